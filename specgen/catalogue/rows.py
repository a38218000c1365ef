"""What the packaged tables other than devices hold, typed: outputs, sensor classes, functions, motors, practice."""

from functools import lru_cache
from typing import Annotated, Literal

from pydantic import BeforeValidator, Field

from specgen.core.quantity import Quantity, parse_quantity
from specgen.model.devices import LifePoint
from specgen.model.fields import (
    Current,
    Flag,
    Fraction,
    Model,
    Number,
    Power,
    Resistance,
    Temperature,
    TemperatureRange,
    Text,
    Time,
    Voltage,
    Written,
)
from specgen.model.sensor import Signal

CoupleType = Literal["K", "J", "T", "N", "E", "S", "R", "B"]


def _signed(given: object) -> float:
    """Read a coefficient, which may be negative and has no unit."""
    if not isinstance(given, str):
        raise ValueError("a coefficient is a single number")  # noqa: TRY004  pydantic takes ValueError for a wrong value
    return float(given)


Coefficient = Annotated[float, BeforeValidator(_signed)]
Kelvin = Annotated[Quantity, Written("difference", sign="positive")]

# a figure of a table is asked for at every candidate
_parsed = lru_cache(maxsize=1024)(parse_quantity)


class TypicalOutput(Model):
    """An output of a controller where the panel names none."""

    kind: Literal["relay", "logic", "analogue"]
    rating: Current | None = None
    voltage: Voltage | None = None
    drive: Current | None = None
    signal: Signal | None = None
    burden: Resistance | None = None
    electrical_life: tuple[LifePoint, ...] = ()
    mechanical_life: Number | None = None
    operations_per_hour: Number | None = None
    pull_in: Time | None = None
    drop_out: Time | None = None


class PlatinumClass(Model):
    """Tolerance of a platinum thermometer: ``a + b |t|`` [K]."""

    class_: Text = Field(alias="class")
    a: Kelvin
    b: Number


class PlatinumRange(Model):
    """Temperatures for which a class of platinum thermometer holds [degC]."""

    class_: Text = Field(alias="class")
    wound: TemperatureRange
    film: TemperatureRange


class PlatinumFunction(Model):
    """Coefficients of the resistance of platinum [1/degC, 1/degC2, 1/degC4] and where they hold [degC]."""

    A: Coefficient
    B: Coefficient
    C: Coefficient
    range: TemperatureRange


class CoupleClass(Model):
    """Tolerance of a thermocouple: the greater of ``a`` and ``b |t|``, or ``a + b (t - above)`` beyond ``above`` [K]."""

    type: CoupleType
    class_: Text = Field(alias="class")
    a: Kelvin | None = None
    b: Number
    above: Temperature | None = None
    range: TemperatureRange


class CoupleFunction(Model):
    """One piece of a thermocouple's reference function [mV from degC]."""

    type: CoupleType
    range: TemperatureRange
    coefficients: tuple[Coefficient, ...]
    exponential: tuple[Coefficient, Coefficient, Coefficient] | None = None


class MotorProduct(Model):
    """Efficiency times power factor of motors up to a shaft power."""

    up_to: Power
    drive: Flag
    product: Number


class Converter(Model):
    """Error of a controller's own input: ``a + b |t|`` [K], or a share of the range."""

    input: Literal["platinum", "couple", "cold_junction", "thermistor", "signal"]
    a: Kelvin | None = None
    b: Number | None = None
    share: Fraction | None = None


class FlickerPoint(Model):
    """Changes of voltage a minute, and the relative change at which they are just irritating (Pst = 1)."""

    rate: Number
    change: Fraction


class Practice(Model):
    """A single figure of the trade with its dimension."""

    value: Text
    dimension: Text
    what: Text

    @property
    def quantity(self) -> Quantity:
        """Return the figure in base units."""
        return _parsed(self.value, self.dimension)
