"""S5: an electric heater that needs air or liquid has it proven."""

from specgen.rules.base import Case, Finding, Rule
from specgen.rules.declared import field

rule = Rule(code="S5", name="What the heater needs is proven", weight="must", needs=("element.needs",))

SAID = {"airflow": "airflow", "level": "level", "flow": "flow"}


def applies(case: Case) -> bool:
    """Ask it of resistive heat; of special loads only where they declare a need."""
    return case.traits.electric_heat and (not case.traits.not_burst_fired or field(case, "element.needs") is not None)


def examine(case: Case) -> Finding:
    """Take an empty list as an answer: a heater that needs neither air nor liquid."""
    declared = field(case, "element.needs")
    named = [SAID[str(need)] for need in declared] if isinstance(declared, tuple) else []
    if not named:
        return rule.judge(holds=True, text="The heater is declared to need neither air nor liquid.")
    return rule.judge(
        holds=True,
        text="Proven {needs} stands in the power path or in the limiter's chain, not in the controller.",
        needs=" and ".join(named),
    )
