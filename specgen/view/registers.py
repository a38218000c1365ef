"""The registers: loops, open points, assumptions, deviations."""

from specgen.design.types import DecidedLoop
from specgen.rules.base import Finding
from specgen.view.cells import DASH, NO_NUMBER, number, verdict_cell, word
from specgen.view.dossier import Dossier
from specgen.view.frame import Place, frame
from specgen.view.grounds import finding_text
from specgen.view.panel_rules import panel_writer
from specgen.view.shapes import Cell, Column, PageView, Row, Section, Table
from specgen.view.summary import summary_of
from specgen.view.words import MODES, OUTCOMES, with_stop

_WEIGHT_ORDER = {"must": 0, "should": 1, "note": 2}
_DEVIATES = ("broken", "overridden")
PANEL = "panel"


def loops_page(dossier: Dossier, place: Place) -> PageView:
    """Build the register of loops."""
    columns = (
        Column("Tag"),
        Column("Service"),
        Column("Verdict"),
        Column("Decision"),
        Column("Stays within", number=True),
        Column("Allowed", number=True),
        Column("Contact life", "years", number=True),
    )
    rows: list[Row] = []
    area = None
    for loop in dossier.design.loops:
        if loop.loop.area != area:
            area = loop.loop.area
            rows.append(Row(heading=area))
        rows.append(_loop_row(dossier, place, loop))
    table = Table("", columns, tuple(rows), wide=True, empty="No loop could be decided.")
    return frame(
        dossier,
        place,
        "Loops",
        (Section("1", "loops", "Loops", (table,)),),
        kicker="Every loop with its decision and the figures it rests on",
    )


def _loop_row(dossier: Dossier, place: Place, decided: DecidedLoop) -> Row:
    writer = dossier.writers[decided.tag]
    short = summary_of(decided)
    excursion, life = short.excursion, short.contact_life
    decision = f"{MODES[short.mode]}, {short.device}"
    cells = (
        word(decided.tag, place.sheet(decided.tag)),
        word(decided.loop.service),
        verdict_cell(decided.verdict),
        word(decision, aside=short.entered_with(writer)),
        NO_NUMBER if excursion is None else number(writer.excursion(excursion, short.allowed), writer.shown_change(excursion)),
        number(writer.setting(short.allowed), writer.shown_change(short.allowed)),
        NO_NUMBER if life is None else number(writer.years_number(life), life),
    )
    return Row(cells, anchor=decided.tag)


def loops_table(dossier: Dossier) -> Table:
    """Build the table of loops for files, every fact in a column of its own; excursion and tolerance in each loop's own unit."""
    columns = (
        Column("Tag", export="tag"),
        Column("Service", export="service"),
        Column("Area", export="area"),
        Column("Verdict", export="verdict"),
        Column("Mode", export="mode"),
        Column("Through", export="device"),
        Column("Entered", export="entered"),
        Column("Stays within", number=True, export="stays within [unit]"),
        Column("Allowed", number=True, export="allowed [unit]"),
        Column("Unit", export="unit"),
        Column("Contact life", number=True, export="contact life [year]"),
    )
    return Table("", columns, tuple(_loop_fields(dossier, loop) for loop in dossier.design.loops))


def _loop_fields(dossier: Dossier, decided: DecidedLoop) -> Row:
    writer = dossier.writers[decided.tag]
    short = summary_of(decided)
    loop = decided.loop
    excursion, life = short.excursion, short.contact_life
    within = NO_NUMBER if excursion is None else number("", writer.shown_change(excursion))
    allowed = number("", writer.shown_change(short.allowed))
    lasts = NO_NUMBER if life is None else number("", life)
    texts = (loop.tag, loop.service, loop.area, decided.verdict, MODES[short.mode], short.device, short.entered_with(writer))
    return Row((*(word(text) for text in texts), within, allowed, word(writer.change_unit), lasts))


def open_points_page(dossier: Dossier, place: Place) -> PageView:
    """Build the register of open points."""
    section = Section("1", "open-points", "Missing inputs", (open_points_table(dossier, place),))
    return frame(dossier, place, "Open points", (section,), kicker="Inputs that are missing, what each would settle, and how to get it")


def open_points_table(dossier: Dossier, place: Place) -> Table:
    """Build the table of inputs that are missing."""
    columns = (
        Column("Loop", export="loop"),
        Column("Input", export="field"),
        Column("Settles", export="settles"),
        Column("How to get it", export="how"),
    )
    panel = dossier.design.panel_design
    missed = [(word(PANEL, place.to("index.html", "panel")), missing) for missing in (panel.open_points if panel else ())]
    missed += [(word(loop.tag, place.sheet(loop.tag)), missing) for loop in dossier.design.loops for missing in loop.missing]
    rows = tuple(Row((whose, word(missing.field), word(" ".join(missing.settles)), word(missing.how))) for whose, missing in missed)
    return Table("", columns, rows, wide=True, empty="No input is missing.")


