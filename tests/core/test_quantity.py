"""What a quantity reads as, what it refuses, and that nothing but its own error comes out."""

import copy
import itertools
import math
import pickle

import pint
import pytest
from hypothesis import assume, given
from hypothesis import strategies as st

from specgen.core.quantity import (
    DIMENSIONS,
    QUANTITY_CODES,
    Quantity,
    QuantityError,
    Range,
    Unit,
    is_a,
    own_dimension,
    parse_quantity,
    parse_range,
    unit,
    written_unit,
)

# By hand: 1 bar = 1e5 Pa, atmosphere 101325 Pa, 0 degC = 273.15 K, 32 degF = 0 degC, 1 degF step = 5/9 K,
# 1 h = 3600 s, 1 year = 365.25 days, 1 inch = 25.4 mm.
HAND = [
    ("6 bar", "pressure", 600_000.0),
    ("3 bar absolute", "pressure", 198_675.0),
    ("0 bar absolute", "pressure", -101_325.0),
    ("-0.5 bar", "pressure", -50_000.0),
    ("65 degC", "temperature", 65.0),
    ("149 degF", "temperature", 65.0),
    ("338.15 K", "temperature", 65.0),
    ("65 °C", "temperature", 65.0),
    ("0 K", "temperature", -273.15),
    ("-40 degF", "temperature", -40.0),
    ("\u221240 degC", "temperature", -40.0),
    ("+5 degC", "temperature", 5.0),
    ("1.5 degC", "difference", 1.5),
    ("3 degF", "difference", 5 / 3),
    ("1.5 K", "difference", 1.5),
    ("2 K/min", "rate_of_temperature", 2 / 60),
    ("2 degC/min", "rate_of_temperature", 2 / 60),
    ("3.6 degF/h", "rate_of_temperature", 2 / 3600),
    ("1.2e3 W", "power", 1200.0),
    ("6 kW", "power", 6000.0),
    ("10 VA", "power", 10.0),
    ("0.3 percent", "fraction", 0.003),
    ("25 %", "fraction", 0.25),
    ("25%", "fraction", 0.25),
    ("6 percent/min", "fraction_rate", 0.001),
    ("20 min", "time", 1200.0),
    ("012 s", "time", 12.0),
    ("10 year", "time", 10 * 365.25 * 86400),
    ("15 ms", "time", 0.015),
    ("7 day", "time", 604_800.0),
    ("6.3 m3/h", "kv", 6.3),
    ("3.6 m3/h", "flow_volume", 0.001),
    ("36 kg/h", "flow_mass", 0.01),
    ("0.6 kJ/(kg K)", "specific_heat", 600.0),
    ("60 kJ/K", "heat_capacity", 60_000.0),
    ("1.1 W/(m2 K)", "u_value", 1.1),
    ("1.1 W/( m2 * K )", "u_value", 1.1),
    ("1.1 W/(m²·K)", "u_value", 1.1),
    ("1.1 W/m2/K", "u_value", 1.1),
    ("1.1 W m^-2 K**-1", "u_value", 1.1),
    ("1.1 W m⁻² K⁻¹", "u_value", 1.1),
    ("600 A2 s", "i2t", 600.0),
    ("0.6 kA2 s", "i2t", 600_000.0),
    ("9 mohm", "resistance", 0.009),
    ("2 k\u03a9", "resistance", 2000.0),
    ("2 k\u2126", "resistance", 2000.0),
    ("5 \u00b5A", "current", 5e-6),
    ("5 \u03bcA", "current", 5e-6),
    ("2.5 mm²", "area", 2.5e-6),
    ("10 inch", "length", 0.254),
    ("0.1 bar/min", "pressure_rate", 10_000 / 60),
    ("50 Hz", "frequency", 50.0),
    ("  6\tkW ", "power", 6000.0),
]


@pytest.mark.parametrize(("text", "dimension", "base"), HAND)
def test_reads_as_worked_out_by_hand(text, dimension, base):
    read = parse_quantity(text, dimension)
    assert read == pytest.approx(base, rel=1e-15, abs=0)
    assert read.text == text.strip()
    assert parse_range(text, dimension) == Range(float(read), float(read), text.strip())


