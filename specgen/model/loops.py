"""Reading all loop documents together: tags, ``same_as``, the loop's own quantity, and the models."""

import re
from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass
from pathlib import PurePosixPath
from typing import Any

from specgen.core.diagnostic import Diagnostic, Path, Span
from specgen.core.dimension import Dimension, own_dimension
from specgen.core.quantity import QuantityError, Unit, parse_quantity, written_unit
from specgen.model.fields import shown
from specgen.model.fitted import Fitted
from specgen.model.hints import has
from specgen.model.loop import Loop
from specgen.model.reader import Plain, Problem, place, read_model
from specgen.model.same_as import Merged, merge

TAG = re.compile(r"[A-Za-z0-9-]{1,40}\Z")
_DEVICE = re.compile(r"(?i)(con|prn|aux|nul|clock|com[0-9]|lpt[0-9]|conin|conout)\Z")
# pages of the dossier stand beside the sheets' data; a loop of the same name would overwrite one
_RESERVED = ("record", "schedules", "source")

_DIMENSIONS: Mapping[str, tuple[tuple[str, str, str], ...]] = {
    "temperature": (("temperature", "difference", "rate_of_temperature"),),
    "pressure": (("pressure", "pressure_difference", "pressure_rate"),),
    "humidity": (("fraction", "fraction", "fraction_rate"),),
    "level": (("fraction", "fraction", "fraction_rate"), ("length", "length", "length_rate")),
    "flow": (("flow_volume", "flow_volume", "flow_volume_rate"), ("flow_mass", "flow_mass", "flow_mass_rate"),
             ("fraction", "fraction", "fraction_rate")),
}


@dataclass(frozen=True, slots=True)
class ReadLoop:
    """A loop that was read without a problem, with the place of every field that was written.

    ``fitted`` is what its recorded step test says, once that was identified.
    """

    loop: Loop
    file: str
    line: int
    spans: Mapping[Path, Span]
    inherited: frozenset[Path]
    fitted: Fitted | None = None

    def written(self, path: Path) -> bool:
        """Tell whether the loop file says this field itself (not inherited, not a default)."""
        return path in self.spans and not any(field[: len(path)] == path for field in self.inherited)


@dataclass(frozen=True, slots=True)
class Reading:
    """Every loop that could be read and every problem of those that could not."""

    loops: tuple[ReadLoop, ...]
    problems: tuple[Diagnostic, ...]


def read_loops(documents: Sequence[Plain]) -> Reading:
    """Read every loop document; problems of one never hide another."""
    problems: list[Diagnostic] = []
    by_tag: dict[str, Plain] = {}
    for document in documents:
        fault = _tag_problem(document, by_tag)
        if fault is not None:
            problems.append(place(document, fault))
            continue
        by_tag[document.data["tag"].lower()] = document
    loops: list[ReadLoop] = []
    for document in by_tag.values():
        merged = merge(document.data["tag"], by_tag)
        if isinstance(merged, Problem):
            problems.append(place(document, merged))
            continue
        loop, found = _read_one(document, merged)
        problems += [place(document, fault, merged.taken) for fault in found]
        if loop is not None and document.sound and all(origin.sound for origin in merged.taken.values()):
            loops.append(ReadLoop(loop, document.file, document.line, Places(document.spans, merged.taken), merged.fields))
    ordered = sorted(loops, key=lambda read: (read.loop.area.lower(), read.loop.tag.lower()))
    return Reading(tuple(ordered), tuple(sorted(set(problems))))


def _tag_problem(document: Plain, by_tag: Mapping[str, Plain]) -> Problem | None:
    if not isinstance(document.data, dict):
        return Problem((), "L201", "a loop is a section of keys such as tag, service, need, sensor and element")
    tag = document.data.get("tag")
    if tag is None:
        return Problem(("tag",), "F102", "'tag' is missing: the loop has no name", "for example tag: TIC-101")
    if not isinstance(tag, str) or not TAG.match(tag):
        said = shown(tag) if isinstance(tag, str) else "this"
        return Problem(("tag",), "L202", f"'{said}' cannot be a tag: it becomes a file name",
                       "letters, digits and '-', 40 at most, for example TIC-101")
    if _DEVICE.match(tag) or tag.lower() in _RESERVED:
        return Problem(("tag",), "L202", f"'{tag}' is a reserved name and cannot be a file's", "for example TIC-101")
    if tag.lower() in by_tag:
        first = by_tag[tag.lower()]
        at = first.spans[("tag",)]
        return Problem(("tag",), "L205", f"the tag '{tag}' is already taken",
                       f"its first use is {at.file}:{at.line}; tags differ by more than case")
    return None


