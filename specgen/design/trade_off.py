"""What a wider differential or a longer cycle costs the product and gains the contacts: the chosen device at a series of settings.

Every figure of the choice is the record's own. At the other settings the same worst cases are held and only the setting moves: a case
that is worst at the choice may there be a little milder than the very worst, which the tests bound. Deciding anew for each setting
would take a hundred times as long.
"""

from dataclasses import dataclass, replace
from math import ceil, floor, isfinite
from typing import Literal

from specgen.design.trade_point import TradePoint
from specgen.design.trade_pulsed import Pulsed
from specgen.design.trade_switched import Switched
from specgen.process.box import Box
from specgen.rules.base import Case
from specgen.rules.margin import SEARCHED, at_most
from specgen.sizing.candidate import Unsized
from specgen.sizing.on_off import setting_step
from specgen.sizing.rounding import SLACK
from specgen.sizing.settings import OnOffSettings, ProportionedSettings
from specgen.sizing.simulated import load_share

MOST_POINTS = 14
BEYOND = 1.25  # how far past the window the settings go
HALF = 0.5


@dataclass(frozen=True, slots=True)
class TradeOff:
    """Every point, by rising setting, with what each figure may be.

    ``least`` and ``most`` bound the setting by the rules, ``most`` infinite where nothing does. ``starts_allowed`` [1/h] is the machine's.
    """

    setting: Literal["differential", "cycle time"]
    points: tuple[TradePoint, ...]
    least: float
    most: float
    allowed_above: float
    allowed_below: float
    house_life: float
    starts_allowed: float | None = None

    @property
    def window(self) -> tuple[float, float] | None:
        """Return from where to where the rules allow the setting; None where nowhere.

        A cycle time is taken from the house's series: of it the first and the last that is allowed.
        """
        kept = [point.at for point in self.points if point.within]
        if self.setting == "differential":
            return (self.least, min(self.most, self.points[-1].at)) if self.least <= self.most * (1 + SLACK) else None
        return (min(kept), max(kept)) if kept else None

    @property
    def choice(self) -> TradePoint:
        """Return the point that was chosen."""
        return next(point for point in self.points if point.chosen)


def trade_off(case: Case) -> TradeOff | Unsized:
    """Return what the chosen device does at settings around the chosen one.

    Parameters
    ----------
    case : Case
        The chosen candidate's.

    Returns
    -------
    TradeOff or Unsized
        Unsized with the reason where nothing is switched in cycles, or no figure was computed.
    """
    settings, box = case.settings, case.box
    if isinstance(settings, Unsized):
        return settings
    if not isinstance(box, Box) or isinstance(case.error, Unsized):
        return Unsized("the measuring error is not known" if isinstance(box, Box) else "no plant is declared")
    if isinstance(settings, OnOffSettings):
        return _of_differential(case, box, settings)
    if isinstance(settings, ProportionedSettings):
        return _of_cycle(case, box, settings)
    return Unsized("the output is not switched in cycles")


def _made(case: Case, setting: Literal["differential", "cycle time"], points: list[TradePoint], least: float, most: float) -> TradeOff:
    tolerance = case.loop.need.tolerance
    starts = getattr(case.loop.element, "starts_per_hour", None) if setting == "differential" else None
    return TradeOff(
        setting, tuple(_judged(case, point, least, most) for point in points), least, most, float(tolerance.above),
        float(tolerance.below), case.panel.house.contact_life_years,
        None if starts is None else float(starts),
    )  # fmt: skip


def _judged(case: Case, point: TradePoint, least: float, most: float) -> TradePoint:
    """Tell whether a point lies in the rules' window and inside the tolerance: the window of a cycle does not count a sudden load."""
    tolerance = case.loop.need.tolerance
    kept = at_most(point.above, float(tolerance.above), SEARCHED) and at_most(point.below, float(tolerance.below), SEARCHED)
    return replace(point, within=kept and least * (1 - SLACK) <= point.at <= most * (1 + SLACK))


def differentials(chosen: float, least: float, most: float, step: float) -> tuple[float, ...]:
    """Return differentials that can be entered, from well below what the rules allow to somewhat above it, the chosen among them.

    Examples
    --------
    >>> differentials(chosen=1.0, least=0.68, most=1.98, step=0.2)
    (0.2, 0.4, 0.6, 0.8, 1.0, 1.2, 1.4, 1.6, 1.8, 2.0, 2.2, 2.4, 2.6)
    """
    ends = [end for end in (chosen, least, most) if isfinite(end) and end > 0]
    low, high = HALF * min(ends), BEYOND * max(ends)
    if not isfinite(most):
        high = max(high, 2 * chosen)
    if high <= low + step:
        high = low + 2 * step
    first, last = max(1, floor(low / step)), ceil(high / step - SLACK)
    stride = max(1, ceil((last - first) / (MOST_POINTS - 2)))
    # counted from the chosen one, so that it is on the list as it was entered
    back, on = floor((chosen / step - first) / stride + SLACK), ceil((last - chosen / step) / stride - SLACK)
    made = [chosen + index * stride * step for index in range(-back, on + 1)]
    return tuple(chosen if value == chosen else round(value, 12) for value in made if value > SLACK * step)


def _of_differential(case: Case, box: Box, settings: OnOffSettings) -> TradeOff | Unsized:
    step = setting_step(case.loop, case.panel)
    assert step is not None  # noqa: S101  a differential was chosen on it
    even = settings.placement == "centred"
    unit = 2 * step if even and abs(settings.differential / (2 * step) % 1) < SLACK else step
    series = differentials(settings.differential, settings.least, settings.most, unit)
    held = Switched(case, box, settings, series[0])
    points = []
    for at in series:
        if at == settings.differential:
            points.append(held.chosen())
        else:
            found = held.at(at)
            if found is not None:
                points.append(found)
    return _made(case, "differential", points, settings.least, settings.most)


def _of_cycle(case: Case, box: Box, settings: ProportionedSettings) -> TradeOff | Unsized:
    series = {float(step) for step in case.panel.house.cycle_time_series} | {settings.cycle_time}
    load = load_share(case.loop, box)
    if isinstance(load, Unsized):
        return load
    held = Pulsed(case, box, settings, load or (), max(series))
    points = [held.chosen() if at == settings.cycle_time else held.at(at) for at in sorted(series)]
    return _made(case, "cycle time", [point for point in points if point is not None], settings.least, settings.most)
