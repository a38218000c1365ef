"""From declared fields to plants, every number by hand."""

from math import sqrt

import pytest

from specgen.core.quantity import Range
from specgen.process.box import Point, Unmodelled
from specgen.process.box_of import box_of
from specgen.process.plant import Integrating, SelfRegulating


def assert_plant(plant, kind, *numbers):
    assert isinstance(plant, kind)
    found = [getattr(plant, name) for name in plant.__slots__]
    wanted = list(numbers) + [0.0] * (len(found) - len(numbers))
    for one, other in zip(found, wanted, strict=True):
        assert one == pytest.approx(other, rel=1e-4)


BALANCE = {
    "balance": {
        "heat_capacity": "60 kJ/K",
        "loss": "100 W/K",
        "surroundings": "8 degC to 30 degC",
        "load": "0 kW to 1 kW",
        "dead_time": "20 s to 25 s",
        "lag": "40 s",
    }
}


def test_balance_by_hand(make):
    """Mild: 40 in 30 with 10.89 kW and no load; hard: 80 in 8 with 7.29 kW and 1 kW of load; UA 100 W/K, C 60 kJ/K."""
    box = box_of(make.loop(make.warm, plant=BALANCE), make.panel())
    mild = box.plant_at(Point(strength=1.0))
    hard = box.plant_at(Point(load=1.0, dead_time=1.0))
    assert_plant(mild, SelfRegulating, 108.9 - 10, 10, 600, 20, 40)
    assert_plant(hard, SelfRegulating, 72.9 - 82, 82, 600, 25, 40)
    assert box.duty_low == (pytest.approx(10 / 108.9), Point(strength=1.0))
    assert box.duty_high == (pytest.approx(82 / 72.9), Point(load=1.0))
    assert not box.rests
    assert not box.reaches
    assert box.reach.shortfall == pytest.approx(9.1)
    assert box.reach.missing_power == pytest.approx(910)


def test_case_in_words(make):
    box = box_of(make.loop(make.warm, plant=BALANCE), make.panel())
    text = box.text(Point(strength=1.0)).replace("\u202f", " ")
    assert text == "supply +10 percent, setpoint 40.0 °C, surroundings 30 °C, no load, dead time 20 s"
    assert box.case(Point(load=0.5))["plant.balance.surroundings"] == pytest.approx(19)
    assert "element.power" not in box.case(Point())


def test_bodies_and_surfaces(make):
    """UA = 14 x 1.1 to 14 x 1.3; fast 60 kg x 600 J/(kg K); all with up to 140 kg x 3000."""
    plant = {
        "balance": {
            "bodies": [
                {"what": "air and coil", "mass": "60 kg", "specific_heat": "0.6 kJ/(kg K)", "follows": "fast"},
                {"what": "herbs", "mass": "0 kg to 140 kg", "specific_heat": "3 kJ/(kg K)", "follows": "slow"},
            ],
            "surfaces": [{"what": "panels", "area": "14 m2", "u_value": "1.1 W/(m2 K) to 1.3 W/(m2 K)"}],
            "surroundings": "20 degC",
            "dead_time": "25 s",
        }
    }
    box = box_of(make.loop(make.warm, plant=plant), make.panel())
    assert box.loss.at(0.0) == pytest.approx(15.4)
    assert box.loss.at(1.0) == pytest.approx(18.2)
    assert box.plant_at(Point()).tau == pytest.approx(36000 / 15.4)
    assert box.plant_at(Point(capacity=1.0), whole=True).tau == pytest.approx((36000 + 420000) / 15.4)


def test_cooling_is_mirrored(make):
    """Store at 4 in 35 degC, UA 60, 1 kW ingress: y_off = 35 + 1000/60, y_on = y_off - 7000/60; power does not follow the supply."""
    plant = {"balance": {"heat_capacity": "600 kJ/K", "loss": "60 W/K", "surroundings": "35 degC", "load": "1 kW", "dead_time": "60 s"}}
    box = box_of(make.loop(make.cold, plant=plant), make.panel())
    plant = box.plant_at(Point())
    y_off = 35 + 1000 / 60
    assert plant.fall == pytest.approx(y_off - 4)
    assert plant.rise == pytest.approx(4 - (y_off - 7000 / 60))
    assert box.value_at(Point(), plant.settles_on) == pytest.approx(y_off - 7000 / 60)
    assert box.value_at(Point(), plant.settles_off) == pytest.approx(y_off)
    assert box.free == ()


def test_cooling_range_runs_from_warm_to_cold(make):
    """The mildest case of a cooler is the highest setpoint in the coldest surroundings."""
    need = {**make.cold["need"], "range": "2 degC to 6 degC"}
    plant = {"balance": {"heat_capacity": "600 kJ/K", "loss": "60 W/K", "surroundings": "10 degC to 35 degC", "dead_time": "60 s"}}
    box = box_of(make.loop(make.cold, need=need, plant=plant), make.panel())
    assert box.plant_at(Point()).fall == pytest.approx(4)
    assert box.plant_at(Point(load=1.0)).fall == pytest.approx(33)


def test_balance_without_loss(make):
    """r_on = (P - Q)/C, r_off = Q/C."""
    plant = {"balance": {"heat_capacity": "100 kJ/K", "load": "2 kW", "dead_time": "10 s"}}
    box = box_of(make.loop(make.warm, plant=plant), make.panel(tolerance="0.0001 percent"))
    made = box.plant_at(Point())
    assert_plant(made, Integrating, 0.07, 0.02, 10)


