"""Every fault of every demo loop has an outcome, and what passes a danger has its limiter in record, parts and checks."""

import re
from functools import cache
from math import exp, log
from pathlib import Path

import pytest

from specgen.design.fault_walk import TITLES, fault_walk
from specgen.design.pairs import opposed
from specgen.design.project import load_design
from specgen.design.record import record_of
from specgen.design.safety import with_pairs
from specgen.design.site_checks import panel_checks, site_checks
from specgen.sizing.candidate import Unsized

ROOT = Path(__file__).parents[2]


@cache
def design():
    return load_design(ROOT, firmness=False)


@cache
def record():
    return record_of(design())


def tags():
    """Return the demo's tags from its files, without deciding anything while tests are collected."""
    text = "\n".join(path.read_text(encoding="utf-8") for path in sorted((ROOT / "loops").glob("*.yml")))
    return re.findall(r"^tag: ([A-Z0-9-]+)", text, re.MULTILINE)


def loop(tag):
    return next(decided for decided in design().loops if decided.tag == tag)


def passes(decided):
    faults = decided.decision.chosen.case.faults
    return not isinstance(faults, Unsized) and faults.on.passes


def test_the_demo_has_what_the_matrix_is_about():
    assert len([decided for decided in design().loops if passes(decided)]) > 10


@pytest.mark.parametrize("tag", tags())
@pytest.mark.parametrize("fault", TITLES)
def test_every_fault_has_an_outcome(tag, fault):
    decided = loop(tag)
    outcome = next(outcome for outcome in fault_walk(decided) if outcome.fault == fault)
    said = decided.phrasing.fill(outcome.text, outcome.words)
    assert "{" not in said
    assert "None" not in said
    assert "nan" not in said
    # where the value goes, and what is seen
    assert "What the operator sees" in said or "Nothing shows" in said
    assert any(word in said for word in ("value", "output", "loop"))


@pytest.mark.parametrize("tag", tags())
def test_what_passes_a_danger_has_its_limiter_everywhere(tag):
    decided = loop(tag)
    row = next(row for row in record()["loops"] if row["tag"] == tag)
    parts = {part["designation"]: part for part in record()["schedules"]["parts"] if part["loops"] == [tag]}
    own = "=" + tag.replace("-", "")
    has = passes(decided) or decided.loop.limits.limiter is not None
    assert ("limiter" in row) is has
    assert (f"{own}-F2" in parts) is has
    ids = {check.id for check in site_checks(decided, design().panel)}
    wanted = {f"{tag}.energise.limiter", f"{tag}.cold.limiter", f"{tag}.cold.limiter-reset", f"{tag}.cold.limiter-fault"}
    assert wanted <= ids if has else not wanted & ids
    walked = {outcome.fault: outcome.text for outcome in fault_walk(decided)}
    assert (f"{own}-F2" in walked["stuck_on"]) is has
    if not has:
        return
    assert row["limiter"]["designation"] == f"{own}-F2"
    assert "limiter" in parts[f"{own}-F2"]["what"]
    assert {f"{own}-B2", f"{own}-Q2", f"{own}-S2"} <= parts.keys()
    contact = next(contact for contact in decided.safety.chain if contact.kind == "limiter")
    assert contact.acts_on == (f"{own}-Q2",)


@pytest.mark.parametrize("tag", tags())
def test_a_limiter_acts_after_normal_running_and_before_the_danger(tag):
    limiter = loop(tag).limiter
    if limiter is None or limiter.window is None:
        pytest.skip("no limiter")
    assert limiter.clear_of_running > 0
    assert limiter.short_of_danger > 0
    assert limiter.outward * (limiter.acts_at - limiter.set) >= 0
    assert limiter.outward * (limiter.peaks_at - limiter.acts_at) >= 0


