"""The cases on the edges of a loop's box at which a figure can be worst: corners of what can switch, equal duties, and bends."""

from collections.abc import Callable, Iterator, Sequence
from itertools import product

from specgen.process.box import Box, Point

EDGE = 1e-6  # how far inside the cut a case is taken, as a share of the strength
MOVED = ("load", "strength", "loss")


def candidates(
    box: Box, high: float, low: float, duties: Sequence[float] = (0.5,), bends: Sequence[Callable[[Point], float]] = ()
) -> Iterator[Point]:
    """Yield the cases on the edges of strength, load and loss at which a figure can be worst.

    Parameters
    ----------
    box : Box
        The loop's box.
    high, low : float
        Switch points from the setpoint [K].
    duties : sequence of float
        Duties at which an edge is looked at.
    bends : sequence of callable
        Rules that change their sign where a figure bends, such as a natural time less the least time.

    Yields
    ------
    Point
        Where an edge enters and leaves what can switch, has one of the duties, or passes a bend.
    """
    free = [name for name in MOVED if name in box.free]
    points = (high, low, (high + low) / 2)
    if not free:
        yield from _on_line(box, Point(), "load", points, duties, bends)
    for along in free:
        others = [name for name in free if name != along]
        for ends in product((0.0, 1.0), repeat=len(others)):
            line = Point()._replace(**dict(zip(others, ends, strict=True)))
            yield from _on_line(box, line, along, points, duties, bends)


def _on_line(  # noqa: C901 - four small rules of one line
    box: Box,
    line: Point,
    along: str,
    points: tuple[float, float, float],
    duties: Sequence[float],
    bends: Sequence[Callable[[Point], float]],
) -> Iterator[Point]:
    """Yield the cases of one edge of the box."""
    high, low, middle = points
    (load_0, strength_0), (load_1, strength_1) = (box.sides_at(line._replace(**{along: t})) for t in (0.0, 1.0))
    steady = box.loss.at(line.loss)

    def parts(t: float) -> tuple[float, float, float]:
        if along == "load":
            # setpoint, surroundings and load move evenly along their axis, and so do both sides of the balance
            return load_0 + t * (load_1 - load_0), strength_0 + t * (strength_1 - strength_0), steady
        at = line._replace(**{along: t})
        load, strength = box.sides_at(at)
        return load, strength, steady if along == "strength" else box.loss.at(t)

    def falls(t: float) -> float:
        load, strength, loss = parts(t)
        return load + low * loss - EDGE * strength

    def passes(t: float) -> float:
        load, strength, loss = parts(t)
        return strength * (1 - EDGE) - load - high * loss

    if along not in box.free:
        if falls(0.0) >= 0 and passes(0.0) >= 0:
            yield line
        return
    span = _where_not_negative(falls, _where_not_negative(passes, (0.0, 1.0)))
    if span is None:
        return
    yield line._replace(**{along: span[0]})
    yield line._replace(**{along: span[1]})
    for duty in duties:

        def apart(t: float, duty: float = duty) -> float:
            load, strength, loss = parts(t)
            return load + middle * loss - duty * strength

        if apart(span[0]) * apart(span[1]) < 0:
            yield line._replace(**{along: _crossing(apart, *span)})
    for bend in bends:

        def bent(t: float, bend: Callable[[Point], float] = bend) -> float:
            return bend(line._replace(**{along: t}))

        if bent(span[0]) * bent(span[1]) < 0:
            yield line._replace(**{along: _crossing(bent, *span, close=1e-6)})


def _where_not_negative(rule: Callable[[float], float], span: tuple[float, float] | None) -> tuple[float, float] | None:
    """Return the part of a span in which a monotone rule is not negative."""
    if span is None:
        return None
    first, last = rule(span[0]), rule(span[1])
    if first >= 0 and last >= 0:
        return span
    if first < 0 and last < 0:
        return None
    at = _crossing(rule, *span)
    # a hair to the side that holds
    hair = 1e-9
    return (span[0], max(span[0], at - hair)) if first >= 0 else (min(span[1], at + hair), span[1])


def _crossing(rule: Callable[[float], float], a: float, b: float, close: float = 1e-13) -> float:
    """Return where a rule changes its sign, by the Illinois form of false position (exact at once where it is linear)."""
    fa, fb = rule(a), rule(b)
    size = abs(fa) + abs(fb)
    at = a
    for _ in range(60):
        at = b - fb * (b - a) / (fb - fa)
        f = rule(at)
        if abs(f) <= close * size:
            break
        if f * fb < 0:
            a, fa = b, fb
        else:
            fa /= 2
        b, fb = at, f
    return at
