"""The demo: nothing in it is held, and it shows every kind of thing there is."""

from pathlib import Path

import pytest

from specgen.core.printed import SI
from specgen.design.project import load_design
from specgen.design.record import record_of
from specgen.model.traits import TRAITS

DEMO = Path(__file__).parents[2]
CONFIRMED = "the demo has a choice that the rules would take too"


@pytest.fixture(scope="module")
def design():
    return load_design(DEMO, remember=False)


@pytest.fixture(scope="module")
def record(design):
    return record_of(design)


def test_nothing_is_held_or_wrong(design):
    assert not design.problems
    assert [loop.tag for loop in design.loops if loop.verdict == "held"] == []
    assert {loop.verdict for loop in design.loops} >= {"meets", "deviates", "open"}


def test_every_kind_of_element_is_there(design):
    kinds = {loop.loop.element.kind for loop in design.loops}
    assert {kind.split()[0] for kind in TRAITS} <= kinds
    stages = {getattr(loop.loop.element, "stages", None) for loop in design.loops}
    assert stages >= {"on_off", "high_low", "modulating"}


def test_every_mode_and_device_is_there(record):
    assert {row["mode"] for row in record["loops"]} == {"on_off", "time_proportioned", "analogue", "three_point"}
    devices = {row["output"]["device"] for row in record["loops"]}
    assert devices == {"relay", "contactor", "ssr", "power_controller", "signal", "relay_pair"}


def test_three_forms_of_plant_and_one_loop_without(design):
    plants = [loop.loop.plant for loop in design.loops]
    for form in ("balance", "response", "rates"):
        assert any(plant is not None and getattr(plant, form) is not None for plant in plants), form
    assert any(plant is None for plant in plants)


def test_every_quantity_is_there(design):
    assert {loop.loop.need.quantity for loop in design.loops} >= {"temperature", "humidity", "pressure", "level", "flow"}


def test_heat_and_cold_act_on_one_body(design):
    bodies = {}
    for loop in design.loops:
        if loop.loop.acts_on:
            bodies.setdefault(loop.loop.acts_on, set()).add(loop.loop.need.direction)
    assert {"raise", "lower"} in bodies.values()


def test_one_loop_takes_over_another(design):
    assert any(loop.read.inherited for loop in design.loops)


def test_a_deviation_is_justified_and_a_choice_confirmed(design, record):
    chosen = [loop for loop in design.loops if loop.loop.choose is not None]
    justified = [loop for loop in chosen if loop.loop.choose.because and loop.verdict == "deviates"]
    assert any(finding.outcome == "overridden" for loop in justified for finding in loop.findings)
    rows = {row["tag"]: row for row in record["loops"]}
    confirmed = [loop for loop in chosen if not loop.loop.choose.because and loop.decision.by_designer]
    assert confirmed, CONFIRMED
    for loop in confirmed:
        assert "the rules alone would take" not in rows[loop.tag]["because"]


def test_every_number_shown_is_in_the_basis(record):
    """Settings, predictions, ratings, faults and the limiter: each is some figure's result."""
    for row in record["loops"]:
        results = [figure["result"] for figure in row["basis"]]
        sections = [row["settings"], row["predicted"], row["output"], row.get("limiter", {}), *row["faults"].values()]
        for section in sections:
            for name, value in section.items():
                if isinstance(value, float):
                    assert any(value == pytest.approx(result, rel=1e-8) for result in results), (row["tag"], name, value)


def test_no_formula_is_left_empty(record):
    for row in record["loops"]:
        for figure in row["basis"]:
            assert set(figure) == {"symbol", "formula", "with", "result", "unit", "source", "case"}
            assert figure["formula"], (row["tag"], figure)
            assert figure["source"], (row["tag"], figure)
            assert figure["symbol"]


def test_units_of_the_record_are_units_and_not_dimensions(record):
    dimensions = {"value", "change", "change_per_second", "share_per_change", *SI.fixed, *SI.ladders}
    for row in record["loops"]:
        for figure in row["basis"]:
            assert figure["unit"] not in dimensions, figure
