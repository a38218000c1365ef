"""O1: the device's rating in the load's category covers the current at the supply's worse end."""

from specgen.core.say import amperes
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.margin import at_most, over
from specgen.sizing.candidate import Unsized, Unsuited

rule = Rule(code="O1", name="Rated current", weight="must")

LISTS = frozenset({"devices.contactors", "devices.relays", "devices.ssrs", "devices.power_controllers"})
DRIVES = frozenset({"controllers.outputs", "control_supply"})


def examine(case: Case) -> Finding:
    """Break where nothing listed carries the load; where the load itself is not known, leave it open."""
    device = case.device
    if isinstance(device, Unsuited):
        return rule.does_not_apply("This kind of device does not suit the element; there is nothing to rate.")
    if isinstance(device, Unsized):
        if set(device.needs) & DRIVES and set(device.needs) <= LISTS | DRIVES:
            return rule.does_not_apply("A device carries the load; whether it can be driven is asked by O6.")
        if set(device.needs) <= LISTS:
            return rule.judge(holds=False, text="Nothing carries the load this way: {because}.", because=device.because)
        return rule.unsized(device)
    if device.rating is None or device.current is None:
        return rule.does_not_apply("A signal switches no load current.")
    return rule.judge(
        holds=at_most(device.current, device.rating),
        margin=over(device.rating, device.current),
        text="{name} is rated {rating} in {category}, and the load takes {current} at the supply's worse end."
        + (" {instead}" if device.because else ""),
        name=device.name, rating=amperes(device.rating), category=device.category, current=amperes(device.current),
        instead=device.because,
    )  # fmt: skip
