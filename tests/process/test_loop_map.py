"""Stability and margins of the latched loop against the known special case and against each other."""

from dataclasses import replace
from math import ceil, inf, pi, sin

import numpy as np
import pytest

from specgen.process.loop_dynamics import Dynamics
from specgen.process.loop_map import eigenvalues, is_stable, latched_margins, spectral_radius, stable_cycle, stated_margins
from specgen.process.margins import margins
from specgen.process.tuning import Settings, simc

TAU = 100.0


def cancelled(a, cycle_time, gain=7.0):
    """Return settings with Ti = tau whose a = Kc K T/tau on a plant of gain K."""
    return Settings(a * TAU / (gain * cycle_time), TAU)


@pytest.mark.parametrize("ratio", [0.0, 0.1, 0.7, 1.0, 1.6, 3.3, 9.5])
@pytest.mark.parametrize("duty", [0.05, 0.5, 0.95])
@pytest.mark.parametrize("a", [0.05, 0.4, 1.3])
def test_characteristic_equation_without_second_lag(ratio, duty, a):
    """``z^n - z^(n-1) + a = 0``, n = ceil(theta/T + x), beside the cancelled ``e^(-T/tau)``."""
    cycle_time = 20.0
    plant = Dynamics(7.0 / TAU, TAU, ratio * cycle_time)
    n = ceil(ratio + duty - 1e-9)
    known = np.zeros(n + 1)
    known[0], known[1], known[-1] = 1, -1, a
    if n == 1:
        known = np.array([1, -1 + a])
    expected = np.append(np.roots(known), np.exp(-cycle_time / TAU))
    found = eigenvalues(plant, cancelled(a, cycle_time), cycle_time, duty)
    assert found.size == expected.size
    assert np.poly(found) == pytest.approx(np.poly(expected), abs=1e-8)


@pytest.mark.parametrize("n", [1, 2, 3, 5, 9, 30])
def test_limit_of_stability_without_second_lag(n):
    """``a = 2 sin(pi/(4n - 2))``: radius 1 there, and the margin is what is left to it."""
    cycle_time, duty = 20.0, 0.4
    plant = Dynamics(7.0 / TAU, TAU, (n - 0.7) * cycle_time)
    limit = 2 * sin(pi / (4 * n - 2))
    assert spectral_radius(plant, cancelled(limit, cycle_time), cycle_time, duty) == pytest.approx(1, abs=1e-9)
    assert stable_cycle(plant, cancelled(0.999 * limit, cycle_time), cycle_time, (duty,))
    assert not stable_cycle(plant, cancelled(1.001 * limit, cycle_time), cycle_time, (duty,))
    assert latched_margins(plant, cancelled(limit / 2.5, cycle_time), cycle_time, duty).gain == pytest.approx(2.5, rel=1e-6)


def draw(random):
    """Draw a plant, a cycle and a highest duty."""
    theta = 10 ** random.uniform(-0.5, 2)
    tau = inf if random.random() < 0.25 else theta * 10 ** random.uniform(0, 2)
    lag = theta * random.uniform(0.1, 4) if random.random() < 0.6 else 0.0
    plant = Dynamics(10 ** random.uniform(-2, 0), tau, theta, lag, theta * random.uniform(0, 0.8) * (random.random() < 0.4))
    return plant, theta * random.choice([0.05, 0.2, 0.5, 1.0, 1.7, 4.0]), random.uniform(0.2, 0.95)


@pytest.mark.parametrize("count", [15, pytest.param(400, marks=pytest.mark.outside_long)])
def test_frequency_response_and_eigenvalues_agree(count):
    """The margin of the response is the gain at which the spectral radius passes 1."""
    random = np.random.default_rng(11)
    for _ in range(count):
        plant, cycle_time, duty = draw(random)
        settings = simc(plant.slope, plant.tau, plant.theta, (plant.lag, plant.sensor_lag), cycle_delay=cycle_time / 2)
        found = latched_margins(plant, settings, cycle_time, duty)
        assert found.stable == (spectral_radius(plant, settings, cycle_time, duty) < 1)
        for factor, stable in ((0.998, True), (1.002, False)):
            changed = replace(settings, gain=settings.gain * found.gain * factor)
            assert (spectral_radius(plant, changed, cycle_time, duty) < 1) is stable
            assert latched_margins(plant, changed, cycle_time, duty).stable is stable


def test_many_cycles_of_delay_are_judged_by_the_response():
    """A solid-state cycle of a two-hundredth of the dead time: close to the continuous loop, and the same limit."""
    plant, cycle_time = Dynamics(0.1, 600, 40, lag=5), 0.2
    settings = simc(plant.slope, plant.tau, plant.theta, (plant.lag,), cycle_delay=cycle_time)
    known = margins(plant, settings, 0.5 * cycle_time)
    assert latched_margins(plant, settings, cycle_time, 0.5).gain == pytest.approx(known.gain, rel=1e-3)
    assert is_stable(plant, settings, cycle_time, 0.5)
    assert not is_stable(plant, replace(settings, gain=1.01 * known.gain * settings.gain), cycle_time, 0.5)


def test_a_short_cycle_is_the_continuous_loop_with_its_delay():
    """T a fiftieth of theta, plant with a lag: gain, phase and peak sensitivity are those of theta + x T."""
    plant, cycle_time = Dynamics(0.1, 600, 40, lag=15, sensor_lag=5), 0.8
    settings = simc(plant.slope, plant.tau, plant.theta, (plant.lag, plant.sensor_lag))
    for duty in (0.1, 0.9):
        latched, known = latched_margins(plant, settings, cycle_time, duty), margins(plant, settings, duty * cycle_time)
        assert latched.gain == pytest.approx(known.gain, rel=2e-3)
        assert latched.phase == pytest.approx(known.phase, rel=2e-3)
        assert latched.sensitivity == pytest.approx(known.sensitivity, rel=2e-3)


def test_stated_margins_take_the_worse_of_charge_and_map():
    """theta/T = 0.6, no second lag, x 0.5: the pulse's end just misses a latch, n = 2; a limit 1 against pi/2 T/1.1 T charged."""
    cycle_time = 20.0
    plant = Dynamics(7.0 / TAU, TAU, 0.6 * cycle_time)
    settings = cancelled(0.4, cycle_time)
    found, duty = stated_margins(plant, settings, cycle_time, (0.1, 0.5), extra_delay=0.5 * cycle_time)
    assert found.gain == pytest.approx(1 / 0.4, rel=1e-6)
    assert duty == 0.5
    assert margins(plant, settings, 0.5 * cycle_time).gain == pytest.approx(pi / 2 / 1.1 / 0.4, rel=1e-6)
    mild, nowhere = stated_margins(plant, settings, cycle_time, (0.1, 0.3), extra_delay=0.5 * cycle_time)
    assert nowhere is None
    assert mild.gain == pytest.approx(pi / 2 / 1.1 / 0.4, rel=1e-6)
