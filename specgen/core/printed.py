"""Units that pages print in: SI, or those usual in the United States; a table each, and texts that arrive ready made turned over.

Numbers are kept in base units; what is written here reaches pages alone, never the record. Powers are watts in both, as electric heaters
are rated; of motors the horsepower is written. Conductors sold by gauge keep their gauge, others their mm2; heat sinks are sold in
degrees Celsius a watt everywhere.
"""

from collections.abc import Mapping
from dataclasses import dataclass, replace
from typing import Literal

from specgen.core.conversion import ATMOSPHERE, Unit

SystemName = Literal["si", "us", "us_iec"]
Ladder = tuple[tuple[float, Unit], ...]
Meaning = Literal["temperature", "difference"]

FOOT, INCH = 0.3048, 0.0254  # m
POUND = 0.45359237  # kg
GALLON = 231 * INCH**3  # m3
PSI = POUND * 9.80665 / INCH**2  # Pa
INCH_OF_WATER = 249.08891  # Pa
BTU = 1055.05585262  # J, of the International Table
HORSEPOWER = 550 * FOOT * POUND * 9.80665  # W
KCMIL = 1e3 * 3.141592653589793 / 4 * (INCH / 1e3) ** 2  # m2, a thousand circular mils
CV = 1 / 0.865  # Cv of a Kv of 1 m3/h
MINUTE, HOUR, DAY, YEAR = 60.0, 3600.0, 86400.0, 365.25 * 86400.0


@dataclass(frozen=True, slots=True)
class System:
    """How numbers of one system are printed.

    ``fixed`` is the one unit of a dimension, ``ladders`` the units of one that has several, the largest first with the least number
    [base units] that is written in it. ``small`` is the unit below the number given. ``own`` turns the unit a loop is written in
    into one of this system; ``texts`` what stands in ready texts, the scale being that from unit to unit. ``degrees`` is the same of
    temperatures; where a text does not tell a temperature from a difference in its unit, it is read as ``unsure`` says, None leaving it.
    """

    fixed: Mapping[str, Unit]
    ladders: Mapping[str, Ladder]
    small: Mapping[str, tuple[float, Unit]]
    own: Mapping[str, Unit]
    texts: Mapping[str, Unit]
    degrees: Mapping[str, Unit]
    unsure: Meaning | None


def _rungs(*rungs: tuple[float, str]) -> Ladder:
    return tuple((size, Unit(symbol, 1 / size)) for size, symbol in rungs)


_TIME: Ladder = (
    (YEAR, Unit("years", 1 / YEAR)), (2 * DAY, Unit("days", 1 / DAY)), (3 * HOUR, Unit("h", 1 / HOUR)), (600.0, Unit("min", 1 / MINUTE)),
    (1.0, Unit("s")), (1e-3, Unit("ms", 1e3)),
)  # fmt: skip
_POWER = _rungs((1e6, "MW"), (1e3, "kW"), (1.0, "W"), (1e-3, "mW"))
_PRESSURE = _rungs((1e5, "bar"), (1e2, "mbar"), (1.0, "Pa"))
_SMALL = {
    "current": (0.1, Unit("mA", 1e3)),
    "resistance": (0.1, Unit("m\u03a9", 1e3)),
    "voltage": (0.1, Unit("mV", 1e3)),
}
_COMMON = {
    "years": Unit("years"), "per_hour": Unit("an hour"), "number": Unit(""), "current": Unit("A"), "voltage": Unit("V"),
    "resistance": Unit("\u03a9"), "fraction": Unit("percent", 100.0), "frequency": Unit("Hz"), "per_year": Unit("a year"),
    "operations": Unit("operations"), "degrees": Unit("°"), "i2t": Unit("A² s"), "per_second": Unit("1/s"),
}  # fmt: skip
_FAHRENHEIT, _OF_FAHRENHEIT = Unit("degF", 1.8, 32.0), Unit("degF", 1.8)
_PER_HOUR_F = HOUR / BTU / 1.8  # Btu/(h degF) of a W/K

_US_PRESSURE: Ladder = ((0.1 * PSI, Unit("psi", 1 / PSI)), (0.0, Unit("inH2O", 1 / INCH_OF_WATER)))

