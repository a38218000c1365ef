"""Signals of a loop: the output that drives a device or element, the sensor, and the limiter's own sensor."""

from specgen.design.wiring.chain import chain_steps
from specgen.design.wiring.draft import Draft
from specgen.design.wiring.facts import Facts
from specgen.design.wiring.load import load_element
from specgen.design.wiring.power import switch_element
from specgen.design.wiring.types import Path, Step
from specgen.model.sensor import Sensor, Thermistor, Transmitter

TOP, X1, SHIELD, END = 0, 50, 55, 60
CHAIN = 1
_THREE = 3
_FOUR = 4


def outputs(draft: Draft, facts: Facts) -> None:
    """Draw up the logic or analogue output of the controller."""
    if facts.by_logic or facts.kind == "power_controller":
        _inside(draft, facts)
    elif facts.kind == "signal":
        _outside(draft, facts)


def _controller(draft: Draft, facts: Facts) -> str:
    return draft.element(facts.own("A1"), "controller")


def _inside(draft: Draft, facts: Facts) -> None:
    """Wire an output to a device that stands in the panel too."""
    own, device = _controller(draft, facts), switch_element(draft, facts)
    logic = facts.by_logic
    chain = chain_steps(draft, facts, CHAIN) if logic and facts.chain_end == "Q1" else []
    pins = ("A1+", "A2−") if logic else ("IN+", "IN−")
    text = "logic output" if logic else f"{_signal(facts)} output"
    there = draft.path([Step(own, "box", "", "O1+", TOP, text=text), *chain, Step(device, "input" if logic else "box", pins[0], "", END)],
                       base="output +")  # fmt: skip
    back = draft.path([Step(own, "box", "", "O1−", TOP), Step(device, "input" if logic else "box", pins[1], "", END)], base="output −")
    draft.circuit("output", "Output", [there, back])


def _outside(draft: Draft, facts: Facts) -> None:
    """Wire an output to an element in the field: currents go through the units one after the other, voltages beside each other."""
    own, element = _controller(draft, facts), load_element(draft, facts)
    count, signal = facts.loop.element.count, _signal(facts)
    text = "input"
    if count > 1:
        text = f"{count} inputs in {'series' if signal.endswith('mA') else 'parallel'}"
    paths = [
        draft.path(
            [Step(own, "box", "", f"O1{sign}", TOP, text=f"{signal} output" if sign == "+" else ""), draft.terminal(X1, "below"),
             Step(element, "box", f"IN{sign}", "", END, text=text if sign == "+" else "")],
            base=f"output {sign}",
        )
        for sign in ("+", "−")
    ]  # fmt: skip
    paths.append(_shield(draft, facts, element))
    draft.circuit("output", "Output", paths, shielded=SHIELD)


def _signal(facts: Facts) -> str:
    signal = getattr(facts.loop.element, "signal", None)
    return str(signal) if signal is not None else "analogue"


def _shield(draft: Draft, facts: Facts, element: str) -> Path:
    """Earth a shield in the panel alone."""
    return draft.path([draft.terminal(X1, "below"), Step(element, "shield", "shield", "", SHIELD)], facts.rail("PE"))


def sensors(draft: Draft, facts: Facts) -> None:
    """Draw up the sensor and, where there is a limiter, its own."""
    sensor = facts.loop.sensor
    name = draft.element(facts.own("B1"), sensor_words(sensor))
    reader = _controller(draft, facts)
    kind = sensor.kind.partition("_")[0]
    wires = getattr(sensor, "wires", 2)
    if isinstance(sensor, Transmitter):
        if sensor.signal is None:
            draft.leave_open("The signal of -B1 is not declared: drawn as 4-20 mA (sensor.signal).")
        elif sensor.signal != "4-20 mA" and wires not in (_THREE, _FOUR):
            draft.leave_open(f"-B1 is drawn with three wires: {sensor.signal} cannot feed a transmitter over its own two.")
            wires = _THREE
    _sensor(draft, facts, ("sensor", "Sensor"), (name, kind, wires), (reader, "input"))
    safety = facts.decided.safety
    if safety is not None and safety.limiter is not None:
        limiter = facts.own("F2")
        words = safety.limiter.sensor
        own = draft.element(facts.own("B2"), f"sensor of the limiter, {words.replace('pt', 'Pt').replace('ntc', 'thermistor')}")
        measured = words.partition(" ")[0]
        _sensor(draft, facts, ("limiter", "Sensor of the limiter"), (own, measured, _THREE if measured.startswith("pt") else 2),
                (limiter, "input"))  # fmt: skip


