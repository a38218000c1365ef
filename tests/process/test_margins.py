"""Margins against the published table, the published examples, python-control and their own meaning."""

from dataclasses import replace
from math import inf

import control
import numpy as np
import pytest

from specgen.process.loop_dynamics import Dynamics, integrating, self_regulating
from specgen.process.margins import margins, margins_of
from specgen.process.tuning import Settings, simc


@pytest.mark.parametrize("theta", [0.02, 1.0, 40.0])
@pytest.mark.parametrize("ratio", [0.05, 1.0, 8.0])
def test_published_row_for_a_lag(theta, ratio):
    """Skogestad 2003 (from memory, recomputed): GM 3.14, PM 61.4 deg, Ms 1.59 where tau <= 8 theta. GM is pi exactly."""
    plant = self_regulating(3.0, ratio * theta, theta)
    found = margins(plant, simc(plant.slope, plant.tau, theta))
    assert found.gain == pytest.approx(np.pi, rel=1e-6)
    assert found.phase == pytest.approx(90 - 0.5 * 180 / np.pi, rel=1e-6)  # crosses at 1/(2 theta)
    assert found.sensitivity == pytest.approx(1.590, abs=5e-4)
    assert found.stable
    assert found.gain_reduction == inf


def test_published_row_for_an_integrator():
    """Skogestad 2003 (from memory, recomputed): GM 2.96, PM 46.9 deg, Ms 1.70."""
    plant = integrating(0.05, 12)
    found = margins(plant, simc(0.05, inf, 12))
    assert found.gain == pytest.approx(2.963, abs=5e-4)
    assert found.phase == pytest.approx(46.86, abs=5e-3)
    assert found.sensitivity == pytest.approx(1.704, abs=5e-4)


S = [
    ("E1", lambda s: 1 / ((s + 1) * (0.2 * s + 1)), (5.5, 0.8, 0), 1.56),
    (
        "E2",
        lambda s: (-0.3 * s + 1) * (0.08 * s + 1) / ((2 * s + 1) * (s + 1) * (0.4 * s + 1) * (0.2 * s + 1) * (0.05 * s + 1) ** 3),
        (0.85, 2.5, 0),
        1.66,
    ),
    (
        "E2 PID",
        lambda s: (-0.3 * s + 1) * (0.08 * s + 1) / ((2 * s + 1) * (s + 1) * (0.4 * s + 1) * (0.2 * s + 1) * (0.05 * s + 1) ** 3),
        (1.30, 2.0, 1.2),
        1.72,
    ),
    ("E3", lambda s: 2 * (15 * s + 1) / ((20 * s + 1) * (s + 1) * (0.1 * s + 1) ** 2), (2.33, 1.05, 0), 1.55),
    ("E4", lambda s: 1 / (s + 1) ** 4, (0.30, 1.5, 0), 1.46),
    ("E4 PID", lambda s: 1 / (s + 1) ** 4, (0.50, 1.5, 1.0), 1.43),
    ("E5", lambda s: 1 / ((s + 1) * (0.2 * s + 1) * (0.04 * s + 1) * (0.008 * s + 1)), (3.72, 1.1, 0), 1.59),
    # the remembered 1.58 is not reproduced: 1.83 was computed for the unfiltered series form
    ("E5 PID", lambda s: 1 / ((s + 1) * (0.2 * s + 1) * (0.04 * s + 1) * (0.008 * s + 1)), (17.86, 0.224, 0.22), 1.83),
]


@pytest.mark.parametrize(("process", "series", "peak"), [pytest.param(*row[1:], id=row[0]) for row in S])
def test_published_examples_on_the_full_process(process, series, peak):
    gain, reset, rate = series

    def loop(omega):
        s = 1j * omega
        return process(s) * gain * (1 + 1 / (reset * s)) * (1 + rate * s)

    assert margins_of(loop, np.geomspace(1e-3, 1e4, 400)).sensitivity == pytest.approx(peak, abs=0.006)


