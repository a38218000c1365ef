"""The panel of the record: demand, incomer, its rules, and the schedules of protection, conductors and parts."""

from typing import Any

from specgen.design.panel.types import ConductorRow, PanelDesign, PartRow, ProtectionRow
from specgen.design.rounding import rounded
from specgen.rules.base import Finding
from specgen.sizing.candidate import Unsized

SQUARE_MM = 1e6
Row = dict[str, Any]


def panel_figures(panel: PanelDesign) -> Row:
    """Return what the record's ``panel`` holds beside its head.

    Returns
    -------
    dict
        ``demand`` [A] by conductor, ``imbalance``, ``incoming_protection`` [A], ``rules``, ``phases`` by loop; ``heat`` [W, m2,
        degC, air in m3/s] and ``control_supply`` [A]; what does not apply is absent.
    """
    made: Row = {
        "demand": {conductor: rounded(current) for conductor, current in panel.demand.currents.items()},
        "rules": [_rule(panel, finding) for finding in panel.findings],
        "phases": [{"loop": load.tag, "on": load.phases, "written": load.written} for load in panel.placed],
        "moved": [{"loop": moved.tag, "on": moved.phases, "in_turn": moved.in_turn} for moved in panel.moved],
    }
    if panel.interior is not None:
        heat = panel.interior
        made["heat"] = _present({
            "loss": heat.loss, "surface": heat.surface, "interior": heat.interior, "limit": heat.limit, "shortfall": heat.shortfall,
            "surface_needed": heat.surface_needed, "air": heat.air,
        })  # fmt: skip
    if panel.control is not None:
        control = panel.control
        made["control_supply"] = _present({"continuous": control.continuous, "inrush": control.inrush, "capacity": control.capacity})
    if panel.demand.imbalance is not None:
        made["imbalance"] = rounded(panel.demand.imbalance)
    if not isinstance(panel.incoming.rating, Unsized):
        made["incoming_protection"] = rounded(panel.incoming.rating)
    return made


def panel_schedules(panel: PanelDesign) -> Row:
    """Return the schedules of protection, conductors and parts."""
    return {
        "protection": [_protection(row) for row in panel.protection],
        "conductors": [_conductor(row) for row in panel.conductors],
        "parts": [_part(row) for row in panel.parts],
    }


def panel_open_points(panel: PanelDesign) -> list[Row]:
    """Return what the panel lacks; no loop is named."""
    return [{"field": point.field, "settles": list(point.settles), "how": point.how} for point in panel.open_points]


def _present(row: Row) -> Row:
    return {key: rounded(value) if isinstance(value, float) else value for key, value in row.items() if value is not None}


def _rule(panel: PanelDesign, finding: Finding) -> Row:
    return {
        "rule": finding.rule, "weight": finding.weight, "outcome": finding.outcome,
        "text": panel.phrasing.fill(finding.text, finding.words), "needs": list(finding.needs),
    }  # fmt: skip


def _protection(row: ProtectionRow) -> Row:
    return _present({
        "designation": row.designation, "loop": row.loop, "kind": row.kind, "rating": row.rating, "design_current": row.design_current,
        "curve": row.curve, "setting": row.setting, "phases": row.phases,
        "setting_range": None if row.setting_range is None else [rounded(end) for end in row.setting_range],
    })  # fmt: skip


def _conductor(row: ConductorRow) -> Row:
    return _present({
        "loop": row.loop, "designation": row.designation, "from": row.start, "to": row.end, "size": row.size * SQUARE_MM,
        "earth": row.earth * SQUARE_MM, "gauge": row.gauge, "method": row.method, "length": row.length, "current": row.current,
        "capacity": row.capacity, "protection": row.protection, "drop": row.drop, "phases": row.phases,
    })  # fmt: skip


def _part(row: PartRow) -> Row:
    return _present({
        "designation": row.designation, "what": row.what, "rating": row.rating, "quantity": row.quantity, "loops": list(row.loops),
    })  # fmt: skip