SI = System(
    fixed=_COMMON | {
        "length": Unit("m"), "area": Unit("m²"), "loss": Unit("W/K"), "mass": Unit("kg"), "u_value": Unit("W/(m² K)"),
        "thermal_resistance": Unit("K/W"), "kv": Unit("m³/h"), "temperature": Unit("°C"), "difference": Unit("K"), "density": Unit("kg/m³"),
        "flow_volume": Unit("m³/h", HOUR), "air_flow": Unit("m³/h", HOUR), "flow_mass": Unit("kg/h", HOUR),
    },
    ladders={
        "time": _TIME, "power": _POWER, "motor_power": _POWER,
        "heat_capacity": _rungs((1e6, "MJ/K"), (1e3, "kJ/K"), (1.0, "J/K")),
        "specific_heat": _rungs((1e3, "kJ/(kg K)"), (1.0, "J/(kg K)")),
        "energy": _rungs((1e6, "MJ"), (1e3, "kJ"), (1.0, "J")),
        "pressure": _PRESSURE, "pressure_difference": _PRESSURE,
    },
    small=_SMALL | {"area": (1e-3, Unit("mm²", 1e6)), "length": (0.1, Unit("mm", 1e3))},
    own={
        "degF": Unit("degC"), "psi": Unit("bar", 1e-5), "inHg": Unit("mbar", 1e-2), "inH2O": Unit("mbar", 1e-2),
        "ftH2O": Unit("mbar", 1e-2), "gal/min": Unit("m3/h", HOUR), "ft3/min": Unit("m3/h", HOUR), "lb/h": Unit("kg/h", HOUR),
        "ft": Unit("m"), "in": Unit("mm", 1e3), "inch": Unit("mm", 1e3), "inches": Unit("mm", 1e3),
    },
    texts={
        "degF/min": Unit("K/min", 1 / 1.8),
        "degF/h": Unit("K/h", 1 / 1.8), "psi": Unit("bar", PSI / 1e5), "psi/min": Unit("bar/min", PSI / 1e5),
        "psi/s": Unit("bar/s", PSI / 1e5), "inH2O": Unit("mbar", INCH_OF_WATER / 1e2), "gal/min": Unit("m³/h", GALLON * 60),
        "gal": Unit("l", GALLON * 1e3), "lb/h": Unit("kg/h", POUND), "lb": Unit("kg", POUND), "ft": Unit("m", FOOT),
        "inch": Unit("mm", INCH * 1e3), "ft2": Unit("m²", FOOT**2), "hp": Unit("kW", HORSEPOWER / 1e3),
        "Btu/h": Unit("kW", BTU / HOUR / 1e3), "Btu/degF": Unit("kJ/K", BTU * 1.8 / 1e3),
        "Btu/(h degF)": Unit("W/K", BTU * 1.8 / HOUR), "Btu/(lb degF)": Unit("kJ/(kg K)", BTU * 1.8 / POUND / 1e3),
        "Btu/(h ft2 degF)": Unit("W/(m² K)", BTU * 1.8 / HOUR / FOOT**2),
    },
    degrees=dict.fromkeys(("degF", "°F"), Unit("°C", 1 / 1.8, -160 / 9)),
    unsure=None,
)  # fmt: skip

