"""The drop against complex arithmetic: sending less receiving voltage."""

from cmath import phase, rect
from math import atan2, pi, radians, sqrt

import pytest
from hypothesis import given
from hypothesis import strategies as st

from specgen.sizing.voltage_drop import voltage_drop


@given(
    current=st.floats(1, 200), length=st.floats(1, 60), area=st.sampled_from([4.0, 10.0, 35.0, 120.0]), degrees=st.floats(0, 60),
    three=st.booleans(),
)  # fmt: skip
def test_against_phasors(current, length, area, degrees, three):
    """The approximation of annex G leaves out the part across the voltage: second order in the drop."""
    r, x, voltage = 0.0225 / area, 0.08e-3, 400.0
    # one conductor to neutral of a star; both conductors of a single-phase circuit
    across, ways = (voltage / sqrt(3), 1) if three else (voltage, 2)
    drop = ways * complex(r, x) * length * rect(current, -radians(degrees))
    exact = abs(across) - abs(across - drop)
    share = voltage_drop(current, voltage, length, r, x, three_phase=three, angle=radians(degrees))
    assert share * across == pytest.approx(exact, abs=abs(drop) ** 2 / across)


@given(r=st.floats(1e-4, 2e-2), degrees=st.floats(0, 90))
def test_the_worst_angle_is_worst(r, degrees):
    known = voltage_drop(10.0, 230.0, 20.0, r, 0.08e-3, three_phase=False, angle=radians(degrees))
    worst = voltage_drop(10.0, 230.0, 20.0, r, 0.08e-3, three_phase=False, angle=None)
    assert known <= worst * (1 + 1e-12)
    at = voltage_drop(10.0, 230.0, 20.0, r, 0.08e-3, three_phase=False, angle=atan2(0.08e-3, r))
    assert at == pytest.approx(worst)
    assert phase(complex(r, 0.08e-3)) <= pi / 2
