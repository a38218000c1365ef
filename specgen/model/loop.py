"""A loop: what must be held, on what, measured how, acted on by what."""

from typing import Annotated, Literal

from pydantic import Field, model_validator

from specgen.core.quantity import Quantity, Range, Unit, is_a
from specgen.model.element import Element
from specgen.model.fields import Change, Count, Model, Power, Share, Text, Time, Value, ValueRange, Written, problem
from specgen.model.limits import Alarms, Cable, Limits
from specgen.model.plant import Plant
from specgen.model.sensor import Sensor

QuantityName = Literal["temperature", "pressure", "humidity", "level", "flow", "other"]
Mode = Literal["on_off", "time_proportioned", "analogue", "three_point"]
Output = Literal["contactor", "relay", "ssr", "power_controller", "signal", "relay_pair"]
LEAP_YEAR = 366  # days


class Duty(Model):
    """How long the plant runs."""

    hours_per_day: Annotated[Quantity, Written("time", sign="positive")]
    days_per_year: Count

    @model_validator(mode="after")
    def _within(self) -> "Duty":
        if self.hours_per_day > 24 * 3600:
            raise problem("F160", "a day has 24 hours", "write at most 24 h", at=("hours_per_day",))
        if not 1 <= self.days_per_year <= LEAP_YEAR:
            raise problem("F160", "a year has 1 to 366 days", "write for example 250", at=("days_per_year",))
        return self

    @property
    def seconds_per_year(self) -> float:
        """Return the running time of a year [s]."""
        return float(self.hours_per_day) * self.days_per_year


class Tolerance(Model):
    """How far the true value may leave the setpoint on each side; one quantity stands for both."""

    above: Change
    below: Change

    @model_validator(mode="before")
    @classmethod
    def _both_sides(cls, data: object) -> object:
        if isinstance(data, list):
            raise problem("F106", "a difference, or a section of above and below, is expected here",
                          "for example 1.5 K or {above: 2 K, below: 0.5 K}")
        return {"above": data, "below": data} if isinstance(data, str) else data


class SuddenLoad(Model):
    """The largest sudden change of load: a heat flow, or a share of full output."""

    power: Power | None = None
    share: Share | None = None

    @model_validator(mode="before")
    @classmethod
    def _by_unit(cls, data: object) -> object:
        if isinstance(data, list):
            raise problem("F106", "a power or a share of full output is expected here", "for example 0.3 kW or 10 percent")
        if not isinstance(data, str):
            return data
        return {"share": data} if is_a(data, "fraction") else {"power": data}

    @model_validator(mode="after")
    def _one(self) -> "SuddenLoad":
        if (self.power is None) == (self.share is None):
            raise problem("F164", "exactly one of power and share is needed", "for example sudden_load: 0.3 kW")
        return self


class Need(Model):
    """What the loop must hold."""

    quantity: QuantityName
    unit: Text | None = None
    direction: Literal["raise", "lower"]
    setpoint: Value
    range: ValueRange | None = None
    tolerance: Tolerance
    overshoot: Change | None = None
    stability: Literal["steady", "relaxed"] = "steady"
    sudden_load: SuddenLoad | None = None
    duty: Duty | None = None

    @model_validator(mode="after")
    def _inside(self) -> "Need":
        if self.range is not None and not self.range.low <= self.setpoint <= self.range.high:
            raise problem("F161", f"the setpoint {self.setpoint.text} lies outside the range {self.range.text}",
                          "the range holds every setpoint the plant is run at", at=("setpoint",))
        return self

    @property
    def setpoints(self) -> Range:
        """Return the setpoints the plant will be run at."""
        return self.range or Range(float(self.setpoint), float(self.setpoint), self.setpoint.text)


class Choose(Model):
    """The designer's own decision, checked against every rule."""

    mode: Mode | None = None
    output: Output | None = None
    differential: Change | None = None
    placement: Literal["centred", "below", "above"] | None = None
    cycle_time: Time | None = None
    proportional_band: Change | None = None
    integral_time: Time | None = None
    derivative_time: Time | None = None
    because: Text | None = None


class Loop(Model):
    """One control loop as declared; quantities in SI with their written form kept."""

    tag: Text
    service: Text
    area: Text
    acts_on: Text | None = None
    need: Need
    plant: Plant | None = None
    sensor: Sensor
    element: Element
    cable: Cable | None = None
    phases_on: Literal["L1-L2", "L2-L3", "L3-L1", "L1-N", "L2-N", "L3-N"] | None = None
    limits: Limits = Limits()
    alarms: Alarms = Alarms()
    choose: Choose | None = None
    notes: Annotated[tuple[Text, ...], Field(max_length=100)] = ()
    # set by the reader, never written by the user
    unit: Annotated[Unit, Field(exclude=True)]
    difference_unit: Annotated[Unit, Field(exclude=True)]

    @property
    def raises(self) -> bool:
        """Tell whether more output raises the measured value."""
        return self.need.direction == "raise"

    @model_validator(mode="after")
    def _dangers_outside(self) -> "Loop":
        span = self.need.setpoints
        if self.limits.danger_high is not None and self.limits.danger_high <= span.high:
            raise problem("F162", f"danger_high {self.limits.danger_high.text} is not above the highest setpoint",
                          f"the setpoints are {span.text}", at=("limits", "danger_high"))
        if self.limits.danger_low is not None and self.limits.danger_low >= span.low:
            raise problem("F162", f"danger_low {self.limits.danger_low.text} is not below the lowest setpoint",
                          f"the setpoints are {span.text}", at=("limits", "danger_low"))
        return self
