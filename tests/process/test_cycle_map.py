"""The one-cycle map against the limited, nonlinear simulation."""

from dataclasses import replace
from math import inf

import numpy as np
import pytest

from specgen.process.closed_loop import steady_cycle
from specgen.process.cycle_map import cycle_map
from specgen.process.latched_loop import simulate_latched
from specgen.process.loop_dynamics import Dynamics, modes_of
from specgen.process.tuning import Settings, cycle_delay, simc

PLANTS = [
    pytest.param(Dynamics(0.1, 600, 25), id="first order"),
    pytest.param(Dynamics(0.1, 600, 25, lag=12), id="second lag"),
    pytest.param(Dynamics(0.1, 600, 25, lag=12, sensor_lag=9), id="sensor lag"),
    pytest.param(Dynamics(0.1, inf, 25, lag=12, sensor_lag=9), id="integrating"),
    pytest.param(Dynamics(0.1, 600, 4, lag=60), id="derivative action"),
]


@pytest.mark.parametrize("plant", PLANTS)
@pytest.mark.parametrize(("cycle_time", "duty"), [(20, 0.5), (20, 0.93), (8, 0.2), (70, 0.35)])
def test_map_follows_the_simulated_loop(plant, cycle_time, duty):
    """A tiny push of the integral: duty for duty the limited, nonlinear simulation does what the matrix says."""
    lags = (plant.lag, plant.sensor_lag)
    settings = simc(plant.slope, plant.tau, plant.theta, lags, cycle_delay=cycle_delay(cycle_time, duty))
    steady = steady_cycle(plant, settings, cycle_time, duty)
    push = 1e-6
    pushed = replace(steady, integral=steady.integral + push)
    run = simulate_latched(plant, settings, cycle_time, pushed, duty, 25 * cycle_time)
    simulated = (np.array(run.outputs) - duty) / push
    found = cycle_map(plant, settings, cycle_time, duty)
    matrix, size = found.matrix(), len(found.push)
    state = np.zeros(len(matrix))
    # the push of the integral part, as the integral of the measurement that makes it
    state[size - 1] = -1 / found.reads[-1]
    expected = []
    for _ in simulated:
        expected.append(-float(np.dot(found.reads, state[:size])))
        state = matrix @ state
    assert simulated[0] == pytest.approx(1, rel=1e-6)
    assert simulated == pytest.approx(np.array(expected[: len(simulated)]), abs=2e-4)


def test_a_pulse_that_ends_on_a_latch_is_seen_by_it():
    """theta 30, T 20, x 0.5: the end arrives 40 s after its latch, in floating point or just beside it."""
    settings = Settings(0.1, 300)
    for theta in (30.0, 30.0 + 1e-11, 30.0 - 1e-11):
        assert cycle_map(Dynamics(0.1, 300, theta), settings, 20.0, 0.5).delay == 2


@pytest.mark.parametrize(("cycle_time", "duty"), [(0, 0.5), (-1, 0.5), (10, -0.1), (10, 1.1)])
def test_what_is_no_cycle_is_refused(cycle_time, duty):
    with pytest.raises(ValueError, match="cycle time"):
        cycle_map(Dynamics(0.1, 300, 20), Settings(0.1, 300), cycle_time, duty)


def test_map_has_one_state_for_each_mode_the_integral_and_each_cycle_under_way():
    """Body, lag, sensor, integral, and three of n = ceil(50/20 + 0.6) = 4 cycles."""
    plant = Dynamics(0.1, 300, 50, lag=10, sensor_lag=5)
    assert len(modes_of(plant).rate) == 3
    assert cycle_map(plant, Settings(0.1, 300), 20, 0.6).matrix().shape == (7, 7)
