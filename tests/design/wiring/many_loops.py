"""Loops of every kind as text, many of them and the same each time, for whoever wants to see all circuits there are."""

import random

PANELS = {
    "star": """panel: {reference: PNL-7, title: Many circuits, revision: A, status: for review, date: 2026-11-20}
supply: {voltage: 400 V, phases: 3, frequency: 50 Hz, prospective_fault_current: 6 kA}
enclosure: {height: 2000 mm, width: 1200 mm, depth: 400 mm, ambient: 5 degC to 35 degC}
""",
    "no logic output, alternating control": """panel: {reference: PNL-8, title: Old shop, revision: A, status: for review, date: 2026-11-20}
supply: {voltage: 400 V, phases: 3, system: delta, neutral: no, frequency: 50 Hz, prospective_fault_current: 6 kA}
control_supply: {voltage: 230 V, kind: ac, capacity: 4 A}
controllers:
  - name: loop controller
    outputs: [{kind: relay, rating: 2 A, count: 400}, {kind: analogue, signal: 4-20 mA, burden: 500 ohm, count: 400}]
enclosure: {height: 2000 mm, width: 1200 mm, depth: 400 mm, ambient: 5 degC to 35 degC}
""",
    "subdivided": """panel: {reference: PNL-9, title: Shop abroad, revision: A, status: for review, date: 2026-11-20}
supply: {voltage: 480 V, phases: 3, frequency: 60 Hz, prospective_fault_current: 6 kA}
enclosure: {height: 2000 mm, width: 1200 mm, depth: 400 mm, ambient: 5 degC to 35 degC}
code_basis: north_america
""",
}  # fmt: skip
LINES = {"star": "400 V", "no logic output, alternating control": "400 V", "subdivided": "480 V"}
SINGLE = {"star": ("230 V", "400 V"), "no logic output, alternating control": ("400 V",), "subdivided": ("277 V", "480 V")}
SENSORS = (
    "{kind: pt100, class: A, wires: 2}", "{kind: pt100, class: A, wires: 3}", "{kind: pt1000, class: B, wires: 4}", "{kind: ntc}",
    "{kind: thermocouple_K}", "{kind: transmitter, range: -50 degC to 300 degC, accuracy: 0.5 percent, signal: 4-20 mA, step: 0.1 K}",
    "{kind: transmitter, wires: 3, range: -50 degC to 300 degC, accuracy: 0.5 percent, signal: 0-10 V, step: 0.1 K}",
    "{kind: transmitter, wires: 4, range: -50 degC to 300 degC, accuracy: 0.5 percent, signal: 4-20 mA, step: 0.1 K}",
    "{kind: transmitter}",
)  # fmt: skip


def loop_texts(panel, count, seed=1):
    """Return as many loops of a panel as text, tag by tag."""
    texts = {}
    for number in range(count):
        draw = random.Random(seed * 1_000_003 + number)  # noqa: S311  no secret: the same loops each time
        tag = f"TIC-{number + 1:03d}"
        texts[tag] = _loop(tag, panel, KINDS[number % len(KINDS)], draw)
    return texts


def _loop(tag, panel, kind, draw):
    raises = not kind.startswith(("fixed_speed", "variable_speed_comp"))
    element, choices = _element(kind, panel, draw)
    lines = [
        f"tag: {tag}", f"service: {kind} {draw.randrange(100)}",
        f"need: {{quantity: temperature, direction: {'raise' if raises else 'lower'}, setpoint: 60 degC, tolerance: 3 K}}",
        f"sensor: {draw.choice(SENSORS)}", f"element: {element}",
    ]  # fmt: skip
    limits = ["on_sensor_fault: off", "after_power_return: resume", f"consequence: {draw.choice(('product', 'fire', 'equipment'))}"]
    if draw.random() < 0.6:
        resets = draw.choice(("manual", "automatic"))
        limits += [
            f"danger_{'high' if raises else 'low'}: {90 if raises else 10} degC",
            f"limiter: {{set: {80 if raises else 20} degC, resets: {resets}}}",
        ]  # fmt: skip
    lines.append(f"limits: {{{', '.join(limits)}}}")
    if draw.random() < 0.5:
        lines.append("cable: {length: 20 m}" if panel == "subdivided" else "cable: {length: 20 m, method: B2}")
    choice = draw.choice(choices)
    if choice:
        lines.append(f"choose: {{{choice}, because: shown here}}")
    return "\n".join(lines) + "\n"


