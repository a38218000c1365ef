"""Symbols that several paths enter: loads, sensors and devices drawn over the width of their connections.

Each gives its strokes in absolute places, from the places of its connection points and the height it stands at.
"""

from collections.abc import Callable, Sequence
from dataclasses import dataclass

THREE = 3


@dataclass(frozen=True, slots=True)
class Pin:
    """A connection point of a symbol: where its path comes in, and its name."""

    x: float
    name: str


@dataclass(frozen=True, slots=True)
class Drawn:
    """Strokes, dashed strokes and letters of a symbol; letters are centred where they stand."""

    strokes: tuple[str, ...]
    dashed: tuple[str, ...] = ()
    letters: tuple[tuple[float, float, str], ...] = ()


def p(x: float, y: float, rest: str = "") -> str:
    """Write the start of a stroke."""
    return f"M{n(x)} {n(y)}{rest}"


def n(value: float) -> str:
    """Write a place with one decimal at most."""
    whole = int(value)
    return str(whole) if whole == value else f"{value:.1f}".removesuffix(".0")


def _live(pins: Sequence[Pin]) -> list[float]:
    return [pin.x for pin in pins if pin.name != "PE"]


def _earth(pins: Sequence[Pin], top: float, bottom: float) -> tuple[str, ...]:
    """Bring the protective earth to the enclosure, with its sign where it ends."""
    return tuple(p(pin.x, top, f"V{n(bottom)}m-7 0h14m-11.5 3h9m-6.5 3h4") for pin in pins if pin.name == "PE")


def _housing(pins: Sequence[Pin], top: float, y: float, edge: float) -> tuple[str, ...]:
    """Bring the protective earth to a housing."""
    return tuple(p(pin.x, top, f"V{n(y)}H{n(edge)}") for pin in pins if pin.name == "PE")


def _rod(x: float, y: float) -> str:
    """Draw a heating element upright around a place."""
    return p(x - 5, y - 14, "h10v28h-10zm0 7h10m-10 7h10m-10 7h10")


def _bar(x: float, y: float) -> str:
    """Draw a heating element lying around a place."""
    return p(x - 14, y - 5, "h28v10h-28zm7 0v10m7 -10v10m7 -10v10")


def _lamp(x: float, y: float) -> str:
    return p(x - 8, y, "a8 8 0 1 0 16 0a8 8 0 1 0 -16 0") + p(x - 5.7, y - 5.7, "l11.4 11.4m0 -11.4l-11.4 11.4")


def _row(pins: Sequence[Pin], y: float, one: Callable[[float, float], str], reach: float) -> Drawn:
    """Draw one element between two paths, or one a path joined at their feet."""
    xs = _live(pins)
    earth = _earth(pins, y - 30, y + 6)
    if len(xs) >= THREE:
        strokes = [p(x, y - 30, f"V{n(y - 14)}") + one(x, y) + p(x, y + 14, f"V{n(y + 24)}") for x in xs]
        return Drawn((*strokes, p(xs[0], y + 24, f"H{n(xs[-1])}"), *earth))
    if len(xs) == 1:
        return Drawn((p(xs[0], y - 30, f"V{n(y - 14)}") + one(xs[0], y), *earth))
    middle = (xs[0] + xs[1]) / 2
    ends = p(xs[0], y - 30, f"V{n(y)}H{n(middle - reach)}") + p(xs[1], y - 30, f"V{n(y)}H{n(middle + reach)}")
    return Drawn((ends, one(middle, y), *earth))


def heater(pins: Sequence[Pin], y: float) -> Drawn:
    """Draw a heater; of three phases in star, or one whose connection is not declared."""
    return _row(pins, y, _rod, 0) if len(_live(pins)) >= THREE else _row(pins, y, _bar, 14)


def heater_delta(pins: Sequence[Pin], y: float) -> Drawn:
    """Draw three heaters, each between two lines."""
    a, b, c = _live(pins)
    down = p(a, y - 30, f"V{n(y + 14)}H{n((a + c) / 2 - 14)}") + p(c, y - 30, f"V{n(y + 14)}H{n((a + c) / 2 + 14)}")
    down += p(b, y - 30, f"V{n(y - 10)}")
    between = ""
    for left, right in ((a, b), (b, c)):
        middle = (left + right) / 2
        between += p(left, y - 10, f"H{n(middle - 14)}") + p(right, y - 10, f"H{n(middle + 14)}") + _bar(middle, y - 10)
    return Drawn((down, between, _bar((a + c) / 2, y + 14), *_earth(pins, y - 30, y + 6)))