US = System(
    fixed=_COMMON | {
        "length": Unit("ft", 1 / FOOT), "area": Unit("ft²", 1 / FOOT**2), "loss": Unit("Btu/(h °F)", _PER_HOUR_F),
        "mass": Unit("lb", 1 / POUND), "u_value": Unit("Btu/(h ft² °F)", _PER_HOUR_F * FOOT**2), "thermal_resistance": Unit("°C/W"),
        "kv": Unit("Cv", CV), "temperature": _FAHRENHEIT, "difference": _OF_FAHRENHEIT, "density": Unit("lb/ft³", FOOT**3 / POUND),
        "flow_volume": Unit("gal/min", MINUTE / GALLON), "air_flow": Unit("ft³/min", MINUTE / FOOT**3),
        "flow_mass": Unit("lb/h", HOUR / POUND), "motor_power": Unit("hp", 1 / HORSEPOWER),
        "heat_capacity": Unit("Btu/°F", 1 / BTU / 1.8), "specific_heat": Unit("Btu/(lb °F)", POUND / BTU / 1.8),
        "energy": Unit("Btu", 1 / BTU),
    },
    ladders={"time": _TIME, "power": _POWER, "pressure": _US_PRESSURE, "pressure_difference": _US_PRESSURE},
    small=_SMALL | {"area": (1e-3, Unit("kcmil", 1 / KCMIL)), "length": (FOOT, Unit("in", 1 / INCH))},
    own={
        "degC": _FAHRENHEIT, "K": _OF_FAHRENHEIT,
        **dict.fromkeys(("bar", "mbar", "Pa", "hPa", "kPa", "MPa"), Unit("psi", 1 / PSI)),
        **dict.fromkeys(("m3/h", "m3/s", "m3/min", "l/h", "l/min", "l/s", "L/min", "L/s", "L/h"), Unit("gal/min", MINUTE / GALLON)),
        **dict.fromkeys(("kg/h", "kg/s", "kg/min", "t/h", "g/s"), Unit("lb/h", HOUR / POUND)),
        "m": Unit("ft", 1 / FOOT), "cm": Unit("in", 1 / INCH), "mm": Unit("in", 1 / INCH),
    },
    texts={
        "degF": Unit("°F"), "K": Unit("°F", 1.8),
        **dict.fromkeys(("K/min", "degC/min"), Unit("°F/min", 1.8)), "K/s": Unit("°F/s", 1.8), "K/h": Unit("°F/h", 1.8),
        "K/W": Unit("°C/W"), "bar": Unit("psi", 1e5 / PSI), "mbar": Unit("psi", 1e2 / PSI), "kPa": Unit("psi", 1e3 / PSI),
        "MPa": Unit("psi", 1e6 / PSI), "bar/min": Unit("psi/min", 1e5 / PSI), "bar/s": Unit("psi/s", 1e5 / PSI),
        **dict.fromkeys(("m³/h", "m3/h"), Unit("gal/min", 1 / GALLON / 60)), "l/min": Unit("gal/min", 1e-3 / GALLON),
        "l/s": Unit("gal/min", 0.06 / GALLON), **dict.fromkeys(("l", "L"), Unit("gal", 1e-3 / GALLON)), "kg/h": Unit("lb/h", 1 / POUND),
        "kg/s": Unit("lb/h", HOUR / POUND), "t/h": Unit("lb/h", 1e3 / POUND), "kg": Unit("lb", 1 / POUND), "t": Unit("lb", 1e3 / POUND),
        "m": Unit("ft", 1 / FOOT), "cm": Unit("in", 1e-2 / INCH), "mm": Unit("in", 1e-3 / INCH),
        **dict.fromkeys(("m²", "m2"), Unit("ft²", 1 / FOOT**2)), "kW/K": Unit("Btu/(h °F)", 1e3 * _PER_HOUR_F),
        "W/K": Unit("Btu/(h °F)", _PER_HOUR_F), **dict.fromkeys(("W/(m² K)", "W/(m2 K)"), Unit("Btu/(h ft² °F)", _PER_HOUR_F * FOOT**2)),
        "kJ/(kg K)": Unit("Btu/(lb °F)", 1e3 * POUND / BTU / 1.8), "J/(kg K)": Unit("Btu/(lb °F)", POUND / BTU / 1.8),
        "MJ/K": Unit("Btu/°F", 1e6 / BTU / 1.8), "kJ/K": Unit("Btu/°F", 1e3 / BTU / 1.8), "J/K": Unit("Btu/°F", 1 / BTU / 1.8),
        **dict.fromkeys(("mm²", "mm2"), Unit("kcmil", 1e-6 / KCMIL)), "Btu/h": Unit("kW", BTU / HOUR / 1e3), "inch": Unit("in"),
        "Btu/degF": Unit("Btu/°F"), "Btu/(h degF)": Unit("Btu/(h °F)"), "Btu/(lb degF)": Unit("Btu/(lb °F)"),
        "Btu/(h ft2 degF)": Unit("Btu/(h ft² °F)"), "ft2": Unit("ft²"), "degF/min": Unit("°F/min"),
    },
    degrees=dict.fromkeys(("degC", "°C"), Unit("°F", 1.8, 32.0)),
    unsure="temperature",  # differences are said in K
)  # fmt: skip

# where conductors are sold by their mm2, these stay beside feet and Fahrenheit
US_IEC = replace(
    US,
    small={**US.small, "area": SI.small["area"]},
    texts={unit: to for unit, to in US.texts.items() if unit not in ("mm²", "mm2")},
)
SYSTEMS: Mapping[SystemName, System] = {"si": SI, "us": US, "us_iec": US_IEC}


def system_named(show: str, code_basis: str) -> SystemName:
    """Return the system that a panel's pages print in.

    Examples
    --------
    >>> system_named("si", "north_america"), system_named("us", "north_america"), system_named("us", "iec")
    ('si', 'us', 'us_iec')
    """
    if show == "si":
        return "si"
    return "us" if code_basis == "north_america" else "us_iec"


def own_unit(unit: Unit, system: SystemName, *, change: bool = False) -> Unit:
    """Return the unit of a system for a unit that a loop is written in; a designer's own stays as it is.

    Parameters
    ----------
    unit : Unit
        As written; a pressure may be ``bar absolute``.
    system : str
        What the pages print in.
    change : bool
        Whether a difference is printed, which has no zero of its own.

    Examples
    --------
    >>> own_unit(Unit("degC"), "us").symbol, own_unit(Unit("bar", 1e-5), "us").symbol, own_unit(Unit("pH"), "us").symbol
    ('degF', 'psi', 'pH')
    """
    plain, absolute, _ = unit.symbol.partition(" absolute")
    to = SYSTEMS[system].own.get(plain)
    if to is None:
        return unit
    if change:
        symbol = "K" if to.symbol == "degC" else to.symbol
        return Unit(symbol, to.scale)
    return Unit(to.symbol + absolute, to.scale, ATMOSPHERE * to.scale) if absolute else to
