"""Starting values: the hardest case of the box, the half rule, the margins over all cases, and what somebody chose."""

import numpy as np
import pytest

from specgen.process.box_of import box_of
from specgen.sizing.candidate import Unsized
from specgen.sizing.starting_values import hardest_case, inside, start_of

VALVE = {"kind": "modulating_valve", "signal": "4-20 mA", "stroke_time": "10 s"}
HEATER = {"kind": "resistive_heater", "power": "6 kW", "voltage": "400 V", "phases": "3"}


def response(**changes):
    return {"response": {"change": "100 K", "time_constant": "30 min", "dead_time": "60 s", "rest_value": "25 degC", **changes}}


def started(loop, panel, plant, element=VALVE, sensor=None, choose=None, **times):
    changes = {key: value for key, value in (("sensor", sensor), ("choose", choose)) if value}
    declared = loop(element=element, plant=plant, **changes)
    return start_of(declared, hardest_case(box_of(declared, panel())), **times)


def figure(start, symbol):
    return next(f for f in start.figures if f.symbol == symbol)


def test_the_hardest_case_is_steepest_and_latest(loop, panel):
    declared = loop(element=HEATER, plant=response(change="80 K to 100 K", time_constant="20 min to 40 min", dead_time="20 s to 90 s"))
    found = hardest_case(box_of(declared, panel()))
    assert found.dynamics.slope == pytest.approx(100 * 1.21 / 1200)
    assert found.dynamics.theta == 90
    laziest = min(case.slope for case in found.others)
    assert laziest == pytest.approx(80 * 0.81 / 2400)


def test_duties_stay_inside():
    assert (inside(-0.3), inside(0.4), inside(1.7)) == (0.02, 0.4, 0.98)


def test_first_order(loop, panel):
    """SIMC: Kc = tau/(K 2 theta), Ti = min(tau, 8 theta)."""
    start = started(loop, panel, response())
    assert start.settings.proportional_band == pytest.approx(100 / 1800 * 2 * 60)
    assert start.settings.integral_time == pytest.approx(480)
    quick = started(loop, panel, response(time_constant="5 min"))
    assert quick.settings.integral_time == pytest.approx(300)


def test_half_of_the_sensors_lag_is_delay(loop, panel):
    """Half rule: 20 s of sensor lag give 10 s to the delay and 10 s to the time constant."""
    start = started(loop, panel, response(), sensor={"lag": "20 s"}, scan=0.5)
    delay, tau = 60 + 10 + 0.25, 1810
    assert start.settings.proportional_band == pytest.approx(100 / tau * 2 * delay)
    assert start.settings.integral_time == pytest.approx(8 * delay)
    assert figure(start, "θe").value == pytest.approx(delay)
    assert figure(start, "τ1").value == pytest.approx(tau)


def test_a_large_second_lag_gets_derivative_action(loop, panel):
    """Series Kc = tau/(K 2 theta), Ti = 8 theta, Td = lag, multiplied out."""
    start = started(loop, panel, response(dead_time="10 s", lag="80 s"))
    series_gain, series_time, series_derivative = 1800 / (100 * 20), 80.0, 80.0
    factor = 1 + series_derivative / series_time
    assert start.settings.gain == pytest.approx(series_gain * factor)
    assert start.settings.integral_time == pytest.approx(series_time * factor)
    assert start.settings.derivative_time == pytest.approx(series_derivative / factor)


def test_integrating(loop, panel):
    """Kc = 1/(k' 2 theta), Ti = 8 theta; Ms 1.70, GM 2.96, PM 46.9 degrees as published for it."""
    start = started(loop, panel, {"rates": {"with_output": "6 K/min", "without_output": "3 K/min", "dead_time": "20 s"}})
    assert start.settings.proportional_band == pytest.approx(0.15 * 40)
    assert start.settings.integral_time == pytest.approx(160)
    assert start.margins.sensitivity == pytest.approx(1.70, abs=0.01)
    assert start.margins.gain == pytest.approx(2.96, abs=0.01)
    assert start.margins.phase == pytest.approx(46.9, abs=0.1)


