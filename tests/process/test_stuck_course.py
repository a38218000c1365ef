"""Courses of a stuck and of a cut output: the extremes and times of the worst cases lie on them."""

import numpy as np
import pytest
from scipy.integrate import solve_ivp

from specgen.process.fault_cases import limiter_case, time_to_reach
from specgen.process.stuck_course import cut_course, stuck_course, stuck_time

BODY = {
    "strength": (8000, 9000), "setpoint": (40, 80), "load": (200, 600), "capacity": (30e3, 50e3), "dead_time": (10, 30),
    "supply": (0.9, 1.1),
}  # fmt: skip


def made(make, *, settles, lag, sign=1):
    more = {"ambient": (30, 8), "loss": (60, 90)} if settles else {"ambient": None, "loss": (0, 0), "rates": True}
    if not settles:
        more |= {"strength": (0.05, 0.06), "load": (0.01, 0.02), "capacity": (1, 1)}
    if sign < 0:
        more |= {"setpoint": (10, 0), "ambient": (12, 30)} if settles else {"setpoint": (10, 0)}
    return make.box(**{**BODY, **more, "lag": lag, "sign": sign})


SHAPES = [(settles, lag, sign) for settles in (True, False) for lag in ((0, 0), (20, 40)) for sign in (1, -1)]


@pytest.mark.parametrize(("settles", "lag", "sign"), SHAPES)
def test_the_value_is_at_the_danger_when_its_time_is_up(make, settles, lag, sign):
    box = made(make, settles=settles, lag=lag, sign=sign)
    start = box.setpoint.at(1.0)
    target = start + sign * 15
    found = time_to_reach(box, "on", start, target)
    assert stuck_time(box, found.point, "on", start, target) == pytest.approx(found.value)
    assert stuck_course(box, found.point, "on", start, (0.0, found.value)) == pytest.approx((start, target))


@pytest.mark.parametrize(("settles", "lag", "sign"), SHAPES)
def test_after_the_cut_the_value_turns_where_the_limiter_case_says(make, settles, lag, sign):
    box = made(make, settles=settles, lag=lag, sign=sign)
    found = limiter_case(box, box.setpoint.at(1.0) + sign * 12, 5.0)
    times = [index * 0.5 for index in range(1200)]
    course = cut_course(box, found.point, found.acts_at, times)
    assert course[0] == pytest.approx(found.acts_at)
    assert max(sign * value for value in course) == pytest.approx(sign * found.peaks_at, abs=0.02)


@pytest.mark.parametrize("lag", [0.0, 40.0])
def test_the_course_after_the_cut_is_the_integrated_plant(make, lag):
    """C y' = P e - D - G (y - setpoint), lag e' = u - e with e full at first, u = 1 for the dead time and then 0."""
    box = made(make, settles=True, lag=(lag, lag))
    point = limiter_case(box, 95.0, 5.0).point
    load, strength = box.sides_at(point)
    capacity, loss = box.capacity.at(point.capacity), box.loss.at(point.loss)
    setpoint, theta = box.setpoint.at(point.load), box.dead_time.at(1.0)

    def slopes(t, state):
        u = float(t < theta)
        drive = state[0] if lag else u
        return [(u - state[0]) / lag if lag else 0.0, (strength * drive - load - loss * (state[1] - setpoint)) / capacity]

    times = np.linspace(0, 400, 41)
    theirs = solve_ivp(slopes, (0, 400), [1.0, 96.0], t_eval=times, max_step=0.5, rtol=1e-9).y[1]
    assert cut_course(box, point, 96.0, times) == pytest.approx(theirs, abs=0.05)
