"""Steady ripple of a time-proportioned output against the differential equation and by hand."""

from math import exp, tanh

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy.integrate import solve_ivp

from specgen.process.cycle_ripple import carried_over, half_duty_ripple
from specgen.process.plant import Integrating, SelfRegulating


def seen_ripple(plant, cycle_time, duty):
    """Integrate one cycle from the settled start, which a linear shooting over unit starts gives."""
    slow = isinstance(plant, Integrating)
    span = plant.gain_per_second if slow else plant.gain

    def right(_t, y, full):
        drive = y[0] if plant.lag else span * (full - duty)
        return [(span * (full - duty) - y[0]) / plant.lag if plant.lag else -y[0], drive if slow else (drive - y[1]) / plant.tau]

    def turn(t, y, full):
        return right(t, y, full)[1]

    def once(start):
        y, seen, area = np.array(start, float), [], 0.0
        for full, length in ((1.0, duty * cycle_time), (0.0, (1 - duty) * cycle_time)):
            done = solve_ivp(
                lambda t, y, full=full: [*right(t, y, full), y[1]],
                (0, length),
                [*y, 0.0],
                method="DOP853",
                rtol=1e-10,
                atol=1e-13 * span,
                events=lambda t, y, full=full: turn(t, y, full),
            )
            seen += [y[1], done.y[1, -1], *(e[1] for e in done.y_events[0])]
            y, area = done.y[:2, -1], area + done.y[2, -1]
        return y, max(seen), min(seen), area / cycle_time

    base = once([0, 0])[0]
    slope = np.array([once([1, 0])[0] - base, once([0, 1])[0] - base]).T
    start = np.linalg.lstsq(np.eye(2) - slope, base, rcond=1e-9)[0]
    _, top, bottom, mean = once(start)
    return top - mean, mean - bottom


DRAWN = {
    "duty": st.floats(0.05, 0.95),
    "gain": st.floats(5, 500),
    "tau": st.floats(20, 3000),
    "lag": st.one_of(st.just(0.0), st.floats(0.02, 1.5)),
    "share": st.floats(0.05, 2.0),
    "integrating": st.booleans(),
}


def compare(duty, gain, tau, lag, share, integrating):
    if integrating:
        plant = Integrating(gain * (1 - duty) / tau, gain * duty / tau, 0, lag * tau)
    else:
        plant = SelfRegulating(gain * (1 - duty), gain * duty, tau, 0, lag * tau)
    ripple = plant.ripple(share * tau)
    above, below = seen_ripple(plant, share * tau, duty)
    assert (ripple.above, ripple.below) == pytest.approx((above, below), abs=1e-6 * ripple.swing)
    assert (ripple.t_on, ripple.t_off) == pytest.approx((duty * share * tau, (1 - duty) * share * tau))


@settings(max_examples=12, deadline=None, derandomize=True)
@given(**DRAWN)
def test_against_the_differential_equation(**parts):
    compare(**parts)


@pytest.mark.outside_long
@settings(max_examples=300, deadline=None, derandomize=True)
@given(**DRAWN)
def test_against_the_differential_equation_many(**parts):
    compare(**parts)


def test_half_duty_by_hand():
    """K tanh(T/4 tau), both sides alike."""
    ripple = SelfRegulating(70, 70, 600, 30).ripple(60)
    assert ripple.swing == pytest.approx(140 * tanh(60 / 2400), rel=1e-12)
    assert ripple.above == pytest.approx(ripple.below, rel=1e-9)
    assert half_duty_ripple(140, 600, 60) == pytest.approx(ripple.swing, rel=1e-12)


def test_quarter_duty_by_hand():
    """The peak is further from the mean than the trough where the output is mostly off."""
    ripple = SelfRegulating(75, 25, 100, 0).ripple(50)
    peak = 100 * (1 - exp(-0.125)) / (1 - exp(-0.5)) - 25
    trough = 25 - 100 * exp(-0.375) * (1 - exp(-0.125)) / (1 - exp(-0.5))
    assert (ripple.above, ripple.below) == pytest.approx((peak, trough), rel=1e-12)
    assert ripple.above > ripple.below


@settings(max_examples=100, deadline=None)
@given(duty=st.floats(0.02, 0.98), share=st.floats(0.01, 3), lag=st.floats(0, 1), longer=st.floats(1, 2))
def test_no_duty_beats_half_and_a_longer_cycle_ripples_more(duty, share, lag, longer):
    plant = SelfRegulating(50, 50, 600, 0, lag * 600)
    here = plant.ripple(600 * share, duty)
    assert here.swing <= plant.ripple(600 * share, 0.5).swing * (1 + 1e-9)
    assert plant.ripple(600 * share * longer, duty).swing >= here.swing * (1 - 1e-9)


def test_nothing_switches_at_the_ends():
    assert SelfRegulating(50, 50, 600, 0).ripple(60, 0.0).swing == 0
    assert Integrating(0.1, 0.1, 0).ripple(60, 1.0).swing == 0


@pytest.mark.parametrize(
    ("duty", "least_on", "least_off", "pattern"),
    [(0.05, 1.2, 1.2, 30), (0.05, 0.5, 0.5, 10), (0.95, 0.1, 1.1, 30), (0.5, 6, 4, 20), (0.0, 1, 1, 10), (1.0, 1, 1, 10)],
)
def test_held_back_pulses(duty, least_on, least_off, pattern):
    """By hand: 0.5 s a cycle reaches 1.2 s in three cycles, and so on."""
    assert carried_over(10, duty, least_on, least_off) == pattern
