"""The shop's approved devices (devices.yml) and the packaged generic classes, in one form."""

from itertools import pairwise
from typing import Annotated, Literal

from pydantic import Field, model_validator

from specgen.core.quantity import Quantity, Range
from specgen.model.fields import Count, Current, Model, Number, Power, Resistance, Temperature, Text, Time, Voltage, Written, problem

Loss = Annotated[Quantity, Written("power", sign="not_negative")]
ThermalResistance = Annotated[Quantity, Written("thermal_resistance", sign="positive")]
I2t = Annotated[Quantity, Written("i2t", sign="positive")]
Voltages = Annotated[Range, Written("voltage", may_range=True, sign="positive")]


class LifePoint(Model):
    """Electrical life at one current."""

    current: Current
    operations: Number


class Coil(Model):
    """The coil of a contactor or relay."""

    voltage: Voltage
    kind: Literal["dc", "ac"] = "dc"
    power: Power
    inrush: Power | None = None


class _Device(Model):
    name: Text
    source: Text | None = None

    @model_validator(mode="after")
    def _life_falls(self) -> "_Device":
        points = getattr(self, "electrical_life", ())
        ordered = sorted(points, key=lambda p: p.current)
        for low, high in pairwise(ordered):
            if high.current == low.current or high.operations > low.operations:
                raise problem("F180", "electrical life must fall as the current rises, one point a current", at=("electrical_life",))
        return self


class Contactor(_Device):
    """A contactor."""

    poles: Count = 3
    resistive_current: Current
    motor_current: Current
    reference_temperature: Temperature = Quantity(40.0, "40 degC")
    electrical_life: Annotated[tuple[LifePoint, ...], Field(min_length=1)]
    motor_life: tuple[LifePoint, ...] = ()
    mechanical_life: Number
    operations_per_hour: Number
    pull_in: Time
    drop_out: Time
    coil: Coil
    loss_per_pole: Loss


class Relay(_Device):
    """A relay: plug-in or on a controller's board."""

    poles: Count = 1
    resistive_current: Current
    coil_current: Current | None = None
    electrical_life: Annotated[tuple[LifePoint, ...], Field(min_length=1)]
    mechanical_life: Number
    operations_per_hour: Number
    pull_in: Time
    drop_out: Time
    coil: Coil | None = None
    loss_per_pole: Loss = Quantity(0.0, "0 W")


class SsrInput(Model):
    """What the control side of a solid-state switch takes."""

    voltage: Voltages
    current: Current


class SolidState(_Device):
    """A zero-crossing solid-state switch."""

    poles: Count
    switched_poles: Count
    current: Current
    on_drop: Voltage
    slope_resistance: Resistance
    junction_to_case: ThermalResistance
    case_to_sink: ThermalResistance
    highest_junction: Temperature
    leakage: Current
    i2t: I2t
    input: SsrInput


class PowerController(_Device):
    """A power controller with an analogue input."""

    poles: Count = 3
    current: Current
    firing: Literal["phase_angle", "burst", "both"] = "both"
    soft_start: Annotated[Literal["yes", "no"], Field()] = "yes"
    current_limit: Literal["yes", "no"] = "yes"
    signal: Text = "4-20 mA"
    input_resistance: Resistance | None = None
    loss_per_ampere: Annotated[Quantity, Written("voltage", sign="positive")]
    i2t: I2t | None = None


class Devices(Model):
    """The whole of devices.yml."""

    contactors: tuple[Contactor, ...] = ()
    relays: tuple[Relay, ...] = ()
    ssrs: tuple[SolidState, ...] = ()
    power_controllers: tuple[PowerController, ...] = ()
