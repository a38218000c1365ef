"""The settled value over two cycles, point by point, for a drawing."""

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import pairwise
from math import isfinite

from specgen.process.periodic import Mode, after_off, after_on, modes_of
from specgen.process.plant import ProcessModel

CYCLES = 2
POINTS_A_CYCLE = 44


@dataclass(frozen=True, slots=True)
class Curve:
    """Times [s] from the output's first going on, and values as distances from the setpoint in the sense of more output."""

    times: tuple[float, ...]
    values: tuple[float, ...]


def settled_curve(plant: ProcessModel, t_on: float, t_off: float, peak: float, *, measured: bool = False) -> Curve:
    """Return the settled value over two cycles of the output.

    Parameters
    ----------
    plant : ProcessModel
        The plant of the case that is drawn.
    t_on, t_off : float
        Time the output is on and off in each cycle [s].
    peak : float
        Highest value of the cycle, from the setpoint; the curve is hung up at it.
    measured : bool
        Whether to draw what the controller reads, behind the sensor's lag; ``peak`` is then the highest reading.

    Notes
    -----
    The output goes on at time 0 and acts on the plant a dead time later. The response of the lags to a periodic rectangle is
    ``process.periodic``'s closed form; a plant that does not settle adds it up between the points, exact where it has no lag.

    Examples
    --------
    >>> from specgen.process.plant import SelfRegulating
    >>> plant = SelfRegulating(rise=95, fall=45, tau=600, theta=30)
    >>> cycle = plant.limit_cycle(high=1, low=-1)
    >>> curve = settled_curve(plant, cycle.t_on, cycle.t_off, cycle.peak)
    >>> round(min(curve.values) - cycle.trough, 6)
    0.0
    """
    times = _times(plant.theta, t_on, t_off)
    lags = (plant.lag, plant.sensor_lag if measured else 0.0)
    if isfinite(plant.gain):
        modes = modes_of((plant.tau, *lags))
        raw = [plant.gain * _response(modes, t_on, t_off, t - plant.theta) for t in times]
    else:
        raw = _added_up(plant, modes_of(lags) if max(lags) > 0 else (), t_on, t_off, times)
    top = max(raw)
    return Curve(tuple(times), tuple(value - top + peak for value in raw))


def _times(theta: float, t_on: float, t_off: float) -> list[float]:
    """Spread points over the cycles, with one wherever the plant's input switches."""
    period = t_on + t_off
    end = CYCLES * period
    count = CYCLES * POINTS_A_CYCLE
    times = {end * index / count for index in range(count + 1)}
    shift = theta % period
    for cycle in range(-1, CYCLES + 1):
        for edge in (cycle * period + shift, cycle * period + shift + t_on):
            if 0 <= edge <= end:
                times.add(edge)
    return sorted(times)


def _response(modes: Sequence[Mode], t_on: float, t_off: float, since: float) -> float:
    """Return the settled response [0..1] a time after the plant's input went on."""
    s = since % (t_on + t_off)
    return after_on(modes, t_on, t_off, s) if s < t_on else after_off(modes, t_on, t_off, s - t_on)


def _added_up(plant: ProcessModel, modes: Sequence[Mode], t_on: float, t_off: float, times: Sequence[float]) -> list[float]:
    period = t_on + t_off
    duty = t_on / period
    values = [0.0]
    for before, after in pairwise(times):
        middle = (before + after) / 2 - plant.theta
        drive = _response(modes, t_on, t_off, middle) if modes else float(middle % period < t_on)
        values.append(values[-1] + plant.gain_per_second * (drive - duty) * (after - before))
    return values
