"""Loss and heat sink of solid-state switches, by hand and by what must hold of them."""

from math import pi, sin, sqrt

import pytest
from hypothesis import given
from hypothesis import strategies as st

from specgen.catalogue.load import load_catalogue
from specgen.model.devices import Devices
from specgen.model.reader import read_model
from specgen.model.traits import traits_of
from specgen.sizing.candidate import Candidate
from specgen.sizing.device_choice import choose_device
from specgen.sizing.heat_sink import sink_resistance
from specgen.sizing.solid_state import pole_loss

THREE_PHASE = {"kind": "resistive_heater", "power": "15 kW", "voltage": "400 V", "phases": "3"}


@pytest.fixture
def ssr(loop, panel, catalogue):
    def choose(element=THREE_PHASE, *, devices=None, **panel_changes):
        made = loop(element)
        if devices is not None:
            shop, problems = read_model(Devices, {"ssrs": devices})
            assert not problems
        listed = load_catalogue(shop) if devices is not None else catalogue
        return choose_device(Candidate("time_proportioned", "ssr"), made, panel(**panel_changes), traits_of(made.element), listed)

    return choose


def test_loss_is_about_a_watt_an_ampere():
    """Seen in an open article on solid-state losses: about 1 W an ampere; a teaching page gives 1.5 W as the upper figure."""
    for current in (5.0, 10.0, 20.0):
        assert 0.9 <= pole_loss(current, 1.0, 0.014) / current <= 1.5
    # by integration of v i over a half wave: v = V0 + r i, i = sqrt(2) I sin
    steps = 20000
    instants = [sqrt(2) * 20 * abs(sin(pi * (k + 0.5) / steps)) for k in range(steps)]
    mean = sum(1.2 * i + 0.01 * i * i for i in instants) / steps
    assert pole_loss(20.0, 1.2, 0.01) == pytest.approx(mean, rel=1e-7)


def test_heat_sink_by_hand():
    """80 K over 40 W leave 2 K/W, less 0.5 and 0.1; 40 W through 1.4 K/W and 0.6 K/W bring the junction to its limit."""
    found = sink_resistance(40, 125, 45, 0.5, 0.1)
    assert found == pytest.approx(1.4)
    assert 45 + 40 * (found + 0.6) == pytest.approx(125)


def test_bursts_count_by_their_mean_only_where_they_are_short():
    full = sink_resistance(40, 125, 45, 0.5, 0.1)
    assert sink_resistance(40, 125, 45, 0.5, 0.1, duty=0.5, cycle=2) == full
    assert sink_resistance(40, 125, 45, 0.5, 0.1, duty=0.5, cycle=61, time_constant=600) == full
    # the sink carries 20 W, the junction still stands 40 x 0.6 = 24 K above it: (80 - 24)/20
    assert sink_resistance(40, 125, 45, 0.5, 0.1, duty=0.5, cycle=60, time_constant=600) == pytest.approx(2.8)


def test_no_heat_sink_helps_a_junction_that_is_too_hot():
    assert sink_resistance(100, 125, 45, 0.7, 0.1) == pytest.approx(0.0)
    assert sink_resistance(120, 125, 45, 0.7, 0.1) < 0


@pytest.mark.parametrize(("loss", "duty"), [(0.0, 1.0), (-3.0, 1.0), (10.0, 0.0), (10.0, 1.1)])
def test_nonsense_is_refused(loss, duty):
    with pytest.raises(ValueError, match=r"needs no heat sink|no share"):
        sink_resistance(loss, 125, 45, 0.5, 0.1, duty=duty)


@given(st.floats(0.1, 100), st.floats(0.1, 100), st.floats(0.5, 2), st.floats(0, 0.05))
def test_more_current_never_loses_less(a, b, drop, slope):
    low, high = sorted((a, b))
    assert pole_loss(low, drop, slope) <= pole_loss(high, drop, slope)


