"""`specgen fit` at the terminal: what goes to which stream, the exit code, the files."""

import math

import pytest
import yaml
from click.testing import CliRunner

from specgen.cli.main import commands
from specgen.core.quantity import parse_range


def rows(header="t_s,out_percent,pv_degC", end=4000, mark=".", separator=","):
    """A plant of 130 K, 600 s and 25 s, from 20 to 70 percent at 100 s, read to 0.01 K (textbook's formula)."""
    made = [header]
    for t in range(0, end, 10):
        since = t - 125
        value = 46.0 + (65.0 * (1 - math.exp(-since / 600)) if since > 0 else 0.0)
        made.append(separator.join((str(t), "20" if t < 100 else "70", f"{value:.2f}".replace(".", mark))))
    return "\n".join(made)


@pytest.fixture
def run(tmp_path):
    def _run(*arguments, text=None, name="tic-101.csv"):
        path = tmp_path / name
        if text is not None:
            path.write_text(text, encoding="utf-8")
        return CliRunner().invoke(commands, ["fit", str(path), *arguments])

    return _run


def response(result):
    block = yaml.safe_load(result.stdout)
    assert list(block) == ["plant"]
    assert list(block["plant"]) == ["response"]
    return block["plant"]["response"]


def test_only_the_block_goes_to_stdout(run, tmp_path):
    result = run(text=rows())
    assert result.exit_code == 0
    found = response(result)
    for key, dimension, truth in (("change", "difference", 130), ("time_constant", "time", 600), ("dead_time", "time", 25),
                                  ("rest_value", "temperature", 20)):  # fmt: skip
        span = parse_range(found[key], dimension)
        assert span.low <= truth <= span.high
    assert "95 % intervals" in result.stderr
    assert (tmp_path / "tic-101.fit.svg").read_bytes().startswith(b"<svg ")
    assert "tic-101.fit.svg" in result.stderr


def test_columns_may_be_named_and_have_their_unit_beside_them(run):
    text = rows(header="zeit,out_percent,reading")
    refused = run(text=text)
    assert refused.exit_code == 2
    assert refused.stdout == ""
    named = ("--time", "zeit", "--output", "out_percent", "--value", "reading", "--unit", "zeit=s", "--unit", "reading=degC")
    assert run(*named, text=text).exit_code == 0


def test_a_supply_scales_the_change_by_its_square(run):
    """130 K at 380 V are 130 (400/380)^2 = 144.04 K at 400 V."""
    span = parse_range(response(run("--rated", "400 V", "--supply", "380 V", text=rows()))["change"], "difference")
    assert span.low <= 144.04 <= span.high
    assert span.high - span.low < 2


def test_a_supply_that_nobody_noted_widens_the_change(run):
    """5 percent both ways: 130/1.05^2 = 117.9 K to 130/0.95^2 = 144.0 K."""
    span = parse_range(response(run("--rated", "400 V", "--tolerance", "5 percent", text=rows()))["change"], "difference")
    assert span.low == pytest.approx(117.9, rel=0.005)
    assert span.high == pytest.approx(144.0, rel=0.005)


def test_a_sensors_lag_is_taken_out(run):
    plain = parse_range(response(run(text=rows()))["dead_time"], "time")
    less = parse_range(response(run("--sensor-lag", "10 s", text=rows()))["dead_time"], "time")
    assert less.high < plain.low - 5


def test_the_drawing_goes_where_it_is_asked_to(run, tmp_path):
    result = run("--plot", str(tmp_path / "drawn.svg"), text=rows())
    assert result.exit_code == 0
    assert (tmp_path / "drawn.svg").is_file()
    assert not (tmp_path / "tic-101.fit.svg").exists()


def test_a_drawing_that_cannot_be_written_leaves_the_block(run, tmp_path):
    result = run("--plot", str(tmp_path / "nowhere" / "drawn.svg"), text=rows())
    assert response(result)
    assert result.exit_code == 2
    assert "cannot be written" in result.stderr


def test_the_recording_is_never_drawn_over(run, tmp_path):
    before = rows()
    result = run("--plot", str(tmp_path / "tic-101.csv"), text=before)
    assert result.exit_code == 2
    assert (tmp_path / "tic-101.csv").read_text(encoding="utf-8") == before


def test_a_bad_cell_is_shown_with_its_line(run, tmp_path):
    result = run(text=rows().replace("50,20,46.00", "50,20,hot", 1))
    assert result.exit_code == 2
    assert result.stdout == ""
    assert "tic-101.csv:7:7: error R108" in result.stderr
    assert "\n50,20,hot\n      ^^^" in result.stderr
    assert not (tmp_path / "tic-101.fit.svg").exists()


def test_a_recording_that_says_too_little_is_refused_with_what_to_do(run):
    result = run(text=rows(end=500))
    assert (result.exit_code, result.stdout) == (2, "")
    assert "not identified" in result.stderr
    assert "hint: " in result.stderr


@pytest.mark.parametrize(
    ("arguments", "said"),
    [
        (("--sensor-lag", "8"), "'8'"),
        (("--sensor-lag", "1,5 s"), "decimal comma"),
        (("--supply", "398 V"), "--rated"),
        (("--rated", "0 V"), "above zero"),
        (("--tolerance", "100 percent"), "below the whole"),
        (("--unit", "reading"), "COLUMN=UNIT"),
    ],
)
def test_a_wrong_option_is_one_clear_line(run, arguments, said):
    result = run(*arguments, text=rows())
    assert (result.exit_code, result.stdout) == (2, "")
    assert said in result.stderr


def test_a_file_that_is_not_there(run):
    result = run()
    assert (result.exit_code, result.stdout) == (2, "")
    assert "R101" in result.stderr
