"""The final element: heater, machine, valve or burner, one model a kind."""

from typing import Annotated, Literal

from pydantic import Field, model_validator

from specgen.core.quantity import Quantity, Range
from specgen.model.fields import (
    Count,
    Current,
    Flag,
    Fraction,
    Model,
    Number,
    Power,
    PowerRange,
    PressureRange,
    Resistance,
    TemperatureRange,
    Text,
    Time,
    TimeRange,
    Voltage,
    Written,
    problem,
)
from specgen.model.sensor import Signal

Medium = Literal["water", "steam", "air", "gas", "brine", "oil"]
OnLoss = Literal["close", "open", "hold"]
Flow = Annotated[Range, Written("flow", may_range=True, sign="positive")]
Kvs = Annotated[Range, Written("kv", may_range=True, sign="positive")]
Density = Annotated[Range, Written("density", may_range=True, sign="positive")]
Speed = Annotated[Quantity, Written("fraction", sign="positive", most=1.0)]


class _Element(Model):
    count: Count = 1

    @model_validator(mode="after")
    def _some(self) -> "_Element":
        if self.count < 1:
            raise problem("F150", "at least one unit is needed", "leave count out where there is one", at=("count",))
        phases = getattr(self, "phases", None)
        if phases not in (None, 1, 3):
            raise problem("F151", f"{phases} phases; 1 or 3 are possible", "write 1 or 3", at=("phases",))
        return self


class ResistiveHeater(_Element):
    """A resistive heater."""

    kind: Literal["resistive_heater"]
    power: PowerRange
    voltage: Voltage
    phases: Count
    connection: Literal["star", "delta"] | None = None
    needs: tuple[Literal["airflow", "level", "flow"], ...] | None = None
    fill: Literal["dry_element", "mineral_insulated"] | None = None


class SpecialHeater(_Element):
    """A heater that asks for phase angle, soft start or a current limit."""

    kind: Literal["infrared_lamp_heater", "silicon_carbide_heater", "molybdenum_disilicide_heater", "transformer_fed_heater"]
    power: PowerRange
    voltage: Voltage
    phases: Count
    connection: Literal["star", "delta"] | None = None
    inrush_factor: Number | None = None
    needs: tuple[Literal["airflow", "level", "flow"], ...] | None = None


class Defrost(Model):
    """Defrosts, which count as starts."""

    per_day: Count
    duration: Time


class FixedSpeedCompressor(_Element):
    """A compressor of one speed."""

    kind: Literal["fixed_speed_compressor"]
    current: Current | None = None
    power: PowerRange | None = None
    voltage: Voltage
    phases: Count
    min_run: Time
    min_rest: Time
    starts_per_hour: Count
    capacity: PowerRange | None = None
    refrigerant_circuit: Flag | None = None
    high_pressure_cutout: Flag | None = None
    pump_down: Flag | None = None
    defrost: Defrost | None = None

    @model_validator(mode="after")
    def _size(self) -> "FixedSpeedCompressor":
        if self.current is None and self.power is None:
            raise problem("F152", "current or power is needed", "the name-plate's rated current, for example current: 8.4 A")
        return self


class VariableSpeedMachine(_Element):
    """A compressor, fan or pump on a variable-speed drive."""

    kind: Literal["variable_speed_compressor", "variable_speed_fan", "variable_speed_pump"]
    power: PowerRange
    signal: Signal
    lowest_speed: Speed
    voltage: Voltage | None = None
    phases: Count | None = None
    ramp_time: TimeRange | None = None
    min_run: Time | None = None
    min_rest: Time | None = None
    starts_per_hour: Count | None = None
    burden: Resistance | None = None
    refrigerant_circuit: Flag | None = None
    high_pressure_cutout: Flag | None = None
    capacity: PowerRange | None = None

    @model_validator(mode="after")
    def _compressor_only(self) -> "VariableSpeedMachine":
        if self.kind != "variable_speed_compressor":
            for name in ("refrigerant_circuit", "high_pressure_cutout"):
                if getattr(self, name) is not None:
                    raise problem("F101", f"{name} belongs to a compressor only", "leave it out", at=(name,))
        return self


class DirectMotor(_Element):
    """A fan or pump direct on line."""

    kind: Literal["fan", "pump"]
    power: PowerRange
    voltage: Voltage
    phases: Count
    starts_per_hour: Count
    min_run: Time | None = None
    min_rest: Time | None = None
    capacity: PowerRange | None = None


class ModulatingValve(_Element):
    """A valve with an analogue input."""

    kind: Literal["modulating_valve"]
    signal: Signal
    stroke_time: Time
    kvs: Kvs | None = None
    characteristic: Literal["linear", "equal_percentage"] | None = None
    rangeability: Number | None = None
    on_signal_loss: OnLoss | None = None
    on_supply_loss: OnLoss | None = None
    medium: Medium | None = None
    density: Density | None = None
    flow: Flow | None = None
    inlet_pressure: PressureRange | None = None
    outlet_pressure: PressureRange | None = None
    medium_temperature: TemperatureRange | None = None
    burden: Resistance | None = None
    capacity: PowerRange | None = None


class ThreePointValve(_Element):
    """A motorised valve that is driven open and closed."""

    kind: Literal["three_point_valve"]
    travel_time: Time
    min_pulse: Time | None = None
    motor_voltage: Voltage | None = None
    motor_current: Current | None = None
    starts_per_hour: Count | None = None
    on_supply_loss: OnLoss | None = None
    medium: Medium | None = None
    capacity: PowerRange | None = None


class SolenoidValve(_Element):
    """A solenoid valve."""

    kind: Literal["solenoid_valve"]
    coil_power: Power
    voltage: Voltage
    coil_inrush: Power | None = None
    operations_life: Number | None = None
    min_pulse: Time | None = None
    fails: Literal["closed", "open"] | None = None
    medium: Medium | None = None
    capacity: PowerRange | None = None


class GasBurner(_Element):
    """A gas burner with its own certified burner control."""

    kind: Literal["gas_burner"]
    stages: Literal["on_off", "high_low", "modulating"]
    min_run: Time | None = None
    min_rest: Time | None = None
    starts_per_hour: Count | None = None
    signal: Signal | None = None
    burden: Resistance | None = None
    control_voltage: Voltage | None = None
    control_current: Current | None = None
    second_stage_offset: Annotated[Quantity, Written("difference_of_value", sign="positive")] | None = None
    capacity: PowerRange | None = None

    @model_validator(mode="after")
    def _modulating(self) -> "GasBurner":
        if self.stages == "modulating" and self.signal is None:
            raise problem("F102", "signal is needed for a modulating burner", "for example signal: 4-20 mA")
        return self


Element = Annotated[
    ResistiveHeater | SpecialHeater | FixedSpeedCompressor | VariableSpeedMachine | DirectMotor | ModulatingValve | ThreePointValve
    | SolenoidValve | GasBurner,
    Field(discriminator="kind"),
]
__all__ = ["Element", "Fraction", "Text"]
