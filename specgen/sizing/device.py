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
class Drawn:
    """What one part takes from the control supply.

    ``hold`` and ``inrush`` in A; ``inside`` tells whether its heat stays in the panel.
    """

    what: str
    hold: float
    inrush: float
    inside: bool = True


@dataclass(frozen=True, slots=True)
class Drive:
    """What a controller's output is asked for and what it can give, both in ``dimension``'s base unit."""

    what: str
    asked: float
    able: float
    dimension: Literal["current", "resistance"] = "current"


@dataclass(frozen=True, slots=True)
class Suppressor:
    """What is fitted across a coil, and why; ``leakage`` [A] flows through it while the contact is closed."""

    across: str
    part: str
    because: str
    leakage: float = 0.0


@dataclass(frozen=True, slots=True)
class DeviceChoice:
    """The device that switches or throttles the element, rated for its current.

    ``rating`` and ``current`` in A, absent for a plain signal; ``category`` is the utilisation category the rating is for;
    ``lines`` is how many live conductors feed the load. ``loss`` [W] is the heat it leaves in the panel at full output, its
    coil included, None where nothing is known of it (a signal, a controller's own relay). ``drawn`` is what its coils or
    input, and a load on the control supply, take from that; ``drives`` what the controller's output is asked for,
    ``undriven`` why that is not known; ``suppressors`` are fitted across coils.

    Of a solid-state switch: ``heat_sink`` [K/W] is the highest thermal resistance its heat sink may have, None where none
    would do; ``cooling`` how that is reached, ``sink_margin`` how many times what a fan reaches; ``leakage`` [A]; ``i2t``
    [A2 s] what it survives, also of a power controller where its data give it; ``isolator`` names the contactor that opens
    every line where the device leaves one live.

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
    loss: float | None = None
    heat_sink: float | None = None
    cooling: Literal["", "natural", "forced", "none"] = ""
    sink_margin: float | None = None
    leakage: float | None = None
    i2t: float | None = None
    lines: int = 0
    drives: tuple[Drive, ...] = ()
    undriven: Unsized | None = None
    suppressors: tuple[Suppressor, ...] = ()
    isolator: str = ""
    drawn: tuple[Drawn, ...] = ()
