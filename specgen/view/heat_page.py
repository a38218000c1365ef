"""The page of heat and control supply: from the sources to the limit, and what the supply of the coils carries."""

from collections.abc import Mapping, Sequence

from specgen.core.say import MINUS, to_step
from specgen.design.panel.types import PanelDesign
from specgen.model.panel import Panel
from specgen.sizing.control_supply import RESERVE, ControlLoad
from specgen.sizing.enclosure import Interior, Source
from specgen.view.bars import Bar, BarChart, Limit, bar_drawing
from specgen.view.cells import NO_NUMBER, number, says, word
from specgen.view.dossier import Dossier
from specgen.view.frame import Place
from specgen.view.panel_page import calculation, panel_page, ruling, unread_page
from specgen.view.panel_rules import panel_writer
from specgen.view.shapes import Cell, Column, Drawing, Note, PageView, Row, Sentence, Shape, Table
from specgen.view.writer import Writer

KICKER = "What warms the panel and what cools it, and what the control supply carries"
WATT_STEP = 0.1
SOURCES: Mapping[Source, str] = {
    "device": "switching devices",
    "safety": "safety chains",
    "drive": "drives",
    "wiring": "wiring inside",
    "protection": "protection",
    "controller": "controllers",
    "supply": "control supply",
    "other": "other, declared",
}


def heat_page(dossier: Dossier, place: Place) -> PageView:
    """Build the page."""
    panel, declared = dossier.design.panel_design, dossier.design.panel
    if panel is None or declared is None:
        return unread_page(dossier, place, "Heat")
    writer = panel_writer(dossier)
    heat, control = panel.interior, panel.control
    basis = (*(heat.figures if heat else ()), *(control.figures if control else ()))
    parts: list[tuple[str, str, Sequence[Shape]]] = []
    if heat is not None:
        parts += [
            ("waterfall", "From the sources to the limit", (waterfall(writer, heat, declared), sources_table(writer, heat))),
            ("interior", "Interior", (*ruling(dossier, place, panel, ("E5",), basis), _interior(writer, heat, declared))),
            ("losses", "Losses by loop", (losses_table(dossier, place),)),
        ]
    if control is not None:
        supply = (*ruling(dossier, place, panel, ("E4",), basis), _supply_chart(writer, control), takers_table(writer, control))
        parts.append(("control-supply", "Control supply", supply))
    parts.append(("basis", "Basis", calculation(dossier, basis)))
    lead = Sentence(says(_lead(writer, panel, declared)), lead=True)
    return panel_page(dossier, place, "Heat", KICKER, parts, lead)


def _lead(writer: Writer, panel: PanelDesign, declared: Panel) -> str:
    heat = panel.interior
    if heat is None:
        return "The heat of the panel is not worked out."
    outside = writer.say(float(declared.enclosure.ambient.high), "temperature")
    inside, limit = writer.say(heat.interior, "temperature"), writer.say(heat.limit, "temperature")
    if heat.shortfall is None:
        return f"The interior reaches {inside} where it is {outside} outside; its limit is {limit}."
    ways = _ways(writer, heat)
    return f"The interior would reach {inside} where it is {outside} outside, above its limit of {limit}: it takes {', or '.join(ways)}."


def _ways(writer: Writer, heat: Interior) -> list[str]:
    """Say what would do, in watts, area and air; nothing where the limit is kept."""
    if heat.shortfall is None:
        return []
    more = " more of cooling" if heat.cooling > 0 else " of cooling"
    ways = [writer.say(heat.shortfall, "power") + more]
    if heat.surface_needed is not None:
        ways.append(f"{writer.say(heat.surface_needed, 'area')} of effective surface")
    if heat.air is not None:
        ways.append(f"{writer.say(heat.air, 'air_flow')} of air from outside")
    return ways


def by_source(heat: Interior) -> dict[Source, float]:
    """Add up the losses of each sort [W]; sorts without a loss are left out."""
    sums: dict[Source, float] = {}
    for source in SOURCES:
        watts = sum(loss.watts for loss in heat.losses if loss.source == source)
        if watts > 0:
            sums[source] = watts
    return sums


