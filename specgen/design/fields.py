"""The field reference: every field of the input files with the rules that read it."""

import re
from functools import lru_cache
from importlib import resources

from specgen.model.documents import DocumentKind
from specgen.model.reference import as_markdown, field_reference
from specgen.rules.engine import all_rules, place_of

_SECTION = r"(?:need|plant|sensor|element|limits|alarms|cable|choose)"
_QUOTED = re.compile(rf'"({_SECTION}(?:\.[a-z_0-9]+)+)"')
_READ = re.compile(rf"\bloop\.({_SECTION}(?:\.[a-z_0-9]+)+)")
_FILE = re.compile(r"([a-z])([0-9]+)_")


@lru_cache(maxsize=1)
def readers() -> dict[str, tuple[str, ...]]:
    """Return the rules that read each field, by its path: as they declare it in ``needs`` and as their text names it."""
    found: dict[str, set[str]] = {}
    for loaded in all_rules():
        for path in loaded.rule.needs:
            found.setdefault(path, set()).add(loaded.rule.code)
    for folder in resources.files("specgen.rules").iterdir():
        if not folder.is_dir():
            continue
        for file in folder.iterdir():
            name = _FILE.match(file.name)
            if name is None:
                continue
            code, text = f"{name[1].upper()}{name[2]}", file.read_text(encoding="utf-8")
            for path in (*_QUOTED.findall(text), *_READ.findall(text)):
                found.setdefault(path, set()).add(code)
    return {path: tuple(sorted(codes, key=place_of)) for path, codes in sorted(found.items())}


def reference(document: DocumentKind) -> str:
    """Return the field reference of one kind of document as Markdown.

    Examples
    --------
    >>> "| `element.min_run` |" in reference("loop")
    True
    """
    return as_markdown(tuple(row for row in field_reference(readers()) if row.document == document))
