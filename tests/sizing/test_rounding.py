"""Settings on the steps in which they can be entered."""

from math import inf, isclose, sqrt

import pytest
from hypothesis import given
from hypothesis import strategies as st

from specgen.sizing.rounding import chosen_differential, down_in_series, up_in_series, up_to_step

SERIES = (1, 2, 3, 5, 8, 10, 15, 20, 30, 45, 60, 90, 120, 180, 240, 300)
sizes = st.floats(0.001, 50)
steps = st.sampled_from([0.01, 0.1, 0.5, 1000.0])


@pytest.mark.parametrize(
    ("least", "most", "step", "even", "taken"),
    [
        (1.0, 4.0, 0.1, True, 2.0),  # sqrt 4
        (0.21, 0.99, 0.1, True, 0.4),  # sqrt(0.2079) = 0.456, on even steps of 0.2
        (0.21, 0.99, 0.1, False, 0.5),  # the same on steps of 0.1
        (0.41, 0.45, 0.1, True, 0.6),  # nothing that can be entered lies between the two: the least, up
        (0.25, 0.35, 0.1, True, 0.3),  # no even number lies between the two, a single step does
        (2.0, 1.0, 0.1, True, 2.0),  # a conflict: the least
        (1.93, 1.0, 0.1, True, 2.0),  # the least of a conflict, up to what can be entered
        (0.7, inf, 0.1, True, 0.8),  # nothing bounds it above
        (1.0, 0.0, 0.1, True, 1.0),  # no differential is narrow enough for the product
        (20000.0, 80000.0, 1000.0, True, 40000.0),  # pressure in Pa, steps of 0.01 bar
    ],
)
def test_geometric_mean_on_the_step(least, most, step, even, taken):
    assert chosen_differential(least, most, step, even=even) == pytest.approx(taken)


@given(sizes, sizes, steps, st.booleans())
def test_never_outside_where_a_step_lies_between(least, most, step, even):
    taken = chosen_differential(least, most, step, even=even)
    unit = 2 * step if even else step
    assert isclose(taken / step, round(taken / step), abs_tol=1e-6)
    first = up_to_step(least, unit)
    if least <= most and first <= most:
        assert least * (1 - 1e-6) <= taken <= most * (1 + 1e-6)
        assert abs(taken - sqrt(least * most)) <= unit * (0.5 + 1e-6) or taken in (pytest.approx(first), pytest.approx(most // unit * unit))
    elif least > most:
        assert taken == pytest.approx(first)


@given(sizes, steps)
def test_a_step_up_is_the_first_that_is_enough(value, step):
    taken = up_to_step(value, step)
    assert taken >= value * (1 - 1e-6)
    assert taken - step < value or taken == step


def test_the_house_series():
    assert down_in_series(59.999, SERIES) == 45
    assert down_in_series(60 * (1 - 1e-12), SERIES) == 60
    assert down_in_series(0.9, SERIES) is None
    assert up_in_series(60.001, SERIES) == 90
    assert up_in_series(60 * (1 + 1e-12), SERIES) == 60
    assert up_in_series(301, SERIES) is None
