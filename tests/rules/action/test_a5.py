"""A5: two loops on one body, the dead band against both their excursions, by numbers set by hand."""

import pytest

from specgen.rules.engine import examine_pair, no_pair
from specgen.rules.pair_case import PairCase


def pair(make, up, down, *, error=0.3):
    """A heater 1.0 K above its setpoint at worst, and a compressor 0.8 K below its own."""
    warm = make.case("heater", "on_off", need={"setpoint": up}, settings=make.on_off(), error=error)
    cold = make.case("compressor", "on_off", need={"setpoint": down}, limits={"danger_low": None}, settings=make.on_off(), error=error)
    return PairCase(warm, cold)


# heater 1.0 K up, compressor 0.8 K down, two errors of 0.3 K: 2.4 K
@pytest.mark.parametrize(
    ("up", "down", "outcome", "apart"),
    [
        pytest.param("20 degC", "22.5 degC", "holds", False, id="wide enough"),
        pytest.param("20 degC", "22.3 degC", "holds", True, id="too narrow, interlocked"),
        pytest.param("20 degC", "20 degC", "broken", False, id="no dead band"),
        pytest.param("22 degC", "20 degC", "broken", False, id="overlapping"),
    ],
)
def test_outcome(make, up, down, outcome, apart):
    case = pair(make, up, down)
    (finding,) = examine_pair(case)
    assert (finding.rule, finding.scope, finding.weight) == ("A5", "pair", "must")
    assert finding.outcome == outcome
    assert case.needs_interlock is apart
    assert ("interlock in the hardware" in make.said(finding, case.raising).text) is apart


def test_the_margin_is_dead_band_over_both_excursions(make):
    case = pair(make, "20 degC", "24.8 degC")
    assert case.reach == pytest.approx(1.0 + 0.8 + 0.3 + 0.3)
    assert examine_pair(case)[0].margin == pytest.approx(4.8 / 2.4)


def test_ranges_count_and_not_the_setpoints_alone(make):
    warm = make.case("heater", "on_off", need={"setpoint": "20 degC", "range": "15 degC to 24 degC"}, settings=make.on_off())
    cold = make.case("compressor", "on_off", need={"setpoint": "30 degC", "range": "23 degC to 35 degC"}, settings=make.on_off())
    (finding,) = examine_pair(PairCase(warm, cold))
    assert finding.outcome == "broken"
    assert "overlap by 1 K" in make.said(finding, warm).text


def test_without_a_prediction_the_tolerance_counts(make):
    warm = make.case("heater", "on_off", need={"setpoint": "20 degC"}, error=make.unsized)
    cold = make.case("compressor", "on_off", need={"setpoint": "23 degC"}, error=make.unsized)
    assert PairCase(warm, cold).reach == pytest.approx(1.5 + 1.0)


def test_a_loop_without_a_counterpart_has_it_as_not_applying():
    assert [(finding.rule, finding.outcome) for finding in no_pair()] == [("A5", "does_not_apply")]
