"""A stuck output against the loop's dangers, from the worst peak of normal running."""

from math import log

import pytest

from specgen.process.box_of import box_of
from specgen.sizing.candidate import Candidate, Unsized
from specgen.sizing.device import DeviceChoice
from specgen.sizing.measurement import MeasuringError
from specgen.sizing.normal_running import normal_running
from specgen.sizing.on_off import on_off_settings
from specgen.sizing.settings import ContinuousSettings, Tuning
from specgen.sizing.stuck import faults_of, with_times
from specgen.sizing.time_proportioned import proportioned_settings

HEATER = {"kind": "resistive_heater", "power": "6 kW", "voltage": "400 V", "phases": "3"}
VALVE = {"kind": "solenoid_valve", "coil_power": "9 W", "voltage": "24 V"}
RESPONSE = {"response": {"change": "100 K", "time_constant": "30 min", "dead_time": "60 s", "rest_value": "15 degC to 25 degC"}}
RATES = {"rates": {"with_output": "1 K/min to 2 K/min", "without_output": "0.5 K/min to 1 K/min", "dead_time": "20 s"}}
NOT_SET = Unsized("nothing is set")


def timed(loop, panel, plant=RESPONSE, element=HEATER, settings=NOT_SET, **changes):
    declared = loop(element=element, plant=plant, **changes)
    box = box_of(declared, panel())
    return with_times(faults_of(declared, box), declared, box, settings)


def test_heating_stuck_on(loop, panel):
    """At +10 percent from 25 degC to 146; from 66.5 on, the tolerance, where nothing is predicted."""
    found = timed(loop, panel, limits={"danger_high": "95 degC", "spoils_high": "75 degC"}).on
    assert found.settles_at == pytest.approx(146)
    assert (found.passes_high, found.passes_low, found.passes) == (True, None, True)
    assert found.time_to_danger == pytest.approx(1800 * log((146 - 66.5) / (146 - 95)))
    assert found.time_to_spoil == pytest.approx(1800 * log((146 - 66.5) / (146 - 75)))


def test_heating_stuck_off(loop, panel):
    found = timed(loop, panel, limits={"danger_low": "40 degC", "spoils_low": "10 degC"}).off
    assert found.settles_at == pytest.approx(15)
    assert (found.passes_high, found.passes_low) == (None, True)
    assert found.time_to_danger == pytest.approx(1800 * log((63.5 - 15) / (40 - 15)))
    assert found.time_to_spoil is None, "it settles above"


@pytest.mark.parametrize(("danger", "passes"), [("145.9 degC", True), ("146.1 degC", False)])
def test_at_the_danger_itself(loop, panel, danger, passes):
    found = timed(loop, panel, limits={"danger_high": danger}).on
    assert found.passes is passes
    assert (found.time_to_danger is not None) == passes, "what is not reached has no time"


def test_cooling_mirrors_it(loop, panel):
    """Rests at 15 to 25 degC, 30 K of cooling: stuck on to -15, stuck off to 25."""
    plant = {"response": {**RESPONSE["response"], "change": "30 K"}}
    need = {"direction": "lower", "setpoint": "6 degC", "range": "4 degC to 8 degC"}
    limits = {"danger_low": "-5 degC", "danger_high": "20 degC", "spoils_high": "12 degC"}
    found = timed(loop, panel, plant, VALVE, need=need, limits=limits)
    assert (found.on.settles_at, found.off.settles_at) == (pytest.approx(-15), pytest.approx(25))
    assert (found.on.passes_low, found.on.passes_high, found.off.passes_high) == (True, None, True)
    assert found.on.time_to_danger == pytest.approx(1800 * log((2.5 + 15) / (-5 + 15)))
    assert found.off.time_to_danger == pytest.approx(1800 * log((25 - 9.5) / (25 - 20)))
    assert found.off.time_to_spoil == pytest.approx(1800 * log((25 - 9.5) / (25 - 12)))


def test_a_plant_that_does_not_settle_reaches_every_danger(loop, panel):
    """Resistive: at +10 percent the sum of the speeds is 1.21 times as large, less the fastest fall back."""
    found = timed(loop, panel, RATES, limits={"danger_high": "95 degC", "danger_low": "40 degC"})
    assert (found.on.settles_at, found.on.passes_high) == (None, True)
    fastest = max(1.21 * (2 + fall) - fall for fall in (0.5, 1.0)) / 60
    assert found.on.time_to_danger == pytest.approx((95 - 66.5) / fastest)
    assert found.off.time_to_danger == pytest.approx((63.5 - 40) / (1 / 60))
    assert timed(loop, panel, RATES).on.passes is False, "no danger is declared"


def test_from_the_peak_of_the_cycle(loop, panel):
    declared = loop(element=VALVE, plant=RESPONSE, limits={"danger_high": "95 degC"}, need={"tolerance": "20 K"})
    box = box_of(declared, panel())
    settings = on_off_settings(declared, panel(), box, DeviceChoice("d", "AC-15", "relay", (), 1), MeasuringError(0.3, 0.5))
    found = with_times(faults_of(declared, box), declared, box, settings).on
    assert found.time_to_danger == pytest.approx(1800 * log((125 - 65 - settings.enforced.above.value) / (125 - 95)))


def test_normal_running_beyond_the_danger_takes_no_time(loop, panel):
    assert timed(loop, panel, need={"tolerance": "35 K"}, limits={"danger_high": "95 degC"}).on.time_to_danger == 0


def test_no_plant(loop, panel):
    assert isinstance(timed(loop, panel, None), Unsized)


def tuning(overshoot):
    made = {"load_deviation": None, "overshoot": overshoot, "time_to_band": None}
    return Tuning(0.1, 10.0, 300.0, 0.0, 30.0, 30.0, 3.0, 60.0, 1.6, stable=True, **made)


@pytest.mark.parametrize(
    ("need", "overshoot", "low", "high"),
    [
        ({}, None, 63.5, 66.5),  # nothing is predicted: the tolerance
        ({"overshoot": "4 K"}, None, 63.5, 69.0),  # nor an overshoot: what is allowed
        ({"overshoot": "4 K"}, 2.5, 63.5, 67.5),  # the predicted one
        ({"range": "60 degC to 70 degC"}, 2.5, 58.5, 72.5),
        ({"direction": "lower", "overshoot": "4 K"}, 2.5, 62.5, 66.5),  # a loop that lowers overshoots downwards
        ({"tolerance": {"above": "3 K", "below": "1 K"}}, None, 64.0, 68.0),
    ],
)
def test_how_far_normal_running_reaches(loop, need, overshoot, low, high):
    declared = loop(need=need, element={"kind": "modulating_valve", "signal": "4-20 mA", "stroke_time": "10 s"})
    reach = normal_running(declared, ContinuousSettings("4-20 mA", tuning(overshoot), 0.1, 0.9))
    assert (reach.low, reach.high) == (pytest.approx(low), pytest.approx(high))


def test_a_sudden_load_belongs_to_normal_running(loop, panel):
    reach = []
    for more in ({}, {"sudden_load": "10 percent"}):
        declared = loop(element=HEATER, plant=RESPONSE, need={"tolerance": "12 K", **more})
        box = box_of(declared, panel())
        device = DeviceChoice("s", "AC-51", "logic", (), 1)
        found = proportioned_settings(Candidate("time_proportioned", "ssr"), declared, panel(), box, device, MeasuringError(0.3, 0.5))
        reach.append(normal_running(declared, found))
        assert reach[-1].low == pytest.approx(65 - found.ripple.below.value - (found.tuning.load_deviation or 0.0))
    assert reach[1].low < reach[0].low
