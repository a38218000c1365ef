"""What the kinds of element have in common, as traits; rules ask these and never a kind's name."""

from dataclasses import dataclass
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from specgen.model.element import Element


@dataclass(frozen=True, slots=True)
class Traits:
    """Yes-or-no properties of one element.

    Attributes
    ----------
    two_state : bool
        Knows only on and off (a machine on the mains, a burner of one or two stages, a solenoid).
    starts_limited : bool
        A machine whose starts, least run and least rest are limited (compressor of one speed).
    runs_whole : bool
        A motor or burner that is started and stopped whole and never proportioned in time.
    analogue_input : bool
        Takes a continuous signal itself.
    travels : bool
        Is driven raise, lower, stop by a motor without an input.
    motor : bool
        Has a motor switched by the panel (utilisation category AC-3).
    heats : bool
        Its full output can overheat something: heater, burner, heating valve (the loop decides that).
    electric_heat : bool
        Turns its electrical power into the heat it moves.
    resistive_power : bool
        Its power follows the square of the supply voltage.
    not_burst_fired : bool
        Must not be switched whole: lamp, silicon carbide, molybdenum disilicide, transformer.
    valve : bool
        Throttles or opens a medium.
    coil : bool
        Is itself an electromagnet switched by the panel (solenoid).
    burner : bool
        Has a certified burner control of its own.
    staged : bool
        Has a second stage.
    may_refrigerate : bool
        May belong to a refrigerant circuit.
    """

    two_state: bool = False
    starts_limited: bool = False
    runs_whole: bool = False
    analogue_input: bool = False
    travels: bool = False
    motor: bool = False
    heats: bool = False
    electric_heat: bool = False
    resistive_power: bool = False
    not_burst_fired: bool = False
    valve: bool = False
    coil: bool = False
    burner: bool = False
    staged: bool = False
    may_refrigerate: bool = False


_SPEED = Traits(analogue_input=True)
_DIRECT = Traits(two_state=True, runs_whole=True, motor=True)

TRAITS = {
    "resistive_heater": Traits(heats=True, electric_heat=True, resistive_power=True),
    # lamps, silicon carbide and transformers change their resistance: the square is the safe estimate for both ends
    "infrared_lamp_heater": Traits(heats=True, electric_heat=True, not_burst_fired=True, resistive_power=True),
    "silicon_carbide_heater": Traits(heats=True, electric_heat=True, not_burst_fired=True, resistive_power=True),
    "molybdenum_disilicide_heater": Traits(heats=True, electric_heat=True, not_burst_fired=True, resistive_power=True),
    "transformer_fed_heater": Traits(heats=True, electric_heat=True, not_burst_fired=True, resistive_power=True),
    "fixed_speed_compressor": Traits(two_state=True, starts_limited=True, motor=True, may_refrigerate=True),
    "variable_speed_compressor": Traits(analogue_input=True, may_refrigerate=True),
    "variable_speed_fan": _SPEED,
    "variable_speed_pump": _SPEED,
    "fan": _DIRECT,
    "pump": _DIRECT,
    "modulating_valve": Traits(analogue_input=True, valve=True),
    "three_point_valve": Traits(travels=True, valve=True),
    "solenoid_valve": Traits(two_state=True, valve=True, coil=True),
    "gas_burner on_off": Traits(two_state=True, runs_whole=True, heats=True, burner=True),
    "gas_burner high_low": Traits(two_state=True, runs_whole=True, heats=True, burner=True, staged=True),
    "gas_burner modulating": Traits(analogue_input=True, heats=True, burner=True),
}


def traits_of(element: "Element") -> Traits:
    """Return the traits of an element; a burner's depend on its stages."""
    stages = getattr(element, "stages", None)
    return TRAITS[f"{element.kind} {stages}" if stages else element.kind]
