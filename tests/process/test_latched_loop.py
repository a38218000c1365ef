"""The exact simulation of a latched loop against scipy's integration of the differential equations."""

from itertools import pairwise
from math import inf

import numpy as np
import pytest
from scipy.integrate import solve_ivp

from specgen.process.closed_loop import LoopState, steady_cycle, turn, weighed
from specgen.process.latched_loop import simulate_latched
from specgen.process.loop_dynamics import Dynamics, modes_of
from specgen.process.loop_run import Band
from specgen.process.tuning import Settings, cycle_delay, simc


def reference(plant, settings, cycle_time, start, load, cycles):
    """Integrate (element, true value, measurement, integral of the error) with the controller written out afresh.

    Starts from rest at ``start``. Returns the true value at each latch, the duties, and the highest and lowest true value.
    """
    has_lag, has_sensor = plant.lag > 0, plant.sensor_lag > 0
    tau_rate = 0.0 if plant.is_integrating else 1 / plant.tau
    edges = []

    def level(time):
        passed = [to for at, to in edges if at <= time + 1e-9]
        return passed[-1] if passed else 0.0

    def slopes(state, output):
        element, value, measured, _ = state
        heat = element if has_lag else output
        return [
            (output - element) / plant.lag if has_lag else 0.0,
            plant.slope * (heat - load) - tau_rate * value,
            (value - measured) / plant.sensor_lag if has_sensor else plant.slope * (heat - load) - tau_rate * value,
            -measured,
        ]

    state = np.array([0.0, start, start, 0.0])
    integral, values, duties, highest, lowest = 0.0, [], [], -inf, inf
    for cycle in range(cycles):
        now = cycle * cycle_time
        values.append(state[1])
        rate = slopes(state, level(now))[2]
        wanted = settings.gain * (-state[2] - settings.derivative_time * rate) + integral
        duty = min(max(wanted, 0), 1)
        duties.append(duty)
        edges += [(now + plant.theta, 1.0 if duty > 0 else 0.0), (now + plant.theta + duty * cycle_time, 1.0 if duty >= 1 else 0.0)]
        stops = sorted({now, now + cycle_time, *(at for at, _ in edges if now < at < now + cycle_time)})
        before = state[3]
        for left, right in pairwise(stops):
            output = level(left)
            found = solve_ivp(
                lambda _, y, output=output: slopes(y, output), (left, right), state, rtol=1e-9, atol=1e-11, max_step=(right - left) / 8
            )
            state = found.y[:, -1]
            highest, lowest = max(highest, found.y[1].max()), min(lowest, found.y[1].min())
        step = settings.gain / settings.integral_time * (state[3] - before)
        if not (wanted > 1 and step > 0) and not (wanted < 0 and step < 0):
            integral += step
    return np.array(values), np.array(duties), highest, lowest


PLANTS = [
    pytest.param(Dynamics(0.1, 300, 12), 10, 0.4, id="first order"),
    pytest.param(Dynamics(0.1, 300, 12, lag=9, sensor_lag=5), 10, 0.4, id="lags"),
    pytest.param(Dynamics(0.1, 300, 0, lag=20), 15, 0.7, id="no dead time"),
    pytest.param(Dynamics(0.05, inf, 7, lag=4), 20, 0.3, id="integrating, cycle above the dead time"),
    pytest.param(Dynamics(0.1, 300, 3, lag=40, sensor_lag=2), 4, 0.5, id="derivative action"),
]


@pytest.mark.parametrize(("plant", "cycle_time", "load"), PLANTS)
def test_start_from_rest_as_scipy_integrates_it(plant, cycle_time, load):
    """From full output through the limits and the anti-windup into the cycle: 60 cycles, to 1e-6."""
    lags = (plant.lag, plant.sensor_lag)
    settings = simc(plant.slope, plant.tau, plant.theta, lags, cycle_delay=cycle_delay(cycle_time, load))
    begin = -2.5 / settings.gain
    start = LoopState(0.0, tuple(modes_of(plant).start(begin)), 0.0, 0.0, ())
    cycles = 60
    run = simulate_latched(plant, settings, cycle_time, start, load, cycles * cycle_time)
    values, duties, highest, lowest = reference(plant, settings, cycle_time, begin, load, cycles)
    assert duties[0] == 1.0
    assert 0 < duties[-1] < 1
    assert np.array(run.outputs) == pytest.approx(duties, abs=1e-6)
    at_latch = dict(zip(np.round(run.times, 6), run.values, strict=True))
    assert [at_latch[round(cycle * cycle_time, 6)] for cycle in range(cycles)] == pytest.approx(values, abs=1e-5)
    # scipy's points miss an extreme by a little: 64 of them a span
    assert run.highest == pytest.approx(highest, abs=2e-3 * (run.highest - run.lowest) / 10)
    assert run.lowest == pytest.approx(lowest, abs=2e-3 * (run.highest - run.lowest) / 10)


