"""The commands as a person meets them: exit codes, one clear line for what goes wrong, the old site left as it was."""

import errno
import json
import os
import re
import subprocess
import sys
from pathlib import Path

import pytest
from click.testing import CliRunner

from specgen.cli import common
from specgen.cli.main import commands, main
from specgen.design.project import load_design
from specgen.render import site as site_module

PANEL = """panel: {reference: PNL-1, title: Test panel, revision: A, status: for review, date: 2026-11-20}
supply: {voltage: 400 V, phases: 3, frequency: 50 Hz, prospective_fault_current: 6 kA}
enclosure: {height: 1800 mm, width: 800 mm, depth: 400 mm, ambient: 5 degC to 35 degC}
"""
GOOD = """tag: TIC-1
service: Tank
need: {quantity: temperature, direction: raise, setpoint: 60 degC, tolerance: 2 K, stability: relaxed}
plant: {response: {change: 100 K, time_constant: 60 min, dead_time: 60 s, rest_value: 20 degC}}
sensor: {kind: pt100, class: A, wires: 4, step: 0.1 K}
element: {kind: resistive_heater, power: 1 kW, voltage: 230 V, phases: 1, needs: [level]}
limits: {danger_high: 90 degC, consequence: product, on_sensor_fault: off, after_power_return: resume}
"""
HELD = GOOD.replace("TIC-1", "TIC-2").replace("change: 100 K", "change: 41 K")  # at -10 percent full output does not reach
OPEN = GOOD.replace("TIC-1", "TIC-3").replace("plant: ", "x: ").replace("x: {response: {change: 100 K, time_constant: 60 min, "
                                                                          "dead_time: 60 s, rest_value: 20 degC}}\n", "")  # fmt: skip
BAD = GOOD.replace("TIC-1", "TIC-4").replace("tolerance: 2 K", "tolerance: 2 parsec")
SITE = "site_name: Test panel\ndocs_dir: loops\ntheme: {name: specgen}\nplugins: [specgen]\n"


@pytest.fixture(autouse=True)
def quick(monkeypatch):
    """Leave out how firm each decision is, which takes longest."""

    def load(folder, progress=None, **_):
        return load_design(folder, progress, remember=False)

    monkeypatch.setattr(common, "load_design", load)


@pytest.fixture
def whole(monkeypatch):
    """Leave nothing out after all."""
    monkeypatch.setattr(common, "load_design", load_design)


def lay(folder, *loops, panel=PANEL, site=SITE):
    (folder / "loops").mkdir(parents=True)
    if site is not None:
        (folder / "mkdocs.yml").write_text(site, encoding="utf-8")
    (folder / "loops" / "panel.yml").write_text(panel, encoding="utf-8")
    (folder / "loops" / "heat.yml").write_text("---\n".join(loops), encoding="utf-8")
    return folder


def run(*arguments):
    return CliRunner().invoke(commands, [str(argument) for argument in arguments])


def ended(capsys, *arguments):
    """Run the program's own entry: exit code, standard output, standard error."""
    with pytest.raises(SystemExit) as end:
        main([str(argument) for argument in arguments])
    told = capsys.readouterr()
    return end.value.code, told.out, told.err


def tree(folder):
    return {path.relative_to(folder): path.read_bytes() for path in sorted(folder.rglob("*")) if path.is_file()}


CODES = [
    pytest.param((GOOD,), 0, id="good"), pytest.param((GOOD, OPEN), 0, id="open"), pytest.param((GOOD, HELD), 1, id="held"),
    pytest.param((GOOD, BAD), 2, id="a problem"), pytest.param((HELD, BAD), 2, id="a problem beside a held loop"),
]  # fmt: skip


