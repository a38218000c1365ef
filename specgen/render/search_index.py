"""The search index as scripts: a page cannot fetch a file from a disk, but it can run one.

The first file holds pages, loops, rules and the sections of the sheets; parts follow in files of bounded size, which a page
loads one after the other when its search is first opened.
"""

import json
from collections.abc import Iterable, Sequence

from specgen.view.dossier import Dossier
from specgen.view.frame import PAGE_ROWS
from specgen.view.shapes import PageView
from specgen.view.summary import summary_of
from specgen.view.words import MODES, capital

PER_FILE = 4000  # rows; some 300 kB, which a browser reads in a few ms
SHARED = "parts.html"  # where a part of several loops stands
CALL = "window.dossierIndex"  # what assets/search.js waits with

Sections = tuple[tuple[str, str], ...]
Row = Sequence[str | int]


def sections_of(view: PageView) -> Sections:
    """Return the anchor and title of every section of a page."""
    return tuple((section.anchor, section.title) for section in view.sections)


def search_files(dossier: Dossier, sheets: Sequence[Sections]) -> dict[str, bytes]:
    """Write the index.

    Parameters
    ----------
    dossier : Dossier
        What is searched.
    sheets : sequence
        The sections of every sheet, in the order of the dossier's loops.

    Returns
    -------
    dict of str to bytes
        ``assets/search-0.js`` and as many more as the parts take.
    """
    sets = list(dict.fromkeys(sheets))
    at = {sections: index for index, sections in enumerate(sets)}
    loops = [
        (loop.tag, loop.loop.service, loop.loop.area, loop.verdict, _decision(dossier, index), at[sections])
        for index, (loop, sections) in enumerate(zip(dossier.design.loops, sheets, strict=True))
    ]
    pages = [(row.path, row.title, row.finds) for row in PAGE_ROWS] + [(page.path, page.title, "") for page in dossier.own_pages]
    rules = [(loaded.rule.code, capital(loaded.rule.name), loaded.sentence) for loaded in dossier.rules]
    parts = list(_parts(dossier))
    chunks = [parts[first : first + PER_FILE] for first in range(0, len(parts), PER_FILE)]
    shared = next((row.path for row in PAGE_ROWS if row.path == SHARED), "")
    head = {"files": 1 + len(chunks), "shared": shared, "rows": {"pages": pages, "sets": sets, "loops": loops, "rules": rules}}
    return {_name(0): _script(head)} | {_name(number): _script({"rows": {"parts": chunk}}) for number, chunk in enumerate(chunks, 1)}


def _decision(dossier: Dossier, index: int) -> str:
    short = summary_of(dossier.design.loops[index])
    return f"{MODES[short.mode]}, {short.device}"


def _parts(dossier: Dossier) -> Iterable[Row]:
    """Give every designation with what it is and the sheet it stands on; what several loops share stands on none."""
    panel = dossier.design.panel_design
    for part in panel.parts if panel else ():
        yield part.designation, part.what, part.loops[0] if len(part.loops) == 1 else ""


def _name(number: int) -> str:
    return f"assets/search-{number}.js"


def _script(part: object) -> bytes:
    return f"{CALL}({json.dumps(part, ensure_ascii=False, separators=(',', ':'))});\n".encode()
