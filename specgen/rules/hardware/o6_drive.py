"""O6: the controller's output can drive what it is wired to."""

from specgen.core.say import Said
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.margin import at_most, least, over
from specgen.sizing.candidate import Unsized, Unsuited

rule = Rule(code="O6", name="The output drives it", weight="must", cites=("Ohm's law", "common practice, no source"))

OURS = frozenset({"controllers.outputs", "control_supply"})
LISTS = frozenset({"devices.contactors", "devices.relays", "devices.ssrs", "devices.power_controllers"})


def applies(case: Case) -> bool:
    """Ask it wherever a kind of device suits the element."""
    return not isinstance(case.device, Unsuited)


def examine(case: Case) -> Finding:
    """Hold coils, inputs and burdens against what the declared outputs give; a panel without such an output cannot be wired."""
    device = case.device
    if isinstance(device, Unsized):
        needs = set(device.needs)
        if needs & OURS and needs <= OURS | LISTS:
            return rule.judge(holds=False, text="It cannot be driven: {because}.", because=device.because)
        return rule.does_not_apply("Nothing was found to drive.")
    if device.undriven is not None:
        return rule.unsized(device.undriven)
    if not device.drives:
        return rule.judge(holds=True, text="The controller's own relay carries the load; there is nothing else to drive.")
    parts: list[str] = []
    words: dict[str, Said | str] = {}
    for number, drive in enumerate(device.drives):
        words[f"what{number}"] = drive.what
        words |= {f"asked{number}": Said(drive.asked, drive.dimension), f"able{number}": Said(drive.able, drive.dimension)}
        parts.append(f"{{what{number}}} is {{asked{number}}} of {{able{number}}}")
    return rule.judge(
        holds=all(at_most(drive.asked, drive.able) for drive in device.drives),
        margin=least(*(over(drive.able, drive.asked) for drive in device.drives)),
        text="Of what the output can give or take: " + "; ".join(parts) + ".",
        **words,
    )