def lamp(pins: Sequence[Pin], y: float) -> Drawn:
    """Draw lamps."""
    return _row(pins, y, _lamp, 8 if len(_live(pins)) < THREE else 0)


def transformer(pins: Sequence[Pin], y: float) -> Drawn:
    """Draw a transformer with a heater behind it."""
    xs = _live(pins)
    middle = (xs[0] + xs[-1]) / 2
    ends = p(xs[0], y - 30, f"V{n(y - 16)}H{n(middle - 9)}") + p(xs[-1], y - 30, f"V{n(y - 16)}H{n(middle + 9)}")
    ends += "".join(p(x, y - 30, f"V{n(y - 25)}H{n(middle)}") for x in xs[1:-1])
    circles = p(middle - 9, y - 16, "a9 9 0 1 0 18 0a9 9 0 1 0 -18 0") + p(middle - 9, y - 4, "a9 9 0 1 0 18 0a9 9 0 1 0 -18 0")
    behind = p(middle - 9, y - 4, f"H{n(middle - 22)}V{n(y + 20)}H{n(middle - 14)}")
    behind += p(middle + 9, y - 4, f"H{n(middle + 22)}V{n(y + 20)}H{n(middle + 14)}")
    return Drawn((ends, circles, behind, _bar(middle, y + 20), *_earth(pins, y - 30, y + 6)))


def _round(pins: Sequence[Pin], y: float, letters: tuple[str, str]) -> Drawn:
    xs = _live(pins)
    middle, r = (xs[0] + xs[-1]) / 2, 18.0
    strokes = [p(middle - r, y, f"a{r:g} {r:g} 0 1 0 {2 * r:g} 0a{r:g} {r:g} 0 1 0 {-2 * r:g} 0")]
    for x in xs:
        if abs(x - middle) < r / 2:
            strokes.append(p(x, y - 30, f"V{n(y - r)}"))
        else:
            at = 0.75 * r if x > middle else -0.75 * r
            strokes.append(p(x, y - 30, f"V{n(y - 24)}L{n(middle + at)} {n(y - 0.66 * r)}"))
    marks = [(middle, y + 1, letters[0]), (middle, y + 12, letters[1])] if letters[1] else [(middle, y + 4, letters[0])]
    return Drawn((*strokes, *_housing(pins, y - 30, y, middle + r)), letters=tuple(marks))


def motor(pins: Sequence[Pin], y: float) -> Drawn:
    """Draw a motor."""
    return _round(pins, y, ("M", "3~" if len(_live(pins)) >= THREE else "1~"))


def valve_motor(pins: Sequence[Pin], y: float) -> Drawn:
    """Draw a valve's motor, the valve below it."""
    made = _round(pins, y, ("M", ""))
    xs = _live(pins)
    middle = (xs[0] + xs[-1]) / 2
    return Drawn((*made.strokes, p(middle - 10, y + 22, "v10l20 -10v10z")), (p(middle, y + 18, "v9"),), made.letters)


def drive(pins: Sequence[Pin], y: float) -> Drawn:
    """Draw a converter with the motor behind it."""
    xs = _live(pins)
    middle = (xs[0] + xs[-1]) / 2
    leads = "".join(p(x, y - 30, "v6") for x in xs)
    half = max(xs[-1] - middle + 8, 18)
    frame = p(middle - half, y - 24, f"h{n(2 * half)}v22h{n(-2 * half)}z") + p(middle - half, y - 2, f"l{n(2 * half)} -22")
    wheel = p(middle, y - 2, "v4") + p(middle - 12, y + 14, "a12 12 0 1 0 24 0a12 12 0 1 0 -24 0")
    marks = ((middle - half * 0.6, y - 14, "~"), (middle + half * 0.6, y - 5, "~"), (middle, y + 18, "M"))
    return Drawn((leads, frame, wheel, *_housing(pins, y - 30, y - 13, middle + half)), letters=marks)


