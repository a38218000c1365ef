"""Load steps: the simulated factors of the first estimate, linearity, the worst instant, the ends of the output."""

from math import exp, inf

import numpy as np
import pytest

from specgen.process.closed_loop import LoopState, advanced, steady_cycle
from specgen.process.latched_loop import simulate_latched
from specgen.process.load_step import first_estimate, load_step
from specgen.process.loop_dynamics import Dynamics, modes_of
from specgen.process.tuning import Settings, cycle_delay, simc


def tuned(plant, cycle_time=0.0, duty=0.5):
    """Return SIMC settings with the cycle charged."""
    return simc(plant.slope, plant.tau, plant.theta, (plant.lag, plant.sensor_lag), cycle_delay=cycle_delay(cycle_time, duty))


@pytest.mark.parametrize(("ratio", "factor"), [(inf, 1.97), (100, 1.93), (8, 1.63), (2, 1.05)])
def test_factors_of_the_first_estimate(ratio, factor):
    """Stated for ``tau/theta_e``; a continuous output, pure dead time."""
    plant = Dynamics(0.2, 30 * ratio, 30)
    found = load_step(plant, tuned(plant), 0.5, 0.1)
    assert found.deviation / (0.2 * 30 * 0.1) == pytest.approx(factor, abs=0.012)
    assert found.deviation <= first_estimate(0.2, 30, 0.1) * 1.005
    assert found.recovers
    assert found.ripple == 0


def test_factor_of_an_integrator_by_small_steps():
    """The loop written out in steps of a thousandth of the dead time: the peak after a unit load."""
    step, parts = 1e-3, 1000
    gain, reset = 0.5, 8.0
    pipe = np.zeros(parts)
    value = integral = peak = 0.0
    for index in range(12 * parts):
        output = gain * (-value) + integral
        integral -= gain / reset * value * step
        arrived, pipe[index % parts] = pipe[index % parts], output
        value += step * (arrived - 1)
        peak = min(peak, value)
    assert -peak == pytest.approx(1.97, rel=0.006)
    plant = Dynamics(1.0, inf, 1.0)
    assert load_step(plant, Settings(gain, reset), 0.5, 0.01).deviation == pytest.approx(-peak * 0.01, rel=2e-3)


@pytest.mark.parametrize("lag", [0.0, 0.5, 1.0])
@pytest.mark.parametrize("tau", [100.0, inf])
def test_half_ruled_lags_keep_the_estimate_near(lag, tau):
    """With half of a lag in theta_e the estimate is a tenth low where the lag equals the dead time, as its description says."""
    plant = Dynamics(1.0, tau, 1.0, lag=lag)
    settings = simc(1.0, tau, 1.0, (lag,), structure="PI")
    found = load_step(plant, settings, 0.5, 0.1)
    assert 0.89 < first_estimate(1.0, settings.theta_e, 0.1) / found.deviation < 1.06


@pytest.mark.parametrize("cycle_time", [0.0, 20.0])
def test_both_directions_mirror_at_half_load(cycle_time):
    """At half load the pulse train is its own mirror but for the instant of the latch."""
    plant = Dynamics(0.1, 1300, 25, lag=10, sensor_lag=8)
    settings = tuned(plant, cycle_time)
    down, up = (load_step(plant, settings, 0.5, change, cycle_time).deviation for change in (0.1, -0.1))
    assert down == pytest.approx(up, rel=1e-6 if cycle_time == 0 else 0.1)


PLANTS = [
    pytest.param(Dynamics(0.1, 1300, 25), id="first order"),
    pytest.param(Dynamics(0.1, 1300, 25, lag=10, sensor_lag=8), id="lags"),
    pytest.param(Dynamics(0.05, inf, 25, lag=10), id="integrating"),
    pytest.param(Dynamics(0.1, 1300, 25, lag=80), id="derivative action"),
]


