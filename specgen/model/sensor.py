"""The sensor and how it is read."""

from typing import Annotated, Literal

from pydantic import Field, model_validator

from specgen.core.quantity import Quantity, Range
from specgen.model.fields import Change, Count, Model, Resistance, Share, TimeRange, ValueRange, Written, problem

Signal = Literal["4-20 mA", "0-20 mA", "0-10 V", "2-10 V", "0-5 V", "1-5 V"]
THERMOCOUPLES = ("K", "J", "T", "N", "E", "S", "R", "B")


class _Sensor(Model):
    step: Change | None = None
    noise: Change | None = None
    lag: TimeRange | None = None

    @property
    def range(self) -> Range | None:
        """Return the measured range, of a transmitter only."""
        return None


class ResistanceSensor(_Sensor):
    """A platinum resistance thermometer (IEC 60751)."""

    kind: Literal["pt100", "pt1000"]
    class_: Literal["AA", "A", "B", "C"] = Field("B", alias="class")
    wires: Count = 3

    @model_validator(mode="after")
    def _wires(self) -> "ResistanceSensor":
        if self.wires not in (2, 3, 4):
            raise problem("F130", f"{self.wires} wires; a resistance thermometer has 2, 3 or 4", "write 2, 3 or 4", at=("wires",))
        return self


class Thermistor(_Sensor):
    """A thermistor with negative coefficient."""

    kind: Literal["ntc"]
    r25: Resistance | None = None
    beta: Annotated[Quantity, Written("difference", sign="positive")] | None = None
    accuracy: Change | None = None
    wires: Count = 2


class Thermocouple(_Sensor):
    """A thermocouple (IEC 60584)."""

    kind: Literal["thermocouple_K", "thermocouple_J", "thermocouple_T", "thermocouple_N", "thermocouple_E", "thermocouple_S",
                  "thermocouple_R", "thermocouple_B"]
    class_: Literal["1", "2", "3"] = Field("2", alias="class")


class Transmitter(_Sensor):
    """A transmitter with a standard signal."""

    kind: Literal["transmitter"]
    measured_range: ValueRange | None = Field(None, alias="range")
    accuracy: Share | None = None
    signal: Signal | None = None
    wires: Count = 2

    @property
    def range(self) -> Range | None:
        """Return the measured range."""
        return self.measured_range


Sensor = Annotated[ResistanceSensor | Thermistor | Thermocouple | Transmitter, Field(discriminator="kind")]
