"""Settings of a time-proportioned loop: the cycle between what contacts and pulses ask and what product and control allow."""

from collections.abc import Sequence
from dataclasses import dataclass, replace

from specgen.model.loop import Loop
from specgen.model.panel import Panel
from specgen.process.box import Box, Unmodelled
from specgen.process.limit_cycle import NoCycle
from specgen.process.time_proportioned import longest_cycle, predict_ripple
from specgen.process.tuning import Pulse
from specgen.sizing.candidate import Assumption, Candidate, Unsized
from specgen.sizing.contact_life import years_of_life
from specgen.sizing.device import DeviceChoice
from specgen.sizing.flicker import Flicker, OutOfScope, flicker_of
from specgen.sizing.measurement import MeasuringError
from specgen.sizing.proportioned_figures import Bounds, bound_figures, cycle_figure, ripple_figures, wear_figures
from specgen.sizing.remembered import remembered
from specgen.sizing.rounding import SLACK, down_in_series, up_in_series
from specgen.sizing.scan import scan_and_pulse
from specgen.sizing.settings import Bound, ProportionedSettings
from specgen.sizing.simulated import SuddenLoad, estimated_deviation, load_share, simulated_deviation, tuning_later, tuning_of
from specgen.sizing.starting_values import Hardest, Start, hardest_case, start_of
from specgen.sizing.wear import HOUR, hours_per_year, weakest

LOW, HIGH = 0.05, 0.95  # C4 looks at these where the declared duties do not go as far
RESOLUTION = 0.01  # a duty below this is carried over and not asked of the device
HALF = 0.5
MOST_SENSITIVITY = 2.0  # T2
LEAST_GAIN_MARGIN = 2.0  # T2
_longest_cycle = remembered(longest_cycle)
_predict_ripple = remembered(predict_ripple)
LOAD = "a longer cycle lets the sudden load carry the value too far"


@dataclass(frozen=True, slots=True)
class _Job:
    loop: Loop
    panel: Panel
    box: Box
    device: DeviceChoice | Unsized
    error: MeasuringError | Unsized
    hardest: Hardest
    solid_state: bool
    scan: float
    pulse: Pulse
    load: SuddenLoad | None
    told: bool


def proportioned_settings(
    candidate: Candidate, loop: Loop, panel: Panel, box: Box | Unmodelled, device: DeviceChoice | Unsized, error: MeasuringError | Unsized,
    *, told: bool = True,
) -> ProportionedSettings | Unsized:  # fmt: skip
    """Choose the cycle time of a time-proportioned loop, its tuning, and predict its ripple.

    Without ``told`` figures and assumptions are left out, and ripple and start-up are looked for when they are asked for.

    Returns
    -------
    ProportionedSettings or Unsized
        Unsized where the plant is not known, needs no output anywhere, or the sudden load cannot be told.
    """
    if isinstance(box, Unmodelled):
        return Unsized(box.because, box.needs)
    if isinstance(device, Unsized):
        return Unsized(f"no device: {device.because}", device.needs)
    load = load_share(loop, box)
    if isinstance(load, Unsized):
        return load
    scan, pulse = scan_and_pulse(panel)
    job = _Job(loop, panel, box, device, error, hardest_case(box), candidate.device == "ssr", scan, pulse, load, told)
    try:
        return _settled(job)
    except NoCycle as none:
        return Unsized(f"no case of the loop needs a part of full output: {none}")


def _settled(job: _Job) -> ProportionedSettings | Unsized:
    series = [float(step) for step in job.panel.house.cycle_time_series]
    lights = flicker_of(job.loop, job.panel)
    least_bounds = (*_least_bounds(job), *_flicker_bound(lights))
    least, *without_flicker = _leasts(least_bounds)
    most_bounds = _first_bounds(job)
    most = min(bound.limit for bound in most_bounds)
    chosen = job.loop.choose.cycle_time if job.loop.choose else None
    if chosen is not None:
        cycle = float(chosen)
        start = _start(job, cycle)
        least = min((least, *without_flicker)) if least > most else least
    else:
        cycle, start, narrowed = _taken(job, series, least, most)
        if without_flicker and not least * (1 - SLACK) <= cycle <= most * (1 + SLACK):
            # C7 is a recommendation: where control allows no such cycle it shows its window, and does not move the others'
            least = without_flicker[0]
            cycle, start, narrowed = _taken(job, series, least, most)
        if narrowed is not None:
            most_bounds = (*most_bounds, narrowed)
            most = min(most, narrowed.limit)
    if isinstance(start, Unsized):
        return start
    made = _result(job, cycle, start, (least, most), (least_bounds, most_bounds), by_designer=chosen is not None)
    if not (job.told and isinstance(lights, Flicker)):
        return made
    return replace(made, figures=(*made.figures, *lights.figures_at(cycle)), assumptions=(*made.assumptions, *lights.assumptions))


