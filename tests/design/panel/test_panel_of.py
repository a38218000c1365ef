"""The panel from its loops: a worked sheet, and what must stay true of any loops."""

from collections import Counter

import numpy as np
import pytest
from hypothesis import HealthCheck, given
from hypothesis import settings as with_settings
from hypothesis import strategies as st

from specgen.core.say import THIN
from specgen.design.panel.confirmed import from_memory_rows_used, is_confirmed, unknown_confirmations
from specgen.design.record_panel import panel_figures, panel_open_points, panel_schedules
from specgen.sizing.feeder import Feeder

A = np.exp(2j * np.pi / 3)
POTENTIALS = {"L1": 1, "L2": A**2, "L3": A, "N": 0}
PAIRS = ("L1-L2", "L2-L3", "L3-L1")
TO_NEUTRAL = ("L1-N", "L2-N", "L3-N")


def recomputed(rows):
    """Return the conductors' currents from the schedule of protection alone."""
    sums = dict.fromkeys(POTENTIALS, 0j)
    for row in rows:
        if row["phases"] == "L1-L2-L3":
            for line in ("L1", "L2", "L3"):
                sums[line] += row["design_current"] * POTENTIALS[line]
        elif row["phases"] != "control supply":
            there, back = row["phases"].split("-")
            across = POTENTIALS[there] - POTENTIALS[back]
            sums[there] += row["design_current"] * across / abs(across)
            sums[back] -= row["design_current"] * across / abs(across)
    return {name: abs(total) for name, total in sums.items()}


def test_worked_sheet(shop):
    """15 kW at 400 V through a contactor, and a compressor of 8.4 A, with their cables.

    Heater: 15000/(sqrt3 400) = 21.65 A, at +10 % 23.82 A: breaker 25 A. B2, two circuits, 40 degC: 6 mm2 carry 30 x 0.8 = 24 A, which is
    too little, 10 mm2 40 x 0.8 = 32 A. Drop: sqrt3 40 23.82 (0.0225/10)/400 = 0.93 %.
    Compressor: starter 6.3 to 10 A, set to 8.4 A. C, alone, 30 degC: 1.5 mm2 carry 15.2 x 1.15 = 17.5 A.
    Lines: 23.82 + 8.4 = 32.22 A. Control supply 24 V 10 A/(0.85 x 230.9 V) = 1.22 A: incomer 33.4 A, so 40 A.
    """
    panel = shop.panel()
    loops = [
        shop.decided("TIC-1", shop.heater("15 kW"), panel, cable={"length": "40 m", "method": "B2", "grouped": "2", "ambient": "40 degC"}),
        shop.decided("TIC-2", shop.compressor("8.4 A"), panel, cable={"length": "10 m", "method": "C", "ambient": "30 degC"}),
    ]
    made = shop.panel_of(loops, panel)
    heater, machine = 15000 / (3**0.5 * 400) * 1.1, 8.4
    for line in ("L1", "L2", "L3"):
        assert made.demand.currents[line] == pytest.approx(heater + machine)
    assert made.demand.currents["N"] == 0.0
    assert made.demand.imbalance == pytest.approx(0.0, abs=1e-9)
    assert made.incoming.carries == pytest.approx(heater + machine + 24 * 10 / (0.85 * 400 / 3**0.5))
    assert made.incoming.rating == 40.0
    first, second = made.protection
    assert (first.designation, first.kind, first.rating, first.curve) == ("=TIC1-F1", "circuit_breaker", 25.0, "B")
    assert (second.designation, second.kind, second.setting_range, second.setting) == ("=TIC2-F1", "motor_starter", (6.3, 10.0), 8.4)
    cables = [row for row in made.conductors if row.designation]
    assert [row.designation for row in cables] == ["=TIC1-W1", "=TIC2-W1"]
    assert [row.size * 1e6 for row in cables] == pytest.approx([10.0, 1.5])
    assert [row.capacity for row in cables] == pytest.approx([40 * 0.8, 15.2 * 1.15])
    assert cables[0].drop == pytest.approx(3**0.5 * 40 * heater * 0.0225 / 10 / 400)
    assert (cables[1].start, cables[1].end) == ("=TIC2-X1", "=TIC2-M1")
    assert {finding.rule: finding.outcome for finding in made.findings if finding.rule in ("E1", "E2", "E3", "E6", "E7", "E8")} == {
        "E1": "holds", "E2": "holds", "E3": "holds", "E6": "unanswered", "E7": "does_not_apply", "E8": "does_not_apply",
    }  # fmt: skip


