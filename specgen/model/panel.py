"""The panel: supply, enclosure, duty, the shop's own limits, revision."""

import datetime
from itertools import pairwise
from typing import Annotated, Literal

from pydantic import Field, model_validator

from specgen.core.quantity import Quantity, Range
from specgen.model.fields import (
    Count,
    Current,
    Flag,
    Fraction,
    Length,
    Model,
    Number,
    Resistance,
    Share,
    TemperatureRange,
    Text,
    Time,
    Voltage,
    Written,
    problem,
)
from specgen.model.loop import Duty
from specgen.model.sensor import Signal

Status = Literal["for review", "for construction", "as built"]


def _quantity(text: str, value: float) -> Quantity:
    return Quantity(value, text)


class Issue(Model):
    """One line of the revision history."""

    revision: Text
    date: datetime.date
    purpose: Text


class Head(Model):
    """Who and what the dossier is for."""

    reference: Text
    title: Text
    revision: Annotated[str, Field(pattern=r"^[A-Za-z0-9][A-Za-z0-9.-]{0,9}$")]
    status: Status
    date: datetime.date
    coincidence: Share = _quantity("100 percent", 1.0)
    history: tuple[Issue, ...] = ()


class Supply(Model):
    """The incoming supply."""

    voltage: Voltage
    phases: Count
    system: Literal["star", "delta", "single", "split", "high_leg"] | None = None
    neutral: Flag = True
    earthing: Literal["TN_S", "TN_C_S", "TT", "IT"] = "TN_S"
    frequency: Annotated[Quantity, Written("frequency", sign="positive")]
    tolerance: Fraction = _quantity("10 percent", 0.1)
    network: Literal["private", "public"] = "private"
    impedance: Resistance | None = None
    prospective_fault_current: Current | None = None
    incomer: Current | None = None
    isolator: Flag = True

    @model_validator(mode="after")
    def _phases(self) -> "Supply":
        if self.phases not in (1, 3):
            raise problem("F151", f"{self.phases} phases; 1 or 3 are possible", "write 1 or 3", at=("phases",))
        if self.tolerance >= 0.5:  # noqa: PLR2004  beyond this the text cannot be meant
            raise problem("F170", f"a supply tolerance of {self.tolerance.text} is no supply", "usual is 10 percent", at=("tolerance",))
        return self


class ControlSupply(Model):
    """The supply of coils and controllers."""

    voltage: Voltage = _quantity("24 V", 24.0)
    kind: Literal["dc", "ac"] = "dc"
    capacity: Current = _quantity("10 A", 10.0)


class ControllerOutput(Model):
    """Outputs of one kind of a controller."""

    kind: Literal["relay", "logic", "analogue"]
    count: Count = 1
    rating: Current | None = None
    voltage: Voltage | None = None
    drive: Current | None = None
    signal: Signal | None = None
    burden: Resistance | None = None
    electrical_life: Number | None = None


class Controller(Model):
    """A controller by its outputs."""

    name: Text
    scan: Time = _quantity("0.25 s", 0.25)
    pulse: Literal["latched", "ramp"] = "latched"
    outputs: tuple[ControllerOutput, ...] = ()


class Enclosure(Model):
    """The enclosure and where it stands."""

    height: Length
    width: Length
    depth: Length
    mounting: Literal["free_standing", "against_wall", "end_of_row", "mid_row", "end_of_row_against_wall", "mid_row_against_wall",
                      "mid_row_against_wall_roof_covered"] = "free_standing"
    surface: Literal["painted_steel", "stainless", "aluminium", "polyester"] = "painted_steel"
    ambient: TemperatureRange
    altitude: Annotated[Quantity, Written("length", sign="not_negative")] = _quantity("200 m", 200.0)
    interior_limit: Annotated[Quantity, Written("temperature")] = _quantity("45 degC", 45.0)
    other_heat: Annotated[Quantity, Written("power", sign="not_negative")] = _quantity("60 W", 60.0)
    cooling: Annotated[Quantity, Written("power", sign="not_negative")] = _quantity("0 W", 0.0)


class Confirmed(Model):
    """A table row that somebody held against the standard or data sheet."""

    row: Text
    by: Text
    against: Text


class SettingStep(Model):
    """Smallest step in which a setting can be entered, by quantity."""

    temperature: Annotated[Quantity, Written("difference", sign="positive")] = _quantity("0.1 K", 0.1)
    pressure: Annotated[Quantity, Written("pressure_difference", sign="positive")] = _quantity("0.01 bar", 1000.0)
    humidity: Fraction = _quantity("0.1 percent", 0.001)
    level: Fraction = _quantity("0.1 percent", 0.001)


YEAR = 365.25 * 86400.0  # the Julian year, as pint has it
_SERIES = (1, 2, 3, 5, 8, 10, 15, 20, 30, 45, 60, 90, 120, 180, 240, 300)


class House(Model):
    """The shop's own limits."""

    contact_life: Time = _quantity("10 year", 10 * YEAR)
    swing_share: Share = _quantity("25 percent", 0.25)
    sensor_share: Share = _quantity("33 percent", 0.33)
    after_power_return: Literal["resume", "off"] | None = None
    setting_step: SettingStep = SettingStep()
    cycle_time_series: tuple[Number, ...] = tuple(Quantity(s, str(s)) for s in _SERIES)
    spare_outputs: Annotated[Quantity, Written("fraction", sign="not_negative")] = _quantity("20 percent", 0.2)
    voltage_drop: Share = _quantity("5 percent", 0.05)

    @property
    def contact_life_years(self) -> float:
        """Return the contact life asked for [year]."""
        return float(self.contact_life) / YEAR

    @model_validator(mode="after")
    def _rising(self) -> "House":
        series = self.cycle_time_series
        if not series or any(b <= a for a, b in pairwise(series)):
            raise problem("F171", "the series of cycle times must rise", "for example [1, 2, 5, 10, 20]", at=("cycle_time_series",))
        return self


class Panel(Model):
    """The whole of panel.yml."""

    panel: Head
    supply: Supply
    control_supply: ControlSupply = ControlSupply()
    controllers: tuple[Controller, ...] = ()
    enclosure: Enclosure
    duty: Duty = Duty(hours_per_day=_quantity("16 h", 57600.0), days_per_year=250)
    confirmed: tuple[Confirmed, ...] = ()
    short_circuit_rating: Current | None = None
    code_basis: Literal["iec", "north_america"] = "iec"
    show: Literal["si", "us"] = "si"
    house: House = House()

    @property
    def supply_range(self) -> Range:
        """Return the supply as a share of rated, over its tolerance."""
        return Range(1 - self.supply.tolerance, 1 + self.supply.tolerance, f"rated supply ±{self.supply.tolerance.text}")
