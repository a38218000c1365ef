"""What the device of a candidate comes to in a decided loop: a longer life where one is reachable, and pairs that do not suit."""

import pytest

from specgen.sizing.candidate import CANDIDATES

BURNER = """tag: PIC-1
service: Steam header
need: {quantity: pressure, direction: raise, setpoint: 6 bar, tolerance: 0.7 bar, stability: relaxed}
plant: {rates: {with_output: 0.1 bar/min to 0.2 bar/min, without_output: 0.1 bar/min to 0.2 bar/min, dead_time: 5 s}}
sensor: {kind: transmitter, range: 0 bar to 10 bar, accuracy: 0.5 percent, signal: 4-20 mA, step: 0.01 bar}
element: {kind: gas_burner, stages: on_off, starts_per_hour: 6, min_run: 2 min, min_rest: 2 min, control_voltage: 230 V,
  control_current: 2 A}
limits: {danger_high: 10 bar, consequence: product, on_sensor_fault: off, after_power_return: resume}
"""


def candidate_of(decided, mode, device):
    cases = (decided.decision.chosen, *(rejected.examined for rejected in decided.decision.rejected))
    return next(e for e in cases if (e.case.candidate.mode, e.case.candidate.device) == (mode, device))


def test_a_relay_that_lasts_takes_the_place_of_one_that_does_not(make):
    """2 A of a.c. control current wear as 10 A: a 10 A relay lasts 100 000, a 16 A relay 16 A/10 A higher on its line."""
    made, problems = make.decided(BURNER)
    assert not problems
    relay = candidate_of(made, "on_off", "relay").case
    assert relay.device.name.startswith("plug-in relay 16 A")
    assert relay.device.because.startswith("plug-in relay 16 A, 1-pole, d.c. coil is taken: its contacts last ")
    # 3.0e5 at 8 A and 1.0e5 at 16 A: log-log at 10 A, by hand 3e5 (10/8)^-1.585
    wears = next(part.life for part in relay.device.chain if part.role == "load")
    assert wears == pytest.approx(3.0e5 * (10 / 8) ** -1.5849625, rel=1e-6)
    assert relay.settings.contact_life >= 10 * (1 - 1e-9)
    finding = {f.rule: f for f in candidate_of(made, "on_off", "relay").findings}
    assert finding["D5"].outcome == "holds"
    assert relay.device.because in make_text(made, finding["O1"])


def make_text(decided, finding):
    return decided.phrasing.fill(finding.text, finding.words)


def test_every_pair_stands_among_the_alternatives_but_a_relay_that_nobody_wires(make):
    made, _ = make.decided(make.steady)
    seen = {(made.decision.chosen.case.candidate.mode, made.decision.chosen.case.candidate.device)}
    seen |= {(r.examined.case.candidate.mode, r.examined.case.candidate.device) for r in made.decision.rejected}
    assert seen == {(c.mode, c.device) for c in CANDIDATES if c.device != "relay"}
    ended = {r.examined.case.candidate.device: r.ruled_out_by for r in made.decision.rejected}
    assert "M3" in ended["signal"]
    assert "M4" in ended["relay_pair"]


@pytest.mark.parametrize(("mode", "output", "rule"), [("analogue", "signal", "M3"), ("three_point", "relay_pair", "M4")])
def test_choosing_a_pair_that_does_not_suit_holds_the_loop(make, mode, output, rule):
    made, problems = make.decided(make.steady + f"choose: {{mode: {mode}, output: {output}, because: Test.}}\n")
    assert not problems
    assert made.verdict == "held"
    assert rule in {f.rule for f in made.findings if f.outcome == "broken"}
    assert not {f.rule for f in made.findings if f.rule[0] == "O" and f.outcome in ("broken", "unanswered")}


def test_a_valve_is_not_switched(make):
    valve = make.steady.replace(
        "kind: resistive_heater, power: 9 kW, voltage: 400 V, phases: 3, needs: [level]",
        "kind: modulating_valve, signal: 4-20 mA, stroke_time: 20 s, on_signal_loss: close, on_supply_loss: close, medium: water",
    )
    made, problems = make.decided(valve)
    assert not problems
    assert "M2" in {f.rule for f in candidate_of(made, "on_off", "contactor").findings if f.outcome == "broken"}
    # its burden is not declared: what the output drives is open
    assert made.verdict == "open"
    assert ("element.burden", ("O6",)) in {(missing.field, missing.settles) for missing in made.missing}


def test_heat_and_heat_sink_are_in_the_record(make):
    record = make.record(make.steady + "choose: {mode: time_proportioned, output: ssr, because: Test.}\n")
    current = 9000 / (3**0.5 * 400) * 1.1
    loss = 3 * (2 * 2**0.5 / 3.141592653589793 * current + 0.014 * current**2)
    assert record["output"]["loss"] == pytest.approx(loss)
    assert record["output"]["heat_sink"] == pytest.approx(80 / loss - 0.28 - 0.1)  # the 25 A row of three poles
    symbols = {line["symbol"]: line for line in record["basis"]}
    assert symbols["P_v"]["result"] == record["output"]["loss"]
    assert symbols["R_s"]["unit"] == "K/W"


def chosen(mode, output):
    return f"choose: {{mode: {mode}, output: {output}, because: Test.}}\n"


VALVE = (
    "kind: modulating_valve, signal: 4-20 mA, stroke_time: 20 s, on_signal_loss: close, on_supply_loss: close, medium: water, "
    "burden: 600 ohm"
)
HEATER = "kind: resistive_heater, power: 9 kW, voltage: 400 V, phases: 3, needs: [level]"
LOGIC = ", {kind: logic, voltage: 12 V, drive: 20 mA, count: 8}"


@pytest.mark.parametrize(
    ("loop", "panel", "broken"),
    [
        pytest.param(("9 kW", "90 kW", "on_off", "contactor"), (), {"O1"}, id="143 A, the largest class carries 110 A"),
        # 71 A through 75 A: 262 W and 80 K, less 0.217 K/W inside, leave 0.09 K/W; its 80 A fuse lets 5000 A2 s through, it stands 4000
        pytest.param(("9 kW", "45 kW", "time_proportioned", "ssr"), (), {"O2", "O5"}, id="too hot on any heat sink"),
        pytest.param(("9 kW", "9 kW", "time_proportioned", "ssr"), ("phases: 3, frequency", "phases: 3, isolator: no, frequency"), {"O3"},
                     id="nothing isolates"),
        pytest.param((HEATER, VALVE, "analogue", "signal"), (), {"O6"}, id="600 ohm on 500"),
        pytest.param(("9 kW", "9 kW", "analogue", "power_controller"), ("4-20 mA, burden", "0-20 mA, burden"), {"O6"}, id="no such output"),
    ],
)  # fmt: skip
def test_each_must_of_the_output_breaks_by_its_own_cause(make, loop, panel, broken):
    old, new, mode, output = loop
    assert old in make.steady
    made, problems = make.decided(make.steady.replace(old, new) + chosen(mode, output), make.panel.replace(*panel) if panel else make.panel)
    assert not problems
    assert {f.rule for f in made.findings if f.outcome == "broken" and f.weight == "must"} == broken
    assert made.verdict == "held"


def test_without_a_logic_output_the_relay_drives_a_solid_state_switch(make):
    made, _ = make.decided(make.steady + chosen("time_proportioned", "ssr"), make.panel.replace(LOGIC, ""))
    device = made.decision.chosen.case.device
    assert device.controller_output == "relay"
    assert [(drive.asked, drive.able) for drive in device.drives] == [(0.018, 2.0)]
