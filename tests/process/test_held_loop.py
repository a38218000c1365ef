"""The loop with a continuous output against small steps of the differential equations."""

from collections import deque
from math import inf

import pytest

from specgen.process.closed_loop import LoopState
from specgen.process.held_loop import averaged, hold_steps, own_delay, simulate_held, steady_hold
from specgen.process.loop_dynamics import Dynamics, modes_of
from specgen.process.loop_run import Band
from specgen.process.tuning import Settings, simc


def reference(plant, settings, start, load, horizon, parts):
    """Follow the loop in steps of a ``parts``-th of the effective delay (midpoint rule); returns highest, lowest, last value."""
    step = own_delay(plant, settings) / parts
    pipe = deque([0.0] * round(plant.theta / step))
    tau_rate = 0.0 if plant.is_integrating else 1 / plant.tau
    element, value, measured, integral = 0.0, start, start, 0.0
    highest, lowest, before = value, value, measured
    for _ in range(round(horizon / step)):
        rate = (measured - before) / step
        before = measured
        wanted = integral - settings.gain * (measured + settings.derivative_time * rate)
        pipe.append(min(max(wanted, 0.0), 1.0))
        output = pipe.popleft()
        change = -settings.gain / settings.integral_time * measured * step
        if not (wanted > 1 and change > 0) and not (wanted < 0 and change < 0):
            integral += change
        old = element
        element = output if plant.lag <= 0 else element + step * (output - element) / (plant.lag + step / 2)
        heat = output if plant.lag <= 0 else (old + element) / 2
        slope = plant.slope * (heat - load) - tau_rate * value
        middle = value + step / 2 * slope
        value += step * (plant.slope * (heat - load) - tau_rate * middle)
        measured = value if plant.sensor_lag <= 0 else measured + step * (middle - measured) / (plant.sensor_lag + step / 2)
        highest, lowest = max(highest, value), min(lowest, value)
    return highest, lowest, value


PLANTS = [
    pytest.param(Dynamics(0.1, 300, 12), 0.4, id="first order"),
    pytest.param(Dynamics(0.1, 300, 12, lag=9, sensor_lag=5), 0.4, id="lags"),
    pytest.param(Dynamics(0.05, inf, 7, lag=4), 0.3, id="integrating"),
    pytest.param(Dynamics(0.1, 300, 3, lag=40, sensor_lag=2), 0.5, id="derivative action"),
]


@pytest.mark.parametrize(("plant", "load"), PLANTS)
def test_start_from_rest_as_small_steps_follow_it(plant, load):
    """600 steps in an effective delay against the 20 of the method: extremes to 2 % of the way, the end closer."""
    settings = simc(plant.slope, plant.tau, plant.theta, (plant.lag, plant.sensor_lag))
    begin = -2.5 / settings.gain
    horizon = 60 * settings.theta_e
    run = simulate_held(plant, settings, LoopState(0.0, tuple(modes_of(plant).start(begin)), 0.0, 0.0, ()), load, horizon)
    highest, lowest, last = reference(plant, settings, begin, load, horizon, 600)
    assert run.highest == pytest.approx(highest, abs=0.01 * -begin)
    assert run.lowest == pytest.approx(lowest, abs=0.01 * -begin)
    assert run.values[-1] == pytest.approx(last, abs=0.004 * -begin)


@pytest.mark.parametrize(("plant", "load"), PLANTS)
def test_rest_at_the_setpoint_stays(plant, load):
    settings = simc(plant.slope, plant.tau, plant.theta, (plant.lag, plant.sensor_lag))
    run = simulate_held(plant, settings, steady_hold(plant, load), load, 20 * settings.theta_e)
    assert (run.highest, run.lowest) == pytest.approx((0, 0), abs=1e-9)
    assert run.outputs == pytest.approx([load] * len(run.outputs))


@pytest.mark.parametrize("theta", [0.0, 0.05, 0.2, 1.0, 7.3, 80.0])
@pytest.mark.parametrize("lag", [0.0, 10.0])
def test_steps_make_up_the_dead_time(theta, lag):
    """Whole steps and half of the hold's own; nothing is lost but dead times far below a step."""
    if theta == lag == 0:
        return
    plant, settings = Dynamics(0.1, 300, theta, lag=lag), Settings(0.1, 100)
    step, delay = hold_steps(plant, settings)
    assert abs((delay + 0.5) * step - theta) <= max(1e-9, own_delay(plant, settings) / 40)
    if theta > own_delay(plant, settings) / 80:
        assert (delay + 0.5) * step == pytest.approx(theta)
    assert step <= own_delay(plant, settings) / 14


def test_a_short_cycle_is_its_mean_with_its_delay():
    plant, settings = Dynamics(0.1, 300, 40), Settings(0.05, 200)
    assert averaged(plant, settings, 0.0, 0.4) == plant
    assert averaged(plant, settings, 2.0, 0.4).theta == pytest.approx(40.8)
    assert averaged(plant, settings, 6.0, 0.4) is None


def test_a_run_at_rest_in_the_band_ends_early():
    plant = Dynamics(0.1, 300, 12)
    settings = simc(0.1, 300, 12)
    run = simulate_held(plant, settings, steady_hold(plant, 0.4), 0.4, 1e5, Band(1, 1))
    assert run.times[-1] < 100
    assert run.time_to_band == 0.0


def test_a_plant_without_any_delay_is_refused():
    with pytest.raises(ValueError, match="neither dead time nor a lag"):
        hold_steps(Dynamics(0.1, 300, 0), Settings(0.1, 100))
