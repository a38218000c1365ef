"""The cycle time between contacts and pulses on one side, ripple and control on the other."""

from math import exp

import numpy as np
import pytest

from specgen.process.box_of import box_of
from specgen.sizing.candidate import Candidate, Unsized
from specgen.sizing.device import Contact, DeviceChoice
from specgen.sizing.measurement import MeasuringError
from specgen.sizing.time_proportioned import asked_duties, least_pulse, proportioned_settings

SERIES = (1, 2, 3, 5, 8, 10, 15, 20, 30, 45, 60, 90, 120, 180, 240, 300)
VALVE = {"kind": "solenoid_valve", "coil_power": "9 W", "voltage": "24 V", "capacity": "10 kW"}
ERROR = MeasuringError(0.3, 0.5)


def plant(change="100 K", tau="30 min", theta="60 s", rest="25 degC", **more):
    return {"response": {"change": change, "time_constant": tau, "dead_time": theta, "rest_value": rest, **more}}


def contacts(life, pull_in=0.02, drop_out=0.015):
    return DeviceChoice("d", "AC-1", "relay", (Contact("contact", "load", "c", 1.0, life, 600.0, pull_in, drop_out),), 1)


SOLID = DeviceChoice("s", "AC-51", "logic", (), 1)


def settled(loop, panel, device, kind="contactor", element=VALVE, response=None, house=None, **changes):
    declared = loop(element=element, plant=response or plant(), **changes)
    shop = panel(**({"house": house} if house else {}))
    box = box_of(declared, shop)
    return proportioned_settings(Candidate("time_proportioned", kind), declared, shop, box, device, ERROR)


def limit(bounds, rule):
    return next((bound.limit for bound in bounds if bound.rule == rule), None)


def test_contacts_take_the_longest_that_the_delay_allows(loop, panel):
    """Duty 0.4: half a cycle is charged, so that the cycle is at most the delay of 60 s and half a scan."""
    found = settled(loop, panel, contacts(1e9), need={"tolerance": "5 K"})
    assert limit(found.most_bounds, "C8") == pytest.approx(60.125)
    assert found.cycle_time == 60
    assert found.tuning.effective_delay == pytest.approx(60.125 + 30)
    assert found.tuning.delay_without_cycle == pytest.approx(60.125)
    assert found.operations_per_year == pytest.approx(4000 * 3600 / 60)
    assert found.contact_life == pytest.approx(1e9 / (4000 * 60))


def test_high_duty_waits_longer(loop, panel):
    """Duty 0.8: 0.8 of a cycle is charged."""
    found = settled(loop, panel, contacts(1e9), need={"tolerance": "5 K"}, response=plant("50 K"))
    assert limit(found.most_bounds, "C8") == pytest.approx(60.125 / 2 / 0.8)
    assert found.cycle_time == 30


def test_ripple_bounds_the_cycle(loop, panel):
    """A quarter of the tolerance, exact first-order ripple of the one duty of 0.4 about its mean, by a dense walk over cycles."""
    found = settled(loop, panel, contacts(1e9), need={"tolerance": "1 K"}, response=plant(tau="10 min"))
    t = np.linspace(0.1, 60, 600_000)
    a, x = t / 600, 0.4
    peak = 100 * (1 - np.exp(-x * a)) / (1 - np.exp(-a))
    side = np.maximum(peak - 100 * x, 100 * x - peak * np.exp(-(1 - x) * a))
    hand = t[np.argmax(side > 0.25)]
    assert limit(found.most_bounds, "C1") == pytest.approx(hand, rel=1e-3)
    assert found.cycle_time == max(step for step in SERIES if step <= hand)
    own = 100 * (1 - exp(-0.4 * found.cycle_time / 600)) / (1 - exp(-found.cycle_time / 600))
    assert found.ripple.above.value == pytest.approx(own - 40, rel=1e-6)


def test_solid_state_takes_the_shortest_that_pulses_allow(loop, panel):
    """A hundredth of the cycle is a half-wave of 10 ms: one second."""
    found = settled(loop, panel, SOLID, "ssr", need={"tolerance": "5 K"})
    assert (limit(found.least_bounds, "C4"), found.cycle_time) == (pytest.approx(1.0), 1)
    assert (found.contact_life, limit(found.least_bounds, "C3")) == (None, None)
    assert (found.shortest_on, found.shortest_off, found.least_pulse) == (pytest.approx(0.05), pytest.approx(0.05), 0.01)


