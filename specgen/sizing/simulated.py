"""What the tuned loop does after a sudden load and from rest, simulated for the cases that are worst for each."""

from dataclasses import dataclass, replace
from math import inf, isfinite

from specgen.core.figure import Figure
from specgen.core.postponed import Postponed
from specgen.model.loop import Loop
from specgen.model.traits import traits_of
from specgen.process.box import Box, Point
from specgen.process.fault_cases import warm_up
from specgen.process.load_step import first_estimate, load_step
from specgen.process.loop_dynamics import Dynamics
from specgen.process.loop_run import Band
from specgen.process.start_up import StartUp, start_up
from specgen.process.tuning import Settings
from specgen.sizing.candidate import Unsized
from specgen.sizing.remembered import remembered
from specgen.sizing.settings import Tuning
from specgen.sizing.starting_values import Hardest, Start, dynamics_of, hardest_case, inside

OWN = "exact simulation of the limited loop, tests/process"
ALMOST = 0.98  # a start-up at nearly full output only creeps in


@dataclass(frozen=True, slots=True)
class LoadCase:
    """A sudden load at one end of the element's strength.

    ``share`` of full output [1]; ``steeper`` is the slope there over that of the hardest case [1]; ``duty_low`` and
    ``duty_high`` are the declared duties there [1].
    """

    share: float
    steeper: float
    duty_low: float
    duty_high: float


SuddenLoad = tuple[LoadCase, ...]


def load_share(loop: Loop, box: Box) -> SuddenLoad | Unsized | None:
    """Return the sudden change of load as a share of full output at both ends of the strength; None where none is declared.

    A heat flow is set against the power or capacity that full output moves there: at the weakest it takes the larger share of
    an output that also drives the value less.
    """
    declared = loop.need.sudden_load
    if declared is None:
        return None
    hardest = hardest_case(box)
    made = []
    for point in box.ends("strength"):
        at = hardest.point._replace(strength=point.strength)
        if declared.share is not None:
            share = float(declared.share)
        else:
            moved = _moved(loop, box, at)
            if moved is None:
                return Unsized("the sudden load is a heat flow, and nothing says how much full output moves", ("element.capacity",))
            share = float(declared.power or 0.0) / moved
        duties = [box.duty_at(end._replace(strength=point.strength)) for end in box.ends("load", "loss")]
        steeper = box.plant_at(at).gain_per_second / box.plant_at(hardest.point).gain_per_second
        made.append(LoadCase(share, steeper, inside(min(duties)), inside(max(duties))))
    return tuple(dict.fromkeys(made))


def _moved(loop: Loop, box: Box, point: Point) -> float | None:
    """Return the heat that full output moves in a case [W]; None where nothing says."""
    if box.form == "balance":
        return box.strength_at(point)
    capacity = getattr(loop.element, "capacity", None)
    if capacity is not None:
        return float(capacity.low)
    power = getattr(loop.element, "power", None)
    if power is None or not traits_of(loop.element).electric_heat:
        return None
    # the share of its rated power that a resistive element takes at this end of the supply
    axis = box.boost or box.strength
    supply = next((field for field in axis.fields if field.dimension == "supply"), None)
    factor = 1.0 if supply is None else axis.factor * supply.at(point.strength) ** 2
    return float(power.low) * getattr(loop.element, "count", 1) * factor


def estimated_deviation(start: Start, load: SuddenLoad) -> float:
    """Return a first estimate of the deviation after a sudden load [in the loop's quantity], with the steepest slope.

    Where full output drives the value less, the loop has as much less gain against the load: the steepest slope stands for both.
    """
    return max(first_estimate(start.hardest.dynamics.slope, _delay(start), case.share) for case in load)


@remembered
def simulated_deviation(start: Start, load: SuddenLoad) -> float:
    """Return the largest simulated deviation after a sudden load, either way, at the ends of the duty range, without the ripple.

    Infinite, or where the value ends, if nowhere in the duty range the output can take the load up.
    """
    plant = _with_actuator(start, start.hardest.dynamics)
    found: list[float] = []
    lost: list[float] = []
    for case in load:
        there = replace(plant, slope=plant.slope * case.steeper)
        for duty in sorted({case.duty_low, case.duty_high}):
            for change in (case.share, -case.share):
                step = load_step(there, start.settings, duty, change, start.cycle_time)
                # from the far end of the duties a load may not be what the panel declares: M9 and M10 judge that
                (found if step.recovers else lost).append(max(step.deviation - step.ripple, 0.0))
    return max(found) if found else min(lost)


