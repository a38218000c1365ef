"""A recorded step test: a CSV file to time, output and value with their units."""

import difflib
import re
from dataclasses import dataclass, field

import numpy as np
from numpy.typing import NDArray

from specgen.core.diagnostic import Diagnostic
from specgen.core.dimension import DIMENSIONS, Dimension, own_dimension
from specgen.core.quantity import Unit, unit
from specgen.core.unit import fits, plain_unit, right_spelling
from specgen.source.recording_number import Cells, decimal_mark, is_stamp, missing, numbers, stamps
from specgen.source.recording_text import RECORDING_CODES, Lines, Problems, cut_lines, decoded

__all__ = ["RECORDING_CODES", "Columns", "ReadRecording", "Recording", "read_recording"]

Array = NDArray[np.float64]

_MEASURED = ("temperature", "pressure", "flow_volume", "flow_mass", "length", "fraction")
_BRACKETS = re.compile(r"(?P<name>.*?)\s*(?:\[(?P<square>[^\]]*)\]|\((?P<round>[^)]*)\))\s*")
_OUTPUT_NAME = re.compile(r"(out|output|op|co|cv|mv|u|valve|heater)\b|(out|output)", re.IGNORECASE)
_TIME_NAME = re.compile(r"(time|date|timestamp|datetime|t)\b", re.IGNORECASE)
_LISTED = 5


@dataclass(frozen=True, slots=True)
class Columns:
    """Names of the columns as in the header; one that is not named is found by its unit.

    ``units`` gives the unit of a column, by its name, where the header does not.
    """

    time: str | None = None
    output: str | None = None
    value: str | None = None
    units: dict[str, str] = field(default_factory=dict)


@dataclass(frozen=True, slots=True)
class Recording:
    """What was recorded, a row a sample; NaN where a cell is empty.

    ``time`` counts from the first row [s], ``output`` is a fraction, ``value`` is in the base unit of ``dimension``; ``unit`` is the one
    it was recorded in. ``lines`` are the rows' numbers in the file.
    """

    time: Array
    output: Array
    value: Array
    dimension: Dimension
    unit: Unit
    names: tuple[str, str, str]
    lines: tuple[int, ...]

    @property
    def written(self) -> Array:
        """The value in the unit it was recorded in."""
        return np.asarray(self.value * self.unit.scale + self.unit.offset, dtype=np.float64)


@dataclass(frozen=True, slots=True)
class ReadRecording:
    """The recording, None where a problem stands in its way, with all problems and with what was assumed in reading."""

    recording: Recording | None
    problems: tuple[Diagnostic, ...]
    notes: tuple[str, ...]


@dataclass(frozen=True, slots=True)
class _Column:
    index: int
    header: str
    unit: str
    cells: Cells


def read_recording(raw: bytes, file: str, columns: Columns | None = None) -> ReadRecording:
    r"""Read a recording.

    Parameters
    ----------
    raw : bytes
        The file: UTF-8, UTF-16 or Latin-1; separated by tab, semicolon or comma; lines that begin with ``#`` or ``//`` are comments.
    file : str
        Its name, for problems.
    columns : Columns, optional
        Which columns to take; found by their units where absent.

    Returns
    -------
    ReadRecording
        The recording or the reasons why there is none; every problem has file, line and column.

    Notes
    -----
    A unit stands behind the name: ``t_s``, ``out_percent``, ``pv_degC``, ``flow_m3/h``, or in brackets: ``time [s]``. Time is a number in
    s, min or h, or an ISO 8601 date and time. A decimal comma is read where the separator is no comma; digits in groups, or
    points and commas in one file, are refused.

    Examples
    --------
    >>> read = read_recording(b"t_min;out_percent;pv_degC\n0;20;20,5\n1;70;20,75\n", "a.csv").recording
    >>> read.time.tolist(), read.output.tolist(), read.value.tolist(), read.unit.symbol
    ([0.0, 60.0], [0.2, 0.7], [20.5, 20.75], 'degC')
    >>> read_recording(b"t_s,out_percent,pv_degC\n0,0,hot\n", "a.csv").problems[0].line()
    "a.csv:2:5: error R108: 'hot' is no number"
    """
    problems, notes = Problems(file), list[str]()
    text = decoded(raw, problems, notes)
    lines = cut_lines(text, problems, notes) if text else None
    found = _found(lines, columns or Columns(), problems, notes) if lines else None
    if lines is None or found is None:
        return ReadRecording(None, problems.all(), tuple(notes))
    recording = _recording(lines, found, problems, notes)
    return ReadRecording(None if problems.found else recording, problems.all(), tuple(notes))


