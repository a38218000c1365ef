"""D6: 180 s of run and 120 s of rest, judged without timers."""

import pytest


@pytest.mark.parametrize(
    ("on", "off", "outcome", "margin"),
    [
        (200.0, 150.0, "holds", 200 / 180),
        pytest.param(180.0, 120.0, "holds", 1.0, id="at both limits"),
        pytest.param(170.0, 150.0, "broken", 170 / 180, id="run"),
        pytest.param(200.0, 100.0, "broken", 100 / 120, id="rest"),
    ],
)
def test_outcome(make, on, off, outcome, margin):
    settings = make.on_off(natural={"shortest_on": on, "shortest_off": off})
    answer = make.ask("D6", make.case("compressor", "on_off", settings=settings))
    assert answer.outcome == outcome
    assert answer.margin == pytest.approx(margin)


def test_one_time_alone(make):
    settings = make.on_off(natural={"shortest_on": 61.0, "shortest_off": 1.0})
    answer = make.ask("D6", make.case("burner", "on_off", settings=settings))
    assert answer.outcome == "holds"
    assert "on for 61 s at the shortest" in answer.text
    assert "off for" not in answer.text


def test_unanswered_and_not_asked(make):
    assert make.ask("D6", make.case("compressor", "on_off")).outcome == "unanswered"
    assert make.ask("D6", make.case("blower", "on_off", settings=make.on_off())).outcome == "does_not_apply"
    assert make.ask("D6", make.case("compressor", "time_proportioned")).outcome == "does_not_apply"
