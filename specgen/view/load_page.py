"""The page of the load: currents of the supply's conductors, what each loop puts on them, the incomer."""

from collections.abc import Sequence

from specgen.core.say import to_step
from specgen.design.panel.lines import NEUTRAL, Lines, lines_of
from specgen.design.panel.types import PanelDesign, Placed
from specgen.model.panel import Panel
from specgen.sizing.candidate import Unsized
from specgen.view.bars import Bar, BarChart, Limit, Part, bar_drawing
from specgen.view.cells import DASH, NO_NUMBER, number, says, word
from specgen.view.dossier import Dossier
from specgen.view.frame import Place
from specgen.view.panel_page import calculation, panel_page, ruling, unread_page
from specgen.view.panel_rules import panel_writer, remarks
from specgen.view.shapes import Cell, Column, Item, List, Note, PageView, Row, Sentence, Shape, Table
from specgen.view.words import listed
from specgen.view.writer import Writer

KICKER = "Currents of the supply's conductors, what each loop puts on them, and the protection they come through"
AMPERE_STEP = 0.1
LEAST_PART = 0.03  # share of a line's current below which a loop is drawn among the others
_HARMONICS = (
    "Drives, phase-angle controllers and switched supplies draw currents far from a sine. Their third harmonic adds up in the neutral "
    "where they stand between a line and the neutral, and stays out of it where they stand between lines; what a line carries in effect "
    "can be more than is shown here, since the figures are those of the fundamental."
)


def load_page(dossier: Dossier, place: Place) -> PageView:
    """Build the page."""
    panel, declared = dossier.design.panel_design, dossier.design.panel
    if panel is None or declared is None:
        return unread_page(dossier, place, "Load")
    writer = panel_writer(dossier)
    basis = (*panel.demand.figures, *panel.incoming.figures)
    parts: list[tuple[str, str, Sequence[Shape]]] = [
        ("currents", "Line and neutral currents", _currents(writer, panel, declared)),
        ("rules", "What the rules find", ruling(dossier, place, panel, ("E2", "E3"), basis)),
        ("loops", "What each loop draws", (_remark(writer, declared), contributions_table(dossier, place))),
        ("placing", "Where the single-phase loads stand", _placing(place, writer, panel)),
        ("neutral", "Neutral and harmonics", _neutral(dossier, panel)),
        ("basis", "Basis", calculation(dossier, basis)),
    ]
    return panel_page(dossier, place, "Load", KICKER, parts, Sentence(says(_lead(writer, panel, declared)), lead=True))


def _lead(writer: Writer, panel: PanelDesign, declared: Panel) -> str:
    said = [
        f"{'the neutral' if name == NEUTRAL else name} carries {writer.say(current, 'current')}"
        for name, current in panel.demand.currents.items()
    ]
    share = writer.say(float(declared.panel.coincidence), "fraction")
    incomer = panel.incoming.rating
    carries = writer.say(panel.incoming.carries, "current")
    if isinstance(incomer, Unsized):
        return f"{listed(said)} at {share} coincidence; the incomer has to carry {carries}, for which no rating is listed."
    kind = "declared" if panel.incoming.declared else "chosen"
    return f"{listed(said)} at {share} coincidence; the {kind} incomer of {writer.say(incomer, 'current')} has to carry {carries}."


def _currents(writer: Writer, panel: PanelDesign, declared: Panel) -> tuple[Shape, ...]:
    if not panel.placed:
        return (Sentence(says("No loop is fed from this panel's supply.")),)
    return bar_drawing(_chart(writer, panel, declared)), conductors_table(writer, panel)


def _chart(writer: Writer, panel: PanelDesign, declared: Panel) -> BarChart:
    demand = panel.demand
    lines = lines_of(declared.supply)
    share = float(declared.panel.coincidence)
    bars = tuple(
        Bar(name, 0.0, current, writer.say(current, "current"), "part" if name == NEUTRAL else "bar",
            () if name == NEUTRAL else tuple(_parts(panel.placed, lines, name, share, current)))
        for name, current in demand.currents.items()
    )  # fmt: skip
    limits = [Limit(panel.incoming.carries, f"has to carry {writer.say(panel.incoming.carries, 'current')}")]
    if not isinstance(panel.incoming.rating, Unsized):
        limits.insert(0, Limit(panel.incoming.rating, f"incomer {writer.say(panel.incoming.rating, 'current')}"))
    told = listed([f"{name} {writer.say(current, 'current')}" for name, current in demand.currents.items()])
    return BarChart(
        anchor="bars",
        title=f"Currents of the conductors: {told}.",
        caption="Currents with the declared coincidence; a line's bar is divided by what each loop adds to its sum, the largest first.",
        axis="current, A",
        bars=bars,
        left=44.0,
        limits=tuple(limits),
        notes=(
            Note("Reading it", "Currents of different lines differ in phase, so that they are added as phasors: a loop between two "
                 "lines adds less to each line's sum than it draws."),
        ),
    )  # fmt: skip