def shed_at_limit(heat: Interior, declared: Panel) -> float:
    """Return what the enclosure sheds while its interior is at the limit [W]; negative where it is warmer outside than the limit."""
    put_in = next(figure.with_ for figure in heat.figures if figure.symbol == "ΔT")
    return put_in["k"][0] * heat.surface * (heat.limit - float(declared.enclosure.ambient.high))


def waterfall(writer: Writer, heat: Interior, declared: Panel) -> Drawing:
    """Draw the sources one after the other, then what takes the heat away, down to what is left."""
    bars, reached = [], 0.0
    for source, watts in by_source(heat).items():
        bars.append(Bar(SOURCES[source], reached, reached + watts, writer.say(watts, "power")))
        reached += watts
    shed = shed_at_limit(heat, declared)
    limit = writer.say(heat.limit, "temperature")
    if heat.cooling > 0:
        bars.append(Bar("cooling unit", reached, reached - heat.cooling, _signed(writer, -heat.cooling), "part"))
        reached -= heat.cooling
    bars.append(Bar("enclosure, at the limit", reached, reached - shed, _signed(writer, -shed), "part"))
    reached -= shed
    left = "missing" if reached > 0 else "to spare"
    bars.append(Bar(left, 0.0, reached, writer.say(abs(reached), "power"), "due"))
    total = writer.say(heat.loss, "power")
    return bar_drawing(
        BarChart(
            anchor="steps",
            title=f"Losses of {total} step by step, less what takes them away at {limit}: {writer.say(abs(reached), 'power')} {left}.",
            caption=f"Dark: what warms the panel. Light: what takes heat away while the interior is at its limit of {limit}. "
            "Left of zero there is room to spare, right of it cooling is missing.",
            axis="heat, W",
            bars=tuple(bars),
            limits=(Limit(heat.loss, f"all losses {total}"),),
            stairs=True,
        )
    )


def _signed(writer: Writer, watts: float) -> str:
    return ("+" if watts >= 0 else MINUS) + writer.say(abs(watts), "power")


def sources_table(writer: Writer, heat: Interior) -> Table:
    """Build the table of the losses by their sort, which says what the drawing shows."""
    columns = (Column("Source"), Column("Parts", number=True), Column("Loss", "W", number=True), Column("Share", "%", number=True))
    rows = []
    for source, watts in by_source(heat).items():
        count = sum(1 for loss in heat.losses if loss.source == source)
        share = 100 * watts / heat.loss
        figures = number(str(count), count), _watts(watts), number(writer.bare(share), share)
        rows.append(Row((word(SOURCES[source]), *figures)))
    rows.append(Row((word("all"), NO_NUMBER, _watts(heat.loss), number("100", 100.0)), chosen=True))
    return Table("", columns, tuple(rows))


def _interior(writer: Writer, heat: Interior, declared: Panel) -> Table:
    enclosure = declared.enclosure
    outside = float(enclosure.ambient.high)
    shed = shed_at_limit(heat, declared)
    size = " × ".join(writer.say(float(side), "length") for side in (enclosure.height, enclosure.width, enclosure.depth))
    rows: list[tuple[str, str, str]] = [
        ("enclosure, H × W × D", size, f"{enclosure.surface}, {enclosure.mounting}".replace("_", " ")),
        ("effective surface", writer.say(heat.surface, "area"), "what cools it; the floor does not count"),
        ("outside, at its warmest", writer.say(outside, "temperature"), ""),
        ("interior", writer.say(heat.interior, "temperature"), ""),
        ("limit", writer.say(heat.limit, "temperature"), "devices are rated at this"),
        ("shed at the limit", writer.say(shed, "power"), ""),
    ]
    if heat.cooling > 0:
        rows.insert(2, ("cooling unit", writer.say(heat.cooling, "power"), "declared"))
    rows += [("would do" if index == 0 else "or", way, "") for index, way in enumerate(_ways(writer, heat))]
    return Table("", (Column("What"), Column("Value"), Column("Remark")), tuple(Row(tuple(word(text) for text in row)) for row in rows))


