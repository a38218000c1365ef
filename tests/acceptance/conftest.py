"""Small projects as a designer writes them: loops by element kind, in memory and in folders."""

from types import SimpleNamespace

import pytest

from specgen.catalogue.load import load_catalogue
from specgen.design.decide import decide
from specgen.design.record_loop import loop_record
from specgen.model.loops import read_loops
from specgen.model.panel import Panel
from specgen.model.reader import read_model
from specgen.source.read import read_text

PANEL = """panel: {reference: PNL-1, title: Test panel, revision: A, status: for review, date: 2026-11-20}
supply: {voltage: 400 V, phases: 3, system: star, neutral: yes, frequency: 50 Hz, prospective_fault_current: 6 kA, isolator: yes}
control_supply: {voltage: 24 V, kind: dc, capacity: 20 A}
controllers:
  - name: loop controller
    scan: 0.25 s
    outputs: [{kind: relay, rating: 2 A, count: 16}, {kind: logic, voltage: 12 V, drive: 20 mA, count: 8},
              {kind: analogue, signal: 4-20 mA, burden: 500 ohm, count: 8},
              {kind: analogue, signal: 0-10 V, count: 4}]
enclosure: {height: 1800 mm, width: 800 mm, depth: 400 mm, ambient: 5 degC to 35 degC}
"""
SITE = "site_name: Test panel\ndocs_dir: loops\ntheme: {name: specgen}\nplugins: [specgen]\n"
OVEN = """plant: {response: {change: 150 K, time_constant: 30 min, dead_time: 30 s, rest_value: 15 degC to 25 degC}}
sensor: {kind: pt100, class: A, wires: 4, step: 0.1 K, noise: 0.1 K, lag: 5 s}
limits: {danger_high: 130 degC, consequence: product, on_sensor_fault: off, after_power_return: resume}
need: {quantity: temperature, direction: raise, setpoint: 80 degC, tolerance: %(tolerance)s, stability: %(stability)s}
"""
COLD = """plant: {response: {change: 25 K, time_constant: 60 min, dead_time: 40 s, rest_value: 14 degC to 20 degC}}
sensor: {kind: pt100, class: A, wires: 4, step: 0.1 K, noise: 0.1 K, lag: 5 s}
limits: {consequence: product, on_sensor_fault: off, after_power_return: resume}
need: {quantity: temperature, direction: lower, setpoint: 6 degC, tolerance: %(tolerance)s, stability: %(stability)s}
"""
ELEMENTS = {
    "compressor": (COLD, ("{kind: fixed_speed_compressor, current: 5 A, voltage: 400 V, phases: 3, min_run: 180 s, min_rest: 180 s, "
                   "starts_per_hour: 6, refrigerant_circuit: yes, high_pressure_cutout: yes}")),
    "fan": (COLD, "{kind: fan, power: 1.5 kW, voltage: 400 V, phases: 3, starts_per_hour: 10, min_run: 60 s}"),
    "pump": (COLD, "{kind: pump, power: 1.1 kW, voltage: 400 V, phases: 3, starts_per_hour: 10}"),
    "burner": (OVEN, ("{kind: gas_burner, stages: on_off, min_run: 120 s, min_rest: 60 s, starts_per_hour: 10, control_voltage: 230 V, "
               "control_current: 1 A, capacity: 60 kW}")),
    "heater": (OVEN, "{kind: resistive_heater, power: 6 kW, voltage: 400 V, phases: 3, needs: [airflow], fill: mineral_insulated}"),
    "solenoid": (COLD, ("{kind: solenoid_valve, coil_power: 9 W, voltage: 24 V, coil_inrush: 9 W, operations_life: 2.0e6, min_pulse: 1 s, "
                 "fails: closed, medium: brine, capacity: 4 kW}")),
    "valve": (OVEN, ("{kind: modulating_valve, signal: 4-20 mA, stroke_time: 60 s, on_signal_loss: close, on_supply_loss: close, "
              "burden: 250 ohm, medium: water, capacity: 20 kW}")),
    "drive fan": (COLD, ("{kind: variable_speed_fan, power: 3 kW, signal: 4-20 mA, lowest_speed: 20 percent, voltage: 400 V, phases: 3, "
                  "burden: 250 ohm}")),
    "drive pump": (COLD, "{kind: variable_speed_pump, power: 2.2 kW, signal: 0-10 V, lowest_speed: 20 percent, voltage: 400 V, phases: 3}"),
    "drive compressor": (COLD, ("{kind: variable_speed_compressor, power: 5.5 kW, signal: 4-20 mA, lowest_speed: 25 percent, "
                         "voltage: 400 V, phases: 3, burden: 250 ohm, refrigerant_circuit: yes, high_pressure_cutout: yes, "
                         "capacity: 12 kW}")),
    "modulating burner": (OVEN, ("{kind: gas_burner, stages: modulating, signal: 4-20 mA, burden: 250 ohm, control_voltage: 230 V, "
                          "control_current: 1 A, capacity: 80 kW}")),
    "motor valve": (OVEN, ("{kind: three_point_valve, travel_time: 120 s, min_pulse: 0.5 s, motor_voltage: 24 V, motor_current: 0.4 A, "
                    "starts_per_hour: 1200, on_supply_loss: close, medium: water, capacity: 20 kW}")),
    "lamp": (OVEN, "{kind: infrared_lamp_heater, power: 4 kW, voltage: 400 V, phases: 1, inrush_factor: 12, needs: []}"),
    "silicon carbide": (OVEN, "{kind: silicon_carbide_heater, power: 4 kW, voltage: 400 V, phases: 1, inrush_factor: 1.5, needs: []}"),
    "disilicide": (OVEN, "{kind: molybdenum_disilicide_heater, power: 4 kW, voltage: 400 V, phases: 1, inrush_factor: 10, needs: []}"),
    "transformer": (OVEN, "{kind: transformer_fed_heater, power: 4 kW, voltage: 400 V, phases: 1, inrush_factor: 10, needs: []}"),
}  # fmt: skip


def loop_text(name, stability="steady", tolerance="2.5 K", tag="TIC-1", more=""):
    """Return the text of a loop by the name of its element."""
    plant, element = ELEMENTS[name]
    return f"tag: {tag}\nservice: {name}\n{plant % {'stability': stability, 'tolerance': tolerance}}element: {element}\n{more}"


def decided(text, panel=PANEL):
    """Decide a loop text: the loop or None, and the problems of the decision."""
    heads, problems = read_text(panel, "loops/panel.yml")
    made, faults = read_model(Panel, heads[0].data)
    documents, found = read_text(text, "loops/loop.yml")
    reading = read_loops(documents)
    assert not [*problems, *faults, *found, *reading.problems], [*problems, *faults, *found, *reading.problems]
    return decide(reading.loops[0], made, load_catalogue(None))


def record(text, panel=PANEL):
    """Return the record of a loop text that has no problem."""
    found, refused = decided(text, panel)
    assert not refused, refused
    return loop_record(found)


def lay(folder, **files):
    """Lay a project's files out; names as ``panel`` for ``loops/panel.yml``."""
    (folder / "loops").mkdir(parents=True)
    (folder / "mkdocs.yml").write_text(SITE, encoding="utf-8")
    for name, text in {"panel": PANEL, **files}.items():
        (folder / "loops" / f"{name}.yml").write_text(text, encoding="utf-8")
    return folder


@pytest.fixture(scope="session")
def make():
    """Give everything an acceptance test builds from."""
    return SimpleNamespace(loop_text=loop_text, decided=decided, record=record, lay=lay, panel=PANEL, site=SITE, elements=tuple(ELEMENTS))
