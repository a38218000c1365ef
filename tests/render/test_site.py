"""The site: the same from MkDocs' own command, swapped in whole or not at all, nothing private in it."""

import errno
import shutil
import subprocess
import sys
from pathlib import Path

import pytest

from specgen.design.project import load_design
from specgen.render import site as site_module
from specgen.render.site import SiteError, swap, write_site

NAME_OWN_PAGES = {"index.html", "print.html", "assets/search-0.js"}


def contents(folder):
    return {path.relative_to(folder).as_posix(): path.read_bytes() for path in folder.rglob("*") if path.is_file()}


@pytest.fixture
def old(project):
    """Put a site where the new one goes, and say what must be left of it."""
    folder = project / "site"
    folder.mkdir()
    (folder / "index.html").write_text("the one before")
    (folder / ".nojekyll").write_text("")
    return contents(folder)


def left_behind(project):
    return [path.name for path in project.iterdir() if path.name.startswith("site.")]


def test_mkdocs_alone_gives_the_same_site_also_where_it_is_strict(project):
    ours = contents(write_site(project, load_design(project, firmness=True)))
    shutil.rmtree(project / "site")
    run = subprocess.run(
        [sys.executable, "-m", "mkdocs", "build", "--strict"], cwd=project, capture_output=True, text=True, check=False, timeout=120
    )
    assert run.returncode == 0, run.stderr
    assert contents(project / "site") == ours
    assert "TIC-3" in run.stderr
    assert "loops/hot.yml:" in run.stderr


def test_pages_written_without_mkdocs_are_the_same(site, files):
    built = contents(site)
    # overview, print and search name the user's own pages, which only the host knows
    assert {name for name, content in files.items() if built.get(name) != content} == NAME_OWN_PAGES


def test_two_builds_are_the_same_wherever_they_stand(project, site, design):
    again = contents(write_site(project, design))
    first = contents(site)
    assert {name for name in again if again[name] != first[name]} == NAME_OWN_PAGES  # the other project has one page more
    assert not any(name.startswith("sitemap") for name in again)


def test_the_new_site_takes_the_place_of_the_old(project, design, old):
    assert write_site(project, design) == (project / "site").resolve()
    assert "Trial &lt;panel&gt;" in (project / "site" / "index.html").read_text(encoding="utf-8")
    assert (project / "site" / ".nojekyll").is_file()
    assert old
    assert left_behind(project) == []


def test_private_files_are_not_published(site):
    built = contents(site)
    assert not any(name.startswith(("issued/", "reviews/")) for name in built)
    assert all(b"secret" not in content for content in built.values())
    outside = [name for name in built if name.endswith((".yml", ".yaml")) and not name.startswith("data/source/")]
    assert outside == []
    assert (site / "photo.png").is_file()


def test_the_sources_are_carried_along(site, design):
    for source in design.sources:
        assert (site / "data" / "source" / source.name).read_bytes() == source.content


def test_a_record_of_each_loop_is_a_part_of_the_whole(files, design):
    import json  # noqa: PLC0415  beside what it is for

    whole = json.loads(files["data/record.json"])
    for loop in whole["loops"]:
        assert json.loads(files[f"data/{loop['tag']}.json"]) == loop
    assert len(whole["loops"]) == len(design.loops)


@pytest.mark.parametrize("stop", [OSError(errno.ENOSPC, "No space left on device"), KeyboardInterrupt(), MemoryError()])
def test_what_stops_a_build_leaves_the_old_site(project, design, old, monkeypatch, stop):
    written = 0

    def write(self, content):
        nonlocal written
        written += 1
        if written > 3:
            raise stop
        with self.open("wb") as file:
            return file.write(content)

    def copy(content, path):
        write(Path(path), content)

    monkeypatch.setattr("mkdocs.utils.write_file", copy)
    with pytest.raises(SiteError if isinstance(stop, OSError) else type(stop)) as caught:
        write_site(project, design)
    assert contents(project / "site") == old
    assert left_behind(project) == []
    if isinstance(stop, OSError):
        assert "No space left on device" in str(caught.value)


def test_a_swap_that_fails_in_the_middle_is_undone(tmp_path, monkeypatch):
    fresh, target = tmp_path / "fresh", tmp_path / "site"
    for folder in (fresh, target):
        folder.mkdir()
        (folder / "index.html").write_text(folder.name)
    rename = Path.rename

    def refuse(self, where):
        if self == fresh:
            raise PermissionError(errno.EACCES, "in use", str(where))
        return rename(self, where)

    monkeypatch.setattr(Path, "rename", refuse)
    with pytest.raises(PermissionError):
        swap(fresh, target)
    assert (target / "index.html").read_text() == "site"
    assert [path.name for path in tmp_path.iterdir() if path.name.startswith("site.")] == []


def test_a_folder_that_cannot_be_written_is_said(project, design, old, monkeypatch):
    """The rights of a folder do not bind the superuser, who runs tests in containers: the refusal is made here."""

    def refuse(**_):
        raise PermissionError(errno.EACCES, "Permission denied", str(project))

    monkeypatch.setattr(site_module.tempfile, "mkdtemp", refuse)
    with pytest.raises(SiteError, match="Permission denied"):
        write_site(project, design)
    assert contents(project / "site") == old


def test_a_site_around_the_project_is_refused(project, design):
    with pytest.raises(SiteError, match="holds the project itself"):
        write_site(project, design, project.parent)
    assert (project / "loops" / "panel.yml").is_file()


def test_a_project_without_configuration_is_told_what_it_holds(tmp_path, design):
    with pytest.raises(SiteError, match=r"mkdocs\.yml"):
        write_site(tmp_path, design)


def test_a_configuration_that_is_broken_is_reported(project, design, old):
    (project / "mkdocs.yml").write_text("site_name: x\ndocs_dir: nowhere\nplugins: [specgen]\n")
    with pytest.raises(SiteError, match="MkDocs stopped"):
        write_site(project, design)
    assert contents(project / "site") == old


def test_theme_and_plugin_need_not_be_named_and_search_is_dropped(project, design):
    named = contents(write_site(project, design))
    bare = "site_name: Trial panel\ndocs_dir: loops\nsite_url: https://example.invalid/x/\nplugins: [search]\n"
    (project / "mkdocs.yml").write_text(bare)
    assert contents(write_site(project, design)) == named


def test_a_file_of_the_dossiers_name_is_left_out_and_said(project, design, caplog):
    (project / "loops" / "assets").mkdir()
    (project / "loops" / "assets" / "dossier.css").write_text("body { display: none }")
    caplog.set_level("WARNING", logger="mkdocs")
    folder = write_site(project, design)
    assert "display: none }" not in (folder / "assets" / "dossier.css").read_text(encoding="utf-8")
    assert "assets/dossier.css of the loops folder is left out" in caplog.text


def test_a_file_of_the_site_s_name_is_left_alone(project):
    (project / "site").write_text("precious")
    with pytest.raises(SiteError, match="is a file"):
        write_site(project, load_design(project))
    assert (project / "site").read_text() == "precious"
    assert left_behind(project) == []