def _element(kind, panel, draw):
    """Return an element and what may be chosen for it."""
    lines, one = LINES[panel], draw.choice(SINGLE[panel])
    three = draw.random() < 0.5
    fed = f"voltage: {lines if three else one}, phases: {3 if three else 1}"
    count = draw.choice((1, 1, 2, 3))
    if kind == "resistive_heater":
        needs = draw.choice(("", "needs: [], ", "needs: [airflow], ", "needs: [level, flow], "))
        shape = draw.choice(("", "connection: star, ", "connection: delta, ")) if three else ""
        size = draw.choice((0.4, 2, 6, 18, 30))
        outputs = (
            "", "mode: time_proportioned, output: ssr", "mode: time_proportioned, output: contactor",
            "mode: analogue, output: power_controller", "mode: on_off, output: contactor", "mode: on_off, output: relay",
        )  # fmt: skip
        return f"{{kind: {kind}, power: {size} kW, {fed}, {needs}{shape}count: {count}}}", outputs
    if kind.endswith("_heater"):
        return f"{{kind: {kind}, power: 4 kW, {fed}, inrush_factor: 3, needs: []}}", ("",)
    if kind == "fixed_speed_compressor":
        circuit = draw.choice(("", ", refrigerant_circuit: yes, high_pressure_cutout: yes"))
        times = "min_run: 180 s, min_rest: 180 s, starts_per_hour: 6"
        return f"{{kind: {kind}, current: 6 A, {fed}, {times}, count: {count}{circuit}}}", ("",)
    if kind in ("fan", "pump"):
        return f"{{kind: {kind}, power: 1.1 kW, {fed}, starts_per_hour: 10, count: {count}}}", ("",)
    if kind.startswith("variable_speed"):
        volts = draw.choice(("", f", {fed}"))
        return f"{{kind: {kind}, power: 4 kW, signal: 4-20 mA, lowest_speed: 30 percent, count: {count}{volts}}}", ("",)
    if kind == "modulating_valve":
        return f"{{kind: {kind}, signal: {draw.choice(('4-20 mA', '0-10 V'))}, stroke_time: 60 s, count: {count}}}", ("",)
    if kind == "three_point_valve":
        volts = draw.choice(("", "24 V", one))
        more = f", motor_voltage: {volts}, motor_current: 0.3 A" if volts else ""
        return f"{{kind: {kind}, travel_time: 120 s{more}}}", ("",)
    if kind == "solenoid_valve":
        volts = draw.choice(("24 V", one))
        return f"{{kind: {kind}, coil_power: 9 W, voltage: {volts}, operations_life: 2.0e6, count: {count}}}", ("",)
    stages = kind.partition(" ")[2]
    given = ", control_voltage: 230 V, control_current: 1 A" if draw.random() < 0.6 else ""
    signal = ", signal: 4-20 mA" if stages == "modulating" else ""
    return f"{{kind: gas_burner, stages: {stages}{given}{signal}}}", ("",)


KINDS = (
    "resistive_heater", "infrared_lamp_heater", "silicon_carbide_heater", "transformer_fed_heater", "resistive_heater",
    "fixed_speed_compressor", "fan", "pump", "resistive_heater", "variable_speed_compressor", "variable_speed_fan", "modulating_valve",
    "three_point_valve", "resistive_heater", "solenoid_valve", "gas_burner on_off", "gas_burner high_low", "gas_burner modulating",
    "molybdenum_disilicide_heater", "resistive_heater", "variable_speed_pump",
)  # fmt: skip
