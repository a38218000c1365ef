"""A dossier as PDF, printed by an installed Chromium, Chrome or Edge; without one everything else works.

Printing takes the site's own ``print.html``, so paper and screen cannot differ. Nothing is fetched: the browser runs on a
profile of its own with every host name mapped to nowhere. A file appears under its name only when it is whole.
"""

import os
import re
import shutil
import signal
import subprocess
import sys
import tempfile
from collections.abc import Iterator, Mapping
from datetime import date
from pathlib import Path

from specgen.design.types import Design
from specgen.render.print_file import batches
from specgen.view.dossier import dossier_of
from specgen.view.frame import PRINT
from specgen.view.print_page import sheets_are_printed

VARIABLE = "SPECGEN_BROWSER"
NAMES = (
    "chromium", "chromium-browser", "google-chrome", "google-chrome-stable", "chrome", "microsoft-edge", "microsoft-edge-stable", "msedge",
)  # fmt: skip
_WINDOWS = (r"Google\Chrome\Application\chrome.exe", r"Microsoft\Edge\Application\msedge.exe", r"Chromium\Application\chrome.exe")
_WINDOWS_ROOTS = ("PROGRAMFILES", "PROGRAMFILES(X86)", "LOCALAPPDATA")
_MAC = ("Google Chrome", "Microsoft Edge", "Chromium")
TIMEOUT = 600.0  # s for one file, which takes half a minute on two idle cores
UNDATED = date(1980, 1, 1)  # of a panel that could not be read
_DATES = re.compile(rb"(/(?:CreationDate|ModDate) \(D:)\d{14}")


class PdfError(Exception):
    """Nothing could be printed; the line says why."""


def find_browser(named: str = "", surroundings: Mapping[str, str] | None = None, system: str = sys.platform) -> Path:
    """Find what prints.

    Parameters
    ----------
    named : str
        A path or a name on PATH that was asked for; the variable SPECGEN_BROWSER stands in for it.
    surroundings : mapping, optional
        Environment variables.
    system : str
        ``sys.platform``.

    Returns
    -------
    pathlib.Path
        The program.

    Raises
    ------
    PdfError
        What was asked for by name is not there, or none is installed in a usual place.
    """
    around = os.environ if surroundings is None else surroundings
    asked = named or around.get(VARIABLE, "")
    if asked:
        found = shutil.which(asked, path=around.get("PATH"))
        if found is None:
            raise PdfError(f"{asked} is no program that can be started")
        return Path(found)
    on_path = (shutil.which(name, path=around.get("PATH")) for name in NAMES)
    usual = (place for place in _usual_places(around, system) if place.is_file())
    found_one = next((Path(found) for found in on_path if found), None) or next(usual, None)
    if found_one is None:
        raise PdfError(f"no Chromium, Chrome or Edge is in a usual place; name one with --browser or {VARIABLE}")
    return found_one


def _usual_places(around: Mapping[str, str], system: str) -> Iterator[Path]:
    if system == "win32":
        yield from (Path(around[root]) / name for name in _WINDOWS for root in _WINDOWS_ROOTS if around.get(root))
    elif system == "darwin":
        roots = (Path("/Applications"), Path(around.get("HOME", "/")) / "Applications")
        yield from (root / f"{name}.app" / "Contents" / "MacOS" / name for name in _MAC for root in roots)


def print_dossier(design: Design, site: Path, browser: Path, timeout: float = TIMEOUT) -> tuple[str, ...]:
    """Print a built site.

    Parameters
    ----------
    design : Design
        What the site was built from.
    site : pathlib.Path
        The site's folder; the files go into it.
    browser : pathlib.Path
        What prints.
    timeout : float
        The longest that one file may take [s].

    Returns
    -------
    tuple of str
        The files' names: ``dossier.pdf``, or ``dossier-1.pdf`` and so on where the sheets are too many for one.

    Raises
    ------
    PdfError
        The browser failed, took too long or wrote no whole PDF; no file of this run is left.
    """
    day = design.panel.panel.date if design.panel else UNDATED
    written: list[str] = []
    try:
        dossier = dossier_of(design)
        if sheets_are_printed(dossier):
            written.append(_print(site / PRINT, site / "dossier.pdf", browser, day, timeout))
            return tuple(written)
        for number, content in enumerate(batches(dossier), 1):
            page = site / f"print-{number}.html"
            try:
                page.write_bytes(content)
                written.append(_print(page, site / f"dossier-{number}.pdf", browser, day, timeout))
            finally:
                page.unlink(missing_ok=True)
    except BaseException:
        for name in written:
            (site / name).unlink(missing_ok=True)
        raise
    return tuple(written)


def _print(page: Path, target: Path, browser: Path, day: date, timeout: float) -> str:
    with tempfile.TemporaryDirectory(prefix="specgen-print-", ignore_cleanup_errors=True) as profile:
        fresh = target.with_suffix(".printing")
        try:
            _run(_command(browser, page, fresh, Path(profile)), timeout)
            fresh.write_bytes(_whole(fresh, day))
            fresh.replace(target)
        finally:
            fresh.unlink(missing_ok=True)
    return target.name


def _command(browser: Path, page: Path, target: Path, profile: Path) -> list[str]:
    # a browser that runs as the machine's administrator refuses its sandbox; what it opens is our own page and nothing else
    bare = ["--no-sandbox"] if hasattr(os, "geteuid") and os.geteuid() == 0 else []
    return [
        str(browser), "--headless", *bare, "--disable-gpu", "--no-first-run", "--no-default-browser-check", "--disable-extensions",
        "--disable-background-networking", "--disable-component-update", "--disable-sync", "--host-resolver-rules=MAP * ~NOTFOUND",
        f"--user-data-dir={profile}", "--no-pdf-header-footer", "--generate-pdf-document-outline", f"--print-to-pdf={target.resolve()}",
        page.resolve().as_uri(),
    ]  # fmt: skip


def _run(command: list[str], timeout: float) -> None:
    """Run the browser in a group of its own, so that its helpers end with it."""
    try:
        with subprocess.Popen(  # noqa: S603  the command is ours, the browser the user's own
            command, stdin=subprocess.DEVNULL, stdout=subprocess.DEVNULL, stderr=subprocess.DEVNULL, start_new_session=True
        ) as process:
            try:
                code = process.wait(timeout)
            except BaseException:
                _end(process)
                raise
    except subprocess.TimeoutExpired:
        raise PdfError(f"{command[0]} had not printed after {timeout:g} s and was ended") from None
    except OSError as error:
        raise PdfError(f"{command[0]} cannot be started: {error.strerror or error}") from None
    if code != 0:
        raise PdfError(f"{command[0]} ended with {code} and printed nothing")


def _end(process: "subprocess.Popen[bytes]") -> None:
    if sys.platform == "win32":
        process.kill()
    else:
        os.killpg(process.pid, signal.SIGKILL)


def _whole(file: Path, day: date) -> bytes:
    """Return a PDF's bytes, its dates set to the panel's; nothing else is touched."""
    content = file.read_bytes() if file.is_file() else b""
    if not content.startswith(b"%PDF-") or not content.rstrip().endswith(b"%%EOF"):
        raise PdfError("the browser wrote no whole PDF; another one may be named with --browser or SPECGEN_BROWSER")

    # of the same length, since a PDF is read by places
    return _DATES.sub(lambda match: match[1] + day.strftime("%Y%m%d000000").encode(), content)
