"""The starts from rest whose overshoot and time to the band stand on a loop's sheet, recomputed as whole courses for a drawing.

A decision keeps two numbers of a simulated start. Here the very runs behind them are made again, for the chosen candidate alone: same
cases, same settings, so that the drawn highest value and the drawn entry into the band are those figures.
"""

from dataclasses import dataclass
from math import inf

from specgen.process.box import Box, Point, Unmodelled
from specgen.process.fault_cases import FaultCase, coldest_rest, warm_up
from specgen.process.loop_dynamics import Dynamics
from specgen.process.loop_run import Band
from specgen.process.on_off import switch_points
from specgen.process.plant import ProcessModel
from specgen.process.start_course import StartCourse, rising, switched_course, tuned_course
from specgen.process.tuning import Settings
from specgen.rules.base import Case
from specgen.sizing.actuator import actuator_delay
from specgen.sizing.candidate import Unsized
from specgen.sizing.scan import scan_and_pulse
from specgen.sizing.settings import ContinuousSettings, OnOffSettings, ProportionedSettings, ThreePointSettings, Tuning
from specgen.sizing.simulated import start_from_rest, start_points
from specgen.sizing.starting_values import hardest_case

CYCLES = 3  # of an on-off loop after the first rise
RISING = 60
FADED = 4.0  # time constants after which a rise is as good as settled
NOWHERE = Unsized("this form of plant does not say where the loop rests")


@dataclass(frozen=True, slots=True)
class Start:
    """One start: its course, the case in words, and what is read off it.

    ``highest`` is the true value's extreme beyond the setpoint in the sense of more output, ripple included [change], at
    ``highest_at`` [s]; None where the course ends at the band. ``in_band`` [s] is when it stays in the band, None where it does not.
    ``ripple`` is what a drawn mean leaves out [change].
    """

    course: StartCourse
    case: str
    highest: float | None
    highest_at: float
    in_band: float | None
    ripple: float = 0.0
    every_body: bool = False


@dataclass(frozen=True, slots=True)
class StartUps:
    """The liveliest start and, where another takes longer into the band, the slowest."""

    lively: Start
    slow: Start | None
    band: Band


def start_ups(case: Case) -> StartUps | Unsized:
    """Return the starts whose figures stand on the sheet; Unsized with the reason where there are none."""
    box, settings = case.box, case.settings
    if isinstance(settings, Unsized):
        return settings
    if isinstance(box, Unmodelled):
        return Unsized(box.because, box.needs)
    tolerance = case.loop.need.tolerance
    below, above = float(tolerance.below), float(tolerance.above)
    band = Band(below, above) if case.loop.raises else Band(above, below)
    cold = warm_up(box, band.below)
    if isinstance(settings, OnOffSettings):
        return _switched(box, settings, band, cold)
    made = _tuned(case, box, settings, band)
    if not made:
        return NOWHERE if box.ambient is None else Unsized("the loop rests at its setpoint, or full output only just reaches it")
    lively = max(made, key=lambda start: start.highest or 0.0)
    slow = max(made, key=_time)
    if cold is not None and cold.value > _time(slow):
        slow = _warm(box, cold)
    return StartUps(lively, None if slow is lively else slow, band)


def _time(start: Start) -> float:
    return inf if start.in_band is None else start.in_band


def _tuned(case: Case, box: Box, settings: ProportionedSettings | ContinuousSettings | ThreePointSettings, band: Band) -> list[Start]:
    tuning, cycle, valve_gain = settings.tuning, 0.0, 1.0
    if isinstance(settings, ProportionedSettings):
        cycle = settings.cycle_time
    elif isinstance(settings, ContinuousSettings) and settings.valve is not None:
        valve_gain = settings.valve.gain_factor
    entered = entered_settings(tuning)
    extra = extra_delay(case)
    made = []
    for point in start_points(hardest_case(box, valve_gain), box):
        rest = start_from_rest(box, point, extra)
        if rest is None:
            continue
        run = rest.simulated(entered, band, cycle)
        course = tuned_course(rest.dynamics, entered, rest.rise, rest.duty, cycle, run)
        in_band = run.time_to_band if run.time_to_band < inf else None
        ripple = max(0.0, run.overshoot - max(0.0, run.run.highest))
        made.append(Start(course, box.text(point), run.overshoot, run.run.highest_at, in_band, ripple))
    return made


def entered_settings(tuning: Tuning) -> Settings:
    """Return the settings as they are entered."""
    return Settings(tuning.gain, tuning.integral_time, tuning.derivative_time)


def extra_delay(case: Case) -> float:
    """Return the delay that actuator and scan add to the plant of a tuned candidate [s]."""
    scan, _ = scan_and_pulse(case.panel)
    moved = case.candidate.device in ("signal", "relay_pair")
    return (actuator_delay(case.loop)[0] if moved else 0.0) + scan / 2


def _warm(box: Box, cold: FaultCase) -> Start:
    """Return the first rise with every body counted, up to the band; towards where it settles if that is short of the band."""
    start, load, plant = _coldest(box, cold.point)
    reaches = cold.value < inf
    end = cold.value if reaches else FADED * plant.tau
    times = (*(end * index / RISING for index in range(RISING)), end)
    course = StartCourse(times, rising(plant, start, load, times), ((0.0, 1.0),))
    return Start(course, cold.text, None, 0.0, cold.value if reaches else None, every_body=True)


def _coldest(box: Box, point: Point) -> tuple[float, float, Dynamics]:
    """Return where the coldest case rests, from its setpoint, the output that would hold that, and its plant with every body."""
    rest = coldest_rest(box, point)
    assert rest is not None  # noqa: S101  a warm-up was computed from it
    return box.sign * (rest - box.setpoint.at(point.load)), box.duty_at(point), _dynamics(box.plant_at(point, whole=True))


def _dynamics(plant: ProcessModel) -> Dynamics:
    return Dynamics(plant.gain_per_second, plant.tau, plant.theta, plant.lag, plant.sensor_lag)


def _switched(box: Box, settings: OnOffSettings, band: Band, cold: FaultCase | None) -> StartUps | Unsized:
    if cold is None:
        return NOWHERE
    if cold.value == inf or cold.value <= 0:
        return Unsized("full output does not reach the band" if cold.value > 0 else "the loop rests in the band")
    start, load, plant = _coldest(box, cold.point)
    points = switch_points(settings.differential, settings.placement, box.sign)
    least = (settings.enforced.min_run, settings.enforced.min_rest)
    course = None if start >= points[1] else switched_course(plant, start, load, points, least, CYCLES)
    if course is None:
        return Unsized("the slowest case does not pass the switch points")
    return StartUps(Start(course, cold.text, None, 0.0, settings.warm_up, every_body=True), None, band)
