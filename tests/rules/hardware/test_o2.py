"""O2: loss and heat sink."""

import pytest

from specgen.sizing.candidate import Unsized

SINK = {"loss": 45.0, "heat_sink": 0.9, "cooling": "natural", "sink_margin": 9.0}


@pytest.mark.parametrize(
    ("changes", "outcome", "words"),
    [
        (SINK, "holds", "leaves 45 W in the panel at full output; at 45 °C its heat sink has at most 0.9 K/W, which the panel's own air"),
        (SINK | {"heat_sink": 0.1, "cooling": "forced", "sink_margin": 1.0}, "holds", "at most 0.1 K/W, which needs a fan"),
        (SINK | {"heat_sink": 0.09, "cooling": "none", "sink_margin": 0.9}, "broken", "no heat sink keeps its junction below its limit"),
        (SINK | {"heat_sink": None, "cooling": "none", "sink_margin": None}, "broken", "no heat sink keeps its junction below its limit"),
        ({"loss": 60.0}, "holds", "on its own heat sink"),
    ],
)
def test_outcome(make, device, changes, outcome, words):
    answer = make.ask("O2", make.case("heater", "time_proportioned", "ssr", device_choice=device(**changes)))
    assert answer.outcome == outcome
    assert words in answer.text


def test_margin_is_what_the_sink_may_have_over_what_a_fan_reaches(make, device):
    assert make.ask("O2", make.case("heater", "on_off", "ssr", device_choice=device(**SINK))).margin == 9.0


def test_a_contact_has_no_heat_sink(make, device):
    for other in (make.case("heater", "on_off", device_choice=device(loss=5.0)), make.case("heater", "on_off", "ssr")):
        assert make.ask("O2", other).outcome == "does_not_apply"
    assert isinstance(other.device, Unsized)
