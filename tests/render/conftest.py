"""The small project of tests/view as a folder of its own, its design, and the site that is built from it."""

import logging
import shutil
from html.parser import HTMLParser
from pathlib import Path

import pytest

from specgen.design.project import load_design
from specgen.render.files import dossier_files
from specgen.render.site import write_site

SOURCE = Path(__file__).parents[1] / "view" / "project"


@pytest.fixture(scope="session")
def design():
    return load_design(SOURCE, firmness=True)


@pytest.fixture(scope="session")
def files(design):
    return dossier_files(design)


@pytest.fixture
def project(tmp_path):
    folder = tmp_path / "project"
    shutil.copytree(SOURCE, folder)
    return folder


@pytest.fixture(scope="session")
def site(tmp_path_factory, design):
    folder = tmp_path_factory.mktemp("built") / "project"
    shutil.copytree(SOURCE, folder)
    for private in ("issued/A/record.json", "reviews/note.yml", "data/tic.csv", "data/old.md"):
        file = folder / "loops" / private
        file.parent.mkdir(parents=True, exist_ok=True)
        file.write_text("secret")
    (folder / "loops" / "README.md").write_text("# About this folder\n\n[Hand over](handover.md)\n")
    (folder / "loops" / "photo.png").write_bytes(b"\x89PNG")
    logging.getLogger("mkdocs").setLevel(logging.ERROR)
    return write_site(folder, design)


class Reader(HTMLParser):
    """Collects what a page links to, its ids, its elements and its text."""

    def __init__(self, text):
        super().__init__()
        self.links, self.ids, self.tags, self.text = [], [], [], ""
        self.feed(text)
        self.close()

    def handle_starttag(self, tag, attrs):
        self.tags.append((tag, dict(attrs)))
        for name, value in attrs:
            if name in ("href", "src", "srcset", "action", "data"):
                self.links.append((tag, value))
            elif name == "id":
                self.ids.append(value)

    def handle_data(self, data):
        self.text += data


@pytest.fixture(scope="session")
def read():
    return Reader
