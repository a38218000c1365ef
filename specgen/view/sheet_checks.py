"""Section Site checks of a sheet: what the installer measures and watches, with room for readings."""

from specgen.design.check import GROUPS
from specgen.design.site_checks import site_checks
from specgen.design.types import DecidedLoop
from specgen.model.panel import Panel
from specgen.view.cells import says
from specgen.view.checks_table import group_table
from specgen.view.shapes import Note, Section, Sentence, Shape
from specgen.view.writer import Writer

_NOTE = Note("Readings", "Each row keeps its name from revision to revision, so that a reading can be brought back to it.")


def checks_section(writer: Writer, decided: DecidedLoop, panel: Panel | None, number: str) -> Section:
    """Build the section, a table a group in the order of the work."""
    if panel is None:
        return Section(number, "site-checks", "Site checks", (Sentence(says("panel.yml could not be read."), quiet=True),))
    checks = site_checks(decided, panel)
    tables = [group_table(writer, checks, group) for group in GROUPS]
    text = "In this order; the checks of the whole panel come first. A group is finished before the next one starts."
    blocks: tuple[Shape, ...] = (Sentence(says(text), quiet=True, notes=(_NOTE,)), *(table for table in tables if table is not None))
    return Section(number, "site-checks", "Site checks", blocks)
