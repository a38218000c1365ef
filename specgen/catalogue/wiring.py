"""Tables of conductors and their protection: capacities, corrections, preferred ratings, single figures."""

from collections.abc import Iterable
from dataclasses import dataclass
from typing import Annotated, Literal, TypeVar

from specgen.catalogue.rows import Practice
from specgen.catalogue.table import Known, known_rows, row_named
from specgen.core.quantity import Quantity
from specgen.model.fields import Count, Current, Model, Number, Temperature, Text, Written

M = TypeVar("M", bound=Model)
Area = Annotated[Quantity, Written("area", sign="positive")]
LetThrough = Annotated[Quantity, Written("i2t", sign="positive")]
Basis = Literal["iec", "north_america"]
Method = Literal["B1", "B2", "C", "E", "awg"]
ProtectiveDevice = Literal["breaker", "fuse", "inverse_time"]


class ConductorRow(Model):
    """Current-carrying capacity of a size [A, m2] in a method of installation."""

    method: Method = "awg"
    gauge: Text | None = None
    size: Area
    capacity: Current
    most: Current | None = None


class AmbientFactor(Model):
    """Correction for the temperature around a conductor."""

    basis: Basis
    up_to: Temperature
    factor: Number


class GroupingFactor(Model):
    """Correction for loaded circuits side by side."""

    basis: Basis
    method: Method
    circuits: Count
    factor: Number


class ProtectiveRating(Model):
    """A rated current that a protective device is made for."""

    device: ProtectiveDevice
    rating: Current


class TripCurve(Model):
    """What a breaker's instantaneous release holds and where it trips for certain, in times its rating."""

    curve: Literal["B", "C", "D"]
    holds: Number
    trips: Number


class MotorStarter(Model):
    """Setting range of a motor protective breaker."""

    lowest: Current
    highest: Current


class SemiconductorFuse(Model):
    """A full-range semiconductor fuse-link with its total let-through."""

    rating: Current
    let_through: LetThrough


@dataclass(frozen=True, slots=True)
class Wiring:
    """Everything that is looked up for conductors and protection, each table in rising order."""

    conductors: tuple[Known[ConductorRow], ...]
    ambient: tuple[Known[AmbientFactor], ...]
    grouping: tuple[Known[GroupingFactor], ...]
    ratings: tuple[Known[ProtectiveRating], ...]
    curves: tuple[Known[TripCurve], ...]
    starters: tuple[Known[MotorStarter], ...]
    semiconductor_fuses: tuple[Known[SemiconductorFuse], ...]
    figures: tuple[Known[Practice], ...]

    def figure(self, name: str) -> Known[Practice]:
        """Return a single figure.

        Raises
        ------
        CatalogueError
            There is no such figure: a mistake in specgen itself.

        Examples
        --------
        >>> read_wiring().figure("voltage_drop").value.quantity
        0.05
        """
        return row_named(self.figures, f"wiring/{name}")

    def sizes(self, method: Method) -> tuple[Known[ConductorRow], ...]:
        """Return the conductors of a method, the smallest first.

        Examples
        --------
        >>> [(row.row.id, float(row.value.capacity)) for row in read_wiring().sizes("B2")][3]
        ('conductors/B2/2.5', 17.4)
        """
        return tuple(listed for listed in self.conductors if listed.value.method == method)

    def preferred(self, device: ProtectiveDevice) -> tuple[Known[ProtectiveRating], ...]:
        """Return the rated currents of a kind of protective device, the smallest first."""
        return tuple(listed for listed in self.ratings if listed.value.device == device)


def read_wiring() -> Wiring:
    """Read the packaged tables.

    Raises
    ------
    CatalogueError
        A table is broken.
    """
    return Wiring(
        conductors=_rising((*known_rows("conductors", ConductorRow), *known_rows("conductors_awg", ConductorRow)), "size"),
        ambient=_rising(known_rows("ambient_factors", AmbientFactor), "up_to"),
        grouping=_rising(known_rows("grouping_factors", GroupingFactor), "circuits"),
        ratings=_rising(known_rows("protective_ratings", ProtectiveRating), "rating"),
        curves=_rising(known_rows("trip_curves", TripCurve), "holds"),
        starters=_rising(known_rows("motor_starters", MotorStarter), "highest"),
        semiconductor_fuses=_rising(known_rows("semiconductor_fuses", SemiconductorFuse), "rating"),
        figures=known_rows("wiring", Practice),
    )


def _rising(rows: Iterable[Known[M]], field: str) -> tuple[Known[M], ...]:
    return tuple(sorted(rows, key=lambda listed: float(getattr(listed.value, field))))
