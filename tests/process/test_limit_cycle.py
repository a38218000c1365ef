"""First-order and integrating cycles: published rows, the differential equation, and what must hold for any plant."""

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from specgen.process.limit_cycle import NoCycle, integrating_cycle, relay_cycle
from specgen.process.plant import Integrating, SelfRegulating

# Exact on-off control of a lag with dead time. Formulas as in Tsypkin, Relay Control Systems (1984), and Astrom and Hagglund, PID
# Controllers (1995), relay chapter; standing: from memory, recalculated and confirmed within 0.2 % by a time-step simulation (dt 0.05 s).
# K, tau, theta, x, half differential -> excursion above, below, time on, time off, simulated period
PUBLISHED = [
    pytest.param(200, 600, 30, 0.50, 0.0, 4.877, 4.877, 58.571, 58.571, 117.20, id="half load, no differential"),
    pytest.param(200, 600, 30, 0.50, 1.0, 5.828, 5.828, 70.019, 70.019, 140.20, id="half load"),
    pytest.param(200, 600, 30, 0.25, 1.0, 8.267, 3.390, 47.421, 133.927, 181.45, id="quarter load"),
    pytest.param(200, 600, 30, 0.80, 0.5, 2.426, 8.279, 150.416, 40.909, 191.50, id="high load"),
]


@pytest.mark.parametrize(("gain", "tau", "theta", "x", "half", "above", "below", "on", "off", "simulated"), PUBLISHED)
def test_published_rows(gain, tau, theta, x, half, above, below, on, off, simulated):
    cycle = SelfRegulating(gain * (1 - x), gain * x, tau, theta).limit_cycle(half, -half)
    assert cycle.peak == pytest.approx(above, abs=6e-4)
    assert -cycle.trough == pytest.approx(below, abs=6e-4)
    assert (cycle.t_on, cycle.t_off) == pytest.approx((on, off), abs=6e-4)
    assert cycle.period == pytest.approx(simulated, rel=2e-3)
    # mean offset of the published block: (A_up - A_lo)/2 is the middle of the swing
    assert (cycle.peak + cycle.trough) / 2 == pytest.approx((above - below) / 2, abs=6e-4)


# Symmetric relay, Astrom and Hagglund 1984 and 1995; standing: from memory, recalculated.
@pytest.mark.parametrize(("half", "amplitude", "period"), [(0.0, 0.3625, 7.3318), (0.2, 0.5263, 10.7793)])
def test_symmetric_relay(half, amplitude, period):
    cycle = SelfRegulating(2, 2, 10, 2).limit_cycle(half, -half)
    assert cycle.peak == pytest.approx(amplitude, abs=6e-5)
    assert cycle.trough == pytest.approx(-amplitude, abs=6e-5)
    assert cycle.period == pytest.approx(period, abs=6e-5)


def test_published_integrating_row():
    """Tank level, r_up 0.2, r_dn 0.1, L 5, h 1: peak to peak 3.5, on 17.5, off 35 (algebra)."""
    cycle = Integrating(0.2, 0.1, 5).limit_cycle(1, -1)
    assert cycle.swing == pytest.approx(3.5)
    assert (cycle.t_on, cycle.t_off) == pytest.approx((17.5, 35.0))
    assert cycle.mean == pytest.approx((2.0 - 1.5) / 2)


PLANT = {
    "duty": st.floats(0.1, 0.9),
    "gain": st.floats(5, 500),
    "tau": st.floats(20, 5000),
    "delay": st.floats(0.01, 1.5),
    "share": st.floats(0.001, 0.08),
    "offset": st.floats(-0.02, 0.02),
}


def first_order(duty, gain, tau, delay, share, offset):
    plant = SelfRegulating(gain * (1 - duty), gain * duty, tau, tau * delay)
    return plant, gain * (offset + share / 2), gain * (offset - share / 2)


