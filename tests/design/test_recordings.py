"""A loop whose plant is a recorded step test: from a folder to its decision, and every way in which that can fail."""

import json
import os
from math import exp

import pytest

from specgen.design.project import load_design
from specgen.design.record import dump, record_of
from specgen.design.recordings import inside

PANEL = """
panel: {reference: P, title: Step tests, revision: A, status: for review, date: 2026-01-01}
supply: {voltage: 400 V, phases: 3, frequency: 50 Hz}
enclosure: {height: 1800 mm, width: 800 mm, depth: 400 mm, ambient: 5 degC to 35 degC}
house: {after_power_return: resume}
"""
LOOP = """
tag: TIC-101
service: cabinet, air
need: {quantity: temperature, direction: %(direction)s, setpoint: 65 degC, tolerance: 2.5 K}
plant:
  step_test: {file: %(file)s, time: t_s, output: out_percent, value: %(value)s%(more)s}
sensor: {kind: pt100, class: A, wires: 4, step: 0.1 K, noise: 0.1 K%(sensor)s}
element: {kind: resistive_heater, power: 9 kW, voltage: 400 V, phases: 3, needs: [airflow]}
limits: {danger_high: 95 degC, on_sensor_fault: off}
"""
GAIN, TAU, THETA, REST = 130.0, 600.0, 25.0, 20.0


def course(t, lag=0.0):
    """A cabinet at rest at 20 percent, raised to 70 at 100 s; seen through a sensor's lag where it has one (textbook's formulas)."""
    since = t - 100 - THETA
    if since <= 0:
        return REST + 0.2 * GAIN
    slow = exp(-since / TAU)
    share = 1 - slow if lag == 0 else 1 - (TAU * slow - lag * exp(-since / lag)) / (TAU - lag)
    return REST + 0.2 * GAIN + 0.5 * GAIN * share


def rows(value=course, header="t_s,out_percent,pv_degC", end=4000):
    return "\n".join([header, *(f"{t},{20 if t < 100 else 70},{value(t):.2f}" for t in range(0, end, 10))])


def project(folder, recording=None, at="data/tic-101.csv", **changes):
    loops = folder / "loops"
    loops.mkdir()
    (loops / "panel.yml").write_text(PANEL, encoding="utf-8")
    said = {"file": "data/tic-101.csv", "value": "pv_degC", "more": ", supply: 400 V", "sensor": "", "direction": "raise", **changes}
    (loops / "a.yml").write_text(LOOP % said, encoding="utf-8")
    if recording is not None:
        path = loops / at
        path.parent.mkdir(parents=True, exist_ok=True)
        path.write_text(recording, encoding="utf-8")
    return load_design(folder)


def codes(design):
    return sorted((problem.code, problem.span.file) for problem in design.problems)


def test_a_recorded_loop_is_decided(tmp_path):
    design = project(tmp_path, rows())
    assert not design.problems
    decided = design.loops[0]
    assert decided.read.fitted is not None
    ranges = decided.read.fitted.ranges
    for name, truth in {"change": GAIN, "time_constant": TAU, "dead_time": THETA, "rest_value": REST}.items():
        assert ranges[name].low <= truth <= ranges[name].high, name
        assert ranges[name].high - ranges[name].low < 0.1 * truth, name
    # a heater 10 percent over its supply's voltage gives 1.21 of its change; y_off + change is where it settles
    assert decided.decision.chosen.case.faults.on.settles_at == pytest.approx(REST + 1.21 * GAIN, rel=0.005)
    assert decided.verdict == "meets"
    assert decided.decision.chosen.case.candidate.mode == "time_proportioned"


def test_the_basis_shows_the_fit_and_the_record_is_whole(tmp_path):
    design = project(tmp_path, rows())
    record = json.loads(dump(record_of(design)))
    basis = record["loops"][0]["basis"]
    fitted = {line["symbol"]: line for line in basis if "loops/data/tic-101.csv" in line["source"]}
    assert {"K", "τ", "θ", "y_off", "s", "ρ"} <= set(fitted)
    assert fitted["τ"]["result"] == pytest.approx(TAU, rel=0.01)
    assert fitted["τ"]["unit"] == "s"
    assert "least" in fitted["τ"]["with"]
    assert "most" in fitted["τ"]["with"]
    # rounded to 0.01 K: a uniform error of 0.01/sqrt(12)
    assert fitted["s"]["result"] == pytest.approx(0.01 / 12**0.5, rel=0.2)


