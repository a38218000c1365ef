"""A longer-lasting device: taken where it reaches the house's life, never where it does not or nothing is gained."""

from dataclasses import replace

import pytest

from specgen.sizing.candidate import Unsized
from specgen.sizing.device import Contact, DeviceChoice
from specgen.sizing.lasting import longer_lasting
from specgen.sizing.settings import Bound, OnOffSettings, ProportionedSettings

YEARLY = 480_000.0  # 4000 h a year in cycles of 30 s
WANTED = 10.0  # years: 4.8 million operations


def choice(name, operations, *roles):
    parts = (*roles, "load")
    chain = tuple(Contact("the load", role, name, 10.0, operations, 600.0, 0.07, 0.03) for role in parts)
    return DeviceChoice(name, "AC-1", "relay", chain, 3, 25.0, 10.0)


def proportioned(device):
    """Return settings at a cycle of 30 s, whatever the device; the rest of them does not matter here."""
    life = min(part.life for part in device.chain) / YEARLY
    return ProportionedSettings(
        30.0, 10.0, 40.0, (), (), None, 0.05, 0.95, 1.5, 1.5, 0.1, YEARLY, life, "the load", None, "computed",
    )  # fmt: skip


def on_off(device, *, least, most=1.0):
    """Return settings whose contact life asks for ``least`` where the product allows ``most``."""
    operations = min(part.life for part in device.chain)
    bounds = (Bound("D1", 0.1, "one step"), Bound("D5", least, "contact life"))
    return OnOffSettings(
        least, "centred", 64.5, 65.5, least, most, bounds, None, None, None, 8.0, operations / WANTED, WANTED, "the load", "computed"
    )


SMALL, RELAYED = choice("class 9", 1.6e6), choice("class 9", 2.4e6, "interposing")
MIDDLE, LARGE, HUGE = choice("class 12", 4.7e6), choice("class 18", 5.0e6), choice("class 25", 9.0e6)


def test_next_class_that_reaches_it_is_taken_and_says_what_it_gains():
    """4.7 million operations are 9.79 years and not enough; 5 million are 10.4; the smallest lasts 1.6 million, 3.33 years."""
    taken, settings = longer_lasting([SMALL, RELAYED, MIDDLE, LARGE, HUGE], proportioned(SMALL), WANTED, proportioned)
    assert taken.name == "class 18"
    assert settings.contact_life == pytest.approx(5.0e6 / 480e3)
    assert taken.because == "class 18 is taken: its contacts last 10.4 years; with class 9, 3.33 years."
    assert taken.figures[-1].value == pytest.approx(1.6e6 / 480e3)


def test_an_interposing_relay_comes_before_a_larger_class():
    relayed = choice("class 9", 6.0e6, "interposing")
    taken, _ = longer_lasting([SMALL, relayed, LARGE], proportioned(SMALL), WANTED, proportioned)
    assert taken.chain == relayed.chain
    said = "class 9 through an interposing relay is taken: its contacts last 12.5 years; with class 9 driven directly"
    assert taken.because.startswith(said)


@pytest.mark.parametrize(
    "choices",
    [
        pytest.param([SMALL], id="none is larger"),
        pytest.param([SMALL, RELAYED, MIDDLE], id="the larger ones do not reach it"),
        pytest.param([SMALL, MIDDLE, choice("class 18", 4.7e6), HUGE], id="three classes up is too far"),
        pytest.param([LARGE, HUGE], id="the smallest lasts"),
    ],
)
def test_else_the_smallest_stays(choices):
    assert longer_lasting(choices, proportioned(choices[0]), WANTED, proportioned) is None


def test_what_cannot_be_settled_with_it_is_not_taken():
    assert longer_lasting([SMALL, LARGE], proportioned(SMALL), WANTED, lambda _: Unsized("unstable")) is None
    assert longer_lasting([SMALL, LARGE], Unsized("no plant"), WANTED, proportioned) is None
    solid = replace(SMALL, chain=())
    assert longer_lasting([solid, LARGE], replace(proportioned(SMALL), contact_life=None), WANTED, proportioned) is None


def test_life_that_forces_the_differential_out_of_the_tolerance():
    """The smallest lasts the house's life only at 1.5 K where 1 K is allowed; the next class at 0.6 K."""
    taken, settings = longer_lasting(
        [SMALL, RELAYED, MIDDLE], on_off(SMALL, least=1.5), WANTED, lambda device: on_off(device, least=0.6 if device is MIDDLE else 1.2)
    )
    assert (taken.name, settings.least) == ("class 12", 0.6)
    assert "with class 9 they would need a wider differential" in taken.because
    assert longer_lasting([SMALL, MIDDLE], on_off(SMALL, least=1.5), WANTED, lambda device: on_off(device, least=1.2)) is None


def test_a_differential_that_something_else_forces_gains_nothing():
    tight = on_off(SMALL, least=0.5, most=0.4)
    assert longer_lasting([SMALL, MIDDLE], replace(tight, least_bounds=(Bound("D1", 0.5, "step"),)), WANTED, lambda _: tight) is None
