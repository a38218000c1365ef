"""Circuits of several hundred loops, walked along wires and contacts: what is fed, what is protected, what stops what."""

from collections import Counter, defaultdict

import pytest

from specgen.design.wiring.draft import step_at
from specgen.design.wiring.types import TERMINAL

PROTECTS = ("breaker", "fuse", "motor_breaker")
TAKES = ("coil", "valve_coil", "alarm", "valve_motor", "motor", "heater", "heater_star", "heater_delta", "lamp", "transformer", "drive")


def steps_of(wiring):
    paths = [path for circuit in wiring.circuits for path in ([circuit.supply] if circuit.supply else []) + list(circuit.paths)]
    return [step for path in paths for step in path.steps]


def reached(wiring, start, without=()):
    """Return every connection point that current can come to from one, elements of some designations taken out."""
    beside = defaultdict(set)
    for wire in wiring.wires:
        beside[wire.start].add(wire.end)
        beside[wire.end].add(wire.start)
    for step in steps_of(wiring):
        # a coil or a device ends the search; contacts and protection let current through
        passes = step.symbol not in TAKES and step.symbol not in ("box", "input", "shield", "burner", TERMINAL)
        if step.enter and step.leave and passes and step.element not in without:
            beside[step.top].add(step.foot)
            beside[step.foot].add(step.top)
    seen, waiting = {start}, [start]
    while waiting:
        for point in beside[waiting.pop()] - seen:
            # the panel's own rails are where current comes from, not a way through
            seen.add(point)
            if not is_source(point):
                waiting.append(point)
    return seen


def is_source(point):
    return point.split(":")[0].endswith(("-T1", "-X0")) or (point.startswith("=PNL") and "-F1:" in point)


def live(points):
    return {p for p in points if is_source(p) and not p.endswith((":N", ":PE", ":−")) and not (p.endswith("-T1:2"))}


def test_terminals_count_from_one_and_have_one_wire_to_the_field(wired):
    for loop, wiring, _ in wired:
        name = f"={loop.tag.replace('-', '')}-X1"
        numbers = sorted(int(t.designation.rpartition(":")[2]) for t in wiring.terminals)
        assert numbers == list(range(1, len(numbers) + 1)), loop.tag
        assert {t.designation.rpartition(":")[0] for t in wiring.terminals} <= {name}
        outside = Counter(end for wire in wiring.wires if wire.field for end in (wire.start, wire.end) if end.startswith(f"{name}:"))
        assert set(outside) == {t.designation for t in wiring.terminals}, loop.tag
        assert set(outside.values()) <= {1}, loop.tag
        assert all(t.inside and t.outside for t in wiring.terminals), loop.tag


def test_every_conductor_ends_in_an_element_at_both_ends(wired):
    for loop, wiring, _ in wired:
        points = {point for step in steps_of(wiring) for point in (step.top if step.enter else "", step.foot if step.leave else "")}
        points |= {f"{item.element}:{pin}" for circuit in wiring.circuits for item in circuit.across for pin in "12"}
        for wire in wiring.wires:
            for end in (wire.start, wire.end):
                assert end in points or is_source(end), (loop.tag, end)
            assert wire.start != wire.end, (loop.tag, wire)
        assert len(set(wiring.wires)) == len(wiring.wires), loop.tag
        ends = {end for wire in wiring.wires for end in (wire.start, wire.end)}
        assert points - {""} <= ends, (loop.tag, points - ends)


def test_a_connection_point_carries_one_potential_and_a_potential_hangs_together(wired):
    for loop, wiring, _ in wired:
        names, groups = defaultdict(set), defaultdict(list)
        for wire in wiring.wires:
            names[wire.start].add(wire.potential)
            names[wire.end].add(wire.potential)
            groups[wire.potential].append(wire)
        assert [(point, found) for point, found in names.items() if len(found) > 1] == [], loop.tag
        for potential, wires in groups.items():
            together = {wires[0].start}
            for _ in wires:
                for wire in wires:
                    if wire.start in together or wire.end in together:
                        together |= {wire.start, wire.end}
            assert all(wire.start in together for wire in wires), (loop.tag, potential)


def test_every_taker_is_fed_over_protection(wired):
    for loop, wiring, _ in wired:
        protections = {step.element for step in steps_of(wiring) if step.symbol in PROTECTS}
        for step in steps_of(wiring):
            if step.symbol not in TAKES or not step.enter or step.enter in ("PE", "N"):
                continue
            source = live(reached(wiring, step.top))
            burner = f"={loop.tag.replace('-', '')}-K9:"
            fed_or_returned = source or any(is_source(p) or p.startswith(burner) for p in reached(wiring, step.top))
            assert fed_or_returned, (loop.tag, step)
            assert not live(reached(wiring, step.top, without=protections)), (loop.tag, step)
        for element in {step.element for step in steps_of(wiring) if step.symbol in TAKES} - {
            step.element for step in steps_of(wiring) if step.symbol == "valve_coil" and not step.leave
        }:
            points = {step.top for step in steps_of(wiring) if step.element == element and step.symbol in TAKES and step.enter}
            assert any(live(reached(wiring, point)) for point in points), (loop.tag, element)


