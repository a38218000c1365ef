"""Between which differentials on-off may be set: what the machine and the contacts need, what the product allows.

Every constraint's figure moves one way with the differential. Its root is sought with the worst case held, then the worst case is sought
again at the root, until it keeps the limit: first among the cases on the box's edges alone, at last with the whole search.
"""

from collections.abc import Callable
from dataclasses import replace
from math import inf

from scipy.optimize import brentq

from specgen.process.box import Box, Point
from specgen.process.box_edges import candidates
from specgen.process.limit_cycle import SECONDS_AN_HOUR, NoCycle
from specgen.process.on_off import OFF, ON, PERIOD, CycleFigure, Placement, Setting, switch_points
from specgen.process.plant import ProcessModel

HELD = 1e-4  # a limit counts as kept within this share
TURNS = 25
LOOKS = 32  # differentials tried where the narrowest of all does not keep a limit


def least_differential(
    box: Box,
    placement: Placement = "centred",
    *,
    starts_per_hour: float | None = None,
    min_run: float = 0.0,
    min_rest: float = 0.0,
    switchings_per_hour: float | None = None,
    known: dict[tuple[str, float, float], float] | None = None,
) -> dict[str, float]:
    """Return, constraint by constraint, the least differential that keeps it in every case of the box [K].

    Parameters
    ----------
    box : Box
        The loop's box.
    placement : "centred", "below" or "above"
        Where the switch points lie.
    starts_per_hour : float or None
        Starts that the machine may make an hour (D3), judged with the least times enforced [1/h].
    min_run, min_rest : float
        Least run and rest [s]: enforced for the starts, and asked of the natural cycle (D6).
    switchings_per_hour : float or None
        Switchings-on an hour that the contacts' life allows (D5) [1/h].
    known : dict or None
        What was found before for this box, placement and least times; what is found now is added.

    Returns
    -------
    dict of str to float
        Keys ``starts``, ``life``, ``run`` and ``rest``, one for each constraint given; infinite where no differential keeps it.
    """
    enforced = Setting(box, placement, min_run, min_rest, "edges")
    free = Setting(box, placement, 0.0, 0.0)
    least = 1e-6 * _scale(box)
    made: dict[str, float] = {}
    known = {} if known is None else known

    def sought(setting: Setting, figure: CycleFigure, name: str, limit: float, start: float) -> float:
        key = ("period" if figure is PERIOD else name, limit, start)
        if key not in known:
            known[key] = _least(setting, figure, limit, start)
        return known[key]

    wanted = {"starts": starts_per_hour, "life": switchings_per_hour}
    # the looser first: what it needs is a start for the tighter
    for name, most in sorted(((n, m) for n, m in wanted.items() if m is not None), key=lambda pair: -pair[1]):
        made[name] = sought(enforced, PERIOD, name, SECONDS_AN_HOUR / most, max([least, *(d for d in made.values() if d < inf)]))
    if min_run > 0:
        made["run"] = sought(free, ON, "run", min_run, least)
    if min_rest > 0:
        made["rest"] = sought(free, OFF, "rest", min_rest, least)
    return made


def _least(setting: Setting, figure: CycleFigure, limit: float, start: float) -> float:
    """Return the least differential at which a figure that grows with it is at least ``limit`` in every case.

    The root is sought with the worst case held, then the worst case is sought again, until it keeps the limit.
    """
    differential, looking = start, replace(setting, look="quick")
    for _ in range(TURNS):
        try:
            now = looking.worst(figure, differential, setting.cycles(differential))
        except NoCycle:
            return inf
        if now.value >= limit * (1 - HELD):
            if looking is setting:
                return differential
            looking = setting
            continue

        def short(d: float, plant: ProcessModel = now.plant) -> float:
            try:
                return figure.read(setting.at(plant, d)) - limit
            except NoCycle:
                return limit  # past this the case rests or is not reached: nothing switches too fast there

        wide = _first_doubling(short, differential)
        differential = float(brentq(short, differential, wide, xtol=1e-12 * wide, rtol=1e-9)) * (1 + 1e-9)
    return differential