def losses_table(dossier: Dossier, place: Place) -> Table:
    """Build the table of losses, one row a loop, one column a sort."""
    heat = dossier.design.panel_design.interior if dossier.design.panel_design else None
    sorts = tuple(source for source in by_source(heat) if source not in ("supply", "other")) if heat else ()
    columns = (
        Column("Loop", export="loop"),
        Column("Service", export="service"),
        *(Column(SOURCES[source].capitalize(), "W", number=True, export=f"{SOURCES[source]} [W]") for source in sorts),
        Column("Together", "W", number=True, export="together [W]"),
    )
    services = {loop.tag: loop.loop.service for loop in dossier.design.loops}
    rows = []
    for tag in dict.fromkeys(loss.loop for loss in (heat.losses if heat else ()) if loss.loop):
        own = [loss for loss in (heat.losses if heat else ()) if loss.loop == tag]
        sums = [sum(loss.watts for loss in own if loss.source == source) for source in sorts]
        cells = tuple(_watts(watts) for watts in (*sums, sum(loss.watts for loss in own)))
        rows.append(Row((word(tag, place.sheet(tag, "hardware")), word(services.get(tag, "")), *cells)))
    return Table("", columns, tuple(rows), wide=True, empty="No loop loses heat in this panel.")


def _watts(watts: float) -> Cell:
    """Write watts so that a reader can add them up."""
    return number(to_step(watts, WATT_STEP), watts) if watts else NO_NUMBER


def _supply_chart(writer: Writer, control: ControlLoad) -> Drawing:
    reserve = writer.say(RESERVE, "fraction")
    bars = (
        Bar("continuous", 0.0, control.continuous, writer.say(control.continuous, "current")),
        Bar("at switch-on", 0.0, control.inrush, writer.say(control.inrush, "current")),
        Bar(f"with {reserve} reserve", 0.0, control.needed, writer.say(control.needed, "current"), "part"),
    )
    capacity = writer.say(control.capacity, "current")
    return bar_drawing(
        BarChart(
            anchor="supply",
            title=f"The control supply carries {bars[0].value} continuously and {bars[1].value} at switch-on; with the reserve "
            f"{bars[2].value} are needed, and {capacity} are there.",
            caption="The load of the control supply against what it gives. At switch-on everything comes on at once.",
            axis="current, A",
            bars=bars,
            limits=(Limit(control.capacity, f"gives {capacity}"),),
        )
    )


def takers_table(writer: Writer, control: ControlLoad) -> Table:
    """Build the table of what the control supply feeds, equal takers together."""
    columns = (
        Column("What it feeds"),
        Column("How many", number=True),
        Column("Continuous", "A", number=True),
        Column("At switch-on", "A", number=True),
    )
    sums: dict[str, tuple[int, float, float]] = {}
    for taken in control.taken:
        count, hold, inrush = sums.get(taken.what, (0, 0.0, 0.0))
        sums[taken.what] = (count + 1, hold + taken.hold, inrush + taken.inrush)
    rows = [
        Row((word(what), number(str(count), count), number(writer.bare(hold), hold), number(writer.bare(inrush), inrush)))
        for what, (count, hold, inrush) in sorted(sums.items(), key=lambda pair: (-pair[1][1], pair[0]))
    ]
    total = number(writer.bare(control.continuous), control.continuous), number(writer.bare(control.inrush), control.inrush)
    rows.append(Row((word("all"), number(str(len(control.taken)), len(control.taken)), *total), chosen=True))
    return Table("", columns, tuple(rows), notes=(Note("By loop", "control-supply.csv has one row a taker with its loop."),))


def control_supply_table(dossier: Dossier) -> Table:
    """Build the table of what the control supply feeds, one row a taker, for files."""
    columns = (
        Column("Loop", export="loop"),
        Column("What", export="what"),
        Column("Continuous", "A", number=True, export="continuous [A]"),
        Column("At switch-on", "A", number=True, export="at switch-on [A]"),
    )
    control = dossier.design.panel_design.control if dossier.design.panel_design else None
    rows = tuple(
        Row((word(taken.loop), word(taken.what), number("", taken.hold), number("", taken.inrush)))
        for taken in (control.taken if control else ())
    )
    return Table("", columns, rows)
