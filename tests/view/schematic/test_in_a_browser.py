"""Every kind of schematic in a real browser: where the words truly stand, with the faces that are installed."""

import shutil
from pathlib import Path

import pytest

from specgen.render.environment import TEMPLATES, environment

pytestmark = pytest.mark.browser

# places in the drawing's own units, a little of a line's leading left away
MEASURE = """() => [...document.querySelectorAll('svg.schematic')].flatMap(svg => {
  const boxes = [...svg.querySelectorAll('text')].map(t => {
    const b = t.getBBox();
    return [t.textContent, b.x + .3, b.y + b.height * .2, b.x + b.width - .3, b.y + b.height * .84];
  });
  const view = svg.viewBox.baseVal, name = svg.parentElement.id, found = [];
  boxes.forEach((a, i) => {
    if (a[1] < 0 || a[2] < 0 || a[3] > view.width || a[4] > view.height) found.push([name, a[0], 'outside']);
    boxes.slice(i + 1).forEach(b => {
      if (a[1] < b[3] && b[1] < a[3] && a[2] < b[4] && b[2] < a[4]) found.push([name, a[0], b[0]]);
    });
  });
  return found;
})"""


def test_no_word_of_any_schematic_stands_on_another(drawn):
    from playwright.sync_api import sync_playwright  # noqa: PLC0415  an extra of the developers

    draw = environment().get_template("shapes/drawing.html").module.draw
    style = (Path(TEMPLATES) / "assets" / "dossier.css").read_text()
    body = "".join(f"<section>{draw(drawing)}</section>" for _, _, drawing in drawn)
    found = next((path for name in ("chromium", "chromium-browser", "google-chrome") if (path := shutil.which(name))), None)
    assert found, "no Chromium is installed"
    with sync_playwright() as playwright:
        browser = playwright.chromium.launch(executable_path=found, args=["--no-sandbox"])
        page = browser.new_page(viewport={"width": 1280, "height": 900})
        page.set_content(f"<!doctype html><style>{style}</style>{body}")
        assert page.evaluate("document.querySelectorAll('svg.schematic').length") == len(drawn) > 200
        assert page.evaluate(MEASURE) == []
        browser.close()
