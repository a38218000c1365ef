"""The drawing of the trade-off, its table, and its figures as JSON: what a wider differential or a longer cycle costs and gains.

The figure's ``data-plot`` holds one JSON object for a page that lets the choice be moved::

    {"setting": "differential", "chosen": 4, "panels": [{"name": "excursion, K", "top": 24, "bottom": 112}, ...],
     "points": [{"x": 120.5, "y": [80.1, 60.2], "within": true, "at": 1.2,
                 "said": {"differential": "1.2 K", "excursion": "1.4 K", "margin": "0.4 K", ...}}, ...]}

Places are in the drawing's own units (its viewBox); a place outside a panel is null. ``said`` is ready text, as the table has it.
"""

import json
from collections.abc import Callable, Sequence
from dataclasses import dataclass
from math import isfinite, log10

from specgen.core.say import MINUS
from specgen.design.trade_off import TradeOff
from specgen.design.trade_point import TradePoint
from specgen.view.axes import Scale, place, ticks
from specgen.view.cells import NO_NUMBER, number, word
from specgen.view.panels import LEFT, RIGHT, WIDTH, Panels, inside, tick_texts
from specgen.view.shapes import Box, Cell, Column, Drawing, Label, Note, Path, Row, Table
from specgen.view.writer import Writer, inward, upward

TOP, TALL, BETWEEN = 44.0, 92.0, 34.0
HEADROOM = 1.12
SEEN = 2.0  # how far beyond its limit a curve is followed, in limits
_THICK = "thick where the rules' window and the tolerance allow it"
SERIES_TICKS = (1.0, 2.0, 5.0, 10.0, 20.0, 60.0, 120.0, 300.0, 600.0, 1800.0)


@dataclass(frozen=True, slots=True)
class _Curve:
    """One panel: what is drawn over the setting, its limit and the limit's words, how the choice is written."""

    name: str
    of: Callable[[TradePoint], float]
    limit: float | None
    limit_text: str
    chosen: str


@dataclass(frozen=True, slots=True)
class Trade:
    """A trade-off with what its drawing and its table have in common."""

    writer: Writer
    it: TradeOff
    above_is_worse: bool

    @property
    def differential(self) -> bool:
        """Tell whether a differential is what is set, and not a cycle time."""
        return self.it.setting == "differential"

    def excursion(self, point: TradePoint) -> float:
        """Return the excursion on the side where the choice takes the larger share of the tolerance [change]."""
        return point.above if self.above_is_worse else point.below

    @property
    def axis(self) -> str:
        """Return the name of the axis of settings, with its unit."""
        return f"{self.it.setting}, {self.writer.change_unit if self.differential else 's'}"

    @property
    def allowed(self) -> float:
        """Return the tolerance on that side [change]."""
        return self.it.allowed_above if self.above_is_worse else self.it.allowed_below

    def setting(self, at: float) -> str:
        """Write a setting with its unit."""
        return self.writer.setting(at) if self.differential else self.writer.time(at)

    def shown(self, at: float) -> float:
        """Return a setting in the unit of the axis."""
        return self.writer.shown_change(at) if self.differential else at

    def _margin(self, point: TradePoint) -> str:
        """Write what is left of the tolerance, below nothing wherever the excursion is written beyond it."""
        left = self.allowed - self.excursion(point)
        return self.writer.excursion(left) if left >= 0 else f"{MINUS}{self.writer.excursion(-left, 0.0)}"

    def said(self, point: TradePoint) -> dict[str, str]:
        """Write every reading of a point."""
        writer = self.writer
        found = {
            self.it.setting: self.setting(point.at),
            "excursion": writer.excursion(self.excursion(point), self.allowed),
            "margin": self._margin(point),
            "swing": writer.fine_change(point.swing),
            "shortest pulse": writer.time(point.pulse),
            "operations an hour": writer.bare(point.operations_per_hour),
        }
        if point.life is not None:
            found["contact life"] = writer.years(point.life)
        return found


def trade_of(writer: Writer, it: TradeOff) -> Trade:
    """Return a trade-off seen from the side that is worse at the choice."""
    chosen = it.choice
    return Trade(writer, it, chosen.above / it.allowed_above >= chosen.below / it.allowed_below)


