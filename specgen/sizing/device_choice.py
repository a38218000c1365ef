"""The device of a candidate: the smallest that carries the load, and the larger ones where life asks for more."""

from specgen.catalogue.load import Catalogue
from specgen.model.loop import Loop
from specgen.model.panel import Panel
from specgen.model.traits import Traits
from specgen.sizing.candidate import Candidate, Unsized, Unsuited
from specgen.sizing.contactor_choice import contactor_choices
from specgen.sizing.device import DeviceChoice
from specgen.sizing.relay_choice import relay_choices, relay_pair_choices
from specgen.sizing.signal_choice import signal_choices
from specgen.sizing.solid_state_choice import power_controller_choices, solid_state_choices


def choose_device(candidate: Candidate, loop: Loop, panel: Panel, traits: Traits, catalogue: Catalogue) -> DeviceChoice | Unsized:
    """Return the smallest device of a candidate's kind that carries the load, with every contact in its chain.

    Parameters
    ----------
    candidate : Candidate
        Mode and kind of device.
    loop, panel, traits, catalogue
        The loop with its element's traits, the panel, and what is looked up.

    Returns
    -------
    DeviceChoice or Unsized
        What is typical is among its assumptions, what is not computed yet among its open points. Unsized where none is large
        enough or a field is missing, Unsuited where the kind of device does not suit, NoCandidate where nobody would wire it.
    """
    found = devices_by_rating(candidate, loop, panel, traits, catalogue)
    return found if isinstance(found, Unsized) else found[0]


def larger_devices(candidate: Candidate, loop: Loop, panel: Panel, traits: Traits, catalogue: Catalogue) -> tuple[DeviceChoice, ...]:
    """Return the devices after the one chosen, by rating, for a step that wants a longer life; parameters as `choose_device`."""
    found = devices_by_rating(candidate, loop, panel, traits, catalogue)
    return () if isinstance(found, Unsized) else found[1:]


def devices_by_rating(
    candidate: Candidate, loop: Loop, panel: Panel, traits: Traits, catalogue: Catalogue
) -> tuple[DeviceChoice, ...] | Unsized:
    """Return every device of a candidate's kind that carries the load, in the order of choice; parameters as `choose_device`."""
    if traits.travels and candidate.device in ("relay", "contactor", "ssr"):
        return Unsuited("a valve that travels is driven by a pair of relays")
    if traits.analogue_input and candidate.device in ("relay", "contactor", "ssr"):
        return Unsuited("the element takes a signal; no load current is switched")
    match candidate.device:
        case "relay":
            return relay_choices(loop, panel, traits, catalogue)
        case "contactor":
            return contactor_choices(loop, panel, catalogue)
        case "ssr":
            return solid_state_choices(loop, panel, traits, catalogue)
        case "power_controller":
            return power_controller_choices(loop, panel, traits, catalogue)
        case "signal":
            return signal_choices(loop, panel, traits, catalogue)
        case "relay_pair":
            return relay_pair_choices(loop, panel, traits, catalogue)
