"""What check and build cost for many loops, against reading the same files with a plain loader and MkDocs on equal Markdown pages."""

import gc
import shutil
import sys
import time
from pathlib import Path

import pytest
import yaml
from mkdocs.commands.build import build as mkdocs_build
from mkdocs.config import load_config

from specgen.design.project import load_design
from specgen.render.site import write_site

sys.path.insert(0, str(Path(__file__).parent))
from equal_markdown import markdown_of
from make_loops import loop_texts

pytestmark = pytest.mark.benchmark
CONFIG = "site_name: Many loops\ndocs_dir: loops\ntheme: {name: specgen}\nplugins: [specgen]\n"


def project(folder, count):
    (folder / "loops").mkdir(parents=True)
    for name, text in loop_texts(count).items():
        (folder / "loops" / name).write_text(text, encoding="utf-8")
    (folder / "mkdocs.yml").write_text(CONFIG, encoding="utf-8")
    return folder


def timed(work):
    gc.collect()
    start = time.perf_counter()
    made = work()
    return time.perf_counter() - start, made


def plain_loader(folder):
    for file in sorted((folder / "loops").glob("*.yml")):
        list(yaml.load_all(file.read_bytes(), Loader=yaml.CSafeLoader))


def plain_mkdocs(folder, site):
    """Build the sheets of a site as Markdown pages with MkDocs' own theme and nothing else, its search left off."""
    docs = folder / "docs"
    docs.mkdir(parents=True)
    for sheet in sorted((site / "loops").glob("*.html")):
        (docs / f"{sheet.stem}.md").write_text(markdown_of(sheet.read_text(encoding="utf-8")), encoding="utf-8")
    (docs / "index.md").write_text("# Index\n", encoding="utf-8")
    (folder / "mkdocs.yml").write_text("site_name: Plain\nplugins: []\nuse_directory_urls: false\nnav: [index.md]\n", encoding="utf-8")
    return timed(lambda: mkdocs_build(load_config(str(folder / "mkdocs.yml"), quiet=True)))[0]


@pytest.mark.parametrize("count", [100, 1000, 3000])
def test_check_and_build(tmp_path, count):
    """Cold decisions over every processor, firmness apart, then a build with remembered ones."""
    folder = project(tmp_path / "many", count)
    reading, _ = timed(lambda: plain_loader(folder))
    cold, design = timed(lambda: load_design(folder, workers=0, remember=True))
    warm, design = timed(lambda: load_design(folder, workers=0, remember=True))
    writing, site = timed(lambda: write_site(folder, design))
    print(f"\n{count} loops: plain loader {reading:.2f} s; check cold {cold:.1f} s ({cold / reading:.0f} times), warm {warm:.2f} s; "
          f"pages {writing:.1f} s; build cold {cold + writing:.1f} s, warm {warm + writing:.1f} s")
    if count <= 1000:
        plain = plain_mkdocs(tmp_path / "plain", site)
        print(f"plain MkDocs on equal Markdown: {plain:.1f} s; pages {writing / plain:.2f}, build warm {(warm + writing) / plain:.2f}, "
              f"cold {(cold + writing) / plain:.2f} of it")
    shutil.rmtree(tmp_path, ignore_errors=True)
