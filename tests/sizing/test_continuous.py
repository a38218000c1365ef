"""Analogue and three-point settings: signal, tuning with the actuator's delay, neutral zone."""

import pytest

from specgen.process.box_of import box_of
from specgen.sizing.candidate import Candidate, Unsized
from specgen.sizing.continuous import continuous_settings, three_point_settings
from specgen.sizing.device import DeviceChoice

RESPONSE = {"response": {"change": "80 K to 100 K", "time_constant": "30 min", "dead_time": "60 s", "rest_value": "25 degC"}}
RATES = {"rates": {"with_output": "3 K/min", "without_output": "1 K/min", "dead_time": "20 s"}}
DRIVE = {"kind": "variable_speed_pump", "power": "3 kW", "signal": "0-10 V", "lowest_speed": "20 percent", "ramp_time": "40 s"}
LAMP = {"kind": "infrared_lamp_heater", "power": "4 kW", "voltage": "400 V", "phases": "1"}
MOTOR = {"kind": "three_point_valve", "travel_time": "120 s", "min_pulse": "0.6 s"}
DEVICE = DeviceChoice("d", "", "analogue", (), 0)


def analogue(loop, panel, element, device="signal", plant=RESPONSE, chosen=DEVICE, **changes):
    declared = loop(element=element, plant=plant, **changes)
    return continuous_settings(Candidate("analogue", device), declared, panel(), box_of(declared, panel()), chosen)


def stepped(loop, panel, element=MOTOR, plant=RESPONSE, chosen=DEVICE, **changes):
    declared = loop(element=element, plant=plant, **changes)
    return three_point_settings(declared, panel(), box_of(declared, panel()), chosen)


def test_a_drive_with_its_ramp(loop, panel):
    """A tenth of 40 s and half a scan of 0.25 s add to the dead time; SIMC with 100 K at the steepest."""
    found = analogue(loop, panel, DRIVE)
    assert found.signal == "0-10 V"
    assert found.tuning.effective_delay == pytest.approx(60 + 4 + 0.125)
    assert found.tuning.proportional_band == pytest.approx(100 / 1800 * 2 * 64.125)
    assert (found.duty_low, found.duty_high) == (pytest.approx(0.4), pytest.approx(0.5))


def test_a_power_controller_has_no_travel_and_a_live_zero(loop, panel):
    found = analogue(loop, panel, LAMP, "power_controller")
    assert found.signal == "4-20 mA"
    assert found.tuning.effective_delay == pytest.approx(60.125)
    assert found.tuning.proportional_band == pytest.approx(100 * 1.21 / 1800 * 2 * 60.125)
    assert "element.signal" in {assumed.field for assumed in found.assumptions}


def test_the_neutral_zone_is_twice_a_pulse(loop, panel):
    """0.6 s of 120 s is half a percent of 100 K: 0.5 K, twice that."""
    found = stepped(loop, panel)
    assert (found.travel_step, found.neutral_zone) == (pytest.approx(0.005), pytest.approx(1.0))


def test_the_neutral_zone_is_a_step_of_the_measurement(loop, panel):
    assert stepped(loop, panel, sensor={"step": "2 K"}).neutral_zone == pytest.approx(2.0)


def test_a_pulse_that_is_not_declared(loop, panel):
    found = stepped(loop, panel, {"kind": "three_point_valve", "travel_time": "120 s"})
    assert found.neutral_zone == pytest.approx(2 * 100 * 0.01)
    assert "element.min_pulse" in {assumed.field for assumed in found.assumptions}


def test_an_integrating_plant_moves_for_one_effective_delay(loop, panel):
    """4 K/min over 20 s, a tenth of the travel and half a scan: that is what the whole travel does before it is seen."""
    found = stepped(loop, panel, plant=RATES, sensor={"step": "0.01 K"})
    delay = 20 + 12 + 0.125
    assert found.neutral_zone == pytest.approx(2 * (4 / 60 * delay) * 0.005)


def test_what_cannot_be_set(loop, panel):
    assert isinstance(analogue(loop, panel, DRIVE, plant=None), Unsized)
    assert isinstance(stepped(loop, panel, plant=None), Unsized)
    refused = Unsized("too small", ("element.power",))
    assert analogue(loop, panel, DRIVE, chosen=refused) == Unsized("no device: too small", ("element.power",))
    assert stepped(loop, panel, chosen=refused) == Unsized("no device: too small", ("element.power",))
    assert stepped(loop, panel, DRIVE).because == "the element does not travel"
    stepless = loop(element=MOTOR, plant=RESPONSE, sensor={"kind": "pt100"})
    assert three_point_settings(stepless, panel(), box_of(stepless, panel()), DEVICE).needs == ("sensor.step",)
    blind = {"response": {**RESPONSE["response"], "dead_time": "0 s"}}
    assert not isinstance(analogue(loop, panel, LAMP, "power_controller", plant=blind), Unsized), "half a scan is a delay"
