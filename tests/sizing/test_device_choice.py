"""Devices and their chains: what is chosen, refused, and stated."""

import pytest

from specgen.catalogue.load import load_catalogue
from specgen.core.quantity import Quantity
from specgen.model.devices import Devices
from specgen.model.reader import read_model
from specgen.model.traits import traits_of
from specgen.sizing.candidate import Candidate, NoCandidate, Unsized, Unsuited
from specgen.sizing.contactor_choice import rating_at
from specgen.sizing.device_choice import choose_device, larger_devices

HEATER = {"kind": "resistive_heater", "power": "6 kW", "voltage": "400 V", "phases": "3"}
SMALL = {"kind": "resistive_heater", "power": "1 kW", "voltage": "230 V", "phases": "1"}
COMPRESSOR = {
    "kind": "fixed_speed_compressor", "current": "8.4 A", "voltage": "400 V", "phases": "3", "min_run": "180 s", "min_rest": "120 s",
    "starts_per_hour": "10",
}  # fmt: skip
SOLENOID = {"kind": "solenoid_valve", "coil_power": "9 W", "voltage": "24 V", "operations_life": "2.0e6", "min_pulse": "1 s"}
VALVE = {"kind": "modulating_valve", "signal": "4-20 mA", "stroke_time": "60 s", "burden": "250 ohm"}
TRAVELLING = {"kind": "three_point_valve", "travel_time": "120 s", "motor_voltage": "24 V", "motor_current": "0.4 A"}
BURNER = {"kind": "gas_burner", "stages": "on_off", "control_voltage": "230 V", "control_current": "2 A"}
MODE = {"relay": "on_off", "contactor": "on_off", "ssr": "time_proportioned", "power_controller": "analogue", "signal": "analogue",
        "relay_pair": "three_point"}  # fmt: skip
CONTROLLER = {"name": "A", "outputs": [{"kind": "relay", "rating": "2 A", "count": "2"}]}


@pytest.fixture
def choose(loop, panel, catalogue):
    def run(device, element, *, the_catalogue=None, function=choose_device, **panel_changes):
        made = loop(element)
        return function(Candidate(MODE[device], device), made, panel(**panel_changes), traits_of(made.element), the_catalogue or catalogue)

    return run


def shop(**kinds):
    devices, problems = read_model(Devices, kinds)
    assert devices is not None, problems
    return load_catalogue(devices)


def test_smallest_contactor_that_carries_it(choose):
    """9.53 A in AC-1: class 9 carries 20 A. 38.1 A: class 25 is the first with 38.1 A or more."""
    small, large = choose("contactor", HEATER), choose("contactor", HEATER | {"power": "24 kW"})
    assert (small.name, small.category, small.rating, small.poles) == ("contactor class 9, d.c. coil", "AC-1", 20.0, 3)
    assert (large.name, large.rating) == ("contactor class 25, d.c. coil", 40.0)
    assert large.current == pytest.approx(24000 / (3**0.5 * 400) * 1.1)
    assert any("to be replaced by the data sheet before construction" in a.why for a in small.assumptions)


def test_motor_by_its_ac3_current(choose):
    assert choose("contactor", COMPRESSOR).rating == 9.0
    assert choose("contactor", COMPRESSOR | {"current": "9.1 A"}).rating == 12.0


def test_chain_of_a_contactor(choose):
    """4 W at 24 V is 0.167 A of d.c.; as wear 0.167/0.3 = 0.556 A, between 800 000 at 0.5 A and 300 000 at 1 A."""
    chain = choose("contactor", HEATER).chain
    assert [part.role for part in chain] == ["controller", "load"]
    assert chain[0].current == pytest.approx(4 / 24)
    from_points = 8.0e5 * (0.5555556 / 0.5) ** -1.4150375  # log2(8/3) = 1.4150375
    assert chain[0].life == pytest.approx(from_points, rel=1e-5)
    # 9.526 A between 10 A (1.5 million) and 5 A (4.5 million): 1.5e6 (9.526/10)^-log2(3)
    assert chain[1].life == pytest.approx(1.5e6 * 0.9526279**-1.5849625, rel=1e-5)


