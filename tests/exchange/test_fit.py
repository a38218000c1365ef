"""`specgen fit` from a file to the block, the remarks, the drawing and the exit code."""

import xml.etree.ElementTree as ET
from pathlib import Path

import numpy as np
import pytest
import yaml

from specgen.core.quantity import Range, parse_range
from specgen.exchange.fit import FitReport, Supply, fit_file, range_text
from specgen.exchange.fit_plot import Drawn, fit_plot, ticks
from specgen.model.plant import Response
from specgen.model.reader import read_model
from specgen.process.step_test import Interval, NotIdentified
from specgen.source.recording import Columns

SVG = "{http://www.w3.org/2000/svg}"


def rise(since, tau):
    return np.where(since > 0, 1 - np.exp(-np.maximum(since, 0) / tau), 0.0)


def values(t, gain=130.0, tau=1200.0, theta=40.0, rest=20.0, noise=0.2, seed=3):
    """A step from 20 to 70 percent at 600 s by the textbook's formula."""
    return rest + 0.2 * gain + 0.5 * gain * rise(t - 600 - theta, tau) + noise * np.random.default_rng(seed).standard_normal(len(t))


def write(folder: Path, value, header="t_s,out_percent,pv_degC", name="tic-101.csv", t=None):
    t = np.arange(0, 9000.0, 15.0) if t is None else t
    output = np.where(t < 600, 20, 70)
    path = folder / name
    path.write_text("\n".join([header, *(f"{a:g},{b},{c:.4f}" for a, b, c in zip(t, output, value, strict=True))]), encoding="utf-8")
    return path


T = np.arange(0, 9000.0, 15.0)


def ranges(report: FitReport, difference="difference", value="temperature") -> dict[str, Range]:
    block = yaml.safe_load(report.block)
    assert list(block) == ["plant"]
    assert list(block["plant"]) == ["response"]
    dimensions = {"change": difference, "time_constant": "time", "dead_time": "time", "rest_value": value}
    return {key: parse_range(text, dimensions[key]) for key, text in block["plant"]["response"].items()}


def test_the_block_holds_what_made_the_record(tmp_path):
    report = fit_file(write(tmp_path, values(T)))
    assert report.exit_code == 0
    found = ranges(report)
    for key, truth in {"change": 130.0, "time_constant": 1200.0, "dead_time": 40.0, "rest_value": 20.0}.items():
        assert found[key].low < truth < found[key].high
        assert found[key].high - found[key].low < 0.2 * truth
    assert not report.problems


def test_the_block_is_valid_in_a_loop_file(tmp_path):
    report = fit_file(write(tmp_path, values(T)))
    data = yaml.load(report.block, Loader=yaml.BaseLoader)["plant"]["response"]  # noqa: S506 - text alone, as the loop files are read
    context = {"value": "temperature", "difference_of_value": "difference"}
    response, problems = read_model(Response, data, context)
    assert not problems
    assert response is not None
    assert response.change.low < 130.0 < response.change.high


def test_the_printed_range_is_hardly_wider_than_the_interval(tmp_path):
    report = fit_file(write(tmp_path, values(T)))
    printed, interval = ranges(report)["time_constant"], report.found.tau
    assert printed.low <= interval.low
    assert printed.high >= interval.high
    assert printed.high - printed.low < 1.025 * interval.width


def test_a_value_that_falls_has_a_positive_change_and_says_the_direction(tmp_path):
    report = fit_file(write(tmp_path, values(T, gain=-30.0)))
    assert ranges(report)["change"].low < 30.0 < ranges(report)["change"].high
    assert any("need.direction: lower" in message for message in report.messages)


@pytest.mark.parametrize(
    ("header", "gain", "rest", "change_unit", "rest_unit"),
    [
        ("t_s,out_percent,pv_degF", 234.0, 68.0, "K", "degF"),  # 234 degF of change are 130 K
        ("t_s,out_percent,pv_K", 130.0, 293.15, "K", "degC"),
    ],
)
def test_fahrenheit_and_kelvin(tmp_path, header, gain, rest, change_unit, rest_unit):
    report = fit_file(write(tmp_path, values(T, gain=gain, rest=rest, noise=0.1), header))
    found = ranges(report)
    assert found["change"].low < 130.0 < found["change"].high
    assert found["rest_value"].low < 20.0 < found["rest_value"].high
    response = yaml.safe_load(report.block)["plant"]["response"]
    assert response["change"].endswith(change_unit)
    assert response["rest_value"].endswith(rest_unit)