def test_decimals_do_not_drift():
    """Rounded once: 0.7 * 0.01 in binary steps would be 0.006999999999999999."""
    assert parse_quantity("0.7 percent", "fraction") == 0.007
    assert parse_quantity("0.1 kW", "power") == 100
    assert parse_quantity("1.1 bar", "pressure") == 110_000
    assert parse_quantity("333.15 K", "temperature") == 60


# What each dimension's usual units and example are in pint's own words, beside pint's unit of our base unit.
PINT_UNITS = {
    "time": ("second", ["second", "millisecond", "minute", "hour", "day", "year"]),
    "temperature": ("degC", ["degC", "degF", "kelvin"]),
    "difference": ("delta_degC", ["kelvin", "delta_degC", "delta_degF"]),
    "rate_of_temperature": ("kelvin/second", ["kelvin/minute", "kelvin/second", "kelvin/hour", "delta_degF/minute"]),
    "power": ("watt", ["watt", "kilowatt", "megawatt", "volt*ampere", "horsepower", "Btu/hour"]),
    "energy": ("joule", ["joule", "kilojoule", "megajoule", "watt*hour", "kilowatt*hour", "Btu"]),
    "voltage": ("volt", ["volt", "millivolt", "kilovolt"]),
    "current": ("ampere", ["ampere", "milliampere", "kiloampere"]),
    "resistance": ("ohm", ["ohm", "milliohm", "kiloohm"]),
    "i2t": ("ampere**2*second", ["ampere**2*second", "kiloampere**2*second"]),
    "frequency": ("hertz", ["hertz", "kilohertz"]),
    "length": ("meter", ["meter", "millimeter", "centimeter", "foot", "inch"]),
    "length_rate": ("meter/second", ["meter/second", "millimeter/second", "millimeter/minute", "meter/hour", "foot/minute"]),
    "area": ("meter**2", ["meter**2", "millimeter**2", "centimeter**2", "foot**2"]),
    "volume": ("meter**3", ["liter", "meter**3", "gallon"]),
    "mass": ("kilogram", ["kilogram", "gram", "metric_ton", "pound"]),
    "density": ("kilogram/meter**3", ["kilogram/meter**3", "kilogram/liter", "pound/foot**3"]),
    "heat_capacity": ("joule/kelvin", ["kilojoule/kelvin", "joule/kelvin", "megajoule/kelvin", "Btu/delta_degF"]),
    "specific_heat": (
        "joule/kilogram/kelvin",
        ["kilojoule/kilogram/kelvin", "joule/kilogram/kelvin", "Btu/pound/delta_degF"],
    ),
    "u_value": ("watt/meter**2/kelvin", ["watt/meter**2/kelvin", "Btu/hour/foot**2/delta_degF"]),
    "loss": ("watt/kelvin", ["watt/kelvin", "kilowatt/kelvin", "Btu/hour/delta_degF"]),
    "thermal_resistance": ("kelvin/watt", ["kelvin/watt", "kelvin/kilowatt"]),
    "pressure": ("pascal", ["bar", "millibar", "kilopascal", "pascal", "megapascal", "psi"]),
    "pressure_difference": ("pascal", ["bar", "millibar", "kilopascal", "pascal", "psi"]),
    "pressure_rate": ("pascal/second", ["bar/minute", "bar/second", "kilopascal/second", "psi/minute"]),
    "flow_volume": ("meter**3/second", ["meter**3/hour", "liter/second", "liter/minute", "gallon/minute"]),
    "flow_volume_rate": ("meter**3/second**2", ["meter**3/hour/second", "liter/minute/second", "gallon/minute/second"]),
    "flow_mass": ("kilogram/second", ["kilogram/hour", "kilogram/second", "metric_ton/hour", "pound/hour"]),
    "flow_mass_rate": ("kilogram/second**2", ["kilogram/hour/second", "pound/hour/second"]),
    "kv": ("meter**3/hour", ["meter**3/hour"]),
    "fraction": ("dimensionless", ["percent", "percent"]),
    "fraction_rate": ("1/second", ["percent/minute", "percent/second", "percent/minute"]),
}
PINT = pint.UnitRegistry()


