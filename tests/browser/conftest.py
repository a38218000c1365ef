"""A real browser, the small project of tests/view built for it, and one in which every text field tries to run something."""

import logging
import os
import shutil
import threading
from functools import partial
from http.server import SimpleHTTPRequestHandler, ThreadingHTTPServer
from pathlib import Path

import pytest

from specgen.design.project import load_design
from specgen.render.pdf import PdfError, find_browser
from specgen.render.site import write_site

SOURCE = Path(__file__).parents[1] / "view" / "project"
HOSTILE = Path(__file__).parent / "hostile"


@pytest.fixture(scope="session")
def browser_path():
    try:
        return find_browser()
    except PdfError as error:
        if os.environ.get("SPECGEN_NEEDS_BROWSER") == "1":
            pytest.fail(str(error))
        pytest.skip(str(error))


@pytest.fixture(scope="module")  # two of these cannot be open at once, and other folders have one of their own
def chromium(browser_path):
    from playwright.sync_api import sync_playwright  # noqa: PLC0415  an extra of the developers

    with sync_playwright() as playwright:
        browser = playwright.chromium.launch(executable_path=str(browser_path), args=["--no-sandbox"])
        yield browser
        browser.close()


def built(source, folder):
    shutil.copytree(source, folder)
    logging.getLogger("mkdocs").setLevel(logging.ERROR)
    return write_site(folder, load_design(folder, remember=False))


@pytest.fixture(scope="session")
def site(tmp_path_factory):
    return built(SOURCE, tmp_path_factory.mktemp("browsed") / "project")


@pytest.fixture(scope="session")
def hostile(tmp_path_factory):
    return built(HOSTILE, tmp_path_factory.mktemp("hostile") / "project")


class _Quiet(SimpleHTTPRequestHandler):
    def log_message(self, *arguments):
        """Say nothing."""


@pytest.fixture(scope="session")
def served(site):
    """Serve the site as any plain server would."""
    server = ThreadingHTTPServer(("127.0.0.1", 0), partial(_Quiet, directory=str(site)))
    thread = threading.Thread(target=server.serve_forever)
    thread.start()
    yield f"http://127.0.0.1:{server.server_port}"
    server.shutdown()
    thread.join()
    server.server_close()


class Watched:
    """A page, what it complained of, what it asked for, and what ran that should not have."""

    def __init__(self, page):
        self.page = page
        self.complaints, self.asked = [], []
        page.on("console", lambda message: self.complaints.append(message.text))
        page.on("pageerror", lambda error: self.complaints.append(str(error)))
        page.on("dialog", lambda dialog: (self.complaints.append(dialog.message), dialog.dismiss()))
        page.on("request", lambda request: self.asked.append(request.url))


@pytest.fixture
def watched(chromium):
    context = chromium.new_context(viewport={"width": 1280, "height": 900}, accept_downloads=True)
    seen = Watched(context.new_page())
    yield seen
    assert seen.complaints == []
    context.close()
