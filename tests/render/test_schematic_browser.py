"""Schematics in a real browser: where the words truly stand, with the faces that are installed."""

import shutil

import pytest

pytestmark = pytest.mark.browser

# boxes in the drawing's own units; a hair of a line's leading may touch
MEASURE = """() => {
  const texts = [...document.querySelectorAll('svg.schematic text')];
  const boxes = texts.map(t => { const b = t.getBBox(); return [t.textContent, b.x + .3, b.y + b.height * .2, b.x + b.width - .3, b.y + b.height * .84]; });
  const found = [];
  boxes.forEach((a, i) => boxes.slice(i + 1).forEach(b => {
    if (a[1] < b[3] && b[1] < a[3] && a[2] < b[4] && b[2] < a[4]) found.push([a[0], b[0]]);
  }));
  const view = document.querySelector('svg.schematic').viewBox.baseVal;
  const out = boxes.filter(b => b[1] < 0 || b[2] < 0 || b[3] > view.width || b[4] > view.height).map(b => b[0]);
  return [found, out, boxes.length];
}"""  # noqa: E501  a script reads best as one writes scripts


@pytest.fixture(scope="module")
def page():
    from playwright.sync_api import sync_playwright  # noqa: PLC0415  an extra of the developers

    found = next((path for name in ("chromium", "chromium-browser", "google-chrome") if (path := shutil.which(name))), None)
    assert found, "no Chromium is installed"
    with sync_playwright() as playwright:
        browser = playwright.chromium.launch(executable_path=found, args=["--no-sandbox"])
        yield browser.new_page(viewport={"width": 1280, "height": 900})
        browser.close()


def test_no_word_of_any_schematic_stands_on_another(page, site):
    seen = 0
    for path in sorted((site / "loops").glob("*.html")):
        page.goto(path.resolve().as_uri())
        overlapping, outside, count = page.evaluate(MEASURE)
        assert overlapping == [], path.name
        assert outside == [], path.name
        seen += count
    assert seen > 100


def test_a_terminal_of_the_schedule_leads_to_its_place_in_the_drawing(page, site):
    page.goto((site / "terminals.html").resolve().as_uri())
    links = page.eval_on_selector_all("tbody th a", "found => found.map(a => a.href)")
    assert links
    page.goto(links[0])
    name = links[0].rpartition("#")[2]
    assert page.evaluate("name => document.getElementById(name).getBoundingClientRect().top < innerHeight", name)
