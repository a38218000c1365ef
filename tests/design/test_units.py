"""The same loop in other units: the same decision, every number converted."""

import pytest

RECEIVER = """tag: PIC-1
service: Receiver
need: {quantity: pressure, direction: %(direction)s, setpoint: %(setpoint)s, tolerance: %(tolerance)s, stability: relaxed}
plant: {rates: {with_output: %(on)s, without_output: %(off)s, dead_time: 2 s}}
sensor: {kind: transmitter, range: %(range)s, accuracy: 0.5 percent, signal: 4-20 mA, step: %(step)s, noise: %(noise)s}
element: {kind: pump, power: 1.5 kW, voltage: 400 V, phases: 3, starts_per_hour: 12}
limits: {danger_high: %(danger)s, danger_low: %(low)s, consequence: equipment, on_sensor_fault: off, after_power_return: resume}
"""
BAR = {"setpoint": "6 bar", "tolerance": "1 bar", "on": "0.1 bar/min to 0.3 bar/min", "off": "0.1 bar/min to 0.2 bar/min",
       "range": "0 bar to 12 bar", "step": "0.01 bar", "noise": "0.02 bar", "danger": "10 bar", "low": "1 bar"}  # fmt: skip
KILOPASCAL = {"setpoint": "600 kPa", "tolerance": "100 kPa", "on": "10 kPa/min to 30 kPa/min", "off": "10 kPa/min to 20 kPa/min",
              "range": "0 kPa to 1200 kPa", "step": "1 kPa", "noise": "2 kPa", "danger": "1000 kPa", "low": "100 kPa"}  # fmt: skip
IN_UNIT = ("differential", "above", "below", "swing", "switch_on", "switch_off", "measuring_error", "proportional_band", "settles_at",
           "set", "acts_at", "overshoot", "load_deviation")  # fmt: skip
TANK = """tag: TIC-1
service: Tank
need: {quantity: temperature, direction: raise, setpoint: %(setpoint)s, tolerance: %(tolerance)s, stability: %(stability)s,
       sudden_load: 10 percent}
plant: {response: {change: %(change)s, time_constant: 60 min, dead_time: 60 s, rest_value: %(rest)s}}
sensor: {kind: pt100, class: A, wires: 4, step: %(step)s, noise: %(step)s, lag: 5 s}
element: {kind: resistive_heater, power: 9 kW, voltage: 400 V, phases: 3, needs: [level]}
limits: {danger_high: %(danger)s, consequence: product, on_sensor_fault: off, after_power_return: resume}
"""
CELSIUS = {"setpoint": "60 degC", "tolerance": "5 K", "change": "90 K", "rest": "20 degC", "step": "0.5 K", "danger": "90 degC"}
FAHRENHEIT = {"setpoint": "140 degF", "tolerance": "9 degF", "change": "162 degF", "rest": "68 degF", "step": "0.9 degF",
              "danger": "194 degF"}  # fmt: skip


def compare(one, other, change, value=lambda shown: shown):
    """Compare two sections of records: what is in the loop's unit by its scale, the rest as it is."""
    assert set(one) == set(other)
    for name, first in one.items():
        if isinstance(first, str):
            assert first == other[name], name
        elif name in ("switch_on", "switch_off", "settles_at", "set", "acts_at"):
            assert other[name] == pytest.approx(value(first), rel=1e-7), name
        else:
            assert other[name] == pytest.approx(first * (change if name in IN_UNIT else 1.0), rel=1e-7), name


@pytest.mark.parametrize("direction", ["raise", "lower"])
def test_bar_and_kilopascal(make, direction):
    first, second = (make.record(RECEIVER % {**units, "direction": direction}) for units in (BAR, KILOPASCAL))
    assert (first["unit"], second["unit"]) == ("bar", "kPa")
    assert (first["mode"], first["verdict"]) == (second["mode"], second["verdict"])
    for section in ("settings", "predicted"):
        compare(first[section], second[section], 100, lambda bar: 100 * bar)
    compare(first["limiter"], second["limiter"], 100, lambda bar: 100 * bar)
    for state in ("stuck_on", "stuck_off"):
        compare(first["faults"][state], second["faults"][state], 100, lambda bar: 100 * bar)
    assert [point["value"] for point in first["inject"]] == [pytest.approx(point["value"]) for point in second["inject"]]
    assert {figure["unit"] for figure in first["basis"]} >= {"bar", "bar/s", "s", "1"}
    assert not {figure["unit"] for figure in first["basis"]} & {"value", "change", "time", "fraction"}


def test_a_receiver_by_hand(make):
    """Rates: ``P = (1/r_on + 1/r_off)(d + theta (r_on + r_off))``, excursions ``d/2 + r theta``."""
    row = make.record(RECEIVER % {**BAR, "direction": "raise"})
    d = row["settings"]["differential"]
    on, off = 0.3 / 60, 0.2 / 60
    assert row["predicted"]["above"] == pytest.approx(d / 2 + 2 * on)
    assert row["predicted"]["below"] == pytest.approx(d / 2 + 2 * off)
    assert row["predicted"]["period"] == pytest.approx((1 / on + 1 / off) * (d + 2 * (on + off)))
    assert row["faults"]["stuck_on"] == {"time_to_danger": pytest.approx((10 - 6 - row["predicted"]["above"]) / on)}
    assert row["faults"]["stuck_off"] == {"time_to_danger": pytest.approx((6 - row["predicted"]["below"] - 1) / off)}


def test_lower_is_the_mirror_of_raise(make):
    """A loop that lowers: what was above is below, switch points exchange their sides, stuck on goes to the low danger."""
    up, down = (make.record(RECEIVER % {**BAR, "direction": direction}) for direction in ("raise", "lower"))
    assert (up["action"], down["action"]) == ("reverse", "direct")
    assert (up["predicted"]["above"], up["predicted"]["below"]) == (down["predicted"]["below"], down["predicted"]["above"])
    assert up["predicted"]["switch_on"] < 6 < up["predicted"]["switch_off"]
    assert down["predicted"]["switch_on"] > 6 > down["predicted"]["switch_off"]
    for name in ("period", "swing", "duty_low", "duty_high", "shortest_on"):
        assert up["predicted"][name] == pytest.approx(down["predicted"][name]), name
    below = down["predicted"]["below"]
    assert down["faults"]["stuck_on"]["time_to_danger"] == pytest.approx((6 - below - 1) / (0.3 / 60))


@pytest.mark.parametrize("stability", ["steady", "relaxed"])
def test_celsius_and_fahrenheit(make, stability):
    first, second = (make.record(TANK % {**units, "stability": stability}) for units in (CELSIUS, FAHRENHEIT))
    assert (first["unit"], second["unit"]) == ("degC", "degC"), "the record of a temperature stays in degC"
    assert (first["mode"], first["output"]["device"], first["verdict"]) == (second["mode"], second["output"]["device"], second["verdict"])
    for section in ("settings", "predicted"):
        compare(first[section], second[section], 1)
    compare(first["faults"]["stuck_on"], second["faults"]["stuck_on"], 1)
