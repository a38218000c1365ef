"""The JSON Schemas: valid in themselves, true to the reader, and good to the demo."""

import json
import re
from functools import cache
from pathlib import Path

import jsonschema
import pytest
import yaml

from specgen.model.loops import read_loops
from specgen.model.schema import json_schema
from specgen.source import read_folder, read_text

LOOPS = Path(__file__).parents[2] / "loops"
INPUTS = Path(__file__).parents[1] / "inputs"
KINDS = ["loop", "panel", "devices"]


@cache
def validator(kind):
    return jsonschema.Draft202012Validator(json_schema(kind))


def errors(kind, data):
    return list(validator(kind).iter_errors(data))


@pytest.mark.parametrize("kind", KINDS)
def test_is_a_schema(kind):
    schema = json_schema(kind)
    jsonschema.Draft202012Validator.check_schema(schema)
    assert schema["$schema"] == "https://json-schema.org/draft/2020-12/schema"
    assert json.loads(json.dumps(schema)) == schema


@pytest.mark.parametrize("kind", KINDS)
def test_is_the_same_each_time(kind):
    assert json.dumps(json_schema(kind)) == json.dumps(json_schema(kind))


def as_an_editor_reads(text):
    """Numbers, truth values and dates as YAML 1.1 has them; a date is text to a schema."""
    return [json.loads(json.dumps(data, default=str)) for data in yaml.safe_load_all(text)]


@pytest.mark.parametrize("path", sorted(LOOPS.glob("*.yml")), ids=lambda path: path.stem)
def test_the_demo_is_valid(path):
    kind = path.stem if path.stem in ("panel", "devices") else "loop"
    documents = as_an_editor_reads(path.read_text(encoding="utf-8"))
    assert documents
    for data in documents:
        assert not errors(kind, data)


def test_the_demo_is_valid_as_text_too():
    sources = read_folder(LOOPS, "loops")
    assert not errors("panel", sources.panel.data)
    for document in sources.loops:
        assert not errors("loop", document.data)


# what an editor can tell without knowing units, other loops or relations between fields
SEEN = [
    "decimal-comma", "no-unit", "infinite", "not-a-number", "yes-where-a-quantity-belongs", "range-where-one-number-belongs",
    "direction-misspelt", "element-kind-misspelt", "element-kind-missing", "sensor-kind-missing", "sensor-class-of-another-kind",
    "signal-misspelt", "on-sensor-fault-misspelt", "unknown-key", "near-miss-key", "key-of-another-section", "key-set-by-the-reader",
    "list-where-a-section-belongs", "section-where-a-value-belongs", "value-where-a-section-belongs", "value-where-a-list-belongs",
    "required-section-missing", "required-field-missing", "tag-missing", "tag-leaves-the-folder", "tag-too-long", "tag-with-a-blank",
    "tag-is-a-list", "quantity-is-a-section", "quantity-is-a-list", "plus-minus", "comma-groups-thousands", "digits-grouped-by-blanks",
    "same-as-a-list",
]  # fmt: skip


@pytest.mark.parametrize("name", SEEN)
def test_an_editor_marks(name):
    documents, _ = read_text((INPUTS / f"{name}.yml").read_text(encoding="utf-8"), "a.yml")
    assert errors("loop", documents[0].data)
    assert not errors("loop", documents[-1].data)


@pytest.mark.parametrize("name", sorted(path.stem for path in INPUTS.glob("fine-*.yml")))
def test_what_is_fine_is_not_marked(name):
    documents, _ = read_text((INPUTS / f"{name}.yml").read_text(encoding="utf-8-sig"), "a.yml")
    for document in documents:
        assert not errors("loop", document.data)


def test_whatever_the_reader_takes_the_schema_takes():
    """No file of the bad inputs holds a loop that is read and yet marked by an editor."""
    for path in sorted(INPUTS.glob("*.yml")):
        if path.name.startswith("panel-") or b"\0" in path.read_bytes():
            continue
        text = path.read_bytes().decode("utf-8", errors="replace").replace("\ufffd", "?")
        documents, _ = read_text(text, path.name)
        good = {read.line for read in read_loops(documents).loops}
        for document in documents:
            if document.line in good:
                assert not errors("loop", document.data), path.name


def properties(schema, pointer):
    for step in pointer.split("/"):
        schema = schema[step]
    return schema


def test_what_an_editor_shows():
    schema = json_schema("loop")
    setpoint = properties(schema, "$defs/Need/properties/setpoint")
    assert "65 degC" in setpoint["description"]
    assert properties(schema, "$defs/Need/properties/direction/enum") == ["raise", "lower"]
    assert properties(schema, "$defs/Need/required") == ["quantity", "direction", "setpoint", "tolerance"]
    assert "unit" not in properties(schema, "$defs/LoopAlone/properties")
    assert "same_as" in properties(schema, "$defs/LoopFromAnother/properties")
    assert "null" not in json.dumps(schema)


def test_every_quantity_has_an_example_that_its_pattern_takes():
    def walk(node):
        if isinstance(node, dict):
            if "pattern" in node and "examples" in node:
                yield node
            for value in node.values():
                yield from walk(value)
        elif isinstance(node, list):
            for value in node:
                yield from walk(value)

    found = [node for kind in KINDS for node in walk(json_schema(kind))]
    assert len(found) > 100
    for node in found:
        for example in node["examples"]:
            assert re.search(node["pattern"], example)


def test_defaults_stand_as_they_would_be_written():
    panel = json_schema("panel")
    assert properties(panel, "$defs/ControlSupply/properties/voltage/default") == "24 V"
    assert properties(panel, "$defs/Supply/properties/neutral/default") == "yes"
    assert properties(panel, "$defs/House/properties/cycle_time_series/default")[:3] == ["1", "2", "3"]
