"""E5: the interior temperature."""

import pytest

from specgen.catalogue.enclosure import enclosure_tables
from specgen.catalogue.wiring import read_wiring
from specgen.core.quantity import Unit
from specgen.core.say import THIN, Phrasing
from specgen.rules.engine import examine_panel
from specgen.rules.panel_case import PanelCase
from specgen.sizing.enclosure import Loss, interior_of

SIZE = {"height": "2 m", "width": "0.8 m", "depth": "0.6 m", "ambient": "5 degC to 30 degC"}  # 5.712 m2 where it stands free
CARRIED = 5.5 * 5.712 * 15  # W at 45 degC inside


@pytest.fixture
def ask(make):
    def run(watts, **changes):
        panel = make.panel(enclosure=SIZE | changes)
        heat = None if watts is None else interior_of(panel.enclosure, [Loss("everything", watts)], enclosure_tables())
        case = PanelCase(panel, (), {"L1": 0.0}, None, 0.0, 16.0, False, (), read_wiring(), interior=heat)
        found = next(finding for finding in examine_panel(case) if finding.rule == "E5")
        text = Phrasing(Unit("degC"), Unit("K")).fill(found.text, found.words).replace(THIN, " ")
        return found.outcome, found.margin, text

    return run


@pytest.mark.parametrize(
    ("watts", "changes", "outcome", "margin"),
    [
        pytest.param(CARRIED / 2, {}, "holds", 2.0, id="half of it"),
        pytest.param(CARRIED, {}, "holds", 1.0, id="at the limit"),
        pytest.param(CARRIED * 1.5, {}, "broken", 1 / 1.5, id="too much"),
        pytest.param(CARRIED * 1.5, {"cooling": "240 W"}, "holds", CARRIED / (CARRIED * 1.5 - 240), id="cooled"),
    ],
)
def test_outcome(ask, watts, changes, outcome, margin):
    assert ask(watts, **changes)[:2] == (outcome, pytest.approx(margin))


def test_what_is_missing_is_said(ask):
    """300 W too many: 9.35 m2 or 64 m3/h, as by hand in the enclosure's own tests."""
    text = ask(CARRIED + 300)[2]
    assert text.endswith("the limit is 45 °C: it takes 300 W of cooling, or 9.35 m² of effective surface, or 64 m³/h of air from outside.")
    assert "771 W over 5.71 m² of effective surface bring the interior to 54.5 °C where it is 30 °C outside" in text
    short = ask(CARRIED + 300, cooling="100 W")[2]
    assert "less 100 W of cooling," in short
    assert "it takes 200 W more of cooling" in short


def test_only_cooling_helps_where_it_is_warmer_outside(ask):
    outcome, _, text = ask(100, ambient="10 degC to 50 degC")
    assert outcome == "broken"
    assert text.endswith("it takes 257 W of cooling.")


def test_where_no_balance_was_made(ask):
    assert ask(None)[0] == "does_not_apply"