@pytest.mark.parametrize(("loops", "code"), CODES)
def test_exit_codes(tmp_path, loops, code):
    folder = lay(tmp_path, *loops)
    checked, built = run("check", folder), run("build", folder)
    assert (checked.exit_code, built.exit_code) == (code, code), checked.output + built.output
    assert (tmp_path / "site" / "index.html").is_file(), "the site is built in every case"
    assert run("check", folder, "--format", "json").exit_code == code


def test_the_verdict_table_and_the_sum(tmp_path):
    output = run("check", lay(tmp_path, GOOD, HELD, OPEN, BAD)).output
    lines = output.splitlines()
    assert lines[0].split() == ["loop", "verdict", "decision"]
    assert [line.split()[:2] for line in lines[1:4]] == [["TIC-1", "meets"], ["TIC-2", "held"], ["TIC-3", "open"]]
    assert "loops/heat.yml:" in output
    assert re.search(r"^loops/heat\.yml:\d+:\d+: error Q\d+: ", output, re.MULTILINE)
    assert lines[-1] == "3 loops: 1 meets, 1 open, 1 held; 1 problem in the files"


def test_a_held_panel_says_why(tmp_path):
    """A box too small for its heat: every loop meets, the panel does not."""
    size = "height: 200 mm, width: 200 mm, depth: 120 mm, other_heat: 400 W"
    small = PANEL.replace("height: 1800 mm, width: 800 mm, depth: 400 mm", size)
    result = run("check", lay(tmp_path, GOOD, panel=small))
    assert result.exit_code == 1
    assert "\npanel broken E5 (must): " in result.output
    assert "1 loop: 1 meets; the panel is held; 0 problems" in result.output


@pytest.mark.usefixtures("whole")
def test_json_is_the_record(tmp_path):
    folder = lay(tmp_path, GOOD, HELD)
    printed = run("check", folder, "--format", "json").stdout_bytes
    run("build", folder)
    assert printed == (folder / "site" / "data" / "record.json").read_bytes()
    assert [row["tag"] for row in json.loads(printed)["loops"]] == ["TIC-1", "TIC-2"]


def test_start_then_check_and_build(tmp_path):
    folder = tmp_path / "new"
    started = run("start", folder)
    assert started.exit_code == 0
    assert {str(path) for path in tree(folder)} == {"mkdocs.yml", "loops/panel.yml", "loops/first-loops.yml"}
    checked = run("check", folder)
    assert checked.exit_code == 0, checked.output
    assert "2 loops" in checked.output
    assert run("build", folder).exit_code == 0


@pytest.mark.parametrize("name", ["mkdocs.yml", "loops/panel.yml", "loops/first-loops.yml"])
def test_start_never_overwrites(tmp_path, name):
    (tmp_path / "loops").mkdir()
    (tmp_path / name).write_text("mine", encoding="utf-8")
    result = run("start", tmp_path)
    assert result.exit_code != 0
    assert "already there; nothing was written" in result.output
    assert tree(tmp_path) == {Path(name): b"mine"}


def test_explain(tmp_path):
    folder = lay(tmp_path, GOOD, HELD)
    result = run("explain", "tic-1", folder)
    assert result.exit_code == 1, "as check: another loop is held"
    assert result.output.startswith("TIC-1  Tank  [meets]  loops/heat.yml:1\n")
    for part in ("Chosen: ", "\nGrounds\n", "\nAlternatives\n", "\nAssumed\n"):
        assert part in result.output
    wrong = run("explain", "TIC-9", folder)
    assert wrong.exit_code != 0
    assert "no loop TIC-9 could be read; there are: TIC-1, TIC-2" in wrong.output


def test_a_bad_panel_still_gives_a_site_that_says_so(tmp_path):
    folder = lay(tmp_path, GOOD, panel=PANEL.replace("phases: 3", "phases: 2"))
    for command in ("check", "build"):
        result = run(command, folder)
        assert result.exit_code == 2
        assert "loops/panel.yml:2:" in result.output
    assert "panel.yml" in (tmp_path / "site" / "index.html").read_text(encoding="utf-8")


