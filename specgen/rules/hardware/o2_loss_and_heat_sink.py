"""O2: a solid-state device has the heat sink it needs, and its heat counts in the panel."""

from specgen.core.say import Said, watts
from specgen.rules.base import Case, Finding, Rule
from specgen.sizing.candidate import Unsized

rule = Rule(code="O2", name="Loss and heat sink", weight="must", cites=("thermal resistances in series", "common practice, no source"))

REACHED = {"natural": "which the panel's own air reaches", "forced": "which needs a fan"}


def applies(case: Case) -> bool:
    """Ask it of semiconductors in the load's circuit; a device that was not found has no heat."""
    return case.candidate.device in ("ssr", "power_controller") and not isinstance(case.device, Unsized)


def examine(case: Case) -> Finding:
    """Keep the junction below its limit at full output, with the interior limit as the air at the heat sink."""
    device = case.device
    if isinstance(device, Unsized) or device.loss is None:
        return rule.does_not_apply()
    words: dict[str, Said | str] = {"loss": watts(device.loss), "interior": Said(float(case.panel.enclosure.interior_limit), "temperature")}
    heat = "{name} leaves {loss} in the panel at full output"
    words["name"] = device.name
    if not device.cooling:
        text = heat + ", on its own heat sink; its rated current at {interior} is to be held against its data sheet."
        return rule.judge(holds=True, margin=None, text=text, **words)
    if device.heat_sink is None or device.cooling == "none":
        text = heat + "; at {interior} no heat sink keeps its junction below its limit, with a fan or without, and nothing larger helps."
        return rule.judge(holds=False, margin=None, text=text, **words)
    text = heat + "; at {interior} its heat sink has at most {sink}, " + REACHED[device.cooling] + "."
    words["sink"] = Said(device.heat_sink, "thermal_resistance")
    return rule.judge(holds=True, margin=device.sink_margin, text=text, **words)
