"""O4: leakage."""

import pytest


@pytest.mark.parametrize(
    ("current", "outcome"),
    [
        pytest.param(1.0, "holds", id="0.5 percent"),
        pytest.param(0.1, "holds", id="5 percent, at the limit"),
        pytest.param(0.09, "broken", id="5.6 percent of a small load"),
    ],
)
def test_outcome(make, device, current, outcome):
    answer = make.ask("O4", make.case("heater", "on_off", "ssr", device_choice=device(current=current, leakage=0.005)))
    assert answer.outcome == outcome
    assert answer.margin == pytest.approx(0.05 / (0.005 / current))
    assert "leaks 0.005 A" in answer.text


def test_an_open_contact_leaks_nothing(make, device):
    assert make.ask("O4", make.case("heater", "on_off", device_choice=device())).outcome == "does_not_apply"