def test_pressure_keeps_its_unit(tmp_path):
    report = fit_file(write(tmp_path, values(T, gain=6.0, rest=1.0, noise=0.01), "t_s,out_percent,pv [bar absolute]"))
    found = ranges(report, "pressure_difference", "pressure")
    assert found["change"].low < 6e5 < found["change"].high
    assert found["rest_value"].low < -1325.0 < found["rest_value"].high  # 1 bar absolute is 101325 - 100000 Pa below gauge


def test_supply_of_a_resistive_element(tmp_path):
    """By hand: (400/380)^2 = 1.1080; not known at 10 %: 0.8264 to 1.2346."""
    path = write(tmp_path, values(T))
    plain = ranges(fit_file(path))["change"]
    scaled = ranges(fit_file(path, supply=Supply(400.0, 380.0)))["change"]
    assert (scaled.low, scaled.high) == pytest.approx((1.10803 * plain.low, 1.10803 * plain.high), rel=1e-3)
    unknown = fit_file(path, supply=Supply(400.0, None, 0.1))
    assert (ranges(unknown)["change"].low, ranges(unknown)["change"].high) == pytest.approx(
        (0.82645 * plain.low, 1.23457 * plain.high), rel=1e-2
    )
    assert any("widened by 10 %" in message for message in unknown.messages)
    assert any("of a resistive heater" in message for message in fit_file(path).messages)


def test_a_plant_without_dead_time_and_noise(tmp_path):
    response = yaml.safe_load(fit_file(write(tmp_path, values(T, theta=0.0, noise=0.0))).block)["plant"]["response"]
    assert parse_range(response["dead_time"], "time").high < 0.001
    assert len(response["dead_time"]) < 30


def test_a_sensor_lag_shortens_the_dead_time(tmp_path):
    path = write(tmp_path, values(T))
    assert ranges(fit_file(path, sensor_lag=20.0))["dead_time"].high < 30.0
    assert any("sensor lag of 20 s" in message for message in fit_file(path, sensor_lag=20.0).messages)


def test_a_record_that_begins_with_the_step_has_no_rest_value(tmp_path):
    t = T[39:]  # one sample before the change
    report = fit_file(write(tmp_path, values(T, theta=2.0)[39:], t=t))
    assert "rest_value" not in yaml.safe_load(report.block)["plant"]["response"]
    assert "# rest_value: not known" in report.block
    assert any(message.startswith("no rest value: only") for message in report.messages)


def test_remarks_say_what_would_be_taken_for_granted(tmp_path):
    report = fit_file(write(tmp_path, values(T, noise=0.02) + 0.0005 * T + np.where(T > 4000, 0.3 * np.sin(T / 300), 0.0)))
    said = "\n".join(report.messages)
    assert "drifts by" in said
    assert "hang together" in said
    path = write(tmp_path, values(T))
    path.write_text(path.read_text().replace(",20,", ",20.5,", 30).replace(",70,", ",70.1,", 1).replace("0,70,", "0,70.2,", 100))
    assert "the output moves" in "\n".join(fit_file(path).messages)
    assert "the sample at 3000 s lies far off" in "\n".join(fit_file(write(tmp_path, values(T) + 4.0 * (T == 3000))).messages)
    said = "\n".join(fit_file(write(tmp_path, values(T, noise=0.02))).messages)
    assert "the dead time is up to 15 s longer" in said
    assert "drifts" not in said
    assert "hang together" not in said


REFUSED = [
    pytest.param(np.full(len(T), 46.0), "constant_value", id="constant"),
    pytest.param(values(T, gain=0.2, noise=1.0), "weak_step", id="noise"),
    pytest.param(values(T, tau=9000.0), "short_record", id="too short"),
]


@pytest.mark.parametrize(("value", "reason"), REFUSED)
def test_refused_with_reason_and_hint_and_nothing_for_stdout(tmp_path, value, reason):
    report = fit_file(write(tmp_path, value))
    assert isinstance(report.found, NotIdentified)
    assert report.found.reason == reason
    assert (report.exit_code, report.block, report.plot) == (2, "", b"")
    assert report.messages[-2].startswith("tic-101.csv: not identified (")
    assert report.messages[-1].startswith("hint: ")


