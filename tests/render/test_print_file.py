"""The whole dossier on one page: every page and sheet in order, no identifier twice, every link within it where that can be."""

from collections import Counter

from hypothesis import given
from hypothesis import strategies as st

from specgen.render.environment import escaped
from specgen.render.files import files_of
from specgen.render.print_file import batches, relinked
from specgen.view import print_page
from specgen.view.dossier import dossier_of
from specgen.view.frame import PAGE_ROWS


def ids_in_order(text, read, wanted):
    return [name for name in read(text).ids if name in wanted]


def test_every_page_stands_on_it_in_order(files, design, read):
    wanted = [row.path.removesuffix(".html") for row in PAGE_ROWS if row.path != "print.html"]
    wanted += [f"loops/{loop.tag}" for loop in design.loops]
    assert ids_in_order(files["print.html"].decode(), read, set(wanted)) == wanted


def test_its_contents_list_leads_to_each(files, design, read):
    links = {link for _, link in read(files["print.html"].decode()).links}
    assert {f"#loops/{loop.tag}" for loop in design.loops} <= links
    assert {f"#{row.path.removesuffix('.html')}" for row in PAGE_ROWS if row.path != "print.html"} <= links


def test_no_identifier_stands_twice_and_links_lead_somewhere(files, read):
    page = read(files["print.html"].decode())
    assert [name for name, count in Counter(page.ids).items() if count > 1] == []
    for _, link in page.links:
        if link.startswith("#"):
            assert link[1:] in page.ids, link
        else:
            assert not link.startswith("../"), link


def test_rows_and_drawings_of_a_sheet_are_all_there(files, read):
    own, whole = read(files["loops/TIC-1.html"].decode()), read(files["print.html"].decode())
    mine = {f"loops/TIC-1:{name}" for name in own.ids if not name.startswith("m-")} - {"loops/TIC-1:content"}
    assert mine <= set(whole.ids)


def test_more_sheets_than_a_browser_prints_are_left_out_and_said_so(design, monkeypatch, read):
    monkeypatch.setattr(print_page, "MOST_SHEETS", 3)
    text = files_of(dossier_of(design))["print.html"].decode()
    assert "sheets are not on this page" in text
    assert "4 sheets would be more" in text
    assert 'id="loops/TIC-1"' not in text
    assert all(not link.startswith("#loops/") for _, link in read(text).links)


def test_batches_hold_every_sheet_once(design, monkeypatch, read):
    monkeypatch.setattr("specgen.render.print_file.MOST_SHEETS", 3)
    found = [read(content.decode()) for content in batches(dossier_of(design))]
    tags = [loop.tag for loop in design.loops]
    assert [[tag for tag in tags if f"loops/{tag}" in page.ids] for page in found] == [tags[:3], tags[3:]]


@given(st.text())
def test_no_text_of_a_user_is_taken_for_an_attribute(text):
    article = f"<p>{escaped(text)}</p><p>{escaped(chr(32) + 'id=' + chr(34) + text + chr(34))}</p>"
    assert relinked(article, "loops/T-1.html", ()) == article