def trade_off_drawing(trade: Trade) -> Drawing:
    """Draw the curves: thin over the whole range, thick where the rules allow the setting, the choice marked."""
    it = trade.it
    panels, curves = Panels(), _curves(trade)
    x, at = _setting_axis(trade)
    bottom = TOP + len(curves) * (TALL + BETWEEN) - BETWEEN
    ends = [min(max(_x(trade, x, edge), LEFT), RIGHT) for edge in it.window or ()]
    if ends and ends[1] > ends[0]:
        panels.boxes.append(Box("band", place(ends[0]), place(TOP), place(ends[1] - ends[0]), place(bottom - TOP)))
    chosen_x = _x(trade, x, it.choice.at)
    panels.paths.append(Path("mark", f"M{place(chosen_x)} {place(TOP)}V{place(bottom)}"))
    scales: list[Scale] = []
    for index, curve in enumerate(curves):
        top = TOP + index * (TALL + BETWEEN)
        scales.append(_panel(panels, trade, curve, x, top, ends))
        panels.axis_below(x, at, top + TALL, trade.axis if index == len(curves) - 1 else "")
    panels.labels.append(Label("plain", place(LEFT), "12", _window_text(trade)))
    return Drawing(
        anchor="trade-off",
        title=_title(trade),
        caption=_caption(trade),
        width=str(WIDTH),
        height=place(bottom + 26),
        boxes=tuple(panels.boxes),
        paths=tuple(panels.paths),
        points=tuple(panels.points),
        labels=tuple(panels.labels),
        notes=(Note("Held cases", _held(trade)),),
        data=_data(trade, curves, x, scales),
    )


def _curves(trade: Trade) -> list[_Curve]:
    writer, it, chosen = trade.writer, trade.it, trade.it.choice
    side = "above" if trade.above_is_worse else "below"
    limit = writer.shown_change(trade.allowed)
    made = [
        _Curve(
            f"excursion {side}, measuring error included, {writer.change_unit}", lambda p: writer.shown_change(trade.excursion(p)), limit,
            f"tolerance {writer.setting(trade.allowed)}", writer.excursion(trade.excursion(chosen), trade.allowed),
        )
    ]  # fmt: skip
    if chosen.life is not None and isfinite(chosen.life):
        house = f"house {writer.years(it.house_life)}"
        made.append(_Curve("contact life, years", lambda p: p.life or 0.0, it.house_life, house, writer.years(chosen.life)))
    if it.starts_allowed is not None:
        most = f"{writer.bare(it.starts_allowed)} allowed"
        reached = writer.bare(chosen.operations_per_hour)
        made.append(_Curve("starts an hour", lambda p: p.operations_per_hour, it.starts_allowed, most, reached))
    return made


def _setting_axis(trade: Trade) -> tuple[Scale, list[tuple[float, str]]]:
    """Return the scale of the settings, of cycle times in octaves, and its ticks in the scale's own numbers."""
    points = trade.it.points
    low, high = trade.shown(points[0].at), trade.shown(points[-1].at)
    if trade.differential:
        x = Scale(0.0, high * 1.02, LEFT, RIGHT)
        at = ticks(0.0, high)
        return x, list(zip(at, tick_texts(at), strict=True))
    spread = max(log10(high / low), 0.1)
    x = Scale(log10(low) - 0.02 * spread, log10(high) + 0.02 * spread, LEFT, RIGHT)
    return x, [(log10(tick), f"{tick:g}") for tick in SERIES_TICKS if low * 0.999 <= tick <= high * 1.001]


def _x(trade: Trade, x: Scale, at: float) -> float:
    shown = trade.shown(at)
    if trade.differential:
        return x(shown)
    return x(log10(shown)) if shown > 0 else LEFT - 1.0


def _panel(panels: Panels, trade: Trade, curve: _Curve, x: Scale, top: float, ends: Sequence[float]) -> Scale:
    it = trade.it
    chosen = curve.of(it.choice)
    values = [curve.of(point) for point in it.points]
    most = max(chosen, curve.limit or 0.0)
    high = HEADROOM * max(min(max(values), SEEN * most), most)
    y = Scale(0.0, high, top + TALL, top)
    panels.value_axis(y, curve.name, 4)
    spots = [(_x(trade, x, point.at), y(value)) for point, value in zip(it.points, values, strict=True)]
    if curve.limit is not None:
        panels.across("limit", y(curve.limit))
        panels.right([(y(curve.limit), curve.limit_text, "soft")], top, top + TALL)
    marked = (_x(trade, x, it.choice.at), y(chosen))
    for piece in inside(spots, (LEFT, top), (RIGHT, top + TALL)):
        panels.curve("thin", piece, [marked])
    if len(ends) > 1 and ends[1] > ends[0]:
        for piece in inside(spots, (ends[0], top), (ends[1], top + TALL)):
            panels.curve("value", piece, [marked])
    panels.mark(*marked, f"chosen {trade.setting(it.choice.at)}: {curve.chosen}")
    return y


