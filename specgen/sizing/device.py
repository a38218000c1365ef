"""The switching device of a candidate and every contact in its chain."""

from dataclasses import dataclass
from typing import Literal

from specgen.core.figure import Figure
from specgen.sizing.candidate import Assumption, ControllerOutputKind, Unsized


@dataclass(frozen=True, slots=True)
class Contact:
    """One part of the chain that operates with every switching.

    ``life`` is the number of operations it lasts at the current it carries; None where nothing wears (solid state).
    ``pull_in`` and ``drop_out`` [s] bound the shortest pulse it can make; ``operations_per_hour`` is its highest rate.
    """

    what: str
    role: Literal["controller", "interposing", "load", "element"]
    name: str
    current: float
    life: float | None
    operations_per_hour: float | None
    pull_in: float
    drop_out: float
    figures: tuple[Figure, ...] = ()


@dataclass(frozen=True, slots=True)
class DeviceChoice:
    """The device that switches or throttles the element, rated for its current.

    ``rating`` and ``current`` in A, absent for a plain signal; ``category`` is the utilisation category the rating is for.
    ``because`` says why it is not the smallest that carries the load; empty where it is.
    """

    name: str
    category: str
    controller_output: ControllerOutputKind
    chain: tuple[Contact, ...]
    poles: int
    rating: float | None = None
    current: float | None = None
    figures: tuple[Figure, ...] = ()
    assumptions: tuple[Assumption, ...] = ()
    open_points: tuple[Unsized, ...] = ()
    because: str = ""
