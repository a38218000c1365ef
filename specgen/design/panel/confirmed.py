"""Table rows recalled from memory that protection and conductors stand on, less those that somebody confirmed."""

from collections.abc import Iterable, Iterator

from specgen.catalogue.table import Row
from specgen.design.types import Design
from specgen.model.panel import Panel
from specgen.sizing.feeder import Feeder

FROM_MEMORY = "from memory"


def from_memory_rows_used(design: Design) -> tuple[Row, ...]:
    """Return the rows used that stand from memory and are not in ``confirmed``.

    Parameters
    ----------
    design : Design
        The whole design.

    Returns
    -------
    tuple of Row
        By id; empty where everything used was held against its source. An issue for construction is refused otherwise.
    """
    if design.panel is None:
        return ()
    used = {row.id: row for row in _used(design) if row.standing == FROM_MEMORY}
    return tuple(row for key, row in sorted(used.items()) if not is_confirmed(key, design.panel))


def is_confirmed(row: str, panel: Panel) -> bool:
    """Tell whether a row is confirmed by its own id, or by that of the group it stands in: ``conductors/B1`` for ``conductors/B1/2.5``."""
    return any(row == entry.row or row.startswith(entry.row.rstrip("/") + "/") for entry in panel.confirmed)


def unknown_confirmations(panel: Panel, rows: Iterable[Row]) -> tuple[str, ...]:
    """Return what ``confirmed`` names that is no row of any table and no group of rows: a slip of the pen confirms nothing."""
    known = [row.id for row in rows]
    return tuple(
        entry.row for entry in panel.confirmed if not any(row == entry.row or row.startswith(entry.row.rstrip("/") + "/") for row in known)
    )


def _used(design: Design) -> Iterator[Row]:
    for loop in design.loops:
        feeder = loop.decision.chosen.case.feeder
        if isinstance(feeder, Feeder):
            yield from feeder.rows
    if design.panel_design is not None:
        yield from design.panel_design.incoming.rows