def test_a_file_that_cannot_be_read(tmp_path):
    report = fit_file(tmp_path / "none.csv")
    assert (report.exit_code, report.problems[0].code) == (2, "R101")
    path = tmp_path / "bad.csv"
    path.write_text("t_s,out_percent,pv_degC\n0,20,1;5\n")
    report = fit_file(path)
    assert (report.exit_code, report.problems[0].span.line, report.problems[0].span.column) == (2, 2, 6)


def test_columns_are_passed_on(tmp_path):
    path = write(tmp_path, values(T), "clock,drive,seen")
    report = fit_file(path, columns=Columns("clock", "drive", "seen", {"clock": "s", "drive": "percent", "seen": "degC"}))
    assert report.exit_code == 0


def test_where_the_drawing_goes(tmp_path):
    path = write(tmp_path, values(T))
    assert fit_file(path).plot_path == tmp_path / "tic-101.fit.svg"
    assert fit_file(path, plot=tmp_path / "x.svg").plot_path == tmp_path / "x.svg"
    assert not (tmp_path / "tic-101.fit.svg").exists()


def test_the_drawing_has_axes_with_units_and_every_sample_in_place(tmp_path):
    report = fit_file(write(tmp_path, values(T)))
    root = ET.fromstring(report.plot)  # noqa: S314 - our own output
    texts = [element.text for element in root.iter(f"{SVG}text")]
    for label in ("value [degC]", "output [percent]", "residual [K]", "time [min]", "recorded", "fit", "tic-101.csv"):
        assert label in texts
    width, height = (float(number) for number in root.get("viewBox").split()[2:])
    curves = [path.get("d") for path in root.iter(f"{SVG}path") if "V" not in path.get("d")]
    assert len(curves) == 5  # value, its fit, output, residuals, their zero
    for curve in curves:
        numbers = [float(number) for number in curve.replace("M", " ").replace("L", " ").replace("h0", " ").split()]
        assert len(numbers) >= 4
        assert all(0 <= x <= width for x in numbers[::2])
        assert all(0 <= y <= height for y in numbers[1::2])
    assert len(report.plot) < 40_000
    assert report.plot == fit_file(tmp_path / "tic-101.csv").plot
    inks = {element.get(key) for element in root.iter() for key in ("stroke", "fill")} - {None, "none"}
    assert all(ink[1:3] == ink[3:5] == ink[5:7] for ink in inks), "grey throughout: nothing is told by colour"


def test_a_title_is_escaped():
    t = np.arange(0, 50.0)
    ET.fromstring(fit_plot(Drawn("a<b&c.csv", t, t * 0, t, t, "pv", "degC", "K")))  # noqa: S314 - our own output


@pytest.mark.parametrize(("count", "changes"), [(20_000, 1), (5_000, 2_500)])
def test_a_long_record_keeps_its_extremes_and_stays_small(count, changes):
    t = np.linspace(0, 50_000, count)
    value = np.zeros(count)
    value[1234] = 100.0
    output = (np.arange(count) // (count // changes // 2) % 2).astype(float)
    svg = fit_plot(Drawn("a", t, output, value, np.zeros(count), "pv", "bar", "bar")).decode()
    assert len(svg) < 60_000
    assert "time [h]" in svg
    top = 40 + 250 * 6 / 112  # by hand: the axis runs from -6 to 106, so 100 stands 6/112 of 250 below its top at 40
    assert f" {top:.1f}h0" in svg


@pytest.mark.parametrize("ends", [(0.0, 1.0), (-3e-5, 7e-5), (1e6, 1.2e6), (19.97, 20.04)])
def test_ticks_are_round_inside_and_few(ends):
    marks = ticks(*ends)
    assert 2 <= len(marks) <= 7
    assert all(ends[0] <= mark <= ends[1] for mark in marks)


@pytest.mark.parametrize(
    ("interval", "text"),
    [
        (Interval(130.0, 128.7312, 131.2741), "128.73 K to 131.28 K"),
        (Interval(0.4, 0.0, 0.8), "0.000 K to 0.800 K"),
        (Interval(-5.0, -5.4321, -4.5678), "-5.433 K to -4.567 K"),
        (Interval(5e5, 4.56789e5, 5.43211e5), "456700 K to 543300 K"),
        (Interval(130.0, 130.0 - 1e-12, 130.0 + 1e-12), "130.0000 K"),
        (Interval(0.0, 0.0, 0.0), "0 K"),
    ],
)
def test_ranges_are_rounded_outwards(interval, text):
    assert range_text(interval, "K") == text
