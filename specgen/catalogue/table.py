"""Packaged tables: rows of YAML with their source, edition and standing, checked on loading."""

import re
from collections.abc import Iterable, Mapping
from dataclasses import dataclass
from functools import cache
from hashlib import sha256
from importlib.resources import files
from importlib.resources.abc import Traversable
from typing import Generic, Literal, TypeVar, get_args

from specgen.model.fields import Model
from specgen.model.reader import read_model
from specgen.source.read import read_table

M = TypeVar("M", bound=Model)
Standing = Literal["seen in a secondary text", "from memory", "common practice", "typical: common practice"]
STANDINGS: tuple[str, ...] = get_args(Standing)
_STANDARD = re.compile(r"\b(IEC|ISO|EN|NFPA|NEMA|UL|ASTM|ANSI|NIST)\b")
_ABOUT = ("id", "source", "edition", "standing")


class CatalogueError(Exception):
    """A packaged table is broken: a fault of specgen itself, never of what the designer wrote."""


@dataclass(frozen=True, slots=True)
class Row:
    """One row of a table: what it is called, what it holds, and how far it can be trusted.

    ``values`` are the row's other keys, still text. ``edition`` is never empty where the source is a standard.
    """

    id: str
    source: str
    edition: str
    standing: str
    values: Mapping[str, object]

    def typed(self, model: type[M]) -> M:
        """Return the row's values as a model.

        Raises
        ------
        CatalogueError
            A value is missing, unknown, or of the wrong dimension.
        """
        made, problems = read_model(model, dict(self.values))
        if made is None:
            raise CatalogueError(f"{self.id}: " + "; ".join(f"{'.'.join(map(str, p.path))}: {p.text}" for p in problems))
        return made

    @property
    def cited(self) -> str:
        """Return the source with its edition and standing, for a figure."""
        edition = f":{self.edition}" if self.edition else ""
        return f"{self.source}{edition} ({self.standing})" if self.source != self.standing else self.source


def read_rows(text: str, name: str) -> tuple[Row, ...]:
    """Read and check the rows of a table.

    Parameters
    ----------
    text : str
        YAML: a list of rows, each with ``id``, ``source``, ``standing``, ``edition`` where the source is a standard.
    name : str
        The table's name; every id starts with it.

    Raises
    ------
    CatalogueError
        The text is no list of such rows.

    Examples
    --------
    >>> row, = read_rows("- {id: a/1, x: 3 A, source: IEC 60947-1, edition: 2020, standing: from memory}", "a")
    >>> row.cited, dict(row.values)
    ('IEC 60947-1:2020 (from memory)', {'x': '3 A'})
    """
    document, problems = read_table(text, f"{name}.yml")
    if problems or document is None:
        raise CatalogueError("; ".join(problem.line() for problem in problems) or f"{name}.yml is empty")
    if not isinstance(document.data, list):
        raise CatalogueError(f"{name}.yml is not a list of rows")
    rows: list[Row] = []
    seen: set[str] = set()
    for number, data in enumerate(document.data):
        row = _row(data, f"{name}.yml row {number + 1}")
        if not row.id.startswith(f"{name}/"):
            raise CatalogueError(f"{row.id} stands in {name}.yml; its id starts with {name}/")
        if row.id in seen:
            raise CatalogueError(f"{row.id} is written twice")
        seen.add(row.id)
        rows.append(row)
    return tuple(rows)


def _row(data: object, at: str) -> Row:
    if not isinstance(data, dict):
        raise CatalogueError(f"{at} is not a row of keys")
    about = {key: data.get(key, "") for key in _ABOUT}
    for key in ("id", "source", "standing"):
        if not isinstance(about[key], str) or not about[key]:
            raise CatalogueError(f"{at} has no {key}")
    if about["standing"] not in STANDINGS:
        raise CatalogueError(f"{at}: the standing '{about['standing']}' is none of: {', '.join(STANDINGS)}")
    if _STANDARD.search(about["source"]) and not about["edition"]:
        raise CatalogueError(f"{at} cites {about['source']} without an edition")
    values = {key: value for key, value in data.items() if key not in _ABOUT}
    if not values:
        raise CatalogueError(f"{at} holds nothing")
    return Row(about["id"], about["source"], about["edition"], about["standing"], values)


@cache
def table(name: str) -> tuple[Row, ...]:
    """Return the rows of a packaged table.

    Raises
    ------
    CatalogueError
        There is no such table, or it is broken.

    Examples
    --------
    >>> [row.values["a"] for row in table("platinum_classes") if row.values["class"] == "A"]
    ['0.15 K']
    """
    path = _folder().joinpath(f"{name}.yml")
    if not path.is_file():
        raise CatalogueError(f"there is no table {name}")
    return read_rows(path.read_text(encoding="utf-8"), name)


@cache
def table_names() -> tuple[str, ...]:
    """Return the names of all packaged tables, sorted."""
    return tuple(sorted(path.name.removesuffix(".yml") for path in _folder().iterdir() if path.name.endswith(".yml")))


@cache
def catalogue_digest() -> str:
    """Return a digest that changes when any packaged table changes.

    Examples
    --------
    >>> len(catalogue_digest())
    64
    """
    digest = sha256()
    for name in table_names():
        # line ends differ between checkouts; read_text makes them one
        text = _folder().joinpath(f"{name}.yml").read_text(encoding="utf-8")
        digest.update(f"{name}\0{len(text)}\0{text}".encode())
    return digest.hexdigest()


def _folder() -> Traversable:
    return files("specgen.catalogue").joinpath("data")


@dataclass(frozen=True, slots=True)
class Known(Generic[M]):
    """A typed row with the row it came from, so that a figure can name its source."""

    value: M
    row: Row


def known_rows(name: str, model: type[M]) -> tuple[Known[M], ...]:
    """Return every row of a table, typed.

    Raises
    ------
    CatalogueError
        As :func:`table` and :meth:`Row.typed`.
    """
    return tuple(Known(row.typed(model), row) for row in table(name))


def row_named(rows: Iterable[Known[M]], name: str) -> Known[M]:
    """Return the row of a name.

    Raises
    ------
    CatalogueError
        There is none: a mistake in specgen itself.
    """
    for known in rows:
        if known.row.id == name:
            return known
    raise CatalogueError(f"there is no {name}")
