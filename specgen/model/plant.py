"""The plant: what the loop acts on, in one of four forms."""

from typing import Annotated, Literal

from pydantic import Field, model_validator

from specgen.core.quantity import Quantity, Range
from specgen.model.fields import (
    ChangeRange,
    Model,
    RateRange,
    Text,
    TimeRange,
    TimeRangeOrNone,
    ValueRange,
    Voltage,
    Written,
    problem,
)

Mass = Annotated[Range, Written("mass", may_range=True, sign="not_negative")]
SpecificHeat = Annotated[Range, Written("specific_heat", may_range=True, sign="positive")]
HeatCapacity = Annotated[Range, Written("heat_capacity", may_range=True, sign="positive")]
Area = Annotated[Range, Written("area", may_range=True, sign="positive")]
UValue = Annotated[Range, Written("u_value", may_range=True, sign="positive")]
Loss = Annotated[Range, Written("loss", may_range=True, sign="positive")]
Load = Annotated[Range, Written("power", may_range=True, sign="any")]
Temperatures = Annotated[Range, Written("temperature", may_range=True)]


class Body(Model):
    """A mass that is heated or cooled."""

    what: Text
    mass: Mass
    specific_heat: SpecificHeat
    follows: Literal["fast", "slow"] = "fast"


class Surface(Model):
    """A surface through which heat is lost to the surroundings."""

    what: Text
    area: Area
    u_value: UValue


class Balance(Model):
    """A heat balance from first principles."""

    bodies: Annotated[tuple[Body, ...], Field(max_length=50)] | None = None
    heat_capacity: HeatCapacity | None = None
    surfaces: Annotated[tuple[Surface, ...], Field(max_length=50)] | None = None
    loss: Loss | None = None
    surroundings: Temperatures | None = None
    load: Load | None = None
    dead_time: TimeRangeOrNone
    lag: TimeRange | None = None

    @model_validator(mode="after")
    def _one_way(self) -> "Balance":
        if (self.bodies is None) == (self.heat_capacity is None):
            raise problem("F120", "exactly one of bodies and heat_capacity is needed", "for example heat_capacity: 60 kJ/K")
        if self.surfaces is not None and self.loss is not None:
            raise problem("F120", "surfaces and loss say the same thing twice", "keep one of them", at=("loss",))
        if self.bodies is not None and not any(b.follows == "fast" and b.mass.low > 0 for b in self.bodies):
            raise problem("F121", "no body with a mass follows the element fast; the value would jump",
                          "let what the sensor sees have follows: fast and a mass above zero", at=("bodies",))
        loses = self.surfaces is not None or self.loss is not None
        if loses and self.surroundings is None:
            raise problem("F122", "surroundings are needed where heat is lost to them", "for example surroundings: 8 degC to 30 degC")
        return self


class Response(Model):
    """A known first-order response with dead time."""

    change: ChangeRange
    time_constant: TimeRange
    dead_time: TimeRangeOrNone
    lag: TimeRange | None = None
    rest_value: ValueRange


class Rates(Model):
    """Rates observed around the setpoint, or of an integrating plant."""

    with_output: RateRange
    without_output: RateRange
    dead_time: TimeRangeOrNone
    lag: TimeRange | None = None


class StepTest(Model):
    """A recorded step test to identify the response from."""

    file: Text
    time: Text
    output: Text
    value: Text
    unit: Text | None = None
    supply: Voltage | None = None


class Plant(Model):
    """The plant in exactly one form."""

    balance: Balance | None = None
    response: Response | None = None
    rates: Rates | None = None
    step_test: StepTest | None = None

    @model_validator(mode="after")
    def _one_form(self) -> "Plant":
        given = [name for name in ("balance", "response", "rates", "step_test") if getattr(self, name) is not None]
        if len(given) != 1:
            text = "no form of plant is given" if not given else f"two forms of plant are given: {' and '.join(given)}"
            raise problem("F123", text, "give one of balance, response, rates, step_test", at=(given[1],) if len(given) > 1 else ())
        return self

    @property
    def form(self) -> str:
        """Return the name of the form given."""
        return next(name for name in ("balance", "response", "rates", "step_test") if getattr(self, name) is not None)

    @property
    def dead_time(self) -> Range | None:
        """Return the declared dead time [s]; a step test has none."""
        held = self.balance or self.response or self.rates
        return held.dead_time if held else None

    @property
    def lag(self) -> Range | None:
        """Return the declared second lag [s]."""
        held = self.balance or self.response or self.rates
        return held.lag if held else None


__all__ = ["Balance", "Body", "Plant", "Quantity", "Rates", "Response", "StepTest", "Surface"]
