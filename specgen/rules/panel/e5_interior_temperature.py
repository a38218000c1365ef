"""E5: the interior stays at or below its limit."""

from specgen.core.say import Said, watts
from specgen.rules.base import Finding, Rule
from specgen.rules.margin import over
from specgen.rules.panel_case import PanelCase

CITES = ("IEC TR 60890 (effective surface)", "common practice, no source")
rule = Rule(code="E5", name="Interior temperature", weight="must", scope="panel", cites=CITES)


def applies(case: PanelCase) -> bool:
    """Ask it where the heat balance was made."""
    return case.interior is not None


def examine(case: PanelCase) -> Finding:
    """Compare the interior at the ambient's top with the limit that every device is rated at; say what is missing."""
    heat = case.interior
    if heat is None:
        return rule.does_not_apply()
    outside = float(case.panel.enclosure.ambient.high)
    words: dict[str, Said | str] = {
        "loss": watts(heat.loss), "surface": Said(heat.surface, "area"), "outside": Said(outside, "temperature"),
        "interior": Said(heat.interior, "temperature"), "limit": Said(heat.limit, "temperature"),
    }  # fmt: skip
    text = "{loss} over {surface} of effective surface" + _less(heat.cooling, words)
    text += " bring the interior to {interior} where it is {outside} outside; the limit is {limit}"
    margin = over(heat.limit - outside, heat.interior - outside)
    if heat.shortfall is None:
        return rule.judge(holds=True, margin=margin, text=text + ".", **words)
    ways = ["{shortfall} of cooling" if heat.cooling == 0 else "{shortfall} more of cooling"]
    words["shortfall"] = watts(heat.shortfall)
    if heat.surface_needed is not None:
        ways.append("{needed} of effective surface")
        words["needed"] = Said(heat.surface_needed, "area")
    if heat.air is not None:
        ways.append("{air} of air from outside")
        words["air"] = Said(heat.air, "air_flow")
    return rule.judge(holds=False, margin=margin, text=text + ": it takes " + ", or ".join(ways) + ".", **words)


def _less(cooling: float, words: dict[str, Said | str]) -> str:
    if cooling == 0:
        return ""
    words["cooling"] = watts(cooling)
    return ", less {cooling} of cooling,"
