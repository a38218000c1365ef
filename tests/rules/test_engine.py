"""How rules are found, asked and answered for; with rules made here, so that none of the book is needed."""

from dataclasses import dataclass

import pytest

from specgen.rules import engine
from specgen.rules.base import Finding, Rule
from specgen.rules.engine import LoadedRule, all_rules, examine_all, place_of, rules_digest


@dataclass(frozen=True)
class Machine:
    min_run: float | None = None
    needs: tuple[str, ...] | None = None


@dataclass(frozen=True)
class Loop:
    element: Machine
    limits: object = None


@dataclass(frozen=True)
class Case:
    loop: Loop


def loaded(rule, examine=None, applies=None):
    return LoadedRule(rule, examine or (lambda _: rule.judge(holds=True, text="asked")), applies, "", "")


def asked(monkeypatch, rules, loop):
    monkeypatch.setattr(engine, "all_rules", lambda: tuple(rules))
    return [(finding.rule, finding.outcome) for finding in examine_all(Case(loop))]


def test_where_it_does_not_apply_nothing_is_missed(monkeypatch):
    rule = Rule("X1", "Shown", "must", needs=("element.min_run",))
    assert asked(monkeypatch, [loaded(rule, applies=lambda _: False)], Loop(Machine())) == [("X1", "does_not_apply")]


@pytest.mark.parametrize(("value", "outcome"), [(None, "unanswered"), (180.0, "holds"), (0.0, "holds")])
def test_a_missing_field_is_unanswered_and_zero_is_an_answer(monkeypatch, value, outcome):
    rule = Rule("X1", "Shown", "must", needs=("element.min_run",))
    assert asked(monkeypatch, [loaded(rule)], Loop(Machine(value))) == [("X1", outcome)]


def test_an_empty_list_is_an_answer(monkeypatch):
    rule = Rule("X1", "Shown", "must", needs=("element.needs",))
    assert asked(monkeypatch, [loaded(rule)], Loop(Machine(needs=()))) == [("X1", "holds")]
    assert asked(monkeypatch, [loaded(rule)], Loop(Machine())) == [("X1", "unanswered")]


def test_every_missing_field_is_named(monkeypatch):
    rule = Rule("X1", "Shown", "must", needs=("element.min_run", "element.nowhere", "limits.danger_high"))
    monkeypatch.setattr(engine, "all_rules", lambda: (loaded(rule),))
    (finding,) = examine_all(Case(Loop(Machine(60.0))))
    assert finding.needs == ("element.nowhere", "limits.danger_high")
    assert finding.text.format(**finding.words) == "element.nowhere and limits.danger_high are not declared"


def test_only_rules_of_a_loop_are_asked(monkeypatch):
    scopes = {"X1": "panel", "X2": "loop", "X3": "pair"}
    rules = [loaded(Rule(code, "Shown", "must", scope=scope)) for code, scope in scopes.items()]
    assert asked(monkeypatch, rules, Loop(Machine())) == [("X2", "holds")]


def test_the_book_is_in_order_and_each_code_once():
    codes = [entry.rule.code for entry in all_rules()]
    assert codes == sorted(codes, key=place_of)
    assert len(codes) == len(set(codes))
    assert place_of("M2") < place_of("M10") < place_of("D1") < place_of("C1") < place_of("T1")
    assert all(entry.sentence and entry.explanation for entry in all_rules())


def test_a_finding_keeps_what_its_rule_declares():
    rule = Rule("X1", "Shown", "should", cites=("somewhere",))
    held, broken = rule.judge(holds=True, text="a", margin=2.0), rule.judge(holds=False, text="b")
    assert (held.outcome, held.margin, broken.outcome) == ("holds", 2.0, "broken")
    for finding in (held, broken, rule.does_not_apply(), rule.unanswered("c", ("need.range",))):
        assert isinstance(finding, Finding)
        assert (finding.rule, finding.weight, finding.scope, finding.cites) == ("X1", "should", "loop", ("somewhere",))
    assert rule.does_not_apply().text == "Shown"


def test_the_digest_follows_the_sources():
    assert rules_digest() == rules_digest()
    assert len(rules_digest()) == 16
    int(rules_digest(), 16)