@pytest.mark.parametrize(("plant", "cycle_time", "load"), PLANTS)
@pytest.mark.parametrize("factor", [0.3, 1.0, 3.0])
def test_steady_cycle_repeats_and_its_mean_is_the_setpoint(plant, cycle_time, load, factor):
    period = cycle_time * factor
    settings = Settings(1e-3 / plant.slope / period, 100 * period, 0.0)
    start = steady_cycle(plant, settings, period, load)
    run = simulate_latched(plant, settings, period, start, load, 5 * period)
    assert run.outputs == pytest.approx([load] * len(run.outputs), abs=1e-9)
    swing = run.highest - run.lowest
    latches = [value for time, value in zip(run.times, run.values, strict=True) if abs(time / period - round(time / period)) < 1e-9]
    assert latches == pytest.approx([latches[0]] * len(latches), abs=1e-9 * swing + 1e-12)
    assert run.lowest < 0 < run.highest


@pytest.mark.parametrize("duty", [0.0, 1.0])
def test_steady_cycle_at_the_ends_has_no_swing(duty):
    plant, settings = Dynamics(0.1, 300, 12, lag=5), Settings(0.1, 100)
    run = simulate_latched(plant, settings, 10, steady_cycle(plant, settings, 10, duty), duty, 100)
    assert (run.highest, run.lowest) == pytest.approx((0, 0), abs=1e-9)


def test_time_to_band_is_the_last_moment_outside():
    plant, settings = Dynamics(0.1, 300, 12, lag=9), Settings(0.15, 160)
    start = LoopState(0.0, tuple(modes_of(plant).start(-12.0)), 0.0, 0.0, ())
    run = simulate_latched(plant, settings, 8, start, 0.4, 3000, Band(0.5, 0.5))
    outside = [time for time, value in zip(run.times, run.values, strict=True) if abs(value) > 0.5]
    assert run.time_to_band >= outside[-1]
    assert run.time_to_band - outside[-1] < 8
    never = simulate_latched(plant, settings, 8, start, 0.4, 40, Band(0.5, 0.5))
    assert never.time_to_band == inf


def test_a_turn_lies_where_the_slope_vanishes():
    plant = Dynamics(0.1, 300, 0, lag=20)
    modes = modes_of(plant)
    states = modes.start(0.0)
    states[1] = 1.0
    states[0] -= modes.true[1]
    time, value = turn(modes, states, 0.0, -0.2, 500.0)

    def course(t):
        """Solve ``y' = 0.1 (f - 0.2) - y/300`` with ``f = e^(-t/20)`` by hand."""
        k = 0.1 / (1 / 300 - 1 / 20)
        return k * np.exp(-t / 20) - 6 + (6 - k) * np.exp(-t / 300)

    fine = np.linspace(0, 500, 2_000_001)
    assert course(0) == pytest.approx(weighed(modes.true, states), abs=1e-9)
    assert value == pytest.approx(course(fine).max(), abs=1e-7)
    assert time == pytest.approx(fine[course(fine).argmax()], abs=1e-2)
    assert turn(modes, states, 0.0, -0.2, time * 0.9) is None
    assert turn(modes_of(Dynamics(0.1, 300, 0)), [1.0], 0.0, 0.0, 100.0) is None


def test_no_cycle_is_refused():
    plant, settings = Dynamics(0.1, 300, 12), Settings(0.1, 100)
    with pytest.raises(ValueError, match="cycle time"):
        simulate_latched(plant, settings, 0, LoopState(0.0, (0.0,), 0.0, 0.0, ()), 0.4, 10)
