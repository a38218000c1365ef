"""The drawn course agrees with the cycle's figures and passes the switch points at the switchings."""

import pytest

from specgen.process.cycle_course import cycle_course
from specgen.process.plant import Integrating, SelfRegulating

PLANTS = [
    pytest.param(SelfRegulating(95, 45, 600, 30), id="one lag"),
    pytest.param(SelfRegulating(95, 45, 600, 30, 40, 20), id="all lags"),
    pytest.param(SelfRegulating(95, 45, 600, 0, 40), id="no dead time"),
    pytest.param(Integrating(0.2, 0.1, 5), id="integrating"),
    pytest.param(Integrating(0.2, 0.1, 5, 7, 3), id="integrating with lags"),
]


@pytest.mark.parametrize("plant", PLANTS)
def test_course(plant):
    cycle = plant.limit_cycle(1.0, -1.0)
    course = cycle_course(plant, cycle, 4000)
    assert max(course.value) == pytest.approx(cycle.peak, abs=1e-4 * cycle.swing)
    assert min(course.value) == pytest.approx(cycle.trough, abs=1e-4 * cycle.swing)
    assert max(course.measured) == pytest.approx(cycle.measured_peak, abs=1e-4 * cycle.swing)
    assert course.time[0] == 0
    assert course.time[-1] == pytest.approx(2 * cycle.period)
    edges = [i for i in range(1, len(course.time)) if course.output[i] != course.output[i - 1]]
    assert [course.time[i] for i in edges] == pytest.approx([cycle.t_on, cycle.period, cycle.period + cycle.t_on])
    assert [course.measured[i] for i in edges] == pytest.approx([1.0, -1.0, 1.0], abs=1e-8)
    assert list(course.time) == sorted(course.time)


@pytest.mark.parametrize("plant", PLANTS)
def test_mean_of_the_course(plant):
    """The trapezium rule over two cycles gives the cycle's mean."""
    cycle = plant.limit_cycle(1.0, -1.0)
    course = cycle_course(plant, cycle, 4000)
    steps = zip(course.time, course.time[1:], course.value, course.value[1:], strict=False)
    area = sum((t1 - t0) * (v0 + v1) / 2 for t0, t1, v0, v1 in steps)
    assert area / (2 * cycle.period) == pytest.approx(cycle.mean, abs=1e-4 * cycle.swing)
