"""E7: 5 kA of components without a rating of their own, or what is declared."""

import pytest


def american(fault=None, rating=None):
    supply = {} if fault is None else {"prospective_fault_current": fault}
    return {"code_basis": "north_america", "supply": supply, **({"short_circuit_rating": rating} if rating else {})}


@pytest.mark.parametrize(
    ("fault", "rating", "outcome", "margin"),
    [
        ("4 kA", None, "holds", 5 / 4),
        pytest.param("5 kA", None, "holds", 1.0, id="at the limit"),
        pytest.param("9 kA", "10 kA", "holds", 10 / 9, id="declared"),
        pytest.param("11 kA", "10 kA", "broken", 10 / 11, id="declared and too small"),
        pytest.param("4 kA", "3 kA", "broken", 3 / 4, id="declared below the usual"),
    ],
)
def test_outcome(ask_panel, fault, rating, outcome, margin):
    answer = ask_panel("E7", panel=american(fault, rating))
    assert answer.outcome == outcome
    assert answer.margin == pytest.approx(margin)


def test_open_points(ask_panel):
    assert ask_panel("E7", panel=american()).needs == ("supply.prospective_fault_current",)
    answer = ask_panel("E7", panel=american("6 kA"))
    assert (answer.outcome, answer.needs) == ("unanswered", ("short_circuit_rating",))
    assert "6000 A is above the 5000 A" in answer.text


def test_elsewhere_it_does_not_apply(ask_panel):
    assert ask_panel("E7").outcome == "does_not_apply"
