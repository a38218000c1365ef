"""A stated cycle keeps what the sheet says: stable over the duty range, the stated swing, no less than the stated margin."""

from dataclasses import dataclass, replace
from math import exp, inf

import numpy as np
import pytest

from specgen.process.closed_loop import steady_cycle, weighed
from specgen.process.latched_loop import simulate_latched
from specgen.process.loop_dynamics import Dynamics, modes_of
from specgen.process.loop_map import latched_margins, spectral_radius, stable_cycle, stated_margins
from specgen.process.margins import margins
from specgen.process.tuning import Settings, cycle_delay, simc


@dataclass(frozen=True)
class Drawn:
    """A plant, a cycle, its duty range and the starting values with the cycle charged."""

    plant: Dynamics
    cycle_time: float
    low: float
    high: float
    settings: Settings
    charged: float

    @property
    def duties(self):
        return self.low, (self.low + self.high) / 2, self.high


def draw(count, seed, cycles=(0.1, 3.0)):
    """Draw plants of every form; the cycle as a share of the dead time, well spread."""
    random = np.random.default_rng(seed)
    low_share, high_share = np.log10(cycles[0]), np.log10(cycles[1])
    for _ in range(count):
        theta = 10 ** random.uniform(0, 2)
        tau = inf if random.random() < 0.2 else theta * 10 ** random.uniform(0.3, 2)
        lag = theta * random.uniform(0.1, 3) if random.random() < 0.5 else 0.0
        sensor = theta * random.uniform(0.05, 0.8) if random.random() < 0.3 else 0.0
        plant = Dynamics(100 / (20 * theta if tau == inf else tau), tau, theta, lag, sensor)
        cycle_time = theta * 10 ** random.uniform(low_share, high_share)
        low, high = random.uniform(0.05, 0.4), random.uniform(0.5, 0.93)
        charged = cycle_delay(cycle_time, high)
        settings = simc(plant.slope, tau, theta, (lag, sensor), cycle_delay=charged)
        yield Drawn(plant, cycle_time, low, high, settings, charged)


def ripple(plant, cycle_time, duty):
    """Return the settled swing by a form of its own: the periodic answers of single lags, put together by partial fractions."""
    time = np.unique(np.concatenate((np.linspace(0, 1, 40001), [duty]))) * cycle_time
    on = duty * cycle_time

    def answer(lag):
        """Periodic answer of ``1/(lag s + 1)`` to unit pulses."""
        if lag <= 0:
            return (time < on).astype(float)
        whole = 1 - exp(-cycle_time / lag)
        start_off, start_on = (1 - exp(-on / lag)) / whole, (1 - exp(-(cycle_time - on) / lag)) / whole
        return np.where(time <= on, 1 - start_on * np.exp(-time / lag), start_off * np.exp(-np.maximum(time - on, 0) / lag))

    if plant.is_integrating:
        triangle = np.where(time <= on, (1 - duty) * time, (1 - duty) * on - duty * (time - on))
        course = plant.slope * (triangle - (plant.lag * answer(plant.lag) if plant.lag > 0 else 0))
    else:
        tau, lag = plant.tau, plant.lag
        course = plant.gain * (tau * answer(tau) - lag * answer(lag)) / (tau - lag) if lag > 0 else plant.gain * answer(tau)
    return float(course.max() - course.min())


COUNT = [8, pytest.param(80, marks=pytest.mark.outside_long)]


@pytest.mark.parametrize("count", COUNT)
def test_stable_over_the_duty_range_by_map_and_in_time(count):
    """A load step of 2 %: the eigenvalues say that it dies out, and it does, into the cycle of the new duty."""
    for case in draw(count, seed=31):
        assert stable_cycle(case.plant, case.settings, case.cycle_time, case.duties)
        modes = modes_of(case.plant)
        for duty in case.duties:
            assert spectral_radius(case.plant, case.settings, case.cycle_time, duty) < 1
            start = steady_cycle(case.plant, case.settings, case.cycle_time, duty)
            after = duty + 0.02
            run = simulate_latched(case.plant, case.settings, case.cycle_time, start, after, 12 * case.settings.integral_time)
            assert run.outputs[-1] == pytest.approx(after, abs=1e-4)
            settled = weighed(modes.true, steady_cycle(case.plant, case.settings, case.cycle_time, after).modes)
            assert run.values[-1] == pytest.approx(settled, abs=1e-3 / case.settings.gain)


@pytest.mark.parametrize("count", COUNT)
def test_swing_is_the_stated_exact_ripple(count):
    for case in draw(count, seed=32):
        for duty in case.duties:
            start = steady_cycle(case.plant, case.settings, case.cycle_time, duty)
            run = simulate_latched(case.plant, case.settings, case.cycle_time, start, duty, 2 * case.cycle_time)
            assert run.highest - run.lowest == pytest.approx(ripple(case.plant, case.cycle_time, duty), rel=1e-5)


@pytest.mark.parametrize("count", COUNT)
def test_no_duty_of_the_range_has_less_margin_than_stated(count):
    """The stated gain margin, applied to the map itself at thirteen duties: still stable just short of it everywhere."""
    for case in draw(count, seed=33):
        stated, _ = stated_margins(case.plant, case.settings, case.cycle_time, case.duties, case.charged)
        assert stated.stable
        raised = replace(case.settings, gain=case.settings.gain * stated.gain * 0.999)
        for duty in np.linspace(case.low, case.high, 13):
            assert spectral_radius(case.plant, raised, case.cycle_time, float(duty)) < 1
            found = latched_margins(case.plant, case.settings, case.cycle_time, float(duty))
            assert found.gain > stated.gain * 0.999
            assert found.sensitivity < stated.sensitivity * 1.02


@pytest.mark.parametrize("count", COUNT)
def test_the_charge_alone_is_honest_with_a_lag_and_a_cycle_within_the_dead_time(count):
    """There the map keeps nine tenths of the margin that the charged delay gives, but not where derivative action cancels the lag."""
    for case in draw(3 * count, seed=34, cycles=(0.1, 1.0)):
        if case.plant.lag <= 0 or case.settings.structure == "PID":
            continue
        known = margins(case.plant, case.settings, case.charged)
        for duty in case.duties:
            assert latched_margins(case.plant, case.settings, case.cycle_time, duty).gain > 0.9 * known.gain


@pytest.mark.parametrize("count", [10, pytest.param(80, marks=pytest.mark.outside_long)])
def test_a_cycle_of_several_delays_swings_at_the_cycle(count):
    """Settings made without the cycle, T 6 to 9 effective delays: the map is unstable, and the value swings at a few cycles."""
    random = np.random.default_rng(35)
    unstable = 0
    for case in draw(count, seed=36):
        plant = case.plant
        settings = simc(plant.slope, plant.tau, plant.theta, (plant.lag, plant.sensor_lag))
        cycle_time, duty = settings.theta_e * random.uniform(6, 9), random.uniform(0.3, 0.7)
        radius = spectral_radius(plant, settings, cycle_time, duty)
        start = steady_cycle(plant, settings, cycle_time, duty)
        pushed = replace(start, integral=start.integral + 0.02)
        outputs = np.array(simulate_latched(plant, settings, cycle_time, pushed, duty, 400 * cycle_time).outputs[-120:])
        if radius > 1.02:
            unstable += 1
            assert np.ptp(outputs) > 0.2
            strength = np.abs(np.fft.rfft(outputs - outputs.mean()))
            assert 120 / (1 + strength[1:].argmax()) <= 6
        elif radius < 0.95:
            assert np.ptp(outputs) < 1e-3
    assert unstable > 0.6 * count
