"""O8: two of three phases."""

import pytest


@pytest.mark.parametrize(
    ("poles", "lines", "isolator", "outcome"),
    [
        (2, 3, "contactor class 25", "holds"),
        (2, 3, "", "broken"),
        pytest.param(3, 3, "", "does_not_apply", id="all three are switched"),
        pytest.param(1, 2, "", "does_not_apply", id="a single-phase load between lines"),
        pytest.param(0, 0, "", "does_not_apply", id="a signal"),
    ],
)
def test_outcome(make, device, poles, lines, isolator, outcome):
    case = make.case("heater", "on_off", "ssr", device_choice=device(poles=poles, lines=lines, isolator=isolator))
    answer = make.ask("O8", case)
    assert answer.outcome == outcome
    if outcome == "holds":
        assert "contactor class 25 opens every line upstream. Warning at the load: live although off." in answer.text
