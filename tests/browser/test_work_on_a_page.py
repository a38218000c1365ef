"""Working on a page: sorting, filtering, searching, reading a curve, notes and as-left values; all of it from a disk."""

import json
import re
from pathlib import Path

import pytest

from specgen.render.environment import TEMPLATES

pytestmark = pytest.mark.browser


@pytest.fixture
def shown(watched, site):
    def go(path):
        watched.page.goto((site / path).resolve().as_uri())
        return watched.page

    return go


def column(page, number):
    return page.locator("main table").first.locator(f"tbody tr:not(.group) > :nth-child({number})").all_inner_texts()


def test_a_head_sorts_up_down_and_back_by_keyboard(shown):
    page = shown("parts.html")
    before = column(page, 1)
    head = page.locator("main thead th").first
    head.locator("button").focus()
    page.keyboard.press("Enter")
    assert head.get_attribute("aria-sort") == "ascending"
    up = column(page, 1)
    page.keyboard.press("Enter")
    assert head.get_attribute("aria-sort") == "descending"
    down = column(page, 1)
    page.keyboard.press("Enter")
    assert head.get_attribute("aria-sort") is None
    assert column(page, 1) == before
    assert sorted(up) == sorted(down) == sorted(before)
    assert up[0] < up[-1]
    assert down[0] == up[-1]


def test_numbers_sort_as_numbers_with_their_units_and_what_has_none_last(shown):
    page = shown("loops.html")
    page.evaluate(
        """() => { const body = document.querySelector('main tbody');
        const cells = ['900\\u2009ms', '2\\u2009min', '\\u2013', '30\\u2009s', '1\\u2009000\\u2009s', '\\u22125\\u2009s', '1\\u2009h'];
        document.querySelector('main').innerHTML = '<section><table><thead><tr><th class="n">t</th></tr></thead><tbody>'
          + cells.map((text) => `<tr><td class="n">${text}</td></tr>`).join('') + '</tbody></table></section>'; }"""
    )
    page.evaluate((Path(TEMPLATES) / "assets" / "tables.js").read_text(encoding="utf-8"))
    page.locator("main thead button").click()
    assert column(page, 1) == ["\u22125\u2009s", "900\u2009ms", "30\u2009s", "2\u2009min", "1\u2009000\u2009s", "1\u2009h", "\u2013"]
    page.locator("main thead button").click()
    assert column(page, 1)[0] == "1\u2009h"
    assert column(page, 1)[-1] == "\u2013"


def test_the_filter_counts_what_it_leaves(shown):
    page = shown("parts.html")
    status = page.locator(".filter [role=status]")
    whole = page.locator("main tbody tr:not(.group)").count()
    assert status.inner_text() == f"{whole} rows"
    page.locator("#filter").fill("tic1-q1")
    rows = page.locator("main tbody tr:not(.group):visible").all_inner_texts()
    assert rows
    assert all("TIC1-Q1" in row for row in rows)
    assert status.inner_text() == f"{len(rows)} of {whole} rows"
    page.locator("#filter").fill("no such thing")
    assert status.inner_text() == f"0 of {whole} rows"
    page.keyboard.press("Escape")
    assert page.locator("main tbody tr:visible").count() >= whole


def test_site_checks_keep_their_order(shown):
    page = shown("site-checks.html")
    assert page.locator("thead button").count() == 0
    assert page.locator("#filter").count() == 1


@pytest.mark.parametrize(
    ("words", "first", "leads"),
    [
        ("TIC-1", "TIC-1", "loops/TIC-1.html"),
        ("tic-2 basis", "TIC-2 Basis", "loops/TIC-2.html#basis"),
        ("m13", "M13", "rule-book.html#M13"),
        ("=TIC1-Q1", "=TIC1-Q1", "loops/TIC-1.html#hardware"),
        ("open points", "Open points", "open-points.html"),
    ],
)
def test_search_finds_and_enter_opens_the_first(shown, words, first, leads):
    page = shown("loops/TIC-3.html")
    page.keyboard.press("/")
    page.keyboard.type(words)
    link = page.locator(".found a").first
    link.wait_for()
    page.wait_for_function("!document.querySelector('dialog [role=status]').textContent.includes('still')")
    assert page.locator(".found a").first.inner_text() == first
    page.keyboard.press("Enter")
    page.wait_for_url(f"**/{leads}")