@pytest.mark.parametrize("plant", PLANTS)
@pytest.mark.parametrize(("cycle_time", "duty"), [(20.0, 0.4), (45.0, 0.7)])
def test_just_after_a_latch_is_the_worst_instant(plant, cycle_time, duty):
    """The load moved through the cycle: no instant beats the start of it by more than the ripple's own course."""
    settings = tuned(plant, cycle_time, duty)
    found = load_step(plant, settings, duty, 0.15, cycle_time)
    modes = modes_of(plant)
    start = steady_cycle(plant, settings, cycle_time, duty)
    worst = 0.0
    for share in np.linspace(0, 0.95, 12):
        # by superposition: the load's own effect up to the next latch, added to the steady cycle's state there
        late = (1 - share) * cycle_time
        effect, gathered = advanced(modes, [0.0] * len(modes.rate), 0.0, -0.15, late)
        states = tuple(state + moved for state, moved in zip(start.modes, effect, strict=True))
        integral = start.integral - settings.gain / settings.integral_time * gathered
        begun = LoopState(0.0, states, integral, start.level, start.edges)
        run = simulate_latched(plant, settings, cycle_time, begun, duty + 0.15, 12 * settings.theta_e)
        worst = max(worst, -run.lowest)
    assert found.deviation > worst * 0.98
    assert found.deviation < worst * 1.25


@pytest.mark.parametrize("plant", PLANTS)
def test_a_short_cycle_is_followed_by_its_mean(plant):
    """A cycle of a seventh of the effective delay, its mean and its ripple: hardly ever better than the same loop pulse by pulse."""
    cycle_time, duty = 3.5, 0.4
    settings = tuned(plant, cycle_time, duty)
    found = load_step(plant, settings, duty, 0.15, cycle_time)
    start = steady_cycle(plant, settings, cycle_time, duty)
    run = simulate_latched(plant, settings, cycle_time, start, duty + 0.15, 12 * settings.theta_e, load_seen=duty)
    assert found.deviation == pytest.approx(-run.lowest, rel=0.06)
    assert found.deviation > -run.lowest * 0.985


def test_ripple_before_the_step_is_the_larger_side_below():
    """First order, x 0.3, T 20: trough below the mean by the closed form of the periodic answer."""
    plant, duty, cycle_time = Dynamics(0.1, 200, 25), 0.3, 20.0
    settings = tuned(plant, cycle_time)
    a, b, c = exp(-duty * cycle_time / 200), exp(-(1 - duty) * cycle_time / 200), exp(-cycle_time / 200)
    trough = 20 * (b - c) / (1 - c)
    assert a * b == pytest.approx(c)
    found = load_step(plant, settings, duty, 0.1, cycle_time)
    assert found.ripple == pytest.approx(20 * duty - trough, rel=1e-9)
    assert found.deviation > found.ripple


def test_a_load_beyond_full_output_ends_where_the_plant_settles():
    """K 130; held at 0.9, then 1.1 would be needed: a tenth of 130 is missing."""
    plant = Dynamics(0.1, 1300, 25)
    for cycle_time in (0.0, 20.0):
        found = load_step(plant, tuned(plant, cycle_time), 0.9, 0.2, cycle_time)
        assert not found.recovers
        assert found.deviation == pytest.approx(13, rel=1e-6)
    assert load_step(Dynamics(0.1, inf, 25), tuned(Dynamics(0.1, inf, 25)), 0.9, 0.2).deviation == inf
    below = load_step(plant, tuned(plant), 0.1, -0.25)
    assert not below.recovers
    assert below.deviation == pytest.approx(0.15 * 130, rel=1e-6)


def test_near_full_output_the_limit_makes_it_worse():
    plant = Dynamics(0.1, 1300, 25, lag=10)
    settings = tuned(plant, 20)
    free = load_step(plant, settings, 0.4, 0.2, 20)
    tight = load_step(plant, settings, 0.78, 0.2, 20)
    assert tight.recovers
    assert tight.deviation - tight.ripple > (free.deviation - free.ripple) * 1.05


def test_a_slow_controller_is_followed_to_its_peak():
    """A tenth of the gain: the value keeps leaving long after twelve delays; a step with Ti endless settles at du/Kc."""
    plant = Dynamics(0.1, 1300, 25)
    settings = Settings(0.02, 1e9)
    # K Kc = 2.6: a pure proportional loop ends at K du/(1 + K Kc)
    found = load_step(plant, settings, 0.4, 0.1)
    assert found.deviation == pytest.approx(13 / 3.6, rel=0.06)


def test_duty_outside_the_output_is_refused():
    with pytest.raises(ValueError, match="duty"):
        load_step(Dynamics(0.1, 1300, 25), Settings(0.1, 300), 1.2, 0.1)