def test_larger_devices_rise_and_last_longer(choose):
    first, rest = choose("contactor", HEATER), choose("contactor", HEATER, function=larger_devices)
    ratings = [first.rating, *(choice.rating for choice in rest)]
    assert ratings == sorted(ratings)
    assert ratings[-1] == 110.0
    lives = [choice.chain[-1].life for choice in (first, *rest)]
    assert lives == sorted(lives)
    # the same class through an interposing relay comes before the next class, where that spares the controller's relay
    assert [part.role for part in rest[0].chain] == ["controller", "interposing", "load"]
    assert rest[0].name == first.name
    assert min(part.life for part in rest[0].chain) > min(part.life for part in first.chain)


def test_too_large_for_any(choose):
    found = choose("contactor", HEATER | {"power": "90 kW"})
    assert found.because.startswith("the largest contactor, contactor class 80")
    assert choose("contactor", HEATER | {"power": "90 kW"}, function=larger_devices) == ()
    assert isinstance(choose("ssr", HEATER | {"power": "60 kW"}), Unsized)
    assert isinstance(choose("power_controller", HEATER | {"power": "90 kW"}), Unsized)


@pytest.mark.parametrize(
    ("element", "words"),
    [
        (COMPRESSOR, "a relay is no candidate for a motor"),
        (HEATER, "a relay is no candidate for a three-phase load"),
        (SMALL | {"power": "4 kW"}, "a relay is no candidate above its rating"),
        (SMALL | {"voltage": "400 V"}, "a relay opens"),
        (HEATER | {"kind": "infrared_lamp_heater", "voltage": "230 V", "phases": "1"}, "a relay has no rating in AC-5b"),
    ],
)
def test_relay_is_no_candidate(choose, element, words):
    found = choose("relay", element)
    assert isinstance(found, NoCandidate)
    assert found.because.startswith(words)


def test_own_relay_before_a_plug_in_one(choose):
    own = choose("relay", SMALL | {"power": "0.4 kW"})
    assert own.rating == 2.0
    assert [part.role for part in own.chain] == ["controller"]
    plug = choose("relay", SMALL)
    # 1000/230 x 231 x 1.1/230 = 4.80 A
    assert (plug.name, [part.role for part in plug.chain]) == ("plug-in relay 6 A, 1-pole, d.c. coil", ["controller", "load"])


def test_coils_count_less(choose):
    """9 W at 24 V d.c. are 0.375 A; a 2 A relay carries 0.3 x 2 = 0.6 A into d.c. coils. 2 A of a.c. burner control need 10 A x 0.2."""
    own = choose("relay", SOLENOID)
    assert (own.category, own.rating) == ("DC-13", pytest.approx(0.6))
    assert [part.role for part in own.chain] == ["controller", "element"]
    assert own.chain[-1].life == 2.0e6
    assert own.chain[-1].pull_in == 1.0
    assert choose("relay", SOLENOID | {"coil_power": "20 W"}).name.startswith("plug-in relay 6 A")
    burner = choose("relay", BURNER)
    assert (burner.name, burner.rating) == ("plug-in relay 10 A, 2-pole, d.c. coil", pytest.approx(2.0))


def test_solenoid_without_a_life_is_an_open_point(choose):
    found = choose("relay", {"kind": "solenoid_valve", "coil_power": "9 W", "voltage": "24 V"})
    assert found.open_points[0].needs == ("element.operations_life",)
    assert any(a.field == "element.min_pulse" for a in found.assumptions)
    assert all(part.role != "element" for part in found.chain)


def test_interposing_where_the_controller_cannot_carry_the_coil(choose):
    """18 W at 24 V are 0.75 A, above the 0.6 A of a 2 A relay."""
    found = choose("contactor", HEATER | {"power": "60 kW"})
    assert [part.role for part in found.chain] == ["controller", "interposing", "load"]
    assert found.chain[1].current == pytest.approx(0.75)


