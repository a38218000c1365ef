"""The table of bad inputs: which file, where its problems stand, their codes, and words that the hint must hold."""

import csv
from pathlib import Path
from typing import NamedTuple

import pytest

HERE = Path(__file__).parent
GOOD = """tag: GOOD-1
service: A loop in a file of its own
need: {quantity: temperature, direction: raise, setpoint: 65 degC, tolerance: 1.5 K}
sensor: {kind: pt100}
element: {kind: resistive_heater, power: 6 kW, voltage: 400 V, phases: 3, needs: []}
"""
PANEL = """panel: {reference: PNL-1, title: Test panel, revision: A, status: for review, date: 2026-11-20}
supply: {voltage: 400 V, phases: 3, frequency: 50 Hz}
enclosure: {height: 1800 mm, width: 800 mm, depth: 400 mm, ambient: 5 degC to 35 degC}
"""


class Expected(NamedTuple):
    """One problem that a file must be answered with."""

    line: int
    column: int
    code: str
    hint_holds: str


class BadInput(NamedTuple):
    """A file of this folder and every problem it must be answered with; none for what is fine after all."""

    file: str
    raw: bytes
    expected: tuple[Expected, ...]

    @property
    def is_panel(self) -> bool:
        """Tell whether the file stands for panel.yml."""
        return self.file.startswith("panel-")


def table() -> list[BadInput]:
    """Read the table beside the files."""
    rows: dict[str, list[Expected]] = {}
    with (HERE / "expected.csv").open(encoding="utf-8", newline="") as opened:
        for row in csv.DictReader(opened):
            found = rows.setdefault(row["file"], [])
            if row["code"]:
                found.append(Expected(int(row["line"]), int(row["column"]), row["code"], row["hint_holds"]))
    return [BadInput(name, (HERE / name).read_bytes(), tuple(sorted(found))) for name, found in rows.items()]


def pytest_generate_tests(metafunc):
    """Run a test that takes ``bad`` once a file."""
    if "bad" in metafunc.fixturenames:
        metafunc.parametrize("bad", table(), ids=lambda bad: bad.file.removesuffix(".yml"))


@pytest.fixture(scope="session")
def bad_inputs():
    """Return the whole table."""
    return table()


@pytest.fixture
def folder(tmp_path):
    """Return a function that lays a bad file beside good ones, as a project's folder of loops."""

    def lay(bad: BadInput) -> Path:
        loops = tmp_path / "loops"
        loops.mkdir()
        (loops / "panel.yml").write_text(PANEL, encoding="utf-8")
        (loops / "a-good-one.yml").write_text(GOOD, encoding="utf-8")
        (loops / ("panel.yml" if bad.is_panel else bad.file)).write_bytes(bad.raw)
        return loops

    return lay