def test_arrows_walk_through_what_was_found_and_escape_leads_back(shown):
    page = shown("index.html")
    page.get_by_role("button", name="Search").click()
    page.keyboard.type("TIC")
    page.locator(".found a").first.wait_for()
    page.keyboard.press("ArrowDown")
    page.keyboard.press("ArrowDown")
    assert page.evaluate("document.activeElement === document.querySelectorAll('.found a')[1]")
    page.keyboard.press("Escape")
    assert page.evaluate("document.activeElement.textContent") == "Search"


def test_a_slash_typed_into_a_field_stays_there(shown):
    page = shown("site-checks.html")
    page.locator("td input").first.click()
    page.keyboard.type("1/2")
    assert page.locator("td input").first.input_value() == "1/2"


def number_in(text, unit):
    return float(re.search(rf"(\u2212?[\d.]+)\s{re.escape(unit)}", text)[1].replace("\u2212", "-"))


def test_the_reading_line_reads_what_is_drawn(shown):
    """At the marked worst point it reads the number that is written there."""
    page = shown("loops/TIC-1.html")
    glass = page.locator("#cycles .glass")
    glass.scroll_into_view_if_needed()
    data = json.loads(page.locator("#cycles").get_attribute("data-plot"))["readings"][0]
    marked = page.locator("#cycles circle.point").first
    box = marked.bounding_box()
    page.mouse.move(box["x"] + box["width"] / 2, box["y"] + box["height"] / 2)
    said = page.locator("#cycles .readout").inner_text()
    label = page.locator("#cycles text", has_text=re.compile("^(highest|lowest) ")).first.text_content()
    unit = data["y_unit"]
    room = abs(data["y"][3] - data["y"][2]) / abs(data["y"][1] - data["y"][0])
    assert number_in(said, unit) == pytest.approx(number_in(label, unit), abs=2 * room)
    glass.focus()
    page.keyboard.press("Home")
    assert glass.get_attribute("aria-valuetext").startswith("At 0")
    page.keyboard.press("End")
    assert number_in(glass.get_attribute("aria-valuetext"), data["x_unit"]) == pytest.approx(data["x"][3], rel=0.01)
    page.keyboard.press("ArrowLeft")
    assert glass.get_attribute("aria-valuenow") == "199"


def test_the_sliders_readings_are_the_records_and_the_tables(shown, site):
    page = shown("loops/TIC-1.html")
    record = json.loads((site / "data" / "TIC-1.json").read_text(encoding="utf-8"))
    slider, said = page.locator("#trade-off input"), page.locator("#trade-off output")
    assert said.inner_text().endswith("the choice")
    swing = number_in(said.inner_text().partition("swing ")[2], "K")
    assert swing == pytest.approx(record["predicted"]["swing"], rel=0.005)
    assert number_in(said.inner_text(), "K") == pytest.approx(record["settings"]["differential"], rel=1e-6)
    rows = page.locator("figure#trade-off ~ .table").first.locator("tbody tr").all_inner_texts()
    slider.focus()
    page.keyboard.press("Home")
    for row in rows:
        text = said.inner_text()
        for cell in row.split("\t")[:4]:
            assert cell.strip() in text, (row, text)
        page.keyboard.press("ArrowRight")
    assert slider.get_attribute("aria-valuetext") == said.inner_text()


def export(page):
    with page.expect_download() as waited:
        page.get_by_role("button", name=re.compile("^Export")).click()
    return waited.value.suggested_filename, json.loads(Path(waited.value.path()).read_text(encoding="utf-8"))


