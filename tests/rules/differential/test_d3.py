"""D3: ten starts an hour, 180 s of run and 120 s of rest are the compressor's limits."""

import pytest

BALANCE = {"heat_capacity": "60 kJ/K", "loss": "100 W/K", "surroundings": "10 degC to 40 degC", "dead_time": "25 s"}


@pytest.mark.parametrize(
    ("starts", "outcome"),
    [
        (8.0, "holds"),
        pytest.param(10.0, "holds", id="at the limit"),
        pytest.param(10.005, "holds", id="within what a search can tell"),
        (10.1, "broken"),
        pytest.param(31.0, "broken", id="half load"),
    ],
)
def test_outcome(make, starts, outcome):
    answer = make.ask("D3", make.case("compressor", "on_off", settings=make.on_off(enforced={"starts_per_hour": starts})))
    assert answer.outcome == outcome
    assert answer.margin == pytest.approx(10 / starts)


def test_every_limit_is_named(make):
    text = make.ask("D3", make.case("compressor", "on_off", settings=make.on_off())).text
    assert text.startswith("It starts up to 8 an hour, with its least run of 180 s and least rest of 120 s enforced")
    assert text.endswith("10 an hour is allowed.")


def test_least_times_alone_are_kept_by_the_timer(make):
    fields = {"starts_per_hour": None}
    answer = make.ask("D3", make.case("burner", "on_off", settings=make.on_off(), element=fields))
    assert answer.outcome == "holds"
    assert answer.margin is None


def test_unanswered_and_not_asked(make):
    assert make.ask("D3", make.case("compressor", "on_off")).outcome == "unanswered"
    assert make.ask("D3", make.case("heater", "on_off", settings=make.on_off())).outcome == "does_not_apply"
    assert make.ask("D3", make.case("compressor", "time_proportioned")).outcome == "does_not_apply"
