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


def test_batches_hold_every_page_once_in_order(design, read):
    found = [read(content.decode()) for content in batches(dossier_of(design), most=150_000)]
    assert len(found) > 3
    wanted = [row.path.removesuffix(".html") for row in PAGE_ROWS if row.path != "print.html"]
    wanted += [f"loops/{loop.tag}" for loop in design.loops]
    assert [name for page in found for name in page.ids if name in set(wanted)] == wanted
    for page in found:
        links = [link for tag, link in page.links if tag == "a"]
        assert all(link[1:] in page.ids for link in links if link.startswith("#"))


def test_the_panels_own_checks_are_left_where_the_sheets_are_printed_elsewhere(design, monkeypatch, read):
    monkeypatch.setattr(print_page, "MOST_SHEETS", 3)
    page = read(files_of(dossier_of(design))["print.html"].decode())
    checks = [name for name in page.ids if name.startswith("site-checks:")]
    assert "site-checks:T-1.energise.isolation" in checks
    assert not [name for name in checks if ":TIC-" in name]
    assert "No loop could be decided" not in page.text


def test_nothing_on_paper_leads_out_of_it(files, read):
    text = files["print.html"].decode()
    outside = [link for tag, link in read(text[text.index("<main") :]).links if tag == "a" and not link.startswith("#")]
    # the neighbours of the page itself are for the screen only
    assert set(outside) <= {row.path for row in PAGE_ROWS}


@given(st.text())
def test_no_text_of_a_user_is_taken_for_an_attribute(text):
    article = f"<p>{escaped(text)}</p><p>{escaped(chr(32) + 'id=' + chr(34) + text + chr(34))}</p>"
    assert relinked(article, "loops/T-1.html", ()) == article
