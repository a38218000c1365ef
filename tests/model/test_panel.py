"""panel.yml and devices.yml: what is required, what the defaults are, what is refused."""

import datetime

import pytest

from specgen.model.devices import Devices
from specgen.model.panel import Panel
from specgen.model.reader import read_model
from specgen.source import read_text

PANEL = """panel: {reference: PNL-3, title: Herb drying, revision: A, status: for review, date: 2026-11-20}
supply: {voltage: 400 V, phases: 3, frequency: 50 Hz}
enclosure: {height: 1800 mm, width: 800 mm, depth: 400 mm, ambient: 5 degC to 35 degC}
"""


def panel(swap=("", ""), more=""):
    text = PANEL.replace(*swap) + more if swap[0] else PANEL + more
    documents, problems = read_text(text, "panel.yml")
    assert not problems
    return read_model(Panel, documents[0].data)


def test_defaults_are_those_of_the_contract():
    made, problems = panel()
    assert not problems
    assert made.panel.date == datetime.date(2026, 11, 20)
    head, supply, control, enclosure = made.panel, made.supply, made.control_supply, made.enclosure
    assert (float(head.coincidence), float(supply.tolerance), supply.neutral, supply.earthing) == (1.0, 0.1, True, "TN_S")
    assert (float(control.voltage), control.kind, float(control.capacity)) == (24.0, "dc", 10.0)
    assert (enclosure.mounting, float(enclosure.interior_limit), float(enclosure.other_heat)) == ("free_standing", 45.0, 60.0)
    assert made.duty.seconds_per_year == 16 * 3600 * 250
    assert made.house.contact_life_years == 10
    assert [float(s) for s in made.house.cycle_time_series] == [1, 2, 3, 5, 8, 10, 15, 20, 30, 45, 60, 90, 120, 180, 240, 300]
    assert (float(made.house.swing_share), float(made.house.sensor_share), made.house.after_power_return) == (0.25, 0.33, None)
    assert (float(made.house.setting_step.temperature), float(made.house.setting_step.pressure)) == (0.1, 1000.0)


def test_supply_range_is_the_voltage_over_rated():
    made, _ = panel(("frequency: 50 Hz", "frequency: 50 Hz, tolerance: 6 percent"))
    assert (made.supply_range.low, made.supply_range.high) == pytest.approx((0.94, 1.06))


def test_lengths_and_temperatures_are_in_base_units():
    made, _ = panel()
    assert (float(made.enclosure.height), made.enclosure.ambient.low, made.enclosure.ambient.high) == (1.8, 5.0, 35.0)


BAD = [
    (("phases: 3", "phases: 2"), "F151", ("supply", "phases")),
    (("revision: A", "revision: A/B"), "F113", ("panel", "revision")),
    (("date: 2026-11-20", "date: tomorrow"), "F112", ("panel", "date")),
    (("status: for review", "status: done"), "F107", ("panel", "status")),
    (("voltage: 400 V", "voltage: 400"), "Q104", ("supply", "voltage")),
    (("frequency: 50 Hz", "frequency: 50 Hz, tolerance: 60 percent"), "F170", ("supply", "tolerance")),
    (("frequency: 50 Hz", "frequency: 50 Hz, systm: star"), "F101", ("supply", "systm")),
    (("height: 1800 mm, ", ""), "F102", ("enclosure", "height")),
]


@pytest.mark.parametrize(("swap", "code", "path"), BAD)
def test_refused(swap, code, path):
    made, problems = panel(swap)
    assert made is None
    assert [(p.code, p.path) for p in problems] == [(code, path)]


def test_every_problem_of_the_panel_is_told_at_once():
    _, problems = panel(("phases: 3", "phases: 2"), "duty: {hours_per_day: 25 h, days_per_year: 250}\nhouse: {contact_life: ten years}\n")
    assert sorted(p.code for p in problems) == ["F151", "F160", "Q102"]


CONTACTOR = """contactors:
  - {name: class 25, resistive_current: 25 A, motor_current: 12 A, mechanical_life: 10e6, operations_per_hour: 600, pull_in: 20 ms,
     drop_out: 15 ms, coil: {voltage: 24 V, power: 3 W}, loss_per_pole: 1.6 W,
     electrical_life: [{current: 25 A, operations: 1.0e6}, {current: 12 A, operations: 2.5e6}]}
"""


def devices(text):
    return read_model(Devices, read_text(text, "devices.yml")[0][0].data)


def test_a_contactor_with_its_defaults():
    made, problems = devices(CONTACTOR)
    assert not problems
    contactor = made.contactors[0]
    assert (contactor.poles, float(contactor.reference_temperature), contactor.coil.kind) == (3, 40.0, "dc")
    assert [(float(p.current), float(p.operations)) for p in contactor.electrical_life] == [(25.0, 1e6), (12.0, 2.5e6)]
    assert float(contactor.pull_in) == 0.02


def test_life_falls_with_current():
    _, problems = devices(CONTACTOR.replace("2.5e6", "0.5e6"))
    assert [(p.code, p.path) for p in problems] == [("F180", ("contactors", 0, "electrical_life"))]


def test_life_has_one_point_a_current():
    _, problems = devices(CONTACTOR.replace("current: 12 A, operations", "current: 25 A, operations"))
    assert [p.code for p in problems] == ["F180"]


def test_life_has_a_point_at_least():
    text = CONTACTOR.replace("[{current: 25 A, operations: 1.0e6}, {current: 12 A, operations: 2.5e6}]", "[]")
    assert [p.code for p in devices(text)[1]] == ["F111"]