def tuning_of(start: Start, box: Box, loop: Loop, deviation: float | None, *, simulate: bool = True) -> Tuning:
    """Return the tuning with its margins, the deviation after a sudden load, and the simulated start-up."""
    tolerance = loop.need.tolerance
    below, above = float(tolerance.below), float(tolerance.above)
    rise = _start_up(start, box, Band(below, above) if loop.raises else Band(above, below)) if simulate else None
    figures = list(start.figures)
    if deviation is not None and isfinite(deviation):
        called = "deviation after the sudden load, ripple not counted"
        figures.append(Figure("Δy", called, "simulated", deviation, "change", OWN, {}, start.hardest.text))
    overshoot = time_to_band = None
    if rise is not None:
        overshoot, simulated = rise
        figures.append(Figure("y_os", "overshoot on start-up", "simulated from rest", overshoot, "change", OWN))
        # the loop is simulated with what follows fast; at a cold start full output has to warm the rest as well
        cold = warm_up(box, below if loop.raises else above)
        time_to_band = simulated if cold is None else max(simulated, cold.value)
        if isfinite(time_to_band):
            how = "the longer of the simulated start and the first rise with every body counted"
            case = "" if cold is None else cold.text
            figures.append(Figure("t_b", "time to the band, longest", how, time_to_band, "time", OWN, {}, case))
    settings, found = start.settings, start.margins
    return Tuning(
        settings.gain, settings.proportional_band, settings.integral_time, settings.derivative_time, _delay(start),
        _delay(start) - start.charged, found.gain, found.phase, found.sensitivity, start.stable, deviation, overshoot,
        time_to_band if time_to_band is not None and isfinite(time_to_band) else None, tuple(figures), start.assumptions,
    )  # fmt: skip


def tuning_later(start: Start, box: Box, loop: Loop, deviation: float | None) -> Tuning:
    """Return the tuning as ``tuning_of`` does, its start-up simulated when it is asked for and its figures left out."""
    settings, found = start.settings, start.margins
    known = {
        "gain": settings.gain, "proportional_band": settings.proportional_band, "integral_time": settings.integral_time,
        "derivative_time": settings.derivative_time, "effective_delay": _delay(start), "delay_without_cycle": _delay(start) - start.charged,
        "gain_margin": found.gain, "phase_margin": found.phase, "peak_sensitivity": found.sensitivity, "stable": start.stable,
        "load_deviation": deviation, "figures": (), "assumptions": (),
    }  # fmt: skip
    return _LateTuning.after(known, lambda name: getattr(tuning_of(start, box, loop, deviation), name))


class _LateTuning(Postponed, Tuning):
    """A tuning whose start-up is simulated when it is asked for."""

    __slots__ = ("_later",)


def _delay(start: Start) -> float:
    reduced = start.settings.reduced
    return reduced.delay.total if reduced is not None else start.hardest.dynamics.theta + start.charged + start.actuator


def _with_actuator(start: Start, plant: Dynamics) -> Dynamics:
    return Dynamics(plant.slope, plant.tau, plant.theta + start.actuator, plant.lag, plant.sensor_lag)


@remembered
def _start_up(start: Start, box: Box, band: Band) -> tuple[float, float] | None:
    """Simulate from rest: the liveliest case for the overshoot, the weakest for the time."""
    asked = (start_from_rest(box, point, start.actuator) for point in start_points(start.hardest, box))
    found = [one.simulated(start.settings, band, start.cycle_time) for one in asked if one is not None]
    if not found:
        return None
    return max(run.overshoot for run in found), max(run.time_to_band for run in found)


def start_points(hardest: Hardest, box: Box) -> tuple[Point, Point]:
    """Return the cases that a start-up is simulated for: the liveliest for the overshoot, the weakest for the time."""
    lively = hardest.point
    slow = 1.0 if box.whole_capacity.at(1.0) >= box.whole_capacity.at(0.0) else 0.0
    return lively, box.duty_high[1]._replace(capacity=slow, dead_time=lively.dead_time)


@dataclass(frozen=True, slots=True)
class FromRest:
    """A case that starts from rest without output: its plant, the distance to the setpoint, and the output that holds it."""

    point: Point
    dynamics: Dynamics
    rise: float
    duty: float

    def simulated(self, settings: Settings, band: Band, cycle_time: float) -> StartUp:
        """Return the start of the tuned loop."""
        return start_up(self.dynamics, settings, self.rise, self.duty, band, cycle_time)


def start_from_rest(box: Box, point: Point, actuator: float) -> FromRest | None:
    """Return how a case starts; None where it rests beyond the setpoint, nowhere, or where nearly full output only creeps in."""
    plant = box.plant_at(point)
    rise = -plant.settles_off
    if not (0 < plant.duty < ALMOST and 0 < rise < inf):
        return None
    own = dynamics_of(box, point)
    return FromRest(point, replace(own, theta=own.theta + actuator), rise, plant.duty)
