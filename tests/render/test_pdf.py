"""What prints is found or named; what it leaves behind is a whole PDF or nothing. The browsers here are small scripts."""

import stat
import sys
import time
from datetime import date

import pytest

from specgen.render.pdf import VARIABLE, PdfError, find_browser, print_dossier

WHOLE = "%PDF-1.4\n1 0 obj <</CreationDate (D:20301231235959+00'00')\n/ModDate (D:20301231235959+00'00')>>\n%%EOF\n"
pytestmark = pytest.mark.skipif(sys.platform == "win32", reason="the stand-ins are shell scripts")


def script(folder, name, body):
    file = folder / name
    file.write_text(f"#!{sys.executable}\nimport sys, time, pathlib\n"
                    "target = next(a.split('=', 1)[1] for a in sys.argv if a.startswith('--print-to-pdf='))\n" + body)  # fmt: skip
    file.chmod(file.stat().st_mode | stat.S_IXUSR)
    return file


@pytest.fixture
def site_folder(tmp_path):
    folder = tmp_path / "site"
    folder.mkdir()
    (folder / "print.html").write_text("<p>whole</p>")
    return folder


def test_one_on_the_path_is_found(tmp_path):
    made = script(tmp_path, "google-chrome", "")
    assert find_browser("", {"PATH": str(tmp_path)}, "linux") == made


def test_a_named_one_comes_first_then_the_variables(tmp_path):
    script(tmp_path, "chromium", "")
    other = script(tmp_path, "other", "")
    third = script(tmp_path, "third", "")
    around = {"PATH": str(tmp_path), VARIABLE: str(other)}
    assert find_browser("", around, "linux") == other
    assert find_browser(str(third), around, "linux") == third


@pytest.mark.parametrize(
    ("system", "root", "below"),
    [
        ("win32", "PROGRAMFILES(X86)", r"Microsoft\Edge\Application\msedge.exe"),
        ("win32", "LOCALAPPDATA", r"Google\Chrome\Application\chrome.exe"),
        ("darwin", "HOME", "Applications/Chromium.app/Contents/MacOS/Chromium"),
    ],
)
def test_usual_places_are_looked_into(tmp_path, system, root, below):
    file = tmp_path / below
    file.parent.mkdir(parents=True, exist_ok=True)
    file.write_text("")
    assert find_browser("", {"PATH": str(tmp_path / "none"), root: str(tmp_path)}, system) == file


@pytest.mark.parametrize("around", [{}, {VARIABLE: "no-such-browser"}])
def test_none_is_said(tmp_path, around):
    with pytest.raises(PdfError, match=r"SPECGEN_BROWSER|no-such-browser"):
        find_browser("", {"PATH": str(tmp_path), **around}, "linux")


def test_a_whole_pdf_gets_its_name_and_the_panels_date(tmp_path, site_folder, design):
    browser = script(tmp_path, "good", f"pathlib.Path(target).write_text({WHOLE!r})")
    assert print_dossier(design, site_folder, browser) == ("dossier.pdf",)
    assert (site_folder / "dossier.pdf").read_text() == WHOLE.replace("20301231235959", "20260203000000")
    assert design.panel.panel.date == date(2026, 2, 3)
    assert sorted(path.name for path in site_folder.iterdir()) == ["dossier.pdf", "print.html"]


@pytest.mark.parametrize(
    "body",
    [
        "pathlib.Path(target).write_text('%PDF-1.4 and then the disk was full')",
        "pass",
        f"pathlib.Path(target).write_text({WHOLE!r}); sys.exit(3)",
        "pathlib.Path(target).write_text('%PDF-'); time.sleep(60)",
    ],
)
def test_half_a_pdf_is_never_left(tmp_path, site_folder, design, body):
    browser = script(tmp_path, "bad", body)
    begun = time.monotonic()
    with pytest.raises(PdfError):
        print_dossier(design, site_folder, browser, timeout=2)
    assert time.monotonic() - begun < 20
    assert [path.name for path in site_folder.iterdir()] == ["print.html"]


def test_what_cannot_be_started_is_said(tmp_path, site_folder, design):
    file = tmp_path / "text"
    file.write_text("no program")
    file.chmod(0o755)
    with pytest.raises(PdfError, match="cannot be started"):
        print_dossier(design, site_folder, file)


def test_many_sheets_are_printed_in_files_of_their_own(tmp_path, site_folder, design, monkeypatch):
    monkeypatch.setattr("specgen.view.print_page.MOST_SHEETS", 3)
    browser = script(tmp_path, "good", f"pathlib.Path(target).write_text({WHOLE!r})")
    assert print_dossier(design, site_folder, browser) == ("dossier-1.pdf",)
    assert not list(site_folder.glob("print-*.html"))
