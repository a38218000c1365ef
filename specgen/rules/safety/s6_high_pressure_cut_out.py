"""S6: a refrigerant circuit has a high-pressure cut-out independent of the loop."""

from specgen.rules.base import Case, Finding, Rule
from specgen.rules.declared import field

rule = Rule(
    code="S6", name="High-pressure cut-out", weight="must", needs=("element.high_pressure_cutout",), cites=("EN 378-2 (from memory)",)
)


def applies(case: Case) -> bool:
    """Ask it of machines declared to be part of a refrigerant circuit."""
    return case.traits.may_refrigerate and field(case, "element.refrigerant_circuit") is True


def examine(case: Case) -> Finding:
    """Ask for the cut-out: the loop's own output is no protection of the circuit."""
    present = field(case, "element.high_pressure_cutout") is True
    return rule.judge(
        holds=present,
        text="A high-pressure cut-out stops the machine whatever the loop asks for."
        if present
        else "The machine is part of a refrigerant circuit and is declared to have no high-pressure cut-out.",
    )