def test_a_solenoid_wears_and_has_its_own_pulse_whatever_switches_it(loop, panel):
    """Behind a solid-state switch the valve itself still has a life and a least pulse: the longest cycle is taken."""
    element = {**VALVE, "operations_life": "1e6", "min_pulse": "2 s"}
    behind = DeviceChoice("s", "DC-13", "logic", (Contact("the valve", "element", "v", 0.4, 1e6, None, 0.0, 0.0),), 1)
    found = settled(loop, panel, behind, "ssr", element=element, need={"tolerance": "5 K"})
    assert found.least_pulse == 2
    assert limit(found.least_bounds, "C4") == pytest.approx(2 / 0.05)
    assert found.cycle_time == 60
    assert found.contact_life == pytest.approx(1e6 / (4000 * 60))


def test_life_asks_for_a_cycle(loop, panel):
    found = settled(loop, panel, contacts(2e6), need={"tolerance": "5 K"})
    assert limit(found.least_bounds, "C3") == pytest.approx(4000 * 3600 * 10 / 2e6)
    assert found.least == pytest.approx(72)
    assert found.cycle_time == 60, "C3 is a recommendation; control bounds the cycle"


def test_slow_contacts_ask_for_longer_pulses(loop, panel):
    slow = contacts(1e9, pull_in=0.4, drop_out=0.6)
    assert least_pulse(slow, loop(element=VALVE), panel(), 0.25, solid_state=False) == pytest.approx(1.0)
    assert least_pulse(contacts(1e9), loop(element=VALVE), panel(), 0.25, solid_state=False) == 0.25
    found = settled(loop, panel, slow, need={"tolerance": "5 K"})
    assert limit(found.least_bounds, "C4") == pytest.approx(20)


@pytest.mark.parametrize(
    ("change", "expected"), [("100 K", (0.05, 0.95)), ("1600 K", (0.025, 0.95)), ("41 K", (0.05, 0.9756)), ("10000 K", (0.01, 0.95))]
)
def test_the_duties_that_pulses_are_asked_at(loop, panel, change, expected):
    """40 K above rest: the declared ends, or 5 and 95 percent; what is within 1 percent of an end is carried over."""
    declared = loop(element=VALVE, plant=plant(change))
    assert asked_duties(box_of(declared, panel())) == (pytest.approx(expected[0]), pytest.approx(expected[1], abs=1e-4))


def test_pulses_that_are_held_back_ripple_more(loop, panel):
    """A cycle of 5 s at 4 percent asks for 0.2 s; what makes 1 s only does so every fifth cycle, and C1 sees the swing of that."""
    choose = {"mode": "time_proportioned", "cycle_time": "5 s", "because": "shown"}
    quick = settled(loop, panel, contacts(1e9, 0.0, 0.0), response=plant("1000 K"), choose=choose)
    slow = settled(loop, panel, contacts(1e9, 0.4, 0.6), response=plant("1000 K"), choose=choose)
    a = 25 / 1800
    swing = 1000 * (1 - exp(-0.04 * a)) * (1 - exp(-0.96 * a)) / (1 - exp(-a))
    assert slow.ripple.swing.value == pytest.approx(swing, rel=1e-6)
    assert slow.ripple.swing.value > 2 * quick.ripple.swing.value


def test_a_sudden_load_takes_the_place_of_half_the_delay(loop, panel):
    found = settled(loop, panel, contacts(1e9), need={"tolerance": "8 K", "sudden_load": "10 percent"}, response=plant(tau="60 min"))
    assert limit(found.most_bounds, "C8") is None
    deviation = found.tuning.load_deviation + found.ripple.above.value + 0.3
    assert found.tuning.load_deviation > 0
    assert deviation <= 8
    tight = settled(loop, panel, contacts(1e9), need={"tolerance": "1.5 K", "sudden_load": "10 percent"}, response=plant(tau="60 min"))
    assert tight.cycle_time < found.cycle_time


def test_a_choice_is_taken_as_it_is(loop, panel):
    choose = {"mode": "time_proportioned", "cycle_time": "77 s", "because": "shown"}
    found = settled(loop, panel, contacts(1e9), choose=choose)
    assert (found.cycle_time, found.chosen_by) == (77, "choose")
    assert (found.shortest_on, found.shortest_off) == (pytest.approx(0.05 * 77), pytest.approx(0.05 * 77))


def test_another_series(loop, panel):
    found = settled(loop, panel, contacts(1e9), need={"tolerance": "5 K"}, house={"cycle_time_series": ["7", "14", "56"]})
    assert found.cycle_time == 56


def test_what_cannot_be_set(loop, panel):
    declared = loop(element=VALVE)
    box = box_of(declared, panel())
    assert isinstance(proportioned_settings(Candidate("time_proportioned", "ssr"), declared, panel(), box, SOLID, ERROR), Unsized)
    warm = settled(loop, panel, SOLID, "ssr", response=plant(rest="70 degC"))
    assert "no case of the loop needs a part of full output" in warm.because
