"""Predictions of on-off by hand, and the differentials between which it may be set."""

from math import inf

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from specgen.process.differential import least_differential, widest_differential
from specgen.process.on_off import predict_on_off, switch_points


def tank(make, **changes):
    """A balance without loss: k' = 0.1 K/s, duty 0.3 to 0.7, 10 s of dead time."""
    given = {
        "strength": (1000, 1000), "ambient": None, "setpoint": (0, 0), "load": (300, 700), "loss": (0, 0), "capacity": (10e3, 10e3),
        "dead_time": (10, 10),
    }  # fmt: skip
    return make.box(**{**given, **changes})


def test_prediction_by_hand(make):
    """Speeds 0.07 up and 0.03 down at low load, the reverse at high load; d = 1 K, theta = 10 s."""
    found = predict_on_off(tank(make), 1.0)
    assert found.above.value == pytest.approx(0.5 + 0.07 * 10)
    assert found.below.value == pytest.approx(0.5 + 0.07 * 10)
    assert found.swing.value == pytest.approx(1 + 0.1 * 10)
    assert found.period == pytest.approx(4 * (10 + 1 / 0.1))
    assert found.starts_per_hour.value == pytest.approx(3600 / 80)
    assert found.shortest_on.value == pytest.approx((1 + 0.1 * 10) / 0.07)
    assert found.shortest_off.value == pytest.approx((1 + 0.1 * 10) / 0.07)
    assert (found.switch_off, found.switch_on) == (0.5, -0.5)
    assert found.above.case == {"load": 300}


def test_sides_of_a_cooler(make):
    """More output lowers the value: what is below the setpoint is where full output carries it."""
    found = predict_on_off(tank(make, sign=-1, load=(300, 300)), 1.0, "below")
    assert (found.switch_off, found.switch_on) == (-1.0, 0.0)
    assert found.below.value == pytest.approx(1 + 0.07 * 10)
    assert found.above.value == pytest.approx(0.03 * 10)


@pytest.mark.parametrize(
    ("placement", "sign", "points"),
    [
        ("centred", 1, (1.0, -1.0)), ("centred", -1, (1.0, -1.0)), ("below", 1, (0.0, -2.0)), ("above", 1, (2.0, 0.0)),
        ("below", -1, (2.0, 0.0)), ("above", -1, (0.0, -2.0)),
    ],
)  # fmt: skip
def test_switch_points(placement, sign, points):
    assert switch_points(2.0, placement, sign) == points


def test_least_times_are_enforced_and_natural_ones_kept(make):
    """60 s of least run at 0.07 K/s carry the value 4.2 K from the trough at -0.5 - 0.3."""
    found = predict_on_off(tank(make, load=(300, 300)), 1.0, min_run=60)
    assert found.above.value == pytest.approx(-0.8 + 4.2)
    assert found.shortest_on.value == pytest.approx(2 / 0.07)
    assert found.period == pytest.approx(60 / 0.3)


def test_least_differential_by_hand(make):
    """Period 4 (theta + d/k'): 10 an hour ask for 8 K, 20 an hour for 3.5 K; on time (d + 1)/0.07: 60 s ask for 3.2 K."""
    found = least_differential(tank(make), switchings_per_hour=10, starts_per_hour=20)
    assert found == {"life": pytest.approx(8.0, rel=1e-3), "starts": pytest.approx(3.5, rel=1e-3)}
    timed = least_differential(tank(make), min_run=60, min_rest=100)
    assert timed == {"run": pytest.approx(3.2, rel=1e-3), "rest": pytest.approx(6.0, rel=1e-3)}


def test_least_times_help_the_starts(make):
    """100 s on and 100 s off are 18 starts an hour at most, whatever the differential."""
    found = least_differential(tank(make), starts_per_hour=18.1, min_run=100, min_rest=100)
    assert found["starts"] < 1e-4


def test_no_differential_makes_a_fast_box_slow(make):
    """With 2 K between the ends, nothing is left to switch at the differential that four starts an hour would need."""
    box = make.box(
        strength=(20, 20), ambient=(-1, -1), setpoint=(0, 0), load=(0, 0), loss=(10, 10), capacity=(100, 100), dead_time=(1, 1)
    )
    found = least_differential(box, switchings_per_hour=4)
    assert found["life"] == inf or predict_on_off(box, found["life"]).starts_per_hour.value <= 4 * 1.001