def _window_text(trade: Trade) -> str:
    it, writer = trade.it, trade.writer
    if it.window is None:
        if it.least <= it.most:
            return f"no {it.setting} keeps every rule"
        if it.most <= 0:
            return f"no {it.setting} keeps the tolerance; {trade.setting(upward(it.least))} is needed"
        return f"no {it.setting} keeps every rule: {trade.setting(upward(it.least))} needed, {trade.setting(inward(it.most))} at most"
    if trade.differential:
        return f"within the rules (shaded): {writer.bounds(it.least, it.most)}"
    first, last = it.window
    if last <= first:
        return f"within the rules: {writer.time(first)}"
    return f"within the rules (shaded): {writer.time(first)} to {writer.time(last)}"


def _title(trade: Trade) -> str:
    it, chosen = trade.it, trade.it.choice
    said = trade.said(chosen)
    text = f"What the {it.setting} costs and gains: at the chosen {said[it.setting]} the excursion is {said['excursion']}"
    if "contact life" in said:
        text += f" and the contacts last {said['contact life']}"
    return f"{text}; {_window_text(trade)}. The figures are in the table below."


def _caption(trade: Trade) -> str:
    if trade.differential:
        return f"What a wider differential costs the product and gains for what switches; {_THICK}."
    gains = "and gains for the contacts" if trade.it.choice.life is not None else "where nothing wears"
    return f"What a longer cycle costs the product {gains}; {_THICK}."


def _held(trade: Trade) -> str:
    text = "The choice stands with its own worst case; the other settings are computed for the same cases."
    return text if trade.differential else f"{text} The margins of control are examined at the choice alone."


def _data(trade: Trade, curves: Sequence[_Curve], x: Scale, scales: Sequence[Scale]) -> str:
    points = []
    for point in trade.it.points:
        places = [_seen(y(curve.of(point)), y) for curve, y in zip(curves, scales, strict=True)]
        stands = {"x": round(_x(trade, x, point.at), 1), "y": places, "within": point.within}
        points.append({**stands, "at": float(f"{point.at:.9g}"), "said": trade.said(point)})
    whole = {
        "setting": trade.it.setting,
        "chosen": next(index for index, point in enumerate(trade.it.points) if point.chosen),
        "panels": [{"name": curve.name, "top": y.at_high, "bottom": y.at_low} for curve, y in zip(curves, scales, strict=True)],
        "points": points,
    }
    return json.dumps(whole, ensure_ascii=False, separators=(",", ":"))


def _seen(at: float, y: Scale) -> float | None:
    return round(at, 1) if y.at_high - 0.05 <= at <= y.at_low + 0.05 else None


def trade_off_table(trade: Trade) -> Table:
    """Return the same figures as a table, the choice set apart."""
    writer, it = trade.writer, trade.it
    side = "above" if trade.above_is_worse else "below"
    columns = [
        Column("Differential" if trade.differential else "Cycle time", number=True),
        Column(f"Excursion {side}", number=True),
        Column("Left of the tolerance", number=True),
        Column("Swing" if trade.differential else "Ripple", number=True),
        Column("Shortest pulse", number=True),
        Column("Operations an hour", number=True),
        Column("Contacts last", number=True),
        Column("Rules"),
    ]
    return Table(f"What each {it.setting} would do", tuple(columns), tuple(_row(writer, trade, point) for point in it.points), wide=True)


def _row(writer: Writer, trade: Trade, point: TradePoint) -> Row:
    said = trade.said(point)
    change = writer.shown_change
    life: Cell = NO_NUMBER if point.life is None or not isfinite(point.life) else number(said["contact life"], point.life)
    stands = "chosen" if point.chosen else "within" if point.within else "outside"
    return Row(
        (
            number(said[trade.it.setting], trade.shown(point.at)),
            number(said["excursion"], change(trade.excursion(point))),
            number(said["margin"], change(trade.allowed - trade.excursion(point))),
            number(said["swing"], change(point.swing)),
            number(said["shortest pulse"], point.pulse),
            number(said["operations an hour"], point.operations_per_hour),
            life,
            word(stands if point.within or not point.chosen else "chosen, outside"),
        ),
        chosen=point.chosen,
    )


