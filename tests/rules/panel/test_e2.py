"""E2: 15 percent of the largest line."""

import pytest


@pytest.mark.parametrize(
    ("low", "outcome"), [(39.0, "holds"), pytest.param(34.0, "holds", id="at the limit"), pytest.param(33.0, "broken", id="beyond")]
)
def test_outcome(ask_panel, low, outcome):
    answer = ask_panel("E2", lines={"L1": 40.0, "L2": low, "L3": 39.5}, imbalance=(40.0 - low) / 40.0)
    assert answer.outcome == outcome
    assert answer.margin == pytest.approx(0.15 * 40.0 / (40.0 - low))


def test_the_sentence(ask_panel):
    text = ask_panel("E2", lines={"L1": 40.0, "L2": 30.0, "L3": 39.5}, imbalance=0.25).text
    assert text == "L1 carries 40 A, L2 carries 30 A: they differ by 25 percent of the larger; 15 percent is the most."


def test_one_line_or_no_load(ask_panel):
    assert ask_panel("E2", lines={"L1": 0.0}, imbalance=None).outcome == "does_not_apply"


def test_exactly_equal(ask_panel):
    answer = ask_panel("E2", lines={"L1": 40.0, "L2": 40.0, "L3": 40.0}, imbalance=0.0)
    assert (answer.outcome, answer.margin) == ("holds", None)
