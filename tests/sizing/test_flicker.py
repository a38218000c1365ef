"""What a load's switching does to a public network, by hand, at the reference and at a declared impedance."""

from math import hypot, inf, sqrt

import pytest

from specgen.sizing.candidate import Unsized
from specgen.sizing.flicker import Flicker, OutOfScope, flicker_of

SINGLE = {"kind": "resistive_heater", "power": "2 kW", "voltage": "230 V", "phases": "1"}
BETWEEN = {"kind": "resistive_heater", "power": "2 kW", "voltage": "400 V", "phases": "1"}
THREE = {"kind": "resistive_heater", "power": "6 kW", "voltage": "400 V", "phases": "3"}
MOTOR = {"kind": "fan", "power": "1.5 kW", "voltage": "400 V", "phases": "3", "starts_per_hour": "10"}
COMPRESSOR = {
    "kind": "fixed_speed_compressor", "current": "4 A", "voltage": "400 V", "phases": "3", "min_run": "180 s", "min_rest": "120 s",
    "starts_per_hour": "6",
}  # fmt: skip


@pytest.fixture
def find(loop, panel):
    def found(element, **supply):
        return flicker_of(loop(element), panel(supply={"network": "public", **supply}))

    return found


def test_to_neutral_over_line_and_neutral(find):
    """2 kW at 230 V takes 2000/230 (U/230) at U = 400/sqrt(3): over 0.24 + 0.16 ohm that is 0.4 x 2000/230^2 whatever U."""
    found = find(SINGLE)
    assert found.change == pytest.approx(0.4 * 2000 / 230**2)
    assert found.shortest == pytest.approx(71.1, abs=0.1)
    assert found.is_single


def test_between_lines_over_both(find):
    assert find(BETWEEN).change == pytest.approx(0.48 * 2000 / 400**2)


def test_three_phases_over_one_line(find):
    """6 kW: 8.66 A a line over 0.24 ohm, of 231 V: 0.9 percent."""
    found = find(THREE)
    assert found.change == pytest.approx(6000 / (sqrt(3) * 400) * 0.24 / (400 / sqrt(3)))
    assert not found.is_single


def test_a_declared_impedance_is_divided_as_the_reference_is(find):
    """0.6 ohm for line and neutral: 0.6 x 0.24/0.40 = 0.36 ohm a line."""
    assert find(SINGLE, impedance="0.6 ohm").change == pytest.approx(0.6 * 2000 / 230**2)
    assert find(THREE, impedance="0.6 ohm").change == pytest.approx(6000 / (sqrt(3) * 400) * 0.36 / (400 / sqrt(3)))
    assert not find(THREE, impedance="0.6 ohm").assumptions
    assert find(THREE).assumptions[0].field == "supply.impedance"


def test_a_motors_start_is_six_times_its_current_over_the_whole_impedance(find):
    found = find(COMPRESSOR)
    assert found.change == pytest.approx(6 * 4 * hypot(0.24, 0.15) / (400 / sqrt(3)))
    assert found.starts
    assert found.most == pytest.approx(0.04)


def test_a_heaters_change_is_steady(find):
    assert find(SINGLE).most == pytest.approx(0.033)


def test_a_change_beyond_what_is_allowed_has_no_cycle(find):
    """3 kW over 0.7 ohm: 0.7 x 3000/230^2 = 3.97 percent, steadily."""
    found = find({**SINGLE, "power": "3 kW"}, impedance="0.7 ohm")
    assert found.change > found.most
    assert found.shortest == inf


@pytest.mark.parametrize(
    ("element", "supply", "said"),
    [
        pytest.param(SINGLE, {"network": "private"}, "private", id="private"),
        pytest.param({**SINGLE, "power": "4 kW"}, {}, "16 A", id="17.4 A"),
        pytest.param(SINGLE, {"frequency": "60 Hz"}, "50 Hz", id="60 Hz"),
        pytest.param({**THREE, "voltage": "208 V"}, {"voltage": "208 V"}, "220 V", id="120 V lamps"),
        pytest.param({"kind": "solenoid_valve", "coil_power": "10 W", "voltage": "24 V"}, {}, "control supply", id="24 V"),
    ],
)
def test_what_the_limits_do_not_cover(find, element, supply, said):
    found = find(element, **supply)
    assert isinstance(found, OutOfScope)
    assert said in found.because


def test_a_load_that_fits_no_voltage_is_an_open_point(find):
    assert isinstance(find({**SINGLE, "voltage": "300 V"}), Unsized)


def test_the_figures_carry_the_sum(find):
    found = find(SINGLE)
    assert isinstance(found, Flicker)
    figures = {figure.symbol: figure for figure in found.figures_at(71.1)}
    assert figures["d"].value == found.change
    assert figures["Plt"].value == pytest.approx(0.65, abs=1e-3)
    assert figures["T_f"].value == found.shortest


def test_a_fan_starts_too(find):
    assert find(MOTOR).starts