def _parts(placed: Sequence[Placed], lines: Lines, name: str, share: float, current: float) -> list[Part]:
    """Divide a line's current: what each loop's phasor adds along the direction of their sum."""
    drawn = {load.tag: lines.drawn(load.place, load.current).get(name, 0j) for load in placed}
    total = sum(drawn.values())
    if abs(total) == 0:
        return []
    along = {tag: share * (phasor * total.conjugate()).real / abs(total) for tag, phasor in drawn.items()}
    named = sorted(((size, tag) for tag, size in along.items() if size >= LEAST_PART * current), key=lambda pair: (-pair[0], pair[1]))
    rest = current - sum(size for size, _ in named)
    return [Part(size, tag) for size, tag in named] + ([Part(rest, "others")] if rest > 0 else [])


def conductors_table(writer: Writer, panel: PanelDesign) -> Table:
    """Build the table of the conductors' currents, which says what the drawing shows."""
    demand, rating = panel.demand, panel.incoming.rating
    columns = (
        Column("Conductor"),
        Column("Current", "A", number=True),
        Column("At most, phase angles unknown", "A", number=True),
        Column("Of the incomer", "%", number=True),
    )
    rows = []
    for name, current in demand.currents.items():
        most = demand.upper.get(name, demand.neutral)
        share = NO_NUMBER if isinstance(rating, Unsized) else number(writer.bare(100 * current / rating), 100 * current / rating)
        rows.append(Row((word(name), number(writer.bare(current), current), number(writer.bare(most), most), share)))
    told = "of a line: every current that is no resistance's added as it is; of the neutral: while the loops of one line alone are on."
    return Table("", columns, tuple(rows), notes=(Note("At most", told),))


def _remark(writer: Writer, declared: Panel) -> Sentence:
    share = writer.say(float(declared.panel.coincidence), "fraction")
    text = f"At full output, before the coincidence of {share}. A column's sum is more than the line carries: currents add as phasors."
    return Sentence(says(text), quiet=True)


def contributions_table(dossier: Dossier, place: Place) -> Table:
    """Build the table of what each loop draws from each conductor."""
    panel, declared = dossier.design.panel_design, dossier.design.panel
    names = tuple(lines_of(declared.supply).potentials) if declared else ()
    columns = (
        Column("Loop", export="loop"),
        Column("Service", export="service"),
        Column("Stands on", export="conductors"),
        *(Column(name, "A", number=True, export=f"{name} [A]") for name in names),
        Column("Kind of current", export="kind of current"),
        Column("Placed", export="placed"),
    )
    services = {loop.tag: loop.loop.service for loop in dossier.design.loops}
    rows = tuple(
        Row(
            (
                word(load.tag, place.sheet(load.tag, "hardware")),
                word(services.get(load.tag, "")),
                word(load.phases),
                *(number(to_step(load.current, AMPERE_STEP), load.current) if name in load.place else NO_NUMBER for name in names),
                word(kind_of_current(load)),
                _placed(load),
            )
        )
        for load in (panel.placed if panel else ())
    )
    return Table("", columns, rows, wide=True, empty="No loop is fed from this panel's supply.")


def kind_of_current(load: Placed) -> str:
    """Say how a load's current lies to its voltage."""
    if load.distorted:
        return "far from a sine"
    return "in phase" if load.resistive else "phase angle unknown"


def _placed(load: Placed) -> Cell:
    if load.written:
        return word("phases_on written")
    return word("to balance") if len(load.place) == 2 else DASH  # noqa: PLR2004


def _placing(place: Place, writer: Writer, panel: PanelDesign) -> tuple[Shape, ...]:
    free = [load for load in panel.placed if len(load.place) == 2]  # noqa: PLR2004  two conductors
    if not free:
        return ()
    if not panel.moved:
        text = (
            "Every load on two conductors stands where it is written or where its turn is: no other place makes the largest current less."
        )
        return (Sentence(says(text)),)
    gain = panel.moved[0]
    text = writer.sentence(
        "Taken in turn, the loads on two conductors would make the largest line current {in_turn} at full output; as they are placed it is "
        "{largest}. The loops that stand elsewhere than in their turn:",
        {"in_turn": gain.words["in_turn"], "largest": gain.words["largest"]},
    )
    columns = (Column("Loop"), Column("Stands on"), Column("In turn"))
    rows = tuple(Row((word(m.tag, place.sheet(m.tag, "hardware")), word(m.phases), word(m.in_turn))) for m in panel.moved)
    note = Note("To hold a place", "write phases_on in the loop file: until then another loop may move it.")
    return Sentence(says(text), notes=(note,)), Table("", columns, rows)


def _neutral(dossier: Dossier, panel: PanelDesign) -> tuple[Shape, ...]:
    distorted = [load for load in panel.placed if load.distorted]
    blocks: list[Shape] = []
    items = list(remarks(dossier, panel))
    if distorted:
        on_neutral = [load.tag for load in distorted if NEUTRAL in load.place]
        named = f"Far from a sine: {listed([load.tag for load in distorted])}."
        if not on_neutral:
            named += " None of them is connected to the neutral."
        items.append(Item(says(named)))
        blocks.append(Sentence(says(_HARMONICS)))
    if items:
        blocks.append(List(tuple(items), quiet=True))
    return tuple(blocks)
