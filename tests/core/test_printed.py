"""Units that pages print in, each factor held against pint."""

import re

import pint
import pytest

from specgen.core.conversion import ATMOSPHERE, Unit
from specgen.core.printed import SYSTEMS, own_unit, system_named
from specgen.core.retell import retold
from specgen.core.say import THIN, Phrasing, Said

PINT = pint.UnitRegistry()
# what each printed spelling is to pint; a difference of temperature is meant throughout
NAMES = {
    "°C": "delta_degC", "degC": "delta_degC", "°F": "delta_degF", "degF": "delta_degF", "K": "kelvin", "m³": "m**3", "m²": "m**2",
    "mm²": "mm**2", "m2": "m**2", "m3": "m**3", "mm2": "mm**2", "ft²": "ft**2", "ft³": "ft**3", "ft2": "ft**2", "ft3": "ft**3",
    "h": "hour", "gal": "gallon", "lb": "pound", "in": "inch", "inH2O": "inH2O", "hp": "horsepower", "t": "metric_ton", "L": "liter",
    "l": "liter", "kcmil": "(1000*pi/4*thou**2)", "percent": "percent", "Ω": "ohm", "mΩ": "milliohm", "years": "year", "days": "day",
}  # fmt: skip
BASES = {
    "length": "m", "area": "m**2", "loss": "W/kelvin", "mass": "kg", "u_value": "W/m**2/kelvin", "density": "kg/m**3",
    "flow_volume": "m**3/s", "air_flow": "m**3/s", "flow_mass": "kg/s", "motor_power": "W", "power": "W", "heat_capacity": "J/kelvin",
    "specific_heat": "J/kg/kelvin", "energy": "J", "pressure": "Pa", "pressure_difference": "Pa", "temperature": "kelvin",
    "difference": "kelvin", "time": "s", "current": "A", "resistance": "ohm", "voltage": "V", "thermal_resistance": "kelvin/W",
}  # fmt: skip
OWN_BASES = {
    "bar": "Pa", "mbar": "Pa", "psi": "Pa", "m3/h": "m**3/s", "gal/min": "m**3/s", "kg/h": "kg/s", "lb/h": "kg/s", "m": "m", "mm": "m",
    "ft": "m", "in": "m", "degC": "kelvin", "degF": "kelvin",
}  # fmt: skip


def to_pint(symbol):
    """Return a printed unit as pint reads it: `Btu/(h ft² °F)` is a quotient, a blank a product."""
    text = re.sub(r"[A-Za-zΩ°²³]+[0-9]*[²³A-Z0-9]*", lambda found: NAMES.get(found[0], found[0]), symbol)
    return PINT.parse_expression(text.replace(" ", "*")).to_base_units()


def cases(table):
    return [(system, key, unit) for system, tables in SYSTEMS.items() for key, unit in getattr(tables, table).items()]


@pytest.mark.parametrize(("system", "dimension", "unit"), [case for case in cases("fixed") if case[1] in BASES])
def test_the_one_unit_of_a_dimension(system, dimension, unit):
    base = PINT.parse_expression(BASES[dimension]).to_base_units()
    assert (unit.scale * to_pint(unit.symbol) / base).to("") == pytest.approx(1, rel=2e-6), system


@pytest.mark.parametrize(("system", "dimension", "ladder"), cases("ladders"))
def test_every_rung_of_a_ladder(system, dimension, ladder):
    base = PINT.parse_expression(BASES[dimension]).to_base_units()
    for _, unit in ladder:
        assert (unit.scale * to_pint(unit.symbol) / base).to("") == pytest.approx(1, rel=2e-6), system
    assert [least for least, _ in ladder] == sorted((least for least, _ in ladder), reverse=True)


@pytest.mark.parametrize(("system", "dimension", "small"), cases("small"))
def test_the_smaller_unit(system, dimension, small):
    base = PINT.parse_expression(BASES[dimension]).to_base_units()
    assert (small[1].scale * to_pint(small[1].symbol) / base).to("") == pytest.approx(1, rel=2e-6), system


@pytest.mark.parametrize(("system", "written", "unit"), cases("own"))
def test_the_unit_of_a_loop_is_one_of_the_same_dimension(system, written, unit):
    assert to_pint(written).is_compatible_with(to_pint(unit.symbol)), system
    base = PINT.parse_expression(OWN_BASES[unit.symbol]).to_base_units()
    assert (unit.scale * to_pint(unit.symbol) / base).to("") == pytest.approx(1, rel=2e-6)


@pytest.mark.parametrize(("system", "written", "unit"), cases("texts"))
def test_units_in_ready_texts(system, written, unit):
    """A ready text's factor leads from unit to unit; degrees Celsius a watt of a heat sink are kelvins a watt."""
    assert (to_pint(written) / to_pint(unit.symbol)).to("") == pytest.approx(unit.scale, rel=2e-6), system


