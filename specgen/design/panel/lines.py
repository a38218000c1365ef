"""Line conductors of a supply: where a load can be put, and what it draws from each, as phasors."""

from cmath import exp
from collections.abc import Mapping
from dataclasses import dataclass
from math import pi

from specgen.model.panel import Supply
from specgen.sizing.connection import Way

NEUTRAL = "N"
THREE = ("L1", "L2", "L3")
Place = tuple[str, ...]


@dataclass(frozen=True, slots=True)
class Lines:
    """The conductors of a supply with their potentials (in any unit; only angles count)."""

    potentials: Mapping[str, complex]

    @property
    def lines(self) -> tuple[str, ...]:
        """Return the line conductors, the neutral apart."""
        return tuple(line for line in self.potentials if line != NEUTRAL)

    def places(self, way: Way) -> tuple[Place, ...]:
        """Return the conductors between which a load can be put, in the order of the lines.

        Examples
        --------
        >>> from specgen.core.quantity import Quantity
        >>> three = lines_of(Supply(voltage=Quantity(400.0), phases=3, frequency=Quantity(50.0)))
        >>> three.places("line_to_line")
        (('L1', 'L2'), ('L2', 'L3'), ('L3', 'L1'))
        """
        lines = self.lines
        if way == "three_phase":
            return (lines,)
        if way == "line_to_line":
            if len(lines) == len(THREE):
                return (("L1", "L2"), ("L2", "L3"), ("L3", "L1"))
            return (lines,)
        if way == "line_to_neutral":
            # the high leg's voltage to neutral is another one
            high = "L2" if abs(self.potentials.get("L1", 0) + self.potentials.get("L3", 0)) < abs(self.potentials["L1"]) / 2 else ""
            return tuple((line, NEUTRAL) for line in lines if line != high)
        return ()

    def drawn(self, place: Place, current: float) -> dict[str, complex]:
        """Return the currents a load of unit power factor draws from the conductors of its place [A]; the neutral's flows back."""
        if len(place) == len(THREE):
            centre = sum(self.potentials[line] for line in place) / len(place)
            return {line: current * _direction(self.potentials[line] - centre) for line in place}
        there, back = place
        flowing = current * _direction(self.potentials[there] - self.potentials[back])
        return {there: flowing, back: -flowing}


def lines_of(supply: Supply) -> Lines:
    r"""Return the conductors of a supply.

    Notes
    -----
    Star and delta: potentials at 0, -120 and 120 degrees. High leg: the mid-point between L1 and L3 is the neutral, L2
    stands apart. Split: two opposite lines around the neutral.
    """
    if supply.phases == 1:
        split = supply.system == "split"
        found: dict[str, complex] = {"L1": 1 + 0j} if supply.neutral or split else {"L1": 0.5 + 0j, "L2": -0.5 + 0j}
        if split:
            found["L2"] = -1 + 0j
    elif supply.system == "high_leg":
        found = {"L1": 0.5 + 0j, "L2": -1j * 3**0.5 / 2, "L3": -0.5 + 0j}
    else:
        found = {line: exp(-2j * pi * number / 3) for number, line in enumerate(THREE)}
    if supply.neutral and not (supply.phases != 1 and supply.system == "delta"):
        found[NEUTRAL] = 0j
    return Lines(found)


def _direction(potential: complex) -> complex:
    return potential / abs(potential)
