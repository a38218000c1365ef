"""Inputs that are not there: which rules they would settle, and how to get them."""

from collections.abc import Iterable

from specgen.design.types import Missing
from specgen.rules.base import Case, Finding
from specgen.sizing.candidate import Unsized

_HOW = (
    ("plant.", "heat balance from drawings and data sheets, or a recorded step test"),
    ("plant", "a heat balance, a known response, observed rates, or a recorded step test"),
    ("sensor.", "data sheet of the sensor or transmitter"),
    ("element.needs", "process description: what must be proven before it may heat; [] where nothing"),
    ("element.", "data sheet of the element, or its name-plate"),
    ("limits.", "hazard review with the process owner"),
    ("need.", "process description"),
    ("cable.", "cable schedule, or measured on site"),
    ("controllers", "data sheet of the controller"),
    ("devices.", "data sheet of the device"),
    ("short_circuit_rating", "marked ratings of the components, put together as the code says"),
    ("supply", "supply authority, or measured on site"),
)


def how_to_get(field: str) -> str:
    """Return how an input is usually obtained.

    Examples
    --------
    >>> how_to_get("element.starts_per_hour"), how_to_get("whatever")
    ('data sheet of the element, or its name-plate', 'ask whoever designed the plant')
    """
    return next((how for prefix, how in _HOW if field == prefix or field.startswith(prefix)), "ask whoever designed the plant")


def missing_inputs(findings: Iterable[Finding], case: Case) -> tuple[Missing, ...]:
    """Return every input that a finding lacked, with the rules it would settle, and open points of the device."""
    settles: dict[str, list[str]] = {}
    for finding in findings:
        if finding.outcome == "unanswered":
            for field in finding.needs:
                settles.setdefault(field, []).append(finding.rule)
    found = [Missing(field, tuple(dict.fromkeys(rules)), how_to_get(field)) for field, rules in settles.items()]
    if not isinstance(case.device, Unsized):
        known = set(settles)
        for point in case.device.open_points:
            fields = point.needs or ("device",)
            found += [Missing(field, (), point.because) for field in fields if field not in known]
    elif case.device.needs:
        found += [Missing(field, (), case.device.because) for field in case.device.needs if field not in settles]
    if not isinstance(case.feeder, Unsized):
        here = {missing.field for missing in found}
        found += [Missing(field, (), point.because) for point in case.feeder.open_points for field in point.needs if field not in here]
    return tuple(sorted(set(found), key=lambda missing: (not missing.settles, missing.field, missing.how)))
