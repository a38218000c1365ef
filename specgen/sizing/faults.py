"""Where the value goes when the output stays on or off, set against the loop's dangers."""

from dataclasses import dataclass

from specgen.core.figure import Figure


@dataclass(frozen=True, slots=True)
class Stuck:
    """One stuck state, in the worst case.

    ``settles_at`` is the extreme value it settles at [value]; None where it never settles (integrating plant, or rates
    that cannot say). ``passes_high`` and ``passes_low`` tell whether a declared danger is passed, None where that
    danger is not declared or cannot lie on this side. Times [s] are None where nothing is reached or nothing declared.
    """

    settles_at: float | None
    passes_high: bool | None
    passes_low: bool | None
    time_to_danger: float | None = None
    time_to_spoil: float | None = None
    case: str = ""
    figures: tuple[Figure, ...] = ()

    @property
    def passes(self) -> bool:
        """Tell whether either declared danger is passed."""
        return bool(self.passes_high) or bool(self.passes_low)


@dataclass(frozen=True, slots=True)
class Faults:
    """Output stuck on and stuck off."""

    on: Stuck
    off: Stuck
