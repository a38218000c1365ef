"""Trying a change of a loop without writing it: new values laid over its text, read and decided again."""

import copy
from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace
from pathlib import Path as FilePath
from typing import Any

from specgen.core.diagnostic import Diagnostic, Path, Span
from specgen.design.many import Task
from specgen.design.pairs import with_pair_rules
from specgen.design.project import LOOPS, catalogue_of, panel_of_sources
from specgen.design.record_loop import loop_record
from specgen.design.recordings import with_recordings
from specgen.design.types import DecidedLoop
from specgen.model.loops import ReadLoop, read_loops
from specgen.model.reader import Problem
from specgen.model.same_as import merge
from specgen.source.document import Data, Document
from specgen.source.folder import Sources
from specgen.source.read import read_text

PLACE = "--set"
_FORMS = ("balance", "response", "rates", "step_test")
_COMPARED = ("output", "settings", "predicted", "faults", "limiter")


@dataclass(frozen=True, slots=True)
class Trial:
    """A loop as declared and as tried; ``after`` is None where the new values cannot be, and ``problems`` say why, placed at ``--set``."""

    before: DecidedLoop
    after: DecidedLoop | None
    problems: tuple[Diagnostic, ...]


@dataclass(frozen=True, slots=True)
class Difference:
    """One figure or word of the record that changes: its section and key there, None where it is absent on a side."""

    section: str
    key: str
    before: object
    after: object


def try_values(
    sources: Sources, folder: FilePath, before: DecidedLoop, wanted: Sequence[str], beside: Sequence[DecidedLoop] = ()
) -> Trial:
    """Decide a loop again with new values.

    Parameters
    ----------
    sources : Sources
        The project's files as read.
    folder : pathlib.Path
        Its folder of loop files, where recordings lie.
    before : DecidedLoop
        The loop as declared.
    wanted : sequence of str
        Each ``path=value``, as ``need.tolerance=1 K`` or ``plant.balance.bodies.0.mass=80 kg``; below ``plant`` the name of the form may
        be left out. A value in brackets or braces is a list or a section.
    beside : sequence of DecidedLoop
        The panel's loops: those that share a body are judged two by two.

    Returns
    -------
    Trial
        Nothing is written.
    """
    documents = {str(d.data["tag"]).lower(): d for d in sources.loops if isinstance(d.data, dict) and isinstance(d.data.get("tag"), str)}
    document = documents[before.tag.lower()]
    merged = merge(before.tag, documents)
    assert not isinstance(merged, Problem)  # noqa: S101  it was read and decided
    data: dict[str, Any] = copy.deepcopy(merged.data)
    data["area"] = before.loop.area
    laid: list[Path] = []
    problems: list[Diagnostic] = []
    for number, text in enumerate(wanted, 1):
        found = _lay(data, text)
        if isinstance(found, Problem):
            problems.append(Diagnostic(Span(PLACE, number, 1), found.code, found.text, found.hint))
        else:
            laid.append(found)
    if problems:
        return Trial(before, None, tuple(problems))
    read, problems = _read(document, data, before.read, laid, folder)
    panel, _ = panel_of_sources(sources)
    catalogue, _ = catalogue_of(sources)
    if read is None or panel is None:
        return Trial(before, None, tuple(problems))
    after, found_problems = Task(panel, catalogue, firmness=False).decided(read)
    if after is not None:
        together = with_pair_rules([after, *(loop for loop in beside if loop.tag != after.tag)])
        after = next(loop for loop in together if loop.tag == before.tag)
    return Trial(before, after, tuple(_at_set(problem, laid) for problem in found_problems))


def _read(
    document: Document, data: dict[str, Data], before: ReadLoop, laid: Sequence[Path], folder: FilePath
) -> tuple[ReadLoop | None, list[Diagnostic]]:
    tried = Document(document.file, document.index, document.line, data, {path: Span(PLACE, n, 1) for n, path in enumerate(laid, 1)}, {})
    reading = read_loops([tried])
    if not reading.loops:
        return None, [_at_set(problem, laid) for problem in reading.problems]
    # where the fields stand that were not set, and from whom they were taken, is as before
    spans = {**dict(before.spans), **{path: Span(PLACE, n, 1) for n, path in enumerate(laid, 1)}}
    read = replace(reading.loops[0], file=before.file, line=before.line, spans=spans, inherited=before.inherited - set(laid))
    tested = with_recordings([read], folder, LOOPS)
    if not tested.loops:
        return None, [_at_set(problem, laid) for problem in tested.problems]
    return tested.loops[0], []


