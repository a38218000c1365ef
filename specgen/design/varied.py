"""The uncertain inputs of a loop, and the loop with one of them at another value.

An input that is declared as a range is moved as a whole. What cannot be negative is multiplied, to a tenth and to ten times; its figure
is the end of larger size. A temperature (or whatever else the loop's value is) of the surroundings or at rest has no natural zero:
it is shifted, by at most the distance between its far end and the setpoints; its figure is that far end, the harder one.
"""

from collections.abc import Callable
from dataclasses import dataclass, replace
from math import inf
from typing import TypeVar

from pydantic import BaseModel

from specgen.core.quantity import Quantity, Range
from specgen.design.outcome import Subject
from specgen.model.fitted import Fitted
from specgen.model.plant import Body
from specgen.model.traits import traits_of

DECADE = 10.0
M = TypeVar("M", bound=BaseModel)
ABSOLUTE_ZERO = -273.15  # degC
Path = tuple[str | int, ...]


@dataclass(frozen=True, slots=True)
class Uncertain:
    """One uncertain input of a loop.

    Attributes
    ----------
    name : str
        Its path; of the plant without the form's name, as rules name it.
    words : str
        What a sentence calls it.
    declared : float
        Its figure [base units of ``dimension``, a dimension of ``specgen.core.say``].
    text : str
        As it was written, a range as a whole.
    down, up : float
        How far it may be shifted either way; both infinite for what is multiplied.
    vary : callable
        Makes the loop with the input multiplied by a factor, or shifted by a distance.
    """

    name: str
    words: str
    dimension: str
    declared: float
    text: str
    vary: Callable[[float], Subject]
    down: float = inf
    up: float = inf

    @property
    def shifts(self) -> bool:
        """Tell whether the input is shifted, not multiplied."""
        return self.up < inf

    def value(self, way: float) -> float:
        """Return the figure a way along the span that is looked at: -1 is its lower end, 0 as declared, 1 its upper end."""
        return self.declared + self._shift(way) if self.shifts else float(self.declared * DECADE**way)

    def at(self, way: float) -> Subject:
        """Return the loop with the input a way along its span."""
        return self.vary(self._shift(way) if self.shifts else DECADE**way)

    def _shift(self, way: float) -> float:
        return way * (self.up if way > 0 else self.down)


def uncertain_inputs(subject: Subject) -> tuple[Uncertain, ...]:
    """Return the uncertain inputs that a loop has, those that leave its plant alone first; a declared zero has no size to vary."""
    found = [_tolerance(subject), *_element(subject), _contact_life(subject), *_plant(subject)]
    return tuple(one for one in found if one.declared != 0)


def _tolerance(subject: Subject) -> Uncertain:
    tolerance = subject.loop.need.tolerance
    tight = min(tolerance.above, tolerance.below)
    text = tight.text if tolerance.above == tolerance.below else f"{tolerance.above.text} above, {tolerance.below.text} below"

    def vary(factor: float) -> Subject:
        sides = {"above": _times(tolerance.above, factor), "below": _times(tolerance.below, factor)}
        return _with(subject, ("need", "tolerance"), tolerance.model_copy(update=sides))

    return Uncertain("need.tolerance", "tolerance", "change", float(tight), text, vary)


def _element(subject: Subject) -> list[Uncertain]:
    least = getattr(subject.loop.element, "min_run", None)
    if least is None:
        return []
    given: Quantity = least

    def vary(factor: float) -> Subject:
        return _with(subject, ("element", "min_run"), _times(given, factor))

    return [Uncertain("element.min_run", "least run", "time", float(given), given.text, vary)]


def _contact_life(subject: Subject) -> Uncertain:
    house = subject.panel.house

    def vary(factor: float) -> Subject:
        panel = subject.panel.model_copy(update={"house": house.model_copy(update={"contact_life": _times(house.contact_life, factor)})})
        return replace(subject, panel=panel)

    return Uncertain("house.contact_life", "contact life asked for", "years", house.contact_life_years, house.contact_life.text, vary)


def _plant(subject: Subject) -> list[Uncertain]:
    plant = subject.loop.plant
    if plant is None:
        return []
    if plant.balance is not None:
        return _balance(subject)
    if plant.response is not None:
        at: Path = ("plant", "response")
        return [
            *_ranges(subject, at, {"dead_time": _TIME["dead_time"], "time_constant": _TIME["time_constant"], "change": _CHANGE}),
            *_shifted(subject, at, "rest_value"),
        ]
    if plant.rates is not None:
        rates = {
            "dead_time": _TIME["dead_time"],
            "with_output": ("speed with output", "change_per_second"),
            "without_output": ("speed without output", "change_per_second"),
        }
        return _ranges(subject, ("plant", "rates"), rates)
    return _fitted(subject) if subject.fitted is not None else []


_TIME = {"dead_time": ("dead time", "time"), "time_constant": ("time constant", "time")}
_CHANGE = ("change from no to full output", "change")


