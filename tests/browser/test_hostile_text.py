"""Text that tries to run something, in every text field of panel and loop, decided or refused: nothing runs."""

import pytest

pytestmark = pytest.mark.browser


def test_nothing_of_the_users_text_runs_anywhere(watched, hostile):
    page = watched.page
    page.add_init_script("window.ran = []; window.hit = (which) => window.ran.push(which);")
    home = hostile.resolve().as_uri()
    paths = sorted(hostile.rglob("*.html"))
    assert (hostile / "loops" / "TIC-1.html") in paths
    for path in paths:
        page.goto(path.resolve().as_uri())
        page.wait_for_load_state("load")
        found = page.evaluate(
            """() => ({ran: window.ran, images: document.images.length,
            scripts: [...document.scripts].filter((one) => !one.src.includes('/assets/')).length,
            links: [...document.links].filter((one) => one.protocol === 'javascript:').length,
            handlers: [...document.querySelectorAll('*')]
              .filter((one) => [...one.attributes].some((at) => at.name.startsWith('on'))).length})"""
        )
        assert found == {"ran": [], "images": 0, "scripts": 0, "links": 0, "handlers": 0}, path.name
    assert [url for url in watched.asked if not url.startswith(home)] == []


def test_nor_does_it_while_the_page_is_worked_on(watched, hostile):
    page = watched.page
    page.add_init_script("window.ran = []; window.hit = (which) => window.ran.push(which);")
    page.goto((hostile / "loops" / "TIC-1.html").resolve().as_uri())
    page.get_by_role("button", name="Notes").click()
    for at in range(0, page.locator("button.add").count(), 7):
        page.locator("button.add").nth(at).click()
        page.locator(".note textarea").last.fill('"><img src=x onerror=hit(99)>')
        page.locator(".note button[type=submit]").last.click()
    page.keyboard.press("/")
    for words in ("hit", "script", "TIC-1", "<"):
        page.locator("#search-words").fill(words)
        page.wait_for_timeout(100)
    page.reload()
    assert page.evaluate("window.ran") == []
    assert page.locator("img").count() == 0


def test_the_text_itself_is_shown(watched, hostile):
    watched.page.goto((hostile / "loops" / "TIC-1.html").resolve().as_uri())
    text = watched.page.locator("body").inner_text()
    assert "javascript:hit(5)" in text
    assert '"><img src=x onerror=hit(12)>' in text
