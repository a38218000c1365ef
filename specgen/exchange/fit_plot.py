"""The drawing of a fitted step test: value with its fit, output, residuals, over one time axis; plain SVG."""

from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from html import escape
from math import ceil, floor, log10

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]

_WIDTH, _LEFT, _RIGHT = 720, 74, 14
_POINTS = 300
_INK, _SOFT, _HAIR = "#1a1a1a", "#8c8c8c", "#d0d0d0"
_MINUTES_FROM, _HOURS_FROM = 600.0, 36_000.0


@dataclass(frozen=True, slots=True)
class Drawn:
    """What is drawn: time [s], output [fraction], value and fit in ``value_unit``; residuals are in ``difference_unit``."""

    title: str
    times: Array
    output: Array
    value: Array
    fitted: Array
    value_name: str
    value_unit: str
    difference_unit: str


@dataclass(frozen=True, slots=True)
class _Panel:
    """One set of axes: the band of the page from ``top`` down over ``height``, and what its ends stand for."""

    top: float
    height: float
    times: tuple[float, float]
    values: tuple[float, float]

    def x(self, at: float) -> float:
        first, last = self.times
        return _LEFT + (at - first) / (last - first) * (_WIDTH - _LEFT - _RIGHT)

    def y(self, value: float) -> float:
        low, high = self.values
        return self.top + self.height * (high - value) / (high - low)


def fit_plot(drawn: Drawn) -> bytes:
    """Draw data, fit, output and residuals.

    Parameters
    ----------
    drawn : Drawn
        What the fit used and found.

    Returns
    -------
    bytes
        An SVG file in UTF-8: two inks, no fonts of its own, the same for the same numbers.

    Examples
    --------
    >>> t = np.arange(0.0, 100.0)
    >>> svg = fit_plot(Drawn("a.csv", t, t * 0, t * 1.0, t * 1.0, "pv", "degC", "K"))
    >>> svg.startswith(b"<svg "), b"time [s]" in svg, b"pv [degC]" in svg
    (True, True, True)
    """
    span = float(drawn.times[-1] - drawn.times[0])
    scale, name = (1.0, "s") if span < _MINUTES_FROM else (60.0, "min") if span < _HOURS_FROM else (3600.0, "h")
    t = drawn.times / scale
    ends = (float(t[0]), float(t[-1]))
    residuals = drawn.value - drawn.fitted
    value = _Panel(40, 250, ends, _room(np.concatenate((drawn.value, drawn.fitted))))
    output = _Panel(314, 70, ends, (-5.0, 105.0))
    rest = _Panel(408, 110, ends, _room(np.append(residuals, 0.0)))
    size = f'viewBox="0 0 {_WIDTH} 566" width="{_WIDTH}" height="566"'
    parts = [
        f'<svg xmlns="http://www.w3.org/2000/svg" {size} role="img" font-family="sans-serif" font-size="12" fill="{_INK}">',
        f"<title>{escape(drawn.title)}: recorded value, fit, output and residuals over time</title>",
        f'<rect width="{_WIDTH}" height="566" fill="#ffffff"/>',
        _text(_LEFT, 22, drawn.title, size=14),
        *_axes(value, f"{drawn.value_name} [{drawn.value_unit}]", _ticks_of(value)),
        *_axes(output, "output [percent]", (0.0, 50.0, 100.0)),
        *_axes(rest, f"residual [{drawn.difference_unit}]", _ticks_of(rest)),
        *_time_axis(rest, f"time [{name}]"),
        _dots(value, _extremes(t, drawn.value)),
        _line(value, _thin(t, drawn.fitted), 1.6),
        _line(output, _stairs(t, 100.0 * drawn.output), 1.4),
        _line(rest, [(ends[0], 0.0), (ends[1], 0.0)], 1.0),
        _dots(rest, _extremes(t, residuals)),
        *_key(value, rising=bool(drawn.fitted[-1] >= drawn.fitted[0])),
        "</svg>",
    ]
    return ("\n".join(parts) + "\n").encode()


def ticks(low: float, high: float, most: int = 6) -> list[float]:
    """Return round numbers from ``low`` to ``high``, ``most`` at most.

    Examples
    --------
    >>> ticks(17.2, 93.0), ticks(-0.31, 0.28)
    ([20.0, 40.0, 60.0, 80.0], [-0.3, -0.2, -0.1, 0.0, 0.1, 0.2])
    """
    rough = (high - low) / most
    power = 10.0 ** floor(log10(rough))
    step = next(size * power for size in (1.0, 2.0, 5.0, 10.0) if size * power >= rough * (1.0 - 1e-9))
    digits = max(0, -floor(log10(step)))
    return [round(k * step, digits) + 0.0 for k in range(ceil(low / step - 1e-9), floor(high / step + 1e-9) + 1)]


def _room(values: Array) -> tuple[float, float]:
    low, high = float(np.min(values)), float(np.max(values))
    margin = 0.06 * (high - low) or 0.5 * max(abs(high), 1e-9)
    return low - margin, high + margin