def _flicker_bound(lights: Flicker | OutOfScope | Unsized) -> tuple[Bound, ...]:
    if not isinstance(lights, Flicker) or lights.shortest <= 0:
        return ()
    return (Bound("C7", lights.shortest, "lamps that do not flicker on the public network"),)


def _leasts(bounds: Sequence[Bound]) -> list[float]:
    """Return the least cycle with what C7 asks for and, where it asks, without."""
    every = max(bound.limit for bound in bounds)
    others = max(bound.limit for bound in bounds if bound.rule != "C7")
    return [every] if every <= others else [every, others]


def _taken(job: _Job, series: Sequence[float], least: float, most: float) -> tuple[float, Start | Unsized, Bound | None]:
    """Return the cycle that C5 asks for, or the longest below it that keeps the loop's margins."""
    wanted = _wanted(job, series, least, most)
    return _workable(job, [step for step in series if step <= wanted * (1 + SLACK)] or [series[0]])


def _wanted(job: _Job, series: Sequence[float], least: float, most: float) -> float:
    """Return the cycle C5 asks for: the longest allowed where anything wears, the shortest makeable where nothing does."""
    if weakest(job.device) is None:
        return up_in_series(least, series) or series[-1]
    # where even the shortest of the series is too long, it is taken and the rules say so
    return down_in_series(most, series) or series[0]


def _workable(job: _Job, falling: Sequence[float]) -> tuple[float, Start | Unsized, Bound | None]:
    """Return the longest cycle of a rising list at which the latched loop keeps its margins and holds the sudden load."""
    narrowed: Bound | None = None
    longest, nearest = falling[-1], falling[0]
    start: Start | Unsized = Unsized("no cycle time was tried")
    for cycle in reversed(falling):
        start = _start(job, cycle)
        if isinstance(start, Unsized):
            return cycle, start, None
        short = _falls_short(job, start)
        if short is None:
            if cycle < longest:
                narrowed = Bound(narrowed.rule if narrowed else "C2", cycle, narrowed.words if narrowed else "")
            return cycle, start, narrowed
        if nearest == falling[0] and short.words == LOAD:
            nearest = cycle
        narrowed = short
    # none of the series does: the longest that keeps its margins, else the shortest, and C2 or T2 says what is broken
    return nearest, _start(job, nearest), None


def _falls_short(job: _Job, start: Start) -> Bound | None:
    if not start.stable:
        return Bound("C2", start.cycle_time, "the latched loop is unstable at a longer cycle")
    if start.margins.sensitivity > MOST_SENSITIVITY or start.margins.gain < LEAST_GAIN_MARGIN:
        return Bound("T2", start.cycle_time, "a longer cycle leaves too little margin")
    if job.load is not None and not _holds_load(job, start):
        return Bound("C2", start.cycle_time, LOAD)
    return None


def _holds_load(job: _Job, start: Start) -> bool:
    assert job.load is not None  # noqa: S101  asked only where a sudden load is declared
    tolerance = min(float(job.loop.need.tolerance.above), float(job.loop.need.tolerance.below))
    error = job.error.root_sum if not isinstance(job.error, Unsized) else 0.0
    ripple = _predict_ripple(job.box, start.cycle_time)
    room = tolerance - error - max(ripple.above.value, ripple.below.value)
    # the first estimate is an upper bound for most plants: simulate only where it does not settle the question
    if estimated_deviation(start, job.load) <= 0.5 * room:
        return True
    return simulated_deviation(start, job.load) <= room


def _start(job: _Job, cycle: float) -> Start | Unsized:
    return start_of(job.loop, job.hardest, cycle_time=cycle, pulse=job.pulse, scan=job.scan)


