"""Step tests made by scipy's integrators are identified; records that say nothing are refused with the reason."""

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy.integrate import solve_ivp
from scipy.signal import StateSpace, lsim

from specgen.process.step_test import Identified, Interval, NotIdentified, at_rated_supply, identify
from specgen.process.step_test_interval import correlated, resolution, spread
from specgen.process.step_test_response import staircase, unit_response
from specgen.process.step_test_search import Samples, best_fit


def integrated(t, output, gain, tau, theta, lag=0.0, rest=20.0):
    """The record as solve_ivp makes it: the output held from its sample on, seen theta later, the sensor behind a lag of its own."""
    moves = np.flatnonzero(np.diff(output)) + 1
    arrivals = [float(t[0]), *(t[moves] + theta), float(t[-1]) + theta + 1.0]
    levels = [output[0], *output[moves]]
    state = [rest + gain * output[0]] * 2
    value = np.empty_like(t)
    for begin, end, level in zip(arrivals[:-1], arrivals[1:], levels, strict=True):

        def slope(_, y, level=level):
            return [(rest + gain * level - y[0]) / tau, (y[0] - y[1]) / lag if lag else 0.0]

        inside = (t >= begin) & (t < end)
        run = solve_ivp(slope, (begin, end), state, t_eval=[*t[inside], end], rtol=1e-11, atol=1e-11, method="DOP853")
        value[inside] = run.y[1 if lag else 0][:-1]
        state = run.y[:, -1]
    return value


def step(t, at=300.0, first=0.2, then=0.7):
    return np.where(t < at, first, then)


def made(gain=130.0, tau=600.0, theta=47.3, rest=20.0, t=None, output=None, noise=0.0, seed=1):
    """A record by the textbook's formula for one step, with noise."""
    t = np.arange(0, 3600.0, 10.0) if t is None else t
    output = step(t) if output is None else output
    at = t[np.flatnonzero(np.diff(output))[0] + 1]
    since = np.maximum(t - at - theta, 0)
    rise = (output.max() - output.min()) * (1 - np.exp(-since / tau))
    return t, output, rest + gain * output[0] + gain * rise + noise * np.random.default_rng(seed).standard_normal(len(t))


def identified(*record, **options) -> Identified:
    found = identify(*record, **options)
    assert isinstance(found, Identified), found
    return found


def refused(*record, **options) -> NotIdentified:
    found = identify(*record, **options)
    assert isinstance(found, NotIdentified), found
    return found


SHAPES = {
    "one step": step,
    "a pulse": lambda t: np.where((t >= 300) & (t < 900), 0.9, 0.1),
    "three steps": lambda t: 0.1 + 0.3 * (t >= 200) - 0.2 * (t >= 900) + 0.5 * (t >= 1800),
    "a ramp held between samples": lambda t: np.clip((t - 300) / 1200, 0, 0.8),
}


@pytest.mark.parametrize("shape", SHAPES)
@pytest.mark.parametrize("lag", [0.0, 35.0])
def test_a_record_without_noise_gives_back_what_made_it(shape, lag):
    t = np.arange(0, 3600.0, 15.0)
    output = SHAPES[shape](t)
    found = identified(t, output, integrated(t, output, gain=130.0, tau=600.0, theta=47.3, lag=lag), sensor_lag=lag)
    assert found.gain.value == pytest.approx(130.0, rel=1e-6)
    assert found.tau.value == pytest.approx(600.0, rel=1e-6)
    assert found.theta.value == pytest.approx(47.3, rel=1e-5)
    assert found.rest is not None
    assert found.rest.value == pytest.approx(20.0, abs=1e-5)


def test_uneven_sampling_and_a_falling_value():
    t = np.sort(np.random.default_rng(4).uniform(0, 3600, 300))
    output = SHAPES["a pulse"](t)
    found = identified(t, output, integrated(t, output, gain=-8.0, tau=420.0, theta=91.7))
    assert (found.gain.value, found.tau.value, found.theta.value) == pytest.approx((-8.0, 420.0, 91.7), rel=1e-5)
    assert found.gain.magnitude().value == pytest.approx(8.0, rel=1e-5)


def test_drift_is_taken_out():
    t, output, value = made()
    found = identified(t, output, value + 0.001 * t)
    assert found.drift.value == pytest.approx(0.001, rel=1e-5)
    assert found.gain.value == pytest.approx(130.0, rel=1e-6)


