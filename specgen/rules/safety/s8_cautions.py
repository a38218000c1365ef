"""S8: cautions end with what local code and a licensed person decide."""

from specgen.catalogue.cautions import caution_for
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.hazards import hazards_of

rule = Rule(code="S8", name="Cautions and who decides", weight="note", cites=("catalogue of cautions, a source a row",))


def examine(case: Case) -> Finding:
    """Name the hazards that the loop's kind, medium and consequence bring; the sheet carries a caution for each."""
    found = [caution_for(hazard, case.panel.code_basis) for hazard in hazards_of(case)]
    heads = [known[0].head for known in found if known is not None]
    if not heads:
        return rule.does_not_apply("Nothing that the loop file declares is on the list of hazards.")
    named = "; ".join(head[:1].lower() + head[1:] for head in heads)
    return rule.judge(
        holds=True,
        text="Cautions stand on the sheet for: {named}. What is needed against them the local code and licensed persons decide.",
        named=named,
    )
