"""The error of the measurement at the setpoint."""

from dataclasses import dataclass

from specgen.core.figure import Figure
from specgen.sizing.candidate import Assumption


@dataclass(frozen=True, slots=True)
class MeasuringError:
    """Largest error of the measurement over the setpoints [in the loop's quantity].

    ``root_sum`` is the root of the sum of squares of the parts, ``sum`` their plain sum; rules use ``root_sum``.
    """

    root_sum: float
    sum: float
    figures: tuple[Figure, ...] = ()
    assumptions: tuple[Assumption, ...] = ()
