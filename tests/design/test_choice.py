"""The order of choice, level by level, and what is said of every candidate that was left."""

from dataclasses import dataclass
from itertools import product

import pytest
from hypothesis import given
from hypothesis import strategies as st

from specgen.core.quantity import Unit
from specgen.core.say import Phrasing, seconds
from specgen.design.choice import because, best, codes, margin, named, rank, reject, separation
from specgen.design.decide import verdict_of
from specgen.design.types import Examined
from specgen.rules.base import Finding
from specgen.sizing.candidate import CANDIDATES, ORDER, Candidate

WORDS = Phrasing(Unit("degC"), Unit("K"))


@dataclass(frozen=True)
class Case:
    candidate: Candidate


def found(rule, outcome="holds", weight="must", margin=None, text="it says {t}"):
    return Finding(rule, weight, "loop", outcome, text, margin, {"t": seconds(10)})


def examined(mode, device, *findings):
    return Examined(Case(Candidate(mode, device)), tuple(findings))


LEVELS = [("broken", "must"), ("broken", "should"), ("unanswered", "must"), ("unanswered", "should")]


@pytest.mark.parametrize(("before", "after"), [(a, b) for i, a in enumerate(LEVELS) for b in LEVELS[i + 1 :]])
def test_one_of_a_level_outweighs_any_number_of_the_next(before, after):
    worse = examined("on_off", "relay", found("X1", *before))
    better = examined("on_off", "signal", *(found(f"Y{n}", *after) for n in range(9)))
    assert best([worse, better]) is better
    assert [f.rule for f in separation(better, worse)] == ["X1"]


def test_devices_in_their_order():
    assert ORDER == ("relay", "contactor", "ssr", "power_controller", "signal", "relay_pair")
    equal = [examined("on_off", device) for device in reversed(ORDER)]
    assert [e.case.candidate.device for e in sorted(equal, key=rank)] == list(ORDER)


def test_the_larger_margin_among_equals():
    tight = examined("on_off", "relay", found("X1", margin=1.1))
    wide = examined("time_proportioned", "relay", found("X1", margin=2.0), found("X2", margin=1.5))
    assert best([tight, wide]) is wide
    assert (margin(tight), margin(wide)) == (1.1, 1.5)
    assert margin(examined("on_off", "relay", found("X1", weight="note", margin=0.1), found("X2", "broken", margin=0.2))) == float("inf")


def test_notes_and_silence_do_not_count():
    noted = examined("on_off", "relay", found("X1", "broken", "note"), found("X2", "does_not_apply"))
    assert rank(noted)[:4] == (0, 0, 0, 0)


def test_only_what_separates_is_named():
    chosen = examined("on_off", "contactor", found("M6", "broken", "should"))
    other = examined("on_off", "relay", found("M6", "broken", "should"), found("D5", "broken", "should"), found("M5", "broken", "should"))
    rejected = reject(chosen, other, WORDS, by_designer=False)
    assert rejected.ruled_out_by == ("D5", "M5")
    assert rejected.text == "it says 10\u202fs"


def test_the_order_decides_between_equals():
    relay, contactor = examined("on_off", "relay"), examined("on_off", "contactor")
    rejected = reject(relay, contactor, WORDS, by_designer=False)
    assert (rejected.ruled_out_by, rejected.text) == (("M13",), "equal in the rules; later in the order of devices")
    tight = examined("time_proportioned", "relay", found("X1", margin=1.1))
    assert reject(relay, tight, WORDS, by_designer=False).text == "equal in the rules; the smaller margin"


def test_what_the_designer_passed_over():
    chosen = examined("on_off", "contactor", found("M6", "broken", "should"))
    free = examined("on_off", "relay")
    assert reject(chosen, free, WORDS, by_designer=True).ruled_out_by == ("M13",)
    assert reject(chosen, free, WORDS, by_designer=True).text == "not taken: the designer chose otherwise"


def test_the_first_rule_that_separates_it_from_the_next_explains_it():
    chosen = examined("on_off", "contactor")
    near, far = examined("on_off", "ssr", found("D4", "broken", "should")), examined("analogue", "signal", found("M3", "broken"))
    rejected = [reject(chosen, other, WORDS, by_designer=False) for other in (far, near)]
    assert because(chosen, rejected, WORDS) == "D4 rules out on-off through a solid-state switch: it says 10\u202fs"
    assert because(chosen, [], WORDS) == "nothing else can be wired here"
    equal = reject(chosen, examined("on_off", "ssr"), WORDS, by_designer=False)
    assert because(chosen, [equal], WORDS) == "M13: on-off through a solid-state switch keeps the same rules; later in the order of devices"


def test_every_candidate_has_words():
    assert len({named(candidate) for candidate in CANDIDATES}) == len(CANDIDATES)


outcomes = st.sampled_from(["holds", "broken", "unanswered", "does_not_apply"])
findings = st.lists(st.builds(found, st.sampled_from(["A1", "B2", "C3", "D4"]), outcomes, st.sampled_from(["must", "should", "note"])),
                    max_size=4, unique_by=lambda f: f.rule)  # fmt: skip


@given(st.lists(findings, min_size=len(CANDIDATES), max_size=len(CANDIDATES)))
def test_never_a_candidate_without_an_end(per_candidate):
    """Whatever the rules find: the chosen one is no worse than any, and each other names what ended it."""
    every = [Examined(Case(candidate), tuple(made)) for candidate, made in zip(CANDIDATES, per_candidate, strict=True)]
    for by_designer, chosen in ((False, best(every)), *((True, one) for one in every)):
        others = [e for e in every if e is not chosen]
        rejected = [reject(chosen, other, WORDS, by_designer=by_designer) for other in others]
        assert all(r.ruled_out_by and r.text for r in rejected)
        for one in rejected:
            if one.ruled_out_by != ("M13",):
                assert set(one.ruled_out_by) <= {f.rule for f in one.examined.findings if f.outcome in ("broken", "unanswered")}
        assert because(chosen, rejected, WORDS)
    assert all(rank(best(every)) <= rank(other) for other in every)


OUTCOMES = ("holds", "broken", "overridden", "unanswered", "does_not_apply")


@pytest.mark.parametrize(("outcome", "weight"), list(product(OUTCOMES, ("must", "should", "note"))))
def test_verdicts(outcome, weight):
    """Held by a broken must, open by an unanswered one, a deviation by a should broken or set aside; notes never."""
    expected = {
        ("broken", "must"): "held", ("unanswered", "must"): "open", ("broken", "should"): "deviates", ("overridden", "should"): "deviates",
    }.get((outcome, weight), "meets")  # fmt: skip
    assert verdict_of((found("X1", outcome, weight), found("X2"))) == expected


def test_the_worst_verdict_wins():
    held, opened, deviates = found("X1", "broken"), found("X2", "unanswered"), found("X3", "broken", "should")
    assert verdict_of((deviates, opened, held)) == "held"
    assert verdict_of((deviates, opened)) == "open"
    assert verdict_of(()) == "meets"
    assert codes(examined("on_off", "relay", held, opened), "broken", "must") == ("X1",)
