"""What the tuned loop does after a sudden load and from rest, simulated for the cases that are worst for each."""

from math import inf, isfinite

from specgen.core.figure import Figure
from specgen.model.loop import Loop
from specgen.process.box import Box, Point
from specgen.process.load_step import first_estimate, load_step
from specgen.process.loop_dynamics import Dynamics
from specgen.process.loop_run import Band
from specgen.process.start_up import StartUp, start_up
from specgen.sizing.candidate import Unsized
from specgen.sizing.remembered import remembered
from specgen.sizing.settings import Tuning
from specgen.sizing.starting_values import Start, dynamics_of

OWN = "exact simulation of the limited loop, tests/process"
ALMOST = 0.98  # a start-up at nearly full output only creeps in


def load_share(loop: Loop, box: Box) -> float | Unsized | None:
    """Return the sudden change of load as a share of full output at the weakest supply; None where none is declared.

    A heat flow is set against the power or capacity that full output moves.
    """
    declared = loop.need.sudden_load
    if declared is None:
        return None
    if declared.share is not None:
        return float(declared.share)
    moved = getattr(loop.element, "capacity", None) or getattr(loop.element, "power", None)
    if box.form == "balance":
        weakest = min(box.strength_at(point) for point in box.ends("strength", "load"))
    elif moved is not None:
        weakest = float(moved.low)
    else:
        return Unsized("the sudden load is a heat flow, and nothing says how much full output moves", ("element.capacity",))
    assert declared.power is not None  # noqa: S101  one of the two is declared
    return float(declared.power) / weakest


def estimated_deviation(start: Start, change: float) -> float:
    """Return the first estimate of the deviation after a sudden load [in the loop's quantity]."""
    return first_estimate(start.hardest.dynamics.slope, _delay(start), change)


@remembered
def simulated_deviation(start: Start, change: float) -> float:
    """Return the largest simulated deviation after a sudden load, either way, at the ends of the duty range."""
    found = 0.0
    for duty in sorted({start.hardest.duty_low, start.hardest.duty_high}):
        for sign in (1.0, -1.0):
            # a load that full output or none cannot hold is M9's and M10's matter
            if 0 < duty + sign * change < 1:
                plant = _with_actuator(start, start.hardest.dynamics)
                found = max(found, load_step(plant, start.settings, duty, sign * change, start.cycle_time).deviation)
    return found


def tuning_of(start: Start, box: Box, loop: Loop, deviation: float | None, *, simulate: bool = True) -> Tuning:
    """Return the tuning with its margins, the deviation after a sudden load, and the simulated start-up."""
    tolerance = loop.need.tolerance
    below, above = float(tolerance.below), float(tolerance.above)
    rise = _start_up(start, box, Band(below, above) if loop.raises else Band(above, below)) if simulate else None
    figures = list(start.figures)
    if deviation is not None and isfinite(deviation):
        figures.append(Figure("Δy", "deviation after the sudden load", "simulated", deviation, "change", OWN, {}, start.hardest.text))
    overshoot = time_to_band = None
    if rise is not None:
        overshoot, time_to_band = rise
        figures.append(Figure("y_os", "overshoot on start-up", "simulated from rest", overshoot, "change", OWN))
        if isfinite(time_to_band):
            figures.append(Figure("t_b", "time to the band, longest", "simulated from rest", time_to_band, "time", OWN))
    settings, found = start.settings, start.margins
    return Tuning(
        settings.gain, settings.proportional_band, settings.integral_time, settings.derivative_time, _delay(start),
        _delay(start) - start.charged, found.gain, found.phase, found.sensitivity, start.stable, deviation, overshoot,
        time_to_band if time_to_band is not None and isfinite(time_to_band) else None, tuple(figures), start.assumptions,
    )  # fmt: skip


def _delay(start: Start) -> float:
    reduced = start.settings.reduced
    return reduced.delay.total if reduced is not None else start.hardest.dynamics.theta + start.charged + start.actuator


def _with_actuator(start: Start, plant: Dynamics) -> Dynamics:
    return Dynamics(plant.slope, plant.tau, plant.theta + start.actuator, plant.lag, plant.sensor_lag)


@remembered
def _start_up(start: Start, box: Box, band: Band) -> tuple[float, float] | None:
    """Simulate from rest: the liveliest case for the overshoot, the weakest for the time."""
    lively = start.hardest.point
    slow = 1.0 if box.whole_capacity.at(1.0) >= box.whole_capacity.at(0.0) else 0.0
    weak = box.duty_high[1]._replace(capacity=slow, dead_time=lively.dead_time)
    found = [run for point in (lively, weak) if (run := _one(start, box, point, band)) is not None]
    if not found:
        return None
    return max(run.overshoot for run in found), max(run.time_to_band for run in found)


def _one(start: Start, box: Box, point: Point, band: Band) -> StartUp | None:
    plant = box.plant_at(point)
    duty = plant.duty
    rise = -plant.settles_off
    if not (0 < duty < ALMOST and 0 < rise < inf):
        return None
    dynamics = _with_actuator(start, dynamics_of(box, point))
    return start_up(dynamics, start.settings, rise, duty, band, start.cycle_time)