@pytest.mark.parametrize("row", DIMENSIONS.values(), ids=DIMENSIONS)
def test_usual_units_are_what_pint_says(row):
    base, usual = PINT_UNITS[row.name]
    for ours, theirs in zip(row.usual, usual, strict=True):
        expected = PINT.Quantity(7.5, theirs).to(base).magnitude
        assert parse_quantity(f"7.5 {ours}", row) == pytest.approx(expected, rel=1e-12), ours
    parse_quantity(row.example, row)


REFUSED = [
    ("", "time", "Q101", "20 s"),
    (" \n", "time", "Q101", "20 s"),
    ("1" * 201, "time", "Q101", "20 s"),
    ("soon", "time", "Q102", "1.5 K"),
    ("nan K", "difference", "Q102", ""),
    ("inf W", "power", "Q102", ""),
    ("-inf W", "power", "Q102", ""),
    ("1e5.5 K", "difference", "Q102", ""),
    (".5 K", "difference", "Q102", "write 0.5 K"),
    ("-.5 degC", "temperature", "Q102", "write -0.5 degC"),
    ("5. K", "difference", "Q102", "write 5 K"),
    ("\uff16 bar", "pressure", "Q102", ""),
    ("\u0666 bar", "pressure", "Q102", ""),
    ("± 1.5 K", "difference", "Q102", "write 1.5 K"),
    ("+/- 1.5 K", "difference", "Q102", "write 1.5 K"),
    ("1,5 K", "difference", "Q103", "write 1.5 K"),
    (",5 K", "difference", "Q103", "write 0.5 K"),
    ("1.234,5 W", "power", "Q103", "write 1234.5 W"),
    ("1,000 W", "power", "Q103", "write 1000 W or 1.000 W"),
    ("5", "difference", "Q104", "write 5 K"),
    ("35", "temperature", "Q104", "write 35 degC"),
    ("6 KW", "power", "Q105", "write kW"),
    ("6 mw", "power", "Q105", "write mW or MW"),
    ("20 Sec", "time", "Q105", "write s"),
    ("65 degc", "temperature", "Q105", "write degC"),
    ("65 C", "temperature", "Q105", "write degC"),
    ("65 celsius", "temperature", "Q105", "write degC"),
    ("6 KPA", "pressure", "Q105", "write kPa"),
    ("50 HZ", "frequency", "Q105", "write Hz"),
    ("6 barg", "pressure", "Q105", "write bar"),
    ("6 bara", "pressure", "Q105", "write bar absolute"),
    ("0.6 KJ/(KG k)", "specific_heat", "Q105", "write kJ/(kg K)"),
    ("5 pH", "pressure", "Q105", "bar, mbar"),
    ("5 parsec", "length", "Q105", ""),
    ("5 w/x/y/z", "length", "Q105", "units that fit: m, mm"),
    ("1 W/m2 K", "u_value", "Q106", "write W/(m2 K)"),
    ("1 kJ/kg*K", "specific_heat", "Q106", "write kJ/(kg*K)"),
    ("1 m**999999", "length", "Q106", "1 to 4"),
    ("1 m^9", "length", "Q106", "1 to 4"),
    ("1 m0", "length", "Q106", "1 to 4"),
    ("1 m**2**3", "length", "Q106", ""),
    ("1 W/(m2 K", "u_value", "Q106", "kJ/(kg K)"),
    ("1 W//K", "loss", "Q106", ""),
    ("1 (W/K)", "loss", "Q106", ""),
    ("1 __import__('os')", "power", "Q106", ""),
    ("1 " + "m " * 60, "length", "Q106", ""),
    ("6 bar", "temperature", "Q107", "65 degC"),
    ("1.5 K", "pressure", "Q107", "6 bar"),
    ("20 m", "time", "Q107", "min"),
    ("50 Hz", "fraction_rate", "Q107", "percent/min"),
    ("5 percent/s", "frequency", "Q107", "Hz"),
    ("6.3 gal/min", "kv", "Q107", "0.865"),
    ("5 K/s", "difference", "Q107", ""),
    ("5 degC/min", "temperature", "Q107", ""),
    ("-5 K", "difference", "Q108", ""),
    ("-1 min", "time", "Q108", ""),
    ("0 Hz", "frequency", "Q108", ""),
    ("-300 degC", "temperature", "Q109", ""),
    ("-1 K", "temperature", "Q109", ""),
    ("-460 degF", "temperature", "Q109", ""),
    ("-1.1 bar", "pressure", "Q109", "gauge"),
    ("-0.1 bar absolute", "pressure", "Q109", ""),
    ("1 K to 2 K", "difference", "Q111", "1.5 K"),
    ("4-20 mA", "current", "Q111", "write 4 to 20 mA"),
    ("4\u201320 mA", "current", "Q111", "write 4 to 20 mA"),
    ("4 mA - 20 mA", "current", "Q111", "write 4 mA to 20 mA"),
    ("4 - 20 mA", "current", "Q111", "write 4 to 20 mA"),
    ("4 mA = x", "current", "Q106", ""),
    ("5 =", "current", "Q106", ""),
    ("4 ... 20 mA", "current", "Q111", "write 4 to 20 mA"),
    ("1" * 41 + " W", "power", "Q112", ""),
    ("1e400 W", "power", "Q112", ""),
    ("1e5000 W", "power", "Q112", ""),
    ("1e-400 W", "power", "Q112", ""),
    ("99999999e300 MPa", "pressure", "Q112", ""),
    ("0.00000001e-300 ms", "time", "Q112", ""),
    ("1 000 W", "power", "Q113", "write 1000 W"),
    ("1'000 W", "power", "Q113", "write 1000 W"),
    ("1_000 W", "power", "Q113", "write 1000 W"),
    ("1:30 h", "time", "Q113", ""),
    ("1/2 inch", "length", "Q113", ""),
    ("2*3 W", "power", "Q113", ""),
    ("5 W absolute", "power", "Q114", ""),
    ("5 bar absolute", "pressure_difference", "Q114", ""),
]


