"""Putting single-phase loads on the lines so that the largest line current is least."""

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import product

import numpy as np
from numpy.typing import NDArray

from specgen.design.panel.lines import Lines, Place

EXACT = 12
EQUAL = 1e-9  # two sums that differ by less differ by rounding only
PLACES = 9
Currents = NDArray[np.complex128]


@dataclass(frozen=True, slots=True)
class Movable:
    """A load that may stand on any of its places: its tag, places, and current [A]."""

    tag: str
    places: tuple[Place, ...]
    current: float


@dataclass(frozen=True, slots=True)
class Balanced:
    """The place of each load by its position, and the largest line current it gives [A]; ``in_turn`` is that of places taken in turn."""

    places: tuple[Place, ...]
    largest: float
    in_turn: float


def balance(loads: Sequence[Movable], fixed: Sequence[complex], lines: Lines) -> Balanced:
    """Choose a place for every load.

    Parameters
    ----------
    loads : sequence of Movable
        In a fixed order (by tag), so that the choice depends on nothing else.
    fixed : sequence of complex
        What the other loads draw from each line [A].
    lines : Lines
        The supply's conductors.

    Returns
    -------
    Balanced
        Exact for up to 12 loads; above, the largest first where it adds least, then single moves and exchanges until
        none helps. Among equals the least sum of squares, then the fewest loads away from their place in turn, then the
        first in order.

    Examples
    --------
    >>> from specgen.core.quantity import Quantity
    >>> from specgen.design.panel.lines import lines_of
    >>> from specgen.model.panel import Supply
    >>> three = lines_of(Supply(voltage=Quantity(400.0), phases=3, frequency=Quantity(50.0)))
    >>> sizes = {"A": 4.0, "B": 5.0, "C": 9.0, "D": 5.0}
    >>> loads = [Movable(tag, three.places("line_to_neutral"), amperes) for tag, amperes in sizes.items()]
    >>> balance(loads, (0, 0, 0), three).places
    (('L1', 'N'), ('L2', 'N'), ('L3', 'N'), ('L1', 'N'))
    """
    start = np.array(fixed, dtype=np.complex128)
    draws = [np.array([[load_on(lines, place, load.current)[line] for line in lines.lines] for place in load.places]) for load in loads]
    turn = tuple(number % len(load.places) for number, load in enumerate(loads))
    chosen = _exact(draws, start, turn) if len(loads) <= EXACT else _improved(draws, start, _greedy(draws, start))
    places = tuple(load.places[at] for load, at in zip(loads, chosen, strict=True))
    return Balanced(places, _figures(draws, start, chosen)[0], _figures(draws, start, turn)[0])


def load_on(lines: Lines, place: Place, current: float) -> dict[str, complex]:
    """Return what a load draws from every line, 0 where it does not stand."""
    drawn = lines.drawn(place, current)
    return {line: drawn.get(line, 0j) for line in lines.lines}


def _figures(draws: Sequence[Currents], start: Currents, chosen: Sequence[int]) -> tuple[float, float]:
    total = start + sum((draw[at] for draw, at in zip(draws, chosen, strict=True)), np.zeros_like(start))
    size = np.abs(total)
    return float(size.max(initial=0.0)), float((size**2).sum())


def _exact(draws: Sequence[Currents], start: Currents, turn: tuple[int, ...]) -> tuple[int, ...]:
    half = len(draws) // 2
    first, second = _sums(draws[:half], start), _sums(draws[half:], np.zeros_like(start))
    total = np.abs(first[:, None, :] + second[None, :, :])
    largest, squares = total.max(axis=2).ravel(), (total**2).sum(axis=2).ravel()
    best = np.flatnonzero(largest <= largest.min() * (1 + EQUAL))
    best = best[squares[best] <= squares[best].min() * (1 + EQUAL)]
    choices = np.array(np.unravel_index(best, [len(draw) for draw in draws])).T if draws else np.zeros((1, 0), dtype=int)
    moved = (choices != np.array(turn, dtype=int)).sum(axis=1)
    return tuple(int(at) for at in choices[np.flatnonzero(moved == moved.min())[0]])


def _sums(draws: Sequence[Currents], start: Currents) -> Currents:
    found = start[None, :]
    for draw in draws:
        found = (found[:, None, :] + draw[None, :, :]).reshape(-1, start.size)
    return found


def _greedy(draws: Sequence[Currents], start: Currents) -> list[int]:
    chosen, total = [0] * len(draws), start.copy()
    order = sorted(range(len(draws)), key=lambda number: (-float(np.abs(draws[number]).max()), number))
    for number in order:
        sizes = [np.abs(total + row) for row in draws[number]]
        tries = [(round(float(size.max()), PLACES), round(float((size**2).sum()), PLACES), at) for at, size in enumerate(sizes)]
        chosen[number] = min(tries)[2]
        total = total + draws[number][chosen[number]]
    return chosen


def _improved(draws: Sequence[Currents], start: Currents, chosen: list[int]) -> tuple[int, ...]:
    best = _figures(draws, start, chosen)
    better = True
    while better:
        better = False
        for trial in _neighbours(draws, chosen):
            figures = _figures(draws, start, trial)
            if figures[0] < best[0] * (1 - EQUAL) or (figures[0] <= best[0] * (1 + EQUAL) and figures[1] < best[1] * (1 - EQUAL)):
                chosen, best, better = trial, figures, True
                break
    return tuple(chosen)


def _neighbours(draws: Sequence[Currents], chosen: list[int]) -> list[list[int]]:
    """Return every choice that differs by one load's place, or by two loads' exchanged places."""
    found = [
        [*chosen[:number], at, *chosen[number + 1 :]]
        for number, draw in enumerate(draws)
        for at in range(len(draw))
        if at != chosen[number]
    ]
    for one, other in product(range(len(draws)), repeat=2):
        if one < other and chosen[one] != chosen[other] and max(chosen[one], chosen[other]) < min(len(draws[one]), len(draws[other])):
            trial = list(chosen)
            trial[one], trial[other] = chosen[other], chosen[one]
            found.append(trial)
    return found