def compare_first_order(relay_reference, plant, high, low):
    cycle = plant.limit_cycle(high, low)
    seen = relay_reference(plant, high, low, start=low)
    assert (cycle.peak - cycle.trough) == pytest.approx(seen.peak - seen.trough, rel=1e-7)
    assert (cycle.peak, cycle.trough) == pytest.approx((seen.peak, seen.trough), abs=1e-7 * cycle.swing)
    assert (cycle.t_on, cycle.t_off) == pytest.approx((seen.t_on, seen.t_off), rel=1e-7)


@settings(max_examples=8, deadline=None, derandomize=True)
@given(**PLANT)
def test_against_the_differential_equation(relay_reference, duty, gain, tau, delay, share, offset):
    compare_first_order(relay_reference, *first_order(duty, gain, tau, delay, share, offset))


@pytest.mark.outside_long
@settings(max_examples=300, deadline=None, derandomize=True)
@given(**PLANT)
def test_against_the_differential_equation_many(relay_reference, duty, gain, tau, delay, share, offset):
    compare_first_order(relay_reference, *first_order(duty, gain, tau, delay, share, offset))


@settings(max_examples=150, deadline=None)
@given(**PLANT, factor=st.floats(1.0, 1.5))
def test_larger_differential_never_switches_faster(duty, gain, tau, delay, share, offset, factor):
    plant, high, low = first_order(duty, gain, tau, delay, share, offset)
    wider = plant.limit_cycle(offset * gain + factor * gain * share / 2, offset * gain - factor * gain * share / 2)
    assert wider.period >= plant.limit_cycle(high, low).period * (1 - 1e-12)


@pytest.mark.parametrize(("ratio", "band"), [(0.05, 0.10), (0.3, 0.10), (1.0, 0.30)])
@pytest.mark.parametrize("x", [0.35, 0.5, 0.65])
def test_parabola_is_near(ratio, band, x):
    """N = 4 Nmax x(1 - x), published approximation of thermostat cycling: a sanity band for the middle duties only."""
    fastest = SelfRegulating(50, 50, 600, 600 * ratio).limit_cycle(0.5, -0.5).starts_per_hour
    here = SelfRegulating(100 * (1 - x), 100 * x, 600, 600 * ratio).limit_cycle(0.5, -0.5).starts_per_hour
    assert here == pytest.approx(4 * fastest * x * (1 - x), rel=band)


def test_slow_plant_is_an_integrating_one():
    """A time constant of 1e7 s around the setpoint: speeds rise/tau and fall/tau."""
    slow = SelfRegulating(2e6, 1e6, 1e7, 5).limit_cycle(1, -1)
    plain = Integrating(0.2, 0.1, 5).limit_cycle(1, -1)
    assert (slow.t_on, slow.t_off, slow.swing) == pytest.approx((plain.t_on, plain.t_off, plain.swing), rel=1e-5)


@pytest.mark.parametrize(
    ("arguments", "says"),
    [
        ((65.5, 20, 600, 30, 66, 64), "full output settles at 65.5"),
        ((66, 20, 600, 30, 66, 64), "full output settles at 66"),
        ((160, 64, 600, 30, 66, 64), "without output"),
        ((160, 20, 600, 0, 65, 65), "nothing keeps"),
    ],
)
def test_no_cycle(arguments, says):
    with pytest.raises(NoCycle, match=says):
        relay_cycle(*arguments)


@pytest.mark.parametrize("arguments", [(0, 0.1, 5, 1, -1), (0.2, -0.1, 5, 1, -1), (0.2, 0.1, 0, 0, 0)])
def test_no_integrating_cycle(arguments):
    with pytest.raises(NoCycle):
        integrating_cycle(*arguments)


def test_starts_and_duty_of_a_cycle():
    cycle = integrating_cycle(0.2, 0.1, 5, 1, -1)
    assert cycle.starts_per_hour == pytest.approx(3600 / 52.5)
    assert cycle.duty == pytest.approx(1 / 3)
    assert cycle.measured_swing == cycle.swing