@pytest.mark.parametrize(("text", "dimension", "code", "hint"), REFUSED)
def test_refused_with_its_code_and_a_hint(text, dimension, code, hint):
    with pytest.raises(QuantityError) as caught:
        parse_quantity(text, dimension)
    assert caught.value.code == code
    assert hint in caught.value.hint
    assert str(caught.value) == caught.value.text
    assert (caught.value.text + caught.value.hint).isprintable()


def test_every_code_is_met_here():
    met = {row[2] for row in REFUSED} | {"Q110"}
    assert met == set(QUANTITY_CODES)
    assert len(set(QUANTITY_CODES.values())) == len(QUANTITY_CODES)


@pytest.mark.parametrize("value", [None, 5, 1.5, ["5 K"], {"above": "5 K"}, b"5 K"])
def test_no_text_is_refused(value):
    for parse in (parse_quantity, parse_range):
        with pytest.raises(QuantityError) as caught:
            parse(value, "difference")
        assert caught.value.code == "Q101"
    assert not is_a(value, "difference")


def test_a_dimension_that_does_not_exist_is_our_own_mistake():
    with pytest.raises(KeyError):
        parse_quantity("5 K", "temperatur")


class TestRange:
    @pytest.mark.parametrize(
        ("text", "dimension", "low", "high"),
        [
            ("0 to 3.5 kW", "power", 0, 3500),
            ("0 kW to 3.5 kW", "power", 0, 3500),
            ("500 W to 3.5 kW", "power", 500, 3500),
            ("5 degC to 95 degF", "temperature", 5, 35),
            ("-10 to 5 degC", "temperature", -10, 5),
            ("1 to 3 bar absolute", "pressure", -1325, 198_675),
            ("1 bar absolute to 3 bar absolute", "pressure", -1325, 198_675),
            ("5 K to 5 K", "difference", 5, 5),
            ("0  to\t140 kg", "mass", 0, 140),
        ],
    )
    def test_read(self, text, dimension, low, high):
        assert parse_range(text, dimension) == Range(low, high, text)

    @pytest.mark.parametrize(
        ("text", "dimension", "code", "hint"),
        [
            ("35 to 5 degC", "temperature", "Q110", "smaller number first"),
            ("35 degC to 5 degC", "temperature", "Q110", "write 5 degC to 35 degC"),
            ("5 degC to 35", "temperature", "Q104", "write 5 degC to 35 degC"),
            ("5 to 35", "temperature", "Q104", "write 5 to 35 degC"),
            ("1 bar to 3 bar absolute", "pressure", "Q114", "both ends"),
            ("1 bar absolute to 3 bar", "pressure", "Q114", "both ends"),
            ("1 to 2 to 3 K", "difference", "Q111", ""),
            ("to 3 K", "difference", "Q102", ""),
            ("3 K to", "difference", "Q105", ""),
            ("-1 to 3 K", "difference", "Q108", ""),
            ("1 kW to 3 K", "difference", "Q107", ""),
            ("1 K to 3,5 K", "difference", "Q103", "write 3.5 K"),
        ],
    )
    def test_refused(self, text, dimension, code, hint):
        with pytest.raises(QuantityError) as caught:
            parse_range(text, dimension)
        assert caught.value.code == code
        assert hint in caught.value.hint


