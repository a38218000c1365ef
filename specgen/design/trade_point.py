"""One setting of the trade-off: what the chosen device does there."""

from dataclasses import dataclass

from specgen.rules.base import Case
from specgen.sizing.candidate import Unsized


@dataclass(frozen=True, slots=True)
class TradePoint:
    """The chosen device at one setting.

    ``at`` is the differential [change] or the cycle time [s]. ``above`` and ``below`` are how far the true value leaves the setpoint:
    switching, the sudden load where one is declared, and the measuring error, together [change]; ``swing`` is peak to trough in one
    case, of a time-proportioned output its ripple. ``pulse`` and ``pause`` are the shortest times on and off [s], ``life`` that of the
    weakest contact [year], None where nothing wears. ``within`` tells whether the rules' window for the
    setting and the tolerance hold it.
    """

    at: float
    above: float
    below: float
    swing: float
    pulse: float
    pause: float
    operations_per_hour: float
    life: float | None
    within: bool = False
    chosen: bool = False


def error_of(case: Case) -> float:
    """Return the measuring error that an excursion includes [change]; nothing where it is not known."""
    return 0.0 if isinstance(case.error, Unsized) else case.error.root_sum
