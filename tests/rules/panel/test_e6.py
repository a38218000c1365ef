"""E6: a fifth of each kind of output stays free."""

import pytest

from specgen.rules.panel_case import OutputCount


@pytest.mark.parametrize(
    ("used", "outcome"),
    [
        (8, "holds"),
        pytest.param(16, "holds", id="4 of 20 free"),
        pytest.param(17, "broken", id="3 free"),
        pytest.param(21, "broken", id="too many"),
    ],
)
def test_outcome(ask_panel, used, outcome):
    answer = ask_panel("E6", outputs=(OutputCount("relay", used, 20), OutputCount("logic", 0, 4)))
    assert answer.outcome == outcome
    assert answer.margin == pytest.approx(max(20 - used, 0) / 20 / 0.2)
    assert f"{used} of 20 relay" in answer.text


def test_the_houses_share(ask_panel):
    outputs = (OutputCount("relay", 15, 20),)
    assert ask_panel("E6", outputs=outputs, panel={"house": {"spare_outputs": "30 percent"}}).outcome == "broken"
    assert ask_panel("E6", outputs=outputs, panel={"house": {"spare_outputs": "25 percent"}}).outcome == "holds"


def test_a_kind_that_nobody_has(ask_panel):
    assert ask_panel("E6", outputs=(OutputCount("relay", 1, 20), OutputCount("analogue", 1, 0))).outcome == "broken"


def test_no_controller_is_declared(ask_panel):
    answer = ask_panel("E6", outputs=(OutputCount("relay", 3, 0),))
    assert (answer.outcome, answer.needs) == ("unanswered", ("controllers.outputs",))
