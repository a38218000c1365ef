"""What one site check is."""

from dataclasses import dataclass, field
from typing import Literal

from specgen.core.say import Said

Group = Literal["energise", "cold", "first_run", "hand_over"]
GROUPS: dict[Group, str] = {
    "energise": "Before energising",
    "cold": "Cold, with simulated values",
    "first_run": "First run",
    "hand_over": "Hand-over",
}
Bound = Literal["", "about", "or more", "or less"]


@dataclass(frozen=True, slots=True)
class Check:
    """One check with a place for its reading.

    ``id`` stays the same as long as the check is about the same thing, so that readings can be brought back to it. ``expected`` is a
    number, or words where the answer is no number; with ``to`` it is a range. ``tolerance`` is how far the reading may lie off, or what is
    meant by ``bound``. ``meaning`` tells what a deviation means and which setting or wiring to change. ``words`` fill the braces of
    ``what`` and ``meaning``.
    """

    id: str
    group: Group
    what: str
    expected: Said | str
    to: Said | None = None
    tolerance: Said | None = None
    bound: Bound = ""
    meaning: str = ""
    words: dict[str, Said | str] = field(default_factory=dict)
