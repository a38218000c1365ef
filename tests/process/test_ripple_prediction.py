"""Worst ripple over a box by hand, held-back pulses, and the longest cycle."""

from math import e, inf, log

import pytest

from specgen.process.limit_cycle import NoCycle
from specgen.process.time_proportioned import longest_cycle, predict_ripple


def tank(make, **changes):
    """A balance without loss: k' = 0.1 K/s, duty 0.3 to 0.7."""
    given = {
        "strength": (1000, 1000), "ambient": None, "setpoint": (0, 0), "load": (300, 700), "loss": (0, 0), "capacity": (10e3, 20e3),
        "dead_time": (10, 10),
    }  # fmt: skip
    return make.box(**{**given, **changes})


def oven(make, **changes):
    """100 K of change at rated supply, 600 s, setpoints 20 to 70 K above the surroundings."""
    given = {
        "strength": (100, 100), "ambient": (20, 20), "setpoint": (40, 90), "load": (0, 0), "loss": (1, 1), "capacity": (600, 600),
        "dead_time": (10, 10),
    }  # fmt: skip
    return make.box(**{**given, **changes})


def test_half_duty_is_found_inside(make):
    """k' x(1 - x) T at half duty, 0.1 x 0.25 x 40 = 1 K; pulses 0.3 x 40 s each way."""
    found = predict_ripple(tank(make), 40)
    assert found.swing.value == pytest.approx(1.0, rel=1e-3)
    assert found.swing.plant.duty == pytest.approx(0.5, abs=0.01)
    assert (found.above.value, found.below.value) == pytest.approx((0.5, 0.5), rel=1e-3)
    assert (found.shortest_on.value, found.shortest_off.value) == pytest.approx((12, 12))
    assert (found.duty_low, found.duty_high) == pytest.approx((0.3, 0.7))
    assert not found.held_back


def test_a_cooler_ripples_to_the_other_side(make):
    """At low duty a heater's peak is the sharper side; a cooler's trough is."""
    warm = predict_ripple(oven(make, setpoint=(30, 30)), 300)
    cold = predict_ripple(oven(make, ambient=(40, 40), setpoint=(30, 30), sign=-1), 300)
    assert warm.above.value > warm.below.value
    assert (cold.below.value, cold.above.value) == pytest.approx((warm.above.value, warm.below.value))


def test_held_back_pulses_swing_more(make):
    """Load of 1 percent in a 10 s cycle: 0.1 s asked for, 0.35 s made: every fourth cycle, k' x(1 - x) 40 s."""
    box = tank(make, load=(10, 10), capacity=(10e3, 10e3))
    found = predict_ripple(box, 10, least_on=0.35, least_off=0.35)
    assert found.held_back
    assert found.shortest_on.value == pytest.approx(0.1)
    assert found.swing.value == pytest.approx(0.1 * 0.01 * 0.99 * 40)


def test_just_held_back_is_worst(make):
    """Duty 1 to 50 percent, pulses from 3 s in 10 s: just below 30 percent the pattern takes 20 s, more than half duty in 10 s does."""
    box = tank(make, load=(10, 500), capacity=(10e3, 10e3))
    found = predict_ripple(box, 10, least_on=3, least_off=0)
    assert found.swing.value == pytest.approx(0.1 * 0.3 * 0.7 * 20, rel=1e-3)


def test_longest_cycle_of_a_tank(make):
    """k' T/8 a side at half duty: 0.25 K allow 20 s."""
    assert longest_cycle(tank(make), 0.25, 1.0) == pytest.approx(20, rel=1e-3)
    assert longest_cycle(tank(make), 1.0, 0.25) == pytest.approx(20, rel=1e-3)


def test_longest_cycle_of_an_oven(make):
    """Half duty alone: K tanh(T/4 tau)/2 = 0.3 K gives T = 2 tau ln((1 + 0.006)/(1 - 0.006))."""
    box = oven(make, setpoint=(70, 70))
    assert longest_cycle(box, 0.3, 0.3) == pytest.approx(2 * 600 * log(1.006 / 0.994), rel=1e-4)


def test_worst_side_is_not_at_half_duty(make):
    """Above the mean K (u - x) with u = (1 - e^-xa)/(1 - e^-a), largest where e^-xa = (1 - e^-a)/a; by hand at a = T/tau = 1."""
    x = -log(1 - 1 / e)
    above = 100 * ((1 - (1 - 1 / e)) / (1 - 1 / e) - x)
    found = predict_ripple(oven(make), 600)
    assert found.above.value == pytest.approx(above, rel=1e-3)
    assert found.above.plant.duty == pytest.approx(x, abs=0.02)


def test_no_cycle_ripples_as_much(make):
    """30 K above and 70 K below are the ends themselves: no cycle leaves the setpoint further."""
    assert longest_cycle(oven(make, setpoint=(90, 90)), 71, 71) == inf


def test_no_duty(make):
    with pytest.raises(NoCycle):
        predict_ripple(tank(make, load=(-5, -2)), 10)
