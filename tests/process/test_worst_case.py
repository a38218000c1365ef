"""The worst case of a box is never beaten by a case inside it."""

from random import Random

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from specgen.process.box import Point
from specgen.process.limit_cycle import NoCycle
from specgen.process.on_off import predict_on_off, switch_points
from specgen.process.time_proportioned import predict_ripple
from specgen.process.worst_case import worst

BEATEN = 1 + 1e-3


def drawn_box(make, random):
    """Draw a box of any form with any of its axes ranging."""

    def span(low, high, fixed=0.4):
        a, b = sorted((random.uniform(low, high), random.uniform(low, high)))
        return (a, a) if random.random() < fixed else (a, b)

    supply = (0.9, 1.1) if random.random() < 0.6 else (1, 1)
    theta = span(1, 120)
    lags = {
        "lag": span(5, 120) if random.random() < 0.4 else (0, 0),
        "sensor_lag": span(2, 60) if random.random() < 0.4 else (0, 0),
    }
    if random.random() < 0.25:
        box = make.box(
            strength=span(0.02, 0.06), ambient=None, setpoint=(0, 0), load=span(0.005, 0.03), loss=(0, 0), capacity=(1, 1),
            dead_time=theta, supply=supply, rates=True, **lags,
        )  # fmt: skip
        return box, random.uniform(0.2, 3)
    warm, cold = sorted((random.uniform(0, 40), random.uniform(0, 40)), reverse=True)
    low, high = span(30, 90, 0.3)
    box = make.box(
        strength=span(6000, 14000), ambient=(warm, cold), setpoint=(low, high), load=span(-500, 3000), loss=span(20, 140),
        capacity=span(20e3, 300e3), dead_time=theta, supply=supply, sign=random.choice((1, 1, -1)) if low == high else 1, **lags,
    )  # fmt: skip
    if box.sign < 0:
        # a cooler in surroundings warmer than its setpoint
        box = make.box(
            strength=span(6000, 14000), ambient=(low + 2, low + 30), setpoint=(low, low), load=span(0, 1500), loss=span(20, 140),
            capacity=span(20e3, 300e3), dead_time=theta, supply=(1, 1), sign=-1, **lags,
        )  # fmt: skip
    return box, random.uniform(0.2, 6)


def check_on_off(make, seed, cases):
    random = Random(seed)  # noqa: S311 - drawing cases, not secrets
    box, differential = drawn_box(make, random)
    placement = random.choice(("centred", "below", "above"))
    run, rest = (random.choice((0.0, random.uniform(20, 300))) for _ in range(2))
    try:
        found = predict_on_off(box, differential, placement, run, rest)
    except NoCycle:
        found = None
    high, low = switch_points(differential, placement, box.sign)
    for _ in range(cases):
        point = Point(*(random.choice((0.0, 1.0, random.random(), random.random())) for _ in Point._fields))
        plant = box.plant_at(point)
        try:
            cycle, free = plant.limit_cycle(high, low, run, rest), plant.limit_cycle(high, low)
        except NoCycle:
            continue
        assert found is not None, (seed, point)
        above, below = (cycle.peak, -cycle.trough) if box.sign > 0 else (-cycle.trough, cycle.peak)
        assert above <= max(found.above.value, 0) * BEATEN + 1e-9, (seed, point, "above")
        assert below <= max(found.below.value, 0) * BEATEN + 1e-9, (seed, point, "below")
        assert cycle.swing <= found.swing.value * BEATEN, (seed, point, "swing")
        assert cycle.starts_per_hour <= found.starts_per_hour.value * BEATEN, (seed, point, "starts")
        assert free.t_on >= found.shortest_on.value / BEATEN, (seed, point, "on")
        assert free.t_off >= found.shortest_off.value / BEATEN, (seed, point, "off")


