"""Life of contacts: hand calculation on two points, and properties."""

from math import inf, log, log2

import pytest
from hypothesis import given
from hypothesis import strategies as st

from specgen.core.quantity import Quantity
from specgen.model.devices import LifePoint
from specgen.sizing.candidate import Unsized
from specgen.sizing.contact_life import life_at, life_figure, years_of_life


def point(current, operations):
    return LifePoint(current=Quantity(current), operations=Quantity(operations))


TWO = (point(25.0, 1.0e6), point(12.5, 3.0e6))


def test_at_a_point_its_own_value():
    assert life_at(25.0, TWO, 1e7) == pytest.approx(1.0e6, rel=1e-12)
    assert life_at(12.5, TWO, 1e7) == pytest.approx(3.0e6, rel=1e-12)


def test_between_two_points_a_straight_line_on_log_log_paper():
    """Three times for each halving is the power -log2(3); half way down in the logarithm is sqrt(3) times."""
    between = 25.0 / 2**0.5
    assert life_at(between, TWO, 1e7) == pytest.approx(1.0e6 * 3**0.5, rel=1e-12)
    assert life_at(20.0, TWO, 1e7) == pytest.approx(1.0e6 * (20 / 25) ** -log2(3), rel=1e-12)


def test_below_the_lowest_point_nothing_is_gained():
    assert life_at(0.1, TWO, 1e7) == 3.0e6
    assert life_at(0.0, TWO, 1e7) == 3.0e6


def test_above_the_highest_point_nothing_is_known():
    found = life_at(25.1, TWO, 1e7)
    assert isinstance(found, Unsized)
    assert "25.1 A is above 25 A" in found.because


def test_never_more_than_mechanical():
    assert life_at(12.5, TWO, 2e6) == 2e6


def test_no_points():
    assert isinstance(life_at(1.0, (), 1e7), Unsized)
    with pytest.raises(ValueError, match="current"):
        life_at(-1.0, TWO, 1e7)


def test_figure_can_be_recalculated_from_what_it_names():
    figure = life_figure("a contactor", 20.0, TWO, 1e7)
    put = {name: value for name, (value, _) in figure.with_.items()}
    again = min(put["N_mech"], put["N_1"] * (put["I"] / put["I_1"]) ** (log(put["N_2"] / put["N_1"]) / log(put["I_2"] / put["I_1"])))
    assert figure.value == pytest.approx(again, rel=1e-12)
    assert figure.dimension == "operations"
    assert life_figure("a contactor", 1.0, TWO, 1e7).formula == "min(N_mech, N_1)"


def test_years():
    """20 s cycles all year are 1 576 800 operations (365 x 86400/20): 1.3 million last 0.824 years."""
    assert years_of_life(1_300_000, 365 * 86400 / 20) == pytest.approx(0.824, abs=5e-4)
    assert years_of_life(None, 1e6) == inf
    assert years_of_life(1e6, 0.0) == inf
    with pytest.raises(ValueError, match="operations"):
        years_of_life(1e6, -1.0)


steps = st.floats(1.05, 5.0)


@st.composite
def falling_points(draw):
    current, operations = draw(st.floats(0.1, 5.0)), draw(st.floats(1e5, 1e7))
    points = [point(current, operations)]
    for _ in range(draw(st.integers(0, 4))):
        current, operations = current * draw(steps), operations / draw(steps)
        points.append(point(current, operations))
    return tuple(points)


@given(falling_points(), st.floats(0, 1), st.floats(0, 1), st.floats(1e4, 1e8))
def test_more_current_never_lasts_longer(points, a, b, mechanical):
    top = float(points[-1].current)
    low, high = sorted((a * top, b * top))
    at_low, at_high = life_at(low, points, mechanical), life_at(high, points, mechanical)
    assert at_low >= at_high * (1 - 1e-12)
    assert at_low <= mechanical
    assert at_high >= min(*(float(p.operations) for p in points), mechanical)


@given(falling_points(), st.floats(0, 1), st.randoms())
def test_order_of_the_points_does_not_matter(points, share, random):
    shuffled = list(points)
    random.shuffle(shuffled)
    current = share * float(points[-1].current)
    assert life_at(current, shuffled, 1e9) == life_at(current, points, 1e9)