def test_response(make):
    """Change 130 K at rated supply: 105.3 to 157.3 K over 10 percent."""
    form = {"change": "130 K", "time_constant": "20 min", "dead_time": "25 s", "lag": "10 s", "rest_value": "8 degC to 30 degC"}
    plant = {"response": form}
    loop = make.loop(make.warm, plant=plant, sensor={"kind": "pt100", "lag": "8 s"})
    box = box_of(loop, make.panel())
    assert_plant(box.plant_at(Point(strength=1.0)), SelfRegulating, 157.3 - 10, 10, 1200, 25, 10, 8)
    assert_plant(box.plant_at(Point(load=1.0)), SelfRegulating, 105.3 - 72, 72, 1200, 25, 10, 8)
    assert box.reaches
    assert box.reach.missing_power is None


def test_response_that_lowers(make):
    """y_on = rest value - change, without the supply's square."""
    plant = {"response": {"change": "40 K", "time_constant": "20 min", "dead_time": "25 s", "rest_value": "20 degC"}}
    made = box_of(make.loop(make.cold, plant=plant), make.panel()).plant_at(Point())
    assert_plant(made, SelfRegulating, 24, 16, 1200, 25)


def test_rates_follow_the_supply(make):
    """r_on(s) = s (r_on + r_off) - r_off at s = 1.21 and 0.81."""
    plant = {"rates": {"with_output": "2 K/min to 3 K/min", "without_output": "0.4 K/min to 0.9 K/min", "dead_time": "25 s"}}
    box = box_of(make.loop(make.warm, plant=plant), make.panel())
    fast, slow = box.plant_at(Point(strength=1.0)), box.plant_at(Point(load=1.0))
    assert_plant(fast, Integrating, (1.21 * 3.4 - 0.4) / 60, 0.4 / 60, 25)
    assert_plant(slow, Integrating, (0.81 * 2.9 - 0.9) / 60, 0.9 / 60, 25)
    cooled = box_of(make.loop(make.cold, plant=plant), make.panel()).plant_at(Point(strength=1.0))
    assert_plant(cooled, Integrating, 3 / 60, 0.4 / 60, 25)


def test_voltage_between_line_and_neutral(make):
    """A 230 V heater on 400 V star gets 400/sqrt(3) V."""
    element = {"kind": "resistive_heater", "power": "2 kW", "voltage": "230 V", "phases": "1", "count": "3"}
    box = box_of(make.loop(make.warm, element=element, plant=BALANCE), make.panel())
    assert box.strength.at(1.0) == pytest.approx(3 * 2000 * (1.1 * 400 / sqrt(3) / 230) ** 2)


@pytest.mark.parametrize(
    ("base", "changes", "needs"),
    [
        ("warm", {}, ("plant",)),
        ("cold", {"plant": BALANCE, "element": {"kind": "fan", "power": "1 kW", "voltage": "400 V", "phases": "3", "starts_per_hour": "6"}},
         ("element.capacity",)),
        ("warm", {"plant": {"step_test": {"file": "data/x.csv", "time": "t_s", "output": "out_percent", "value": "pv_degC"}}},
         ("plant.step_test.file",)),
    ],
)  # fmt: skip
def test_what_cannot_be_modelled(make, base, changes, needs):
    made = box_of(make.loop(getattr(make, base), **changes), make.panel())
    assert isinstance(made, Unmodelled)
    assert made.needs == needs


def test_balance_of_a_pressure(make):
    need = {"quantity": "pressure", "direction": "raise", "setpoint": "6 bar", "tolerance": "0.2 bar"}
    made = box_of(make.loop(make.warm, need=need, plant=BALANCE), make.panel())
    assert isinstance(made, Unmodelled)
    assert "temperature" in made.because


FITTED = {"change": Range(90, 110), "time_constant": Range(500, 600), "dead_time": Range(20, 30), "rest_value": Range(18, 22)}
STEP = {"step_test": {"file": "data/x.csv", "time": "t_s", "output": "out_percent", "value": "pv_degC"}}


def test_step_test_at_a_stated_supply(make):
    """At 380 V in the test, 440 V and 360 V in service: the change goes with the square of their ratio."""
    loop = make.loop(make.warm, plant={"step_test": {**STEP["step_test"], "supply": "380 V"}})
    box = box_of(loop, make.panel(), FITTED)
    assert box.strength.at(0.0) == pytest.approx(90 * (360 / 380) ** 2)
    assert box.strength.at(1.0) == pytest.approx(110 * (440 / 380) ** 2)
    assert box.form == "step_test"


def test_step_test_at_an_unknown_supply(make):
    """The tolerance counts both ways: tested at +10, run at -10 percent, and the reverse."""
    box = box_of(make.loop(make.warm, plant=STEP), make.panel(), FITTED)
    assert box.strength.at(0.0) == pytest.approx(90 * (0.9 / 1.1) ** 2)
    assert box.strength.at(1.0) == pytest.approx(110 * (1.1 / 0.9) ** 2)


def test_a_loop_that_rests(make):
    """40 degC asked for where the surroundings reach 45."""
    plant = {"response": {"change": "100 K", "time_constant": "10 min", "dead_time": "10 s", "rest_value": "10 degC to 45 degC"}}
    box = box_of(make.loop(make.warm, plant=plant), make.panel())
    assert box.rests
    assert box.duty_low[0] == pytest.approx(-5 / 81)  # the smallest change makes the largest share of a deficit