def header_unit(header: str) -> tuple[str, str]:
    """Split a header into name and unit; the unit is empty where none that is known stands there.

    Examples
    --------
    >>> header_unit("pv_degC"), header_unit("time [s]"), header_unit("flow_m3_per_h"), header_unit("tank_level")
    (('pv', 'degC'), ('time', 's'), ('flow', 'm3/h'), ('tank_level', ''))
    """
    bracketed = _BRACKETS.fullmatch(header)
    if bracketed:
        return bracketed["name"], plain_unit((bracketed["square"] or bracketed["round"] or "").strip())
    for place in (found.start() for found in re.finditer("_", header)):
        written = plain_unit(header[place + 1 :].replace("_per_", "/"))
        if any(fits(written, DIMENSIONS[name]) for name in ("time", *_MEASURED)):
            return header[:place], written
    return header, ""


def _found(lines: Lines, asked: Columns, problems: Problems, notes: list[str]) -> tuple[_Column, _Column, _Column] | None:
    """Cut the rows and return the columns of time, output and value."""
    table = _table(lines, problems, notes)
    if table is None:
        return None
    given = {name.casefold(): written for name, written in asked.units.items()}
    every = [
        _Column(k, name, given.get(name.casefold(), header_unit(name)[1]), tuple(row[k] for row in table))
        for k, name in enumerate(lines.header)
    ]
    asked_for = {name.casefold() for name in (asked.time, asked.output, asked.value) if name}
    taken: list[_Column] = []
    for role, name in (("time", asked.time), ("output", asked.output), ("value", asked.value)):
        free = [column for column in every if column not in taken and column.header.casefold() not in asked_for]
        column = _named(role, name, every, lines, problems) if name else _guessed(role, free, lines, problems)
        if column is not None:
            taken.append(column)
    if len(taken) < 3:  # noqa: PLR2004 - time, output, value
        return None
    if not (asked.time and asked.output and asked.value):
        notes.append(f"columns: time {taken[0].header}, output {taken[1].header}, value {taken[2].header}")
    return taken[0], taken[1], taken[2]


def _table(lines: Lines, problems: Problems, notes: list[str]) -> list[list[str]] | None:
    """Cut all rows into as many cells as the header has."""
    width, table = len(lines.header), list[list[str]]()
    for number, line in lines.rows:
        if line.count('"') % 2:
            problems.add("R107", "a quotation mark is not closed", at=(number, line.index('"') + 1, 1))
            continue
        cells = lines.cells(line)
        if len(cells) > width and not any(cells[width:]):
            cells = cells[:width]
        if len(cells) < width and number == lines.rows[-1][0] and len(table) > 1:
            notes.append(f"the last row, line {number}, is cut short and left out")
            cells = [""] * width
        if len(cells) != width:
            commas = lines.separator == "," and len(cells) > width
            hint = "decimal commas cannot be told from separators: save with semicolons or with decimal points" if commas else ""
            problems.add("R106", f"the row has {len(cells)} cells, the header {width}", hint, (number, 1, len(line)))
            continue
        table.append(cells)
    return None if problems.found else table


def _named(role: str, name: str, every: list[_Column], lines: Lines, problems: Problems) -> _Column | None:
    same = [column for column in every if column.header == name] or [
        column for column in every if column.header.casefold() == name.casefold()
    ]
    if same:
        return same[0]
    near = difflib.get_close_matches(name, lines.header, n=1, cutoff=0.5)
    hint = f"did you mean {near[0]}?" if near else f"the columns are {', '.join(lines.header)}"
    problems.add("R110", f"there is no column '{name}' for the {role}", hint, (lines.header_line[0], 1, len(lines.header_line[1])))
    return None


def _guessed(role: str, free: list[_Column], lines: Lines, problems: Problems) -> _Column | None:
    """Find a column by its unit; where two suit, by its name."""
    if role == "time":
        suits = [column for column in free if fits(column.unit, DIMENSIONS["time"]) or _first_is_stamp(column)]
        preferred = [column for column in suits if _TIME_NAME.match(column.header.replace("_", " "))]
    elif role == "output":
        suits = [column for column in free if fits(column.unit, DIMENSIONS["fraction"])]
        preferred = [column for column in suits if _OUTPUT_NAME.match(column.header.replace("_", " "))]
    else:
        suits = [column for column in free if column.unit and not fits(column.unit, DIMENSIONS["time"])]
        preferred = []
    for few in (suits, preferred):
        if len(few) == 1:
            return few[0]
    wanted = {"time": "t_s or time [s]", "output": "out_percent", "value": "pv_degC or pv_bar"}[role]
    at = (lines.header_line[0], 1, len(lines.header_line[1]))
    if suits:
        problems.add(
            "R112", f"{' and '.join(column.header for column in suits)} may each be the {role}", f"name the column of the {role}", at
        )
    else:
        problems.add(
            "R112",
            f"no column is the {role} by its unit",
            f"put the unit into the header, as in {wanted}, or name the column and its unit",
            at,
        )
    return None


