"""O1: rating and current."""

import pytest

from specgen.sizing.candidate import Unsized, Unsuited
from specgen.sizing.device import DeviceChoice


def device(rating, current):
    return DeviceChoice("contactor class 25", "AC-1", "relay", (), 3, rating, current)


@pytest.mark.parametrize(
    ("rating", "current", "outcome", "margin"),
    [
        (25.0, 14.3, "holds", 25 / 14.3),
        pytest.param(25.0, 25.0, "holds", 1.0, id="at the limit"),
        pytest.param(12.0, 14.3, "broken", 12 / 14.3, id="too small"),
        pytest.param(None, None, "does_not_apply", None, id="a signal"),
    ],
)
def test_outcome(make, rating, current, outcome, margin):
    answer = make.ask("O1", make.case("heater", "on_off", device_choice=device(rating, current)))
    assert answer.outcome == outcome
    assert answer.margin == (None if margin is None else pytest.approx(margin))


@pytest.mark.parametrize(
    ("needs", "outcome"),
    [
        pytest.param((), "broken", id="no such device exists"),
        pytest.param(("devices.contactors",), "broken", id="none is listed"),
        pytest.param(("element.power",), "unanswered", id="the load is not known"),
        pytest.param(("devices.contactors", "supply.voltage"), "unanswered", id="the supply is not known"),
    ],
)
def test_no_device(make, needs, outcome):
    case = make.case("blower", "on_off", "ssr", device_choice=Unsized("no motor rating is given for a solid-state switch", needs))
    answer = make.ask("O1", case)
    assert answer.outcome == outcome
    assert "no motor rating is given for a solid-state switch" in answer.text


def test_nothing_to_rate_where_the_kind_does_not_suit(make):
    """The mode's rules end such a pair; a rating would add nothing."""
    case = make.case("heater", "three_point", device_choice=Unsuited("a pair of relays drives a valve that travels"))
    assert make.ask("O1", case).outcome == "does_not_apply"
