"""What feeds a loop, from its element to the open points."""

import pytest
from hypothesis import HealthCheck, given
from hypothesis import settings as with_settings
from hypothesis import strategies as st

from specgen.model.traits import traits_of
from specgen.sizing.candidate import Candidate, Unsized
from specgen.sizing.device_choice import devices_by_rating
from specgen.sizing.feeder import Feeder, NotFed, feeder_of, surviving

HEATER = {"kind": "resistive_heater", "power": "9 kW", "voltage": "400 V", "phases": "3"}
CABLE = {"length": "30 m", "method": "C", "ambient": "30 degC"}
MODES = {"power_controller": "analogue", "signal": "analogue"}


@pytest.fixture
def feed(catalogue, loop, panel):
    def made(element, device="contactor", house=None, *, saved=False, **changes):
        panel_fields = {key: changes.pop(key) for key in ("supply", "code_basis", "enclosure") if key in changes}
        declared = loop(element, **changes)
        shop = panel(**panel_fields, **({"house": house} if house else {}))
        traits = traits_of(declared.element)
        found = devices_by_rating(Candidate(MODES.get(device, "on_off"), device), declared, shop, traits, catalogue)
        if saved:
            found = surviving(device, found, declared, shop, traits, catalogue)
        choice = found if isinstance(found, Unsized) else found[0]
        return choice, feeder_of(device, choice, declared, shop, traits, catalogue)

    return made


def test_nine_kilowatts_at_the_end_of_a_cable(feed):
    """9000/(sqrt3 400) 1.1 = 14.29 A: 16 A. Inside B1 at 45 degC: 2.5 mm2, 18.3 x 0.91 = 16.65 A.

    C at 30 degC: 1.5 mm2, 15.2 x 1.15 = 17.48 A; its drop is sqrt3 30 14.29 0.0225/1.5/400 = 2.78 %.
    """
    _, fed = feed(HEATER, cable=CABLE)
    branch, = fed.branches
    assert branch.current == pytest.approx(9000 / (3**0.5 * 400) * 1.1)
    assert branch.protection.rating == 16.0
    assert (branch.internal.size * 1e6, branch.internal.capacity) == (pytest.approx(2.5), pytest.approx(18.3 * 0.91))
    assert (branch.cable.size * 1e6, branch.cable.capacity) == (pytest.approx(1.5), pytest.approx(15.2 * 1.15))
    assert branch.cable.drop == pytest.approx(3**0.5 * 30 * 14.2894 * 0.0225 / 1.5 / 400, rel=1e-5)
    assert not fed.open_points


def test_without_a_cable_only_the_inside_is_sized(feed):
    _, fed = feed(HEATER)
    assert fed.branches[0].cable is None
    assert [point.needs for point in fed.open_points] == [("cable.length",)]
    assert fed.branches[0].internal.drop is None


def test_the_houses_own_drop_counts(feed):
    assert feed(HEATER, cable=CABLE)[1].branches[0].cable.size * 1e6 == pytest.approx(1.5)
    _, strict = feed(HEATER, house={"voltage_drop": "2 percent"}, cable=CABLE)
    assert strict.branches[0].cable.size * 1e6 == pytest.approx(2.5)
    assert "wiring/voltage_drop" not in [row.id for row in strict.rows]


def test_nothing_is_fed(feed):
    valve = {"kind": "modulating_valve", "signal": "4-20 mA", "stroke_time": "60 s"}
    assert isinstance(feed(valve, "signal")[1], NotFed)
    burner = {"kind": "gas_burner", "stages": "on_off", "control_voltage": "110 V", "control_current": "1 A"}
    assert isinstance(feed(burner)[1], NotFed)


def test_an_unknown_current_names_what_is_missing(feed):
    drive = {"kind": "variable_speed_fan", "power": "3 kW", "signal": "4-20 mA", "lowest_speed": "20 percent"}
    found = feed(drive, "signal")[1]
    assert isinstance(found, Unsized)
    assert found.needs == ("element.voltage", "element.phases")


def test_what_is_too_large_lacks_nothing(feed):
    found = feed({**HEATER, "power": "500 kW"})[1]
    assert isinstance(found, Unsized)
    assert not found.needs