def test_coincidence_and_a_loop_that_runs_alone(shop):
    """At 10 percent two loops of 23.8 A draw 4.8 A together; the incomer still carries one, and is no smaller than what is behind it."""
    panel = shop.panel(panel={"coincidence": "10 percent"})
    loops = [shop.decided(f"TIC-{n}", shop.heater("15 kW"), panel) for n in (1, 2)]
    made = shop.panel_of(loops, panel)
    assert made.demand.currents["L1"] == pytest.approx(0.1 * 2 * 23.8157, rel=1e-5)
    assert made.incoming.carries == pytest.approx(23.8157 + 1.2227, rel=1e-4)
    assert made.incoming.rating == 32.0


def test_a_declared_incomer_that_is_too_small_holds_the_panel(shop):
    panel = shop.panel(supply={"incomer": "25 A"})
    made = shop.panel_of([shop.decided("TIC-1", shop.heater("15 kW"), panel)], panel)
    assert made.verdict == "held"
    assert {f.rule: f.outcome for f in made.findings}["E3"] == "broken"


def test_written_phases_are_kept_and_the_others_go_round_them(shop):
    """One stands on L1-N by writing: the two others take L2 and L3.

    In turn they would take L1 and L2, so that moving the first is enough. One draws 2000/230 x (400/sqrt3 x 1.1)/230 = 9.60 A.
    """
    panel = shop.panel()
    loops = [
        shop.decided("TIC-1", shop.heater("2 kW", "230 V", "1"), panel, phases_on="L1-N"),
        shop.decided("TIC-2", shop.heater("2 kW", "230 V", "1"), panel),
        shop.decided("TIC-3", shop.heater("2 kW", "230 V", "1"), panel),
    ]
    made = shop.panel_of(loops, panel)
    found = [(load.tag, load.phases, load.written) for load in made.placed]
    assert found == [("TIC-1", "L1-N", True), ("TIC-2", "L3-N", False), ("TIC-3", "L2-N", False)]
    assert [(moved.tag, moved.in_turn) for moved in made.moved] == [("TIC-2", "L1-N")]
    text = made.phrasing.fill(made.moved[0].text, made.moved[0].words)
    assert text.replace(THIN, " ").endswith("stand on L1-N, and the largest line current be 19.2 A; as all are placed it is 9.6 A.")


def test_phases_that_do_not_fit_are_an_open_point(shop):
    panel = shop.panel()
    made = shop.panel_of([shop.decided("TIC-1", shop.heater("2 kW", "230 V", "1"), panel, phases_on="L1-L2")], panel)
    assert made.open_points[0].field == "TIC-1: phases_on"
    assert "L1-N, L2-N, L3-N would" in made.open_points[0].how
    assert not made.placed[0].written


def test_a_pair_of_relays_takes_two_outputs(shop):
    panel = shop.panel(controllers=[{"name": "c", "outputs": [{"kind": "relay", "rating": "2 A", "count": "8"}]}])
    valve = {"kind": "three_point_valve", "travel_time": "120 s", "motor_voltage": "24 V", "motor_current": "0.2 A"}
    loops = [shop.decided("TIC-1", valve, panel, "relay_pair"), shop.decided("TIC-2", shop.heater("9 kW"), panel)]
    made = shop.panel_of(loops, panel)
    assert {count.sort: (count.used, count.there) for count in made.outputs} == {"relay": (3, 8), "logic": (0, 0), "analogue": (0, 0)}
    assert {row.loop: row.phases for row in made.protection} == {"TIC-1": "control supply", "TIC-2": "L1-L2-L3"}


