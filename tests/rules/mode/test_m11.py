"""M11: two stages. On at 64.5, the second 0.5 K further out at 64.0: 1.0 K from 65, 1.3 K with the measuring error, of 1.5 K."""

import pytest


@pytest.mark.parametrize(
    ("offset", "outcome"),
    [
        pytest.param("0.5 K", "holds", id="called in time"),
        pytest.param("0.7 K", "holds", id="called at the limit"),
        pytest.param("0.71 K", "broken", id="called too late"),
        pytest.param(None, "unanswered", id="not declared"),
    ],
)
def test_outcome(make, offset, outcome):
    case = make.case("two_stage", "on_off", settings=make.on_off(), element={"second_stage_offset": offset})
    assert make.ask("M11", case).outcome == outcome


def test_both_pairs_of_points_are_named(make):
    settings = make.on_off()
    answer = make.ask("M11", make.case("two_stage", "on_off", settings=settings, element={"min_run": "90 s"}))
    assert "64.5 °C and 65.5 °C, the second at 64.0 °C and 65.0 °C" in answer.text
    assert answer.text.endswith("Each stage keeps a least run of 90 s.")
    assert answer.margin == pytest.approx(1.5 / 1.3)


def test_where_it_does_not_apply(make):
    assert make.ask("M11", make.case("burner", "on_off", settings=make.on_off())).outcome == "does_not_apply"
    assert make.ask("M11", make.case("two_stage", "time_proportioned")).outcome == "does_not_apply"


def test_unsized(make):
    assert make.ask("M11", make.case("two_stage", "on_off")).outcome == "unanswered"
