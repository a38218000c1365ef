"""Putting circuits side by side on a sheet: in their order, lower ones stacked beside a higher one, then the next line."""

from collections.abc import Sequence
from dataclasses import dataclass

from specgen.view.schematic.layout import Layout

APART = 20.0
LINES = 22.0
SPARE = 60.0  # by which a stack may be higher than what it stands beside


@dataclass(frozen=True, slots=True)
class Placed:
    """A circuit with the place of its upper left corner."""

    layout: Layout
    x: float
    y: float


def packed(layouts: Sequence[Layout], width: float) -> tuple[list[Placed], float, float]:
    """Place circuits in lines.

    Parameters
    ----------
    layouts : sequence of Layout
        In the order of the wiring.
    width : float
        The sheet's; a circuit wider than that stands alone in its line.

    Returns
    -------
    list of Placed, float, float
        With the width and height they take.
    """
    placed: list[Placed] = []
    line = 0.0  # where the line begins
    tall = 0.0  # how high it is
    left = 0.0  # of the stack that is filled
    wide = 0.0  # of that stack
    used = 0.0  # how much of its height is taken
    for layout in layouts:
        if wide and used + LINES + layout.height <= tall + SPARE and left + layout.width <= width:
            placed.append(Placed(layout, left, line + used + LINES))
            used += LINES + layout.height
            tall = max(tall, used)
            wide = max(wide, layout.width)
            continue
        beside = left + wide + (APART if wide else 0.0)
        if wide and beside + layout.width > width:
            line += tall + LINES
            tall = left = wide = beside = 0.0
        left, wide, used = beside, layout.width, layout.height
        tall = max(tall, layout.height)
        placed.append(Placed(layout, left, line))
    right = max((item.x + item.layout.width for item in placed), default=0.0)
    return placed, max(right, width), line + tall