def test_the_chain_stands_in_its_order_and_every_contact_of_it_stops_what_it_ends_in(wired):
    seen = 0
    for loop, wiring, _ in wired:
        chain = [link.designation for link in loop.safety.chain if link.kind != "burner_control"]
        contacts = ("emergency_stop", "overload_contact", "cut_out", "proof", "limiter_contact", "break_contact")
        walks = [
            [step.element for step in path.steps if step.symbol in contacts and step.element in chain]
            for circuit in wiring.circuits for path in circuit.paths
        ]  # fmt: skip
        found = [walk for walk in walks if walk]
        assert all(walk == chain for walk in found), (loop.tag, chain, found)
        assert bool(found) == bool(chain), (loop.tag, chain, loop.decision.chosen.case.candidate)
        seen += bool(chain)
    assert seen > 100


def test_a_limiter_s_contactor_is_another_than_the_loop_s_and_opens_every_live_line(wired):
    seen = 0
    for loop, wiring, _ in wired:
        if loop.safety.switch not in ("contactor", "drive_contactor"):
            continue
        own = f"={loop.tag.replace('-', '')}"
        for step in steps_of(wiring):
            if step.element.startswith((f"{own}-E", f"{own}-M")) and step.symbol in TAKES and step.enter not in ("PE", "N"):
                before = live(reached(wiring, step.top))
                if before and not any(point.endswith(("T1:+", "T1:1")) for point in before):
                    assert not live(reached(wiring, step.top, without=(f"{own}-Q2",))), (loop.tag, step)
                    seen += 1
    assert seen > 60


def test_what_is_drawn_is_what_the_parts_list_has(wired):
    """The controller -A1 is bought with others, cables and terminal strips are no symbols, what is not sized is no part."""
    for loop, wiring, design in wired:
        parts = {row.designation for row in design.panel_design.parts if row.loops == (loop.tag,)}
        own = f"={loop.tag.replace('-', '')}-"
        drawn = {element.designation for element in wiring.elements if element.designation.startswith(own)}
        open_ones = {element.designation for element in wiring.elements if element.open}
        assert {name for name in parts - drawn if not name.startswith(f"{own}W")} == set(), loop.tag
        assert drawn - parts - open_ones - {f"{own}A1"} == set(), loop.tag


def test_two_windings_are_never_on_together(wired):
    """Close both relays' make contacts and open what a picked-up relay opens: the second winding is dead."""
    seen = 0
    for loop, wiring, _ in wired:
        if loop.decision.chosen.case.candidate.device != "relay_pair":
            continue
        lower = next(step for step in steps_of(wiring) if step.enter == "lower")
        broken = [step for step in steps_of(wiring) if step.symbol == "break_contact" and step.element.endswith("-K1")]
        assert len(broken) == 1
        assert live(reached(wiring, lower.top))
        # the only way to the winding is over that break contact
        wires = [wire for wire in wiring.wires if broken[0].foot not in (wire.start, wire.end)]
        assert not any(lower.top in (w.start, w.end) and broken[0].top in (w.start, w.end) for w in wires)
        foot = broken[0].foot
        ends = {end for wire in wiring.wires if foot in (wire.start, wire.end) for end in (wire.start, wire.end)} - {foot}
        assert ends == {f"={loop.tag.replace('-', '')}-K2:11"}
        seen += 1
    assert seen >= 10


def test_joints_lie_on_a_step(wired):
    for _, wiring, _ in wired:
        for circuit in wiring.circuits:
            for item in circuit.across:
                assert step_at(circuit.paths, item.first)


@pytest.mark.parametrize("number", range(0, 42, 5))
def test_no_other_loop_renumbers_anything(panels, texts, make_design, number):
    many = list(texts("star", 42).values())
    alone = make_design(panels["star"], [many[number]])
    some = make_design(panels["star"], [many[number], many[(number + 7) % 42], many[(number + 14) % 42]])
    tag = alone.loops[0].tag
    one, other = alone.wirings[tag], some.wirings[tag]
    assert [t.designation for t in one.terminals] == [t.designation for t in other.terminals]
    assert [e.designation for e in one.elements] == [e.designation for e in other.elements]
    # the line a single-phase load stands on may change with the others; nothing else does
    blank = str.maketrans("123", "000")
    assert [t.outside for t in one.terminals] == [t.outside for t in other.terminals]
    assert [t.potential.translate(blank) for t in one.terminals] == [t.potential.translate(blank) for t in other.terminals]