def assumptions_page(dossier: Dossier, place: Place) -> PageView:
    """Build the register of assumptions, one row for all loops that make the same."""
    shared: dict[tuple[str, str, str], list[str]] = {}
    panel = dossier.design.panel_design
    for assumed in panel.assumptions if panel else ():
        shared.setdefault((assumed.field, assumed.value, assumed.why), []).append(PANEL)
    for loop in dossier.design.loops:
        for assumed in loop.assumptions:
            shared.setdefault((assumed.field, assumed.value, assumed.why), []).append(loop.tag)
    columns = (Column("Stands for"), Column("Taken as"), Column("Because"), Column("Loops"))
    rows = tuple(
        Row((word(field), word(value), word(why), _loops_cell(dossier, tags, place)))
        for (field, value, why), tags in sorted(shared.items())
    )
    table = Table("", columns, rows, wide=True, empty="Nothing was taken for granted.")
    kicker = "What was taken for granted where the loop files say nothing"
    return frame(dossier, place, "Assumptions", (Section("1", "assumptions", "Taken for granted", (table,)),), kicker=kicker)


def _loops_cell(dossier: Dossier, tags: list[str], place: Place) -> Cell:
    if tags == [PANEL]:
        return word(PANEL, place.to("index.html", "panel"))
    if len(tags) == 1:
        return word(tags[0], place.sheet(tags[0], "basis"))
    if len(tags) == len(dossier.design.loops):
        return word(f"all {len(tags)}")
    return word(", ".join(tags))


def assumptions_table(dossier: Dossier) -> Table:
    """Build the table of assumptions with one row a loop, for files."""
    columns = (
        Column("Loop", export="loop"),
        Column("Stands for", export="field"),
        Column("Taken as", export="value"),
        Column("Because", export="why"),
    )
    panel = dossier.design.panel_design
    made = [(PANEL, assumed) for assumed in (panel.assumptions if panel else ())]
    made += [(loop.tag, assumed) for loop in dossier.design.loops for assumed in loop.assumptions]
    return Table("", columns, tuple(Row((word(whose), word(a.field), word(a.value), word(a.why))) for whose, a in made))


def deviations_page(dossier: Dossier, place: Place) -> PageView:
    """Build the register of rules that are broken or overridden, musts first."""
    found = [(loop, finding) for loop in dossier.design.loops for finding in loop.findings if finding.outcome in _DEVIATES]
    found.sort(key=lambda pair: _WEIGHT_ORDER[pair[1].weight])
    columns = (Column("Loop"), Column("Rule"), Column("Weight"), Column("What it says here"), Column("Outcome"), Column("Reason given"))
    rows = (*_panel_deviations(dossier, place), *(_deviation_row(dossier, place, loop, finding) for loop, finding in found))
    table = Table("", columns, rows, wide=True, empty="No rule is broken or overridden.")
    kicker = "Every rule that is broken or overridden; a broken must-rule holds its loop, or the panel"
    return frame(dossier, place, "Deviations", (Section("1", "deviations", "Broken and overridden rules", (table,)),), kicker=kicker)


def _panel_deviations(dossier: Dossier, place: Place) -> tuple[Row, ...]:
    panel = dossier.design.panel_design
    if panel is None:
        return ()
    writer = panel_writer(dossier)
    return tuple(
        Row(
            (
                word("panel", place.to("index.html", "panel")),
                word(finding.rule, place.rule(dossier, finding.rule)),
                word(finding.weight),
                word(finding_text(writer, finding)),
                word(OUTCOMES[finding.outcome]),
                DASH,
            )
        )
        for finding in sorted(panel.findings, key=lambda finding: _WEIGHT_ORDER[finding.weight])
        if finding.outcome in _DEVIATES
    )


def _deviation_row(dossier: Dossier, place: Place, decided: DecidedLoop, finding: Finding) -> Row:
    choose = decided.loop.choose
    reason = choose.because if choose is not None and finding.outcome == "overridden" else None
    return Row(
        (
            word(decided.tag, place.sheet(decided.tag)),
            word(finding.rule, place.rule(dossier, finding.rule)),
            word(finding.weight),
            word(finding_text(dossier.writers[decided.tag], finding)),
            word(OUTCOMES[finding.outcome]),
            word(with_stop(reason)) if reason else DASH,
        )
    )
