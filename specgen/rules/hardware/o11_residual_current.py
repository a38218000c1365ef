"""O11: elements that leak after standing damp have residual-current protection."""

from specgen.rules.base import Case, Finding, Rule
from specgen.rules.declared import word

rule = Rule(code="O11", name="Residual current", weight="note")


def applies(case: Case) -> bool:
    """Ask it of electric heaters whose filling can take up damp, as far as that is declared."""
    return case.traits.electric_heat and word(case, "element.fill") == "mineral_insulated"


def examine(case: Case) -> Finding:
    """Ask for protection that sees the leakage, and for drying out before the first full voltage."""
    del case  # the declared filling says it all
    text = (
        "The mineral filling takes up damp and leaks to earth after standing: residual-current protection in its circuit, the insulation "
        "measured before first use, dried out at reduced output where it is low. What it may leak, local code decides."
    )
    return rule.judge(holds=True, text=text)
