"""What must never be passed, what spoils the product, and what the output does when something fails."""

from typing import Annotated, Literal

from pydantic import model_validator

from specgen.core.quantity import Range
from specgen.model.fields import Count, Flag, Length, Model, Text, TimeOrNone, Value, Written, problem


class Limiter(Model):
    """An independent limiter that is already chosen."""

    set: Value
    sensor_lag: TimeOrNone | None = None
    resets: Literal["manual", "automatic"] = "manual"


class Limits(Model):
    """Dangers, product limits and declared behaviour on faults."""

    danger_high: Value | None = None
    danger_low: Value | None = None
    consequence: Literal["injury", "fire", "environment", "equipment", "product"] | None = None
    spoils_high: Value | None = None
    spoils_low: Value | None = None
    on_sensor_fault: Literal["off", "full", "hold"] | None = None
    on_sensor_fault_because: Text | None = None
    after_power_return: Literal["resume", "off"] | None = None
    limiter: Limiter | None = None
    frost_risk: Flag = False

    @model_validator(mode="after")
    def _order(self) -> "Limits":
        for low, high in (("danger_low", "danger_high"), ("spoils_low", "spoils_high")):
            below, above = getattr(self, low), getattr(self, high)
            if below is not None and above is not None and below >= above:
                raise problem("F140", f"{low} {below.text} is not below {high} {above.text}", "swap the two", at=(low,))
        return self


class Alarms(Model):
    """Alarm set values."""

    high: Value | None = None
    low: Value | None = None


class Cable(Model):
    """The load cable to the field."""

    length: Length
    method: Literal["B1", "B2", "C", "E"] = "B2"
    grouped: Count = 1
    ambient: Annotated[Range, Written("temperature", may_range=True)] | None = None
