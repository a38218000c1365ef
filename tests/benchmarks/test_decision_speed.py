"""How long deciding takes: a decision without and with its firmness against reading the files, and a whole check of many loops.

``SPECGEN_LOOPS`` takes another number of loops than 1000; firmness is measured on every tenth of them, on one processor.
"""

import importlib.util
import os
import statistics
import time
from pathlib import Path

import pytest

from specgen.catalogue.load import load_catalogue
from specgen.design.decide import decide
from specgen.design.firmness import firmness_of
from specgen.design.outcome import Subject
from specgen.design.project import load_design
from specgen.model.loops import read_loops
from specgen.model.panel import Panel
from specgen.model.reader import read_model
from specgen.source.read import read_text

pytestmark = pytest.mark.benchmark

_spec = importlib.util.spec_from_file_location("make_loops", Path(__file__).parent / "make_loops.py")
make_loops = importlib.util.module_from_spec(_spec)
_spec.loader.exec_module(make_loops)

LOOPS = int(os.environ.get("SPECGEN_LOOPS", "1000"))
EACH = 10


def timed(work, *args):
    """Return what the work gives and the processor's time it takes [s]."""
    start = time.process_time()
    made = work(*args)
    return made, time.process_time() - start


def read_all(files):
    documents = []
    for name, text in files.items():
        if name != "panel.yml":
            documents += read_text(text, f"loops/{name}")[0]
    return read_loops(documents).loops


@pytest.fixture(scope="module")
def panel():
    return read_model(Panel, read_text(make_loops.PANEL, "loops/panel.yml")[0][0].data)[0]


def test_decisions_and_firmness(panel):
    loops, reading = timed(read_all, make_loops.loop_texts(LOOPS))
    catalogue = load_catalogue(None)
    for loop in read_all(make_loops.loop_texts(13, seed=99)):
        decide(loop, panel, catalogue)  # tables are read and rules found before the clock runs
    plain = [timed(decide, loop, panel, catalogue)[1] for loop in loops]
    # from another seed, so that nothing of their own decisions is remembered
    firm = [
        timed(firmness_of, Subject(loop.loop, panel, loop.fitted), catalogue)[1]
        for loop in read_all(make_loops.loop_texts(LOOPS // EACH, seed=2))
    ]
    each = reading / len(loops)
    print(f"\nreading {len(loops)} loops: {reading:.2f} s, {each * 1e3:.2f} ms each")
    for name, times in (("decision", plain), ("firmness", firm)):
        median, mean, most = statistics.median(times), statistics.fmean(times), sorted(times)[len(times) * 9 // 10]
        print(
            f"{name}: median {median * 1e3:.1f} ms, mean {mean * 1e3:.1f} ms, nine of ten below {most * 1e3:.0f} ms; "
            f"median is {median / each:.0f} times reading"
        )
    assert len(plain) == LOOPS


@pytest.mark.parametrize("count", [100, 1000, 3000])
def test_seconds_for_a_check(tmp_path, monkeypatch, count):
    """Over the machine's processors, without firmness, then again with everything remembered."""
    monkeypatch.setenv("XDG_CACHE_HOME", str(tmp_path / "user"))
    (tmp_path / "loops").mkdir()
    for name, text in make_loops.loop_texts(count).items():
        (tmp_path / "loops" / name).write_text(text)
    start = time.perf_counter()
    design = load_design(tmp_path, workers=0, remember=True)
    first = time.perf_counter() - start
    start = time.perf_counter()
    load_design(tmp_path, workers=0, remember=True)
    again = time.perf_counter() - start
    print(f"\n{count} loops: {first:.1f} s, remembered {again:.1f} s")
    assert len(design.loops) == count
    assert again < first
