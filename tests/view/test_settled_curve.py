"""The drawn curve is the cycle that was computed: held against numerical integration and hand calculation."""

from itertools import pairwise

import numpy as np
import pytest
from scipy.integrate import solve_ivp

from specgen.process.plant import Integrating, SelfRegulating
from specgen.view.settled_curve import CYCLES, settled_curve

LAGGED = SelfRegulating(rise=95, fall=45, tau=600, theta=30, lag=40, sensor_lag=25)


@pytest.mark.parametrize(
    "plant",
    [
        pytest.param(SelfRegulating(rise=95, fall=45, tau=600, theta=30), id="one lag"),
        pytest.param(LAGGED, id="two lags and a slow sensor"),
        pytest.param(SelfRegulating(rise=30, fall=200, tau=300, theta=0, lag=20), id="no dead time"),
    ],
)
def test_extremes_are_those_of_the_cycle(plant):
    cycle = plant.limit_cycle(high=1, low=-1)
    curve = settled_curve(plant, cycle.t_on, cycle.t_off, cycle.peak)
    assert max(curve.values) == pytest.approx(cycle.peak, abs=1e-9)
    assert min(curve.values) == pytest.approx(cycle.trough, abs=0.01 * cycle.swing)
    assert curve.times[-1] == pytest.approx(CYCLES * cycle.period)


def test_the_curve_follows_the_integrated_plant():
    """Two lags driven by the same rectangle until settled, by scipy."""
    cycle = LAGGED.limit_cycle(high=1, low=-1)
    curve = settled_curve(LAGGED, cycle.t_on, cycle.t_off, cycle.peak)
    period = cycle.period

    def slopes(t, state):
        between, value = state
        on = (t - LAGGED.theta) % period < cycle.t_on
        end = LAGGED.settles_off + LAGGED.gain * on
        return [(end - between) / LAGGED.lag, (between - value) / LAGGED.tau]

    settled = 40 * period
    run = solve_ivp(slopes, (0, settled + CYCLES * period), [0, 0], max_step=period / 400, rtol=1e-8, dense_output=True)
    theirs = run.sol(settled + np.array(curve.times))[1]
    assert np.max(np.abs(theirs - np.array(curve.values))) < 0.01 * cycle.swing


def test_what_the_controller_reads_swings_less_and_meets_the_switch_points():
    """The output switches when the reading is at +1 and -1: at t_on and at 0."""
    cycle = LAGGED.limit_cycle(high=1, low=-1)
    reading = settled_curve(LAGGED, cycle.t_on, cycle.t_off, cycle.measured_peak, measured=True)
    at = dict(zip(reading.times, reading.values, strict=True))
    assert at[0.0] == pytest.approx(-1, abs=0.01 * cycle.measured_swing)
    assert max(reading.values) - min(reading.values) < cycle.swing


def test_a_level_is_a_triangle():
    """0.2 up and 0.1 down a second, 5 s late, between -1 and 1: peak 1 + 0.2 x 5, trough -1 - 0.1 x 5."""
    plant = Integrating(r_on=0.2, r_off=0.1, theta=5)
    cycle = plant.limit_cycle(high=1, low=-1)
    curve = settled_curve(plant, cycle.t_on, cycle.t_off, cycle.peak)
    assert max(curve.values) == pytest.approx(2.0)
    assert min(curve.values) == pytest.approx(-1.5)
    rising = [(t, v) for t, v in zip(curve.times, curve.values, strict=True) if 5 <= t <= 5 + cycle.t_on]
    slopes = [(b[1] - a[1]) / (b[0] - a[0]) for a, b in pairwise(rising)]
    assert slopes == pytest.approx([0.2] * len(slopes))