def drawn(count, seed):
    """Draw plants with settings from mild to brisk, PI and PID, some with several crossovers."""
    random = np.random.default_rng(seed)
    for _ in range(count):
        theta = 10 ** random.uniform(-1, 2)
        tau = inf if random.random() < 0.25 else theta * 10 ** random.uniform(-1, 2.5)
        lag = theta * 10 ** random.uniform(-1.5, 1) if random.random() < 0.6 else 0.0
        sensor = theta * 10 ** random.uniform(-1.5, 0.5) if random.random() < 0.5 else 0.0
        plant = Dynamics(10 ** random.uniform(-2, 1), tau, theta, lag, sensor)
        tuned = simc(plant.slope, tau, theta, (lag, sensor), structure=random.choice(["PI", "PID"]))
        yield plant, replace(tuned, gain=tuned.gain * random.uniform(0.3, 2), integral_time=tuned.integral_time * random.uniform(0.6, 3))


@pytest.mark.parametrize("count", [8, pytest.param(150, marks=pytest.mark.outside_long)])
def test_against_python_control(count):
    """python-control on a dense response with the exact dead time: margins and peak sensitivity to 0.1 %."""
    compared = 0
    for plant, settings in drawn(count, seed=5):
        total = plant.theta + plant.lag + plant.sensor_lag
        omega = np.concatenate((np.geomspace(1e-5 / total, 2 / plant.theta, 3000), np.arange(2.01, 15, 0.01) / plant.theta))
        s = 1j * omega
        body = plant.slope * np.exp(-plant.theta * s) / (s + (0 if plant.is_integrating else 1 / plant.tau))
        body = body / ((1 + plant.lag * s) * (1 + plant.sensor_lag * s))
        loop = body * settings.gain * (1 + 1 / (settings.integral_time * s) + settings.derivative_time * s)
        found = margins(plant, settings)
        # without further lag derivative action leaves |L| level above the reference's last frequency, at any phase
        level = settings.gain * settings.derivative_time * plant.slope if plant.lag + plant.sensor_lag == 0 else 0.0
        assert found.stable or level < 1 or found.sensitivity == inf
        if level < 1:
            assert found.sensitivity == pytest.approx(max(float(1 / np.abs(1 + loop).min()), 1 / (1 - level)), rel=1e-3)
        if not found.stable:
            continue
        compared += 1
        gains, phases, *_ = control.stability_margins(control.frd(loop, omega), returnall=True)
        assert found.gain == pytest.approx(min(gains[gains > 1].min(), 1 / level if level > 0 else inf), rel=1e-3)
        assert found.phase == pytest.approx(min(abs(phases)), rel=1e-3)
    assert compared > count / 2


@pytest.mark.parametrize("count", [12, pytest.param(120, marks=pytest.mark.outside_long)])
def test_stability_is_that_of_the_roots(count):
    """Closed-loop roots with the dead time as a Pade form of order 12, good to far beyond the crossovers."""
    seen = set()
    for plant, settings in drawn(count, seed=9):
        for factor in (0.5, 1, 2, 5):
            pushed = replace(settings, gain=settings.gain * factor)
            found = margins(plant, pushed)
            if 0.9 < found.gain < 1.1 or plant.lag + plant.sensor_lag == 0:
                continue
            # in units of the dead time, so that the polynomial's coefficients stay of one size
            theta = plant.theta
            top, bottom = control.pade(1, 12)
            s = control.tf([1, 0], [1])
            tau_pole = 0 if plant.is_integrating else theta / plant.tau
            body = plant.slope * theta / ((s + tau_pole) * (1 + plant.lag / theta * s) * (1 + plant.sensor_lag / theta * s))
            loop = control.tf(top, bottom) * body
            loop *= pushed.gain * (1 + theta / (pushed.integral_time * s) + pushed.derivative_time / theta * s)
            characteristic = np.polyadd(loop.num[0][0], loop.den[0][0])
            assert found.stable == bool(np.roots(characteristic).real.max() < 1e-9)
            seen.add(found.stable)
    assert seen == {True, False}