def _least_bounds(job: _Job) -> tuple[Bound, ...]:
    bounds: list[Bound] = []
    last = weakest(job.device)
    if last is not None:
        years = job.panel.house.contact_life_years
        limit = hours_per_year(job.loop, job.panel) * HOUR * years / last.operations
        bounds.append(Bound("C3", limit, f"the house's contact life of the {last.contact.what}"))
    low, high = asked_duties(job.box)
    pulse = least_pulse(job.device, job.loop, job.panel, job.scan, solid_state=job.solid_state)
    limit = max(pulse / low, pulse / (1 - high))
    if job.solid_state:
        limit = max(limit, job.scan, half_cycle(job.panel) / RESOLUTION)
    bounds.append(Bound("C4", limit, "the shortest pulse that can be made"))
    return tuple(bounds)


def asked_duties(box: Box) -> tuple[float, float]:
    """Return the duties C4 looks at: the declared ends, at least 5 and 95 percent; what lies within 1 percent of an end is carried over."""
    low = max(min(box.duty_low[0], LOW), RESOLUTION)
    high = min(max(box.duty_high[0], HIGH), 1 - RESOLUTION)
    return low, high


def half_cycle(panel: Panel) -> float:
    """Return half a mains cycle, the shortest pulse of a zero-crossing switch [s]."""
    return 0.5 / float(panel.supply.frequency)


def least_pulse(device: DeviceChoice | Unsized, loop: Loop, panel: Panel, scan: float, *, solid_state: bool) -> float:
    """Return the shortest pulse that the whole chain can make [s]."""
    own = float(getattr(loop.element, "min_pulse", None) or 0.0)
    if solid_state:
        return max(half_cycle(panel), own)
    chain = () if isinstance(device, Unsized) else device.chain
    moving = sum(contact.pull_in + contact.drop_out for contact in chain)
    return max(scan, moving, own)


def _first_bounds(job: _Job) -> tuple[Bound, ...]:
    """Return what bounds the cycle before any simulation: ripple (C1) and, without a sudden load, the delay it adds (C8)."""
    share, tolerance = float(job.panel.house.swing_share), job.loop.need.tolerance
    ripple = _longest_cycle(job.box, share * float(tolerance.above), share * float(tolerance.below))
    bounds = [Bound("C1", ripple, "the ripple's share of the tolerance")]
    if job.load is None:
        bare = start_of(job.loop, job.hardest, scan=job.scan)
        if not isinstance(bare, Unsized) and bare.settings.reduced is not None:
            delay = bare.settings.reduced.delay.total
            bounds.append(Bound("C8", delay * HALF / max(job.hardest.duty_high, HALF), "half of the loop's own delay"))
    return tuple(bounds)


def _result(
    job: _Job, cycle: float, start: Start, window: tuple[float, float], bounds: Bounds, *, by_designer: bool
) -> ProportionedSettings:
    pulse = least_pulse(job.device, job.loop, job.panel, job.scan, solid_state=job.solid_state)
    ripple = _predict_ripple(job.box, cycle, pulse, pulse)
    low, high = asked_duties(job.box)
    deviation = simulated_deviation(start, job.load) if job.load is not None else None
    tuning = (tuning_of if job.told else tuning_later)(start, job.box, job.loop, deviation)
    operations = hours_per_year(job.loop, job.panel) * HOUR / cycle
    last = weakest(job.device)
    life = years_of_life(last.operations, operations) if last else None
    hours = hours_per_year(job.loop, job.panel)
    figures = () if not job.told else (
        *bound_figures(bounds),
        cycle_figure(cycle, bounds, wears=last is not None, by_designer=by_designer),
        *ripple_figures(cycle, ripple, (low, high)),
        *wear_figures(cycle, hours, operations, life, last.operations if last else None),
    )
    assumptions: tuple[Assumption, ...] = ()
    if job.solid_state and job.told:
        assumptions = (
            Assumption(
                "controllers.scan", "timed in half-cycles", "a logic output times its pulses itself, not once a scan (common practice)"
            ),
        )
    return ProportionedSettings(
        cycle_time=cycle, least=window[0], most=window[1], least_bounds=bounds[0], most_bounds=bounds[1], ripple=ripple,
        lowest_duty=low, highest_duty=high, shortest_on=low * cycle, shortest_off=(1 - high) * cycle, least_pulse=pulse,
        operations_per_year=operations, contact_life=life, weakest=last.contact.what if last else "", tuning=tuning,
        chosen_by="choose" if by_designer else "computed", figures=figures, assumptions=assumptions,
    )  # fmt: skip