def valve_coil(pins: Sequence[Pin], y: float) -> Drawn:
    """Draw a solenoid between two paths, its valve beside it."""
    xs = _live(pins)
    if len(xs) == 1:
        return Drawn((p(xs[0], y - 30, f"V{n(y - 7)}") + p(xs[0] - 13, y - 7, "h26v14h-26z"),))
    middle = (xs[0] + xs[-1]) / 2
    ends = p(xs[0], y - 30, f"V{n(y)}H{n(middle - 13)}") + p(xs[-1], y - 30, f"V{n(y)}H{n(middle + 13)}")
    return Drawn((ends, p(middle - 13, y - 7, "h26v14h-26z"), p(middle - 10, y + 16, "v10l20 -10v10z"), *_earth(pins, y - 30, y + 6)),
                 (p(middle, y + 7, "v14"),))  # fmt: skip


def burner(pins: Sequence[Pin], y: float) -> Drawn:
    """Draw a burner with its flame."""
    xs = _live(pins)
    left, right = xs[0] - 15, xs[-1] + 15
    middle = (left + right) / 2
    leads = "".join(p(x, y - 30, "v10") for x in xs)
    flame = p(middle, y + 10, "c-9 -3 -6 -12 0 -20c1 7 9 12 0 20z")
    return Drawn((leads, p(left, y - 20, f"H{n(right)}v36H{n(left)}z"), flame, *_housing(pins, y - 30, y, right)))


def box(pins: Sequence[Pin], y: float) -> Drawn:
    """Draw a device as a box over its connections."""
    left, right = pins[0].x - 17, pins[-1].x + 17
    return Drawn((p(left, y - 18, f"H{n(right)}v36H{n(left)}z"),))


def device_input(pins: Sequence[Pin], y: float) -> Drawn:
    """Draw the input of a solid-state switch: a box with a diode."""
    made = box(pins, y)
    middle = (pins[0].x + pins[-1].x) / 2
    return Drawn((*made.strokes, p(middle - 9, y, "h5m0 -4.5v9l8 -4.5zm8 0v9m0 -4.5h6")))


def resistance(pins: Sequence[Pin], y: float) -> Drawn:
    """Draw a measuring resistor: its leads gather at its two ends."""
    return _resistor(pins, y, "l20 -20h4")


def thermistor(pins: Sequence[Pin], y: float) -> Drawn:
    """Draw a thermistor."""
    return _resistor(pins, y, "h5l17 -20")


def _resistor(pins: Sequence[Pin], y: float, mark: str) -> Drawn:
    first = [pin.x for pin in pins if pin.name.startswith("1")]
    last = [pin.x for pin in pins if not pin.name.startswith("1")]
    middle = (first[-1] + last[0]) / 2
    leads = "".join(p(x, y - 18, f"V{n(y)}H{n(middle - 12)}") for x in first)
    leads += "".join(p(x, y - 18, f"V{n(y)}H{n(middle + 12)}") for x in last)
    return Drawn((leads, p(middle - 12, y - 4.5, "h24v9h-24z"), p(middle - 11, y + 11, mark)), letters=((middle + 19, y + 14, "ϑ"),))


def thermocouple(pins: Sequence[Pin], y: float) -> Drawn:
    """Draw the two legs of a thermocouple to their junction, the negative one thicker."""
    middle = (pins[0].x + pins[-1].x) / 2
    plus = p(pins[0].x, y - 18, f"V{n(y - 6)}L{n(middle)} {n(y + 12)}")
    minus = p(pins[-1].x, y - 18, f"V{n(y - 6)}L{n(middle)} {n(y + 12)}")
    thick = p(pins[-1].x + 1.5, y - 6, f"L{n(middle + 1.5)} {n(y + 12)}")
    return Drawn((plus, minus, thick))


SPANS: dict[str, tuple[Callable[[Sequence[Pin], float], Drawn], float, float]] = {
    # how it is drawn, half its height, and how far it reaches beyond its outer paths
    "heater": (heater, 30, 8), "heater_star": (heater, 30, 8), "heater_delta": (heater_delta, 30, 8), "lamp": (lamp, 30, 10),
    "transformer": (transformer, 30, 8), "motor": (motor, 30, 8), "valve_motor": (valve_motor, 34, 8), "drive": (drive, 30, 12),
    "valve_coil": (valve_coil, 30, 14), "burner": (burner, 30, 16), "box": (box, 18, 18), "input": (device_input, 18, 18),
    "resistance": (resistance, 18, 8), "thermistor": (thermistor, 18, 8), "thermocouple": (thermocouple, 18, 8),
    "transmitter": (box, 18, 18),
}  # fmt: skip
