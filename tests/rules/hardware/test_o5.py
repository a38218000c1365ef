"""O5: let-through against let-through, rating against what a contact carries."""

from dataclasses import replace

import pytest

from specgen.sizing.candidate import Unsized
from specgen.sizing.connection import Connection
from specgen.sizing.current import LoadCurrent
from specgen.sizing.device import DeviceChoice
from specgen.sizing.feeder import Feeder, NotFed, Survival

LOAD = LoadCurrent(14.3, 13.0, Connection("three_phase", 400.0, 440.0, 360.0), "AC-1", "AC-51")
DEVICE = DeviceChoice("solid-state switch 25 A", "AC-51", "logic", (), 3, 25.0, 14.3)


def asked(make, survival, device=DEVICE):
    case = make.case("heater", "on_off", "ssr", device_choice=device)
    feeder = survival if isinstance(survival, Unsized) else Feeder(LOAD, (), survival)
    return make.ask("O5", replace(case, feeder=feeder))


@pytest.mark.parametrize(
    ("survival", "outcome", "margin"),
    [
        pytest.param(Survival("i2t", 300.0, 90.0, 6000.0), "holds", 300 / 90, id="the fuse lets less through"),
        pytest.param(Survival("i2t", 300.0, 300.0, 6000.0), "broken", 1.0, id="as much is too much"),
        pytest.param(Survival("i2t", 300.0, 450.0, 6000.0), "broken", 300 / 450, id="it lets more through"),
        pytest.param(Survival("current", 20.0, 20.0, 6000.0), "holds", None, id="a contact carries its protection"),
        pytest.param(Survival("current", 20.0, 25.0, 6000.0), "broken", None, id="a contact below it"),
        pytest.param(Survival("i2t", None, 90.0, 6000.0), "holds", None, id="the data do not say: an open point"),
    ],
)
def test_outcome(make, survival, outcome, margin):
    answer = asked(make, survival)
    assert answer.outcome == outcome
    assert answer.margin == (None if margin is None else pytest.approx(margin))


def test_the_sentences(make):
    text = asked(make, Survival("i2t", 300.0, 90.0, 6000.0)).text
    assert text.startswith("The fuse lets 90 A² s through; solid-state switch 25 A stands 300 A² s.")
    assert text.endswith("Its breaking capacity has to be at least 6000 A.")
    assert "is an open point" in asked(make, Survival("current", 20.0, 16.0, None)).text
    assert "the maker's fuse decides, an open point" in asked(make, Survival("i2t", None, 90.0, 6000.0)).text


def test_unanswered_and_not_asked(make):
    answer = asked(make, Unsized("the current is not known", ("element.power",)))
    assert (answer.outcome, answer.needs) == ("unanswered", ("element.power",))
    assert asked(make, NotFed("a signal")).outcome == "does_not_apply"
    assert asked(make, None).outcome == "does_not_apply"
    signal = DeviceChoice("4-20 mA signal", "signal", "analogue", (), 0)
    assert asked(make, Survival("i2t", 300.0, 90.0, None), signal).outcome == "does_not_apply"
    assert asked(make, Survival("i2t", 300.0, 90.0, None), Unsized("none fits")).outcome == "does_not_apply"
