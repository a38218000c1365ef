"""Settings of on-off control: window, differential, wear and start, each against the closed form."""

from math import exp, inf, log

import pytest

from specgen.process.box_of import box_of
from specgen.sizing.candidate import Unsized
from specgen.sizing.device import Contact, DeviceChoice
from specgen.sizing.measurement import MeasuringError
from specgen.sizing.on_off import on_off_settings, setting_step

# one case only: 60 K above and 40 K below the setpoint, half an hour, a minute
PLANT = {"response": {"change": "100 K", "time_constant": "30 min", "dead_time": "60 s", "rest_value": "25 degC"}}
VALVE = {"kind": "solenoid_valve", "coil_power": "9 W", "voltage": "24 V"}
FAN = {"kind": "fan", "power": "1 kW", "voltage": "400 V", "phases": "3", "starts_per_hour": "6"}
ERROR = MeasuringError(0.3, 0.5)


def device(life=None):
    return DeviceChoice("device", "AC-1", "relay", (Contact("contact", "load", "contact", 1.0, life, 600.0, 0.02, 0.02),), 1)


def settled(loop, panel, element=VALVE, life=None, error=ERROR, plant=PLANT, **changes):
    declared = loop(element=element, plant=plant, **changes)
    shop = panel()
    return on_off_settings(declared, shop, box_of(declared, shop), device(life), error)


def cycle(d, rise=60.0, fall=40.0, tau=1800.0, theta=60.0):
    high, low, q = d / 2, -d / 2, 1 - exp(-theta / tau)
    peak, trough = high + (rise - high) * q, low - (low + fall) * q
    on = theta + tau * log(1 + (high - trough) / (rise - high))
    off = theta + tau * log(1 + (peak - low) / (low + fall))
    return peak, trough, on, off


def narrowest(keeps):
    narrow, wide = 1e-9, 100.0
    for _ in range(100):
        middle = (narrow + wide) / 2
        narrow, wide = (narrow, middle) if keeps(middle) else (middle, wide)
    return wide


def bound(settings, rule):
    return next((bound.limit for bound in settings.least_bounds if bound.rule == rule), None)


def test_excursions_and_times_of_the_one_case(loop, panel):
    found = settled(loop, panel, need={"tolerance": "8 K"})
    peak, trough, on, off = cycle(found.differential)
    enforced = found.enforced
    assert (enforced.above.value, enforced.below.value) == (pytest.approx(peak), pytest.approx(-trough))
    assert enforced.swing.value == pytest.approx(peak - trough)
    assert enforced.period == pytest.approx(on + off)
    assert found.starts_per_hour == pytest.approx(3600 / (on + off))
    assert found.operations_per_year == pytest.approx(3600 / (on + off) * 4000)
    assert (found.natural.shortest_on.value, found.natural.shortest_off.value) == (pytest.approx(on), pytest.approx(off))


def test_least_by_starts_and_by_life(loop, panel):
    found = settled(loop, panel, element=FAN, life=160000.0, need={"tolerance": "8 K"})
    assert bound(found, "D3") == pytest.approx(narrowest(lambda d: sum(cycle(d)[2:]) >= 600), rel=2e-4)
    assert bound(found, "D5") == pytest.approx(narrowest(lambda d: sum(cycle(d)[2:]) >= 900), rel=2e-4), "4 an hour for ten years"
    assert found.least == max(bound(found, "D3"), bound(found, "D5"))
    assert found.contact_life == pytest.approx(160000 / found.operations_per_year)


def test_least_by_step_and_noise(loop, panel):
    found = settled(loop, panel, need={"tolerance": "20 K"}, sensor={"step": "0.2 K", "noise": "0.7 K"})
    assert (bound(found, "D1"), bound(found, "D2")) == (pytest.approx(0.2), pytest.approx(1.4))
    assert found.least == pytest.approx(1.4)


