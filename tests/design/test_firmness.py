import importlib.util
from dataclasses import replace
from pathlib import Path

import pytest

from specgen.catalogue.load import load_catalogue
from specgen.design.decide import decide
from specgen.design.firmness import NEAR, firmness_of, nearest_first, nothing_hides
from specgen.design.many import Task
from specgen.design.outcome import Subject, standing_of, verdict_of_loop
from specgen.design.record_loop import loop_record
from specgen.design.varied import uncertain_inputs
from specgen.model.loops import read_loops
from specgen.model.panel import Panel
from specgen.model.reader import read_model
from specgen.source.read import read_text

_spec = importlib.util.spec_from_file_location("make_loops", Path(__file__).parents[1] / "benchmarks" / "make_loops.py")
make_loops = importlib.util.module_from_spec(_spec)
_spec.loader.exec_module(make_loops)

CATALOGUE = load_catalogue(None)
PANEL = read_model(Panel, read_text(make_loops.PANEL, "loops/panel.yml")[0][0].data)[0]
KINDS = range(len(make_loops.MAKERS))


def read(text):
    reading = read_loops(read_text(text, "loops/a.yml")[0])
    assert not reading.problems
    return reading.loops[0]


def mixed(number, seed=4):
    return read(make_loops.loop_text(number, seed))


def outcome(subject):
    return verdict_of_loop(subject.loop, subject.panel, CATALOGUE, subject.fitted)


@pytest.mark.parametrize("number", [*KINDS, *(13 + kind for kind in KINDS)])
def test_the_outcome_alone_is_what_deciding_says(number):
    loop = mixed(number)
    decided, _ = decide(loop, PANEL, CATALOGUE)
    candidate = decided.decision.chosen.case.candidate
    found = verdict_of_loop(loop.loop, PANEL, CATALOGUE)
    assert (found.mode, found.device, found.verdict) == (candidate.mode, candidate.device, decided.verdict)


@pytest.mark.parametrize(
    "wish", ["{mode: on_off, because: old habit}", "{cycle_time: 20 s, because: house rule}", "{output: ssr, because: x}"]
)
def test_the_outcome_under_a_choice_is_what_deciding_says(wish):
    loop = read(make_loops.loop_text(0, 4) + f"choose: {wish}\n")
    decided, _ = decide(loop, PANEL, CATALOGUE)
    candidate = decided.decision.chosen.case.candidate
    found = verdict_of_loop(loop.loop, PANEL, CATALOGUE)
    assert (found.mode, found.device, found.verdict) == (candidate.mode, candidate.device, decided.verdict)


@pytest.mark.parametrize("number", [0, 3, 6, 8])
def test_just_inside_the_decision_stands_and_at_the_value_it_is_another(number):
    subject = Subject(mixed(number).loop, PANEL)
    declared = outcome(subject)
    by_name = {one.name: one for one in uncertain_inputs(subject)}
    changes = 0
    for firm in firmness_of(subject, CATALOGUE):
        one = by_name[firm.input]
        for value, to, sign in ((firm.below, firm.below_to, -1.0), (firm.above, firm.above_to, 1.0)):
            assert (value is None) == (to == "")
            if value is None:
                continue
            changes += 1
            way = _way(one, value)
            assert way * sign > 0
            assert outcome(one.at(way)) != declared
            inside = sign * max(abs(way) - 1.1 * NEAR, 0.0)
            assert outcome(one.at(inside)) == declared
    assert changes > 2


@pytest.mark.parametrize("number", [0, 3, 8])
def test_where_no_change_is_told_none_is_found_on_a_grid(number):
    subject = Subject(mixed(number).loop, PANEL)
    declared = standing_of(subject, CATALOGUE)
    by_name = {one.name: one for one in uncertain_inputs(subject)}
    for firm in firmness_of(subject, CATALOGUE):
        one = by_name[firm.input]
        for value, sign in ((firm.below, -1.0), (firm.above, 1.0)):
            if value is None and not (one.shifts and (one.up if sign > 0 else one.down) <= 0):
                for way in (0.11, 0.37, 0.62, 0.83):
                    assert standing_of(one.at(sign * way), CATALOGUE, declared).outcome == declared.outcome, (firm.input, sign * way)


def _way(one, value):
    """Find the way of a value by halving: it rises with the value."""
    low, high = -1.0, 1.0
    for _ in range(60):
        middle = (low + high) / 2
        low, high = (middle, high) if one.value(middle) < value else (low, middle)
    return high


# full output of 10 kW against a loss of 100 W/K over 60 K and a load of 1 kW: at -10 percent supply it moves 8.1 kW, and 7 are needed
BY_HAND = """tag: TIC-1
service: Tank
need: {quantity: temperature, direction: raise, setpoint: 80 degC, tolerance: 3 K, overshoot: 6 K}
plant: {balance: {heat_capacity: 400 kJ/K, loss: 100 W/K, surroundings: 20 degC, load: 1 kW, dead_time: 20 s}}
sensor: {kind: pt100, class: A, wires: 4, step: 0.1 K, noise: 0.1 K, lag: 5 s}
element: {kind: resistive_heater, power: 10 kW, voltage: 400 V, phases: 3, needs: [level]}
limits: {danger_high: 180 degC, consequence: product, on_sensor_fault: off, after_power_return: resume}
"""