@pytest.mark.parametrize(("kind", "sensor_lag"), [(response(), None), (response(dead_time="10 s", lag="80 s"), "5 s")])
def test_figures_follow_from_what_they_name(loop, panel, kind, sensor_lag):
    """Every formula of the settings again from the inputs that its figure states."""
    start = started(loop, panel, kind, sensor={"lag": sensor_lag} if sensor_lag else None, scan=0.25, actuator=2.0)
    by = {f.symbol: {name: value for name, (value, _) in f.with_.items()} for f in start.figures}
    value = {f.symbol: f.value for f in start.figures}
    assert value["k'"] == pytest.approx(by["k'"]["K"] / by["k'"]["τ"])
    assert value["θe"] == pytest.approx(sum(by["θe"].values()))
    assert value["k1"] == pytest.approx(by["k1"]["k'"] * by["k1"]["τ"] / by["k1"]["τ1"])
    gain = "Kc'" if "Kc'" in value else "Kc"
    assert value[gain] == pytest.approx(1 / (by[gain]["k1"] * 2 * by[gain]["θe"]))
    time = "Ti'" if "Ti'" in value else "Ti"
    assert value[time] == pytest.approx(min(by[time]["τ1"], 8 * by[time]["θe"]))
    assert value["Xp"] == pytest.approx(1 / by["Xp"]["Kc"])
    if gain == "Kc'":
        given = by["Kc"]
        assert value["Kc"] == pytest.approx(given["Kc'"] * (1 + given["Td'"] / given["Ti'"]))
        assert value["Ti"] == pytest.approx(given["Ti'"] + given["Td'"])
        assert value["Td"] == pytest.approx(given["Td'"] / (1 + given["Td'"] / given["Ti'"]))


def test_margins_are_the_worst_of_the_steepest_and_the_laziest(loop, panel):
    """A capacity that may be eight times larger: integral action that suits the steep case swings in the lazy one."""
    start = started(loop, panel, {"rates": {"with_output": "1 K/min to 16 K/min", "without_output": "0.5 K/min to 8 K/min",
                                            "dead_time": "20 s"}})  # fmt: skip
    w = np.geomspace(1e-4, 1, 400_001)
    s = 1j * w
    gain, reset = start.settings.gain, start.settings.integral_time
    peaks, phases = [], []
    for slope in (0.4, 1.5 / 60):
        walked = gain * (1 + 1 / (reset * s)) * slope / s * np.exp(-20 * s)
        peaks.append(np.abs(1 / (1 + walked)).max())
        phases.append(180 + np.degrees(np.unwrap(np.angle(walked))[np.argmax(np.abs(walked) < 1)]))
    assert peaks[1] > peaks[0]
    assert start.margins.sensitivity == pytest.approx(max(peaks), rel=1e-3)
    assert start.margins.phase == pytest.approx(min(phases), abs=0.05)


def test_nothing_limits_the_gain(loop, panel):
    found = started(loop, panel, response(dead_time="0 s"))
    assert isinstance(found, Unsized)
    assert found.needs == ("plant.dead_time",)
    assert not isinstance(started(loop, panel, response(dead_time="0 s"), scan=0.25), Unsized)


def test_a_band_that_somebody_chose(loop, panel):
    """A tenth of the rule's band is ten times its gain: margins tell."""
    ruled = started(loop, panel, response())
    chosen = started(loop, panel, response(), choose={"proportional_band": "0.7 K"})
    assert chosen.settings.proportional_band == pytest.approx(0.7)
    assert chosen.settings.integral_time == ruled.settings.integral_time
    assert chosen.margins.gain == pytest.approx(ruled.margins.gain * 0.7 / ruled.settings.proportional_band, rel=1e-3)
    assert not chosen.stable
    named = {f.name: f for f in chosen.figures}
    assert named["proportional band, chosen"].source == "choose.proportional_band"
    assert named["proportional band, by the rule"].value == pytest.approx(ruled.settings.proportional_band)


@pytest.mark.parametrize(("pulse", "lag", "charged"), [("latched", None, 8.0), ("ramp", None, 8.0), ("ramp", "20 s", 0.0)])
def test_the_cycle_is_charged(loop, panel, pulse, lag, charged):
    """Duty 0.4 of a 16 s cycle: half of it; nothing where a ramp forms the pulse, a lag follows and the cycle is within the dead time."""
    plant = response(**({"lag": lag} if lag else {}))
    start = started(loop, panel, plant, element=HEATER, cycle_time=16.0, pulse=pulse)
    high = start.hardest.duty_high
    assert high == pytest.approx(40 / 81)
    assert start.charged == pytest.approx(charged)
    assert bool(start.assumptions) == (pulse == "latched")
