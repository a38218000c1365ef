"""Reading a project's folder of loop files, all problems of all files in one run."""

import stat
from dataclasses import dataclass
from pathlib import Path as FilePath

from specgen.core.codes import shown
from specgen.core.diagnostic import Diagnostic, Span
from specgen.source.document import Document
from specgen.source.read import only, read_bytes
from specgen.source.text import LARGEST_FILE

PANEL = "panel.yml"
DEVICES = "devices.yml"
OWN_FOLDERS = frozenset({"data", "reviews", "issued"})


@dataclass(frozen=True, slots=True)
class Sources:
    """All documents of a folder, every problem met, and the bytes that were read under each file's label."""

    panel: Document | None
    devices: Document | None
    loops: tuple[Document, ...]
    problems: tuple[Diagnostic, ...]
    files: tuple[tuple[str, bytes], ...]


def read_folder(folder: FilePath, label: str) -> Sources:
    """Read the panel, the devices and the loop files of a folder, in the order of their names.

    Parameters
    ----------
    folder : pathlib.Path
        The folder of the loop files.
    label : str
        How the folder is called in documents and problems: its path from the project's folder, ``"loops"``.

    Returns
    -------
    Sources
        What could be read. Nothing is raised for what the folder holds, nor where it is missing.
    """
    problems: list[Diagnostic] = []
    files: list[tuple[str, bytes]] = []
    documents: dict[str, list[Document]] = {}
    prefix = f"{label}/" if label not in ("", ".") else ""
    for path in _listed(folder, label, problems):
        file = prefix + _printable(path.name)
        odd = _passed_over(path)
        if odd:
            problems.append(Diagnostic(Span(file, 1, 1), "Y120", odd, "loop files lie beside panel.yml and end in .yml, in small letters"))
        elif path.suffix == ".yml":
            raw = _bytes_of(path, file, problems)
            if raw is not None:
                files.append((file, raw))
                documents[path.name], found = read_bytes(raw, file)
                problems += found
    panel, more_panels = only(documents.pop(PANEL, []))
    devices, more_devices = only(documents.pop(DEVICES, []))
    if panel is None and not any(problem.span.file in (prefix + PANEL, label) for problem in problems):
        problems.append(Diagnostic(Span(prefix + PANEL, 1, 1), "Y118", "there is no panel.yml", "write one: it holds the panel's data"))
    loops = tuple(document for name in sorted(documents) for document in documents[name])
    return Sources(panel, devices, loops, tuple(sorted([*problems, *more_panels, *more_devices])), tuple(files))


def _listed(folder: FilePath, label: str, problems: list[Diagnostic]) -> list[FilePath]:
    """Return what lies in the folder by name, without hidden files."""
    try:
        return sorted((path for path in folder.iterdir() if not path.name.startswith(".")), key=lambda path: path.name)
    except OSError as error:
        told = f"the folder cannot be read: {_reason(error)}"
        problems.append(Diagnostic(Span(label, 1, 1), "Y101", told, "name the folder of the loop files"))
        return []


def _passed_over(path: FilePath) -> str:
    """Say why a file that looks like a loop file would not be read as one; empty where all is well."""
    try:
        if path.is_dir():
            if path.suffix == ".yml" or path.name in OWN_FOLDERS:
                return ""
            inside = sorted(inner.name for inner in path.iterdir() if inner.suffix.lower() in (".yml", ".yaml"))
            return f"{shown(inside[0])} in this folder is not read" if inside else ""
    except OSError:
        return ""
    if path.suffix.lower() in (".yml", ".yaml") and (path.suffix != ".yml" or _almost_special(path.name)):
        return f"a file named {shown(path.name)} is not read"
    return ""


def _almost_special(name: str) -> bool:
    return name not in (PANEL, DEVICES) and name.casefold() in (PANEL, DEVICES)


def _bytes_of(path: FilePath, file: str, problems: list[Diagnostic]) -> bytes | None:
    """Read a plain file up to the size that is refused; anything else is a problem."""
    try:
        if not stat.S_ISREG(path.stat().st_mode):
            kind = "a folder" if path.is_dir() else "no plain file"
            problems.append(Diagnostic(Span(file, 1, 1), "Y101", f"this is {kind}", "give it a name that does not end in .yml"))
            return None
        with path.open("rb") as opened:
            return opened.read(LARGEST_FILE + 1)
    except OSError as error:
        told = f"the file cannot be read: {_reason(error)}"
        problems.append(Diagnostic(Span(file, 1, 1), "Y101", told, "check the link and the permissions"))
        return None


def _reason(error: OSError) -> str:
    return (error.strerror or type(error).__name__).lower()


def _printable(name: str) -> str:
    """Return a file's name without characters that a problem could not be printed with."""
    return "".join(letter if letter.isprintable() else "?" for letter in name)
