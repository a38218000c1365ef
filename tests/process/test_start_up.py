"""Start-up: properties, and the whole course against the loop simulated without the leap over full output."""

from math import inf, log

import numpy as np
import pytest

from specgen.process.closed_loop import LoopState, full_output
from specgen.process.held_loop import simulate_held
from specgen.process.latched_loop import simulate_latched
from specgen.process.loop_dynamics import Dynamics, modes_of
from specgen.process.loop_run import Band
from specgen.process.start_up import start_up
from specgen.process.tuning import Settings, cycle_delay, simc

BAND = Band(1.5, 1.5)
PLANTS = [
    pytest.param(Dynamics(0.1, 1300, 25), 52, 0.4, 20, id="first order"),
    pytest.param(Dynamics(0.1, 1300, 25, lag=10, sensor_lag=8), 110, 110 / 130, 20, id="lags, nearly full output"),
    pytest.param(Dynamics(0.1, 1300, 25, lag=10), 3, 0.4, 20, id="from nearby"),
    pytest.param(Dynamics(0.05, inf, 30, lag=10), 20, 0.3, 45, id="integrating"),
    pytest.param(Dynamics(0.1, 1300, 8, lag=60, sensor_lag=3), 52, 0.4, 6, id="derivative action"),
]


def tuned(plant, cycle_time, duty):
    """Return SIMC settings with the cycle charged."""
    return simc(plant.slope, plant.tau, plant.theta, (plant.lag, plant.sensor_lag), cycle_delay=cycle_delay(cycle_time, duty))


@pytest.mark.parametrize(("plant", "rise", "duty", "cycle_time"), PLANTS)
def test_the_leap_over_full_output_changes_nothing(plant, rise, duty, cycle_time):
    settings = tuned(plant, cycle_time, duty)
    found = start_up(plant, settings, rise, duty, BAND, cycle_time)
    start = LoopState(0.0, tuple(modes_of(plant).start(-rise)), 0.0, 0.0, ())
    run = simulate_latched(plant, settings, cycle_time, start, duty, found.run.times[-1], BAND)
    assert found.overshoot == pytest.approx(max(run.highest, 0), abs=1e-6)
    assert found.time_to_band == pytest.approx(run.time_to_band, abs=cycle_time)
    full = next(index for index, output in enumerate(run.outputs) if output < 1) * cycle_time
    assert found.full_output == full


@pytest.mark.parametrize(("plant", "rise", "duty", "cycle_time"), PLANTS)
def test_a_continuous_output_leaps_as_well(plant, rise, duty, cycle_time):
    settings = tuned(plant, 0, duty)
    found = start_up(plant, settings, rise, duty, BAND)
    start = LoopState(0.0, tuple(modes_of(plant).start(-rise)), 0.0, 0.0, ())
    run = simulate_held(plant, settings, start, duty, found.run.times[-1], BAND)
    assert found.overshoot == pytest.approx(max(run.highest, 0), abs=1e-3 * rise)
    assert found.time_to_band == pytest.approx(run.time_to_band, abs=cycle_time)


def test_full_output_ends_where_the_band_begins():
    """First order, K 130, rise 52: full output until 1/Kc below the setpoint. By hand: 26 degrees of 130 are left to 8 below.

    ``t = theta + tau ln(130/(130 - 44))`` with Kc = 1/8, read at the next latch.
    """
    plant, settings = Dynamics(0.1, 1300, 25), Settings(1 / 8, 320)
    reached = 25 + 1300 * log(130 / 86)
    state = full_output(plant, settings, 20, 0.4, 52, 1.5)
    assert reached <= state.time < reached + 20
    assert state.time % 20 == 0
    assert state.level == 1.0


def test_the_band_may_be_reached_at_full_output():
    """A wide band of 10 against a proportional band of 8: passed 42 above rest, ``t = theta + tau ln(130/88)``."""
    plant, settings = Dynamics(0.1, 1300, 25), Settings(1 / 8, 320)
    found = start_up(plant, settings, 52, 0.4, Band(10, 10), 20)
    assert found.time_to_band == pytest.approx(25 + 1300 * log(130 / 88), rel=1e-6)


def test_a_short_cycle_is_followed_by_its_mean():
    """A solid-state cycle of 1 s against the same loop pulse by pulse."""
    plant = Dynamics(0.1, 1300, 25, lag=10)
    settings = tuned(plant, 1, 0.4)
    found = start_up(plant, settings, 52, 0.4, BAND, 1.0)
    start = LoopState(0.0, tuple(modes_of(plant).start(-52)), 0.0, 0.0, ())
    run = simulate_latched(plant, settings, 1.0, start, 0.4, 3000, BAND)
    assert found.overshoot == pytest.approx(max(run.highest, 0), abs=0.02)
    assert found.time_to_band == pytest.approx(run.time_to_band, rel=0.01)


def test_more_gain_overshoots_more():
    plant = Dynamics(0.1, 1300, 25, lag=10, sensor_lag=8)
    base = tuned(plant, 20, 0.4)
    found = [start_up(plant, Settings(base.gain * factor, base.integral_time), 52, 0.4, BAND, 20).overshoot for factor in (1, 2, 2.7)]
    assert found[0] < found[1] < found[2]


def test_a_swinging_loop_never_arrives():
    plant = Dynamics(0.1, 1300, 25, lag=10, sensor_lag=8)
    base = tuned(plant, 20, 0.4)
    assert start_up(plant, Settings(base.gain * 6, base.integral_time), 52, 0.4, Band(0.3, 0.3), 20).time_to_band == inf


@pytest.mark.parametrize(("rise", "duty", "why"), [(130, 1.0, "does not reach"), (150, 1.15, "does not reach"), (0, 0.4, "begins below")])
def test_what_is_no_start_up(rise, duty, why):
    plant, settings = Dynamics(0.1, 1300, 25), Settings(0.1, 300)
    for cycle_time in (0, 20):
        with pytest.raises(ValueError, match=why):
            start_up(plant, settings, rise, duty, BAND, cycle_time)


@pytest.mark.parametrize("count", [6, pytest.param(80, marks=pytest.mark.outside_long)])
def test_drawn_plants_arrive(count):
    """SIMC settings with the cycle charged: every drawn loop reaches a band as wide as its switching allows."""
    random = np.random.default_rng(21)
    for _ in range(count):
        theta = 10 ** random.uniform(0, 2)
        tau = theta * 10 ** random.uniform(0.5, 2)
        plant = Dynamics(100 / tau, tau, theta, theta * random.uniform(0, 1), theta * random.uniform(0, 1))
        duty, cycle_time = random.uniform(0.2, 0.8), theta * random.uniform(0.1, 0.7)
        settings = tuned(plant, cycle_time, 0.8)
        wide = 0.15 * settings.proportional_band + plant.slope * cycle_time / 4
        found = start_up(plant, settings, 100 * duty, duty, Band(wide, wide), cycle_time)
        assert found.full_output <= found.time_to_band < found.full_output + 60 * settings.theta_e + tau
