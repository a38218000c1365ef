"""Courses of a start from rest: held against numerical integration, the settled cycle and hand calculation."""

from math import exp, log

import numpy as np
import pytest
from scipy.integrate import solve_ivp

from specgen.process.loop_dynamics import Dynamics
from specgen.process.loop_run import Band
from specgen.process.plant import SelfRegulating
from specgen.process.start_course import rising, switched_course, tuned_course
from specgen.process.start_up import start_up
from specgen.process.tuning import Settings

LAGGED = Dynamics(slope=0.2, tau=700, theta=30, lag=40, sensor_lag=25)


def test_the_rise_follows_the_integrated_plant():
    """Element, body: lag e' = u - e, y' = k'(e - x) - (y)/tau with the load as output x = 0.3, from rest at -k' tau x."""
    load, start = 0.3, -0.2 * 700 * 0.3

    def slopes(t, state):
        element, value = state
        return [(float(t > LAGGED.theta) - element) / LAGGED.lag, LAGGED.slope * (element - load) - value / LAGGED.tau]

    times = np.linspace(0, 900, 61)
    theirs = solve_ivp(slopes, (0, 900), [0, start], t_eval=times, max_step=1, rtol=1e-9, atol=1e-9).y[1]
    assert rising(LAGGED, start, load, times) == pytest.approx(theirs, abs=1e-4)


def test_the_first_rise_of_one_lag_is_the_logarithm():
    """From -42 towards k' tau (1 - 0.3) = 98, off at +1 after 30 + 700 ln((98 + 42)/(98 - 1)) s: no sensor lag, no second lag."""
    plant = Dynamics(slope=0.2, tau=700, theta=30)
    course = switched_course(plant, -42, 0.3, (1.0, -1.0), (0, 0), 2)
    assert course.outputs[0] == (0.0, 1.0)
    assert course.outputs[1][0] == pytest.approx(30 + 700 * log(140 / 97))
    peak = max(course.values)
    assert peak == pytest.approx(98 - 97 * exp(-30 / 700), abs=0.02)


@pytest.mark.parametrize(("run", "rest"), [(0, 0), (180, 240)])
def test_switching_settles_to_the_limit_cycle(run, rest):
    plant = SelfRegulating(rise=98, fall=42, tau=700, theta=30, lag=40, sensor_lag=25)
    cycle = plant.limit_cycle(1.0, -1.0, run, rest)
    course = switched_course(LAGGED, -42, 0.3, (1.0, -1.0), (run, rest), 12)
    switched_on = [time for time, level in course.outputs if level == 1.0]
    assert switched_on[-1] - switched_on[-2] == pytest.approx(cycle.period, rel=1e-4)
    late = [value for time, value in zip(course.times, course.values, strict=True) if time > switched_on[-2]]
    assert max(late) == pytest.approx(cycle.peak, abs=0.02 * cycle.swing)
    assert min(late) == pytest.approx(cycle.trough, abs=0.02 * cycle.swing)


def test_what_cannot_pass_its_switch_point_has_no_course():
    assert switched_course(Dynamics(slope=0.2, tau=700, theta=30), -42, 0.3, (98.0, -1.0), (0, 0), 2) is None
    assert switched_course(Dynamics(slope=0.2, tau=700, theta=30), -42, 0.3, (1.0, -42.0), (0, 0), 2) is None


@pytest.mark.parametrize("cycle", [0.0, 0.5, 60.0])
def test_a_tuned_course_is_full_output_and_then_the_run_without_a_step_between(cycle):
    plant, settings = Dynamics(slope=0.1, tau=1300, theta=25, sensor_lag=8), Settings(gain=0.125, integral_time=320)
    run = start_up(plant, settings, 52, 0.4, Band(1.5, 1.5), cycle)
    course = tuned_course(plant, settings, 52, 0.4, cycle, run)
    assert course.values[0] == pytest.approx(-52)
    assert list(course.times) == sorted(course.times)
    joint = course.times.index(run.run.times[0])
    assert course.times[joint] == pytest.approx(run.full_output)
    slope = 0.1 * (1 - 0.4) + 52 / 1300
    assert abs(course.values[joint] - course.values[joint - 1]) <= slope * (course.times[joint] - course.times[joint - 1]) + 1e-9
    assert max(run.run.values) <= run.run.highest
    assert course.outputs[0] == (0.0, 1.0)
    assert all(a[1] != b[1] for a, b in zip(course.outputs, course.outputs[1:], strict=False))


def test_the_time_of_the_highest_value_is_kept():
    plant, settings = Dynamics(slope=0.1, tau=1300, theta=25), Settings(gain=0.25, integral_time=150)
    run = start_up(plant, settings, 52, 0.4, Band(1.5, 1.5), 20).run
    at = min(range(len(run.times)), key=lambda index: abs(run.times[index] - run.highest_at))
    assert run.values[at] == pytest.approx(run.highest, abs=1e-9)