def test_the_fault_current_is_an_open_point_once(shop):
    panel = shop.panel()
    loops = [shop.decided(f"TIC-{n}", shop.heater("9 kW"), panel) for n in (1, 2)]
    points = [point for point in shop.panel_of(loops, panel).open_points if point.field == "supply.prospective_fault_current"]
    assert [point.settles for point in points] == [("O5",)]
    declared = shop.panel(supply={"prospective_fault_current": "6 kA"})
    assert not [point for point in shop.panel_of(loops, declared).open_points if "fault" in point.field]


def test_parts(shop):
    panel = shop.panel(controllers=[{"name": "loop controller", "outputs": [{"kind": "relay", "rating": "2 A", "count": "8"}]}])
    heater = shop.decided("TIC-1", shop.heater("9 kW"), panel, cable={"length": "10 m"})
    loops = [heater, shop.decided("TIC-2", shop.compressor("8.4 A"), panel)]
    made = shop.panel_of(loops, panel)
    names = [part.designation for part in made.parts]
    assert len(names) == len(set(names))
    assert {f"=TIC1-{product}" for product in ("F1", "Q1", "W1", "E1", "B1", "X1")} <= set(names)
    assert {"=TIC2-M1", "=PNL1-F1", "=PNL1-Q1", "=PNL1-T1"} <= set(names)
    for part in made.parts:
        assert len(part.loops) == 1 or part.designation.startswith("=PNL1-")
        assert part.quantity >= 1
    own = Counter(part.loops[0] for part in made.parts if not part.designation.startswith("=PNL1-"))
    alone = {loop.tag: shop.panel_of([loop], panel) for loop in loops}
    for tag, count in own.items():
        # what the parts come to is what each loop brings: nothing is shared, lost or renumbered
        assert count == len([part for part in alone[tag].parts if not part.designation.startswith("=PNL1-")])


def test_rows_from_memory(shop):
    """B1 inside is from memory; confirming the group, or the row, takes it off the list."""
    cable = {"length": "10 m", "method": "C", "ambient": "30 degC"}
    used = []
    for confirmed in ([], ["conductors/B1"], ["conductors/B1/2.5", "wiring"]):
        entries = [{"row": row, "by": "ab", "against": "the standard"} for row in confirmed]
        panel = shop.panel(confirmed=entries)
        design = shop.design([shop.decided("TIC-1", shop.heater("9 kW"), panel, cable=cable)], panel)
        used.append([row.id for row in from_memory_rows_used(design)])
    assert used[0] == ["conductors/B1/2.5", "wiring/reactance", "wiring/resistance", "wiring/voltage_drop"]
    assert used[1] == ["wiring/reactance", "wiring/resistance", "wiring/voltage_drop"]
    assert used[2] == []
    panel = shop.panel(confirmed=[{"row": row, "by": "ab", "against": "x"} for row in ("conductors/B", "conductors/B1")])
    assert not is_confirmed("conductors/B2/2.5", panel)
    assert unknown_confirmations(panel, shop.catalogue.rows) == ("conductors/B",)
    points = [point for point in shop.panel_of([], panel).open_points if point.field == "confirmed"]
    assert len(points) == 1
    assert "'conductors/B'" in points[0].how


def test_record(shop):
    panel = shop.panel(supply={"prospective_fault_current": "6 kA"})
    made = shop.panel_of([shop.decided("TIC-1", shop.heater("9 kW"), panel, cable={"length": "10 m"})], panel)
    figures, schedules = panel_figures(made), panel_schedules(made)
    assert figures["demand"]["L1"] == pytest.approx(14.2894192)
    assert figures["incoming_protection"] == 16.0
    assert schedules["protection"][0]["phases"] == "L1-L2-L3"
    assert "setting" not in schedules["protection"][0]
    inside, cable = schedules["conductors"]
    assert ("drop" in inside, "drop" in cable) == (False, True)
    assert (cable["from"], cable["to"], cable["size"]) == ("=TIC1-X1", "=TIC1-E1", 2.5)
    assert [point["field"] for point in panel_open_points(made)] == [point.field for point in made.open_points]


