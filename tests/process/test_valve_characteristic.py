"""Characteristics against tables computed by hand from the formulas of IEC 60534-2-4 and of authority."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from specgen.process.valve_characteristic import inherent, installed, installed_gain, opening, steepest_gain

TRAVEL = [0, 0.1, 0.25, 0.5, 0.75, 0.9, 1]
authorities = st.floats(0.02, 1)
travels = st.floats(0.01, 1)
forms = st.sampled_from(["linear", "equal_percentage"])
spans = st.floats(5, 100)


@pytest.mark.parametrize(
    ("rangeability", "phi"),
    [(50, [0.0200, 0.0296, 0.0532, 0.1414, 0.3761, 0.6762, 1]), (30, [0.0333, 0.0468, 0.0780, 0.1826, 0.4273, 0.7117, 1])],
)
def test_equal_percentage(rangeability, phi):
    assert [inherent(h, "equal_percentage", rangeability) for h in TRAVEL] == pytest.approx(phi, abs=6e-5)


@pytest.mark.parametrize(
    ("authority", "flow"),
    [
        (1.0, [0.0200, 0.0532, 0.1414, 0.3761, 1]),
        (0.5, [0.0283, 0.0751, 0.1980, 0.4978, 1]),
        (0.3, [0.0365, 0.0968, 0.2524, 0.5954, 1]),
        (0.1, [0.0631, 0.1661, 0.4117, 0.7888, 1]),
    ],
)
def test_installed_equal_percentage(authority, flow):
    assert [installed(h, authority, "equal_percentage") for h in (0, 0.25, 0.5, 0.75, 1)] == pytest.approx(flow, abs=6e-5)


@pytest.mark.parametrize(("authority", "flow"), [(0.5, [0.3430, 0.6325, 0.8485, 1]), (0.1, [0.6325, 0.8771, 0.9632, 1])])
def test_installed_linear(authority, flow):
    assert [installed(h, authority, "linear") for h in (0.25, 0.5, 0.75, 1)] == pytest.approx(flow, abs=6e-5)


@given(travels, authorities, forms, spans)
def test_opening_undoes_installed(travel, authority, form, rangeability):
    flow = installed(travel, authority, form, rangeability)
    assert opening(flow, authority, form, rangeability) == pytest.approx(travel, abs=1e-6)


@given(st.floats(0.05, 0.95), authorities, forms, spans)
def test_gain_is_the_slope(travel, authority, form, rangeability):
    h = 1e-6
    slope = (installed(travel + h, authority, form, rangeability) - installed(travel - h, authority, form, rangeability)) / (2 * h)
    assert installed_gain(travel, authority, form, rangeability) == pytest.approx(slope, rel=1e-4, abs=1e-8)


@given(st.floats(0, 0.9), st.floats(0.01, 1), authorities, forms, spans)
def test_steepest_is_steeper_than_anywhere(low, width, authority, form, rangeability):
    high = min(1.0, low + width)
    gain, travel = steepest_gain(low, high, authority, form, rangeability)
    assert low <= travel <= high
    everywhere = max(installed_gain(float(h), authority, form, rangeability) for h in np.linspace(low, high, 60))
    assert gain >= everywhere * (1 - 1e-9)
    assert gain == installed_gain(travel, authority, form, rangeability)


def test_steepest_by_hand():
    """N 0.5: phi^2 = 1/2, gain = N ln R phi/((1 - N)/2 + N)^1.5 = 0.5 3.912 0.7071/0.75^1.5; linear at N 0.25 from h 0: 1/sqrt N."""
    assert steepest_gain(0, 1, 0.5, "equal_percentage")[0] == pytest.approx(0.5 * 3.91202 * 0.707107 / 0.649519, rel=1e-5)
    assert steepest_gain(0, 1, 0.25, "linear") == pytest.approx((2.0, 0.0))
    # full authority: ln 50 at full travel
    assert steepest_gain(0.2, 0.9, 1.0, "equal_percentage") == pytest.approx((3.91202 * 50**-0.1, 0.9), rel=1e-5)


def test_a_valve_too_small_opens_beyond_its_travel():
    """Kv 1.2 of Kvs 1 with constant pressure drop: h = 1 + ln 1.2/ln 50; Kv 0.01 lies below the least: h < 0."""
    assert opening(1.2, 1.0, "equal_percentage") == pytest.approx(1.0466, abs=1e-4)
    assert opening(0.01, 1.0, "equal_percentage") < 0
    assert opening(1.2, 1.0, "linear") == pytest.approx(1.2)


@pytest.mark.parametrize(
    ("call", "why"),
    [
        pytest.param(lambda: inherent(1.2, "linear"), "travel", id="travel"),
        pytest.param(lambda: inherent(0.5, "equal_percentage", 1), "rangeability", id="rangeability"),
        pytest.param(lambda: installed(0.5, 0, "linear"), "authority", id="no authority"),
        pytest.param(lambda: installed(0.5, 1.1, "linear"), "authority", id="too much authority"),
        pytest.param(lambda: opening(0, 0.5, "linear"), "no travel", id="no flow"),
        pytest.param(lambda: opening(1.5, 0.5, "linear"), "no travel", id="pipes hold it back"),
        pytest.param(lambda: steepest_gain(0.6, 0.4, 0.5, "linear"), "lower one first", id="order"),
    ],
)
def test_what_no_valve_has_is_refused(call, why):
    with pytest.raises(ValueError, match=why):
        call()
