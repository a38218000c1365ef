"""A longer-lasting device where the smallest that carries the load falls short of the house's contact life."""

from collections.abc import Callable, Iterator, Sequence
from dataclasses import replace

from specgen.core.figure import Figure
from specgen.core.say import digits
from specgen.sizing.candidate import Unsized
from specgen.sizing.device import DeviceChoice
from specgen.sizing.settings import OnOffSettings, ProportionedSettings, Settings
from specgen.sizing.wear import weakest

LARGER = 2  # classes above the smallest that are tried: beyond them another kind of device is the better answer (common practice)
Resize = Callable[[DeviceChoice], Settings | Unsized]
Lasting = tuple[DeviceChoice, OnOffSettings | ProportionedSettings]


def longer_lasting(choices: Sequence[DeviceChoice], settings: Settings | Unsized, wanted: float, resize: Resize) -> Lasting | None:
    """Return the smallest device that lasts as long as is asked for, where the first does not.

    Parameters
    ----------
    choices : sequence of DeviceChoice
        Every device that carries the load, in the order of choice.
    settings : Settings or Unsized
        What was settled with the first of them.
    wanted : float
        The house's contact life [year].
    resize : callable
        Settles the loop with another device.

    Returns
    -------
    tuple of DeviceChoice and settings, or None
        The device with the sentence that says what it gains; None where the first lasts, where nothing wears, and where
        neither an interposing relay nor one of the next two classes reaches it.

    Notes
    -----
    Only devices that would last at the operations of the present settings are settled anew. Where the contact life itself
    forces a differential wider than the tolerance, there are no such settings, and the longest-lasting of each class is.
    """
    if not isinstance(settings, OnOffSettings | ProportionedSettings) or not _falls_short(settings, wanted):
        return None
    first = weakest(choices[0])
    if first is None:
        return None
    for choice in _tried(choices, settings, wanted, first.operations):
        made = resize(choice)
        if isinstance(made, OnOffSettings | ProportionedSettings) and not _falls_short(made, wanted):
            return _explained(choices[0], choice, settings, made), made
    return None


def _falls_short(settings: OnOffSettings | ProportionedSettings, wanted: float) -> bool:
    if settings.contact_life is None:
        return False
    return settings.contact_life < wanted * (1 - 1e-9) or _forced(settings)


def _forced(settings: OnOffSettings | ProportionedSettings) -> bool:
    """Tell whether the contact life asks for a wider differential than the product allows."""
    return isinstance(settings, OnOffSettings) and any(b.rule == "D5" and b.limit > settings.most for b in settings.least_bounds)


def _tried(
    choices: Sequence[DeviceChoice], settings: OnOffSettings | ProportionedSettings, wanted: float, first: float
) -> Iterator[DeviceChoice]:
    names = list(dict.fromkeys(choice.name for choice in choices))[: 1 + LARGER]
    longest: dict[str, tuple[float, DeviceChoice]] = {}
    for choice in choices[1:]:
        last = weakest(choice)
        if choice.name not in names or last is None or last.operations <= first:
            continue
        if not _forced(settings) and last.operations >= wanted * settings.operations_per_year:
            yield choice
        elif choice.name not in longest or longest[choice.name][0] < last.operations:
            longest[choice.name] = (last.operations, choice)
    if _forced(settings):
        yield from (choice for _, choice in longest.values())


def _explained(
    small: DeviceChoice, taken: DeviceChoice, before: OnOffSettings | ProportionedSettings, after: OnOffSettings | ProportionedSettings
) -> DeviceChoice:
    had, has = before.contact_life or 0.0, after.contact_life or 0.0
    instead = f"{small.name} driven directly" if small.name == taken.name else small.name
    through = " through an interposing relay" if any(part.role == "interposing" for part in taken.chain) else ""
    if _forced(before) and isinstance(before, OnOffSettings) and isinstance(after, OnOffSettings):
        gain = f"its contacts last {digits(has)} years inside the tolerance; with {instead} they would need a wider differential"
    else:
        gain = f"its contacts last {digits(has)} years; with {instead}, {digits(had)} years"
    lasted = Figure("L_0", f"contact life with {instead}", "operations/n_op", had, "years", "rules C3 and D5")
    said = f"{taken.name}{through} is taken: {gain}."
    return replace(taken, because=f"{small.because} {said}".strip(), figures=(*taken.figures, lasted))
