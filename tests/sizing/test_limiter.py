"""Set values of limiters: inside the room, on the step, rounded towards normal running; and early enough for what follows."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from specgen.sizing.limiter import LimiterDesign, Window, set_value

ROOM = st.floats(0.05, 40.0)


@given(st.floats(-50, 200), ROOM, ROOM, st.sampled_from([0.1, 0.5, 1.0]), st.sampled_from([1, -1]), st.floats(0.01, 1.0))
def test_a_set_value_lies_in_the_room_and_on_the_step_where_one_fits(running, room, more, step, outward, part):
    latest = running + outward * room
    softest = running + outward * room * part
    window = Window(outward, running, latest, latest + outward * more, softest)
    value = set_value(window, step)
    assert value is not None
    assert window.clear(value) > 0
    assert outward * (softest - value) >= 0
    middle = (running + softest) / 2
    around = [round(middle / step) + n for n in (-1, 0, 1)]
    if any(_in(window, n * step, softest) and abs(n * step - middle) < step for n in around):
        assert abs(value / step - round(value / step)) < 1e-6


def _in(window, value, softest):
    return window.clear(value) > 1e-9 and window.outward * (softest - value) > 1e-9


@pytest.mark.parametrize(
    ("window", "step", "value"),
    [
        pytest.param(Window(1, 80.0, 90.3, 95.0), 0.1, 85.1, id="85.15 down"),
        pytest.param(Window(-1, 4.0, -2.7, -3.0), 0.1, 0.7, id="0.65 up"),
        pytest.param(Window(1, 80.0, 90.0, 95.0), None, 85.0, id="no step known"),
        pytest.param(Window(1, 80.0, 81.2, 95.0), 1.0, None, id="down to 80 is normal running; up to 81 is in"),
        pytest.param(Window(1, 90.0, 89.0, 95.0), 0.1, None, id="no room"),
    ],
)
def test_rounding(window, step, value):
    found = set_value(window, step)
    if value is None and window.open:
        assert found == pytest.approx(81.0)
    elif value is None:
        assert found is None
    else:
        assert found == pytest.approx(value)


def test_distances_and_what_coasts_past():
    window = Window(1, 80.0, 93.0, 95.0)
    limiter = LimiterDesign(88.0, 10.0, 89.5, declared=True, peaks_at=95.5, window=window)
    assert (limiter.clear_of_running, limiter.short_of_danger) == (8.0, 5.5)
    assert limiter.coasts_past
