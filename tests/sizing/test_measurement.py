"""Error of the measurement: published tolerance rows and hand sums."""

from math import hypot

import pytest

from specgen.sizing.candidate import Unsized
from specgen.sizing.measurement import measuring_error

# IEC 60751 tolerances [class, degC, K]: computed from the class formulas; A and B were seen written so
PLATINUM = [("A", 65, 0.28), ("B", 65, 0.625), ("A", 100, 0.35), ("B", 100, 0.80), ("B", 400, 2.30)]
# IEC 60584-1 classes [type, class, degC, K], the greater of a and b|t|; break points a/b as seen: K1 375, K2 333.3 degC
COUPLES = [
    ("K", "1", 200, 1.5), ("K", "1", 375, 1.5), ("K", "1", 1000, 4.0), ("K", "2", 333, 2.5), ("K", "2", 400, 3.0), ("J", "2", 750, 5.625),
    ("T", "1", 125, 0.5), ("T", "1", 200, 0.8), ("T", "3", -100, 1.5), ("E", "3", -200, 3.0), ("S", "1", 1100, 1.0), ("S", "1", 1400, 1.9),
    ("R", "2", 600, 1.5), ("R", "2", 1000, 2.5), ("B", "2", 800, 2.0), ("B", "3", 800, 4.0), ("B", "3", 1200, 6.0),
]  # fmt: skip


def figures(error):
    return {figure.symbol: figure for figure in error.figures}


def at(loop, sensor, temperature):
    return loop(sensor=sensor, need={"setpoint": f"{temperature} degC"})


@pytest.mark.parametrize(("name", "temperature", "kelvin"), PLATINUM)
def test_platinum_classes(loop, panel, catalogue, name, temperature, kelvin):
    error = measuring_error(at(loop, {"kind": "pt100", "class": name, "step": "0.1 K"}, temperature), panel(), catalogue)
    assert figures(error)["e_s"].value == pytest.approx(kelvin)
    assert "IEC 60751" in figures(error)["e_s"].source


@pytest.mark.parametrize(("kind", "name", "temperature", "kelvin"), COUPLES)
def test_couple_classes(loop, panel, catalogue, kind, name, temperature, kelvin):
    error = measuring_error(at(loop, {"kind": f"thermocouple_{kind}", "class": name, "step": "0.1 K"}, temperature), panel(), catalogue)
    assert figures(error)["e_s"].value == pytest.approx(kelvin)


def test_sums_by_hand(loop, panel, catalogue):
    """Class A at 65 degC 0.28 K, input 0.3 + 0.001 x 65 = 0.365 K, half a step 0.05 K: 0.4627 and 0.695 K."""
    error = measuring_error(loop(), panel(), catalogue)
    assert error.root_sum == pytest.approx(hypot(0.28, 0.365, 0.05))
    assert error.root_sum == pytest.approx(0.4627, abs=5e-5)
    assert error.sum == pytest.approx(0.695)
    assert figures(error)["e"].value == error.root_sum
    assert figures(error)["e_sum"].value == error.sum
    assert any("controller's input" in a.field for a in error.assumptions)


def test_the_worse_end_of_the_setpoints(loop, panel, catalogue):
    """Class A from -60 to 40 degC: 0.15 + 0.002 x 60 = 0.27 K at the lower end counts."""
    need = {"quantity": "temperature", "direction": "lower", "setpoint": "0 degC", "range": "-60 degC to 40 degC", "tolerance": "1.5 K"}
    error = measuring_error(loop(need=need), panel(), catalogue)
    assert figures(error)["e_s"].value == pytest.approx(0.27)
    assert figures(error)["e_s"].case == "at the lowest setpoint"
    # -60 degC lies outside what is remembered for film elements of class A
    assert any(a.value == "wire-wound" for a in error.assumptions)


def test_cold_junction_counts_by_the_slopes(loop, panel, catalogue):
    """NIST slopes [uV/K], from memory of the printed tables: S 6.0 at 25 degC and 10.2 at 600 degC, so 1 K shows as 0.59 K."""
    error = measuring_error(at(loop, {"kind": "thermocouple_S", "class": "1", "step": "0.1 K"}, 600), panel(), catalogue)
    assert figures(error)["e_j"].value == pytest.approx(6.0 / 10.2, abs=0.01)


def test_transmitter(loop, panel, catalogue):
    """0.5 percent of 10 bar is 5000 Pa, the input's 0.1 percent 1000 Pa, half of 0.01 bar 500 Pa."""
    sensor = {"kind": "transmitter", "range": "0 bar to 10 bar", "accuracy": "0.5 percent", "signal": "4-20 mA", "step": "0.01 bar"}
    need = {"quantity": "pressure", "direction": "raise", "setpoint": "6 bar", "tolerance": "0.3 bar"}
    error = measuring_error(loop(sensor=sensor, need=need), panel(), catalogue)
    assert error.root_sum == pytest.approx(hypot(5000, 1000, 500))
    assert error.sum == pytest.approx(6500)


@pytest.mark.parametrize(
    ("sensor", "needs"),
    [
        ({"kind": "pt100", "wires": "2"}, ("sensor.wires",)),
        ({"kind": "ntc"}, ("sensor.accuracy",)),
        ({"kind": "transmitter"}, ("sensor.range", "sensor.accuracy")),
        ({"kind": "transmitter", "range": "0 degC to 150 degC"}, ("sensor.accuracy",)),
        ({"kind": "transmitter", "accuracy": "1 percent"}, ("sensor.range",)),
        ({"kind": "thermocouple_J", "class": "3"}, ("sensor.class",)),
        ({"kind": "thermocouple_B", "class": "2"}, ("sensor.class",)),
    ],
)
def test_what_is_missing_is_named(loop, panel, catalogue, sensor, needs):
    error = measuring_error(loop(sensor={**sensor, "step": "0.1 K"}), panel(), catalogue)
    assert isinstance(error, Unsized)
    assert error.needs == needs


def test_thermistor_with_its_accuracy(loop, panel, catalogue):
    error = measuring_error(loop(sensor={"kind": "ntc", "accuracy": "0.5 K", "step": "0.1 K"}), panel(), catalogue)
    assert error.root_sum == pytest.approx(hypot(0.5, 0.365, 0.05))


def test_a_class_where_it_does_not_hold(loop, panel, catalogue):
    error = measuring_error(at(loop, {"kind": "pt100", "class": "AA", "step": "0.1 K"}, 300), panel(), catalogue)
    assert isinstance(error, Unsized)
    assert "class AA" in error.because


def test_the_step_of_a_setting_stands_in(loop, panel, catalogue):
    error = measuring_error(loop(sensor={"kind": "pt100", "class": "A"}), panel(), catalogue)
    assert figures(error)["e_q"].value == pytest.approx(0.05)
    assert any(a.field == "sensor.step" for a in error.assumptions)
    transmitter = {"kind": "transmitter", "range": "0 m to 4 m", "accuracy": "1 percent"}
    need = {"quantity": "level", "direction": "raise", "setpoint": "2 m", "tolerance": "0.1 m"}
    assert measuring_error(loop(sensor=transmitter, need=need), panel(), catalogue).needs == ("sensor.step",)


def test_a_thermometer_measures_no_pressure(loop, panel, catalogue):
    need = {"quantity": "pressure", "direction": "raise", "setpoint": "6 bar", "tolerance": "0.3 bar"}
    assert measuring_error(loop(sensor={"kind": "pt100"}, need=need), panel(), catalogue).needs == ("sensor.kind",)
