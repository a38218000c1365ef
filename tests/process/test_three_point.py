"""Three-point drive by hand."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from specgen.process.three_point import motor_work, three_point, travel_step


def test_zone_is_twice_the_shortest_pulse():
    """0.4 s of 60 s is 0.667 % of the travel; of 90 K that is 0.6 K, twice 1.2 K."""
    found = three_point(0.4, 60, highest_gain=90, measurement_step=0.1)
    assert found.travel_step == pytest.approx(0.4 / 60)
    assert found.step_effect == pytest.approx(0.6)
    assert found.neutral_zone == pytest.approx(1.2)
    assert found.decided_by == "pulse"


def test_a_coarse_measurement_decides():
    """Twice 0.05 K lies below a step of 0.5 K."""
    found = three_point(0.1, 120, highest_gain=60, measurement_step=0.5)
    assert found.neutral_zone == 0.5
    assert found.decided_by == "measurement"


def test_boundary_goes_to_the_pulse():
    assert three_point(1, 100, highest_gain=25, measurement_step=0.5).decided_by == "pulse"


def test_work_of_the_motor():
    """Load swings by 0.3 of the travel in 15 min: 0.6 x 4 = 2.4 travels an hour, 240 steps of 1 %, 2.4 x 90 s of 3600 s."""
    found = motor_work(0.3, 900, 0.01, 90)
    assert found.pulses_per_hour == pytest.approx(240)
    assert found.duty == pytest.approx(2.4 * 90 / 3600)


@given(st.floats(0, 1), st.floats(60, 1e5), st.floats(1e-3, 0.1), st.floats(5, 300))
def test_every_pulse_runs_for_its_own_time(swing, period, step, travel_time):
    """Pulses an hour times the length of each is the running time of an hour."""
    found = motor_work(swing, period, step, travel_time)
    assert found.pulses_per_hour * step * travel_time == pytest.approx(found.duty * 3600, abs=1e-9)


@pytest.mark.parametrize(
    ("call", "why"),
    [
        pytest.param(lambda: travel_step(0, 60), "shortest pulse", id="no pulse"),
        pytest.param(lambda: travel_step(61, 60), "shortest pulse", id="pulse beyond the travel"),
        pytest.param(lambda: three_point(1, 60, 0, 0.1), "highest gain", id="no gain"),
        pytest.param(lambda: motor_work(-0.1, 60, 0.01, 60), "swing", id="swing"),
        pytest.param(lambda: motor_work(0.1, 0, 0.01, 60), "period", id="period"),
    ],
)
def test_what_is_no_drive_is_refused(call, why):
    with pytest.raises(ValueError, match=why):
        call()
