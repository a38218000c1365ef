"""The cells of a recording as numbers and times: one decimal mark a file, nothing that can be read in two ways."""

import re
from datetime import datetime
from math import isfinite, nan

import numpy as np
from numpy.typing import NDArray

from specgen.source.recording_text import Lines, Problems

Cells = tuple[str, ...]
Array = NDArray[np.float64]

_MISSING = frozenset(("", "nan", "na", "n/a", "#n/a", "null", "none", "-", "--", "---"))
_NUMBER = re.compile(r"[-+]?(?:[0-9]+[.,]?[0-9]*|[.,][0-9]+)(?:[eE][-+]?[0-9]{1,3})?", re.ASCII)
_GROUPED = re.compile(r"[-+]?[0-9]{1,3}(?:([.,' \u00a0\u202f\u2009\u2019])[0-9]{3})+(?:[.,][0-9]*)?")
_THOUSANDS = re.compile(r"[-+]?[1-9][0-9]{0,2}[.,][0-9]{3}")
_STAMP = re.compile(r"[0-9]{4}-[0-9]{2}-[0-9]{2}[T ][0-9]{2}:[0-9]{2}(?::[0-9]{2}(?:[.,][0-9]{1,9})?)?(?: ?(?:Z|[-+][0-9]{2}:?[0-9]{2}))?")
_GROUPS_HINT = "write numbers without grouping and with one decimal mark, such as 1234.5"
_STAMP_HINT = "write 2026-03-04T10:00:00, or the time in a column such as t_s"


def is_stamp(text: str) -> bool:
    """Tell whether a cell looks like a date and time of ISO 8601.

    Examples
    --------
    >>> is_stamp("2026-03-04 10:00:00"), is_stamp("04/03/2026 10:00"), is_stamp("20260304")
    (True, False, False)
    """
    return _STAMP.fullmatch(text) is not None


def missing(text: str) -> bool:
    """Tell whether a cell stands for a reading that is not there."""
    return text.casefold() in _MISSING


def decimal_mark(columns: dict[int, Cells], lines: Lines, problems: Problems) -> str:
    """Find the one decimal mark of a file.

    Parameters
    ----------
    columns : dict
        The cells of each column that holds numbers, by its place in the header.
    lines : Lines
        The file, for the place of a problem.
    problems : Problems
        Takes what can be read in two ways.

    Returns
    -------
    str
        ``"."`` or ``","``.
    """
    with_comma = {index: [k for k, cell in enumerate(cells) if "," in cell] for index, cells in columns.items()}
    with_point = {index: [k for k, cell in enumerate(cells) if "." in cell] for index, cells in columns.items()}
    commas = [(index, rows[0]) for index, rows in with_comma.items() if rows]
    points = [(index, rows[0]) for index, rows in with_point.items() if rows]
    if not commas:
        return "."
    index, row = commas[0]
    cell, place = columns[index][row], lines.place(lines.rows[row], index)
    if lines.separator == ",":
        problems.add("R109", f"'{cell}' has a comma in a file that separates by commas", _GROUPS_HINT, place)
    elif points:
        other = columns[points[0][0]][points[0][1]]
        problems.add("R109", f"'{cell}' has a comma where the file also has points, as in '{other}'", _GROUPS_HINT, place)
    for index, rows in with_comma.items():
        # with decimals a column of three digits behind each comma has no number without; with thousands the small ones have none
        whole = any(cell.lstrip("+-").isdigit() for cell in columns[index])
        if rows and whole and all(_THOUSANDS.fullmatch(columns[index][k]) for k in rows):
            text = f"'{columns[index][rows[0]]}' may be a decimal or thousands: the column has whole numbers too"
            problems.add("R109", text, _GROUPS_HINT, lines.place(lines.rows[rows[0]], index))
    return ","


def numbers(index: int, cells: Cells, mark: str, lines: Lines, problems: Problems) -> Array:
    """Read a column of numbers; NaN where a reading is missing or not to be read."""
    out = np.full(len(cells), nan)
    for row, cell in enumerate(cells):
        if missing(cell):
            continue
        if _NUMBER.fullmatch(cell):
            number = float(cell.replace(",", ".")) if mark == "," else float(cell) if "," not in cell else nan
            if isfinite(number):
                out[row] = number
                continue
            if "," in cell:
                continue  # said once, for the file
        place = lines.place(lines.rows[row], index)
        if _GROUPED.fullmatch(cell) or _grouped_twice(cell):
            problems.add("R109", f"'{shown(cell)}' has its digits in groups", _GROUPS_HINT, place)
        else:
            hint = (
                "the unit belongs into the header"
                if re.match(r"[-+]?[0-9.,]+\s*[^0-9.,\s]", cell)
                else "leave the cell empty where a reading is missing"
            )
            problems.add("R108", f"'{shown(cell)}' is no number", hint, place)
    return out


def _grouped_twice(cell: str) -> bool:
    return re.fullmatch(r"[-+]?[0-9.,' ]+", cell) is not None and cell.count(",") + cell.count(".") > 1


def stamps(index: int, cells: Cells, lines: Lines, problems: Problems) -> Array:
    """Read a column of dates and times as seconds from the first; NaN where one is missing or not to be read."""
    out = np.full(len(cells), nan)
    first: datetime | None = None
    for row, cell in enumerate(cells):
        if missing(cell):
            continue
        try:
            when = datetime.fromisoformat(cell.replace(",", ".").replace(" Z", "Z").replace(" +", "+")) if is_stamp(cell) else None
        except ValueError:
            when = None
        if when is None:
            problems.add(
                "R114", f"'{shown(cell)}' is no date and time as ISO 8601 writes it", _STAMP_HINT, lines.place(lines.rows[row], index)
            )
            continue
        first = first or when
        if (when.tzinfo is None) != (first.tzinfo is None):
            problems.add(
                "R114",
                f"'{shown(cell)}' and the first time differ in having an offset from UTC",
                _STAMP_HINT,
                lines.place(lines.rows[row], index),
            )
            continue
        out[row] = (when - first).total_seconds()
    return out


def shown(text: str) -> str:
    """Cut a cell for a sentence."""
    clean = "".join(letter if letter.isprintable() else "?" for letter in text)
    return clean if len(clean) <= 40 else clean[:37] + "..."  # noqa: PLR2004 - a line of a terminal
