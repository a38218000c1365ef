"""What a recorded step test says of a loop's plant, once identified: numbers without the recording."""

from collections.abc import Mapping
from dataclasses import dataclass

from specgen.core.figure import Figure
from specgen.core.quantity import Range


@dataclass(frozen=True, slots=True)
class Fitted:
    """A response identified from a recording, at the supply of the test; each range is the 95 % interval.

    ``ranges`` has ``change`` (its size), ``time_constant``, ``dead_time`` and ``rest_value`` in base units, as
    ``specgen.process.box_of`` takes them; ``figures`` are the lines of the Basis they come from.
    """

    ranges: Mapping[str, Range]
    figures: tuple[Figure, ...]
