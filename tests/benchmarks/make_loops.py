# ruff: noqa: E501, ISC004, RET504 - lines of YAML are kept as they are written
"""Makes many mixed loops as text: every kind of element, every form of plant, the same for the same number and seed."""

import random

PER_FILE = 25

PANEL = """panel: {reference: PNL-9, title: Many loops, revision: A, status: for review, date: 2026-11-20}
supply: {voltage: 400 V, phases: 3, frequency: 50 Hz, prospective_fault_current: 6 kA}
enclosure: {height: 2000 mm, width: 1200 mm, depth: 400 mm, ambient: 5 degC to 35 degC}
house: {after_power_return: resume}
"""

SENSOR = "sensor: {{kind: pt100, class: A, wires: 3, step: 0.1 K, noise: 0.1 K, lag: {lag} s}}"


def loop_texts(count: int, seed: int = 1) -> dict[str, str]:
    """Return the files of a loops folder with ``count`` mixed loops, panel.yml among them, by their names."""
    files = {"panel.yml": PANEL}
    texts = [loop_text(number, seed) for number in range(count)]
    for first in range(0, count, PER_FILE):
        files[f"area-{first // PER_FILE:03d}.yml"] = "".join(texts[first : first + PER_FILE])
    return files


def loop_text(number: int, seed: int = 1) -> str:
    """Return one loop's document."""
    draw = random.Random(seed * 1_000_003 + number)  # noqa: S311  no secret: the same loops each time
    make = MAKERS[number % len(MAKERS)]
    return "---\n" + make(f"XIC-{number + 1:05d}", draw)


def markdown_pages(count: int) -> dict[str, str]:
    """Return as many Markdown pages of a loop sheet's length, for what MkDocs takes for pages alone."""
    row = "| {0} | {0}.5 K | a figure of the sheet with its formula and its source | worst case of the declared ranges |\n"
    pages = {}
    for number in range(count):
        parts = [f"# Loop {number}\n\nWhat is decided, and why.\n"]
        for title in ("Decision", "Settings", "Expect", "Hardware", "If it fails", "Reasons", "Alternatives", "Basis"):
            parts.append(f"\n## {title}\n\n| symbol | value | formula | case |\n|---|---|---|---|\n")
            parts += [row.format(line) for line in range(8)]
        pages[f"loop-{number:05d}.md"] = "".join(parts)
    return pages


def _temperature(tag: str, draw: random.Random, what: str, direction: str, setpoint: float, *, relaxed: bool = False) -> list[str]:
    tolerance = draw.choice((0.8, 1, 1.5, 2, 3))
    lines = [
        f"tag: {tag}", f"service: {what} {draw.randrange(1, 90)}",
        f"need: {{quantity: temperature, direction: {direction}, setpoint: {setpoint:.0f} degC, tolerance: {tolerance} K, "
        f"overshoot: {2 * tolerance:g} K" + (", stability: relaxed" if relaxed else "") + "}",
        SENSOR.format(lag=draw.choice((2, 5, 8, 15))),
    ]  # fmt: skip
    return lines


def _joined(lines: list[str]) -> str:
    return "\n".join(lines) + "\n"


def heater_with_balance(tag: str, draw: random.Random) -> str:
    power = draw.choice((2, 3, 4.5, 6, 9, 12, 18))
    setpoint = draw.choice((45, 65, 80, 95))
    mass, loss = power * draw.uniform(4, 40), power * 1000 * draw.uniform(0.2, 0.6) / (setpoint - 10)
    lines = _temperature(tag, draw, "Cabinet", "raise", setpoint, relaxed=draw.random() < 0.3)
    lines += [
        "plant:", "  balance:", "    bodies:",
        f"      - {{what: air and trays, mass: {mass:.1f} kg, specific_heat: {draw.uniform(0.5, 1.5):.2f} kJ/(kg K), follows: fast}}",
        f"      - {{what: goods, mass: 0 kg to {mass * 2:.1f} kg, specific_heat: 3 kJ/(kg K), follows: slow}}",
        "    surfaces:", f"      - {{what: panels, area: {loss:.2f} m2, u_value: 1.0 W/(m2 K)}}",
        f"    surroundings: {draw.choice((8, 12))} degC to {draw.choice((25, 30))} degC",
        f"    load: {power * 0.04:.2f} kW to {power * draw.uniform(0.1, 0.3):.2f} kW", f"    dead_time: {draw.choice((10, 25, 40, 60))} s",
    ]  # fmt: skip
    if draw.random() < 0.4:
        lines.append(f"    lag: {draw.choice((8, 20, 30))} s")
    lines.append(f"element: {{kind: resistive_heater, power: {power} kW, voltage: 400 V, phases: 3, needs: [airflow], fill: dry_element}}")
    return _joined([*lines, *_danger(setpoint)])


