"""Reading fields that only some elements have, by their path below the loop; None where nothing is declared."""

from specgen.rules.base import Case


def field(case: Case, path: str) -> object:
    """Return what the loop declares at a path such as ``element.min_run``, None where it declares nothing."""
    here: object = case.loop
    for step in path.split("."):
        here = getattr(here, step, None)
        if here is None:
            return None
    return here


def number(case: Case, path: str) -> float | None:
    """Return a declared number in base units, None where nothing is declared."""
    found = field(case, path)
    return float(found) if isinstance(found, int | float) and not isinstance(found, bool) else None


def word(case: Case, path: str) -> str | None:
    """Return a declared word, None where nothing is declared."""
    found = field(case, path)
    return found if isinstance(found, str) else None


def longest_asked(case: Case) -> float:
    """Return the cycle time that the designer asks for, else the longest of the house's series [s]."""
    asked = number(case, "choose.cycle_time")
    return float(case.panel.house.cycle_time_series[-1]) if asked is None else asked
