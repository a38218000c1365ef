"""Numbers in sentences: as many digits as count, a unit that people would take, the loop's own unit where it has one."""

from math import inf, isfinite

import pytest
from hypothesis import given
from hypothesis import strategies as st

from specgen.core.quantity import Unit
from specgen.core.say import (
    THIN,
    Phrasing,
    amperes,
    digits,
    join,
    of_change,
    of_value,
    per_hour,
    plain,
    seconds,
    share,
    to_step,
    watts,
    years,
)  # fmt: skip

CELSIUS = Phrasing(Unit("degC"), Unit("K"))
BAR = Phrasing(Unit("bar", 1e-5), Unit("bar", 1e-5))
FLOW = Phrasing(Unit("m3/h", 3600.0), Unit("m3/h", 3600.0))


def plainly(text):
    return text.replace("\u202f", " ").replace("\u2212", "-")


@pytest.mark.parametrize(
    ("said", "text"),
    [
        (seconds(0), "0 s"), (seconds(0.02), "20 ms"), (seconds(59.96), "60 s"), (seconds(180), "180 s"), (seconds(600), "10 min"),
        (seconds(3600), "60 min"), (seconds(10800), "3 h"), (seconds(2 * 86400), "2 days"), (seconds(365.25 * 86400), "1 years"),
        (share(0.05), "5 percent"), (share(1.213), "121 percent"), (watts(9000), "9 kW"), (watts(0.4), "400 mW"), (watts(1.2e6), "1.2 MW"),
        (years(10.44), "10.4 years"), (per_hour(13.22), "13.2 an hour"), (amperes(14.289), "14.3 A"), (plain(1234567), "1 230 000"),
        (of_value(65), "65.0 °C"), (of_value(-0.04), "0.0 °C"), (of_change(1.2345), "1.23 K"), (of_change(-0.5), "-0.5 K"),
    ],
)  # fmt: skip
def test_as_people_write_it(said, text):
    assert plainly(CELSIUS.say(said)) == text


def test_in_the_loops_unit():
    assert plainly(BAR.say(of_value(620000.0))) == "6.2 bar"
    assert plainly(BAR.say(of_change(1234.0))) == "0.0123 bar"
    assert plainly(FLOW.say(of_value(12 / 3600))) == "12 m³/h"


def test_fahrenheit_has_its_offset_in_values_only():
    fahrenheit = Phrasing(Unit("degF", 1.8, 32.0), Unit("degF", 1.8))
    assert plainly(fahrenheit.say(of_value(60))) == "140.0 °F"
    assert plainly(fahrenheit.say(of_change(10))) == "18 °F"


def test_a_sentence():
    assert plainly(CELSIUS.fill("{on} on at {low}, {who} says", {"on": seconds(10), "low": share(0.05), "who": "the sheet {as is}"})) == (
        "10 s on at 5 percent, the sheet {as is} says"
    )


@pytest.mark.parametrize(
    ("value", "text"),
    [(999.6, "1000"), (9999.0, "10 000"), (0.0999, "0.0999"), (0.09996, "0.1"), (12345.6, "12 300"), (-2, "-2"), (inf, "without limit"),
     (-inf, "-without limit")],
)  # fmt: skip
def test_digits(value, text):
    assert plainly(digits(value)) == text


@given(st.floats(-1e12, 1e12).filter(lambda value: value == 0 or abs(value) > 1e-9), st.integers(1, 6))
def test_digits_are_the_number_to_so_many_digits(value, significant):
    read = float(plainly(digits(value, significant)).replace(" ", ""))
    assert isfinite(read)
    assert abs(read - value) <= 0.5000001 * 10 ** (1 - significant) * abs(value)
    assert "e" not in digits(value, significant)


STEPS = [(65.04, 0.1, "65.0"), (0.25, 0.05, "0.25"), (-0.02, 0.1, "0.0"), (7.0, 5.0, "7"), (1, 0, "1")]


@pytest.mark.parametrize(("value", "step", "text"), STEPS)
def test_to_a_step(value, step, text):
    assert plainly(to_step(value, step)) == text


def test_units_are_joined_by_a_thin_space():
    assert join("3", "ohm") == f"3{THIN}Ω"
    assert join("3", "") == "3"
