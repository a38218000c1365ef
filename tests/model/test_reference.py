"""The field reference: a row for every field, its words from the models."""

import pytest

from specgen.core.dimension import DIMENSIONS
from specgen.model.fields import WORDS_OF_LOOP
from specgen.model.reference import as_markdown, field_reference

ROWS = field_reference({"element.min_run": ("D3", "M1"), "need.tolerance": ("M5",)})


def row(field, document="loop", kind=""):
    return next(r for r in ROWS if (r.document, r.field) == (document, field) and (not kind or kind in r.kinds))


# written out from the contract of the loop file, not from the models
CONTRACT = [
    ("tag", "text", "", "yes", ""),
    ("same_as", "tag of another loop", "", "no", ""),
    ("area", "text", "", "no", ""),
    ("need.setpoint", "quantity", "the loop's quantity", "yes", ""),
    ("need.stability", "steady or relaxed", "", "no", "steady"),
    ("plant.response.change", "quantity or range", "a difference of the loop's quantity", "yes", ""),
    ("plant.rates.with_output", "quantity or range", "a rate of change of the loop's quantity", "yes", ""),
    ("plant.balance.bodies[].follows", "fast or slow", "", "no", "fast"),
    ("limits.limiter.resets", "manual or automatic", "", "no", "manual"),
    ("limits.frost_risk", "yes or no", "", "no", "no"),
    ("element.count", "count", "", "no", "1"),
    ("element.operations_life", "number", "", "no", ""),
    ("notes", "list of text", "", "no", ""),
]


@pytest.mark.parametrize("wanted", CONTRACT, ids=lambda wanted: wanted[0])
def test_the_contract(wanted):
    assert row(wanted[0])[1:6] == wanted


def test_one_row_a_difference_between_kinds():
    assert row("element.min_run", kind="fan").required == "no"
    assert row("element.min_run", kind="fixed_speed_compressor").required == "yes"
    assert row("element.power", kind="resistive_heater").required == "yes"
    assert row("sensor.wires", kind="pt100").default == "3"
    assert row("sensor.wires", kind="transmitter").default == "2"
    assert row("sensor.step").kinds == ()  # every kind has it


def test_all_kinds_of_element_are_named():
    assert row("element.kind").type.count(" or ") == 14  # fifteen kinds in the contract's table


def test_readers_are_carried_over():
    assert row("element.min_run", kind="fan").read_by == ("D3", "M1")
    assert row("need.tolerance").read_by == ("M5",)
    assert row("same_as").read_by == ("reading",)


def test_the_panel_and_the_devices_are_there():
    assert row("house.contact_life", "panel").default == "10 year"
    assert row("supply.tolerance", "panel")[2:6] == ("quantity", "fraction", "no", "10 percent")
    assert row("house.cycle_time_series", "panel").default.startswith("1, 2, 3, 5, 8")
    assert row("contactors[].electrical_life[].current", "devices").dimension == "current"


def test_every_quantity_names_a_known_dimension():
    words = {name.replace("_", " ") for name in DIMENSIONS} | set(WORDS_OF_LOOP.values()) | {"flow"}
    for r in ROWS:
        assert (r.type.startswith("quantity") and "section" not in r.type) == bool(r.dimension)
        assert not r.dimension or r.dimension in words


def test_markdown_has_a_line_a_row():
    text = as_markdown(ROWS)
    assert len([line for line in text.splitlines() if line.startswith("| `")]) == len(ROWS)
    width = {line.replace("\\|", "").count("|") for line in text.splitlines() if line.startswith("|")}
    assert width == {8}
