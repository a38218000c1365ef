"""Figures that anybody in the trade would check by heart: common practice, no source."""

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from specgen.process.cycle_ripple import lag_ripple
from specgen.process.signal import SIGNALS

OVEN = """tag: TIC-1
service: Oven
need: {quantity: temperature, direction: raise, setpoint: 80 degC, tolerance: 2 K}
plant: {response: {change: 120 K, time_constant: 60 min, dead_time: 60 s, rest_value: 50 degC}}
sensor: {kind: pt100, class: A, wires: 4, step: 0.1 K}
element: {kind: resistive_heater, power: 6 kW, voltage: 400 V, phases: 3, needs: []}
limits: {danger_high: 200 degC, consequence: product, on_sensor_fault: off, after_power_return: resume}
choose: {mode: time_proportioned, cycle_time: %s, because: A check value.}
"""
STIFF = "\n  tolerance: 0.001 percent"


def said(row, code):
    return next(rule["text"] for rule in row["rules"] if rule["rule"] == code).replace("\u202f", " ")


@pytest.mark.parametrize(("cycle", "on"), [(8, 2), (64, 16)])
def test_a_quarter_of_the_cycle_is_a_quarter_of_the_output(make, cycle, on):
    """Common practice, no source: 2 s of 8 s is 25 percent, 16 s of 64 s as well. Here 30 K of 120 K are asked for."""
    ripple = lag_ripple(120, 3600, cycle, 0.25)
    assert (ripple.t_on, ripple.t_off) == (pytest.approx(on), pytest.approx(cycle - on))
    row = make.record(OVEN % f"{cycle} s", make.panel.replace("frequency: 50 Hz", f"frequency: 50 Hz,{STIFF}"))
    assert row["predicted"]["duty_low"] == pytest.approx(0.25, rel=1e-3)
    assert row["predicted"]["duty_high"] == pytest.approx(0.25, rel=1e-3)
    assert row["settings"]["cycle_time"] == cycle


def test_the_ends_of_a_200_s_cycle(make):
    """Common practice, no source: at 5 percent of 200 s the output is on for 10 s, at 95 percent it is off for 10 s."""
    row = make.record(OVEN % "200 s")
    assert (row["predicted"]["shortest_on"], row["predicted"]["shortest_off"]) == (pytest.approx(10), pytest.approx(10))


@pytest.mark.parametrize("choose", ["{cycle_time: 200 s}", "{mode: time_proportioned, cycle_time: 200 s, because: Asked for.}"])
def test_a_compressor_says_what_a_200_s_cycle_would_do_to_it(make, choose):
    """The cycle that would keep 180 s of run at 5 percent is 3600 s, an hour."""
    row = make.record(make.loop_text("compressor", "relaxed", "4 K", more=f"choose: {choose}\n"))
    assert said(row, "M1") == (
        "10 s on at 5 percent of a 200 s cycle is shorter than the least run of 180 s; the cycle would have to be 60 min."
    )
    assert row["verdict"] == ("held" if "mode" in choose else "meets")


def test_without_a_reason_it_is_told_both(make):
    text = make.loop_text("compressor", "relaxed", "4 K", more="choose: {mode: time_proportioned, cycle_time: 200 s}\n")
    none, problems = make.decided(text)
    assert none is None
    assert [problem.code for problem in problems] == ["L302"]
    assert "And no reason would do for M1: 10\u202fs on at 5" in problems[0].text


def test_the_least_run_is_the_compressors_own(make):
    text = make.loop_text("compressor", "relaxed", "4 K", more="choose: {cycle_time: 200 s}\n").replace("min_run: 180 s", "min_run: 5 min")
    assert "shorter than the least run of 300 s; the cycle would have to be 100 min." in said(make.record(text), "M1")


def test_half_of_a_dead_zero_signal():
    """Common practice, no source: 0-20 mA at 50 percent is 10 mA, 4-20 mA is 12 mA."""
    assert SIGNALS["0-20 mA"].at(0.5) == pytest.approx(10e-3)
    assert SIGNALS["4-20 mA"].at(0.5) == pytest.approx(12e-3)


@settings(max_examples=15, deadline=None)
@given(step=st.sampled_from(["0.05 K", "0.1 K", "0.2 K", "0.5 K", "1 K"]), noise=st.sampled_from(["0 K", "0.05 K", "0.3 K"]),
       tolerance=st.sampled_from(["2 K", "4 K", "8 K"]), name=st.sampled_from(["heater", "compressor", "pump", "solenoid"]))  # fmt: skip
def test_no_differential_below_one_step_of_the_measurement(make, step, noise, tolerance, name):
    """Common practice, no source; nor below twice its noise, where noise is declared."""
    text = make.loop_text(name, "relaxed", tolerance).replace("step: 0.1 K", f"step: {step}").replace("noise: 0.1 K", f"noise: {noise}")
    row = make.record(text.replace("noise: 0 K, ", ""))
    if row["mode"] == "on_off":
        assert row["settings"]["differential"] >= float(step.split()[0]) * (1 - 1e-9)
        assert row["settings"]["differential"] >= 2 * float(noise.split()[0]) * (1 - 1e-9)
