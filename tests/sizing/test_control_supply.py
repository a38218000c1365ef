"""Load of the control supply, added up by hand."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from specgen.core.quantity import Quantity
from specgen.model.panel import ControlSupply
from specgen.sizing.control_supply import Taken, control_load

SUPPLY = ControlSupply(capacity=Quantity(5.0, "5 A"))


def test_sums_and_reserve():
    """0.167 + 0.25 + 0.4 = 0.817 A; at switch-on 0.167 + 1.5 + 0.4 = 2.067 A, and a fifth more: 2.48 A."""
    found = control_load(SUPPLY, [Taken("coil", 0.167, 0.167), Taken("valve", 0.25, 1.5), Taken("controllers", 0.4, 0.0)])
    assert found.continuous == pytest.approx(0.817)
    assert found.inrush == pytest.approx(2.067)
    assert found.needed == pytest.approx(2.4804)
    assert found.capacity == 5.0
    assert [figure.value for figure in found.figures] == [found.continuous, found.inrush, found.needed]


def test_nothing_takes_nothing():
    assert control_load(SUPPLY, []).needed == 0.0


AMPERES = st.floats(0, 20)


@given(st.lists(st.tuples(AMPERES, AMPERES), max_size=6), AMPERES, AMPERES)
def test_one_more_taker_never_needs_less(pairs, hold, inrush):
    before = control_load(SUPPLY, [Taken("", *pair) for pair in pairs])
    after = control_load(SUPPLY, [*before.taken, Taken("", hold, inrush)])
    assert after.needed >= before.needed
    assert after.inrush >= after.continuous - 1e-9