def _danger(setpoint: float) -> list[str]:
    return [
        f"limits: {{danger_high: {setpoint + 30} degC, consequence: equipment, on_sensor_fault: off, after_power_return: resume, "
        f"limiter: {{set: {setpoint + 22} degC, sensor_lag: 10 s, resets: manual}}}}"
    ]


def _response(draw: random.Random, setpoint: float, *, raises: bool) -> list[str]:
    low = setpoint - draw.uniform(25, 45) if raises else setpoint + draw.uniform(4, 8)
    span = draw.uniform(4, 12)
    rest = (low - span, low) if raises else (low, low + span)
    needed = setpoint - rest[0] if raises else rest[1] - setpoint
    tau = draw.choice((3, 6, 10, 20, 40))
    lines = [
        "plant:", "  response:", f"    change: {needed * draw.uniform(1.3, 2.4):.1f} K", f"    time_constant: {tau} min to {tau * 1.4:.1f} min",
        f"    dead_time: {draw.choice((5, 12, 20, 40))} s", f"    rest_value: {rest[0]:.1f} degC to {rest[1]:.1f} degC",
    ]  # fmt: skip
    if draw.random() < 0.3:
        lines.append(f"    lag: {draw.choice((5, 10, 20))} s")
    return lines


def heater_with_response(tag: str, draw: random.Random) -> str:
    setpoint = draw.choice((45, 60, 90, 150))
    lines = [*_temperature(tag, draw, "Heated plate", "raise", setpoint, relaxed=draw.random() < 0.5), *_response(draw, setpoint, raises=True)]
    power, voltage, phases = draw.choice(((0.6, 230, 1), (1.2, 230, 1), (2, 230, 1), (6, 400, 3), (15, 400, 3)))
    lines.append(f"element: {{kind: resistive_heater, power: {power} kW, voltage: {voltage} V, phases: {phases}, needs: []}}")
    return _joined([*lines, *_danger(setpoint)])


def heater_with_rates(tag: str, draw: random.Random) -> str:
    setpoint = draw.choice((60, 120))
    slow = draw.uniform(0.3, 1.0)
    lines = _temperature(tag, draw, "Bath", "raise", setpoint)
    lines += [
        "plant:", "  rates:", f"    with_output: {slow * 2:.2f} K/min to {slow * 2.6:.2f} K/min",
        f"    without_output: {slow * 0.4:.2f} K/min to {slow:.2f} K/min", f"    dead_time: {draw.choice((10, 30))} s",
        f"element: {{kind: resistive_heater, power: {draw.choice((3, 9, 24))} kW, voltage: 400 V, phases: 3, needs: [level]}}",
    ]  # fmt: skip
    return _joined([*lines, *_danger(setpoint)])


def special_heater(tag: str, draw: random.Random) -> str:
    setpoint = draw.choice((55, 90, 160))
    kind = draw.choice(("infrared_lamp_heater", "silicon_carbide_heater", "molybdenum_disilicide_heater", "transformer_fed_heater"))
    lines = [*_temperature(tag, draw, "Furnace zone", "raise", setpoint), *_response(draw, setpoint, raises=True)]
    lines.append(f"element: {{kind: {kind}, power: {draw.choice((6, 12, 18))} kW, voltage: 400 V, phases: 3, inrush_factor: 6, needs: [airflow]}}")
    return _joined([*lines, *_danger(setpoint)])


