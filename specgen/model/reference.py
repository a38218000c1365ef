"""The reference of every field of every input document, row by row from the models."""

import datetime
import types
from collections.abc import Iterator, Mapping
from typing import Annotated, Literal, NamedTuple, Union, get_args, get_origin

from pydantic import BaseModel
from pydantic.fields import FieldInfo

from specgen.core.quantity import Quantity
from specgen.model.documents import DOCUMENTS, SET_BY_READER, DocumentKind, written
from specgen.model.fields import WORDS_OF_LOOP, Written

_PLAIN = {bool: "yes or no", int: "count", str: "text", Quantity: "number", datetime.date: "date"}
_SHORT = {"Tolerance": "quantity for both sides, or section", "SuddenLoad": "power or share of full output, or section"}
HEADINGS = ("field", "type", "dimension", "required", "default", "for kinds", "read by")


class FieldRow(NamedTuple):
    """One field: where it stands, what may be written there, and who reads it.

    ``field`` is the path in the document, with ``[]`` for each item of a list. ``kinds`` names the kinds of element or
    sensor that have the field, empty where it does not depend on one. ``read_by`` are rule codes or other readers.
    """

    document: DocumentKind
    field: str
    type: str
    dimension: str
    required: str
    default: str
    kinds: tuple[str, ...]
    read_by: tuple[str, ...]


def field_reference(readers: Mapping[str, tuple[str, ...]]) -> tuple[FieldRow, ...]:
    """Return one row for every field of a loop, of panel.yml and of devices.yml.

    Parameters
    ----------
    readers : mapping of str to tuple of str
        Who reads a field, by its path (``element.min_run``), as the rules declare it.

    Returns
    -------
    tuple of FieldRow
        The rows in the order of the models.

    Examples
    --------
    >>> rows = field_reference({"element.min_run": ("D3", "M1")})
    >>> next(row for row in rows if row.field == "need.tolerance.above")[1:5]
    ('need.tolerance.above', 'quantity', "a difference of the loop's quantity", 'yes')
    >>> [row.read_by for row in rows if row.field == "element.min_run"]
    [('D3', 'M1'), ('D3', 'M1')]
    """
    found: list[FieldRow] = []
    for document, (model, _) in DOCUMENTS.items():
        rows = list(_section(document, model, "", ()))
        found += [row._replace(read_by=tuple(readers.get(row.field, ()))) for row in rows]
    found.insert(2, FieldRow("loop", "same_as", "tag of another loop", "", "no", "", (), ("reading",)))
    return tuple(found)


def as_markdown(rows: tuple[FieldRow, ...]) -> str:
    """Return the rows as Markdown, one table a document.

    Examples
    --------
    >>> print(as_markdown((FieldRow("loop", "tag", "text", "", "yes", "", (), ("reading",)),)))
    ## loop
    <BLANKLINE>
    | field | type | dimension | required | default | for kinds | read by |
    | --- | --- | --- | --- | --- | --- | --- |
    | `tag` | text |  | yes |  |  | reading |
    <BLANKLINE>
    """
    lines: list[str] = []
    for document in dict.fromkeys(row.document for row in rows):
        lines += [f"## {document}", "", "| " + " | ".join(HEADINGS) + " |", "|" + " --- |" * len(HEADINGS)]
        for row in rows:
            if row.document == document:
                cells = (f"`{row.field}`", row.type, row.dimension, row.required, row.default, ", ".join(row.kinds), ", ".join(row.read_by))
                lines.append("| " + " | ".join(cell.replace("|", "\\|") for cell in cells) + " |")
        lines.append("")
    return "\n".join(lines)


def _section(document: DocumentKind, model: type[BaseModel], prefix: str, kinds: tuple[str, ...]) -> Iterator[FieldRow]:
    for name, field in model.model_fields.items():
        if model is DOCUMENTS["loop"][0] and name in SET_BY_READER:
            continue
        yield from _field(document, field, f"{prefix}{field.alias or name}", kinds)


def _field(document: DocumentKind, field: FieldInfo, path: str, kinds: tuple[str, ...]) -> Iterator[FieldRow]:
    annotation = Annotated[field.annotation, *field.metadata] if field.metadata else field.annotation
    required = "yes" if field.is_required() and path != "area" else "no"
    default = "" if field.is_required() else _default(field.default)
    said, dimension, models, listed = _kind_of(annotation)
    yield FieldRow(document, path, said, dimension, required, default, kinds, ())
    below = [row for model in models
             for row in _section(document, model, f"{path}[]." if listed else f"{path}.", _kinds(model) if len(models) > 1 else kinds)]
    every = {kind for model in models for kind in _kinds(model)} if len(models) > 1 else set()
    yield from (row._replace(kinds=()) if every and set(row.kinds) == every else row for row in _joined(below))


def _default(value: object) -> str:
    if value is None or value == () or isinstance(value, BaseModel):
        return ""
    shown = written(value)
    return ", ".join(map(str, shown)) if isinstance(shown, list) else str(shown)


def _kind_of(annotation: object) -> tuple[str, str, tuple[type[BaseModel], ...], bool]:
    """Return the words for a type, its dimension, the models below it, and whether it is a list."""
    origin, args = get_origin(annotation), get_args(annotation)
    if origin is Annotated:
        for part in args[1:]:
            if isinstance(part, Written):
                return _quantity(part)
        return _kind_of(args[0])
    if origin in (Union, types.UnionType):
        members = [_kind_of(arg) for arg in args if arg is not type(None)]
        models = tuple(model for member in members for model in member[2])
        return (members[0] if len(members) == 1 else ("section by kind", "", models, False))
    if origin is tuple:
        said, dimension, models, _ = _kind_of(args[0])
        return f"list of {'sections' if models else said}", dimension, models, True
    if origin is Literal:
        return " or ".join(str(arg) for arg in args), "", (), False
    if isinstance(annotation, type) and issubclass(annotation, BaseModel):
        return _SHORT.get(annotation.__name__, "section"), "", (annotation,), False
    return _PLAIN[annotation] if isinstance(annotation, type) else str(annotation), "", (), False


def _quantity(part: Written) -> tuple[str, str, tuple[type[BaseModel], ...], bool]:
    dimension = WORDS_OF_LOOP.get(part.dimension, part.dimension.replace("_", " "))
    return ("quantity or range" if part.may_range else "quantity"), dimension, (), False


def _kinds(model: type[BaseModel]) -> tuple[str, ...]:
    return tuple(str(kind) for kind in get_args(model.model_fields["kind"].annotation))


def _joined(rows: list[FieldRow]) -> list[FieldRow]:
    """Join rows that differ by their kinds alone, and gather the words of ``kind`` itself in one row."""
    joined: dict[tuple[str, ...], FieldRow] = {}
    for row in rows:
        is_kind = bool(row.kinds) and row.field.endswith(".kind")
        key = (row.field,) if is_kind else (row.field, row.type, row.dimension, row.required, row.default)
        before = joined.get(key)
        if before is None:
            joined[key] = row
            continue
        said = f"{before.type} or {row.type}" if is_kind else before.type
        joined[key] = before._replace(type=said, kinds=(*before.kinds, *row.kinds))
    return list(joined.values())


__all__ = ["FieldRow", "as_markdown", "field_reference"]