def test_control_supply_picks_the_coil(choose):
    a_c = choose("contactor", HEATER, control_supply={"voltage": "230 V", "kind": "ac", "capacity": "2 A"})
    assert a_c.name == "contactor class 9, a.c. coil"
    # 9 VA at 230 V and 10 percent more
    assert a_c.chain[0].current == pytest.approx(9 / 230 * 1.1)
    too_high = choose("contactor", HEATER, control_supply={"voltage": "110 V", "kind": "dc", "capacity": "2 A"})
    assert "110 V d.c. is not given" in too_high.because


CONTACTOR = {
    "name": "approved 30", "resistive_current": "30 A", "motor_current": "15 A", "mechanical_life": "5e6", "operations_per_hour": "600",
    "electrical_life": [{"current": "30 A", "operations": "1e6"}], "pull_in": "20 ms", "drop_out": "15 ms", "loss_per_pole": "2 W",
    "coil": {"voltage": "24 V", "kind": "dc", "power": "3 W"},
}  # fmt: skip


def test_shop_devices_replace_the_class(choose):
    mine = shop(contactors=[CONTACTOR])
    found = choose("contactor", HEATER, the_catalogue=mine)
    assert found.name == "approved 30"
    assert not any(a.field == "devices.contactors" for a in found.assumptions)
    # its resistive current holds at 40 degC: at 45 degC sqrt(60/65) of it is left
    assert found.rating == pytest.approx(30 * (60 / 65) ** 0.5)
    assert choose("contactor", HEATER, the_catalogue=mine, enclosure={"interior_limit": "40 degC"}).rating == 30.0


def test_shop_contactor_without_motor_life_is_not_guessed(choose):
    found = choose("contactor", COMPRESSOR, the_catalogue=shop(contactors=[CONTACTOR]))
    assert found.needs == ("devices.contactors.motor_life",)
    lasting = CONTACTOR | {"motor_life": [{"current": "15 A", "operations": "1e6"}]}
    assert choose("contactor", COMPRESSOR, the_catalogue=shop(contactors=[lasting])).chain[-1].life == 1e6


def test_shop_coil_must_fit(choose):
    control = {"voltage": "48 V", "kind": "dc", "capacity": "2 A"}
    found = choose("contactor", HEATER, the_catalogue=shop(contactors=[CONTACTOR]), control_supply=control)
    assert found.because == "the coil of approved 30 is for 24 V d.c., the control supply is 48 V d.c."
    assert found.needs == ("control_supply",)


def test_rating_falls_with_the_interior(catalogue, panel):
    device = catalogue.contactors[0]
    ratings = [rating_at(device, "AC-1", panel(enclosure={"interior_limit": f"{t} degC"}), catalogue).value for t in (40, 60, 70, 90)]
    assert ratings[0] == ratings[1] == float(device.resistive_current)
    assert ratings[1] > ratings[2] > ratings[3]
    assert isinstance(rating_at(device, "AC-1", panel(enclosure={"interior_limit": "105 degC"}), catalogue), Unsized)
    # a motor current is never above what the heat allows
    assert rating_at(device, "AC-3", panel(enclosure={"interior_limit": "104 degC"}), catalogue).value < device.motor_current


def test_solid_state(choose):
    found = choose("ssr", HEATER)
    assert (found.name, found.poles, found.controller_output) == ("solid-state switch 25 A, three-phase, 3 poles switched", 3, "logic")
    assert [(part.role, part.life, part.pull_in) for part in found.chain] == [("load", None, 0.01)]
    assert (found.open_points, found.cooling) == ((), "natural")
    assert choose("ssr", SMALL).name == "solid-state switch 10 A, 1-pole"
    between = choose("ssr", SMALL | {"voltage": "400 V"})
    assert (between.name, between.poles) == ("solid-state switch 25 A, 2-pole", 2)
    assert choose("ssr", COMPRESSOR).because == "no motor rating is given for a solid-state switch"
    assert isinstance(choose("ssr", SOLENOID), Unsized)
    assert isinstance(choose("ssr", BURNER), Unsized)