def _first_doubling(short: Callable[[float], float], differential: float) -> float:
    """Return a differential doubled until it is wide enough, which a wider one then is too: its place is halved in on."""
    low, high = 0, 1
    while short(differential * 2.0**high) < 0:
        low, high = high, 2 * high
    while high - low > 1:
        middle = (low + high) // 2
        low, high = (middle, high) if short(differential * 2.0**middle) < 0 else (low, middle)
    return float(differential * 2.0**high)


def widest_differential(
    box: Box,
    allowed_above: float,
    allowed_below: float,
    placement: Placement = "centred",
    min_run: float = 0.0,
    min_rest: float = 0.0,
) -> float:
    """Return the largest differential at which the true value stays within what is allowed on both sides, in every case [K].

    Parameters
    ----------
    box : Box
        The loop's box.
    allowed_above, allowed_below : float
        Tolerance less measuring error on each side of the setpoint, on the value's own scale [K].
    placement : "centred", "below" or "above"
        Where the switch points lie.
    min_run, min_rest : float
        Least run and rest that are enforced [s].

    Returns
    -------
    float
        0 where the excursion is too large at any differential, or nothing in the box switches.
    """
    if allowed_above <= 0 or allowed_below <= 0:
        return 0.0
    setting = Setting(box, placement, min_run, min_rest, "edges")
    widest = inf
    # with the points on one side of the setpoint a differential beyond what that side allows can never do
    differential = allowed_above + allowed_below if placement == "centred" else _one_side(placement, allowed_above, allowed_below)
    least = min(1e-6 * _scale(box), differential / 2)
    for side, allowed in ((setting.above, allowed_above), (setting.below, allowed_below)):
        widest = min(widest, _most(setting, side, allowed, (least, min(differential, widest))))
    return widest


def _one_side(placement: Placement, allowed_above: float, allowed_below: float) -> float:
    return allowed_below if placement == "below" else allowed_above


def _most(setting: Setting, side: CycleFigure, allowed: float, span: tuple[float, float]) -> float:
    """Return the largest differential within ``span`` at which an excursion that grows with it keeps to ``allowed``."""
    least, differential = span
    looking = replace(setting, look="quick")
    for _ in range(TURNS):
        try:
            now = looking.worst(side, differential, setting.cycles(differential))
        except NoCycle:
            # too wide for any case to pass both points
            differential = _widest_that_switches(setting, least, differential)
            if differential <= least:
                return 0.0
            continue
        if now.value <= allowed * (1 + HELD):
            if looking is setting:
                return differential
            looking = setting
            continue

        def over(d: float, plant: ProcessModel = now.plant) -> float:
            return side.read(setting.at(plant, d)) - allowed

        if differential <= least:
            return 0.0
        kept = _kept_below(over, least, differential)
        if kept is None:
            return 0.0
        differential = float(brentq(over, *kept, xtol=1e-12 * differential, rtol=1e-9)) * (1 - 1e-9)
    return differential


def _kept_below(over: Callable[[float], float], least: float, most: float) -> tuple[float, float] | None:
    """Return two differentials, the smaller keeping a limit that the larger passes; None where none keeps it.

    An excursion grows with the differential, but for least times: where they lengthen every phase of a narrow differential a wider one
    starts its run from further off and may end nearer. So the widest that keeps is sought from above.
    """
    if over(least) <= 0:
        return least, most
    wide = most
    for step in range(1, LOOKS):
        narrow = most * (1 - step / LOOKS)
        if over(narrow) <= 0:
            return narrow, wide
        wide = narrow
    return None


def _widest_that_switches(setting: Setting, least: float, most: float) -> float:
    """Return the largest differential, to a thousandth, at which some case of the box passes both switch points."""

    def switches(differential: float) -> bool:
        high, low = switch_points(differential, setting.placement, setting.box.sign)
        return next(candidates(setting.box, high, low), None) is not None

    if not switches(least):
        return least
    while most - least > 1e-3 * most:
        middle = (least + most) / 2
        least, most = (middle, most) if switches(middle) else (least, middle)
    return least


def _scale(box: Box) -> float:
    """Return a difference of the size at which the box's plants move: one percent of the change, or a second of the fastest speed."""
    plant = box.plant_at(Point(strength=1.0))
    return min(0.01 * plant.gain, plant.gain_per_second * max(1.0, plant.theta + plant.lag))
