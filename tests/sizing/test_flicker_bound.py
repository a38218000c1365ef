"""What a public network does to the cycle time and to an on-off loop: 2 kW to neutral needs 71.1 s at the reference impedance."""

import pytest

from specgen.model.traits import traits_of
from specgen.process.box_of import box_of
from specgen.sizing.candidate import Candidate
from specgen.sizing.device_choice import choose_device
from specgen.sizing.measurement import measuring_error
from specgen.sizing.on_off import on_off_settings
from specgen.sizing.time_proportioned import proportioned_settings

HEATER = {"kind": "resistive_heater", "power": "2 kW", "voltage": "230 V", "phases": "1", "needs": []}
# slow enough that control allows long cycles, and too fast for any
SLOW = {"response": {"change": "130 K", "time_constant": "60 min", "dead_time": "240 s", "rest_value": "8 degC to 20 degC"}}
WIDE = {"tolerance": "4 K"}
FAST = {"response": {"change": "130 K", "time_constant": "10 min", "dead_time": "25 s", "rest_value": "8 degC to 20 degC"}}


@pytest.fixture
def settled(loop, panel, catalogue):
    def make(plant, device, network, mode="time_proportioned", **changes):
        declared, shop = loop(HEATER, plant=plant, **changes), panel(supply={"network": network})
        box, error = box_of(declared, shop), measuring_error(declared, shop, catalogue)
        candidate = Candidate(mode, device)
        chosen = choose_device(candidate, declared, shop, traits_of(declared.element), catalogue)
        if mode == "on_off":
            return on_off_settings(declared, shop, box, chosen, error)
        return proportioned_settings(candidate, declared, shop, box, chosen, error)

    return make


def bounds(settings):
    return {bound.rule: bound.limit for bound in settings.least_bounds}


def test_a_private_network_asks_nothing(settled):
    settings = settled(SLOW, "ssr", "private")
    assert "C7" not in bounds(settings)
    assert all(figure.symbol != "Plt" for figure in settings.figures)


def test_solid_state_takes_the_shortest_cycle_that_does_not_flicker(settled):
    """From 71.1 s the next of the series is 90 s; without the network it would be a second or two."""
    settings = settled(SLOW, "ssr", "public", need=WIDE)
    assert bounds(settings)["C7"] == pytest.approx(71.1, abs=0.1)
    assert settings.least == bounds(settings)["C7"]
    assert settings.cycle_time == 90
    assert settled(SLOW, "ssr", "private", need=WIDE).cycle_time < 5


def test_where_control_does_not_allow_it_the_cycle_is_what_it_was(settled):
    public, private = settled(FAST, "ssr", "public"), settled(FAST, "ssr", "private")
    assert public.most < bounds(public)["C7"]
    assert public.cycle_time == private.cycle_time
    assert public.least == private.least


def test_a_window_between_two_steps_of_the_series_is_none(settled):
    """With 1.5 K the ripple lets the cycle be 74 s: more than 71.1 s, but the next of the series is 90 s."""
    public = settled(SLOW, "ssr", "public", need={"tolerance": "1.5 K"})
    assert bounds(public)["C7"] < public.most < 90
    assert public.cycle_time == settled(SLOW, "ssr", "private", need={"tolerance": "1.5 K"}).cycle_time
    assert public.least < public.cycle_time * 1.001


def test_contacts_take_the_longest_cycle_all_the_same(settled):
    assert settled(SLOW, "contactor", "public").cycle_time == settled(SLOW, "contactor", "private").cycle_time


def test_the_basis_shows_it(settled):
    settings = settled(SLOW, "ssr", "public", need=WIDE)
    figures = {figure.symbol: figure.value for figure in settings.figures}
    assert figures["d"] == pytest.approx(0.4 * 2000 / 230**2)
    assert figures["Plt"] < 0.65
    assert any(assumption.field == "supply.impedance" for assumption in settings.assumptions)


def test_on_off_shows_it_too(settled):
    settings = settled(FAST, "contactor", "public", "on_off", need={"tolerance": "4 K", "stability": "relaxed"})
    assert any(figure.symbol == "Plt" for figure in settings.figures)
    assert all(figure.symbol != "Plt" for figure in settled(FAST, "contactor", "private", "on_off").figures)


@pytest.mark.parametrize(("network", "plant", "least"), [("private", FAST, 1.0), ("public", FAST, 1.0), ("public", SLOW, 71.1)])
def test_a_cycle_of_the_designer_is_kept_and_its_window_shown(settled, network, plant, least):
    settings = settled(plant, "ssr", network, need=WIDE, choose={"cycle_time": "20 s", "because": "as on the others"})
    assert settings.cycle_time == 20
    assert settings.least == pytest.approx(least, abs=0.1)