def test_least_by_run_and_rest(loop, panel):
    fan = {**FAN, "min_run": "6 min", "min_rest": "10 min", "starts_per_hour": "60"}
    found = settled(loop, panel, element=fan, need={"tolerance": "20 K"})
    limits = sorted(bound.limit for bound in found.least_bounds if bound.rule == "D6")
    hand = sorted([narrowest(lambda d: cycle(d)[2] >= 360), narrowest(lambda d: cycle(d)[3] >= 600)])
    assert limits == [pytest.approx(hand[0], rel=2e-4), pytest.approx(hand[1], rel=2e-4)]


@pytest.mark.parametrize("tolerance", [{"above": "4 K", "below": "9 K"}, {"above": "9 K", "below": "4 K"}])
def test_most_by_the_narrower_side(loop, panel, tolerance):
    found = settled(loop, panel, need={"tolerance": tolerance})
    above, below = (float(tolerance[side].split()[0]) - 0.3 for side in ("above", "below"))
    hand = narrowest(lambda d: cycle(d)[0] > above or -cycle(d)[1] > below)
    assert found.most == pytest.approx(hand, rel=2e-4)
    assert found.most_bound.rule == "D4"


def test_a_conflict_takes_the_least_and_keeps_the_window(loop, panel):
    found = settled(loop, panel, element=FAN, need={"tolerance": "2.5 K"})
    assert found.least > found.most
    assert found.differential == pytest.approx(0.2 * -(-found.least // 0.2))


def test_defrosts_are_starts(loop, panel):
    compressor = {"kind": "fixed_speed_compressor", "current": "5 A", "voltage": "400 V", "phases": "3", "min_run": "60 s",
                  "min_rest": "60 s", "starts_per_hour": "6", "defrost": {"per_day": "24", "duration": "10 min"}}  # fmt: skip
    found = settled(loop, panel, element=compressor, need={"tolerance": "20 K"})
    assert bound(found, "D3") == pytest.approx(narrowest(lambda d: sum(cycle(d)[2:]) >= 3600 / 5), rel=2e-4), "one of six is a defrost's"
    assert found.starts_per_hour == pytest.approx(found.enforced.starts_per_hour.value + 1)
    too_many = settled(loop, panel, element={**compressor, "defrost": {"per_day": "144", "duration": "5 min"}}, need={"tolerance": "20 K"})
    assert bound(too_many, "D3") == inf


def test_without_an_error_nothing_bounds_it_above(loop, panel):
    found = settled(loop, panel, error=Unsized("unknown"), need={"tolerance": "8 K"})
    assert (found.most, found.most_bound) == (inf, None)


def test_what_cannot_be_set(loop, panel):
    assert isinstance(settled(loop, panel, plant=None), Unsized)
    cold = {"response": {**PLANT["response"], "change": "39 K"}}
    assert "cannot switch" in settled(loop, panel, plant=cold).because
    declared = loop(element=VALVE, plant=PLANT)
    none = on_off_settings(declared, panel(), box_of(declared, panel()), Unsized("too small", ("element.power",)), ERROR)
    assert none == Unsized("no device: too small", ("element.power",))


def test_the_step_of_a_setting(loop, panel):
    shop = panel(house={"setting_step": {"temperature": "0.5 K"}})
    assert setting_step(loop(), shop) == 0.5
    transmitter = {"kind": "transmitter", "range": "0 m3/h to 10 m3/h", "signal": "4-20 mA", "step": "0.1 m3/h"}
    flow = loop(need={"quantity": "flow", "setpoint": "5 m3/h", "tolerance": "1 m3/h"}, sensor=transmitter, element=VALVE)
    assert setting_step(flow, shop) == pytest.approx(0.1 / 3600)
    stepless = {key: value for key, value in transmitter.items() if key != "step"}
    silent = loop(need={"quantity": "flow", "setpoint": "5 m3/h", "tolerance": "1 m3/h"}, sensor=stepless, element=VALVE)
    assert setting_step(silent, shop) is None


def test_the_first_rise(loop, panel):
    found = settled(loop, panel, need={"tolerance": "8 K"})
    # from 25 degC to 57: 60 s, then 32 K of 100
    assert found.warm_up == pytest.approx(60 + 1800 * log(100 / 68))
