"""Every rule of the book with its weight and its plain sentence, whether it is examined yet or not.

The sheet names what is not examined (``not_examined``), so that no silence reads as clearance.
"""

from collections.abc import Iterable
from dataclasses import dataclass

from specgen.rules.base import Scope, Weight


@dataclass(frozen=True, slots=True)
class Planned:
    """One rule of the book: code, weight, scope and the sentence a person reads."""

    code: str
    weight: Weight
    scope: Scope
    sentence: str


FAMILY_NAMES = {
    "A": "direction and safe state",
    "M": "mode",
    "D": "differential",
    "C": "cycle time",
    "V": "valves and three-point",
    "O": "output device and hardware",
    "E": "panel",
    "I": "instrument",
    "S": "safety",
    "T": "tuning",
}

_ROWS: tuple[tuple[str, Weight, Scope, str], ...] = (
    ("A1", "must", "loop", "raising the value by more output is reverse acting, lowering it is direct acting"),
    ("A2", "must", "loop", "the output on sensor fault is declared, and a heating element does not stay on without reason and limit"),
    ("A3", "must", "loop", "a valve without signal or supply goes where the safe state is, or passes no danger where it goes"),
    ("A4", "should", "loop", "no drive is the safe state"),
    ("A5", "must", "pair", "two loops that act on one body in opposite directions are never on together"),
    ("M1", "must", "loop", "a fixed-speed compressor is switched on-off, never time-proportioned"),
    ("M2", "must", "loop", "what has an analogue input takes a continuous output"),
    ("M3", "must", "loop", "what only switches never takes a continuous signal"),
    ("M4", "must", "loop", "what a motor drives open and closed takes a three-point output, and nothing else does"),
    ("M5", "should", "loop", "where on-off would leave the tolerance, proportional control is used"),
    ("M6", "should", "loop", "steady control is proportional; relaxed control is on-off where on-off fits"),
    ("M7", "must", "loop", "what is started and stopped whole is switched on-off, never time-proportioned"),
    ("M8", "must", "loop", "loads that must not be switched whole take a power controller"),
    ("M9", "must", "loop", "full output reaches every setpoint in the worst case"),
    ("M10", "note", "loop", "the output's share at both ends is known, and where the loop rests"),
    ("M11", "must", "loop", "two stages take two switch points"),
    ("M12", "must", "loop", "pump-down switches the liquid line, and defrosts count as starts"),
    ("M13", "note", "loop", "among equals the first in the order of choice is taken"),
    ("D1", "must", "loop", "the differential is at least one step of the measurement"),
    ("D2", "should", "loop", "the differential is at least twice the measurement noise"),
    ("D3", "must", "loop", "starts per hour, least run and least rest hold over the whole declared range"),
    ("D4", "must", "loop", "the worst excursion and the measuring error stay inside the tolerance"),
    ("D5", "should", "loop", "every contact in the chain lasts the house's contact life"),
    ("D6", "should", "loop", "the least times do not act in settled running"),
    ("C1", "must", "loop", "the ripple from switching takes no more than the house's share of the tolerance"),
    ("C2", "must", "loop", "the starting values pay for the cycle's delay, and a sudden load stays inside the tolerance"),
    ("C3", "should", "loop", "every contact in the chain lasts the house's contact life at this cycle time"),
    ("C4", "must", "loop", "the shortest on and off times are pulses the device can make"),
    ("C5", "should", "loop", "contacts take the longest cycle allowed, solid state the shortest"),
    ("C6", "note", "loop", "where the contacts need a longer cycle than control allows, the window is shown"),
    ("C7", "should", "loop", "on a public network the switching does not flicker the lights"),
    ("C8", "should", "loop", "the cycle lengthens the loop's delay by at most half"),
    ("V1", "should", "loop", "the opening at highest and lowest duty lies within 10 to 90 percent of travel"),
    ("V2", "should", "loop", "the lowest controllable flow is below the lowest duty's"),
    ("V3", "must", "loop", "the neutral zone is at least twice the effect of the shortest pulse and one step of the measurement"),
    ("V4", "should", "loop", "pulses an hour and motor duty stay within the actuator's"),
    ("O1", "must", "loop", "the device's rating in the load's category covers the current at the supply's worse end"),
    ("O2", "must", "loop", "a solid-state device has the heat sink it needs, and its heat counts in the panel"),
    ("O3", "must", "loop", "solid state is no isolation: an isolating device stands upstream"),
    ("O4", "should", "loop", "the leakage of an open device cannot hold in or light the load"),
    ("O5", "must", "loop", "the device survives its short-circuit protection"),
    ("O6", "must", "loop", "the controller's output can drive what it is wired to"),
    ("O7", "should", "loop", "coils have suppression suited to kind and output"),
    ("O8", "must", "loop", "a three-phase load switched in two phases has an isolation contactor and a warning"),
    ("O9", "should", "loop", "the device runs at no more than its highest operating frequency"),
    ("O10", "should", "loop", "signals have a live zero, so that a broken wire is seen"),
    ("O11", "note", "loop", "elements that leak after standing damp have residual-current protection"),
    ("E1", "must", "panel", "protection covers the current, and the conductor covers the protection"),
    ("E2", "should", "panel", "line currents are within 15 percent of each other"),
    ("E3", "must", "panel", "the incoming demand is within the incomer"),
    ("E4", "must", "panel", "the control supply carries continuous and inrush load with 20 percent reserve"),
    ("E5", "must", "panel", "the interior stays at or below its limit"),
    ("E6", "should", "panel", "spare outputs are left"),
    ("E7", "must", "panel", "the panel's short-circuit current rating covers the fault current"),
    ("E8", "must", "panel", "resistive heating above 48 A is subdivided"),
    ("I1", "should", "loop", "the measuring error takes no more than the house's share of the tolerance"),
    ("I2", "must", "loop", "the tolerance is at least two steps of the measurement"),
    ("I3", "should", "loop", "the sensor's lag is below a fifth of the time constant"),
    ("I4", "should", "loop", "a sensor break is detected, and which way it drives is known"),
    ("S1", "must", "loop", "where a stuck output passes a danger, something independent stops it"),
    ("S2", "note", "loop", "the time to danger and to spoiling is known"),
    ("S3", "must", "loop", "a solid-state output is taken to fail closed"),
    ("S4", "must", "loop", "after loss and return of supply nothing starts that can hurt"),
    ("S5", "must", "loop", "an electric heater that needs air or liquid has it proven"),
    ("S6", "must", "loop", "a refrigerant circuit has a high-pressure cut-out independent of the loop"),
    ("S7", "must", "loop", "a heating medium that could pass a danger is shut off without power"),
    ("S8", "note", "loop", "cautions end with what local code and a licensed person decide"),
    ("T1", "note", "loop", "starting values come from a published rule, the cycle's delay included"),
    ("T2", "must", "loop", "peak sensitivity is at most 2 and the gain margin at least 2 in the worst case"),
    ("T3", "note", "loop", "what to watch at start-up tells a long cycle from too much gain"),
    ("T4", "should", "loop", "the overshoot at start-up stays within what is allowed"),
)  # fmt: skip

PLANNED = tuple(Planned(*row) for row in _ROWS)


def not_examined(found: Iterable[str]) -> tuple[Planned, ...]:
    """Return the rules of the book whose codes are not among those found.

    Examples
    --------
    >>> [rule.code for rule in not_examined({rule.code for rule in PLANNED} - {"O11", "E7"})]
    ['O11', 'E7']
    """
    known = frozenset(found)
    return tuple(rule for rule in PLANNED if rule.code not in known)