def test_a_note_and_a_reading_survive_a_reload_and_are_exported_once(shown):
    page = shown("loops/TIC-1.html")
    page.get_by_role("button", name="Notes").click()
    page.locator("section[aria-labelledby=settings] button.add").first.click()
    text = 'Is <img src=x onerror=alert(1)> "right"?\n\u00b5, \U0001f321'
    page.locator(".note textarea").fill(text)
    page.get_by_label("By", exact=True).fill("A. Reviewer")
    page.get_by_label("State", exact=True).select_option("answered")
    page.get_by_role("button", name="Keep", exact=True).click()
    reading = page.locator("[data-entry=reading] input").first
    check = page.locator("tr:has([data-entry=reading])").first.get_attribute("id")
    reading.fill("0.08 ohm")
    mark = page.locator("main .unexported").first
    assert mark.inner_text() == "Not exported yet from this page: 1 note and 1 reading."

    page.reload()
    assert page.locator("[data-entry=reading] input").first.input_value() == "0.08 ohm"
    assert "A. Reviewer" in page.locator(".note").inner_text()
    assert page.locator(".note img").count() == 0
    assert page.get_by_role("button", name="Export 2 unexported").is_visible()

    name, file = export(page)
    assert name.startswith("notes-T-1-B-")
    assert (file["format"], file["panel"], file["revision"]) == ("specgen-notes/1", "T-1", "B")
    note, = file["notes"]
    assert (note["tag"], note["author"], note["text"], note["state"]) == ("TIC-1", "A. Reviewer", text, "answered")
    assert note["row"].startswith("settings/")
    left, = file["as_left"]
    assert (left["tag"], left["row"], left["reading"]) == ("TIC-1", check, "0.08 ohm")
    assert page.locator("main .unexported").first.inner_text() == ""
    assert page.get_by_role("button", name="Export notes").is_visible()

    page.get_by_role("button", name="Edit the note").click()
    page.get_by_role("button", name="Remove").click()
    page.locator("[data-entry=reading] input").first.fill("")
    assert page.get_by_role("button", name=re.compile("^Export")).count() == 0


def test_a_check_has_one_reading_on_the_sheet_and_on_the_page_of_checks(shown):
    page = shown("site-checks.html")
    row = page.locator("tr[id^='TIC-2.']").first
    row.locator("[data-entry=initials] input").fill("AB")
    check = row.get_attribute("id")
    assert "1 reading" in page.locator("main .unexported").first.inner_text()
    page = shown("loops/TIC-2.html")
    assert page.locator(f"[id='{check}'] [data-entry=initials] input").input_value() == "AB"
    page = shown("index.html")
    assert page.get_by_role("button", name="Export 1 unexported").is_visible()


def test_rows_of_one_page_are_called_differently(shown):
    for path in ("loops/TIC-1.html", "rule-book.html", "parts.html"):
        page = shown(path)
        page.get_by_role("button", name="Notes").click()
        count = page.locator("button.add").count()
        for at in (0, count // 2, count - 1):
            page.locator("button.add").nth(at).click()
            page.locator(".note textarea").fill(f"{path} {at}")
            page.get_by_role("button", name="Keep", exact=True).click()
    _, file = export(page)
    assert len({(note["page"], note["row"]) for note in file["notes"]}) == len(file["notes"]) == 9


def test_a_sorted_table_keeps_notes_with_their_rows(shown):
    page = shown("parts.html")
    page.get_by_role("button", name="Notes").click()
    page.locator("main tbody tr").nth(1).locator("button.add").click()
    page.locator(".note textarea").fill("this one")
    page.get_by_role("button", name="Keep", exact=True).click()
    whose = page.locator("tr:has(+ tr.noted) th").inner_text()
    page.locator("main thead button").first.click()
    page.locator("main thead button").first.click()
    assert page.locator("tr:has(+ tr.noted) th").inner_text() == whose