def _first_is_stamp(column: _Column) -> bool:
    return is_stamp(next((cell for cell in column.cells if not missing(cell)), ""))


def _recording(lines: Lines, found: tuple[_Column, _Column, _Column], problems: Problems, notes: list[str]) -> Recording | None:
    time, output, value = found
    stamped = _first_is_stamp(time)
    numeric = found[1:] if stamped else found
    mark = decimal_mark({column.index: column.cells for column in numeric}, lines, problems)
    if mark == ",":
        notes.append("numbers are read with a decimal comma")
    time_unit = None if stamped else _unit_of(time, ("time",), lines, problems)
    output_unit = _unit_of(output, ("fraction",), lines, problems)
    value_unit = _unit_of(value, _MEASURED, lines, problems, own=True)
    read = [numbers(column.index, column.cells, mark, lines, problems) for column in numeric]
    if output_unit is None or value_unit is None or (time_unit is None and not stamped):
        return None
    seconds = stamps(time.index, time.cells, lines, problems) if stamped else read[0] / time_unit[1].scale if time_unit else read[0]
    _check_increasing(seconds, time, lines, problems)
    _tell_missing(seconds, read[-2], read[-1], lines, notes)
    shares = read[-2] / output_unit[1].scale
    base = (read[-1] - value_unit[1].offset) / value_unit[1].scale
    first = seconds[np.isfinite(seconds)]
    begin = float(first[0]) if len(first) else 0.0
    names = (time.header, output.header, value.header)
    return Recording(seconds - begin, shares, base, value_unit[0], value_unit[1], names, tuple(number for number, _ in lines.rows))


def _unit_of(
    column: _Column, dimensions: tuple[str, ...], lines: Lines, problems: Problems, *, own: bool = False
) -> tuple[Dimension, Unit] | None:
    """Return dimension and unit of a column, or say why it has none."""
    for name in dimensions:
        if fits(column.unit, DIMENSIONS[name]):
            return DIMENSIONS[name], unit(column.unit, DIMENSIONS[name])
    place = lines.place(lines.header_line, column.index)
    row = DIMENSIONS[dimensions[0]]
    if not column.unit:
        problems.add(
            "R111", f"the column {column.header} has no unit", f"write it behind the name, as in {column.header}_{row.usual[0]}", place
        )
        return None
    meant = [spelt for spelt in (right_spelling(column.unit, DIMENSIONS[name]) for name in dimensions) if spelt]
    known = any(fits(column.unit, other) for other in DIMENSIONS.values())
    if own and not meant and not known:
        dimension = own_dimension(column.unit)
        return dimension, Unit(column.unit)
    hint = f"write {meant[0]}" if meant else f"its unit is for example {row.usual[0]}"
    problems.add("R111", f"the unit {column.unit} of the column {column.header} does not suit it", hint, place)
    return None


def _check_increasing(seconds: Array, time: _Column, lines: Lines, problems: Problems) -> None:
    rows = np.flatnonzero(np.isfinite(seconds))
    for later in np.flatnonzero(np.diff(seconds[rows]) <= 0.0) + 1:
        row, before = int(rows[later]), int(rows[later - 1])
        text = f"time {'stands still' if seconds[row] == seconds[before] else 'goes back'}: {time.cells[row]} after {time.cells[before]}"
        hint = "remove doubled rows, or the rows from before a change of the clock"
        problems.add("R113", text, hint, lines.place(lines.rows[row], time.index))


def _tell_missing(seconds: Array, output: Array, value: Array, lines: Lines, notes: list[str]) -> None:
    empty = np.flatnonzero(~np.isfinite(seconds + output + value))
    if len(empty):
        where = ", ".join(str(lines.rows[row][0]) for row in empty[:_LISTED]) + (", ..." if len(empty) > _LISTED else "")
        notes.append(f"{len(empty)} rows with an empty cell are left out (lines {where})")