def test_two_switched_poles_only_where_no_three_are_listed(choose, catalogue):
    two = [device for device in catalogue.ssrs if device.switched_poles == 2 and device.poles == 3]
    found = choose("ssr", HEATER, the_catalogue=load_catalogue(Devices(ssrs=tuple(two))))
    assert found.poles == 2
    order = [found, *choose("ssr", HEATER, function=larger_devices)]
    assert order[-1].poles == 2


def test_solid_state_without_a_logic_output_wears_the_relay(choose):
    found = choose("ssr", HEATER, controllers=[CONTROLLER])
    assert found.controller_output == "relay"
    assert [(part.role, part.life is None) for part in found.chain] == [("controller", False), ("load", True)]
    weak = {"name": "B", "outputs": [{"kind": "logic", "voltage": "12 V", "drive": "5 mA"}]}
    assert "gives 5 mA" in choose("ssr", HEATER, controllers=[weak]).because


def test_power_controller(choose):
    found = choose("power_controller", HEATER)
    assert (found.name, found.category, found.chain) == ("power controller 16 A, three-phase", "AC-51", ())
    assert choose("power_controller", SMALL).name == "power controller 16 A, single-phase"
    assert isinstance(choose("power_controller", COMPRESSOR), Unsuited)
    lamp = HEATER | {"kind": "infrared_lamp_heater"}
    assert choose("power_controller", lamp).category == "AC-55b"
    burst = {"name": "burst 30", "current": "30 A", "firing": "burst", "loss_per_ampere": "1.3 V"}
    assert isinstance(choose("power_controller", lamp, the_catalogue=shop(power_controllers=[burst])), Unsized)


def test_signal(choose):
    found = choose("signal", VALVE)
    assert (found.name, found.controller_output, found.rating, found.chain) == ("4-20 mA signal", "analogue", None, ())
    assert found.figures[0].value == pytest.approx(0.5)  # 250 of 500 ohm
    assert choose("signal", {k: v for k, v in VALVE.items() if k != "burden"}).undriven.needs == ("element.burden",)
    assert isinstance(choose("signal", HEATER), Unsuited)
    assert choose("signal", VALVE, controllers=[CONTROLLER]).needs == ("controllers.outputs",)


def test_pair_of_relays(choose):
    found = choose("relay_pair", TRAVELLING)
    assert (found.controller_output, found.current) == ("relay_pair", 0.4)
    one = {"name": "A", "outputs": [{"kind": "relay", "rating": "2 A", "count": "1"}]}
    assert choose("relay_pair", TRAVELLING, controllers=[one]).because == "no controller of the panel has a relay output with 2 of them"
    assert isinstance(choose("relay_pair", HEATER), Unsuited)
    assert choose("relay_pair", TRAVELLING | {"motor_current": "1 A"}).chain[-1].role == "load"


@pytest.mark.parametrize("device", ["relay", "contactor", "ssr"])
def test_no_switch_for_what_takes_a_signal_or_travels(choose, device):
    assert isinstance(choose(device, VALVE), Unsuited)
    assert isinstance(choose(device, TRAVELLING), Unsuited)


def test_inrush_counts(choose):
    """Ten times 22 A are 220 A: a class 18 contactor makes ten times 18 A, class 25 makes 250 A."""
    hot = {"kind": "molybdenum_disilicide_heater", "power": "8 kW", "voltage": "400 V", "phases": "1", "inrush_factor": "10"}
    assert choose("contactor", hot).name == "contactor class 25, d.c. coil"
    assert choose("contactor", hot | {"inrush_factor": "1"}).name == "contactor class 12, d.c. coil"


def test_every_wearing_contact_has_a_life_and_every_number_a_figure(choose):
    for device, element in (("contactor", HEATER), ("contactor", COMPRESSOR), ("relay", SMALL), ("relay", SOLENOID), ("contactor", BURNER)):
        found = choose(device, element)
        assert found.rating >= found.current
        values = [figure.value for figure in found.figures]
        assert found.rating in values
        assert found.current in values
        for part in found.chain:
            assert part.life > 0
            assert part.life in [figure.value for figure in part.figures]


def test_quantities_of_shop_devices_keep_their_text():
    assert isinstance(shop(contactors=[CONTACTOR]).contactors[0].resistive_current, Quantity)