class TestSign:
    def test_a_field_may_allow_more(self):
        assert parse_quantity("-3 kW", "power", sign="any") == -3000
        assert parse_range("-3 to 2 kW", "power", sign="any").low == -3000
        assert parse_quantity("0 Hz", "frequency", sign="not_negative") == 0

    def test_a_field_may_allow_less(self):
        for text in ("0 K", "-1 K"):
            with pytest.raises(QuantityError, match="K'"):
                parse_quantity(text, "difference", sign="positive")
        with pytest.raises(QuantityError):
            parse_range("0 to 5 K", "difference", sign="positive")

    def test_a_temperature_below_zero_is_no_negative_size(self):
        assert parse_quantity("-40 degC", "temperature") == -40


class TestUnit:
    def test_shown_is_base_times_scale_plus_offset(self):
        assert unit("degF", "temperature") == Unit("degF", 1.8, 32.0)
        assert unit("K", "temperature") == Unit("K", 1.0, 273.15)
        assert unit("degF", "difference") == Unit("degF", 1.8, 0.0)
        assert unit("percent", "fraction") == Unit("percent", 100.0, 0.0)
        assert unit("bar", "pressure") == Unit("bar", 1e-5, 0.0)
        assert unit("m3/h", "kv") == Unit("m3/h", 1.0, 0.0)

    def test_written_unit(self):
        assert written_unit("6 bar") == Unit("bar", 1e-5, 0.0)
        assert written_unit("3 bar absolute") == Unit("bar absolute", 1e-5, 1.01325)
        assert written_unit("5 to 35 degC") == Unit("degC", 1.0, 0.0)
        assert written_unit("5 K") == Unit("K", 1.0, 0.0)
        assert written_unit("300 K", "temperature") == Unit("K", 1.0, 273.15)
        assert written_unit("5 degF", "difference") == Unit("degF", 1.8, 0.0)
        assert written_unit("5 m3/h") == Unit("m3/h", 3600.0, 0.0)
        assert written_unit("5 m4") == Unit("m4", 1.0, 0.0)

    @pytest.mark.parametrize(("text", "dimension"), [("5", None), ("five", None), ("5 K", "pressure"), ("5 pH", None)])
    def test_no_unit(self, text, dimension):
        with pytest.raises(QuantityError):
            written_unit(text, dimension)

    def test_is_a_looks_at_the_unit_alone(self):
        assert is_a("-300 degC", "temperature")
        assert is_a("0 to 3 kW", "power")
        assert is_a("3 bar absolute", "pressure")
        assert not is_a("3 bar absolute", "power")
        assert not is_a("3", "power")
        assert not is_a("3 kw", "power")


class TestOwnUnit:
    def test_is_kept_as_written(self):
        assert parse_quantity("-7.2 pH", own_dimension("pH")) == -7.2
        assert parse_range("2 to 3 mS/cm", own_dimension("mS/cm")) == Range(2, 3, "2 to 3 mS/cm")
        assert unit("pH", own_dimension("pH")) == Unit("pH")

    def test_its_rate_is_per_second(self):
        assert parse_quantity("6 mS/cm/min", own_dimension("mS/cm", rate=True)) == 0.1
        assert written_unit("6 pH/h", own_dimension("pH", rate=True)) == Unit("pH/h", 3600.0)

    @pytest.mark.parametrize("label", ["", "7", "g CO2", "a" * 21, "to", "absolute", "p\u200bH", "/s", "\n"])
    def test_what_cannot_be_a_unit(self, label):
        for rate in (False, True):
            with pytest.raises(QuantityError) as caught:
                own_dimension(label, rate=rate)
            assert caught.value.code == "Q106"

    @pytest.mark.parametrize("text", ["7 ph", "7 pH/min", "7 bar", "7 pH absolute"])
    def test_takes_no_other(self, text):
        assert not is_a(text, own_dimension("pH"))
        with pytest.raises(QuantityError):
            parse_quantity(text, own_dimension("pH"))


