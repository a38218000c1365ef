"""The modes of a plant against the matrix exponential of the chain itself."""

from math import inf

import numpy as np
import pytest
from scipy.linalg import expm

from specgen.process.closed_loop import advanced, measured_slope, weighed
from specgen.process.loop_dynamics import Dynamics, grown, integrating, modes_of, self_regulating

PLANTS = [
    pytest.param(Dynamics(0.2, 50, 3), 1e-10, id="first order"),
    pytest.param(Dynamics(0.2, 50, 3, lag=7), 1e-10, id="second lag"),
    pytest.param(Dynamics(0.2, 50, 3, sensor_lag=7), 1e-10, id="sensor lag"),
    pytest.param(Dynamics(0.2, 50, 3, lag=70, sensor_lag=4), 1e-10, id="lag above the time constant"),
    pytest.param(Dynamics(0.2, inf, 3, lag=7, sensor_lag=4), 1e-10, id="integrating"),
    pytest.param(Dynamics(0.2, 50, 3, lag=7, sensor_lag=7), 1e-6, id="equal lags"),
    pytest.param(Dynamics(0.2, 50, 3, lag=50, sensor_lag=4), 2e-5, id="lag equal to the time constant"),
    pytest.param(Dynamics(0.2, 50, 3, lag=50, sensor_lag=50), 2e-5, id="three equal"),
    pytest.param(Dynamics(0.2, 50, 3, lag=50.006, sensor_lag=50.003), 2e-5, id="three nearly equal"),
]


def chain(plant, level, load):
    """Return the matrix of (element, true value, measurement, its integral, 1), written down from the equations."""
    matrix = np.zeros((5, 5))
    row = 0 if plant.lag > 0 else None
    if row is not None:
        matrix[0, 0], matrix[0, 4] = -1 / plant.lag, level / plant.lag
        matrix[1, 0] = plant.slope
    else:
        matrix[1, 4] += plant.slope * level
    matrix[1, 1] = 0 if plant.is_integrating else -1 / plant.tau
    matrix[1, 4] += plant.slope * load
    if plant.sensor_lag > 0:
        matrix[2, 1], matrix[2, 2] = 1 / plant.sensor_lag, -1 / plant.sensor_lag
    matrix[3, 2 if plant.sensor_lag > 0 else 1] = 1
    return matrix


@pytest.mark.parametrize(("plant", "tolerance"), PLANTS)
def test_modes_follow_the_chain(plant, tolerance):
    modes = modes_of(plant)
    states = modes.start(-5.0)
    real = np.array([0.0, -5.0, -5.0, 0.0, 1.0])
    for level, load, span in [(1.0, -0.3, 2.0), (0.0, -0.3, 11.0), (0.6, 0.1, 0.05), (1.0, 0.0, 160.0)]:
        matrix = chain(plant, level, load)
        slope = (matrix @ real)[2 if plant.sensor_lag > 0 else 1]
        assert measured_slope(modes, states, level, load) == pytest.approx(slope, rel=10 * tolerance, abs=10 * tolerance)
        states, gathered = advanced(modes, states, level, load, span)
        before = real[3]
        real = expm(matrix * span) @ real
        measured = real[2] if plant.sensor_lag > 0 else real[1]
        assert weighed(modes.true, states) == pytest.approx(real[1], rel=tolerance, abs=10 * tolerance)
        assert weighed(modes.measured, states) == pytest.approx(measured, rel=tolerance, abs=10 * tolerance)
        assert gathered == pytest.approx(real[3] - before, rel=10 * tolerance, abs=100 * tolerance)


@pytest.mark.parametrize(("plant", "tolerance"), PLANTS)
def test_frequency_response_is_that_of_the_chain(plant, tolerance):
    """Impulse of the modes, summed over their poles, delayed: the transfer function at a few frequencies."""
    modes = modes_of(plant)
    s = 1j * np.geomspace(1e-4, 1, 9)
    by_modes = sum(c * b / (s + p) for p, b, c in zip(modes.rate, modes.output, modes.measured, strict=True)) * np.exp(-plant.theta * s)
    assert by_modes == pytest.approx(plant.response(s), rel=100 * tolerance, abs=1e-3 * tolerance)


@pytest.mark.parametrize("rate", [0.0, 1e-9, 0.99e-3, 1.01e-3, 0.4, 30.0])
def test_growth_of_one_mode(rate):
    """``z' = -p z + 1`` and its integral by the matrix exponential."""
    span = 1.0
    decay, answer, gathered = grown(rate, span)
    block = expm(np.array([[-rate, 0, 1], [1, 0, 0], [0, 0, 0]]) * span)
    assert (decay, answer, gathered) == pytest.approx((block[0, 0], block[0, 2], block[1, 2]), rel=1e-12)


def test_two_ways_to_name_a_plant():
    assert self_regulating(130, 1300, 25).gain == pytest.approx(130)
    assert integrating(0.1, 25).gain == inf
    assert not self_regulating(130, 1300, 25).is_integrating


@pytest.mark.parametrize(
    "numbers", [(0, 10, 1), (-1, 10, 1), (inf, 10, 1), (1, 0, 1), (1, -5, 1), (1, 10, -1), (1, 10, inf), (1, 10, 1, -1), (1, 10, 1, 0, -1)]
)
def test_what_is_no_plant_is_refused(numbers):
    with pytest.raises(ValueError, match=r"slope|time"):
        Dynamics(*numbers)