def test_every_motor_has_its_own_starter(feed):
    fan = {"kind": "fan", "power": "1.5 kW", "voltage": "400 V", "phases": "3", "starts_per_hour": "10", "count": "3"}
    _, fed = feed(fan)
    assert len(fed.branches) == 3
    # 1500/(sqrt3 400 0.6) = 3.608 A each
    assert [branch.current for branch in fed.branches] == pytest.approx([1500 / (3**0.5 * 400 * 0.6)] * 3)
    assert fed.branches[0].protection.setting_range == (2.5, 4.0)


@pytest.mark.parametrize(
    ("count", "units"),
    [
        pytest.param(1, [1], id="one unit cannot be divided"),
        pytest.param(2, [2], id="two of 17.2 A together are below 48 A"),
        pytest.param(5, [2, 2, 1], id="two a circuit"),
        pytest.param(4, [2, 2], id="as equal as can be"),
    ],
)
def test_north_america_divides_heaters(feed, count, units):
    """13 kW at 480 V: 15.64 A, 17.2 A at the highest supply: two are 34.4 A, three 51.6 A."""
    element = {**HEATER, "power": "13 kW", "voltage": "480 V", "count": str(count)}
    _, fed = feed(element, supply={"voltage": "480 V", "frequency": "60 Hz"}, code_basis="north_america")
    assert [branch.units for branch in fed.branches] == units
    for branch in fed.branches:
        assert branch.current == pytest.approx(branch.units * 13000 / (3**0.5 * 480) * 1.1)
        assert branch.internal.gauge.endswith("AWG")
        assert branch.protection.rating >= 1.25 * branch.current


def test_a_larger_switch_where_the_smallest_would_not_survive(feed):
    """22 kW: 34.9 A takes a fuse of 40 A that lets 850 A2 s through: the class 40 stands 600, the class 55 1500."""
    element = {**HEATER, "power": "22 kW"}
    first, fed = feed(element, "ssr")
    assert (fed.survival.sees, fed.survival.withstands, fed.survival.survives) == (850.0, 600.0, False)
    saved, fed = feed(element, "ssr", saved=True)
    assert first.rating == 40.0
    assert saved.rating == 55.0
    assert fed.survival.survives is True
    assert first.name in saved.because
    small, _ = feed(HEATER, "ssr", saved=True)
    assert not small.because


def test_a_let_through_that_the_data_do_not_say(feed):
    _, fed = feed(HEATER, "power_controller", cable=CABLE)
    assert fed.branches[0].protection.kind == "semiconductor_fuse"
    assert fed.survival.survives is None
    assert [point.needs for point in fed.open_points] == [("devices.power_controllers",)]


def test_contacts_carry_their_protection(feed):
    _, fed = feed(HEATER)
    assert (fed.survival.sees, fed.survival.withstands, fed.survival.survives) == (16.0, 20.0, True)


@with_settings(max_examples=60, deadline=None, suppress_health_check=[HealthCheck.function_scoped_fixture])
@given(
    power=st.integers(200, 60000), three=st.booleans(), length=st.integers(1, 150), method=st.sampled_from(["B1", "B2", "C", "E"]),
    grouped=st.integers(1, 9), ambient=st.integers(0, 50), basis=st.sampled_from(["iec", "north_america"]),
    device=st.sampled_from(["contactor", "ssr", "power_controller"]),
)  # fmt: skip
def test_current_protection_and_conductors_always_rise_in_this_order(feed, power, three, length, method, grouped, ambient, basis, device):
    element = {**HEATER, "power": f"{power} W", "phases": "3" if three else "1"}
    cable = {"length": f"{length} m", "method": method, "grouped": str(grouped), "ambient": f"{ambient} degC"}
    _, fed = feed(element, device, code_basis=basis, cable=cable)
    if not isinstance(fed, Feeder):
        assert not fed.needs
        return
    factor = 1.25 if basis == "north_america" else 1.0
    assert sum(branch.current for branch in fed.branches) == pytest.approx(power / (400 * (3**0.5 if three else 1)) * 1.1)
    for branch in fed.branches:
        for conductor in (branch.internal, branch.cable):
            assert factor * branch.current <= branch.protection.rating * (1 + 1e-9)
            assert branch.protection.rating <= conductor.capacity * (1 + 1e-9)
        assert branch.cable.drop <= 0.05 * (1 + 1e-9)