def test_widest_differential_by_hand(make):
    """d/2 + 0.07 x 10 on each side: 2 K allow 2.6 K, and the narrower side decides."""
    assert widest_differential(tank(make), 2.0, 2.0) == pytest.approx(2.6, rel=1e-3)
    assert widest_differential(tank(make), 2.0, 1.5) == pytest.approx(1.6, rel=1e-3)
    assert widest_differential(tank(make), 5.0, 2.0, "below") == pytest.approx(1.3, rel=1e-3)


def test_widest_differential_where_nothing_fits(make):
    assert widest_differential(tank(make), 0.6, 2.0) == 0
    assert widest_differential(tank(make), -0.1, 2.0) == 0


def test_widest_differential_where_the_least_run_spoils_the_narrow_ones(make):
    """Speeds 0.07 up and 0.03 down, theta = 10 s, 60 s of least run: 4.2 K a run.

    Narrow: the run starts at -d/2 - 0.3 and ends at 3.9 - d/2, past 3 K below d = 1.8 K. Wide: the peak is d/2 + 0.7, 3 K at d = 4.6 K.
    """
    assert widest_differential(tank(make, load=(300, 300)), 3.0, 3.0, min_run=60.0) == pytest.approx(4.6, rel=1e-3)
    assert widest_differential(tank(make, load=(300, 300)), 2.0, 3.0, min_run=60.0) == 0


def test_widest_differential_is_what_still_switches(make):
    """Full output ends 3 K above, none 3 K below: at most 6 K lie between points that are passed, though 10 K are allowed."""
    box = make.box(
        strength=(60, 60), ambient=(-3, -3), setpoint=(0, 0), load=(0, 0), loss=(10, 10), capacity=(1000, 1000), dead_time=(1, 1)
    )
    assert widest_differential(box, 10, 10) == pytest.approx(6.0, rel=2e-3)


BOXES = {
    "gain": st.floats(50, 300),
    "warm": st.floats(5, 40),
    "spread": st.floats(0, 30),
    "tau": st.floats(100, 3000),
    "delay": st.floats(0.01, 0.3),
    "lag": st.one_of(st.just(0.0), st.floats(0.02, 0.3)),
    "limit": st.floats(2, 60),
}


@settings(max_examples=25, deadline=None)
@given(**BOXES)
def test_the_least_is_the_least(make, gain, warm, spread, tau, delay, lag, limit):
    """At the least differential the limit holds in the worst case, and a hundredth below it does not."""
    theta = tau * delay
    box = make.box(
        strength=(gain, gain), ambient=(50 - warm, 50 - warm - spread), setpoint=(50, 50), load=(0, 0), loss=(1, 1), capacity=(tau, tau),
        dead_time=(theta, theta), lag=(lag * tau, lag * tau), supply=(0.9, 1.1),
    )  # fmt: skip
    least = least_differential(box, switchings_per_hour=limit)["life"]
    if least == inf:
        return
    assert predict_on_off(box, least).starts_per_hour.value <= limit * 1.001
    if least > 0.01:
        assert predict_on_off(box, least * 0.99).starts_per_hour.value > limit


@settings(max_examples=25, deadline=None)
@given(**BOXES)
def test_the_widest_is_the_widest(make, gain, warm, spread, tau, delay, lag, limit):
    theta = tau * delay
    box = make.box(
        strength=(gain, gain), ambient=(50 - warm, 50 - warm - spread), setpoint=(50, 50), load=(0, 0), loss=(1, 1), capacity=(tau, tau),
        dead_time=(theta, theta), lag=(lag * tau, lag * tau), supply=(0.9, 1.1),
    )  # fmt: skip
    allowed = limit * 2
    widest = widest_differential(box, allowed, allowed)
    if widest == 0:
        least = predict_on_off(box, 1e-3)
        assert max(least.above.value, least.below.value) > allowed * 0.99
        return
    found = predict_on_off(box, widest)
    assert max(found.above.value, found.below.value) <= allowed * 1.001
    if widest < 1.98 * allowed:
        try:
            wider = predict_on_off(box, widest * 1.01)
        except ValueError:
            return  # nothing switches further apart
        assert max(wider.above.value, wider.below.value) > allowed
