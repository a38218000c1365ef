"""The record as the contract has it: every key, no other, nothing null, nothing that is not finite."""

import json
from math import inf, isfinite, nan

import pytest
from hypothesis import given
from hypothesis import strategies as st

from specgen.core.quantity import Unit
from specgen.design.record_loop import UNITS, present
from specgen.design.rounding import in_unit, rounded

LOOP = {"tag", "service", "area", "unit", "source", "verdict", "mode", "action", "because", "output", "settings", "predicted", "faults",
        "inject", "rules", "alternatives", "assumptions", "firmness", "missing", "basis"}  # fmt: skip
SETTINGS = {"differential", "placement", "cycle_time", "proportional_band", "integral_time", "derivative_time", "minimum_on", "minimum_off",
            "neutral_zone", "signal", "on_sensor_fault"}  # fmt: skip
PREDICTED = {"above", "below", "swing", "switch_on", "switch_off", "period", "starts_per_hour", "shortest_on", "shortest_off", "duty_low",
             "duty_high", "operations_per_year", "contact_life", "gain_margin", "phase_margin", "peak_sensitivity", "load_deviation",
             "measuring_error", "overshoot", "time_to_band", "opening_low", "opening_high"}  # fmt: skip
OUTPUT = {"device", "designation", "rating", "current", "loss", "controller_output", "heat_sink"}


@pytest.fixture(scope="module")
def record(make):
    other = make.compressor.replace("TIC-2", "TIC-3") + "choose: {mode: time_proportioned, because: Shown.}\n"
    texts = {"loops/a.yml": make.steady, "loops/b.yml": make.compressor + "---\n" + other, "loops/c.yml": make.steady + "nonsense: 1\n"}
    return make.record_of(make.whole(texts))


def test_the_whole(record):
    assert set(record) == {"format", "made_by", "loops", "panel", "schedules", "open_points", "problems"}
    assert record["format"] == "specgen-record/1"
    assert set(record["made_by"]) == {"version", "rules", "catalogue"}
    assert set(record["schedules"]) >= {"outputs", "parts", "protection", "conductors"}


def test_a_loop_has_every_key_and_no_other(record):
    for row in record["loops"]:
        assert LOOP - {"firmness"} <= set(row) <= LOOP | {"limiter"}
        assert set(row["settings"]) <= SETTINGS
        assert set(row["predicted"]) <= PREDICTED
        assert {"device", "controller_output"} <= set(row["output"]) <= OUTPUT
        assert set(row["source"]) == {"file", "line"}
        for alternative in row["alternatives"]:
            assert set(alternative) == {"mode", "device", "chosen", "ruled_out_by", "predicted", "text"}
            assert bool(alternative["ruled_out_by"]) != alternative["chosen"]
        for rule in row["rules"]:
            assert set(rule) == {"rule", "weight", "outcome", "text", "needs"}
            assert rule["text"]
            assert "{" not in rule["text"]
        for point in row["inject"]:
            assert set(point) == {"at", "value", "unit"}
            assert point["unit"] in ("ohm", "mV", "mA")


def test_where_each_loop_stands(record):
    assert [(row["tag"], row["source"]["file"], row["source"]["line"]) for row in record["loops"]] == [
        ("TIC-1", "loops/a.yml", 1), ("TIC-2", "loops/b.yml", 1), ("TIC-3", "loops/b.yml", 9),
    ]  # fmt: skip
    assert [(problem["file"], problem["severity"]) for problem in record["problems"]] == [("loops/c.yml", "error")]


def test_a_held_loop_keeps_its_figures(record):
    held = next(row for row in record["loops"] if row["tag"] == "TIC-3")
    assert (held["verdict"], held["mode"]) == ("held", "time_proportioned")
    assert held["settings"]["cycle_time"] > 0
    assert held["predicted"]["swing"] > 0
    assert "TIC-3" in {row["loop"] for row in record["schedules"]["outputs"]}


def test_units_are_units(record):
    for row in record["loops"]:
        assert row["unit"] == "degC"
        for figure in row["basis"]:
            assert figure["unit"] in {*UNITS.values(), "degC", "K", "K/s", "1/K"}, figure


def test_it_reads_back(record, make):
    assert json.loads(make.dump(record)) == record


@given(st.floats(allow_nan=False, allow_infinity=False))
def test_nine_digits(value):
    found = rounded(value)
    assert isfinite(found)
    assert abs(found - value) <= 5e-9 * abs(value) * (1 + 1e-6)
    assert rounded(found) == found
    assert not str(found).startswith("-0.0") or found != 0


@pytest.mark.parametrize("value", [inf, -inf, nan])
def test_what_is_not_finite_is_refused(value):
    with pytest.raises(ValueError, match="finite, or absent"):
        rounded(value)


def test_in_the_loops_unit():
    assert in_unit(60.0, Unit("degF", 1.8, 32.0)) == 140.0
    assert in_unit(1 / 3600, Unit("m3/h", 3600.0)) == 1.0


def test_what_is_not_there_is_absent():
    assert present({"a": 0.0, "b": None, "c": "", "d": False}) == {"a": 0.0, "c": "", "d": False}