def compressor(tag: str, draw: random.Random) -> str:
    setpoint = draw.choice((2, 5, 8))
    mass = draw.uniform(400, 1500)
    lines = _temperature(tag, draw, "Cold room", "lower", setpoint, relaxed=True)
    lines += [
        "plant:", "  balance:", f"    heat_capacity: {mass:.0f} kJ/K", f"    loss: {draw.uniform(15, 40):.1f} W/K",
        "    surroundings: 15 degC to 30 degC", f"    load: 0.4 kW to {draw.uniform(1, 2.5):.2f} kW", "    dead_time: 40 s",
        "element: {kind: fixed_speed_compressor, power: 2.4 kW, voltage: 400 V, phases: 3, min_run: 120 s, min_rest: 180 s, "
        f"starts_per_hour: {draw.choice((6, 8, 10))}, capacity: {draw.uniform(4.5, 9):.1f} kW, refrigerant_circuit: yes, "
        "high_pressure_cutout: yes, pump_down: no, defrost: {per_day: 2, duration: 15 min}}",
        "limits: {danger_low: -6 degC, consequence: product, on_sensor_fault: off, after_power_return: resume, "
        "limiter: {set: -4 degC, sensor_lag: 30 s, resets: manual}}",
    ]  # fmt: skip
    return _joined(lines)


def variable_speed(tag: str, draw: random.Random) -> str:
    setpoint = draw.choice((6, 14, 20))
    lines = [*_temperature(tag, draw, "Air cooler", "lower", setpoint), *_response(draw, setpoint, raises=False)]
    lines += [
        f"element: {{kind: variable_speed_fan, power: {draw.choice((1.5, 3, 5.5))} kW, signal: 4-20 mA, lowest_speed: 20 percent, "
        "voltage: 400 V, phases: 3, ramp_time: 5 s, burden: 250 ohm}",
        "limits: {on_sensor_fault: full, after_power_return: resume}",
    ]
    return _joined(lines)


def whole_fan(tag: str, draw: random.Random) -> str:
    setpoint = draw.choice((25, 30))
    lines = [*_temperature(tag, draw, "Hall", "lower", setpoint, relaxed=True), *_response(draw, setpoint, raises=False)]
    least = draw.choice((60, 120))
    lines += [
        f"element: {{kind: fan, power: 2.2 kW, voltage: 400 V, phases: 3, starts_per_hour: {draw.choice((6, 10, 20))}, min_run: {least} s, "
        f"min_rest: {least // 2} s}}",
        "limits: {on_sensor_fault: full, after_power_return: resume}",
    ]
    return _joined(lines)


def level_pump(tag: str, draw: random.Random) -> str:
    speed = draw.uniform(1, 4)
    return _joined([
        f"tag: {tag}", f"service: Receiver {draw.randrange(1, 90)}, level",
        f"need: {{quantity: level, direction: lower, setpoint: 50 percent, tolerance: {draw.choice((8, 15, 20))} percent, stability: relaxed}}",
        "sensor: {kind: transmitter, range: 0 percent to 100 percent, accuracy: 0.5 percent, signal: 4-20 mA, step: 0.1 percent, "
        "noise: 0.5 percent}",
        "plant:", "  rates:", f"    with_output: {speed * 1.6:.2f} percent/min to {speed * 2.4:.2f} percent/min",
        f"    without_output: {speed * 0.4:.2f} percent/min to {speed:.2f} percent/min", "    dead_time: 2 s",
        "element: {kind: pump, power: 1.1 kW, voltage: 400 V, phases: 3, starts_per_hour: 12, min_run: 45 s, min_rest: 30 s}",
        "limits: {danger_high: 95 percent, danger_low: 5 percent, consequence: equipment, on_sensor_fault: off, after_power_return: resume, "
        "limiter: {set: 12 percent, sensor_lag: 1 s, resets: manual}}",
    ])  # fmt: skip