def _at_set(problem: Diagnostic, laid: Sequence[Path]) -> Diagnostic:
    """Place a problem at the value that was set; at the first where it is about what several make together."""
    span = problem.span if problem.span.file == PLACE else Span(PLACE, 1 if laid else 0, 1)
    return replace(problem, span=span)


def _lay(data: dict[str, Any], text: str) -> Path | Problem:
    """Put one value into the data; return its path."""
    name, equals, value = text.partition("=")
    name, value = name.strip(), value.strip()
    if not equals or not name:
        return Problem((), "L321", f"'{text}' is no path=value", 'write for example --set need.tolerance="1 K"')
    path = _path_of(name, data)
    if path[0] in ("tag", "same_as"):
        return Problem((), "L322", f"'{path[0]}' cannot be tried", "name the loop as the command's argument")
    parsed = _value(value)
    if isinstance(parsed, Problem):
        return parsed
    here: Any = data
    for depth, step in enumerate(path[:-1]):
        if isinstance(here, dict) and step not in here:
            here[step] = {}
        if not _may_hold(here, step):
            return _no_such(path[: depth + 1], here)
        here = here[step]
    if not _may_hold(here, path[-1], new=True):
        return _no_such(path, here)
    here[path[-1]] = parsed
    return path


def _path_of(name: str, data: Mapping[str, Any]) -> Path:
    """Split a path; below ``plant`` put in the form that the loop has where none is named."""
    steps: list[str | int] = [int(step) if step.isascii() and step.isdigit() else step for step in name.split(".")]
    plant = data.get("plant")
    if steps[0] == "plant" and len(steps) > 1 and steps[1] not in _FORMS and isinstance(plant, dict) and len(plant) == 1:
        steps.insert(1, next(iter(plant)))
    return tuple(steps)


def _may_hold(here: object, step: str | int, *, new: bool = False) -> bool:
    if isinstance(here, dict):
        return isinstance(step, str) and (new or step in here)
    return isinstance(here, list) and isinstance(step, int) and step < len(here)


def _no_such(path: Path, here: object) -> Problem:
    above = ".".join(str(step) for step in path[:-1])
    if isinstance(here, list):
        return Problem(path, "L322", f"{above} has no entry {path[-1]}", f"its entries are counted from 0 to {len(here) - 1}")
    if isinstance(here, dict):
        return Problem(path, "L322", f"{above or 'the loop'} is a section, and {path[-1]} is no key", "keys are words such as dead_time")
    return Problem(path, "L322", f"{above} is a single value and has nothing below it", f'write --set {above}="..." for the whole')


def _value(text: str) -> Data | Problem:
    """Return a value as a loop file would give it: text, or what brackets and braces hold."""
    if not text.startswith(("[", "{")):
        return text
    documents, problems = read_text(f"value: {text}\n", PLACE)
    if problems or not documents or not isinstance(documents[0].data, dict):
        first = problems[0] if problems else None
        return Problem((), first.code if first else "L321", first.text if first else f"'{text}' is no value", first.hint if first else "")
    return documents[0].data["value"]


def differences(trial: Trial) -> tuple[Difference, ...]:
    """Return what changes: the decision, verdict and reason first, then settings and figures, then the outcomes of rules.

    Numbers are the record's own, in its units.
    """
    if trial.after is None:
        return ()
    before, after = loop_record(trial.before), loop_record(trial.after)
    found = [Difference("decision", key, before.get(key), after.get(key)) for key in ("mode", "verdict", "because")]
    for section in _COMPARED:
        one, other = _flat(before.get(section, {})), _flat(after.get(section, {}))
        found += [Difference(section, key, one.get(key), other.get(key)) for key in dict.fromkeys([*one, *other])]
    ruled, now = ({rule["rule"]: rule["outcome"] for rule in row["rules"]} for row in (before, after))
    found += [Difference("rules", rule, ruled.get(rule), now.get(rule)) for rule in dict.fromkeys([*ruled, *now])]
    return tuple(one for one in found if one.before != one.after)


def _flat(section: Mapping[str, Any]) -> dict[str, Any]:
    flat: dict[str, Any] = {}
    for key, value in section.items():
        if isinstance(value, Mapping):
            flat |= {f"{key} {below}": figure for below, figure in value.items()}
        else:
            flat[key] = value
    return flat