def _axes(panel: _Panel, label: str, at: Sequence[float]) -> list[str]:
    left, right = _LEFT, _WIDTH - _RIGHT
    middle = panel.top + panel.height / 2.0
    out = [f'<line x1="{left}" x2="{right}" y1="{panel.y(v):.1f}" y2="{panel.y(v):.1f}" stroke="{_HAIR}" stroke-width="0.6"/>' for v in at]
    out += [_text(left - 6, panel.y(v) + 4, f"{v:g}".replace("-", "\u2212"), anchor="end") for v in at]
    out.append(f'<path d="M{left} {panel.top}V{panel.top + panel.height}H{right}" fill="none" stroke="{_INK}" stroke-width="1"/>')
    out.append(f'<text transform="translate(16 {middle:.1f}) rotate(-90)" text-anchor="middle">{escape(label)}</text>')
    return out


def _ticks_of(panel: _Panel) -> list[float]:
    return ticks(*panel.values, most=max(4, int(panel.height // 40)))


def _time_axis(panel: _Panel, label: str) -> list[str]:
    bottom = panel.top + panel.height
    out = []
    for at in ticks(*panel.times, most=9):
        x = panel.x(at)
        out.append(f'<line x1="{x:.1f}" x2="{x:.1f}" y1="{bottom}" y2="{bottom + 5}" stroke="{_INK}" stroke-width="1"/>')
        out.append(_text(x, bottom + 18, f"{at:g}".replace("-", "\u2212"), anchor="middle"))
    out.append(_text((_LEFT + _WIDTH - _RIGHT) / 2.0, bottom + 38, label, anchor="middle"))
    return out


def _key(panel: _Panel, *, rising: bool) -> list[str]:
    """Return what dots and line are, in the corner that the response leaves free."""
    y = panel.top + (panel.height - 34 if rising else 14)
    x = _WIDTH - _RIGHT - 92
    return [
        f'<rect x="{x - 6}" y="{y - 11}" width="94" height="38" fill="#ffffff" fill-opacity="0.85"/>',
        "".join(f'<circle cx="{x + 4 + 8 * k}" cy="{y}" r="1.5" fill="{_SOFT}"/>' for k in range(3)),
        _text(x + 30, y + 4, "recorded"),
        f'<line x1="{x}" x2="{x + 24}" y1="{y + 17}" y2="{y + 17}" stroke="{_INK}" stroke-width="1.6"/>',
        _text(x + 30, y + 21, "fit"),
    ]


def _text(x: float, y: float, text: str, *, anchor: str = "start", size: int = 12) -> str:
    return f'<text x="{x:.1f}" y="{y:.1f}" text-anchor="{anchor}" font-size="{size}">{escape(text)}</text>'


def _line(panel: _Panel, points: Iterable[tuple[float, float]], width: float) -> str:
    path = "L".join(f"{panel.x(at):.1f} {panel.y(value):.1f}" for at, value in points)
    return f'<path d="M{path}" fill="none" stroke="{_INK}" stroke-width="{width}" stroke-linejoin="round"/>'


def _dots(panel: _Panel, points: Iterable[tuple[float, float]]) -> str:
    # a stroke of no length with round ends is a dot, in a third of the bytes of a circle
    path = "".join(f"M{panel.x(at):.1f} {panel.y(value):.1f}h0" for at, value in points)
    return f'<path d="{path}" fill="none" stroke="{_SOFT}" stroke-width="3" stroke-linecap="round"/>'


def _thin(t: Array, values: Array) -> list[tuple[float, float]]:
    keep = np.unique(np.linspace(0, len(t) - 1, min(len(t), 2 * _POINTS)).astype(int))
    return list(zip(t[keep].tolist(), values[keep].tolist(), strict=True))


def _extremes(t: Array, values: Array) -> list[tuple[float, float]]:
    """Return the samples, of many the least and the largest of each stretch, so that no outlier is hidden."""
    if len(t) <= 2 * _POINTS:
        return list(zip(t.tolist(), values.tolist(), strict=True))
    out = []
    for part in np.array_split(np.arange(len(t)), _POINTS):
        out += [(float(t[k]), float(values[k])) for k in sorted({int(part[np.argmin(values[part])]), int(part[np.argmax(values[part])])})]
    return out


def _stairs(t: Array, levels: Array) -> list[tuple[float, float]]:
    """Return the corners of a held output; of very many changes the least and largest of each stretch."""
    moves = np.flatnonzero(np.diff(levels) != 0.0) + 1
    if len(moves) > _POINTS:
        return _extremes(t, levels)
    corners = [(float(t[0]), float(levels[0]))]
    for k in moves:
        corners += [(float(t[k]), float(levels[k - 1])), (float(t[k]), float(levels[k]))]
    return [*corners, (float(t[-1]), float(levels[-1]))]
