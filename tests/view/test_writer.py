"""Numbers of a page: digits by tolerance, nothing rounded across a limit."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from specgen.core.quantity import Unit
from specgen.core.say import Phrasing
from specgen.view.writer import Writer, inward, outward, plain, step_for, upward, writer_for

CELSIUS = Phrasing(Unit("degC"), Unit("K"))
SIZES = st.floats(1e-6, 1e6)


@pytest.mark.parametrize(
    ("tolerance", "shown"),
    [(1.5, "65.0\u202f°C"), (0.2, "65.04\u202f°C"), (50, "65\u202f°C")],
)
def test_a_value_has_the_digits_that_a_tenth_of_its_tolerance_can_use(tolerance, shown):
    assert Writer(CELSIUS, step_for(tolerance)).value(65.04) == shown


def test_an_excursion_is_written_to_the_nearest_step():
    assert Writer(CELSIUS, 0.1).excursion(1.31, 1.5) == "1.3\u202fK"


def test_an_excursion_past_its_limit_is_never_rounded_back_to_it():
    """1.52 K against 1.5 K must not read 1.5 K of 1.5 K allowed."""
    assert Writer(CELSIUS, 0.1).excursion(1.52, 1.5) == "1.6\u202fK"
    assert Writer(CELSIUS, 0.1).excursion(1.58, 1.5) == "1.6\u202fK"


@given(change=st.floats(0.001, 100), limit=st.floats(0.001, 100))
def test_what_is_written_stands_on_the_same_side_of_the_limit(change, limit):
    writer = Writer(CELSIUS, step_for(limit))
    shown = float(writer.excursion_number(change, limit))
    assert abs(shown - change) <= writer.step * 1.001
    if change > limit:
        assert shown > limit * (1 - 1e-9)


@given(value=SIZES)
def test_rounding_goes_the_way_it_says(value):
    assert inward(value) <= value * (1 + 1e-9)
    assert upward(value) >= value * (1 - 1e-9)
    assert outward(value, 0.1) >= value * (1 - 1e-9)
    assert inward(value) == pytest.approx(value, rel=0.01)
    assert upward(value) == pytest.approx(value, rel=0.01)


def test_bounds_are_rounded_into_the_range():
    assert Writer(CELSIUS, 0.1).bounds(0.94691, 2.3486) == "0.947 to 2.34\u202fK"


def test_a_window_that_is_none_says_what_each_side_asks():
    assert Writer(CELSIUS, 0.1).bounds(3.001, 2.5) == "needs 3.01\u202fK, may be 2.5\u202fK at most"


@pytest.mark.parametrize(("apart", "shown"), [(0.7, "5.7\u202f°C"), (0.05, "5.05\u202f°C"), (0.125, "5.125\u202f°C")])
def test_a_switch_point_shows_every_decimal_of_half_the_differential(apart, shown):
    assert Writer(CELSIUS, 0.1).fine_value(5 + apart, apart) == shown


def test_a_small_ripple_is_still_told_from_the_setpoint():
    """0.0315 K below 79.3 keeps two digits of the distance."""
    assert Writer(CELSIUS, 0.1).near(79.2685, 0.0315) == "79.268\u202f°C" or Writer(CELSIUS, 0.1).near(79.2685, 0.0315) == "79.269\u202f°C"


def test_words_stand_a_whole_space_from_their_number():
    writer = Writer(CELSIUS, 0.1)
    from specgen.core.say import per_hour, share  # noqa: PLC0415  beside what they are for

    assert writer.sentence("{x} and {n}", {"x": share(0.5), "n": per_hour(6)}) == "50\u00a0percent and 6\u00a0an hour"


def test_shares_are_percent_signs_in_tables():
    assert Writer(CELSIUS, 0.1).say(0.125, "fraction") == "12.5\u202f%"


def test_american_pages_show_fahrenheit(loop):
    """149 degF is 65 degC; a difference of 1.5 K is 2.7 degF; the tolerance of 2.7 gives one decimal."""
    writer = writer_for(loop("TIC-2"), "us")
    assert writer.value(65) == "149.0\u202f°F"
    assert writer.setting(1.5) == "2.7\u202f°F"


@given(value=st.floats(-1e12, 1e12, allow_nan=False))
def test_plain_numbers_are_read_back(value):
    text = plain(value)
    assert float(text) == pytest.approx(value, rel=1e-8, abs=1e-300)
    assert "," not in text
    assert "\u2212" not in text


@pytest.mark.parametrize(
    ("value", "dimension", "shown"),
    [
        (4e-6, "area", "4\u202fmm²"),
        (0.005, "current", "5\u202fmA"),
        (0.167, "current", "0.167\u202fA"),
        (0.01, "change_per_second", "0.01\u202fK/s"),
        (0.125, "share_per_change", "0.125\u202f1/K"),
        (float("inf"), "value", "without limit"),
    ],
)
def test_sizes_that_would_be_all_zeros_are_written_in_the_smaller_unit(value, dimension, shown):
    assert Writer(CELSIUS, 0.1).say(value, dimension) == shown