def sensor_words(sensor: Sensor) -> str:
    """Say what a sensor is.

    Examples
    --------
    >>> from specgen.model.sensor import Thermocouple
    >>> sensor_words(Thermocouple(kind="thermocouple_K"))
    'thermocouple K'
    """
    said = sensor.kind.replace("_", " ")
    if isinstance(sensor, Transmitter):
        return f"{said}, {sensor.signal}" if sensor.signal else said
    if isinstance(sensor, Thermistor):
        return "thermistor"
    return said.replace("pt", "Pt")


def _sensor(draft: Draft, facts: Facts, circuit: tuple[str, str], sensor: tuple[str, str, int], reader: tuple[str, str]) -> None:
    name, kind, wires = sensor
    if kind == "transmitter":
        _transmitter(draft, facts, circuit, name, wires, reader)
        return
    symbol = {"thermocouple": "thermocouple", "ntc": "thermistor"}.get(kind, "resistance")
    ends = {"thermocouple": ("+", "−")}.get(kind) or {3: ("1", "2a", "2b"), 4: ("1a", "1b", "2a", "2b")}.get(wires, ("1", "2"))
    paths = [
        draft.path(
            [Step(reader[0], "box", "", f"I1.{at}", TOP, text=reader[1] if at == 1 else ""), draft.terminal(X1, "below"),
             Step(name, symbol, end, "", END)],
            base=f"{name[name.index('-'):]} {end}",
        )
        for at, end in enumerate(ends, 1)
    ]  # fmt: skip
    draft.circuit(*circuit, [*paths, _shield(draft, facts, name)], shielded=SHIELD)


def _transmitter(draft: Draft, facts: Facts, circuit: tuple[str, str], name: str, wires: int, reader: tuple[str, str]) -> None:
    """Two wires carry supply and signal, three share the return, four keep both apart; an a.c. control supply feeds none of them."""
    direct = facts.panel.control_supply.kind == "dc"
    own = name[name.index("-") :]

    def field(pin: str, top: Step | None, base: str) -> Path:
        steps = [*([] if top is None else [top]), draft.terminal(X1, "below"), Step(name, "transmitter", pin, "", END)]
        return draft.path(steps, None if top is not None else facts.ground() if pin == "−" else facts.control(), base=base)

    def pin(leave: str, text: str = "") -> Step:
        return Step(reader[0], "box", "", leave, TOP, text=text)

    paths = [field("+", None if direct else pin("T+", "supply"), f"{own} +")]
    if wires in (_THREE, _FOUR):
        paths.append(field("−", None if direct else pin("T−"), f"{own} −"))
    text = reader[1] if direct else ""
    paths.append(field("−" if wires not in (_THREE, _FOUR) else "S+", pin("I1+", text), f"{own} signal +"))
    if wires == _FOUR:
        paths.append(field("S−", pin("I1−"), f"{own} signal −"))
    else:
        back = facts.ground() if direct else None
        steps = [pin("I1−")] if direct else [pin("I1−"), Step(reader[0], "jumper", "T−", "", X1)]
        paths.append(draft.path(steps, None, back, base=f"{own} −"))
    draft.circuit(*circuit, [*paths, _shield(draft, facts, name)], shielded=SHIELD)
