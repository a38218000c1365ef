"""Tables of conductors and their protection: capacities, corrections, preferred ratings, single figures."""

from collections.abc import Iterable
from dataclasses import dataclass
from typing import Annotated, Generic, Literal, TypeVar

from specgen.catalogue.rows import Practice
from specgen.catalogue.table import CatalogueError, Row, table
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
class Listed(Generic[M]):
    """A typed row with the row it came from."""

    value: M
    row: Row


@dataclass(frozen=True, slots=True)
class Wiring:
    """Everything that is looked up for conductors and protection, each table in rising order."""

    conductors: tuple[Listed[ConductorRow], ...]
    ambient: tuple[Listed[AmbientFactor], ...]
    grouping: tuple[Listed[GroupingFactor], ...]
    ratings: tuple[Listed[ProtectiveRating], ...]
    curves: tuple[Listed[TripCurve], ...]
    starters: tuple[Listed[MotorStarter], ...]
    semiconductor_fuses: tuple[Listed[SemiconductorFuse], ...]
    figures: tuple[Listed[Practice], ...]

    def figure(self, name: str) -> Listed[Practice]:
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
        for listed in self.figures:
            if listed.row.id == f"wiring/{name}":
                return listed
        raise CatalogueError(f"there is no wiring/{name}")

    def sizes(self, method: Method) -> tuple[Listed[ConductorRow], ...]:
        """Return the conductors of a method, the smallest first.

        Examples
        --------
        >>> [(row.row.id, float(row.value.capacity)) for row in read_wiring().sizes("B2")][3]
        ('conductors/B2/2.5', 17.4)
        """
        return tuple(listed for listed in self.conductors if listed.value.method == method)

    def preferred(self, device: ProtectiveDevice) -> tuple[Listed[ProtectiveRating], ...]:
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
        conductors=_rising((*_listed("conductors", ConductorRow), *_listed("conductors_awg", ConductorRow)), "size"),
        ambient=_rising(_listed("ambient_factors", AmbientFactor), "up_to"),
        grouping=_rising(_listed("grouping_factors", GroupingFactor), "circuits"),
        ratings=_rising(_listed("protective_ratings", ProtectiveRating), "rating"),
        curves=_rising(_listed("trip_curves", TripCurve), "holds"),
        starters=_rising(_listed("motor_starters", MotorStarter), "highest"),
        semiconductor_fuses=_rising(_listed("semiconductor_fuses", SemiconductorFuse), "rating"),
        figures=_listed("wiring", Practice),
    )


def _listed(name: str, model: type[M]) -> tuple[Listed[M], ...]:
    return tuple(Listed(row.typed(model), row) for row in table(name))


def _rising(rows: Iterable[Listed[M]], field: str) -> tuple[Listed[M], ...]:
    return tuple(sorted(rows, key=lambda listed: float(getattr(listed.value, field))))