def _read_one(document: Plain, merged: Merged) -> tuple[Loop | None, list[Problem]]:
    data = dict(merged.data)
    data.setdefault("area", _area(document.file))
    extra = [
        Problem((key,), "F101", f"'{key}' is not a key of the document", "known here: tag, service, need, sensor, element", at_key=True)
        for key in ("unit", "difference_unit")
        if key in data
    ]
    context, fault = _context(data.get("need"))
    if fault is not None:
        extra.append(fault)
    data["unit"] = context.pop("unit")
    data["difference_unit"] = context.pop("difference_unit")
    loop, problems = read_model(Loop, data, context)
    seen: set[tuple[Path, str, str]] = {(p.path, p.code, p.text) for p in extra}
    kept = list(extra)
    told = fault is not None or any(p.code != "F110" for p in problems)
    for found in problems:
        # what only says that the quantity could not be told follows from a fault already reported,
        # and so does what is said of a value that the text itself left empty
        follows = (fault is not None and found.path == fault.path) or (told and found.code == "F110")
        follows = follows or _left_empty(document, found.path)
        key = (found.path, found.code, found.text)
        if key not in seen and not follows:
            seen.add(key)
            kept.append(found)
    return (None if kept else loop), kept


def _left_empty(document: Plain, path: Path) -> bool:
    if document.sound:
        return False
    if path in document.key_spans and path not in document.spans:
        return True
    here: object = document.data
    for step in path:
        if not has(here, step):
            return False
        here = here[step]  # type: ignore[index]  # has looked
    return here == ""


def _area(file: str) -> str:
    stem = PurePosixPath(file).stem.replace("-", " ").replace("_", " ").strip()
    return stem[:1].upper() + stem[1:]


def _context(need: object) -> tuple[dict[str, Any], Problem | None]:
    """Find the dimension of the loop's quantity from its name and the unit of its setpoint."""
    none = {"unit": Unit("degC"), "difference_unit": Unit("K")}
    if not isinstance(need, dict):
        return none, None
    quantity, setpoint = need.get("quantity"), need.get("setpoint")
    if quantity == "other":
        label = need.get("unit")
        if not isinstance(label, str):
            return none, Problem(("need", "unit"), "F102", "'unit' is needed where the quantity is other", "for example unit: pH")
        try:
            value, rate = own_dimension(label), own_dimension(label, rate=True)
        except QuantityError as error:
            return none, Problem(("need", "unit"), error.code, error.text, error.hint)
        unit = Unit(label)
        return _named(quantity, value, value, rate, unit, unit), None
    if "unit" in need:
        return none, Problem(("need", "unit"), "F114", "unit is written only where the quantity is other", "leave it out")
    choices = _DIMENSIONS.get(quantity) if isinstance(quantity, str) else None
    if choices is None or not isinstance(setpoint, str):
        return none, None
    fault: Problem | None = None
    for value_name, difference, rate_name in choices:
        try:
            parse_quantity(setpoint, value_name)
        except QuantityError as error:
            fault = fault or Problem(("need", "setpoint"), error.code, error.text + f"; the loop's quantity is {quantity}", error.hint)
            continue
        written = Unit("degC") if value_name == "temperature" else written_unit(setpoint)
        step = Unit("K") if value_name == "temperature" else Unit(written.symbol.replace(" absolute", ""), written.scale)
        return _named(quantity, value_name, difference, rate_name, written, step), None
    value_name, difference, rate_name = choices[0]
    return _named(quantity, value_name, difference, rate_name, Unit("degC"), Unit("K")), fault


def _named(
    quantity: object, value: str | Dimension, difference: str | Dimension, rate: str | Dimension, unit: Unit, step: Unit
) -> dict[str, Any]:
    return {"value": value, "difference_of_value": difference, "rate_of_value": rate, "unit": unit, "difference_unit": step,
            "because": f"; the loop's quantity is {quantity}"}


class Places(Mapping[Path, Span]):
    """Where each field of a loop stands, in its own document or in the one it was taken from; made when asked for."""

    __slots__ = ("_own", "_taken")

    def __init__(self, own: Mapping[Path, Span], taken: Mapping[Path, Plain]) -> None:
        self._own = own
        self._taken = taken

    def __getitem__(self, path: Path) -> Span:
        """Return the place of a field."""
        origin = self._taken.get(path)
        return self._own[path] if origin is None else origin.spans[path]

    def __iter__(self) -> Iterator[Path]:
        yield from (path for path in self._own if path and path not in self._taken)
        yield from self._taken

    def __len__(self) -> int:
        return sum(1 for _ in self)

    def __contains__(self, path: object) -> bool:
        return path in self._own or path in self._taken


__all__ = ["ReadLoop", "Reading", "read_loops"]
