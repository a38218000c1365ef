"""What turns places of a drawing back into numbers, for the line that reads its curves by pointer and arrow keys.

A drawing's ``data`` then holds one JSON object::

    {"readings": [{"x": [48, 506, 0, 20], "x_unit": "min", "x_places": 1, "y": [186, 22, 61.5, 68.2], "y_unit": "°C", "y_places": 2,
                   "curves": [["value", "true value"], ["measured", "controller reads"]]}]}

``x`` and ``y`` are the places of an axis' two ends and the numbers there; a curve is named by its kind in the drawing and in
words. With several readings a page takes the one whose panel the pointer is in.
"""

import json
from collections.abc import Sequence
from dataclasses import dataclass
from math import floor, log10

from specgen.view.axes import Scale

FINE = 200  # parts of an axis that a reading tells apart


@dataclass(frozen=True, slots=True)
class Readable:
    """One panel of a drawing: its scales, in the units that are written, and its curves as pairs of kind and words."""

    x: Scale
    x_unit: str
    y: Scale
    y_unit: str
    curves: tuple[tuple[str, str], ...]


def decimals(span: float) -> int:
    """Return the decimals that tell the parts of a span apart.

    Examples
    --------
    >>> decimals(20), decimals(6.7), decimals(900), decimals(0.05)
    (1, 2, 0, 4)
    """
    return max(0, -floor(log10(span / FINE) + 1e-9)) if span > 0 else 0


def reading_data(panels: Sequence[Readable]) -> str:
    """Write what a page needs to read a drawing's curves.

    Examples
    --------
    >>> reading_data([Readable(Scale(0, 20, 48, 506), "min", Scale(60, 66.7, 186, 22), "K", (("value", "true value"),))])[:63]
    '{"readings":[{"x":[48,506,0.0,20.0],"x_unit":"min","x_places":1'
    """
    readings = [
        {
            "x": _ends(panel.x), "x_unit": panel.x_unit, "x_places": decimals(abs(panel.x.high - panel.x.low)),
            "y": _ends(panel.y), "y_unit": panel.y_unit, "y_places": decimals(abs(panel.y.high - panel.y.low)),
            "curves": panel.curves,
        }
        for panel in panels
    ]  # fmt: skip
    return json.dumps({"readings": readings}, ensure_ascii=False, separators=(",", ":"))


def _ends(scale: Scale) -> list[float]:
    return [round(scale.at_low, 1), round(scale.at_high, 1), float(f"{scale.low:.9g}"), float(f"{scale.high:.9g}")]
