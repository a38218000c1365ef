"""Bad inputs from the command line: exit code 2, every problem with its place and hint, the good loops in record and site."""

import csv
import json
import os
import subprocess
import sys
from pathlib import Path

import pytest
from click.testing import CliRunner

from specgen.cli.main import commands

INPUTS = Path(__file__).parents[1] / "inputs"
GOOD = """tag: GOOD-1
service: A loop in a file of its own
need: {quantity: temperature, direction: raise, setpoint: 65 degC, tolerance: 2 K}
sensor: {kind: pt100, class: A, step: 0.1 K}
element: {kind: resistive_heater, power: 6 kW, voltage: 400 V, phases: 3, needs: []}
"""
PANEL = """panel: {reference: PNL-1, title: Test panel, revision: A, status: for review, date: 2026-11-20}
supply: {voltage: 400 V, phases: 3, frequency: 50 Hz}
enclosure: {height: 2000 mm, width: 1200 mm, depth: 400 mm, ambient: 5 degC to 30 degC}
"""
SITE = "site_name: Test panel\ndocs_dir: loops\ntheme: {name: specgen}\nplugins: [specgen]\n"


def expected():
    """Return the table of bad inputs by file."""
    rows = {}
    with (INPUTS / "expected.csv").open(encoding="utf-8", newline="") as opened:
        for row in csv.DictReader(opened):
            rows.setdefault(row["file"], [])
            if row["code"]:
                rows[row["file"]].append(row)
    return rows


TABLE = expected()


def is_panel(name):
    return name.startswith("panel-")


def lay(folder, name):
    """Lay a bad file beside good ones as a project."""
    loops = folder / "loops"
    loops.mkdir()
    (folder / "mkdocs.yml").write_text(SITE, encoding="utf-8")
    (loops / "panel.yml").write_text(PANEL, encoding="utf-8")
    (loops / "a-good-one.yml").write_text(GOOD, encoding="utf-8")
    (loops / ("panel.yml" if is_panel(name) else name)).write_bytes((INPUTS / name).read_bytes())
    return folder


def run(*arguments):
    result = CliRunner().invoke(commands, [str(argument) for argument in arguments])
    assert result.exception is None or isinstance(result.exception, SystemExit), result.exc_info
    return result


def places(name):
    file = "loops/panel.yml" if is_panel(name) else f"loops/{name}"
    return sorted(f"{file}:{row['line']}:{row['column']}: error {row['code']}: " for row in TABLE[name])


@pytest.mark.parametrize("name", TABLE)
def test_check_names_every_problem(name, tmp_path):
    result = run("check", lay(tmp_path, name))
    assert result.exit_code == (2 if TABLE[name] else 0)
    assert "Traceback" not in result.output
    for start in places(name):
        assert start in result.output
    told = [line for line in result.output.splitlines() if ": error " in line]
    assert len(told) == len(TABLE[name])
    for row in TABLE[name]:
        assert row["hint_holds"] in result.output
    if not is_panel(name) or not TABLE[name]:
        assert "GOOD-1" in result.output


SAMPLE = ["decimal-comma.yml", "alias-bomb.yml", "binary.yml", "latin-1.yml", "tag-leaves-the-folder.yml", "same-as-circle.yml",
          "fine-script-in-service.yml", "panel-days-400.yml", "empty-file.yml"]  # fmt: skip


@pytest.mark.parametrize("name", SAMPLE)
def test_the_record_holds_problems_and_good_loops(name, tmp_path):
    result = run("check", lay(tmp_path, name), "--format", "json")
    assert result.exit_code == (2 if TABLE[name] else 0)
    record = json.loads(result.stdout)
    found = sorted(f"{p['file']}:{p['line']}:{p['column']}: {p['severity']} {p['code']}: " for p in record["problems"])
    assert found == places(name)
    assert all(p["text"] and p["hint"] for p in record["problems"])
    assert ("GOOD-1" in {loop["tag"] for loop in record["loops"]}) == (not is_panel(name) or not TABLE[name])


@pytest.mark.parametrize("name", SAMPLE)
def test_the_site_is_built_from_the_good_loops(name, tmp_path):
    result = run("build", lay(tmp_path, name))
    assert result.exit_code == (2 if TABLE[name] else 0)
    index = (tmp_path / "site" / "index.html").read_text(encoding="utf-8")
    if not is_panel(name):
        assert (tmp_path / "site" / "loops" / "GOOD-1.html").is_file()
        assert "GOOD-1" in index
    for row in TABLE[name]:
        assert row["code"] in index, "every problem stands on the overview"
    assert "<script>alert(1)" not in "".join(page.read_text(encoding="utf-8") for page in (tmp_path / "site").rglob("*.html"))
    assert not (tmp_path / "BAD-1.html").exists()


@pytest.mark.parametrize("name", ["decimal-comma.yml", "three-thousand-brackets.yml", "control-character.yml"])
def test_as_a_program_of_its_own(name, tmp_path):
    folder = lay(tmp_path, name)
    code = "from specgen.cli import main; main()"
    # a terminal that knows ASCII only must not turn a problem into a traceback
    environment = {**os.environ, "PYTHONIOENCODING": "ascii"}
    done = subprocess.run(
        [sys.executable, "-c", code, "check", str(folder)], capture_output=True, text=True, check=False, timeout=60, env=environment
    )
    assert done.returncode == 2, done.stderr
    assert "Traceback" not in done.stdout + done.stderr
    for start in places(name):
        assert start in done.stdout


def test_a_file_over_one_mebibyte(tmp_path):
    folder = lay(tmp_path, "decimal-comma.yml")
    (folder / "loops" / "large.yml").write_bytes(b"# " + b"x" * 1024 * 1024)
    result = run("check", folder)
    assert result.exit_code == 2
    assert "loops/large.yml:1:1: error Y102: " in result.output
    assert "loops/decimal-comma.yml:8:14: error Q103: " in result.output
