"""The same bytes from the same loops: in every run, folder, hash seed and order of files, and by MkDocs alone."""

import json
import os
import shutil
import subprocess
import sys
from concurrent.futures import ThreadPoolExecutor
from pathlib import Path

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from specgen.design.project import load_design
from specgen.design.record import dump, record_of

NAMES = ("heater", "compressor", "valve", "lamp", "solenoid", "motor valve")
SPECGEN = "from specgen.cli import main; main()"
MKDOCS = "from mkdocs.__main__ import cli; cli()"


def tree(folder):
    return {path.relative_to(folder).as_posix(): path.read_bytes() for path in sorted(folder.rglob("*")) if path.is_file()}


FEW = NAMES[:3]


def project(make, folder, order=NAMES, prefix=""):
    """Lay one loop a file, written in the given order; the area is written out, since it defaults to the file's name."""
    make.lay(folder)
    for name in order:
        text = make.loop_text(name, "relaxed", "4 K", tag=f"T-{NAMES.index(name)}", more="area: Works\n")
        (folder / "loops" / f"{prefix}{NAMES.index(name)}.yml").write_text(text, encoding="utf-8")
    return folder


def run(code, arguments, cwd, seed):
    environment = {**os.environ, "PYTHONHASHSEED": seed}
    return subprocess.run(
        [sys.executable, "-c", code, *arguments], cwd=cwd, capture_output=True, text=True, check=False, timeout=120, env=environment
    )


@pytest.fixture(scope="module")
def expected(make, tmp_path_factory):
    return dump(record_of(load_design(project(make, tmp_path_factory.mktemp("expected") / "project"), remember=False)))


@settings(max_examples=4, deadline=None, suppress_health_check=[HealthCheck.function_scoped_fixture])
@given(order=st.permutations(NAMES), prefix=st.sampled_from(["", "z-", "A_"]))
def test_files_in_any_order_and_under_other_names(make, tmp_path_factory, expected, order, prefix):
    """Names that sort alike: only the file that a loop is said to stand in changes."""
    folder = project(make, tmp_path_factory.mktemp("any") / "project", order, prefix)
    record = record_of(load_design(folder, remember=False))
    if prefix:
        assert {row["source"]["file"] for row in record["loops"]} == {f"loops/{prefix}{n}.yml" for n in range(len(NAMES))}
        for row in record["loops"]:
            row["source"]["file"] = row["source"]["file"].replace(prefix, "")
    assert dump(record) == expected


def test_programs_in_two_places_and_mkdocs_alone(make, tmp_path):
    """Two builds by specgen with other hash seeds and working directories, and one by ``mkdocs build --strict``."""
    places = [project(make, tmp_path / name / "project", FEW) for name in ("one", "two", "three")]
    jobs = [
        (SPECGEN, ["build", str(places[0])], tmp_path, "1"),
        (SPECGEN, ["build"], places[1], "4711"),
        (MKDOCS, ["build", "--strict"], places[2], "0"),
    ]
    with ThreadPoolExecutor(2) as pool:
        done = list(pool.map(lambda job: run(*job), jobs))
    assert [job.returncode for job in done] == [0, 0, 0], [job.stderr for job in done]
    first, *others = [tree(place / "site") for place in places]
    for other in others:
        assert set(first) == set(other)
        assert [name for name, content in first.items() if other[name] != content] == []
    # how firm each decision is takes long, and only the programs ask for it
    built, own = json.loads(first["data/record.json"]), record_of(load_design(places[0], remember=False))
    for row in (*built["loops"], *own["loops"]):
        row.pop("firmness", None)
    assert built == own


def test_a_record_is_in_order_and_finite(expected):
    record = json.loads(expected, parse_constant=lambda word: pytest.fail(f"{word} in the record"))
    assert expected.decode() == json.dumps(record, ensure_ascii=False, sort_keys=True, separators=(",", ":")) + "\n"

    def walk(value, path):
        assert value is not None, f"{path} is null"
        if isinstance(value, dict):
            for key, inner in value.items():
                walk(inner, f"{path}.{key}")
        elif isinstance(value, list):
            for number, inner in enumerate(value):
                walk(inner, f"{path}[{number}]")
        elif isinstance(value, float):
            assert value == float(f"{value:.9g}"), f"{path} has more than nine digits"

    walk(record, "record")


def test_no_trace_of_the_machine(make, tmp_path, expected):
    folder = project(make, tmp_path / "project")
    assert str(tmp_path).encode() not in dump(record_of(load_design(folder, remember=False)))
    assert str(Path.home()).encode() not in expected
    shutil.rmtree(folder)
