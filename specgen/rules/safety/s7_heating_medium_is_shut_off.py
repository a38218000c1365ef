"""S7: a heating medium that could pass a danger is shut off without power."""

from specgen.rules.base import Case, Finding, Rule
from specgen.rules.hazard import GOES, heating, lost_positions, rooms
from specgen.sizing.candidate import Unsized

rule = Rule(code="S7", name="The heating medium is shut off", weight="must")


def applies(case: Case) -> bool:
    """Ask it of valves whose opening heats."""
    return case.traits.valve and heating(case)


def examine(case: Case) -> Finding:
    """Ask a valve that stays put, or opens for frost, for an independent high limit that shuts the medium off by another device."""
    limits = case.loop.limits
    if limits.danger_high is None:
        return rule.unanswered("Without limits.danger_high nothing says whether full opening is harmless.", ("limits.danger_high",))
    if isinstance(case.faults, Unsized):
        return rule.unsized(case.faults)
    if not case.faults.on.passes_high:
        return rule.does_not_apply("Full opening passes no danger.")
    supply = {field: position for field, position in lost_positions(case).items() if field != "element.on_signal_loss"}
    field, position = next(iter(supply.items()))
    if position is None:
        return rule.unanswered("Full opening passes the danger, and where the valve goes without supply is not declared.", (field,))
    if position == "close":
        return rule.judge(holds=True, text="Full opening passes the danger; without supply the valve closes.")
    if position == "open" and not limits.frost_risk:
        return rule.judge(holds=False, text="Full opening passes the danger, and without supply the valve opens; no frost asks for it.")
    open_rooms = all(room.open for room in rooms(case, "on", case.faults.on))
    return rule.judge(
        holds=open_rooms,
        text="Full opening passes the danger, and without supply the valve {goes}"
        + (
            ": an independent high limit shuts the medium off by another device."
            if open_rooms
            else "; normal running reaches the danger, so that no high limit has room."
        ),
        goes=GOES[position],
    )
