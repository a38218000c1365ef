"""A relay at the load: the controller's own where it carries it, else a plug-in relay driven by it."""

from collections.abc import Iterator
from dataclasses import dataclass

from specgen.catalogue.load import Catalogue
from specgen.core.figure import Figure
from specgen.model.devices import Relay
from specgen.model.loop import Loop
from specgen.model.panel import Panel
from specgen.model.traits import Traits
from specgen.sizing.candidate import Assumption, NoCandidate, Unsized, Unsuited
from specgen.sizing.chain import contact, element_contact, relay_rating, typical
from specgen.sizing.coil_drive import coil_current, coil_drives
from specgen.sizing.controller import OutputSide, controller_side
from specgen.sizing.current import LoadCurrent, load_current
from specgen.sizing.device import Contact, DeviceChoice, Drawn, Drive
from specgen.sizing.drawn import load_drawn, loss_figure
from specgen.sizing.suppression import suppressors


@dataclass(frozen=True, slots=True)
class _Option:
    name: str
    poles: int
    rating: Figure
    chain: tuple[Contact, ...]
    figures: tuple[Figure, ...]
    assumptions: tuple[Assumption, ...]
    loss: float | None = None
    drawn: tuple[Drawn, ...] = ()
    drives: tuple[Drive, ...] = ()


def relay_choices(loop: Loop, panel: Panel, traits: Traits, catalogue: Catalogue) -> tuple[DeviceChoice, ...] | Unsized:
    """Return the relays that could switch a load, the smallest first.

    Parameters
    ----------
    loop, panel, traits, catalogue
        The loop with its element's traits, the panel, and what is looked up.

    Returns
    -------
    tuple of DeviceChoice, or Unsized
        Unsized with a reason that starts with 'a relay' where a relay is no candidate: motors, three-phase loads, loads
        above its rating in their category.
    """
    if traits.motor:
        return NoCandidate("a relay is no candidate for a motor: it has no rating in AC-3")
    load = load_current(loop.element, panel, catalogue)
    if isinstance(load, Unsized):
        return load
    if load.connection.way == "three_phase":
        return NoCandidate("a relay is no candidate for a three-phase load")
    return _choices(loop, load, panel, catalogue, pair=False)


def relay_pair_choices(loop: Loop, panel: Panel, traits: Traits, catalogue: Catalogue) -> tuple[DeviceChoice, ...] | Unsized:
    """Return the pairs of relays that could drive a travelling valve, the smallest first; parameters as `relay_choices`."""
    if not traits.travels:
        return Unsuited("a pair of relays drives a valve that travels; this element does not")
    load = load_current(loop.element, panel, catalogue)
    if isinstance(load, Unsized):
        return load
    return _choices(loop, load, panel, catalogue, pair=True)


def _choices(loop: Loop, load: LoadCurrent, panel: Panel, catalogue: Catalogue, *, pair: bool) -> tuple[DeviceChoice, ...] | Unsized:
    side = controller_side(panel, catalogue, "relay", at_least=2 if pair else 1)
    if isinstance(side, Unsized):
        return side
    found: list[DeviceChoice] = []
    refused: list[Unsized] = []
    parts, more, missing = element_contact(loop.element, load.current, catalogue)
    fed = load_drawn(load, panel)
    for option in (_own(side, load, catalogue), *_plugged(load, panel, catalogue)):
        if isinstance(option, Unsized):
            refused.append(option)
            continue
        found.append(
            DeviceChoice(
                name=f"two of {option.name}" if pair else option.name,
                category=load.category,
                controller_output="relay_pair" if pair else "relay",
                chain=(*option.chain, *parts),
                poles=load.connection.lines,
                rating=option.rating.value,
                current=load.current,
                figures=(*load.figures, option.rating, *option.figures),
                assumptions=(*load.assumptions, *option.assumptions, *more),
                open_points=missing,
                # both of a pair are bought, one is on at a time
                loss=option.loss,
                lines=load.connection.lines,
                drawn=(*option.drawn, *fed),
                drives=option.drives,
                suppressors=suppressors(option.drawn, load, panel),
            )
        )
    if not found:
        # one that would carry the load but cannot be driven says more than one that is too small
        return next((reason for reason in refused if not isinstance(reason, NoCandidate)), refused[-1])
    return tuple(sorted(found, key=lambda choice: (choice.rating or 0.0, len(choice.chain))))


def _own(side: OutputSide, load: LoadCurrent, catalogue: Catalogue) -> _Option | Unsized:
    name = f"the relay of {side.controller}"
    rating = _covering(name, side.rating or 0.0, 1, load, catalogue)
    if isinstance(rating, Unsized):
        return rating
    made = contact(
        "the load", "controller", name, load.current, load.category, side.points, side.mechanical_life,
        side.operations_per_hour, side.pull_in, side.drop_out, catalogue,
    )  # fmt: skip
    if isinstance(made, Unsized):
        return made
    return _Option(name, 1, rating, (made,), (), side.assumptions)


def _plugged(load: LoadCurrent, panel: Panel, catalogue: Catalogue) -> Iterator[_Option | Unsized]:
    for relay in sorted(catalogue.relays, key=lambda relay: relay.resistive_current):
        yield _one(relay, load, panel, catalogue)


def _one(relay: Relay, load: LoadCurrent, panel: Panel, catalogue: Catalogue) -> _Option | Unsized:
    rating = _covering(relay.name, float(relay.resistive_current), relay.poles, load, catalogue)
    if isinstance(rating, Unsized):
        return rating
    if relay.coil is None:
        return Unsized(f"{relay.name} has no coil of its own")
    coil = coil_current(relay.coil, relay.name, panel, any_voltage=catalogue.is_typical("relays"))
    if isinstance(coil, Unsized):
        return coil
    drives = coil_drives(coil, relay.name, panel, catalogue)
    if isinstance(drives, Unsized):
        return drives
    drive = drives[0]  # a relay's coil is so light that another relay before it gains nothing
    made = contact(
        "the load", "load", relay.name, load.current, load.category, relay.electrical_life, relay.mechanical_life,
        relay.operations_per_hour, relay.pull_in, relay.drop_out, catalogue,
    )  # fmt: skip
    if isinstance(made, Unsized):
        return made
    assumed = (*typical(catalogue, "relays", relay.name), *drive.assumptions)
    lost = loss_figure(relay, load, drive.power)
    chain, figures = (*drive.contacts, made), (*drive.figures, lost)
    return _Option(relay.name, relay.poles, rating, chain, figures, assumed, lost.value, drive.drawn, drive.drives)


def _covering(name: str, resistive: float, poles: int, load: LoadCurrent, catalogue: Catalogue) -> Figure | Unsized:
    if poles < load.connection.lines:
        return NoCandidate(f"a relay opens both lines of this load; {name} has {poles} pole")
    rating = relay_rating(resistive, load.category, load.connection, catalogue)
    if isinstance(rating, Unsized):
        return rating
    if load.current > rating.value or (load.inrush or 0.0) > resistive * _make(load):
        return NoCandidate(f"a relay is no candidate above its rating: {name} carries {rating.value:.3g} A in {load.category}, "
                       f"the load takes {load.current:.3g} A")  # fmt: skip
    return rating


def _make(load: LoadCurrent) -> float:
    """Return how many times its resistive current a contact may make: AC-15 is tested making ten times a fifth of it."""
    return 2.0 if load.category == "AC-15" else 1.0