def test_the_recording_is_among_the_sources(tmp_path):
    design = project(tmp_path, rows())
    assert {source.name: source.content for source in design.sources}["loops/data/tic-101.csv"] == rows().encode()


def test_the_sensors_lag_is_taken_out(tmp_path):
    """Seen through 20 s of sensor, the true value's time constant and dead time come out; without it the delay is too long."""
    seen = rows(lambda t: course(t, lag=20.0))
    known = project(tmp_path, seen, sensor=", lag: 20 s").loops[0].read.fitted.ranges
    assert known["time_constant"].low <= TAU <= known["time_constant"].high
    assert known["dead_time"].low <= THETA <= known["dead_time"].high
    (tmp_path / "other").mkdir()
    blind = project(tmp_path / "other", seen).loops[0].read.fitted.ranges
    assert blind["dead_time"].low > THETA + 10


def test_a_lag_that_is_a_range_joins_the_intervals_of_both_ends(tmp_path):
    seen = rows(lambda t: course(t, lag=20.0))
    both = project(tmp_path, seen, sensor=", lag: 10 s to 30 s").loops[0].read.fitted.ranges["dead_time"]
    (tmp_path / "low").mkdir()
    (tmp_path / "high").mkdir()
    low = project(tmp_path / "low", seen, sensor=", lag: 10 s").loops[0].read.fitted.ranges["dead_time"]
    high = project(tmp_path / "high", seen, sensor=", lag: 30 s").loops[0].read.fitted.ranges["dead_time"]
    assert (both.low, both.high) == (high.low, low.high)


def test_a_supply_that_nobody_noted_counts_both_ways_and_is_an_assumption(tmp_path):
    """Between 90 and 110 percent then and now: the change may be (0.9/1.1)^2 to (1.1/0.9)^2 of the recorded one."""
    decided = project(tmp_path, rows(), more="").loops[0]
    assert decided.decision.chosen.case.faults.on.settles_at == pytest.approx(REST + (1.1 / 0.9) ** 2 * GAIN, rel=0.005)
    assert any(assumption.field == "plant.step_test.supply" for assumption in decided.assumptions)


def test_the_column_may_have_its_unit_beside_it(tmp_path):
    design = project(tmp_path, rows(header="t_s,out_percent,reading"), value="reading", more=", unit: degC, supply: 400 V")
    assert not design.problems
    assert design.loops[0].read.fitted.ranges["change"].low <= GAIN


def test_a_recording_beside_the_loop_file_is_found(tmp_path):
    assert not project(tmp_path, rows(), at="step.csv", file="step.csv").problems


@pytest.mark.parametrize(
    "written", ["../tic-101.csv", "/etc/tic-101.csv", "data/../../a.csv", "C:/a.csv", "data\\a.csv", "issued/A/a.csv", "./a.csv", "data//a"]
)
def test_a_path_that_leads_elsewhere_is_refused(tmp_path, written):
    design = project(tmp_path, rows(), file=f"'{written}'")
    assert codes(design) == [("L311", "loops/a.yml")]
    assert not design.loops
    assert not inside(written)


@pytest.mark.skipif(os.name == "nt", reason="links need a privilege there")
def test_a_link_that_leads_out_is_refused(tmp_path):
    outside = tmp_path / "outside.csv"
    outside.write_text(rows(), encoding="utf-8")
    (tmp_path / "made" / "loops" / "data").mkdir(parents=True)
    (tmp_path / "made" / "loops" / "data" / "tic-101.csv").symlink_to(outside)
    (tmp_path / "made" / "loops").joinpath("panel.yml").write_text(PANEL, encoding="utf-8")
    said = {"file": "data/tic-101.csv", "value": "pv_degC", "more": "", "sensor": "", "direction": "raise"}
    (tmp_path / "made" / "loops" / "a.yml").write_text(LOOP % said, encoding="utf-8")
    design = load_design(tmp_path / "made")
    assert codes(design) == [("L312", "loops/a.yml")]
    assert all(source.name != "loops/data/tic-101.csv" for source in design.sources)


