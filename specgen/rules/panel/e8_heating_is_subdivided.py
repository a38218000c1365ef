"""E8: resistive heating above 48 A is subdivided."""

from specgen.core.say import amperes
from specgen.rules.base import Finding, Rule
from specgen.rules.margin import at_most, over
from specgen.rules.panel_case import PanelCase
from specgen.sizing.feeder import Feeder

rule = Rule(code="E8", name="Subdivided heating", weight="must", scope="panel", cites=("NFPA 70 clause 424.22(B)",))


def applies(case: PanelCase) -> bool:
    """Ask it where the code of North America applies and heaters are fed."""
    return case.panel.code_basis == "north_america" and bool(_rated(case))


def examine(case: PanelCase) -> Finding:
    """Compare the name-plate's current of each circuit of a heater with the limit."""
    limit = float(case.wiring.figure("subdivide").value.quantity)
    rated = _rated(case)
    over_it = [f"{tag} ({current:.3g} A)" for tag, current in rated if not at_most(current, limit)]
    tag, most = max(rated, key=lambda pair: pair[1])
    margin = over(limit, most)
    if over_it:
        text = "Heaters above {limit} on one circuit: {which}; they need more, smaller units."
        return rule.judge(holds=False, margin=margin, text=text, limit=amperes(limit), which=", ".join(over_it))
    text = "The largest circuit of a heater, of {tag}, is rated {most}; {limit} is the most."
    return rule.judge(holds=True, margin=margin, text=text, tag=tag, most=amperes(most), limit=amperes(limit))


def _rated(case: PanelCase) -> list[tuple[str, float]]:
    return [
        (loop.tag, loop.feeder.load.rated * branch.current / loop.feeder.load.current)
        for loop in case.fed
        if isinstance(loop.feeder, Feeder) and loop.traits.electric_heat
        for branch in loop.feeder.branches
    ]
