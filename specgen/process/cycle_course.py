"""The exact course of value, measurement and output over two settled cycles, for drawing."""

from dataclasses import dataclass
from math import isinf

from specgen.process.limit_cycle import Cycle
from specgen.process.periodic import Mode, after_off, after_on, modes_of
from specgen.process.plant import ProcessModel


@dataclass(frozen=True, slots=True)
class Course:
    """Times [s], true value and measured value from the setpoint [K], and output (0 or 1), all equally long."""

    time: tuple[float, ...]
    value: tuple[float, ...]
    measured: tuple[float, ...]
    output: tuple[int, ...]


def cycle_course(plant: ProcessModel, cycle: Cycle, n: int = 200) -> Course:
    """Return two settled cycles, from a switching-on to the one after the next.

    Parameters
    ----------
    plant : ProcessModel
        The plant that the cycle belongs to.
    cycle : Cycle
        Its settled cycle; of an alternating pattern the mean cycle is drawn.
    n : int
        Number of equal steps; switching times are added as points of their own, twice, so that the output's edges stay upright.

    Returns
    -------
    Course
        Times from the first switching-on [s], value and measurement [K], output.

    Examples
    --------
    >>> from specgen.process.plant import SelfRegulating
    >>> plant = SelfRegulating(rise=95, fall=45, tau=600, theta=30)
    >>> cycle = plant.limit_cycle(high=1, low=-1)
    >>> course = cycle_course(plant, cycle)
    >>> round(max(course.value), 3), round(cycle.peak, 3), course.output[0], round(course.measured[0], 9)
    (5.584, 5.584, 1, -1.0)
    """
    on, period = cycle.t_on, cycle.period
    turns = [(plant.theta + edge) % period + turn * period for turn in (0, 1) for edge in (0.0, on)]
    steps = sorted([2 * period * i / n for i in range(n + 1)] + turns)
    times: list[float] = []
    output: list[int] = []
    for start, end, state in ((0.0, on, 1), (on, period, 0), (period, period + on, 1), (period + on, 2 * period, 0)):
        held = [start, *(t for t in steps if start < t < end), end]
        times += held
        output += [state] * len(held)
    value = _values(plant, cycle, times, sensor_lag=0.0)
    measured = value if plant.sensor_lag <= 0 else _values(plant, cycle, times, sensor_lag=plant.sensor_lag)
    return Course(tuple(times), value, measured, tuple(output))


def _values(plant: ProcessModel, cycle: Cycle, times: list[float], sensor_lag: float) -> tuple[float, ...]:
    """Return the settled value at times counted from the output's switching-on."""
    a, b = cycle.t_on, cycle.t_off
    integrates = isinf(plant.tau)
    constants = (plant.lag, sensor_lag) if integrates else (plant.tau, plant.lag, sensor_lag)
    modes = modes_of(constants) if max(constants) > 0 else ()
    made = []
    for time in times:
        # since the plant's input went on, a dead time after the output
        s = (time - plant.theta) % (a + b)
        if integrates:
            made.append(cycle.mean + plant.gain_per_second * _integral(modes, a, b, s))
        else:
            share = after_on(modes, a, b, s) if s < a else after_off(modes, a, b, s - a)
            made.append(plant.settles_off + plant.gain * share)
    return tuple(made)


def _integral(modes: tuple[Mode, ...], a: float, b: float, s: float) -> float:
    """Return the balanced integral of the chain's settled response from its middle, a time ``s`` after the input went on [s]."""
    duty = a / (a + b)
    half = a * b / (a + b) / 2
    if s < a:
        bare, lags = (1 - duty) * s - half, [(c * t, after_on(((1.0, t),), a, b, s)) for c, t in modes]
    else:
        bare, lags = half - duty * (s - a), [(c * t, after_off(((1.0, t),), a, b, s - a)) for c, t in modes]
    return bare - sum(w * (y - duty) for w, y in lags)
