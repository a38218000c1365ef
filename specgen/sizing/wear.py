"""How long the contacts of a chain last, and which of them ends first."""

from dataclasses import dataclass

from specgen.model.loop import Loop
from specgen.model.panel import Panel
from specgen.sizing.candidate import Unsized
from specgen.sizing.device import Contact, DeviceChoice

HOUR = 3600.0


@dataclass(frozen=True, slots=True)
class Weakest:
    """The contact of the chain that ends first, and the operations it lasts."""

    contact: Contact
    operations: float


def weakest(device: DeviceChoice | Unsized) -> Weakest | None:
    """Return the contact with the fewest operations; None where nothing wears or the chain is not known."""
    if isinstance(device, Unsized):
        return None
    wearing = [Weakest(contact, contact.life) for contact in device.chain if contact.life is not None]
    return min(wearing, key=lambda found: found.operations, default=None)


def hours_per_year(loop: Loop, panel: Panel) -> float:
    """Return the running time of the loop in a year [h]."""
    return (loop.need.duty or panel.duty).seconds_per_year / HOUR


def allowed_per_hour(operations: float, panel: Panel, loop: Loop) -> float:
    """Return how often an hour a contact may operate to last the house's contact life [1/h]."""
    return operations / (panel.house.contact_life_years * hours_per_year(loop, panel))


