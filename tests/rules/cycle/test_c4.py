"""C4: pulses the device can make. Common practice, no source: 2 s on of 8 s is 25 %, as 16 s of 64 s is."""

import pytest


@pytest.mark.parametrize(
    ("on", "off", "least", "outcome"),
    [
        (1.5, 1.5, 0.25, "holds"),
        pytest.param(0.25, 1.5, 0.25, "holds", id="at the limit on"),
        pytest.param(0.2, 1.5, 0.25, "broken", id="too short on"),
        pytest.param(1.5, 0.2, 0.25, "broken", id="too short off"),
    ],
)
def test_outcome(make, on, off, least, outcome):
    settings = make.proportioned(shortest_on=on, shortest_off=off, least_pulse=least)
    answer = make.ask("C4", make.case("heater", "time_proportioned", settings=settings))
    assert answer.outcome == outcome
    assert answer.margin == pytest.approx(min(on, off) / least)


@pytest.mark.parametrize(("cycle", "on"), [(8.0, 2.0), (64.0, 16.0)])
def test_a_quarter_of_the_cycle(make, cycle, on):
    settings = make.proportioned(cycle_time=cycle, lowest_duty=0.25, shortest_on=on, shortest_off=on)
    text = make.ask("C4", make.case("heater", "time_proportioned", settings=settings)).text
    assert f"A cycle of {cycle:.0f} s is on for {on:.0f} s at 25 percent" in text


def test_unanswered_and_not_asked(make):
    assert make.ask("C4", make.case("heater", "time_proportioned")).outcome == "unanswered"
    assert make.ask("C4", make.case("heater", "on_off")).outcome == "does_not_apply"