def test_a_sensor_lag_left_out_of_the_fit_goes_into_the_dead_time():
    """What the declared lag is for: by the half rule it would come out as dead time and time constant of the plant."""
    t = np.arange(0, 3600.0, 10.0)
    value = integrated(t, step(t), gain=130.0, tau=600.0, theta=30.0, lag=40.0)
    assert identified(t, step(t), value).theta.value > 50
    assert identified(t, step(t), value, sensor_lag=40.0).theta.value == pytest.approx(30.0, rel=1e-4)


@pytest.mark.parametrize(("tau", "lag"), [(60.0, 0.0), (60.0, 12.0), (60.0, 60.0), (60.0, 60.0001), (60.0, 300.0)])
def test_response_against_lsim(tau, lag):
    """A held input on an even grid, dead time a multiple of it, so that lsim's own interpolation (none) is exact."""
    t = np.arange(0, 900.0, 3.0)
    output = np.random.default_rng(2).choice([0.0, 0.3, 0.8], size=len(t)).repeat(20)[: len(t)]
    delayed = np.concatenate((np.full(5, output[0]), output[:-5])) - output[0]
    a = [[-1 / tau]] if not lag else [[-1 / tau, 0], [1 / lag, -1 / lag]]
    b = [[1 / tau]] if not lag else [[1 / tau], [0]]
    c = [[1]] if not lag else [[0, 1]]
    _, reference, _ = lsim(StateSpace(a, b, c, [[0]]), delayed, t, interp=False)
    assert unit_response(staircase(t, output), t, tau, 15.0, lag) == pytest.approx(np.ravel(reference), abs=1e-9)


@settings(max_examples=25, deadline=None)
@given(st.floats(5, 2000), st.floats(0, 300), st.floats(1, 400), st.integers(0, 10_000))
def test_the_response_stays_between_the_least_and_the_largest_output(tau, theta, lag, seed):
    random = np.random.default_rng(seed)
    t = np.cumsum(random.uniform(0.5, 30, 80))
    output = random.uniform(0, 1, 80)
    seen = unit_response(staircase(t, output), t, tau, theta, lag) + output[0]
    assert np.all(seen >= output.min() - 1e-9)
    assert np.all(seen <= output.max() + 1e-9)


def test_interval_of_the_gain_in_a_case_done_by_hand():
    """Least squares of a line through known regressors: with tau and theta fixed by a noise-free shape the textbook covariance applies.

    The reference is the same Jacobian by analytic derivatives, s^2 (J'J)^-1 with numpy's inverse.
    """
    t, output, value = made(noise=0.5)
    samples = Samples(t, value, staircase(t, output))
    point = best_fit(samples)
    gain, tau, theta = point.linear[2], point.tau, point.theta
    since = t - 300 - theta
    late = since > 0
    fade = np.where(late, np.exp(-np.maximum(since, 0) / tau), 0.0)
    jacobian = np.column_stack(
        [
            np.ones_like(t),
            t / t[-1],
            0.5 * np.where(late, 1 - fade, 0.0),
            -0.5 * gain * fade * np.maximum(since, 0) / tau**2,
            -0.5 * gain * fade / tau,
        ]
    )
    variance = point.squares / (len(t) - 5)
    reference = np.sqrt(np.diag(variance * np.linalg.inv(jacobian.T @ jacobian)))
    width = spread(samples, point)
    assert width.correlation == 0.0
    assert np.sqrt(np.diag(width.covariance)) == pytest.approx(reference, rel=0.02)
    assert width.reach == pytest.approx(1.967, abs=2e-3)  # t-table: 0.975 with 355 degrees of freedom


def test_correlation_against_the_whole_matrix():
    columns = np.random.default_rng(5).standard_normal((30, 3))
    lags = np.abs(np.subtract.outer(np.arange(30), np.arange(30)))
    assert correlated(columns, 0.7) == pytest.approx(0.7**lags @ columns)


def test_residuals_that_hang_together_widen_the_intervals():
    t, output, value = made()
    white = np.random.default_rng(8).standard_normal(len(t))
    red = white.copy()
    for k in range(1, len(red)):
        red[k] = 0.8 * red[k - 1] + 0.6 * white[k]
    calm, wavy = identified(t, output, value + 0.3 * white), identified(t, output, value + 0.3 * red)
    assert calm.correlation == 0.0
    assert wavy.correlation == pytest.approx(0.8, abs=0.12)
    assert wavy.gain.width > 1.8 * calm.gain.width


