"""Nothing is taken for granted in silence: a default that bears on a result is listed until it is written."""

import pytest

WRITTEN = [
    ("supply.tolerance", "frequency: 50 Hz,", "frequency: 50 Hz, tolerance: 10 percent,", "10 percent"),
    ("enclosure.interior_limit", "depth: 400 mm,", "depth: 400 mm, interior_limit: 45 degC,", "45 degC"),
    ("control_supply.voltage", "controllers:", "control_supply: {voltage: 24 V}\ncontrollers:", "24 V"),
    ("control_supply.kind", "controllers:", "control_supply: {kind: dc}\ncontrollers:", "dc"),
    ("duty", "controllers:", "duty: {hours_per_day: 16 h, days_per_year: 250}\ncontrollers:", "16 h a day, 250 days a year"),
    ("house.contact_life", "controllers:", "house: {contact_life: 10 year}\ncontrollers:", "10 year"),
    ("house.sensor_share", "controllers:", "house: {sensor_share: 33 percent}\ncontrollers:", "33 percent"),
    ("house.setting_step.temperature", "controllers:", "house: {setting_step: {temperature: 0.1 K}}\ncontrollers:", "0.1 K"),
]
IN_CYCLES = [
    ("house.swing_share", "controllers:", "house: {swing_share: 25 percent}\ncontrollers:", "25 percent"),
    ("house.cycle_time_series", "controllers:", "house: {cycle_time_series: [1, 2, 5, 10, 60]}\ncontrollers:", None),
    ("controllers.loop controller.scan", "name: loop controller\n", "name: loop controller\n    scan: 0.25 s\n", "0.25 s"),
]


def assumed(row):
    return {assumption["field"]: assumption["value"] for assumption in row["assumptions"]}


@pytest.mark.parametrize(("field", "before", "after", "value"), WRITTEN)
def test_a_default_of_the_panel_is_listed_until_it_is_written(make, field, before, after, value):
    assert assumed(make.record(make.relaxed))[field] == value
    row = make.record(make.relaxed, make.panel.replace(before, after))
    assert field not in assumed(row)


@pytest.mark.parametrize(("field", "before", "after", "value"), IN_CYCLES)
def test_a_default_of_time_proportioned_control(make, field, before, after, value):
    found = assumed(make.record(make.steady))[field]
    assert value is None or found == value
    assert field not in assumed(make.record(make.steady, make.panel.replace(before, after)))
    assert field not in assumed(make.record(make.compressor)), "it does not bear on a loop that is switched"


@pytest.mark.parametrize(
    ("field", "before", "after"),
    [("need.range", "setpoint: 60 degC", "setpoint: 60 degC, range: 60 degC to 60 degC"),
     ("need.stability", "stability: steady", "stability: steady"), ("sensor.lag", "noise: 0.1 K", "noise: 0.1 K, lag: 5 s"),
     ("sensor.class", "class: A, ", "class: B, "), ("sensor.wires", "wires: 4, ", "wires: 3, "),
     ("need.overshoot", "tolerance: 2 K", "tolerance: 2 K, overshoot: 2 K"),
     ("limits.after_power_return", "after_power_return: resume", "after_power_return: resume")],
)  # fmt: skip
def test_a_loops_own_silence(make, field, before, after):
    written = make.steady.replace(before, after)
    assert field not in assumed(make.record(written))
    cut = {"need.stability": ", stability: steady", "sensor.class": "class: A, ", "sensor.wires": "wires: 4, ",
           "limits.after_power_return": ", after_power_return: resume"}.get(field, "")  # fmt: skip
    assert field in assumed(make.record(make.steady.replace(cut, "") if cut else make.steady))


def test_inherited_limits_are_listed_until_they_are_written_out(make):
    second = "tag: TIC-9\nservice: Second tank\nsame_as: TIC-1\n"
    design = make.whole({"loops/a.yml": make.relaxed + "---\n" + second})
    rows = {row["tag"]: assumed(row) for row in make.record_of(design)["loops"]}
    assert rows["TIC-9"]["limits.danger_high"] == "90 degC"
    assert "limits.danger_high" not in rows["TIC-1"]
    own = make.whole({"loops/a.yml": make.relaxed + "---\n" + second + "limits: {danger_high: 85 degC}\n"})
    assert "limits.danger_high" not in {row["tag"]: assumed(row) for row in make.record_of(own)["loops"]}["TIC-9"]


def test_after_the_return_of_supply_the_house_may_have_said_it(make):
    silent = make.steady.replace(", after_power_return: resume", "")
    house = make.panel.replace("controllers:", "house: {after_power_return: off}\ncontrollers:")
    assert assumed(make.record(silent))["limits.after_power_return"] == "resume"
    assert "limits.after_power_return" not in assumed(make.record(silent, house))
    injury = make.record(silent.replace("consequence: product", "consequence: injury"))
    assert "limits.after_power_return" not in assumed(injury), "what must be declared is missing, not assumed"
    assert "limits.after_power_return" in {missing["field"] for missing in injury["missing"]}