def test_a_quantity_survives_pickle_and_copy():
    made = parse_quantity("6 bar", "pressure")
    copies = [copy.copy(made), copy.deepcopy(made), *(pickle.loads(pickle.dumps(made, protocol)) for protocol in range(6))]  # noqa: S301 - made one line above
    assert {(type(other), other, other.text) for other in copies} == {(Quantity, 600_000.0, "6 bar")}
    assert Quantity(1.5) == 1.5
    assert type(made * 2) is float, "a computed number was not written by anybody"


NAMES = st.sampled_from(sorted(DIMENSIONS))
ANY_UNIT = st.sampled_from([(row.name, usual) for row in DIMENSIONS.values() for usual in row.usual])
SMALL = st.decimals(min_value=0, max_value=100_000, places=3)


@given(ANY_UNIT, SMALL)
def test_quantities_round_trip(named, number):
    """What is read and shown again in its unit is what was written, to the last digits of a float."""
    dimension, symbol = named
    assume(number > 0)
    read = parse_quantity(f"{number} {symbol}", dimension)
    shown = unit(symbol, dimension)
    assert read * shown.scale + shown.offset == pytest.approx(float(number), rel=1e-12, abs=1e-9)
    again = parse_quantity(read.text, dimension)
    assert (again, again.text) == (read, read.text)


@given(ANY_UNIT, SMALL, SMALL)
def test_ranges_keep_their_order(named, one, other):
    dimension, symbol = named
    low, high = sorted((one, other))
    assume(low > 0)
    read = parse_range(f"{low} to {high} {symbol}", dimension)
    assert read.low <= read.high
    assert read == parse_range(f"{low} {symbol} to {high} {symbol}", dimension).__class__(read.low, read.high, read.text)
    if low < high:
        with pytest.raises(QuantityError):
            parse_range(f"{high} to {low} {symbol}", dimension)


PIECES = st.sampled_from(
    ["1", "5", "0", "-", "+", ".", ",", "e", "E", " ", " to ", "to", "K", "kW", "degC", "bar", "absolute", "m", "2", "**", "^", "*", "/",
     "(", ")", "%", "percent", "\u00b2", "\u03a9", "\u2126", "\u00b5", "\u212a", "\u0130", "\u0660", "\u00a0", "\n", "nan", "inf", "±",
     "_", "'", ":", "\x00", "x"]
)  # fmt: skip


@given(st.lists(PIECES, max_size=25).map("".join) | st.text(max_size=60), NAMES)
def test_no_text_raises_anything_else(text, dimension):
    for parse in (parse_quantity, parse_range):
        problem = None
        try:
            read = parse(text, dimension)
        except QuantityError as error:
            problem = error
        if problem is not None:
            assert problem.code in QUANTITY_CODES
            assert problem.text
            assert (problem.text + problem.hint).isprintable()
        else:
            ends = (read.low, read.high) if isinstance(read, Range) else (read,)
            assert all(math.isfinite(end) for end in ends)
            assert is_a(text, dimension)
            written_unit(text, dimension)


def test_each_pair_of_dimensions_is_told_apart():
    """A value of one dimension in a field of another is refused, but where both measure the same thing."""
    same = [{"temperature", "difference"}, {"pressure", "pressure_difference"}, {"flow_volume", "kv"}]
    for one, other in itertools.permutations(DIMENSIONS.values(), 2):
        if {one.name, other.name} not in same:
            assert not is_a(one.example, other), (one.name, other.name)


@given(st.text(min_size=1, max_size=20), SMALL)
def test_an_own_unit_that_is_taken_can_be_written(label, number):
    try:
        value, rate = own_dimension(label), own_dimension(label, rate=True)
    except QuantityError:
        return
    assert parse_quantity(f"{number} {label}", value) == float(number)
    assert parse_quantity(f"{number} {label}/s", rate) == float(number)
    parse_quantity(value.example, value)
    parse_quantity(rate.example, rate)
