"""What controller and actuator add: the slowest scan, the least favourable pulse, a tenth of the travel."""

import pytest

from specgen.sizing.actuator import actuator_delay
from specgen.sizing.scan import scan_and_pulse

VALVE = {"kind": "modulating_valve", "signal": "4-20 mA", "stroke_time": "60 s"}
MOTOR = {"kind": "three_point_valve", "travel_time": "120 s"}
DRIVE = {"kind": "variable_speed_fan", "power": "3 kW", "signal": "4-20 mA", "lowest_speed": "20 percent", "voltage": "400 V",
         "phases": "3", "ramp_time": "5 s to 20 s"}  # fmt: skip


@pytest.mark.parametrize(
    ("controllers", "expected"),
    [
        ([], (0.25, "latched")),
        ([{"name": "a"}], (0.25, "latched")),
        ([{"name": "a", "scan": "100 ms", "pulse": "ramp"}], (0.1, "ramp")),
        ([{"name": "a", "scan": "100 ms", "pulse": "ramp"}, {"name": "b", "scan": "1 s", "pulse": "latched"}], (1.0, "latched")),
    ],
)
def test_slowest_and_least_favourable(panel, controllers, expected):
    assert scan_and_pulse(panel(controllers=controllers)) == expected


TRAVELS = [(VALVE, 6.0, "stroke_time"), (MOTOR, 12.0, "travel_time"), (DRIVE, 2.0, "ramp_time")]


@pytest.mark.parametrize(("element", "delay", "field"), TRAVELS)
def test_a_tenth_of_the_longest_travel(loop, element, delay, field):
    found, figures, assumptions = actuator_delay(loop(element=element))
    assert found == pytest.approx(delay)
    assert [figure.value for figure in figures] == [pytest.approx(delay)]
    assert [assumed.field for assumed in assumptions] == [f"element.{field}"]


def test_nothing_travels(loop):
    assert actuator_delay(loop()) == (0.0, (), ())