def pressure_vessel(tag: str, draw: random.Random) -> str:
    speed = draw.uniform(0.2, 1)
    return _joined([
        f"tag: {tag}", f"service: Air receiver {draw.randrange(1, 90)}",
        f"need: {{quantity: pressure, direction: raise, setpoint: 7 bar, tolerance: {draw.choice((0.3, 0.5, 0.8))} bar, stability: relaxed}}",
        "sensor: {kind: transmitter, range: 0 bar to 10 bar, accuracy: 0.5 percent, signal: 4-20 mA, step: 0.01 bar, noise: 0.02 bar, lag: 0.5 s}",
        "plant:", "  rates:", f"    with_output: {speed:.3f} bar/min to {speed * 1.5:.3f} bar/min",
        f"    without_output: {speed * 0.1:.3f} bar/min to {speed * 0.6:.3f} bar/min", "    dead_time: 1 s",
        "element: {kind: fixed_speed_compressor, power: 5.5 kW, voltage: 400 V, phases: 3, min_run: 60 s, min_rest: 60 s, starts_per_hour: 10, "
        "pump_down: no}",
        "limits: {danger_high: 9.5 bar, consequence: injury, on_sensor_fault: off, after_power_return: resume, "
        "limiter: {set: 8.8 bar, sensor_lag: 1 s, resets: manual}}",
    ])  # fmt: skip


def valve(tag: str, draw: random.Random) -> str:
    setpoint = draw.choice((40, 55, 70))
    lines = [*_temperature(tag, draw, "Heat exchanger", "raise", setpoint), *_response(draw, setpoint, raises=True)]
    lines += [
        f"element: {{kind: modulating_valve, signal: 4-20 mA, stroke_time: {draw.choice((15, 30, 60))} s, burden: 250 ohm, kvs: 6.3 m3/h, "
        "characteristic: equal_percentage, rangeability: 50, on_signal_loss: close, on_supply_loss: close, medium: water, density: 985 kg/m3, "
        "flow: 4 m3/h, inlet_pressure: 3.5 bar, outlet_pressure: 2 bar, medium_temperature: 80 degC, capacity: 60 kW}",
    ]
    return _joined([*lines, *_danger(setpoint)])


def travelling_valve(tag: str, draw: random.Random) -> str:
    setpoint = draw.choice((45, 60))
    lines = [*_temperature(tag, draw, "Vessel", "raise", setpoint), *_response(draw, setpoint, raises=True)]
    lines.append(
        f"element: {{kind: three_point_valve, travel_time: {draw.choice((60, 120))} s, min_pulse: 0.5 s, motor_voltage: 230 V, "
        "motor_current: 0.1 A, starts_per_hour: 600, on_supply_loss: hold, medium: water}"
    )
    return _joined([*lines, *_danger(setpoint)])


def solenoid(tag: str, draw: random.Random) -> str:
    setpoint = draw.choice((40, 55))
    lines = [*_temperature(tag, draw, "Rinsing tank", "raise", setpoint, relaxed=True), *_response(draw, setpoint, raises=True)]
    lines.append(
        "element: {kind: solenoid_valve, coil_power: 12 W, voltage: 230 V, coil_inrush: 30 W, operations_life: 1.0e6, min_pulse: 0.5 s, "
        "fails: closed, medium: steam}"
    )
    return _joined([*lines, *_danger(setpoint)])


def burner(tag: str, draw: random.Random) -> str:
    setpoint = draw.choice((70, 110))
    stages = draw.choice(("on_off", "high_low", "modulating"))
    lines = [*_temperature(tag, draw, "Air heater", "raise", setpoint, relaxed=stages != "modulating"), *_response(draw, setpoint, raises=True)]
    more = {
        "on_off": "min_run: 60 s, min_rest: 60 s, starts_per_hour: 20",
        "high_low": "min_run: 60 s, min_rest: 60 s, starts_per_hour: 20, second_stage_offset: 2 K",
        "modulating": "signal: 4-20 mA, burden: 250 ohm",
    }[stages]
    lines.append(f"element: {{kind: gas_burner, stages: {stages}, {more}, control_voltage: 230 V, control_current: 1.5 A, capacity: 80 kW}}")
    return _joined([*lines, *_danger(setpoint)])


MAKERS = (
    heater_with_balance, heater_with_response, compressor, valve, heater_with_rates, whole_fan, special_heater, level_pump,
    travelling_valve, solenoid, variable_speed, burner, pressure_vessel,
)  # fmt: skip