def test_a_coarsely_recorded_value_has_wider_intervals_than_its_residuals_say():
    """Read in steps of 1 K over a rise of 65 K, each flat end carries up to half a step of error, however many samples."""
    t, output, value = made()
    found = identified(t, output, np.round(value))
    assert found.resolution == pytest.approx(1.0)
    assert found.gain.low < 130.0 < found.gain.high
    assert found.gain.width > 0.5


def test_resolution_of_a_value_without_steps_does_not_matter():
    assert resolution(np.random.default_rng(1).standard_normal(300)) < 1e-3
    assert resolution(np.full(5, 3.0)) == 0.0


@pytest.mark.parametrize(("seed", "noise"), [(1, 0.3), (2, 1.0), (3, 2.0)])
def test_rest_value_and_its_interval(seed, noise):
    found = identified(*made(noise=noise, seed=seed))
    assert found.rest is not None
    # five standard errors: how often two hold it is another test's
    assert abs(found.rest.value - 20.0) < 2.5 * found.rest.width / 2
    assert found.rest.width < 2 * noise
    assert "at rest" in found.rest_because


def test_no_rest_value_where_the_record_begins_with_the_step():
    t, output, value = made()
    found = identified(t[29:], output[29:], value[29:])
    assert found.gain.value == pytest.approx(130.0, rel=1e-5)
    assert found.rest is not None  # six samples stand before the response
    noisy = made(noise=0.5, theta=1.0)
    short = identified(*(column[29:] for column in noisy))
    assert short.rest is None
    assert "too few" in short.rest_because


def test_a_value_that_still_settles_is_fitted_with_its_decay():
    """By hand: a first-order plant 15 K off at the start adds 15 exp(-t/tau)."""
    t, output, value = made(noise=0.2)
    found = identified(t, output, value - 15 * np.exp(-t / 600))
    assert not found.at_rest_before
    assert found.rest is None
    assert found.gain.low - 0.5 < 130.0 < found.gain.high + 0.5
    assert found.tau.low - 5 < 600.0 < found.tau.high + 5


def test_a_change_between_two_samples_may_make_the_dead_time_longer():
    """The output moved at 300 s between samples at 292 and 302 s: the record says 302, and how much longer the dead time may be."""
    t = np.arange(2.0, 3600.0, 10.0)
    output = step(t)
    since = np.maximum(t - 300 - 47.3, 0)
    found = identified(t, output, 46 + 65 * (1 - np.exp(-since / 600)))
    assert found.theta.value == pytest.approx(45.3, abs=1e-4)
    assert found.last_before_change == pytest.approx(10.0)


def test_missing_rows_are_left_out_and_counted():
    t, output, value = made()
    value[[5, 80, 81, 200]] = np.nan
    found = identified(t, output, value)
    assert found.record.dropped == 4
    assert found.tau.value == pytest.approx(600.0, rel=1e-6)


def test_a_long_record_is_thinned_and_says_so():
    t = np.arange(0, 3600.0, 0.05)
    found = identified(*made(t=t))
    assert found.record.every == 4
    assert found.last_before_change == pytest.approx(0.05)
    assert found.theta.value == pytest.approx(47.3, rel=1e-5)


@pytest.mark.parametrize(("lag", "least"), [(60.0, 1.0), (100.0, 10.0)])
def test_a_second_order_plant_gets_wider_intervals_than_its_noise_would_give(lag, least):
    """0.05 K of noise alone would leave about 0.1 K of interval."""
    t = np.arange(0, 3600.0, 10.0)
    value = integrated(t, step(t), gain=130.0, tau=600.0, theta=30.0, lag=lag)
    found = identified(t, step(t), value + 0.05 * np.random.default_rng(3).standard_normal(len(t)))
    assert found.correlation > 0.9
    assert found.gain.width > least
    assert found.gain.low < 130.0 < found.gain.high


