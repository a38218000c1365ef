"""O6: what the output drives."""

import pytest

from specgen.sizing.candidate import Unsized, Unsuited
from specgen.sizing.device import Drive

COIL = Drive("the holding current of the coil, in DC-13", 0.167, 0.6)
BURDEN = Drive("the resistance of 2 inputs in series", 500.0, 500.0, "resistance")


@pytest.mark.parametrize(
    ("drives", "outcome", "margin"),
    [
        ((COIL,), "holds", 0.6 / 0.167),
        ((BURDEN,), "holds", 1.0),
        ((COIL, Drive("the inrush current of the coil", 2.1, 2.0)), "broken", 2.0 / 2.1),
        ((Drive("the resistance of 3 inputs in series", 750.0, 500.0, "resistance"),), "broken", 500 / 750),
        ((), "holds", None),
    ],
)
def test_outcome(make, device, drives, outcome, margin):
    answer = make.ask("O6", make.case("valve", "analogue", "signal", device_choice=device(drives=drives)))
    assert answer.outcome == outcome
    assert answer.margin == (None if margin is None else pytest.approx(margin))


def test_numbers_are_said(make, device):
    answer = make.ask("O6", make.case("valve", "analogue", "signal", device_choice=device(drives=(BURDEN,))))
    assert answer.text.endswith("the resistance of 2 inputs in series is 500 Ω of 500 Ω.")


def test_an_input_that_is_not_known_is_named(make, device):
    unknown = Unsized("the resistance of the input is not declared", ("element.burden",))
    answer = make.ask("O6", make.case("valve", "analogue", "signal", device_choice=device(undriven=unknown)))
    assert (answer.outcome, answer.needs) == ("unanswered", ("element.burden",))


@pytest.mark.parametrize(
    ("choice", "outcome"),
    [
        (Unsized("no controller of the panel has a logic output", ("controllers.outputs",)), "broken"),
        (Unsized("the relay cannot; no relay helps", ("controllers.outputs", "devices.relays")), "broken"),
        (Unsized("the coil is for 24 V d.c.", ("control_supply",)), "broken"),
        (Unsized("the load is not known", ("element.power",)), "does_not_apply"),
        (Unsized("too large", ("devices.ssrs",)), "does_not_apply"),
        (Unsuited("takes a signal"), "does_not_apply"),
    ],
)
def test_no_device(make, choice, outcome):
    case = make.case("heater", "on_off", "ssr", device_choice=choice)
    assert make.ask("O6", case).outcome == outcome
    # what cannot be driven is said once
    assert make.ask("O1", case).outcome != "broken" or outcome != "broken"