@pytest.mark.parametrize("tag", tags())
def test_an_output_stuck_off_past_a_danger_has_its_alarm(tag):
    decided = loop(tag)
    faults = decided.decision.chosen.case.faults
    has = not isinstance(faults, Unsized) and faults.off.passes
    alarm = decided.safety.alarm
    assert (alarm is not None) is has
    if has:
        assert alarm.window.clear(alarm.set) > 0
        assert alarm.window.short(alarm.acts_at) > 0
        assert f"{tag}.cold.alarm" in {check.id for check in site_checks(decided, design().panel)}


@pytest.mark.parametrize("tag", tags())
def test_checks_have_names_of_their_own_that_do_not_depend_on_figures(tag):
    found = site_checks(loop(tag), design().panel)
    names = [check.id for check in found]
    assert len(names) == len(set(names))
    assert all(re.fullmatch(rf"{tag}\.(energise|cold|first_run|hand_over)\.[a-z0-9_-]+", name) for name in names)
    order = [check.group for check in found]
    assert order == sorted(order, key=("energise", "cold", "first_run", "hand_over").index)
    for check in found:
        assert "{" not in loop(tag).phrasing.fill(check.what + check.meaning, check.words)


def test_the_panel_has_checks_of_its_own():
    names = [check.id for check in panel_checks(design().panel)]
    assert len(names) == len(set(names))
    assert "PNL-3.energise.isolation" in names


def test_cold_resistance_of_a_three_phase_heater():
    """7.5 kW at 400 V in star: 3 x 400^2/7500/3 = 21.33 ohm a branch, two in series between lines."""
    check = next(c for c in site_checks(loop("TIC-101"), design().panel) if c.id.endswith("energise.resistance"))
    assert check.expected.value == pytest.approx(2 * 21.333, rel=1e-4)


def test_rise_at_full_output_by_hand():
    """TIC-101: 36 kJ/K; 7.5 kW at 121 % less the loss of (14 x 1.1 + 45) W/K and 200 W at 40 degC in 30 degC, in one minute."""
    check = next(c for c in site_checks(loop("TIC-101"), design().panel) if c.id.endswith("first_run.speed"))
    loss = 14 * 1.1 + 45
    assert check.to.value == pytest.approx((7500 * 1.21 - loss * 10 - 200) / 36e3 * 60, rel=1e-9)


def test_what_a_stuck_heater_does_by_hand():
    """TIC-101: after the limiter has acted at 89.49 the value follows its first-order curve for 25 s at full output: 36 kJ/K, 60.4 W/K."""
    limiter = loop("TIC-101").limiter
    loss, capacity = 14 * 1.1 + 45, 36e3
    end = 30 + (7500 * 1.21 - 200) / loss
    acts = 88 + 10 * (end - 88) * loss / capacity
    assert limiter.acts_at == pytest.approx(acts, rel=1e-9)
    assert limiter.peaks_at == pytest.approx(end - (end - acts) * exp(-25 * loss / capacity), rel=1e-9)
    soon = loop("TIC-101").decision.chosen.case.faults.on.time_to_danger
    start = limiter.window.running
    assert soon == pytest.approx(capacity / loss * log((end - start) / (end - 95)), rel=1e-9)


def test_a_computed_limiter_is_listed_as_an_assumption():
    decided = loop("TIC-306")
    assert not decided.limiter.declared
    assert {"limits.limiter.set", "limits.limiter.sensor_lag"} <= {assumed.field for assumed in decided.assumptions}


def test_pairs_are_found_by_their_body():
    assert [(one.tag, other.tag) for one, other, _ in opposed(design().loops)] == [("TIC-401", "TIC-402")]
    finding = next(f for f in loop("TIC-401").findings if f.rule == "A5")
    assert finding.outcome == "holds"
    assert [f.outcome for f in loop("TIC-101").findings if f.rule == "A5"] == ["does_not_apply"]


def test_an_interlock_against_another_loop_stands_in_the_chain():
    decided = loop("TIC-402")
    safety = with_pairs(decided.safety, decided.decision.chosen.case, ("TIC-401",))
    contact = next(contact for contact in safety.chain if contact.kind == "pair")
    assert (contact.designation, contact.acts_on) == ("=TIC401-K8", ("=TIC402-Q2",))
    assert "K8" in {part.product for part in safety.parts}
