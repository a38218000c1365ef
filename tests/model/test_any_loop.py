"""Whatever a loop file says, reading it gives loops or problems with a place in the file, and never raises."""

from functools import cache
from pathlib import Path

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from specgen.model.devices import Devices
from specgen.model.loops import read_loops
from specgen.model.panel import Panel
from specgen.model.reader import place, read_model
from specgen.source import Document, read_folder, read_text

LOOPS = Path(__file__).parents[2] / "loops"
TOKENS = st.sampled_from(
    ["tag: TIC-1\n", "service: x\n", "need: ", "plant: ", "sensor: ", "element: ", "limits: ", "choose: ", "same_as: TIC-1\n",
     "quantity: ", "temperature", "flow", "other", "unit: ", "direction: raise", "setpoint: ", "65 degC", "6 bar", "tolerance: ", "1.5 K",
     "kind: ", "pt100", "resistive_heater", "gas_burner", "modulating", "power: ", "6 kW", ", ", "- ", "[", "]", "---\n", "rates: ", "nan",
     "\n  ", "{", "}", "1,5 K", "1e400 s",
     "bodies: ", "mass: ", "wires: ", "5", "above: ", "duty: ", "limiter: ", "set: ", "\n"]
)  # fmt: skip


def check(documents, reading, text):
    lines = text.split("\n")
    for problem in reading.problems:
        assert problem.span.file == "a.yml"
        assert 1 <= problem.span.line <= max(len(lines), 1)
        assert 1 <= problem.span.column <= max(len(lines[problem.span.line - 1]), 1)
        assert problem.line().isprintable()
        assert problem.code != "F199"  # every kind of fault has words of its own
    sound = [document for document in documents if document.sound]
    assert reading.loops or reading.problems or not sound


@given(st.lists(TOKENS, max_size=40).map("".join))
@settings(max_examples=250, deadline=None)
def test_text_like_a_loop_file(text):
    documents, _ = read_text(text, "a.yml")
    check(documents, read_loops(documents), text)


@given(st.text(max_size=200))
@settings(max_examples=100, deadline=None)
def test_any_text(text):
    documents, _ = read_text(text, "a.yml")
    check(documents, read_loops(documents), text.replace("\r\n", "\n").replace("\r", "\n").removeprefix("\ufeff"))


@cache
def demo() -> tuple[Document, ...]:
    return tuple(document for document in read_folder(LOOPS, "loops").loops if "same_as" not in document.data)


@cache
def everything() -> tuple[Document, ...]:
    return read_folder(LOOPS, "loops").loops


@cache
def special(file) -> Document:
    text = DEVICES if file == "devices.yml" else (LOOPS / file).read_text(encoding="utf-8")
    return read_text(text, file)[0][0]


def paths(value, path=()):
    yield path
    if isinstance(value, dict):
        for key, inner in value.items():
            yield from paths(inner, (*path, key))
    elif isinstance(value, list):
        for index, inner in enumerate(value):
            yield from paths(inner, (*path, index))


def changed(value, path, change):
    """Return a copy of nested data with the value at a path replaced, or dropped where ``change`` is None."""
    step, *rest = path
    copy = dict(value) if isinstance(value, dict) else list(value)
    if rest:
        copy[step] = changed(copy[step], tuple(rest), change)
    elif change is None:
        del copy[step]
    else:
        copy[step] = change
    return copy


ODD = st.sampled_from(
    ["", "0", "-1", "yes", "off", "1", "nan", "1e400 K", "-5 K", "10 K to 5 K", "0 K", "65 degC", "6 bar", "5 percent", "3 phases",
     "x" * 3000, "TIC-101", "{}",
     [], {}, ["a"], [[]], {"kind": "fan"}, {"above": "1 K"}, {"": ""}, {"kind": ["a"]}, {"kind": {"a": "b"}}, [{}]]
)  # fmt: skip


@given(st.data())
@settings(max_examples=400, deadline=None)
def test_a_demo_loop_with_one_field_changed(data):
    document = data.draw(st.sampled_from(demo()))
    path = data.draw(st.sampled_from([path for path in paths(document.data) if path]))
    change = data.draw(st.none() | ODD)
    other = Document(document.file, 0, document.line, changed(document.data, path, change), document.spans, document.key_spans)
    reading = read_loops([other])
    assert bool(reading.loops) != bool(reading.problems)
    places = {span.line for span in [*document.spans.values(), *document.key_spans.values()]}
    for problem in reading.problems:
        assert problem.span.file == document.file
        assert problem.span.line in places
        assert problem.line().isprintable()
        assert problem.code != "F199"


@given(st.data())
@settings(max_examples=60, deadline=None)
def test_one_changed_loop_leaves_the_others(data):
    """Only loops that start from the changed one may be lost with it."""
    documents = everything()
    number = data.draw(st.integers(0, len(documents) - 1))
    document = documents[number]
    path = data.draw(st.sampled_from([path for path in paths(document.data) if path and path[0] != "tag"]))
    change = data.draw(st.none() | ODD)
    other = Document(document.file, 0, document.line, changed(document.data, path, change), document.spans, document.key_spans)
    before = {read.loop.tag for read in read_loops(documents).loops}
    after = {read.loop.tag for read in read_loops([*documents[:number], other, *documents[number + 1 :]]).loops}
    tag = document.data["tag"]
    from_it = {d.data["tag"] for d in documents if d.data.get("same_as") == tag}
    assert before - after <= {tag} | from_it


@pytest.mark.parametrize(("model", "file"), [(Panel, "panel.yml"), (Devices, "devices.yml")])
@given(data=st.data())
@settings(max_examples=120, deadline=None)
def test_a_panel_or_device_with_one_field_changed(model, file, data):
    document = special(file)
    path = data.draw(st.sampled_from([path for path in paths(document.data) if path]))
    change = data.draw(st.none() | ODD)
    made, problems = read_model(model, changed(document.data, path, change))
    assert (made is None) == bool(problems)
    for problem in problems:
        assert problem.code != "F199"
        assert place(document, problem).span.line >= 1


DEVICES = """contactors:
  - {name: contactor class 25, poles: 3, resistive_current: 25 A, motor_current: 12 A, reference_temperature: 40 degC,
     electrical_life: [{current: 25 A, operations: 1.0e6}, {current: 12 A, operations: 2.5e6}],
     mechanical_life: 10e6, operations_per_hour: 600, pull_in: 20 ms, drop_out: 15 ms,
     coil: {voltage: 24 V, kind: dc, power: 3 W}, loss_per_pole: 1.6 W}
ssrs:
  - {name: three-phase solid state class 25, poles: 3, switched_poles: 3, current: 25 A, on_drop: 1.3 V,
     slope_resistance: 9 mohm, junction_to_case: 0.5 K/W, case_to_sink: 0.1 K/W, highest_junction: 125 degC, leakage: 5 mA,
     i2t: 600 A2 s, input: {voltage: 4 V to 32 V, current: 12 mA}}
"""
