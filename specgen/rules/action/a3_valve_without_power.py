"""A3: a valve without signal or supply goes where the safe state is, or passes no danger where it goes."""

from specgen.rules.base import Case, Finding, Rule
from specgen.rules.hazard import GOES, POSITION_OF, Position, heating, lost_positions, rooms
from specgen.sizing.candidate import Unsized
from specgen.sizing.faults import Faults

rule = Rule(code="A3", name="Valve on loss of signal and supply", weight="must", needs=("limits.on_sensor_fault",))

_LOST = {"element.on_signal_loss": "signal", "element.on_supply_loss": "supply", "element.fails": "power"}


def applies(case: Case) -> bool:
    """Ask it of valves."""
    return case.traits.valve


def examine(case: Case) -> Finding:
    """Judge a position that differs from the safe state by where the value goes with the valve left there, and what ends it."""
    positions = lost_positions(case)
    missing = tuple(field for field, position in positions.items() if position is None)
    if missing:
        return rule.unanswered("Where the valve goes by itself is not declared: {fields}.", missing, fields=" and ".join(missing))
    safe = POSITION_OF[case.loop.limits.on_sensor_fault or "off"]
    said = " and ".join(f"without {_LOST[field]} it {GOES[position]}" for field, position in positions.items() if position)
    elsewhere = [position for position in positions.values() if position is not None and position != safe]
    if not elsewhere:
        return rule.judge(holds=True, text="The safe state is that the valve {safe}; {said}.", safe=GOES[safe], said=said)
    if heating(case) and case.loop.limits.danger_high is None:
        return rule.unanswered(
            "The safe state is that the valve {safe}; {said}; without limits.danger_high nothing says whether that is harmless.",
            ("limits.danger_high",), safe=GOES[safe], said=said,
        )  # fmt: skip
    if isinstance(case.faults, Unsized):
        return rule.unsized(case.faults)
    passing = [position for position in elsewhere if _passes(position, case.faults)]
    ended = all(_is_ended(case, position, case.faults) for position in passing)
    verdict = "staying there passes no danger"
    if passing:
        verdict = "staying there passes a danger" + (", which something independent ends by another device" if ended else "")
    return rule.judge(
        holds=ended, text="The safe state is that the valve {safe}; {said}; {verdict}.", safe=GOES[safe], said=said, verdict=verdict
    )


def _is_ended(case: Case, position: Position, faults: Faults) -> bool:
    """Tell whether a limiter that acts by another device has room; it cannot give back what a closed valve withholds."""
    if faults.off.passes and position != "open":
        return False
    if position == "open" and heating(case) and not case.loop.limits.frost_risk:
        return False
    return all(room.open for room in rooms(case, "on", faults.on))


def _passes(position: Position, faults: Faults) -> bool:
    if position == "open":
        return faults.on.passes
    return faults.off.passes if position == "close" else faults.on.passes or faults.off.passes
