"""Heat of a whole panel and load of its control supply, from first principles and by what must hold of them."""

import pytest

from specgen.catalogue.load import load_catalogue
from specgen.design.panel import panel_of
from specgen.design.panel.limiter_switch import limiter_switches
from specgen.design.record_panel import panel_figures

CONTACTOR = "choose: {mode: on_off, output: contactor, because: Site keeps contactors only.}\n"
SOLID = "choose: {mode: time_proportioned, output: ssr, because: Test.}\n"
FAN = """tag: MIC-9
service: Chamber, humid air out
need: {quantity: humidity, direction: lower, setpoint: 40 percent, tolerance: 4 percent}
plant: {response: {change: 40 percent, time_constant: 8 min, dead_time: 20 s, rest_value: 60 percent}}
sensor: {kind: transmitter, range: 0 percent to 100 percent, accuracy: 1 percent, signal: 4-20 mA, step: 0.1 percent}
element: {kind: variable_speed_fan, power: 3 kW, signal: 4-20 mA, lowest_speed: 20 percent, voltage: 400 V, phases: 3, burden: 250 ohm}
limits: {on_sensor_fault: off, after_power_return: resume, consequence: product}
"""


@pytest.fixture(scope="module")
def whole(make):
    """Decide loops, each text once, and put the panel together."""
    known = {}

    def run(*texts, coincidence="100 percent"):
        panel = make.panel_of(make.panel.replace("date: 2026-11-20}", f"date: 2026-11-20, coincidence: {coincidence}}}"))
        loops = []
        for text in texts:
            if text not in known:
                known[text], problems = make.decided(text)
                assert not problems, problems
            loops.append(known[text])
        return panel_of(loops, panel, load_catalogue(None))

    return run


def test_worked_sheet_of_a_contactor_heater(make, whole):
    """9 kW at 400 V and 10 percent more; three poles of 1.5 W at 20 A, coils of 4 W, a limiter with a contactor of its own."""
    found = whole(make.relaxed + CONTACTOR)
    current = 9000 / (3**0.5 * 400) * 1.1
    contactor = 3 * 1.5 * (current / 20) ** 2 + 4
    size = next(row.size for row in found.conductors if row.designation is None) * 1e6  # mm2, by the conductor's own tests
    by_hand = {
        "contactor class 9, d.c. coil": contactor,
        "contactor class 9, d.c. coil, switching device of the safety chain": contactor,
        "wiring inside": 3 * current**2 * 0.0225 * 2 / size,  # 2 m of each line, 0.0225 ohm mm2/m when warm
        "protection": 3 * current * 0.2,
        "controller, its share": 5.0,
        "control supply": 0.1 * (4 + 4 + 5),
        "other heat, declared": 60.0,
    }
    assert {loss.what: loss.watts for loss in found.interior.losses} == pytest.approx(by_hand)
    assert found.interior.loss == pytest.approx(sum(by_hand.values()))
    surface = 1.8 * 1.8 * (0.8 + 0.4) + 1.4 * 0.8 * 0.4
    assert found.interior.surface == pytest.approx(surface)
    assert found.interior.interior == pytest.approx(35 + sum(by_hand.values()) / (5.5 * surface))
    assert found.control.continuous == pytest.approx((4 + 4 + 5) / 24)
    assert found.control.inrush == pytest.approx(found.control.continuous)


def test_a_solid_state_heater_counts_with_all_its_poles(make, whole):
    found = whole(make.steady + SOLID)
    current = 9000 / (3**0.5 * 400) * 1.1
    # 1 V and 14 milliohm a pole
    by_hand = 3 * (2 * 2**0.5 / 3.141592653589793 * current + 0.014 * current**2)
    assert next(loss.watts for loss in found.interior.losses if loss.what.startswith("solid-state")) == pytest.approx(by_hand)


def test_a_drive_in_the_panel_loses_three_percent(whole):
    found = whole(FAN)
    assert next(loss.watts for loss in found.interior.losses if loss.what == "variable-speed drive") == pytest.approx(0.03 * 3000)
    assert any("drive standing in this panel" in assumed.why for assumed in found.assumptions)
    elsewhere = whole(FAN.replace("voltage: 400 V, phases: 3, ", ""))
    assert not any(loss.what == "variable-speed drive" for loss in elsewhere.interior.losses)


def test_one_more_loop_never_lowers_anything(make, whole):
    texts = [make.relaxed, make.steady.replace("TIC-1", "TIC-3"), make.compressor, FAN]
    panels = [whole(*texts[:n]) for n in range(len(texts) + 1)]
    heats = [found.interior.loss for found in panels]
    assert heats == sorted(heats)
    assert heats[0] == pytest.approx(60.0)
    supplies = [found.control.needed for found in panels]
    assert supplies == sorted(supplies)


def test_more_at_once_never_loses_less(make, whole):
    texts = [make.relaxed, make.compressor, FAN]
    heats = [whole(*texts, coincidence=f"{share} percent").interior.loss for share in (1, 40, 70, 100)]
    assert heats == sorted(heats)
    # what is on whenever the plant runs does not depend on it
    always = whole(*texts, coincidence="1 percent").interior.losses
    whole = whole(*texts).interior.losses
    assert {loss.watts for loss in always if "controller" in loss.what} == {loss.watts for loss in whole if "controller" in loss.what}


def test_the_order_of_the_files_does_not_matter(make, whole):
    texts = [make.relaxed, make.compressor, FAN]
    assert whole(*texts).interior.loss == pytest.approx(whole(*reversed(texts)).interior.loss, rel=1e-12)


def test_panel_rules_and_record(make, whole):
    found = whole(make.relaxed)
    outcomes = {finding.rule: finding.outcome for finding in found.findings}
    assert (outcomes["E4"], outcomes["E5"]) == ("holds", "holds")
    record = panel_figures(found)
    assert set(record["heat"]) == {"loss", "surface", "interior", "limit"}
    assert record["heat"]["interior"] == pytest.approx(35 + record["heat"]["loss"] / (5.5 * record["heat"]["surface"]))
    assert set(record["control_supply"]) == {"continuous", "inrush", "capacity"}


def test_too_hot_a_panel_is_held(make):
    hot = make.panel_of(make.panel.replace("ambient: 5 degC to 35 degC", "ambient: 5 degC to 44.9 degC"))
    loop, _ = make.decided(make.relaxed)
    found = panel_of([loop], hot, load_catalogue(None))
    assert next(f.outcome for f in found.findings if f.rule == "E5") == "broken"
    assert found.verdict == "held"
    heat = panel_figures(found)["heat"]
    assert heat["shortfall"] == pytest.approx(heat["loss"] - 5.5 * heat["surface"] * 0.1)


def test_a_limiter_has_a_switch_only_where_it_opens_a_load(make):
    panel, catalogue = make.panel_of(), load_catalogue(None)
    made, problems = make.decided(make.relaxed)
    assert not problems
    assert limiter_switches([made], panel, catalogue)["TIC-1"].name == "contactor class 9, d.c. coil"
    harmless = make.relaxed.replace("danger_high: 90 degC", "danger_high: 200 degC").replace("needs: [level]", "needs: []")
    safe, _ = make.decided(harmless)
    assert limiter_switches([safe], panel, catalogue) == {}
