"""Two panels against the whole engine: every must-rule broken once, and every must-rule unanswered that can be."""

from functools import cache
from pathlib import Path

import pytest

from specgen.design.project import design_of, load_design
from specgen.rules.planned import PLANNED
from specgen.source import Sources, read_text

PANELS = Path(__file__).parents[1] / "panels"

# rules that break along with the one named, from the same cause and no other
WITH_IT = {
    "A3": {"S7"},  # a heating valve that opens without supply
    "M2": {"O1"},  # nothing switches a valve that takes a signal
    "M4": {"O1"},  # nothing switches a valve that travels
    "M8": {"O1"},  # no plain switch is rated for lamps
}
# a contact cannot be asked to throttle: the pair is refused as an input before any rule is asked
REFUSED = {"M3"}
BROKEN = ["A1", "A2", "A3", "M1", "M2", "M4", "M7", "M8", "M9", "M11", "M12", "D1", "D3", "D4", "C1", "C2", "C4", "I2", "S1"]

# Must-rules that no readable loop file can leave unanswered, and why.
ALWAYS_ANSWERED = {
    "A1": "need.direction is required",
    "M1": "a compressor's least run, least rest and starts an hour are required",
    "M2": "whether an element takes a signal follows from its kind, and its signal is required",
    "M3": "mode and device are the candidate's own",
    "M4": "whether a valve travels follows from its kind",
    "M8": "whether a load may be switched whole follows from its kind",
}
UNANSWERED = ["A2", "A3", "M7", "M9", "M11", "M12", "D1", "D3", "D4", "C1", "C2", "C4", "I2", "S1"]


@cache
def decided(name):
    design = load_design(PANELS / name)
    assert not design.problems
    return design, {loop.tag: loop for loop in design.loops}


def outcomes(loop, outcome):
    return {f.rule for f in loop.findings if f.outcome == outcome and f.weight == "must"}


@pytest.mark.parametrize("rule", BROKEN)
def test_broken_once(rule):
    _, loops = decided("broken")
    loop = loops[f"BREAKS-{rule}"]
    assert outcomes(loop, "broken") - WITH_IT.get(rule, set()) == {rule}
    assert loop.verdict == "held"


def test_the_broken_panel_is_held():
    design, loops = decided("broken")
    assert design.verdict == "held"
    assert set(loops) == {f"BREAKS-{rule}" for rule in BROKEN}


@pytest.mark.parametrize("rule", UNANSWERED)
def test_unanswered(rule):
    _, loops = decided("unanswered")
    loop = loops[f"ASKS-{rule}"]
    assert rule in outcomes(loop, "unanswered")
    assert not outcomes(loop, "broken")
    assert loop.verdict == "open"
    assert any(rule in missing.settles for missing in loop.missing), "the sheet names what would answer it"


def test_the_unanswered_panel_is_open():
    design, loops = decided("unanswered")
    assert design.verdict == "open"
    assert set(loops) == {f"ASKS-{rule}" for rule in UNANSWERED}


def test_every_rule_of_the_first_book_is_in_one_of_the_lists():
    first = {"A1", "A2", "A3", "M1", "M2", "M3", "M4", "M7", "M8", "M9", "M11", "M12", "D1", "D3", "D4", "C1", "C2", "C4", "I2", "S1"}
    musts = {rule.code for rule in PLANNED if rule.weight == "must"}
    assert first <= musts
    assert set(BROKEN) | REFUSED == first
    assert set(UNANSWERED) | set(ALWAYS_ANSWERED) == first
    assert not set(UNANSWERED) & set(ALWAYS_ANSWERED)


@pytest.mark.parametrize("rule", sorted(ALWAYS_ANSWERED))
def test_what_is_always_answered_is_never_unanswered(rule):
    for name in ("broken", "unanswered"):
        _, loops = decided(name)
        for loop in loops.values():
            everywhere = [loop.findings, *(rejected.examined.findings for rejected in loop.decision.rejected)]
            assert not any(f.rule == rule and f.outcome == "unanswered" for findings in everywhere for f in findings)


def one_loop(text):
    documents, problems = read_text(text, "loops/a.yml")
    panel, _ = read_text((PANELS / "broken" / "loops" / "panel.yml").read_text(encoding="utf-8"), "loops/panel.yml")
    return design_of(Sources(panel[0], None, tuple(documents), tuple(problems), ()))


HEATER = """tag: TIC-1
service: A heater
need: {quantity: temperature, direction: raise, setpoint: 65 degC, tolerance: 2 K}
plant: {response: {change: 130 K, time_constant: 20 min, dead_time: 25 s, rest_value: 20 degC}}
sensor: {kind: pt100, class: A, step: 0.1 K}
element: {kind: resistive_heater, power: 6 kW, voltage: 400 V, phases: 3, needs: []}
limits: {danger_high: 95 degC, consequence: product, on_sensor_fault: off}
"""


def test_a_contactor_cannot_be_asked_to_throttle():
    """No trade uses the pair; named by the designer it is held, whatever the reason."""
    design = one_loop(HEATER + "choose: {mode: analogue, output: contactor, because: Test.}\n")
    assert not design.problems
    assert design.loops[0].verdict == "held"
    assert {f.rule for f in design.loops[0].findings if f.outcome == "broken"} >= {"M3"}


def test_a_choice_against_advice_needs_its_reason():
    without = one_loop(HEATER + "choose: {mode: time_proportioned, output: contactor}\n")
    assert [(p.code, p.span.line) for p in without.problems] == [("L302", 8)]
    reasoned = one_loop(HEATER + "choose: {mode: time_proportioned, output: contactor, because: Site keeps contactors only.}\n")
    assert not reasoned.problems
    assert reasoned.loops[0].verdict == "deviates"
    assert {f.rule for f in reasoned.loops[0].findings if f.outcome == "overridden"} >= {"C3"}


def test_a_must_is_never_overridden_by_a_reason():
    design = one_loop(HEATER + "choose: {mode: time_proportioned, output: ssr, cycle_time: 120 s, because: We want it so.}\n")
    assert design.loops[0].verdict == "held"
    assert "C1" in outcomes(design.loops[0], "broken")


def test_confirming_the_rules_needs_no_reason():
    design = one_loop(HEATER + "choose: {mode: time_proportioned, output: ssr}\n")
    assert not design.problems
    assert design.loops[0].decision.by_designer
    assert not {f.rule for f in design.loops[0].findings if f.outcome == "overridden"}