SORTS = st.tuples(
    st.sampled_from(["three", "between", "neutral", "motor", "drive", "valve"]), st.integers(300, 15000), st.integers(0, 2), st.booleans()
)  # fmt: skip


DRIVE = {"kind": "variable_speed_fan", "signal": "4-20 mA", "lowest_speed": "20 percent", "voltage": "400 V", "phases": "3"}


def some_loop(shop, panel, number, sort, *, written):
    kind, power, at, fixed = sort
    tag = f"TIC-{number:02}"
    elements = {
        "three": (shop.heater(f"{power} W"), "contactor", None),
        "between": (shop.heater(f"{power} W", "400 V", "1"), "contactor", PAIRS[at]),
        "neutral": (shop.heater(f"{power} W", "230 V", "1"), "contactor", TO_NEUTRAL[at]),
        "motor": (shop.compressor(f"{power / 500} A"), "contactor", None),
        "drive": ({**DRIVE, "power": f"{power} W"}, "signal", None),
        "valve": ({"kind": "modulating_valve", "signal": "4-20 mA", "stroke_time": "60 s"}, "signal", None),
    }  # fmt: skip
    element, device, phases = elements[kind]
    changes = {"phases_on": phases} if phases and (fixed or written) else {}
    return shop.decided(tag, element, panel, device, **changes)


@with_settings(max_examples=25, deadline=None, suppress_health_check=[HealthCheck.function_scoped_fixture])
@given(sorts=st.lists(SORTS, min_size=1, max_size=7))
def test_nothing_is_lost_and_the_order_of_files_does_not_count(shop, sorts):
    panel = shop.panel()
    loops = [some_loop(shop, panel, number, sort, written=False) for number, sort in enumerate(sorts)]
    made = shop.panel_of(loops, panel)
    assert shop.panel_of(loops[::-1], panel) == made
    rows = panel_schedules(made)["protection"]
    fed = [loop for loop in loops if isinstance(loop.decision.chosen.case.feeder, Feeder)]
    assert len(rows) == sum(len(loop.decision.chosen.case.feeder.branches) for loop in fed)
    for name, current in recomputed(rows).items():
        assert made.demand.currents[name] == pytest.approx(current, rel=1e-6, abs=1e-6)
    for line, upper in made.demand.upper.items():
        assert upper >= made.demand.currents[line] * (1 - 1e-9)
    for row in made.conductors:
        assert row.current <= row.protection * (1 + 1e-9)
        assert row.protection <= row.capacity * (1 + 1e-9)
    assert sum(count.used for count in made.outputs) == len(loops)


@with_settings(max_examples=25, deadline=None, suppress_health_check=[HealthCheck.function_scoped_fixture])
@given(sorts=st.lists(SORTS, min_size=1, max_size=6), more=SORTS)
def test_another_loop_adds_and_leaves_the_others_alone(shop, sorts, more):
    """With the phases written, no line carries less for another loop, and no row of another loop is changed."""
    panel = shop.panel()
    loops = [some_loop(shop, panel, number, sort, written=True) for number, sort in enumerate(sorts)]
    before, after = shop.panel_of(loops, panel), shop.panel_of([*loops, some_loop(shop, panel, 99, more, written=True)], panel)
    for line in ("L1", "L2", "L3"):
        assert after.demand.currents[line] >= before.demand.currents[line] * (1 - 1e-9)
        assert after.demand.upper[line] >= before.demand.upper[line] * (1 - 1e-9)
    assert after.demand.neutral >= before.demand.neutral * (1 - 1e-9)
    assert after.incoming.carries >= before.incoming.carries * (1 - 1e-9)
    assert set(before.conductors) <= set(after.conductors)
    assert set(before.protection) <= set(after.protection)
    # moved by balance, the largest line is never less either
    free = [some_loop(shop, panel, number, sort, written=False) for number, sort in enumerate(sorts)]
    fewer, all_of_them = (shop.panel_of(some, panel) for some in (free, [*free, some_loop(shop, panel, 99, more, written=False)]))
    most = [max(made.demand.currents[line] for line in ("L1", "L2", "L3")) for made in (fewer, all_of_them)]
    assert most[1] >= most[0] * (1 - 1e-9)