@given(st.floats(0.01, 1), st.floats(0.01, 1), st.floats(1, 200))
def test_a_larger_duty_never_allows_a_smaller_heat_sink(a, b, loss):
    low, high = sorted((a, b))
    rest = (loss, 125.0, 45.0, 0.2, 0.1)
    # where a heat sink is possible at all: else both are negative, and there is none
    if sink_resistance(*rest) > 0:
        assert sink_resistance(*rest, duty=high, cycle=1, time_constant=600) <= sink_resistance(*rest, duty=low, cycle=1, time_constant=600)


def test_worked_sheet_of_a_three_phase_heater(ssr, catalogue):
    """15 kW at 400 V and 10 percent more: I = 15000/(sqrt3 400) 1.1; each of three poles V0 2sqrt2/pi I + r I^2; 80 K to the junction."""
    found = ssr()
    device = catalogue.device(found.name)
    current = 15000 / (3**0.5 * 400) * 1.1
    assert current == pytest.approx(23.816, abs=1e-3)
    loss = 3 * (float(device.on_drop) * 2 * 2**0.5 / pi * current + float(device.slope_resistance) * current**2)
    assert found.current == pytest.approx(current)
    assert found.loss == pytest.approx(loss)
    assert 60 < found.loss < 110  # 3 poles x 24 A x 0.9 to 1.5 W/A
    sink = (125 - 45) / loss - float(device.junction_to_case) - float(device.case_to_sink)
    assert found.heat_sink == pytest.approx(sink)
    assert found.cooling == "natural"
    values = {figure.symbol: figure.value for figure in found.figures}
    assert values["P_v"] == found.loss
    assert values["R_s"] == found.heat_sink
    assert found.poles == found.lines == 3


def device(name, current, junction_to_case):
    return {
        "name": name, "poles": "1", "switched_poles": "1", "current": current, "on_drop": "1.0 V", "slope_resistance": "10 mohm",
        "junction_to_case": junction_to_case, "case_to_sink": "0.1 K/W", "highest_junction": "125 degC", "leakage": "5 mA",
        "i2t": "5000 A2 s", "input": {"voltage": "4 V to 32 V", "current": "12 mA"},
    }  # fmt: skip


def test_a_larger_device_where_the_smallest_gets_too_hot(ssr):
    """4.6 kW at 230 V are 22.08 A: 19.88 + 4.88 = 24.8 W; 80 K/24.8 W = 3.23 K/W: 3.3 K/W inside leave nothing, 2.9 K/W need a fan."""
    element = {"kind": "resistive_heater", "power": "4.6 kW", "voltage": "230 V", "phases": "1"}
    current = 4600 / 230 * (400 / 3**0.5 * 1.1 / 230)
    loss = 2 * 2**0.5 / pi * current + 0.01 * current**2
    hot, fan, cool = device("hot", "25 A", "3.3 K/W"), device("fan", "30 A", "2.9 K/W"), device("cool", "40 A", "0.6 K/W")
    assert ssr(element, devices=[hot, fan, cool]).name == "cool"
    assert ssr(element, devices=[hot, fan, cool]).because == "hot carries the load and gets too hot on any heat sink."
    assert ssr(element, devices=[fan, cool]).because == "fan carries the load and would need a fan on its heat sink."
    assert ssr(element, devices=[cool]).because == ""
    found = ssr(element, devices=[hot, fan])
    assert (found.name, found.cooling) == ("fan", "forced")
    assert found.heat_sink == pytest.approx(80 / loss - 3.0)
    found = ssr(element, devices=[hot])
    assert (found.cooling, found.heat_sink) == ("none", None)


def test_the_interior_limit_counts(ssr):
    cool, warm = ssr(enclosure={"interior_limit": "40 degC"}), ssr(enclosure={"interior_limit": "55 degC"})
    assert cool.name == warm.name
    assert cool.heat_sink - warm.heat_sink == pytest.approx(15 / cool.loss)
