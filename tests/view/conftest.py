"""A small project of five loops: met, held, open, not readable, and with text that must be escaped."""

from pathlib import Path

import pytest

from specgen.design.project import load_design
from specgen.view.dossier import OwnPage, dossier_of
from specgen.view.pages import page_views
from specgen.view.shapes import Item, List, Notice, Sentence, Span, Table

PROJECT = Path(__file__).parent / "project"


@pytest.fixture(scope="session")
def design():
    return load_design(PROJECT)


@pytest.fixture(scope="session")
def dossier(design):
    return dossier_of(design, [OwnPage("Handing over", "handover.html")])


@pytest.fixture(scope="session")
def pages(dossier):
    return {view.path: view for view in page_views(dossier)}


@pytest.fixture(scope="session")
def loop(design):
    by_tag = {decided.tag: decided for decided in design.loops}
    return by_tag.__getitem__


_TEXTS = ("name", "formula", "filled", "result", "source", "case", "title", "caption")


def words(block):
    """Return every text of a shape or page, in order."""
    if isinstance(block, str):
        return block
    if isinstance(block, Span):
        return block.text
    if isinstance(block, tuple):
        return " ".join(words(part) for part in block)
    if isinstance(block, Sentence):
        return "".join(span.text for span in block.spans)
    if isinstance(block, Item):
        return f"{block.label} {block.mark.word if block.mark else ''} {''.join(span.text for span in block.spans)} {block.aside}"
    if isinstance(block, List | Notice):
        return words(block.items)
    if isinstance(block, Table):
        return " ".join(f"{cell.text}{''.join(s.text for s in cell.spans)} {cell.aside}" for row in block.rows for cell in row.cells)
    return " ".join(str(getattr(block, name)) for name in _TEXTS if hasattr(block, name))


@pytest.fixture(scope="session")
def text_of():
    """Return the words of a section, found by its anchor."""

    def find(page, anchor=None):
        if anchor is None:
            return " ".join(words(block) for section in page.sections for block in section.blocks)
        section = next(section for section in page.sections if section.anchor == anchor)
        return " ".join(words(block) for block in section.blocks)

    return find