def test_a_file_that_is_not_there_is_a_problem_of_the_loop(tmp_path):
    design = project(tmp_path)
    assert [problem.line().partition(" error ")[0] for problem in design.problems] == ["loops/a.yml:6:21:"]
    assert codes(design) == [("L312", "loops/a.yml")]
    assert not design.loops


def test_a_bad_cell_is_shown_in_the_recording_and_at_the_loop(tmp_path):
    bad = rows().replace("50,20,46.00", "50,20,hot", 1)
    design = project(tmp_path, bad)
    assert codes(design) == [("L312", "loops/a.yml"), ("R108", "loops/data/tic-101.csv")]
    assert ("loops/data/tic-101.csv", 7, 7) in {(p.span.file, p.span.line, p.span.column) for p in design.problems}
    assert any(source.name == "loops/data/tic-101.csv" for source in design.sources)


@pytest.mark.parametrize(
    ("recording", "changes", "code"),
    [
        pytest.param(rows(lambda t: 46.0 + 0.0 * t), {}, "L313", id="nothing moves"),
        pytest.param(rows(end=600), {}, "L313", id="too short"),
        pytest.param(rows(header="t_s,out_percent,pv_bar"), {"value": "pv_bar"}, "L314", id="a pressure"),
        pytest.param(rows(lambda t: 100 - course(t)), {}, "L315", id="it falls"),
        pytest.param(rows(), {"direction": "lower"}, "L315", id="it should fall"),
        pytest.param(rows(lambda t: course(t) - 15 * exp(-t / TAU)), {}, "L316", id="still settling at first"),
    ],
)
def test_a_recording_that_cannot_be_designed_with_is_refused(tmp_path, recording, changes, code):
    design = project(tmp_path, recording, **changes)
    assert code in {problem.code for problem in design.problems}
    assert not design.loops


def test_a_pressure_in_bar_comes_out_in_pascal(tmp_path):
    """A pressure of 6 bar and 2 bar more at full output: kept as 600 kPa and 200 kPa."""
    loop = """
tag: PIC-1
service: header
need: {quantity: pressure, direction: raise, setpoint: 6 bar, tolerance: 0.5 bar}
plant: {step_test: {file: data/p.csv, time: t_s, output: out_percent, value: pv_bar}}
sensor: {kind: transmitter, range: 0 bar to 10 bar, signal: 4-20 mA, accuracy: 0.5 percent, step: 0.01 bar}
element: {kind: modulating_valve, signal: 4-20 mA, stroke_time: 10 s, on_signal_loss: close, on_supply_loss: close}
"""
    (tmp_path / "loops" / "data").mkdir(parents=True)
    (tmp_path / "loops" / "panel.yml").write_text(PANEL, encoding="utf-8")
    (tmp_path / "loops" / "a.yml").write_text(loop, encoding="utf-8")
    text = rows(lambda t: 5.0 + 2.0 * (course(t) - REST) / GAIN, header="t_s,out_percent,pv_bar")
    (tmp_path / "loops" / "data" / "p.csv").write_text(text, encoding="utf-8")
    design = load_design(tmp_path)
    assert not design.problems
    ranges = design.loops[0].read.fitted.ranges
    assert ranges["change"].low <= 200e3 <= ranges["change"].high
    assert ranges["rest_value"].low <= 500e3 <= ranges["rest_value"].high


def test_two_loops_may_name_one_recording(tmp_path):
    design = project(tmp_path, rows())
    text = (tmp_path / "loops" / "a.yml").read_text(encoding="utf-8")
    (tmp_path / "loops" / "b.yml").write_text(text.replace("TIC-101", "TIC-102"), encoding="utf-8")
    again = load_design(tmp_path)
    assert not again.problems
    assert len(again.loops) == 2
    assert len(again.sources) == len(design.sources) + 1


def test_a_drift_is_taken_out_and_shown(tmp_path):
    """1.8 K/h over the whole recording, beside a step that is known."""
    design = project(tmp_path, rows(lambda t: course(t) + 1.8 * t / 3600))
    assert not design.problems
    figure = next(figure for figure in design.loops[0].basis if figure.symbol == "drift")
    assert figure.value * 3600 == pytest.approx(1.8, rel=0.02)
    assert design.loops[0].read.fitted.ranges["change"].low <= GAIN <= design.loops[0].read.fitted.ranges["change"].high