def check_ripple(make, seed, cases):
    random = Random(seed)  # noqa: S311 - drawing cases, not secrets
    box, _ = drawn_box(make, random)
    cycle_time = random.uniform(1, 300)
    try:
        found = predict_ripple(box, cycle_time)
    except NoCycle:
        found = None
    for _ in range(cases):
        point = Point(*(random.choice((0.0, 1.0, random.random(), random.random())) for _ in Point._fields))
        plant = box.plant_at(point)
        if not 0 < plant.duty < 1:
            continue
        assert found is not None, (seed, point)
        ripple = plant.ripple(cycle_time)
        above, below = (ripple.above, ripple.below) if box.sign > 0 else (ripple.below, ripple.above)
        assert above <= found.above.value * BEATEN, (seed, point, "above")
        assert below <= found.below.value * BEATEN, (seed, point, "below")
        assert ripple.swing <= found.swing.value * BEATEN, (seed, point, "swing")
        assert ripple.t_on >= found.shortest_on.value / BEATEN - 1e-6 * cycle_time, (seed, point, "on")
        assert ripple.t_off >= found.shortest_off.value / BEATEN - 1e-6 * cycle_time, (seed, point, "off")


@settings(max_examples=40, deadline=None)
@given(seed=st.integers(0, 10**9))
def test_no_case_beats_on_off(make, seed):
    check_on_off(make, seed, 20)


@settings(max_examples=40, deadline=None)
@given(seed=st.integers(0, 10**9))
def test_no_case_beats_the_ripple(make, seed):
    check_ripple(make, seed, 20)


@pytest.mark.outside_long
@pytest.mark.parametrize("first", range(0, 2000, 200))
def test_no_case_beats_on_off_many(make, first):
    for seed in range(first, first + 200):
        check_on_off(make, seed, 30)


@pytest.mark.outside_long
@pytest.mark.parametrize("first", range(0, 2000, 200))
def test_no_case_beats_the_ripple_many(make, first):
    for seed in range(first, first + 200):
        check_ripple(make, seed, 30)


def half_load_box(make):
    """A cooler that both ends of its load switch rarely: duty 0.2 to 0.8 of 7 kW, no loss, 1.1 K between the points."""
    return make.box(
        strength=(7000, 7000), ambient=None, setpoint=(0, 0), load=(1400, 5600), loss=(0, 0), capacity=(60e3, 60e3), dead_time=(10, 10)
    )


def test_fastest_at_half_load(make):
    """N = 3600 x(1 - x)/(theta + d/k'), exact for an integrating plant; k' = 7/60 K/s."""
    found = predict_on_off(half_load_box(make), 1.1)
    through = 10 + 1.1 * 60 / 7
    assert found.starts_per_hour.value == pytest.approx(3600 * 0.25 / through, rel=1e-3)
    assert found.starts_per_hour.plant.duty == pytest.approx(0.5, abs=0.02)
    at_ends = 3600 * 0.16 / through
    assert found.starts_per_hour.value > 1.5 * at_ends


def test_what_rests_is_cut_off_and_not_lost(make):
    """Load from none to half: the last case that still falls back has no drop to speak of, so its peak is that of full speed."""
    box = make.box(
        strength=(1000, 1000), ambient=None, setpoint=(0, 0), load=(-200, 500), loss=(0, 0), capacity=(10e3, 10e3), dead_time=(10, 10)
    )
    found = predict_on_off(box, 1.0)
    assert found.above.value == pytest.approx(0.5 + 0.1 * 10, rel=1e-3)
    assert found.shortest_on.value == pytest.approx(10 + 1.0 / 0.1, rel=1e-3)


def test_nothing_switches(make):
    box = make.box(
        strength=(1000, 1000), ambient=(20, 20), setpoint=(80, 80), load=(0, 0), loss=(20, 20), capacity=(10e3, 10e3), dead_time=(10, 10)
    )
    with pytest.raises(NoCycle, match="full output settles"):
        predict_on_off(box, 1.0)


def test_any_figure_over_every_corner(make):
    """Without known ends every corner is tried: the slowest period has the largest dead time."""
    box = make.box(
        strength=(1000, 1000), ambient=None, setpoint=(0, 0), load=(500, 500), loss=(0, 0), capacity=(10e3, 20e3), dead_time=(10, 30)
    )
    found = worst(box, lambda plant: plant.limit_cycle(0.5, -0.5).period, "largest", high=0.5, low=-0.5)
    # P = 4 (theta + d C/P) at half load
    assert found.value == pytest.approx(4 * (30 + 20))
    assert found.case == {"capacity": 20e3, "dead_time": 30}
    assert "dead_time 30" in found.text.replace("\u202f", " ")
