"""Pages in a real browser: nothing wider than the window, nothing asked of another machine, no complaint in the console."""

import shutil

import pytest

pytestmark = pytest.mark.browser
WIDTHS = (768, 1440)


@pytest.fixture(scope="module")
def chromium():
    from playwright.sync_api import sync_playwright  # noqa: PLC0415  an extra of the developers

    found = next((path for name in ("chromium", "chromium-browser", "google-chrome") if (path := shutil.which(name))), None)
    assert found, "no Chromium is installed"
    with sync_playwright() as playwright:
        browser = playwright.chromium.launch(executable_path=found, args=["--no-sandbox"])
        yield browser
        browser.close()


@pytest.mark.parametrize("width", WIDTHS)
def test_pages_fit_and_keep_to_themselves(chromium, site, width):
    page = chromium.new_page(viewport={"width": width, "height": 900})
    complaints, asked = [], []
    page.on("console", lambda message: complaints.append(message.text))
    page.on("pageerror", lambda error: complaints.append(str(error)))
    page.on("request", lambda request: asked.append(request.url))
    home = site.resolve().as_uri()
    for path in sorted(site.rglob("*.html")):
        page.goto(path.resolve().as_uri())
        wide = page.evaluate("document.documentElement.scrollWidth - document.documentElement.clientWidth")
        assert wide <= 0, f"{path.name} is {wide} px wider than {width}"
    assert complaints == []
    assert [url for url in asked if not url.startswith(home)] == []
    page.close()


def test_a_page_reads_in_order_by_keyboard(chromium, site):
    """The first tab leads past the head; focus is seen."""
    page = chromium.new_page(viewport={"width": 1280, "height": 900})
    page.goto((site / "loops" / "TIC-1.html").resolve().as_uri())
    page.keyboard.press("Tab")
    assert page.evaluate("document.activeElement.textContent") == "Skip to the content"
    page.keyboard.press("Tab")
    outline = page.evaluate("getComputedStyle(document.activeElement).outlineStyle")
    assert outline == "solid"
    page.close()


def test_paper_has_the_title_block_on_every_sheet(chromium, site, tmp_path):
    pdftotext = shutil.which("pdftotext")
    assert pdftotext, "poppler-utils is not installed"
    import subprocess  # noqa: PLC0415  beside what it is for

    page = chromium.new_page()
    page.goto((site / "loops" / "TIC-1.html").resolve().as_uri())
    printed = tmp_path / "sheet.pdf"
    page.pdf(path=str(printed), prefer_css_page_size=True)
    page.close()
    sheets = subprocess.run([pdftotext, "-layout", str(printed), "-"], capture_output=True, text=True, check=True).stdout.split("\f")[:-1]
    assert 3 < len(sheets) < 30
    for sheet in sheets:
        assert "Approved" in sheet
        assert "B, 2026-02-03" in sheet
