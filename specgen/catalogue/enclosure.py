"""Tables of the enclosure: which faces cool, how well its walls do, what air carries away, and what the panel's own parts lose."""

from collections.abc import Iterator
from dataclasses import dataclass
from functools import cache
from typing import Annotated, TypeVar

from specgen.catalogue.rows import Practice
from specgen.catalogue.table import CatalogueError, Known, known_rows
from specgen.core.quantity import Quantity
from specgen.model.fields import Length, Model, Number, Text, Written

M = TypeVar("M", bound=Model)


class Faces(Model):
    """Weight of each face of an enclosure in its effective cooling surface."""

    mounting: Text
    top: Number
    front: Number
    back: Number
    left: Number
    right: Number


class Wall(Model):
    """Heat transfer of a wall [W/(m2 K)]."""

    surface: Text
    k: Annotated[Quantity, Written("u_value", sign="positive")]


class AirFactor(Model):
    """Volume of air an hour for a loss over a rise [m3 K/(W h)], up to an altitude [m]."""

    up_to: Length
    factor: Number


@dataclass(frozen=True, slots=True)
class EnclosureTables:
    """Everything that is looked up for the enclosure."""

    faces: tuple[Known[Faces], ...]
    walls: tuple[Known[Wall], ...]
    air: tuple[Known[AirFactor], ...]
    figures: tuple[Known[Practice], ...]

    def faces_of(self, mounting: str) -> Known[Faces]:
        """Return the weights of a mounting; parameters and errors as `wall_of`."""
        return _first((known for known in self.faces if known.value.mounting == mounting), mounting)

    def wall_of(self, surface: str) -> Known[Wall]:
        """Return the heat transfer of a surface.

        Raises
        ------
        CatalogueError
            There is no such row: a mistake in specgen itself.

        Examples
        --------
        >>> float(enclosure_tables().wall_of("painted_steel").value.k)
        5.5
        """
        return _first((known for known in self.walls if known.value.surface == surface), surface)

    def air_at(self, altitude: float) -> Known[AirFactor] | None:
        """Return the air factor at an altitude [m]; None above the table.

        Examples
        --------
        >>> float(enclosure_tables().air_at(340).value.factor), enclosure_tables().air_at(1500)
        (3.3, None)
        """
        return next((known for known in self.air if altitude <= known.value.up_to), None)

    def figure(self, name: str) -> Known[Practice]:
        """Return a single figure; errors as `wall_of`."""
        return _first((known for known in self.figures if known.row.id == f"panel_practice/{name}"), name)


def _first(found: Iterator[Known[M]], name: str) -> Known[M]:
    known = next(found, None)
    if known is None:
        raise CatalogueError(f"there is no row for {name}")
    return known


@cache
def enclosure_tables() -> EnclosureTables:
    """Read the packaged tables.

    Raises
    ------
    CatalogueError
        A table is broken.
    """
    air = sorted(known_rows("air_factors", AirFactor), key=lambda known: known.value.up_to)
    return EnclosureTables(
        known_rows("enclosure_surfaces", Faces), known_rows("enclosure_walls", Wall), tuple(air), known_rows("panel_practice", Practice)
    )
