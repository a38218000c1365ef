"""Suppressors, drives and heat of contact devices."""

from math import pi, sqrt

import pytest

from specgen.model.traits import traits_of
from specgen.sizing.burden import analogue_drive
from specgen.sizing.candidate import Candidate
from specgen.sizing.controller import OutputSide
from specgen.sizing.device_choice import choose_device
from specgen.sizing.suppression import rc_leakage

HEATER = {"kind": "resistive_heater", "power": "6 kW", "voltage": "400 V", "phases": "3"}
SOLENOID = {"kind": "solenoid_valve", "coil_power": "9 W", "voltage": "24 V", "operations_life": "2.0e6"}


@pytest.fixture
def choose(loop, panel, catalogue):
    def run(device, element, **panel_changes):
        made = loop(element)
        return choose_device(Candidate("on_off", device), made, panel(**panel_changes), traits_of(made.element), catalogue)

    return run


def test_direct_current_takes_a_diode_that_lets_go_in_time(choose):
    found = choose("contactor", HEATER)
    assert [(s.across, s.part) for s in found.suppressors] == [("the coil of contactor class 9, d.c. coil", "diode with Zener diode")]


def test_alternating_current_by_what_the_rc_unit_leaks(choose):
    """100 nF at 230 V and 50 Hz: 7.23 mA, which is 6 percent of what 25 VA hold with (class 80) and 17 percent of 9 VA."""
    assert rc_leakage(230, 50) == pytest.approx(2 * pi * 50 * 100e-9 * 230)
    control = {"voltage": "230 V", "kind": "ac", "capacity": "5 A"}
    small = choose("contactor", HEATER, control_supply=control)
    large = choose("contactor", HEATER | {"power": "66 kW"}, control_supply=control)
    assert small.suppressors[0].part == "varistor"
    assert (large.suppressors[0].part, large.suppressors[0].leakage) == ("RC unit 100 nF, 100 ohm", rc_leakage(230, 50))


def test_a_coil_as_load_has_one_of_its_own(choose):
    found = choose("relay", SOLENOID)
    assert [s.across for s in found.suppressors] == ["the element"]
    mains = choose("relay", SOLENOID | {"voltage": "230 V"})
    # 9 W at 230 V: 39 mA and 10 percent more; 7.2 mA is too near
    assert mains.suppressors[-1].part == "varistor"


def test_heat_of_a_contactor_by_hand(choose):
    """Three poles of 1.5 W at 20 A carry 9.53 A, the coil takes 4 W: 3 x 1.5 x (9.526/20)^2 + 4 = 5.02 W."""
    found = choose("contactor", HEATER)
    current = 6000 / (sqrt(3) * 400) * 1.1
    assert found.loss == pytest.approx(3 * 1.5 * (current / 20) ** 2 + 4)
    assert next(f for f in found.figures if f.symbol == "P_v").value == found.loss
    assert [(d.what, d.hold) for d in found.drawn] == [("the coil of contactor class 9, d.c. coil", pytest.approx(4 / 24))]


def test_a_load_on_the_control_supply_is_drawn_from_it_but_warms_nothing_inside(choose):
    (drawn,) = choose("relay", SOLENOID | {"coil_inrush": "18 W"}).drawn
    assert (drawn.hold, drawn.inrush, drawn.inside) == (pytest.approx(0.375), pytest.approx(0.75), False)
    assert choose("relay", SOLENOID | {"voltage": "230 V"}).drawn == ()  # the controller's own relay carries it


def side(**given):
    return OutputSide("analogue", "A", 4, **given)


def test_current_loops_in_series_voltages_in_parallel():
    """Two inputs of 250 ohm: 500 ohm. Two of 2 kohm at 10 V: 10 mA."""
    (series,), missing = analogue_drive("4-20 mA", 250.0, 2, side(burden=600.0), "element.burden")
    assert (series.asked, series.able, series.dimension, missing) == (500.0, 600.0, "resistance", None)
    (parallel,), missing = analogue_drive("0-10 V", 2000.0, 2, side(drive=0.02), "element.burden")
    assert (parallel.asked, parallel.able, missing) == (pytest.approx(0.01), 0.02, None)


@pytest.mark.parametrize(
    ("signal", "resistance", "given", "needs"),
    [
        ("4-20 mA", None, {"burden": 500.0}, "element.burden"),
        ("4-20 mA", 250.0, {}, "controllers.outputs.burden"),
        ("0-10 V", 10e3, {}, "controllers.outputs.drive"),
    ],
)
def test_what_is_not_known_is_said(signal, resistance, given, needs):
    drives, missing = analogue_drive(signal, resistance, 1, side(**given), "element.burden")
    assert (drives, missing.needs) == ((), (needs,))
