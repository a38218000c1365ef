"""Reading loops together: names, units of the loop's own quantity, and what is written where."""

import pytest


def test_area_defaults_to_the_file(one):
    assert one().loop.area == "Drying hall"


def test_written_tells_own_fields_from_defaults(one):
    read = one()
    assert read.written(("need", "tolerance"))
    assert not read.written(("need", "range"))
    assert not read.written(("sensor", "class"))
    assert read.spans["need", "setpoint"].line == 6


def test_loops_are_ordered_by_area_and_tag(reading):
    from_text, _ = reading(
        "\n---\n".join(
            f"tag: {tag}\nservice: x\narea: {area}\nneed: {{quantity: temperature, direction: raise, setpoint: 6 degC, tolerance: 1 K}}\n"
            "sensor: {kind: pt100}\nelement: {kind: resistive_heater, power: 6 kW, voltage: 400 V, phases: 3}"
            for tag, area in [("b", "Z"), ("C", "a"), ("a", "Z")]
        )
    )
    assert [(r.loop.area, r.loop.tag) for r in from_text.loops] == [("a", "C"), ("Z", "a"), ("Z", "b")]


# by hand: 149 degF is 65 degC and 3 degF are 3 x 5/9 K; 6 bar are 600 kPa; 12 m3/h are 12/3600 m3/s
QUANTITIES = [
    ("temperature", "149 degF", "3 degF", 65.0, 3 * 5 / 9, "degC", "K"),
    ("temperature", "338.15 K", "1 K", 65.0, 1.0, "degC", "K"),
    ("pressure", "6 bar", "20 kPa", 6e5, 2e4, "bar", "bar"),
    ("pressure", "3 bar absolute", "0.1 bar", 3e5 - 101325, 1e4, "bar absolute", "bar"),
    ("humidity", "55 percent", "5 percent", 0.55, 0.05, "percent", "percent"),
    ("level", "1.2 m", "5 cm", 1.2, 0.05, "m", "m"),
    ("level", "50 %", "5 percent", 0.5, 0.05, "%", "%"),
    ("flow", "12 m3/h", "1 l/s", 12 / 3600, 1e-3, "m3/h", "m3/h"),
    ("flow", "360 kg/h", "0.01 kg/s", 0.1, 0.01, "kg/h", "kg/h"),
]


@pytest.mark.parametrize(("quantity", "setpoint", "tolerance", "value", "change", "unit", "step"), QUANTITIES)
def test_the_loops_own_quantity(one, quantity, setpoint, tolerance, value, change, unit, step):
    swap = {"quantity: temperature": f"quantity: {quantity}", "65 degC": setpoint, "1.5 K": tolerance}
    loop = one(swap=swap).loop
    assert float(loop.need.setpoint) == pytest.approx(value, rel=1e-12)
    assert float(loop.need.tolerance.above) == pytest.approx(change, rel=1e-12)
    assert (loop.unit.symbol, loop.difference_unit.symbol) == (unit, step)


def test_a_unit_of_the_designers_own(one):
    swap = {"quantity: temperature": "quantity: other\n  unit: pH", "65 degC": "7 pH", "1.5 K": "0.2 pH"}
    loop = one("plant: {rates: {with_output: 6 pH/min, without_output: 3 pH/min, dead_time: 5 s}}\n", swap=swap).loop
    assert (float(loop.need.setpoint), loop.unit.symbol) == (7.0, "pH")
    assert loop.plant.rates.with_output.low == pytest.approx(0.1)


def test_a_mixture_of_quantities_is_refused(reading):
    _, problems = reading(
        "tag: FIC-1\nservice: x\nneed: {quantity: flow, direction: raise, setpoint: 12 m3/h, tolerance: 5 kg/h}\n"
        "sensor: {kind: transmitter}\nelement: {kind: modulating_valve, signal: 4-20 mA, stroke_time: 30 s}\n"
    )
    assert [p.code for p in problems] == ["Q107"]
    assert problems[0].span.line == 3
    assert "flow" in problems[0].text


def test_setpoints_are_the_range_or_the_setpoint_alone(one):
    assert (one().loop.need.setpoints.low, one().loop.need.setpoints.high) == (65.0, 65.0)
    wide = one(swap={"tolerance: 1.5 K": "tolerance: 1.5 K\n  range: 40 degC to 80 degC"}).loop
    assert (wide.need.setpoints.low, wide.need.setpoints.high) == (40.0, 80.0)


def test_tolerance_and_sudden_load_in_both_forms(one):
    sided = one(swap={"tolerance: 1.5 K": "tolerance: {above: 2 K, below: 0.5 K}"}).loop.need.tolerance
    assert (float(sided.above), float(sided.below)) == (2.0, 0.5)
    power = one(swap={"tolerance: 1.5 K": "tolerance: 1.5 K\n  sudden_load: 0.3 kW"}).loop.need.sudden_load
    share = one(swap={"tolerance: 1.5 K": "tolerance: 1.5 K\n  sudden_load: 10 percent"}).loop.need.sudden_load
    assert (float(power.power), power.share) == (300.0, None)
    assert (share.power, float(share.share)) == (None, 0.1)


def test_a_problem_of_a_section_does_not_hide_another(reading):
    _, problems = reading(
        "tag: TIC-1\nservice: x\nneed: {quantity: temperature, direction: up, setpoint: 65 degC, tolerance: 1,5 K}\n"
        "sensor: {kind: pt100, wires: 7}\nelement: {kind: resistive_heater, power: 6 KW, voltage: 400 V, phases: 3}\n"
        "limits: {consequence: fir}\n"
    )
    assert sorted(p.code for p in problems) == ["F107", "F107", "F130", "Q104", "Q105", "Y114"]


def test_a_misspelt_key_is_told_once(reading):
    _, problems = reading(
        "tag: TIC-1\nservice: x\nneed: {quantity: temperature, direction: raise, setpont: 65 degC, tolerance: 1.5 K}\n"
        "sensor: {kind: pt100}\nelement: {kind: resistive_heater, power: 6 kW, voltage: 400 V, phases: 3}\n"
    )
    assert [(p.code, p.hint) for p in problems] == [("F101", "did you mean setpoint?")]
