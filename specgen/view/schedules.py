"""The schedules: controller outputs and what they drive."""

from specgen.design.types import DecidedLoop
from specgen.sizing.device import DeviceChoice
from specgen.view.cells import DASH, NO_NUMBER, number, says, verdict_cell, word
from specgen.view.dossier import Dossier
from specgen.view.frame import Place, frame
from specgen.view.panel_page import ruling, sections_of
from specgen.view.shapes import Column, Note, PageView, Row, Sentence, Shape, Table
from specgen.view.summary import designated, summary_of
from specgen.view.words import OUTPUTS

_NOTE = (
    Note("Designations", "IEC 81346: =TIC101 is the loop, -Q1 or -K1 the device in it. No other loop renumbers them."),
    Note("In the CSV file", "text that begins with = + - or @ stands behind an apostrophe, so that no spreadsheet computes it."),
)


def outputs_page(dossier: Dossier, place: Place) -> PageView:
    """Build the schedule of controller outputs."""
    table = outputs_table(dossier, place)
    remark = Sentence(says("One row a loop: the controller output it takes and the device that output drives."), quiet=True, notes=_NOTE)
    sections = sections_of((("outputs", "Controller outputs", (remark, table)), ("spare", "Spare outputs", _spare(dossier, place))))
    return frame(dossier, place, "Outputs", sections, kicker="Controller outputs and what they drive")


def _spare(dossier: Dossier, place: Place) -> tuple[Shape, ...]:
    """Count the outputs of each kind that are taken and left."""
    panel = dossier.design.panel_design
    if panel is None:
        return ()
    columns = (Column("Kind"), Column("Taken", number=True), Column("There", number=True), Column("Left", number=True))
    rows = tuple(
        Row((word(OUTPUTS[count.sort]), *(number(str(n), n) for n in (count.used, count.there, count.there - count.used))))
        for count in panel.outputs
        if count.used or count.there
    )
    return (*ruling(dossier, place, panel, ("E6",)), Table("", columns, rows, empty="No output is taken or declared."))


def outputs_table(dossier: Dossier, place: Place) -> Table:
    """Build the table of controller outputs."""
    columns = (
        Column("Loop", export="loop"),
        Column("Service", export="service"),
        Column("Verdict", export="verdict"),
        Column("Controller output", export="controller output"),
        Column("Designation", export="designation"),
        Column("Device", export="device"),
        Column("Rating", "A", number=True, export="rating [A]"),
        Column("Current", "A", number=True, export="current [A]"),
    )
    rows = tuple(_row(dossier, place, loop) for loop in dossier.design.loops)
    return Table("", columns, rows, wide=True, empty="No loop could be decided.")


def _row(dossier: Dossier, place: Place, decided: DecidedLoop) -> Row:
    case = decided.decision.chosen.case
    writer = dossier.writers[decided.tag]
    device = case.device if isinstance(case.device, DeviceChoice) else None
    rating = device.rating if device else None
    current = device.current if device else None
    return Row(
        (
            word(decided.tag, place.sheet(decided.tag, "hardware")),
            word(decided.loop.service),
            verdict_cell(decided.verdict),
            word(OUTPUTS[device.controller_output]) if device else DASH,
            word(designated(decided.tag, case.candidate.device)),
            word(device.name if device else summary_of(decided).device),
            NO_NUMBER if rating is None else number(writer.bare(rating), rating),
            NO_NUMBER if current is None else number(writer.bare(current), current),
        )
    )
