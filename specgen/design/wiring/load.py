"""The element of a loop as it is drawn: its symbol, its connection points, and what stands beside it."""

from collections.abc import Sequence

from specgen.design.panel.schedules import numbered
from specgen.design.wiring.draft import Draft
from specgen.design.wiring.facts import Facts

_THREE = ("U", "V", "W")


def load_element(draft: Draft, facts: Facts, number: int = 0) -> str:
    """Enter the element of a circuit and return its designation."""
    element = facts.loop.element
    words = kind_words(element.kind)
    units = facts.branches[number].units if number < len(facts.branches) else element.count
    said = [f"{units} × {words}" if units > 1 else words]
    for name in ("power", "coil_power", "current", "motor_current", "voltage", "motor_voltage", "control_voltage"):
        given = getattr(element, name, None)
        if given is not None:
            said.append(given.text)
    return draft.element(facts.own(numbered(facts.load, number)), ", ".join(said))


def kind_words(kind: str) -> str:
    """Return an element's kind in words.

    Examples
    --------
    >>> kind_words("fixed_speed_compressor"), kind_words("three_point_valve"), kind_words("gas_burner")
    ('fixed-speed compressor', 'three-point valve', 'gas burner')
    """
    words = kind.replace("_", " ")
    for pair in ("fixed speed", "variable speed", "three point", "transformer fed"):
        words = words.replace(pair, pair.replace(" ", "-"))
    return words


def load_symbol(facts: Facts) -> str:
    """Return the symbol of the element."""
    element, traits = facts.loop.element, facts.decided.traits
    if traits.burner:
        return "burner"
    if traits.travels:
        return "valve_motor"
    if traits.coil:
        return "valve_coil"
    if traits.motor:
        return "motor"
    if traits.analogue_input:
        return "valve_drive" if traits.valve else "drive"
    if element.kind.startswith("infrared"):
        return "lamp"
    if element.kind.startswith("transformer"):
        return "transformer"
    connection = getattr(element, "connection", None)
    return f"heater_{connection}" if connection and getattr(element, "phases", 1) == 3 else "heater"  # noqa: PLR2004  three phases


def load_pins(facts: Facts, live: int, returns: Sequence[str]) -> tuple[str, ...]:
    """Return the element's connection points, one a conductor."""
    symbol, count = load_symbol(facts), live + len(returns)
    if symbol == "burner":
        return ("stage 1" if facts.decided.traits.staged else "L", *("N" for _ in returns))
    if symbol == "valve_coil":
        return ("A1", "A2")[:count]
    if symbol == "drive":
        return (*("L" if live == 1 else f"L{at + 1}" for at in range(live)), *("N" for _ in returns))
    if symbol == "motor":
        return tuple(f"{name}1" for name in _THREE) if live == len(_THREE) else ("U1", "U2")
    return _THREE if live == len(_THREE) else ("1", "2")