def by_hand():
    return {firm.input: firm for firm in firmness_of(Subject(read(BY_HAND).loop, PANEL), CATALOGUE)}


def test_where_full_output_no_longer_reaches_is_worked_out_by_hand():
    """The loop is held where 0.81 P = 100 W/K (80 - Ta) + Q no longer holds: P = 8642 W, Q = 2100 W, Ta = 9 degC."""
    found = by_hand()
    assert found["element.power"].below == pytest.approx(7000 / 0.81, rel=0.01)
    assert found["plant.load"].above == pytest.approx(2100, rel=0.01)
    assert found["plant.surroundings"].below == pytest.approx(9.0, abs=0.5)
    for firm, to in (("element.power", "below_to"), ("plant.load", "above_to"), ("plant.surroundings", "below_to")):
        assert getattr(found[firm], to).endswith("held")


def test_every_uncertain_input_has_one_entry_in_the_order_of_the_file():
    plant = ["plant.dead_time", "plant.heat_capacity", "element.power", "plant.load", "plant.surroundings"]
    assert list(by_hand()) == [*plant, "need.tolerance", "house.contact_life"]


def test_a_declared_zero_has_no_size_to_vary():
    loop = read(BY_HAND.replace("load: 1 kW", "load: 0 kW"))
    assert "plant.load" not in {one.name for one in uncertain_inputs(Subject(loop.loop, PANEL))}


def test_a_range_is_moved_as_a_whole_and_temperatures_are_shifted():
    loop = read(BY_HAND.replace("load: 1 kW", "load: 0.5 kW to 1 kW").replace("surroundings: 20 degC", "surroundings: 10 degC to 20 degC"))
    by_name = {one.name: one for one in uncertain_inputs(Subject(loop.loop, PANEL))}
    doubled = by_name["plant.load"].vary(2.0).loop.plant.balance.load
    assert (doubled.low, doubled.high) == (1000.0, 2000.0)
    shifted = by_name["plant.surroundings"].vary(-5.0).loop.plant.balance.surroundings
    assert (shifted.low, shifted.high) == (5.0, 15.0)
    assert by_name["plant.surroundings"].declared == 10.0
    assert by_name["plant.surroundings"].value(1.0) == 10.0 + 70.0


def test_bodies_gain_heat_together():
    text = BY_HAND.replace(
        "heat_capacity: 400 kJ/K",
        "bodies: [{what: water, mass: 100 kg, specific_heat: 4 kJ/(kg K)}, "
        "{what: load, mass: 0 kg to 10 kg, specific_heat: 1 kJ/(kg K), follows: slow}]",
    )
    one = next(one for one in uncertain_inputs(Subject(read(text).loop, PANEL)) if one.name == "plant.heat_capacity")
    assert one.declared == 400_000.0
    assert [body.mass.high for body in one.vary(3.0).loop.plant.balance.bodies] == [300.0, 30.0]


def test_rules_that_turn_together_may_hide_a_change():
    """A must-rule that breaks somewhere between two standings of the same outcome is not overlooked."""
    standing = standing_of(Subject(read(BY_HAND).loop, PANEL), CATALOGUE)
    assert nothing_hides(standing, standing)
    ours = standing.findings[standing.chosen]
    at = next(i for i, finding in enumerate(ours) if finding.weight == "must" and finding.outcome == "holds")
    broken = (*ours[:at], replace(ours[at], outcome="broken"), *ours[at + 1 :])
    assert not nothing_hides(standing, replace(standing, findings={**standing.findings, standing.chosen: broken}))


def test_the_record_has_one_entry_an_input_and_no_value_where_nothing_changes():
    decided, _ = Task(PANEL, CATALOGUE).decided(read(BY_HAND))
    rows = {row["input"]: row for row in loop_record(decided)["firmness"]}
    assert list(rows) == [firm.input for firm in decided.firmness]
    assert (rows["plant.dead_time"]["declared"], rows["plant.dead_time"]["unit"]) == (20.0, "s")
    assert (rows["plant.surroundings"]["declared"], rows["plant.surroundings"]["unit"]) == (20.0, "degC")
    assert (rows["house.contact_life"]["declared"], rows["house.contact_life"]["unit"]) == (10.0, "year")
    for firm in decided.firmness:
        row = rows[firm.input]
        assert ("below" in row, "below_to" in row) == (firm.below is not None,) * 2
        assert ("above" in row, "above_to" in row) == (firm.above is not None,) * 2


def test_a_panel_lists_what_is_nearest_to_changing_a_decision_first():
    loops = [Task(PANEL, CATALOGUE).decided(loop)[0] for loop in (read(BY_HAND), mixed(3))]
    ordered = [firm.nearness for _, firm in nearest_first(loops)]
    assert ordered == sorted(ordered)
    assert len(ordered) == sum(len(loop.firmness) for loop in loops)
