"""Every page in a real browser: no wider than the window, asks nothing of another machine, complains of nothing, axe finds nothing."""

import shutil
import subprocess

import pytest

pytestmark = pytest.mark.browser
WIDTHS = (768, 1440)


def pages_of(site):
    return sorted(path.relative_to(site).as_posix() for path in site.rglob("*.html"))


@pytest.mark.parametrize("width", WIDTHS)
def test_pages_fit_and_keep_to_themselves_from_a_disk(watched, site, width):
    watched.page.set_viewport_size({"width": width, "height": 900})
    home = site.resolve().as_uri()
    for path in pages_of(site):
        watched.page.goto(f"{home}/{path}")
        wide = watched.page.evaluate("document.documentElement.scrollWidth - document.documentElement.clientWidth")
        assert wide <= 0, f"{path} is {wide} px wider than {width}"
    assert [url for url in watched.asked if not url.startswith(home)] == []


def test_a_server_is_asked_for_nothing_but_its_own_files(watched, served, site):
    for path in pages_of(site):
        watched.page.goto(f"{served}/{path}")
        watched.page.evaluate("document.querySelector('.tools button')?.click()")
    watched.page.goto(f"{served}/loops.html")
    watched.page.keyboard.press("/")
    watched.page.keyboard.type("contactor")
    watched.page.locator(".found a").first.wait_for()
    assert [url for url in watched.asked if not url.startswith(served)] == []


def test_axe_finds_nothing_on_any_page(watched, served, site):
    from axe_playwright_python.sync_playwright import Axe  # noqa: PLC0415  an extra of the developers

    axe = Axe()
    for path in pages_of(site):
        watched.page.goto(f"{served}/{path}")
        found = axe.run(watched.page).response["violations"]
        told = [(one["id"], [node["html"][:120] for node in one["nodes"][:3]]) for one in found]
        assert told == [], path


def test_axe_finds_nothing_while_the_page_is_worked_on(watched, served):
    from axe_playwright_python.sync_playwright import Axe  # noqa: PLC0415  an extra of the developers

    page = watched.page
    page.goto(f"{served}/loops/TIC-1.html")
    page.get_by_role("button", name="Notes").click()
    page.locator("button.add").first.click()
    page.locator(".note textarea").fill("Why?")
    for wanted in ("Keep", ""):
        found = Axe().run(page).response["violations"]
        assert [(one["id"], one["nodes"][0]["html"][:120]) for one in found] == []
        if wanted:
            page.get_by_role("button", name=wanted, exact=True).click()
    page.keyboard.press("/")
    page.keyboard.type("TIC")
    page.locator(".found a").first.wait_for()
    assert [one["id"] for one in Axe().run(page).response["violations"]] == []


def test_a_page_reads_in_order_by_keyboard(watched, site):
    """The first tab leads past the head; focus is seen."""
    page = watched.page
    page.goto((site / "loops" / "TIC-1.html").resolve().as_uri())
    page.keyboard.press("Tab")
    assert page.evaluate("document.activeElement.textContent") == "Skip to the content"
    page.keyboard.press("Tab")
    outline = page.evaluate("getComputedStyle(document.activeElement).outlineStyle")
    assert outline == "solid"


@pytest.mark.parametrize("path", ["loops/TIC-1.html", "loops.html", "site-checks.html"])
def test_the_keyboard_reaches_everything_that_can_be_used(watched, site, path):
    page = watched.page
    page.goto((site / path).resolve().as_uri())
    usable = page.evaluate(
        """() => { const all = [...document.querySelectorAll('a[href], button, input, select, textarea, [tabindex="0"]')];
        const shown = all.filter((one) => one.getClientRects().length && !one.disabled);
        shown.forEach((one, at) => { one.dataset.reach = at; }); return shown.length; }"""
    )
    assert usable > 20
    reached = set()
    for _ in range(usable + 2):
        page.keyboard.press("Tab")
        reached.add(page.evaluate("document.activeElement.dataset.reach ?? null"))
    assert reached - {None} == {str(number) for number in range(usable)}


def test_a_page_is_whole_without_scripts(chromium, site):
    context = chromium.new_context(java_script_enabled=False)
    page = context.new_page()
    for path in ("loops.html", "loops/TIC-1.html", "site-checks.html"):
        page.goto((site / path).resolve().as_uri())
        assert page.locator("button, input").count() == 0
        assert page.locator("main table tbody tr").first.is_visible()
    context.close()


@pytest.mark.parametrize("name", ["loops/TIC-1.html", "print.html"])
def test_paper_has_the_title_block_on_every_sheet(watched, site, tmp_path, name):
    pdftotext = shutil.which("pdftotext")
    assert pdftotext, "poppler-utils is not installed"
    watched.page.goto((site / name).resolve().as_uri())
    printed = tmp_path / "sheet.pdf"
    watched.page.pdf(path=str(printed), prefer_css_page_size=True)
    sheets = subprocess.run([pdftotext, "-layout", str(printed), "-"], capture_output=True, text=True, check=True).stdout.split("\f")[:-1]
    assert 3 < len(sheets) < (30 if name != "print.html" else 200)
    for number, sheet in enumerate(sheets, 1):
        assert "Approved" in sheet
        assert "B, 2026-02-03" in sheet
        if name == "print.html":
            assert f"page {number} of {len(sheets)}" in sheet
    if name == "print.html":
        assert b"URI (file" not in printed.read_bytes()  # nothing leads to where it was printed from
        text = "".join(sheets)
        assert all(text.count(f"Sheet TIC-{number}") > 1 for number in (1, 2, 3, 4))