@pytest.mark.parametrize("count", [20, pytest.param(200, marks=pytest.mark.outside_long)])
def test_a_gain_margin_is_what_the_gain_may_grow_by(count):
    for plant, settings in drawn(count, seed=3):
        found = margins(plant, settings)
        if found.stable and found.phase_crossover < inf:
            near = margins(plant, replace(settings, gain=settings.gain * found.gain * 0.999))
            past = margins(plant, replace(settings, gain=settings.gain * found.gain * 1.001))
            assert near.stable
            assert not past.stable
            assert past.gain == pytest.approx(1 / 1.001, rel=1e-6)
            assert past.phase < 0 < near.phase


def test_no_crossover_is_infinite():
    """One lag and PI with Ti = tau is an integrator: it never turns by 180 degrees."""
    found = margins(self_regulating(2.0, 10, 0), Settings(4.0, 10))
    assert (found.gain, found.phase_crossover) == (inf, inf)
    assert found.phase == pytest.approx(90)
    assert found.sensitivity == pytest.approx(1.0, abs=1e-3)


def test_no_gain_crossover_is_an_infinite_phase_margin():
    """A response that stays below one, given directly: half of a pure delay."""
    found = margins_of(lambda omega: 0.5 * np.exp(-1j * omega), np.arange(0.01, 7, 0.05))
    assert found.phase == inf
    assert found.gain == pytest.approx(2)
    assert found.sensitivity == pytest.approx(2, rel=1e-6)


def test_the_largest_of_several_crossings_decides():
    """A resonance past the first crossing: the second one is nearer to -1."""

    def loop(omega):
        s = 1j * omega
        return 0.2 * np.exp(-s) / s * (1 + 6 * s**2 / (s**2 + 0.1 * s + 36))

    omega = np.arange(0.01, 12, 0.0005)
    dense = loop(omega)
    passes = np.flatnonzero((np.diff(np.sign(dense.imag)) != 0) & (dense.real[:-1] < 0))
    assert len(passes) > 1
    found = margins_of(loop, np.arange(0.01, 12, 0.02))
    assert found.gain == pytest.approx(1 / -dense.real[passes].min(), rel=1e-3)
    assert found.phase_crossover > 1.6


def test_integral_action_too_quick_for_an_integrator_is_unstable_at_any_gain():
    plant = integrating(0.05, 12)
    for gain in (0.001, 0.1, 3.0):
        found = margins(plant, Settings(gain, 11))
        assert not found.stable
        assert found.gain <= 1
    assert margins(plant, Settings(0.1, 14)).stable


def test_low_gain_may_be_the_danger():
    """Integrator with quick integral action and strong derivative action: stable between two gains."""
    plant = Dynamics(1.0, inf, 0.1, lag=1.0, sensor_lag=0.05)
    settings = Settings(3.0, 0.8, 0.9)
    found = margins(plant, settings)
    assert found.stable
    assert found.gain_reduction < inf
    assert margins(plant, replace(settings, gain=settings.gain / found.gain_reduction * 1.01)).stable
    assert not margins(plant, replace(settings, gain=settings.gain / found.gain_reduction * 0.99)).stable


def test_derivative_action_on_a_plant_without_further_lag_keeps_a_level_gain():
    """|L| tends to Kc Td slope = 0.5 while the dead time turns on: the gain margin is at most 2, Ms at least 2."""
    found = margins(Dynamics(1.0, 10, 1), Settings(0.5, 10, 1.0))
    assert found.gain <= 2
    assert found.sensitivity >= 2
    assert not margins(Dynamics(1.0, 10, 1), Settings(0.5, 10, 2.01)).stable


def test_charged_delay_counts_as_dead_time():
    assert margins(Dynamics(1.0, 50, 4), Settings(0.05, 40), extra_delay=6) == margins(Dynamics(1.0, 50, 10), Settings(0.05, 40))
