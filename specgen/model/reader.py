"""From plain text data to models: every problem of every document, with its place."""

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace
from typing import Any, Protocol, TypeVar

from pydantic import BaseModel, ValidationError
from pydantic_core import ErrorDetails

from specgen.core.diagnostic import Diagnostic, Path, Span
from specgen.model.fields import shown
from specgen.model.hints import has, keys_hint, known_keys, missing_hint, nearest

M = TypeVar("M", bound=BaseModel)


class Plain(Protocol):
    """What the reader needs of a source document: plain nested text and where each path stands."""

    @property
    def file(self) -> str:
        """Return the file's name as shown in messages."""
        ...

    @property
    def line(self) -> int:
        """Return the line the document starts on."""
        ...

    @property
    def data(self) -> Any:  # noqa: ANN401  whatever YAML may hold
        """Return nested dicts and lists of text."""
        ...

    @property
    def spans(self) -> Mapping[Path, Span]:
        """Return where each value stands."""
        ...

    @property
    def sound(self) -> bool:
        """Tell whether the text was read without a problem; nothing is decided on a document that was not."""
        ...

    @property
    def key_spans(self) -> Mapping[Path, Span]:
        """Return where each key stands."""
        ...


@dataclass(frozen=True, slots=True)
class Problem:
    """A problem by path, before its place is looked up."""

    path: Path
    code: str
    text: str
    hint: str = ""
    at_key: bool = False


def read_model(model: type[M], data: object, context: Mapping[str, Any] | None = None) -> tuple[M | None, list[Problem]]:
    """Validate plain data; return the model, or None and every problem found."""
    try:
        return model.model_validate(data, context=dict(context or {})), []
    except ValidationError as error:
        return None, _without_echoes([_problem_of(model, data, details) for details in error.errors(include_url=False)])


def _without_echoes(problems: list[Problem]) -> list[Problem]:
    """Drop the report of a missing key where the same section holds it misspelt."""
    meant = {(*p.path[:-1], p.hint.removeprefix("did you mean ").rstrip("?")) for p in problems if p.code == "F101"}
    return [p for p in problems if not (p.code == "F102" and p.path in meant)]


def place(document: Plain, problem: Problem, provenance: Mapping[Path, Plain] | None = None) -> Diagnostic:
    """Turn a problem's path into a place: the value, its key, or the nearest section above it."""
    path = problem.path
    origin = document
    for length in range(len(path), 0, -1):
        if provenance and path[:length] in provenance:
            origin = provenance[path[:length]]
            break
        if path[:length] in document.spans or path[:length] in document.key_spans:
            break
    for length in range(len(path), -1, -1):
        at = path[:length]
        key_first = problem.at_key or (length < len(path) and length > 0)
        tables = (origin.key_spans, origin.spans) if key_first else (origin.spans, origin.key_spans)
        for table in tables:
            if at in table:
                return Diagnostic(table[at], problem.code, problem.text, problem.hint)
    return Diagnostic(Span(origin.file, origin.line, 1), problem.code, problem.text, problem.hint)


def _problem_of(model: type[BaseModel], data: object, details: ErrorDetails) -> Problem:
    path = _path_in(data, details["loc"])
    kind = details["type"]
    context = details.get("ctx") or {}
    name = str(path[-1]) if path else "the document"
    if kind == "specgen":
        below = tuple(context["at"])
        return Problem((*path, *below), str(context["code"]), str(context["text"]), str(context["hint"]))
    if kind == "extra_forbidden":
        known = known_keys(model, path[:-1], data)
        hint = nearest(name, known, "known here: ")
        return Problem(path, "F101", f"'{shown(name)}' is not a key of {_section(path)}", hint, at_key=True)
    if kind in ("missing", "union_tag_not_found"):
        missing = name if kind == "missing" else "kind"
        where = path if kind == "missing" else (*path, "kind")
        return Problem(where, "F102", f"'{missing}' is missing in {_section(where)}", missing_hint(model, where, data))
    if kind in ("literal_error", "union_tag_invalid"):
        where = path if kind == "literal_error" else (*path, "kind")
        words = _words(str(context.get("expected") or context.get("expected_tags") or ""))
        given = str(context.get("tag", details.get("input", "")))
        return Problem(where, "F107", f"'{shown(given)}' is not one of the words of {where[-1]}", nearest(given, words, "one of: "))
    if kind in ("model_type", "model_attributes_type", "dict_type", "dataclass_type"):
        return Problem(path, "F108", f"{name} is a section of keys, not a single value or list", keys_hint(model, path, data))
    if kind in ("tuple_type", "list_type"):
        return Problem(path, "F109", f"{name} is a list", "write it with brackets or one item a line after a dash")
    if kind == "too_long":
        return Problem(path, "F111", f"{name} has more items than the {context.get('max_length')} that are read")
    if kind == "too_short":
        return Problem(path, "F111", f"{name} needs at least {context.get('min_length')} item")
    if kind.startswith("date"):
        return Problem(path, "F112", f"'{shown(str(details.get('input')))}' is no date", "write year-month-day, for example 2026-11-20")
    if kind == "string_type":
        return Problem(path, "F106", "a single value is expected here, not a list or a section", "text")
    if kind == "string_pattern_mismatch":
        return Problem(path, "F113", f"'{shown(str(details.get('input')))}' cannot be used as {name}",
                       "letters, digits, '-' and '.', ten at most, for example A or P2")
    return Problem(path, "F199", f"{name}: {shown(details['msg'], 200)}")


def _path_in(data: object, loc: Sequence[str | int]) -> Path:
    """Drop from pydantic's location what is not in the data (names of union members, field names behind an alias)."""
    path: list[str | int] = []
    here: object = data
    for index, step in enumerate(loc):
        last = index == len(loc) - 1
        if has(here, step):
            here = here[step]  # type: ignore[index]  # has looked
            path.append(step)
        elif last and isinstance(here, dict):
            if step in _TAGS or step == here.get("kind"):
                continue
            path.append(step)
    return tuple(path)


_TAGS = frozenset({"function-after", "function-before"})


def _section(path: Path) -> str:
    names = [str(step) for step in path[:-1] if isinstance(step, str)]
    return names[-1] if names else "the document"


def _words(expected: str) -> list[str]:
    return [word.strip().strip("'") for word in expected.replace(" or ", ", ").split(",") if word.strip()]


def renamed(problem: Problem, path: Path) -> Problem:
    """Return the problem at another path."""
    return replace(problem, path=path)
