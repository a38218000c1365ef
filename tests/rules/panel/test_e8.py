"""E8: 48 A of name-plate current on one circuit."""

import pytest

AMERICAN = {"code_basis": "north_america"}


@pytest.mark.parametrize(
    ("rated", "outcome"), [(40.0, "holds"), pytest.param(48.0, "holds", id="at the limit"), pytest.param(48.1, "broken", id="above")]
)
def test_outcome(ask_panel, fed, rated, outcome):
    answer = ask_panel("E8", panel=AMERICAN, feeders={"TIC-1": fed(), "TIC-2": fed(1.1 * rated, 80.0, 85.0, rated=rated)})
    assert answer.outcome == outcome
    assert answer.margin == pytest.approx(48.0 / rated)
    assert "TIC-2" in answer.text


def test_two_circuits_of_thirty(ask_panel, fed):
    assert ask_panel("E8", panel=AMERICAN, feeders={"TIC-1": fed(33.0, 50.0, 65.0, rated=30.0, branches=2)}).outcome == "holds"


def test_it_is_asked_of_heaters_in_north_america(ask_panel, fed):
    large = {"TIC-1": fed(60.0, 80.0, 85.0, rated=55.0)}
    assert ask_panel("E8", feeders=large).outcome == "does_not_apply"
    assert ask_panel("E8", feeders=large, panel=AMERICAN, heats=False).outcome == "does_not_apply"