def test_a_temperature_has_its_own_zero():
    """Freezing is 32 degF, boiling 212 degF; a difference of 100 K is one of 180 degF."""
    fahrenheit = own_unit(Unit("degC"), "us")
    assert [value * fahrenheit.scale + fahrenheit.offset for value in (0, 100)] == pytest.approx([32, 212])
    assert own_unit(Unit("degC"), "us", change=True) == Unit("degF", 1.8)
    assert own_unit(Unit("degF", 1.8, 32.0), "si") == Unit("degC")
    assert own_unit(Unit("degF", 1.8), "si", change=True) == Unit("K")


def test_an_absolute_pressure_stays_absolute():
    """The standard atmosphere is 14.696 psi absolute and 1.01325 bar absolute; gauge it is nought."""
    psi = own_unit(Unit("bar absolute", 1e-5, 1.01325), "us")
    assert psi.symbol == "psi absolute"
    assert 0 * psi.scale + psi.offset == pytest.approx(14.6959, abs=1e-4)
    bar = own_unit(Unit("psi absolute", 1 / 6894.757), "si")
    assert bar.symbol == "bar absolute"
    assert 0 * bar.scale + bar.offset == pytest.approx(ATMOSPHERE / 1e5)


def test_a_designers_own_unit_is_left_alone():
    assert own_unit(Unit("pH"), "us") == Unit("pH")
    assert own_unit(Unit("percent", 100.0), "us_iec") == Unit("percent", 100.0)


@pytest.mark.parametrize(
    ("value", "dimension", "us", "si"),
    [
        (7.62, "length", "25 ft", "7.62 m"),
        (7456.998715822702, "motor_power", "10 hp", "7.46 kW"),
        (9000.0, "power", "9 kW", "9 kW"),
        (689475.7293168, "pressure", "100 psi", "6.89 bar"),
        (249.08891, "pressure", "1 inH2O", "2.49 mbar"),
        (0.0, "pressure", "0 psi", "0 Pa"),
        (45.0, "temperature", "113 °F", "45 °C"),
        (6.30901964e-5, "flow_volume", "1 gal/min", "0.227 m³/h"),
        (20.0, "time", "20 s", "20 s"),
    ],
)
def test_sentences_say_it_in_the_units_of_the_pages(value, dimension, us, si):
    """1 gal/min is 6.30902e-5 m3/s, 1 hp 745.7 W, 1 psi 6894.757 Pa: from the definitions of inch, pound and gallon."""
    for system, said in (("us", us), ("us_iec", us), ("si", si)):
        assert Phrasing(Unit("degC"), Unit("K"), system).say(Said(value, dimension)).replace(THIN, " ") == said


@pytest.mark.parametrize(
    ("text", "us"),
    [
        ("surroundings 8 degC to 30 degC", "surroundings 46.4 °F to 86 °F"),
        ("8 to 30 degC", "46.4 to 86 °F"),
        ("within ±0.9 K of it", "within ±1.62 °F of it"),
        (f"at {chr(0x2212)}18{THIN}°C", f"at {chr(0x2212)}0.4 °F"),
        ("a heat sink of at most 1.72 K/W", "a heat sink of at most 1.72 °C/W"),
        ("1.1 W/(m2 K) over 14 m2", "0.194 Btu/(h ft² °F) over 151 ft²"),
        ("0.1 bar/min", "1.45 psi/min"),
        (f"1{THIN}200{THIN}mm wide", "47.2 in wide"),
        ("25 min, 3 ms, 40 A, 6 kW, IEC 60204-1 table 6", "25 min, 3 ms, 40 A, 6 kW, IEC 60204-1 table 6"),
        ("=TIC101-M1 and phase L1 of 3", "=TIC101-M1 and phase L1 of 3"),
        ("2.5 mm² in a duct", "4.93 kcmil in a duct"),
        ("98.6 °F, 12 AWG, 10 ft", "98.6 °F, 12 AWG, 10 ft"),
    ],
)
def test_ready_texts_are_turned_over(text, us):
    assert retold(text, "us").replace(THIN, " ") == us.replace(THIN, " ")


def test_conductors_that_are_sold_in_square_millimetres_keep_them():
    assert retold("2.5 mm² over 10 m", "us_iec").replace(THIN, " ") == "2.5 mm² over 32.8 ft"


def test_texts_in_american_units_are_turned_over_for_si():
    assert retold("14.5 psi, 10 ft, 2 hp, 9 degF/min", "si").replace(THIN, " ") == "1 bar, 3.05 m, 1.49 kW, 5 K/min"


def test_a_number_of_degrees_is_turned_over_only_where_its_meaning_is_known():
    """140 degF is 60 degC as a temperature and 77.8 K as a difference: taking one for the other would be a wrong number."""
    assert retold("140 degF", "si") == "140 degF"
    assert retold("140 degF", "si", "temperature") == f"60{THIN}°C"
    assert retold("140 degF", "si", "difference") == f"77.8{THIN}K"
    assert retold("1.5 degC", "us", "difference") == f"2.7{THIN}°F"
    assert retold("65 degC", "us") == f"149{THIN}°F"


def test_the_system_of_a_panel():
    assert [system_named(*pair) for pair in (("si", "iec"), ("us", "iec"), ("us", "north_america"))] == ["si", "us_iec", "us"]
