"""Values to inject at site."""

import pytest

from specgen.sizing.candidate import Unsized
from specgen.sizing.injection import inject_values


def by_case(figures):
    return {figure.case: figure.value for figure in figures}


def test_platinum_at_its_values(loop, catalogue):
    """125.16 and 138.51 ohm: IEC 60751 table 1."""
    found = by_case(inject_values(loop(limits={"danger_high": "100 degC"}), catalogue))
    assert found == {"setpoint": pytest.approx(125.16, abs=0.005), "danger high": pytest.approx(138.51, abs=0.005)}
    need = {"range": "0 degC to 100 degC"}
    assert list(by_case(inject_values(loop(need=need), catalogue))) == ["lowest setpoint", "setpoint", "highest setpoint"]


def test_couple_with_its_terminals_at_25(loop, catalogue):
    """K at 200 degC, terminals at 25: 8.1385 - 1.0002 = 7.138 mV (seen table), not E(175)."""
    found = inject_values(loop(sensor={"kind": "thermocouple_K"}, need={"setpoint": "200 degC"}), catalogue)
    assert found[0].value * 1e3 == pytest.approx(7.138, abs=0.0006)
    assert found[0].dimension == "voltage"


def test_milliampere(loop, catalogue):
    """6 bar of 0 to 10 bar is 60 percent: 4 + 0.6 x 16 = 13.6 mA; 0-20 mA 12 mA; 2-10 V 6.8 V."""
    need = {"quantity": "pressure", "direction": "raise", "setpoint": "6 bar", "tolerance": "0.3 bar"}
    sensor = {"kind": "transmitter", "range": "0 bar to 10 bar", "accuracy": "0.5 percent"}
    for signal, expected, dimension in (("4-20 mA", 13.6e-3, "current"), ("0-20 mA", 12e-3, "current"), ("2-10 V", 6.8, "voltage")):
        found = inject_values(loop(sensor=sensor | {"signal": signal}, need=need), catalogue)
        assert (found[0].value, found[0].dimension) == (pytest.approx(expected), dimension)
    outside = inject_values(loop(sensor=sensor | {"signal": "4-20 mA"}, need=need, limits={"danger_high": "11 bar"}), catalogue)
    assert outside.because == "the danger high lies outside the transmitter's range 0 bar to 10 bar"
    assert inject_values(loop(sensor=sensor, need=need), catalogue).needs == ("sensor.signal",)


def test_thermistor(loop, catalogue):
    assert inject_values(loop(sensor={"kind": "ntc", "r25": "10 kohm"}), catalogue).needs == ("sensor.beta",)
    found = inject_values(loop(sensor={"kind": "ntc", "r25": "10 kohm", "beta": "3950 K"}, need={"setpoint": "50 degC"}), catalogue)
    assert found[0].value == pytest.approx(3588, abs=1)


def test_outside_the_function(loop, catalogue):
    assert isinstance(inject_values(loop(sensor={"kind": "thermocouple_T"}, need={"setpoint": "500 degC"}), catalogue), Unsized)
    assert isinstance(inject_values(loop(need={"setpoint": "900 degC"}), catalogue), Unsized)
