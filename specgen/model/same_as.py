"""``same_as``: another loop's fields as the starting point."""

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Any

from specgen.core.diagnostic import Path
from specgen.model.fields import shown
from specgen.model.hints import nearest
from specgen.model.reader import Plain, Problem

NEVER = ("tag", "service", "choose", "notes", "same_as")
_FORMS = ("balance", "response", "rates", "step_test")
LONGEST_CHAIN = 100
MOST_NAMED = 40


@dataclass(frozen=True, slots=True)
class Merged:
    """A loop's data with what it takes from others, and which document each taken path came from.

    ``taken`` holds the fields that are taken and the sections they stand in; ``fields`` the fields alone.
    """

    data: dict[str, Any]
    taken: Mapping[Path, Plain]
    fields: frozenset[Path]


def merge(tag: str, by_tag: Mapping[str, Plain]) -> Merged | Problem:
    """Follow the chain of ``same_as`` from a loop and lay each loop's own fields over those it starts from.

    Errors are returned as a ``Problem`` at ``same_as``: an unknown tag, or a circle, which is shown.
    """
    chain = [tag]
    while True:
        data = by_tag[chain[-1].lower()].data
        base = data.get("same_as") if isinstance(data, dict) else None
        if base is None:
            break
        if not isinstance(base, str):
            return Problem(("same_as",), "L203", "same_as names one other loop by its tag", "for example same_as: TIC-101")
        if base.lower() not in by_tag:
            known = [str(document.data["tag"]) for name, document in by_tag.items() if name != tag.lower()]
            return Problem(("same_as",), "L203", f"same_as names '{shown(base)}', and no loop that could be read has that tag",
                           nearest(base, known[:MOST_NAMED], "tags: ") if len(known) <= MOST_NAMED else "see the list of loops")
        if base.lower() in [known.lower() for known in chain]:
            circle = " -> ".join([*chain, base])
            return Problem(("same_as",), "L204", f"same_as goes in a circle: {circle}", "let one of them be written out")
        if len(chain) >= LONGEST_CHAIN:
            return Problem(("same_as",), "L204", f"same_as goes over more than {LONGEST_CHAIN} loops")
        chain.append(base)
    merged: dict[str, Any] = {}
    taken: dict[Path, Plain] = {}
    for number, name in enumerate(reversed(chain)):
        document = by_tag[name.lower()]
        own = {k: v for k, v in document.data.items() if k != "same_as"}
        if number < len(chain) - 1:
            own = {k: v for k, v in own.items() if k not in NEVER and not _is_step_test(k, v)}
        _lay(merged, own, document, taken)
    own_document = by_tag[tag.lower()]
    fields = {path for path, document in taken.items() if document is not own_document and not isinstance(_at(merged, path), dict)}
    sections = {path[:length] for path in fields for length in range(1, len(path))}
    kept = {path: document for path, document in taken.items() if path in fields or (path in sections and document is not own_document)}
    return Merged(merged, kept, frozenset(fields))


def _at(data: object, path: Path) -> object:
    for step in path:
        data = data[step]  # type: ignore[index]  # the path was made from this data
    return data


def _is_step_test(key: str, value: object) -> bool:
    return key == "plant" and isinstance(value, dict) and "step_test" in value


def _lay(merged: dict[str, Any], own: Mapping[str, Any], document: Plain, taken: dict[Path, Plain]) -> None:
    for key, value in own.items():
        before = merged.get(key)
        if isinstance(value, dict) and isinstance(before, dict) and not _replaces(key, before, value):
            inner = dict(before)
            for name, given in value.items():
                _take(inner, (key, name), given, document, taken)
            merged[key] = inner
        else:
            for path in [p for p in taken if p[0] == key]:
                del taken[path]
            merged[key] = value
            for path in _paths((key,), value):
                taken[path] = document


def _take(inner: dict[str, Any], path: Path, given: object, document: Plain, taken: dict[Path, Plain]) -> None:
    name = str(path[-1])
    before = inner.get(name)
    if isinstance(given, dict) and isinstance(before, dict):
        nested = dict(before)
        for below, value in given.items():
            _take(nested, (*path, below), value, document, taken)
        inner[name] = nested
        return
    for known in [p for p in taken if p[: len(path)] == path]:
        del taken[known]
    inner[name] = given
    for below_path in _paths(path, given):
        taken[below_path] = document


def _replaces(key: str, before: Mapping[str, Any], own: Mapping[str, Any]) -> bool:
    """Tell whether a new plant form, element kind or sensor kind replaces its whole section."""
    if key == "plant":
        return bool({f for f in own if f in _FORMS} - set(before))
    return key in ("element", "sensor") and "kind" in own and own["kind"] != before.get("kind")


def _paths(path: Path, value: object) -> list[Path]:
    found = [path]
    if isinstance(value, dict):
        for key, below in value.items():
            found += _paths((*path, key), below)
    elif isinstance(value, list):
        for index, below in enumerate(value):
            found += _paths((*path, index), below)
    return found
