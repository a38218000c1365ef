"""E3: what the incomer has to carry against its rating."""

import pytest

from specgen.sizing.candidate import Unsized
from specgen.sizing.feeder import NotFed


@pytest.mark.parametrize(
    ("carries", "outcome"), [(45.0, "holds"), pytest.param(50.0, "holds", id="at the limit"), pytest.param(50.1, "broken", id="above")]
)
def test_outcome(ask_panel, carries, outcome):
    answer = ask_panel("E3", carries=carries, declared=True)
    assert answer.outcome == outcome
    assert answer.margin == pytest.approx(50.0 / carries)
    assert answer.text.startswith("The declared incomer of 50 A")


def test_none_is_large_enough(ask_panel):
    answer = ask_panel("E3", carries=700.0, incomer=Unsized("700 A is above the largest protective rating listed"))
    assert answer.outcome == "broken"
    assert "700 A is above" in answer.text


def test_a_current_that_is_not_known(ask_panel, fed):
    feeders = {"TIC-1": fed(), "TIC-2": Unsized("not declared", ("element.voltage",)), "TIC-3": NotFed("a signal")}
    answer = ask_panel("E3", feeders=feeders)
    assert (answer.outcome, answer.needs) == ("unanswered", ("TIC-2: element.voltage",))
    assert ask_panel("E3", feeders=feeders, carries=51.0).outcome == "broken"