def test_schema_and_version():
    assert json.loads(run("schema").output)["$schema"]
    assert "| `need.setpoint` |" in run("schema", "--fields").output
    assert run("--version").output.startswith("specgen, version ")


@pytest.mark.parametrize("command", ["check", "build"])
def test_a_folder_without_loops(tmp_path, capsys, command):
    code, out, err = ended(capsys, command, tmp_path)
    assert (code, out) == (2, "")
    assert err.splitlines() == [f"specgen: {tmp_path} has no folder loops/; `specgen start {tmp_path}` makes one to begin with"]
    code, _, err = ended(capsys, command, tmp_path / "nowhere")
    assert code == 2
    assert len(err.splitlines()) == 1


def test_no_configuration(tmp_path, capsys):
    folder = lay(tmp_path, GOOD, site=None)
    assert run("check", folder).exit_code == 0
    code, _, err = ended(capsys, "build", folder)
    assert code == 2
    assert len(err.splitlines()) == 1
    assert "mkdocs.yml is missing" in err


STOPS = [
    pytest.param(OSError(errno.ENOSPC, "No space left on device"), 2, "No space left on device", id="full disk"),
    pytest.param(PermissionError(errno.EACCES, "Permission denied"), 2, "Permission denied", id="unwritable"),
    pytest.param(KeyboardInterrupt(), 130, "stopped", id="Ctrl-C"),
]


@pytest.mark.parametrize(("stop", "code", "words"), STOPS)
def test_what_stops_a_build_is_told_in_one_line(tmp_path, capsys, monkeypatch, stop, code, words):
    folder = lay(tmp_path, GOOD)
    assert run("build", folder).exit_code == 0
    before = tree(tmp_path)

    def stopped(*_args, **_kwargs):
        raise stop

    monkeypatch.setattr(site_module, "build", stopped)
    found, _, err = ended(capsys, "build", folder)
    assert found == code
    # a terminal shows ^C before it, so that one empty line comes first there
    assert len(err.lstrip("\n").splitlines()) == 1, err
    assert words in err
    assert tree(tmp_path) == before


def test_ctrl_c_while_deciding(tmp_path, capsys, monkeypatch):
    folder = lay(tmp_path, GOOD)
    monkeypatch.setattr(common, "load_design", lambda *_, **__: (_ for _ in ()).throw(KeyboardInterrupt))
    assert ended(capsys, "check", folder)[0] == 130


@pytest.mark.skipif(os.name == "nt" or os.geteuid() == 0, reason="permissions do not bind this user")
def test_an_unwritable_folder(tmp_path, capsys):
    folder = lay(tmp_path, GOOD)
    folder.chmod(0o500)
    try:
        code, _, err = ended(capsys, "build", folder)
    finally:
        folder.chmod(0o700)
    assert code == 2
    assert len(err.splitlines()) == 1


def test_an_unreadable_file_among_the_loops(tmp_path):
    folder = lay(tmp_path, GOOD)
    (folder / "loops" / "nowhere.yml").symlink_to("missing.yml")
    result = run("check", folder)
    assert result.exit_code == 2
    assert "loops/nowhere.yml:1:1: error" in result.output
    assert "TIC-1" in result.output


@pytest.mark.usefixtures("whole")
def test_as_a_program(tmp_path):
    """Exit code and streams of a process of its own; the record has its own byte order, wherever it is written."""
    folder = lay(tmp_path, GOOD, HELD)
    done = subprocess.run(
        [sys.executable, "-c", "from specgen.cli import main; main()", "check", ".", "--format", "json"],
        capture_output=True, check=False, cwd=folder, timeout=60, env={**os.environ, "PYTHONHASHSEED": "7"},
    )  # fmt: skip
    assert (done.returncode, done.stderr) == (1, b"")
    assert done.stdout.replace(b"\r\n", b"\n") == run("check", folder, "--format", "json").stdout_bytes
