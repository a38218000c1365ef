"""SIMC against the published examples and by hand."""

from math import inf

import numpy as np
import pytest

from specgen.process.tuning import NothingLimitsTheGainError, Settings, cycle_delay, effective_delay, reduce_plant, series_to_ideal, simc

# Skogestad, J. Process Control 13 (2003) 291-309, examples (from memory; every number recomputed). Inverse response and
# positive numerator time constants enter as dead time: E2 has 0.3 - 0.08.
EXAMPLES = [
    pytest.param((1, 0.2), 0.0, "PI", (0.1, 1.1, 0), (5.5, 0.8, 0), id="E1 PI"),
    pytest.param((2, 1, 0.4, 0.2, 0.05, 0.05, 0.05), 0.22, "PI", (1.47, 2.5, 0), (0.85, 2.5, 0), id="E2 PI"),
    pytest.param((2, 1, 0.4, 0.2, 0.05, 0.05, 0.05), 0.22, "PID", (0.77, 2.0, 1.2), (1.30, 2.0, 1.2), id="E2 PID"),
    pytest.param((1, 1, 1, 1), 0.0, "PI", (2.5, 1.5, 0), (0.30, 1.5, 0), id="E4 PI"),
    pytest.param((1, 1, 1, 1), 0.0, "PID", (1.5, 1.5, 1.0), (0.50, 1.5, 1.0), id="E4 PID"),
    pytest.param((1, 0.2, 0.04, 0.008), 0.0, "PI", (0.148, 1.1, 0), (3.72, 1.1, 0), id="E5 PI"),
    pytest.param((1, 0.2, 0.04, 0.008), 0.0, "PID", (0.028, 1.0, 0.22), (17.86, 0.224, 0.22), id="E5 PID"),
]


@pytest.mark.parametrize(("lags", "theta", "structure", "model", "series"), EXAMPLES)
def test_published_examples(lags, theta, structure, model, series):
    settings = simc(1 / lags[0], lags[0], theta, lags[1:], structure=structure)
    reduced = settings.reduced
    assert (reduced.delay.total, reduced.tau, reduced.lag) == pytest.approx(model)
    found = settings.series or (settings.gain, settings.integral_time, settings.derivative_time)
    assert found == pytest.approx(series, rel=0.006)  # the table has two or three digits


def test_e3_with_its_reduced_model():
    """E3's model is K 1.5, L 0.15, T 1.05: Kc 1.05/(1.5 0.3) = 2.333, Ti min(1.05, 1.2)."""
    settings = simc(1.5 / 1.05, 1.05, 0.15)
    assert (settings.gain, settings.integral_time) == pytest.approx((2.3333, 1.05), rel=1e-4)


def test_structure_is_chosen_by_the_second_lag():
    """E2 keeps 1.2 beside a delay of 0.77, E4 1.0 beside 1.5; without a lag there is nothing to cancel."""
    assert simc(0.5, 2, 0.22, (1, 0.4, 0.2, 0.05, 0.05, 0.05)).structure == "PID"
    assert simc(1, 1, 0, (1, 1, 1)).structure == "PI"
    assert simc(1, 100, 5).structure == "PI"
    assert simc(1, 100, 5, (4.0,)).structure == "PI"
    assert simc(1, 100, 5, (6.0,)).structure == "PID"
    # the cycle's delay counts on the other side of the scale
    assert simc(1, 100, 5, (6.0,), cycle_delay=2).structure == "PI"


def test_integrating_plant():
    """k' 0.05, theta 10: Kc 1/(0.05 20) = 1, Ti 80; with a lag of 4 by the half rule theta_e 12."""
    settings = simc(0.05, inf, 10)
    assert (settings.gain, settings.integral_time) == pytest.approx((1.0, 80))
    lagged = simc(0.05, inf, 10, (4,))
    assert (lagged.gain, lagged.integral_time, lagged.theta_e) == pytest.approx((1 / (0.05 * 24), 96, 12))


def test_integrating_plant_with_a_large_lag_takes_derivative_action():
    """k' 0.05, theta 10, lag 30: series Kc 1, Ti 80, Td 30; ideal factor 1 + 30/80."""
    settings = simc(0.05, inf, 10, (30,))
    assert settings.series == pytest.approx((1.0, 80, 30))
    assert (settings.gain, settings.integral_time, settings.derivative_time) == pytest.approx((1.375, 110, 30 / 1.375))


def test_a_lag_above_the_time_constant_is_the_one_kept():
    assert reduce_plant(10, 1, (40,)).tau == 45
    assert reduce_plant(10, 1, (40,)).delay.half_lag == 5
    # the gain K = 20 stays: Kc = 45/(20 2 6)
    assert simc(2, 10, 1, (40,), structure="PI").gain == pytest.approx(45 / (20 * 12))


def test_series_and_ideal_are_the_same_controller():
    series = (1.3, 2.0, 1.2)
    gain, reset, rate = series_to_ideal(*series)
    s = 1j * np.geomspace(0.01, 100, 7)
    assert gain * (1 + 1 / (reset * s) + rate * s) == pytest.approx(series[0] * (1 + 1 / (series[1] * s)) * (1 + series[2] * s))


def test_parts_of_the_delay_add_up():
    delay = effective_delay(25, (10, 8, 0, 1), actuator=3, cycle_delay=15)
    assert (delay.dead_time, delay.actuator, delay.cycle, delay.half_lag, delay.other_lags) == (25, 3, 15, 5, 9)
    assert (delay.total, delay.without_cycle) == (57, 42)


@pytest.mark.parametrize(
    ("arguments", "expected"),
    [
        pytest.param((20, 0.9), 18, id="high duty"),
        pytest.param((20, 0.3), 10, id="at least half a cycle"),
        pytest.param((0, 0.9), 0, id="continuous"),
        pytest.param((20, 0.9, "ramp", 20, 5), 0, id="ramp, cycle at the dead time, lag"),
        pytest.param((20, 0.9, "ramp", 19.9, 5), 18, id="ramp, cycle above the dead time"),
        pytest.param((20, 0.9, "ramp", 40, 0), 18, id="ramp without a second lag"),
    ],
)
def test_delay_of_a_cycle(arguments, expected):
    assert cycle_delay(*arguments) == pytest.approx(expected)


def test_proportional_band_is_the_whole_output_over_the_gain():
    """Kc 0.125 of the output for 1 K, that is 12.5 %/K: 8 K moves it from 0 to 100 %."""
    assert Settings(0.125, 300).proportional_band == 8


def test_chosen_settings_have_no_effective_delay():
    with pytest.raises(ValueError, match="chose"):
        _ = Settings(0.125, 300).theta_e


def test_a_plant_without_any_delay_is_refused():
    with pytest.raises(NothingLimitsTheGainError, match="dead time"):
        simc(1, 10, 0)


@pytest.mark.parametrize("numbers", [(0, 10), (-1, 10), (inf, 10), (1, 0), (1, 10, -1)])
def test_settings_that_no_controller_takes(numbers):
    with pytest.raises(ValueError, match="above zero"):
        Settings(*numbers)


@pytest.mark.parametrize("arguments", [(-1, 0.5), (10, 1.2), (10, -0.1)])
def test_cycles_that_there_are_not(arguments):
    with pytest.raises(ValueError, match="cycle time"):
        cycle_delay(*arguments)
