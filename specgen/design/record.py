"""The machine-readable record: the same from run to run, numbers never formatted."""

import json
from typing import Any

from specgen import __version__
from specgen.core.diagnostic import Diagnostic
from specgen.design.record_loop import loop_record
from specgen.design.record_panel import panel_figures, panel_open_points, panel_schedules
from specgen.design.record_wiring import wiring_schedules
from specgen.design.types import Design

FORMAT = "specgen-record/1"


def record_of(design: Design) -> dict[str, Any]:
    """Return the whole design as plain data.

    Returns
    -------
    dict
        As the contract of ``data/record.json``: what does not apply is absent, never null; numbers are rounded to
        nine significant digits, in the loop's own unit where they are values or differences of it.
    """
    loops = [loop_record(loop) for loop in design.loops]
    record: dict[str, Any] = {
        "format": FORMAT,
        "made_by": {"version": __version__, "rules": design.rules_digest, "catalogue": design.catalogue_digest},
        "loops": loops,
        "schedules": {"outputs": [_output_row(loop) for loop in loops]},
        "open_points": [
            {"loop": loop["tag"], "field": row["field"], "settles": row["settles"], "how": row["how"]}
            for loop in loops
            for row in loop["missing"]
        ],
        "problems": [_problem(problem) for problem in design.problems],
    }
    if design.panel is not None:
        head = design.panel.panel
        record["panel"] = {
            "reference": head.reference, "revision": head.revision, "status": head.status, "title": head.title,
            "date": head.date.isoformat(), "verdict": design.verdict,
        }  # fmt: skip
    if design.panel_design is not None:
        record["panel"] |= panel_figures(design.panel_design)
        record["schedules"] |= panel_schedules(design.panel_design) | wiring_schedules(design)
        record["open_points"] += panel_open_points(design.panel_design)
    return record


def dump(record: dict[str, Any]) -> bytes:
    r"""Write a record: UTF-8, keys sorted, one final line end.

    Examples
    --------
    >>> dump({"b": 1, "a": "°"}).decode()
    '{"a":"°","b":1}\n'
    """
    # without indentation: Python's quick encoder knows none, and a thousand loops are a matter of seconds
    return (json.dumps(record, ensure_ascii=False, sort_keys=True, separators=(",", ":"), allow_nan=False) + "\n").encode()


def _output_row(loop: dict[str, Any]) -> dict[str, Any]:
    output = loop["output"]
    return {"loop": loop["tag"]} | {key: output[key] for key in ("device", "controller_output", "designation") if key in output}


def _problem(problem: Diagnostic) -> dict[str, Any]:
    return {
        "file": problem.span.file, "line": problem.span.line, "column": problem.span.column, "severity": problem.severity,
        "code": problem.code, "text": problem.text, "hint": problem.hint,
    }  # fmt: skip


