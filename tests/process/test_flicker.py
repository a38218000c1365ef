"""Flicker against the tabulated curve, the standard's formula, and heaters worked out from both."""

from math import inf, sqrt

import pytest
from hypothesis import given
from hypothesis import strategies as st

from specgen.catalogue.load import load_catalogue
from specgen.process.flicker import allowed_change, severity, severity_analytic, shortest_cycle, voltage_change

CURVE = tuple((float(point.value.rate), float(point.value.change)) for point in load_catalogue().flicker)

# heaters on 230 V over 0.4 ohm: power, current, change in percent, shortest cycle for Pst 1 and for Plt 0.65 by the curve, and
# the same by the formula; computed apart from the program: I = P/230, d = 100 I 0.4/230, straight in logarithms
HEATERS = [
    (1000, 4.348, 0.756, 1.3, 8.5, 1.9, 7.5),
    (2000, 8.696, 1.512, 19.0, 71.1, 17.3, 68.6),
    (3000, 13.043, 2.268, 65.3, 283.3, 63.3, 251.0),
]


@pytest.mark.parametrize(("power", "current", "percent", "at_1", "at_065", "formula_1", "formula_065"), HEATERS)
def test_heaters(power, current, percent, at_1, at_065, formula_1, formula_065):
    change = voltage_change(power / 230, 0.4, 230)
    assert power / 230 == pytest.approx(current, abs=5e-4)
    assert 100 * change == pytest.approx(percent, abs=5e-4)
    assert shortest_cycle(change, 1.0, CURVE) == pytest.approx(at_1, abs=0.051)
    assert shortest_cycle(change, 0.65, CURVE) == pytest.approx(at_065, abs=0.051)
    assert severity_analytic(change, formula_1) == pytest.approx(1.0, rel=0.02)
    assert severity_analytic(change, formula_065) == pytest.approx(0.65, rel=0.02)


@pytest.mark.parametrize(("rate", "percent"), [(0.1, 7.4), (1, 2.724), (10, 1.29), (39, 0.906), (110, 0.725), (1020, 0.28), (2875, 1.04)])
def test_the_tabulated_points_come_back(rate, percent):
    """IEC 61000-3-3 figure 2 as tabulated; a change there is just irritating, half of it half as severe."""
    assert allowed_change(rate, CURVE) == pytest.approx(percent / 100)
    assert severity(percent / 100, 120 / rate, CURVE) == pytest.approx(1.0)
    assert severity(percent / 200, 120 / rate, CURVE) == pytest.approx(0.5)


@pytest.mark.parametrize(("rate", "found"), [(1, 0.98), (10, 0.96), (39, 1.03), (110, 1.14)])
def test_the_formula_against_the_curve(rate, found):
    """The formula on the curve's points, as computed apart from the program."""
    assert severity_analytic(allowed_change(rate, CURVE), 120 / rate) == pytest.approx(found, abs=0.01)


def test_the_curve_is_straight_in_logarithms_between_points():
    """Half way between 1 and 2 a minute in logarithms lies the geometric mean of both changes."""
    assert allowed_change(sqrt(2), CURVE) == pytest.approx(sqrt(0.02724 * 0.02211))


def test_beyond_the_ends_of_the_curve_nothing_more_is_allowed():
    assert allowed_change(0.01, CURVE) == CURVE[0][1]
    assert allowed_change(5000, CURVE) == CURVE[-1][1]


def test_what_is_rarer_than_once_an_hour_has_no_severity():
    assert severity(0.03, 7300, CURVE) == 0
    assert severity(0.03, 7100, CURVE) > 0


def test_a_change_that_no_rate_makes_visible_and_one_that_every_rate_does():
    assert shortest_cycle(0.0028 * 0.65, 0.65, CURVE) == 0
    assert shortest_cycle(0.075 * 0.65, 0.65, CURVE) == inf


@given(st.floats(0.0019, 0.048), st.floats(1, 50))
def test_every_longer_cycle_keeps_the_limit(change, longer):
    cycle = shortest_cycle(change, 0.65, CURVE)
    assert severity(change, cycle * longer, CURVE) <= 0.65 * (1 + 1e-9)
    assert severity(change, cycle * 0.98, CURVE) > 0.65 * (1 - 1e-9)


@pytest.mark.parametrize("given_", [(-1, 0.4, 230), (1, -0.4, 230), (1, 0.4, 0)])
def test_what_is_no_circuit_is_refused(given_):
    with pytest.raises(ValueError, match="zero"):
        voltage_change(*given_)