def test_a_plant_far_from_first_order_is_refused_and_told_why():
    t = np.arange(0, 3600.0, 10.0)
    value = integrated(t, step(t), gain=130.0, tau=600.0, theta=30.0, lag=150.0)
    found = refused(t, step(t), value + 0.05 * np.random.default_rng(3).standard_normal(len(t)))
    assert found.reason == "wide_interval"
    assert "may not be first order" in found.hint


T, U, Y = made(noise=0.1)


def without(samples):
    value = Y.copy()
    value[samples] = np.nan
    return value


REFUSED = [
    pytest.param(T, np.full_like(T, 0.4), Y, "no_step", id="output constant"),
    pytest.param(T, np.append(U[:-1] * 0 + 0.2, 0.7), Y, "no_step", id="output moves at the last sample"),
    pytest.param(T, U, np.full_like(T, 21.0), "constant_value", id="value constant"),
    pytest.param(T[:15], U[:15], Y[:15], "too_few_points", id="15 samples"),
    pytest.param([], [], [], "too_few_points", id="nothing"),
    pytest.param(T[::-1], U, Y, "time_not_increasing", id="time runs back"),
    pytest.param(np.repeat(T[::2], 2), U, Y, "time_not_increasing", id="doubled rows"),
    pytest.param(T, 100 * U, Y, "bad_output", id="percent taken for a fraction"),
    pytest.param(T, U - 0.5, Y, "bad_output", id="output below nothing"),
    pytest.param(T, U, without(slice(100, 150)), "gaps", id="50 rows missing in one stretch"),
    pytest.param(T, U, without(slice(0, 360, 5)), "gaps", id="a fifth of the rows missing"),
    pytest.param(T, U, 20 + np.random.default_rng(1).standard_normal(len(T)), "weak_step", id="noise alone"),
    pytest.param(*made(gain=4.0, noise=1.0), "weak_step", id="2 K of response in 1 K of noise"),
    pytest.param(T[:90], U[:90], Y[:90], "short_record", id="600 s after the step at tau 600 s"),
    pytest.param(*made(gain=130.0, noise=9.0), "wide_interval", id="response of 7 times the noise, tau unsure"),
    pytest.param(*made(tau=0.5, noise=0.01), "coarse_sampling", id="over within a sample"),
]


@pytest.mark.parametrize(("t", "output", "value", "reason"), REFUSED)
def test_refused_with_the_reason(t, output, value, reason):
    found = refused(t, output, value)
    assert found.reason == reason
    assert found.text
    assert found.hint


def test_an_integrating_plant_is_not_taken_for_a_slow_one():
    found = refused(T, U, 20 + 0.01 * np.maximum(T - 347, 0) + 0.05 * np.random.default_rng(1).standard_normal(len(T)))
    assert found.reason == "short_record"
    assert "declare rates" in found.hint


def test_a_misreading_that_hides_the_response_is_named():
    value = Y.copy()
    value[100] = 900.0
    found = refused(T, U, value)
    assert found.reason == "weak_step"
    assert "the sample at 1000 s" in found.hint


def test_mistakes_of_the_caller():
    with pytest.raises(ValueError, match="one length"):
        identify(T, U, Y[:-1])
    with pytest.raises(ValueError, match="not negative"):
        identify(T, U, Y, sensor_lag=-1.0)


def test_supply_of_the_test():
    """By hand: (400/380)^2 = 1.10803; unknown at 10 %: 1/1.1^2 = 0.82645 and 1/0.9^2 = 1.23457."""
    gain = Interval(100.0, 90.0, 110.0)
    assert at_rated_supply(gain, 400.0, 380.0).value == pytest.approx(110.803, abs=1e-3)
    unknown = at_rated_supply(gain, 400.0, None, 0.1)
    assert (unknown.low, unknown.value, unknown.high) == pytest.approx((74.380, 100.0, 135.802), abs=1e-3)
    falling = at_rated_supply(Interval(-100.0, -110.0, -90.0), 400.0, None, 0.1)
    assert (falling.low, falling.high) == pytest.approx((-135.802, -74.380), abs=1e-3)


@pytest.mark.parametrize(("rated", "during", "tolerance"), [(0.0, 380.0, 0.1), (400.0, -1.0, 0.1), (400.0, None, 1.0)])
def test_supply_out_of_its_range(rated, during, tolerance):
    with pytest.raises(ValueError, match="positive"):
        at_rated_supply(Interval(1.0, 1.0, 1.0), rated, during, tolerance)
