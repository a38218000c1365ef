"""What a sheet says about failing, cautions and site checks, and the pages that gather them."""

import pytest

from specgen.design.cautions import cautions_of
from specgen.design.fault_walk import TITLES
from specgen.design.site_checks import panel_checks, site_checks
from specgen.view.frame import PAGE_ROWS
from specgen.view.shapes import Notice, Sentence, Table

CLEARANCE = ("complies", "compliant", "is safe", "are safe", "safe to", "no risk", "is enough", "approved", "certifies", "guarantee")


def blocks(page, anchor, kind):
    section = next(section for section in page.sections if section.anchor == anchor)
    return [block for block in section.blocks if isinstance(block, kind)]


def test_every_sheet_walks_every_fault(pages, design):
    for loop in design.loops:
        heads = [block.spans[0].text for block in blocks(pages[f"loops/{loop.tag}.html"], "faults", Sentence) if block.spans[0].strong]
        assert heads == [f"{title}. " for title in TITLES.values()]


def test_every_caution_of_a_loop_stands_on_its_sheet(pages, design):
    for loop in design.loops:
        notices = blocks(pages[f"loops/{loop.tag}.html"], "cautions", Notice)
        assert [notice.head for notice in notices] == [f"{found.caution.head}." for found in cautions_of(loop)]
        assert notices
        assert all(notice.kind == "hazard" and "decide" in notice.spans[-1].text for notice in notices)


def test_every_check_is_a_row_with_room_for_reading_and_initials(pages, design):
    for loop in design.loops:
        rows = [row for table in blocks(pages[f"loops/{loop.tag}.html"], "site-checks", Table) for row in table.rows]
        assert [row.anchor for row in rows] == [check.id for check in site_checks(loop, design.panel)]
        assert all(row.cells[-1].text == row.cells[-2].text == "" for row in rows)
        assert all(row.cells[0].text and row.cells[1].text for row in rows)


def test_the_page_of_checks_has_the_panel_and_every_loop(pages, design):
    rows = [row for section in pages["site-checks.html"].sections for block in section.blocks for row in block.rows]
    wanted = [check.id for check in panel_checks(design.panel)]
    wanted += [check.id for loop in design.loops for check in site_checks(loop, design.panel)]
    assert sorted(row.anchor for row in rows if not row.heading) == sorted(wanted)
    assert rows[0].heading == f"Panel {design.panel.panel.reference}"


def test_the_page_of_cautions_names_each_hazard_once_with_its_loops(pages, design, text_of):
    heads = [notice.head for notice in blocks(pages["cautions.html"], "hazards", Notice)]
    assert len(heads) == len(set(heads))
    assert set(heads) == {f"{found.caution.head}." for loop in design.loops for found in cautions_of(loop)}
    assert "no performance level and no integrity level is claimed" in text_of(pages["cautions.html"], "limits")


@pytest.mark.parametrize("anchor", ["faults", "cautions", "site-checks"])
def test_nothing_reads_as_clearance(pages, design, text_of, anchor):
    for loop in design.loops:
        said = text_of(pages[f"loops/{loop.tag}.html"], anchor)
        page = pages[f"loops/{loop.tag}.html"]
        said += " ".join(span.text for notice in blocks(page, anchor, Notice) for span in notice.spans)
        assert not [word for word in CLEARANCE if word in said.replace("whether an alarm is enough", "")]


def test_the_guide_leads_each_reader_to_pages_that_are_there(pages):
    guide = pages["guide.html"]
    there = {row.path for row in PAGE_ROWS}
    for anchor in ("reviewer", "purchaser", "installer"):
        items = next(section for section in guide.sections if section.anchor == anchor).blocks[0].items
        assert len(items) >= 2
        assert all(item.spans[-1].href in there for item in items)
