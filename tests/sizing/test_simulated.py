"""What a sudden load and a cold start do, with the share of full output that a heat flow is at each end of the supply."""

from math import inf, log

import pytest

from specgen.process.box_of import box_of
from specgen.process.load_step import load_step
from specgen.process.loop_dynamics import Dynamics
from specgen.sizing.candidate import Unsized
from specgen.sizing.simulated import estimated_deviation, load_share, simulated_deviation, tuning_of
from specgen.sizing.starting_values import hardest_case, start_of

HEATER = {"kind": "resistive_heater", "power": "6 kW", "voltage": "400 V", "phases": "3"}
VALVE = {"kind": "modulating_valve", "signal": "4-20 mA", "stroke_time": "10 s"}
RESPONSE = {"response": {"change": "100 K", "time_constant": "30 min", "dead_time": "60 s", "rest_value": "25 degC"}}
BALANCE = {"balance": {"heat_capacity": "100 kJ/K", "loss": "60 W/K", "surroundings": "20 degC", "load": "0 W", "dead_time": "30 s"}}


def boxed(loop, panel, plant, element, load):
    declared = loop(element=element, plant=plant, need={"sudden_load": load} if load else {})
    return declared, box_of(declared, panel())


def shares(loop, panel, plant, element, load):
    return [case.share for case in load_share(*boxed(loop, panel, plant, element, load))]


def test_none_is_declared(loop, panel):
    assert load_share(*boxed(loop, panel, RESPONSE, HEATER, None)) is None


@pytest.mark.parametrize("plant", [RESPONSE, BALANCE])
def test_a_heat_flow_at_both_ends_of_the_supply(loop, panel, plant):
    """0.6 kW of 6 kW: 10 percent at the rated supply, 12.3 and 8.3 percent at -10 and +10 percent of it."""
    found = load_share(*boxed(loop, panel, plant, HEATER, "0.6 kW"))
    assert [case.share for case in found] == [pytest.approx(0.1 / 0.81), pytest.approx(0.1 / 1.21)]
    assert [case.steeper for case in found] == [pytest.approx(0.81 / 1.21), pytest.approx(1.0)]


def test_units_that_are_switched_together(loop, panel):
    three = {**HEATER, "count": "3"}
    assert shares(loop, panel, RESPONSE, three, "0.6 kW") == [pytest.approx(0.1 / 3 / 0.81), pytest.approx(0.1 / 3 / 1.21)]


def test_a_share_is_a_share(loop, panel):
    assert shares(loop, panel, RESPONSE, VALVE, "10 percent") == [pytest.approx(0.1)]


def test_what_moves_the_heat_of_a_valve(loop, panel):
    assert shares(loop, panel, RESPONSE, {**VALVE, "capacity": "20 kW to 30 kW"}, "1 kW") == [pytest.approx(0.05)]
    found = load_share(*boxed(loop, panel, RESPONSE, VALVE, "1 kW"))
    assert isinstance(found, Unsized)
    assert found.needs == ("element.capacity",)


def test_the_power_of_a_motor_is_not_the_heat_it_moves(loop, panel):
    drive = {"kind": "variable_speed_pump", "power": "3 kW", "signal": "4-20 mA", "lowest_speed": "20 percent"}
    assert isinstance(load_share(*boxed(loop, panel, RESPONSE, drive, "1 kW")), Unsized)


def test_deviation_of_the_worse_end(loop, panel):
    """Continuous, so that no ripple is in it: each end of the supply by itself."""
    declared, box = boxed(loop, panel, RESPONSE, HEATER, "0.6 kW")
    start = start_of(declared, hardest_case(box))
    load = load_share(declared, box)
    own = []
    for square in (0.81, 1.21):
        plant = Dynamics(100 * square / 1800, 1800, 60)
        duty = 40 / (100 * square)
        own += [load_step(plant, start.settings, duty, sign * 0.1 / square).deviation for sign in (1, -1)]
    assert simulated_deviation(start, load) == pytest.approx(max(own), rel=1e-9)
    assert simulated_deviation(start, load) <= estimated_deviation(start, load)


def test_the_ripple_is_counted_apart(loop, panel):
    declared, box = boxed(loop, panel, RESPONSE, VALVE, "10 percent")
    start = start_of(declared, hardest_case(box), cycle_time=120.0)
    steps = [load_step(start.hardest.dynamics, start.settings, 0.4, change, 120.0) for change in (0.1, -0.1)]
    assert min(step.ripple for step in steps) > 0.5
    assert simulated_deviation(start, load_share(declared, box)) == pytest.approx(max(step.deviation - step.ripple for step in steps))


def test_a_load_that_nothing_can_take_up_is_never_nothing(loop, panel):
    """Nine tenths of full output, at a duty of four tenths: beyond either end of the output."""
    declared, box = boxed(loop, panel, RESPONSE, VALVE, "90 percent")
    found = simulated_deviation(start_of(declared, hardest_case(box)), load_share(declared, box))
    assert found >= 100 * 0.3 * 0.999, "full output settles 30 K short"
    rates = {"rates": {"with_output": "6 K/min", "without_output": "6 K/min", "dead_time": "20 s"}}
    declared, box = boxed(loop, panel, rates, VALVE, "90 percent")
    assert simulated_deviation(start_of(declared, hardest_case(box)), load_share(declared, box)) == inf


def test_a_cold_start_warms_every_body(loop, panel):
    """Goods that follow slowly hold the true value back: 36 + 420 kJ/K at 40 W/K, 3600 W of rest."""
    bodies = [{"what": "air", "mass": "60 kg", "specific_heat": "0.6 kJ/(kg K)"},
              {"what": "goods", "mass": "140 kg", "specific_heat": "3 kJ/(kg K)", "follows": "slow"}]  # fmt: skip
    plant = {"balance": {"bodies": bodies, "loss": "40 W/K", "surroundings": "20 degC", "dead_time": "25 s"}}
    declared = loop(element={**VALVE, "capacity": "3.6 kW"}, plant=plant)
    box = box_of(declared, panel())
    start = start_of(declared, hardest_case(box))
    tuning = tuning_of(start, box, declared, None)
    tau = (36000 + 420000) / 40
    assert tuning.time_to_band == pytest.approx(25 + tau * log(90 / (90 - (45 - 1.5))), rel=1e-6)


def test_a_plant_that_cannot_say_where_it_rests(loop, panel):
    rates = {"rates": {"with_output": "6 K/min", "without_output": "6 K/min", "dead_time": "20 s"}}
    declared = loop(element=VALVE, plant=rates)
    box = box_of(declared, panel())
    tuning = tuning_of(start_of(declared, hardest_case(box)), box, declared, None)
    assert (tuning.overshoot, tuning.time_to_band) == (None, None)


@pytest.mark.parametrize("change", ["100 K", "60 K to 100 K", "25 K to 100 K"])
def test_the_first_estimate_bounds_a_weak_element_too(loop, panel, change):
    """A quarter of the strength has a quarter of the gain against the load; the estimate that skips a simulation covers it."""
    plant = {"response": {**RESPONSE["response"], "change": change, "rest_value": "55 degC"}}
    declared, box = boxed(loop, panel, plant, VALVE, "10 percent")
    start = start_of(declared, hardest_case(box))
    load = load_share(declared, box)
    assert 0 < simulated_deviation(start, load) <= estimated_deviation(start, load)