def _balance(subject: Subject) -> list[Uncertain]:
    plant = subject.loop.plant
    assert plant is not None  # noqa: S101  asked only of a balance
    balance = plant.balance
    assert balance is not None  # noqa: S101  as above
    at: Path = ("plant", "balance")
    found = _ranges(subject, at, {"dead_time": _TIME["dead_time"]})
    if balance.bodies is not None:
        found.append(_bodies(subject, balance.bodies))
    else:
        found += _ranges(subject, at, {"heat_capacity": ("heat capacity", "heat_capacity")})
    moved = "power" if traits_of(subject.loop.element).electric_heat else "capacity"
    if getattr(subject.loop.element, moved, None) is not None:
        found += _ranges(subject, ("element",), {moved: (moved, "power")})
    return [*found, *_ranges(subject, at, {"load": ("load", "power")}), *_shifted(subject, at, "surroundings")]


def _bodies(subject: Subject, bodies: tuple[Body, ...]) -> Uncertain:
    """Return the heat capacity of the bodies, all masses multiplied together; its figure is that of the fast ones."""
    capacity = sum(body.mass.high * body.specific_heat.high for body in bodies if body.follows == "fast")

    def vary(factor: float) -> Subject:
        made = tuple(body.model_copy(update={"mass": _scaled(body.mass, factor)}) for body in bodies)
        return _with(subject, ("plant", "balance", "bodies"), made)

    text = ", ".join(f"{body.what} {body.mass.text}" for body in bodies)
    return Uncertain("plant.heat_capacity", "heat capacity of all bodies", "heat_capacity", capacity, text, vary)


def _ranges(subject: Subject, at: Path, wanted: dict[str, tuple[str, str]]) -> list[Uncertain]:
    """Return the named ranges below a path that are declared, to be multiplied."""
    found = []
    for name, (words, dimension) in wanted.items():
        given = getattr(_read(subject.loop, at), name, None)
        if given is None:
            continue

        def vary(factor: float, path: Path = (*at, name), given: Range = given) -> Subject:
            return _with(subject, path, _scaled(given, factor))

        found.append(Uncertain(f"{at[0]}.{name}", words, dimension, _larger(given), given.text, vary))
    return found


def _shifted(subject: Subject, at: Path, name: str) -> list[Uncertain]:
    """Return where the surroundings hold the value, to be shifted."""
    given = getattr(_read(subject.loop, at), name, None)
    if given is None:
        return []

    def vary(distance: float) -> Subject:
        return _with(subject, (*at, name), Range(given.low + distance, given.high + distance, given.text))

    return [_rest(subject, f"{at[0]}.{name}", name.replace("_", " "), given, vary)]


def _rest(subject: Subject, name: str, words: str, given: Range, vary: Callable[[float], Subject]) -> Uncertain:
    loop = subject.loop
    points = loop.need.setpoints
    reach = max(points.high - given.low, given.high - points.low)
    far = given.low if points.high - given.low >= given.high - points.low else given.high
    least, most = -inf, inf
    if loop.need.quantity == "temperature":
        least = ABSOLUTE_ZERO
    elif loop.unit.symbol == "percent":
        least, most = min(0.0, given.low), max(1.0, given.high)
    return Uncertain(name, words, "value", far, given.text, vary, min(reach, given.low - least), min(reach, most - given.high))


def _fitted(subject: Subject) -> list[Uncertain]:
    """Return what a recorded step test says, each interval moved as a whole."""
    fitted = subject.fitted
    assert fitted is not None  # noqa: S101  asked only then

    def turned(name: str, given: Range) -> Subject:
        return replace(subject, fitted=Fitted({**fitted.ranges, name: given}, fitted.figures))

    found = []
    for name, (words, dimension) in {**_TIME, "change": _CHANGE}.items():

        def vary(factor: float, name: str = name) -> Subject:
            return turned(name, _scaled(fitted.ranges[name], factor))

        given = fitted.ranges[name]
        found.append(Uncertain(f"plant.{name}", words, dimension, _larger(given), given.text, vary))
    rest = fitted.ranges["rest_value"]

    def shift(distance: float) -> Subject:
        return turned("rest_value", Range(rest.low + distance, rest.high + distance, rest.text))

    return [*found, _rest(subject, "plant.rest_value", "rest value", rest, shift)]


def _larger(given: Range) -> float:
    return given.high if abs(given.high) >= abs(given.low) else given.low


def _scaled(given: Range, factor: float) -> Range:
    return Range(given.low * factor, given.high * factor, given.text)


def _times(given: Quantity, factor: float) -> Quantity:
    return Quantity(float(given) * factor, given.text)


def _read(model: BaseModel, path: Path) -> BaseModel:
    here: BaseModel = model
    for step in path:
        here = getattr(here, str(step))
    return here


def _with(subject: Subject, path: Path, value: object) -> Subject:
    return replace(subject, loop=_replaced(subject.loop, path, value))


def _replaced(model: M, path: Path, value: object) -> M:
    name = str(path[0])
    if len(path) > 1:
        value = _replaced(getattr(model, name), path[1:], value)
    return model.model_copy(update={name: value})
