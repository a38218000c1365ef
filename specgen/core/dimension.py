"""The dimensions a field can have: base unit, example, sign and usual units, one row each."""

import re
from dataclasses import dataclass
from typing import Literal

from specgen.core.codes import QuantityError, shown

Sign = Literal["any", "not_negative", "positive"]


@dataclass(frozen=True, slots=True)
class Dimension:
    """What a field measures.

    ``base`` is the unit its numbers are kept in, ``words`` how a sentence names it, ``example`` a value that
    would be right, ``sign`` which numbers suit when the field says nothing else, ``usual`` the units offered in
    a hint. ``label`` is set for a designer's own unit alone (``pH``), which is never converted.
    """

    name: str
    base: str
    words: str
    example: str
    sign: Sign
    usual: tuple[str, ...]
    note: str = ""
    label: str = ""


# starts as every unit does; `to` and `absolute` have a meaning of their own behind a number
_LABEL = re.compile(r"(?!to$|absolute$)[A-Za-z%°\u00b5\u03bc\u03a9\u2126℃℉][^\s]{0,19}")
_GAUGE = "gauge, unless `absolute` follows the unit"
_APPARENT = "VA is read as W, as if the power factor were 1"

_ROWS = (
    Dimension("time", "s", "a time", "20 s", "not_negative", ("s", "ms", "min", "h", "day", "year")),
    Dimension("temperature", "degC", "a temperature", "65 degC", "any", ("degC", "degF", "K"), "a value in K is absolute"),
    Dimension("difference", "K", "a temperature difference", "1.5 K", "not_negative", ("K", "degC", "degF")),
    Dimension("rate_of_temperature", "K/s", "a rate of temperature", "2 K/min", "not_negative", ("K/min", "K/s", "K/h", "degF/min")),
    Dimension("power", "W", "a power", "6 kW", "not_negative", ("W", "kW", "MW", "VA", "hp", "Btu/h"), _APPARENT),
    Dimension("energy", "J", "an energy", "5 kWh", "not_negative", ("J", "kJ", "MJ", "Wh", "kWh", "Btu")),
    Dimension("voltage", "V", "a voltage", "400 V", "not_negative", ("V", "mV", "kV")),
    Dimension("current", "A", "a current", "16 A", "not_negative", ("A", "mA", "kA")),
    Dimension("resistance", "ohm", "a resistance", "500 ohm", "not_negative", ("ohm", "mohm", "kohm")),
    Dimension("i2t", "A2 s", "a let-through (I2t)", "600 A2 s", "positive", ("A2 s", "kA2 s")),
    Dimension("frequency", "Hz", "a frequency", "50 Hz", "positive", ("Hz", "kHz")),
    Dimension("length", "m", "a length", "25 m", "not_negative", ("m", "mm", "cm", "ft", "inch")),
    Dimension("length_rate", "m/s", "a speed", "5 mm/s", "not_negative", ("m/s", "mm/s", "mm/min", "m/h", "ft/min")),
    Dimension("area", "m2", "an area", "14 m2", "not_negative", ("m2", "mm2", "cm2", "ft2")),
    Dimension("volume", "m3", "a volume", "200 l", "not_negative", ("l", "m3", "gal")),
    Dimension("mass", "kg", "a mass", "60 kg", "not_negative", ("kg", "g", "t", "lb")),
    Dimension("density", "kg/m3", "a density", "998 kg/m3", "positive", ("kg/m3", "kg/l", "lb/ft3")),
    Dimension("heat_capacity", "J/K", "a heat capacity", "60 kJ/K", "not_negative", ("kJ/K", "J/K", "MJ/K", "Btu/degF")),
    Dimension("specific_heat", "J/(kg K)", "a specific heat", "4.2 kJ/(kg K)", "positive", ("kJ/(kg K)", "J/(kg K)", "Btu/(lb degF)")),
    Dimension("u_value", "W/(m2 K)", "a heat transfer coefficient", "1.1 W/(m2 K)", "not_negative", ("W/(m2 K)", "Btu/(h ft2 degF)")),
    Dimension("loss", "W/K", "a heat loss per kelvin", "35 W/K", "not_negative", ("W/K", "kW/K", "Btu/(h degF)")),
    Dimension("thermal_resistance", "K/W", "a thermal resistance", "0.5 K/W", "not_negative", ("K/W", "K/kW")),
    Dimension("pressure", "Pa", "a pressure", "6 bar", "any", ("bar", "mbar", "kPa", "Pa", "MPa", "psi"), _GAUGE),
    Dimension("pressure_difference", "Pa", "a pressure difference", "0.2 bar", "not_negative", ("bar", "mbar", "kPa", "Pa", "psi")),
    Dimension("pressure_rate", "Pa/s", "a rate of pressure", "0.1 bar/min", "not_negative", ("bar/min", "bar/s", "kPa/s", "psi/min")),
    Dimension("flow_volume", "m3/s", "a volume flow", "6.3 m3/h", "not_negative", ("m3/h", "l/s", "l/min", "gal/min")),
    Dimension("flow_volume_rate", "m3/s2", "a rate of volume flow", "1 m3/h/s", "not_negative", ("m3/h/s", "l/min/s", "gal/min/s")),
    Dimension("flow_mass", "kg/s", "a mass flow", "250 kg/h", "not_negative", ("kg/h", "kg/s", "t/h", "lb/h")),
    Dimension("flow_mass_rate", "kg/s2", "a rate of mass flow", "10 kg/h/s", "not_negative", ("kg/h/s", "lb/h/s")),
    Dimension("kv", "m3/h", "a valve's flow coefficient (Kv)", "6.3 m3/h", "positive", ("m3/h",), "kept in m3/h at 1 bar; Kv = 0.865 Cv"),
    Dimension("fraction", "1", "a share", "25 percent", "not_negative", ("percent", "%")),
    Dimension("fraction_rate", "1/s", "a rate of a share", "2 percent/min", "not_negative", ("percent/min", "percent/s", "%/min")),
)

DIMENSIONS = {row.name: row for row in _ROWS}


def dimension_named(name: str | Dimension) -> Dimension:
    """Return the row of ``name``; a row is its own answer.

    Raises
    ------
    KeyError
        There is no such dimension: a mistake in specgen itself, never in what the designer wrote.
    """
    return name if isinstance(name, Dimension) else DIMENSIONS[name]


def own_dimension(label: str, *, rate: bool = False) -> Dimension:
    """Return the dimension of a designer's own unit, such as ``pH`` or ``mS/cm``, or of its rate.

    Such a unit stands for itself: the number is kept as written (a rate: per second), and no other unit is taken.

    Raises
    ------
    QuantityError
        Q106: the unit starts with no letter, holds a blank, or is longer than 20 characters.

    Examples
    --------
    >>> own_dimension("pH").example, own_dimension("pH", rate=True).example
    ('5 pH', '5 pH/min')
    """
    if _LABEL.fullmatch(label) is None or not label.isprintable():
        raise QuantityError("Q106", f"{shown(label)} cannot be a unit", "write it without blanks, letter first: pH, mS/cm, ppm")
    if rate:
        units = tuple(f"{label}/{time}" for time in ("min", "s", "h"))
        return Dimension(f"own_rate:{label}", f"{label}/s", f"a rate in {label}", f"5 {label}/min", "not_negative", units, label=label)
    return Dimension(f"own:{label}", label, f"a value in {label}", f"5 {label}", "any", (label,), label=label)
