"""What saves cycles gives what it stands for: multipliers of two modes, the first doubling, a figure that rises throughout."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from specgen.process.box import Point
from specgen.process.differential import _first_doubling
from specgen.process.follow import Relay, _of_two, _rows, _through
from specgen.process.periodic import modes_of
from specgen.process.worst_case import _golden

times = st.floats(1.0, 900.0)


@given(st.floats(100, 4000), st.floats(1, 90), st.floats(0, 60), times, times, st.booleans(), st.booleans())
def test_multipliers_of_two_modes_are_the_matrix_own(tau, lag, theta, on, off, run_fixed, rest_fixed):
    relay = Relay((), modes_of((tau, lag)), 0.6, 0.4, theta, 10.0, 10.0)
    a, b = theta + on, theta + off
    whole = _through(relay, a, b, None, fixed=rest_fixed) @ _through(relay, b, a, None, fixed=run_fixed)
    expected = np.abs(np.linalg.eigvals(whole)).max()
    # where two multipliers nearly meet, the root of their distance magnifies rounding
    assert _of_two(_rows(relay, b, a, fixed=run_fixed), _rows(relay, a, b, fixed=rest_fixed)) == pytest.approx(expected, rel=1e-6, abs=1e-7)


@given(st.floats(1e-6, 1e3), st.floats(1e-7, 1e6))
def test_the_first_doubling_is_that_of_stepping(start, limit):
    wide = start * 2
    while wide < limit:
        wide *= 2
    assert _first_doubling(lambda d: d - limit, start) == wide


class _Counted:
    """A figure of one axis, that counts how often it is asked."""

    def __init__(self, figure):
        self.figure, self.known = figure, {}

    def __call__(self, point):
        return self.known.setdefault(point, self.figure(point.load))


@given(st.floats(0.05, 0.999))
def test_a_top_inside_the_stretch_is_not_taken_for_its_end(top):
    judge = _Counted(lambda t: -((t - top) ** 2))
    assert _golden(judge, Point(), "load", 0.0, 1.0).load == pytest.approx(top, abs=2e-3)


def test_a_figure_that_rises_throughout_takes_five_looks():
    judge = _Counted(lambda t: t**3)
    assert _golden(judge, Point(), "load", 0.0, 1.0).load == 1.0
    assert len(judge.known) == 5
