"""Words of the pages for the words of the loop file."""

import re

_PATH = re.compile(r"[a-z_]+[._][a-z]")

MODES = {
    "on_off": "on-off",
    "time_proportioned": "time-proportioned",
    "analogue": "analogue",
    "three_point": "three-point",
}
DONE = {
    "on_off": "Switched on-off",
    "time_proportioned": "Time-proportioned",
    "analogue": "Driven continuously",
    "three_point": "Driven three-point",
}
DEVICES = {
    "relay": "relay",
    "contactor": "contactor",
    "ssr": "solid-state switch",
    "power_controller": "power controller",
    "signal": "signal",
    "relay_pair": "pair of relays",
}
THROUGH = {
    "relay": "through a relay",
    "contactor": "through a contactor",
    "ssr": "through a solid-state switch",
    "power_controller": "through a power controller",
    "signal": "by its own signal",
    "relay_pair": "through a pair of relays",
}
OUTPUTS = {
    "relay": "relay contact",
    "logic": "logic output",
    "analogue": "analogue output",
    "relay_pair": "two relay contacts",
}
OUTCOMES = {
    "holds": "holds",
    "broken": "broken",
    "overridden": "overridden",
    "unanswered": "unanswered",
    "does_not_apply": "does not apply",
}
ROLES = {
    "controller": "controller's output",
    "interposing": "interposing relay",
    "load": "load contact",
    "element": "element's own coil",
}
FAMILIES = {
    "A": "Direction and safe state",
    "M": "Mode",
    "D": "Differential",
    "C": "Cycle time",
    "V": "Valves and three-point",
    "O": "Output device and hardware",
    "E": "Panel",
    "I": "Instrument",
    "S": "Safety",
    "T": "Tuning",
}
SENSOR_FAULT = {"off": "off", "full": "full output", "hold": "held as it was"}
VERDICT_VERBS = {
    "held": ("is held", "are held"),
    "open": ("is open", "are open"),
    "deviates": ("deviates", "deviate"),
    "meets": ("meets its need", "meet their need"),
}
VERDICT_SAYS = {
    "held": "a must-rule is broken",
    "open": "a must-rule cannot be answered until an input is there",
    "deviates": "a should-rule is broken or overridden",
    "meets": "every rule that could be asked holds",
}


def counted(number: int, one: str, many: str = "") -> str:
    """Write a count with its noun.

    Examples
    --------
    >>> counted(1, "loop"), counted(3, "loop"), counted(0, "loop"), counted(2, "is", "are")
    ('1 loop', '3 loops', 'no loops', '2 are')
    """
    noun = one if number == 1 else many or one + "s"
    return f"{number or 'no'} {noun}"


def listed(words: tuple[str, ...] | list[str], last: str = "and") -> str:
    """Join words as a sentence does.

    Examples
    --------
    >>> listed(["A"]), listed(["A", "B"]), listed(["A", "B", "C"])
    ('A', 'A and B', 'A, B and C')
    """
    if len(words) <= 1:
        return "".join(words)
    return f"{', '.join(words[:-1])} {last} {words[-1]}"


def capital(text: str) -> str:
    """Begin a text with a capital, unless it begins with a field's path.

    Examples
    --------
    >>> capital("time of day"), capital("sensor.lag is not declared"), capital("")
    ('Time of day', 'sensor.lag is not declared', '')
    """
    return text if _PATH.match(text) else text[:1].upper() + text[1:]


def with_stop(text: str) -> str:
    """End a text with a full stop, once.

    Examples
    --------
    >>> with_stop("It holds"), with_stop("Does it?")
    ('It holds.', 'Does it?')
    """
    return text if text.endswith((".", "!", "?", ":")) else text + "."
