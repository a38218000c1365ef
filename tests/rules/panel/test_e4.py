"""E4: the control supply."""

import pytest

from specgen.catalogue.wiring import read_wiring
from specgen.core.quantity import Unit
from specgen.core.say import THIN, Phrasing
from specgen.rules.engine import examine_panel
from specgen.rules.panel_case import PanelCase
from specgen.sizing.control_supply import Taken, control_load


@pytest.fixture
def ask(make):
    def run(hold, inrush, capacity):
        panel = make.panel(control_supply={"capacity": capacity})
        load = None if hold is None else control_load(panel.control_supply, [Taken("coils", hold, inrush)])
        case = PanelCase(panel, (), {"L1": 0.0}, None, 0.0, 16.0, False, (), read_wiring(), control=load)
        found = next(finding for finding in examine_panel(case) if finding.rule == "E4")
        text = Phrasing(Unit("degC"), Unit("K")).fill(found.text, found.words).replace(THIN, " ")
        return found.outcome, found.margin, text

    return run


@pytest.mark.parametrize(
    ("hold", "inrush", "outcome", "margin"),
    [
        pytest.param(4.0, 4.0, "holds", 5 / 4.8, id="a fifth is left"),
        pytest.param(5 / 1.2, 1.0, "holds", 1.0, id="at the limit"),
        pytest.param(4.2, 4.2, "broken", 5 / 5.04, id="carried, without reserve"),
        pytest.param(2.0, 6.0, "broken", 5 / 7.2, id="too much at switch-on"),
    ],
)
def test_outcome(ask, hold, inrush, outcome, margin):
    found = ask(hold, inrush, "5 A")
    assert found[:2] == (outcome, pytest.approx(margin))


def test_the_sentence(ask):
    text = ask(2.0, 6.0, "5 A")[2]
    assert text == "It carries 2 A continuously and 6 A at switch-on; with 20 percent of reserve 7.2 A are needed, and it gives 5 A."


def test_where_it_was_not_added_up(ask):
    assert ask(None, None, "5 A")[0] == "does_not_apply"
