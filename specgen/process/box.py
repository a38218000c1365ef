r"""The worst-case box: every declared range of a loop, reduced to the few axes that a plant is made of.

Each form of plant is brought to one balance, ``C dz/dt = u P - D - G z`` from the setpoint in the sense of more output, with the
strength ``P``, the load ``D = G gap + Q``, the loss ``G`` and the capacity ``C``; ``gap`` is the distance from where the surroundings
hold the value to the setpoint. A balance gives them as they stand; a response has ``G = 1`` and ``C = tau``; rates have ``G = 0`` and
``C = 1``. Setpoint, surroundings and load only ever act through ``D``, and so move together on one axis: at its low end the setpoint
that needs least output, the mildest surroundings and the smallest load.
"""

from collections.abc import Mapping
from dataclasses import dataclass, field
from itertools import product
from typing import NamedTuple

from specgen.core.say import Phrasing
from specgen.process.axis import Axis, Declared
from specgen.process.plant import Integrating, ProcessModel, SelfRegulating

MOST_KEPT = 4096


@dataclass(frozen=True, slots=True)
class Unmodelled:
    """Why no process model can be made, and the paths of the fields that would make one."""

    because: str
    needs: tuple[str, ...] = ()


class Point(NamedTuple):
    """A case of the box: how far along each axis, 0..1."""

    strength: float = 0.0
    load: float = 0.0
    loss: float = 0.0
    capacity: float = 0.0
    dead_time: float = 0.0
    lag: float = 0.0
    sensor_lag: float = 0.0


@dataclass(frozen=True, slots=True)
class Reach:
    """How far full output falls short of the hardest case.

    ``shortfall`` is in the value's unit (per second where the value does not settle), ``missing_power`` in W for a heat balance; both
    negative where there is something to spare. ``point`` is the hardest case.
    """

    shortfall: float
    missing_power: float | None
    point: Point


@dataclass(frozen=True, slots=True)
class Box:
    """Axes of one loop's plant.

    ``sign`` is +1 where more output raises the value, -1 where it lowers it. ``setpoint`` runs from the setpoint that needs least
    output to the one that needs most; ``ambient`` is where the surroundings (or the rest value) hold the value, absent for rates.
    ``boost`` multiplies the sum of the strength and the load for rates on a resistive element, whose speed without output does not
    follow the supply. ``whole_capacity`` counts every body, ``capacity`` only those that follow fast. ``free`` names the axes that vary
    in cycling.
    """

    sign: int
    setpoint: Declared
    strength: Axis
    ambient: Declared | None
    heat: Axis
    loss: Axis
    capacity: Axis
    whole_capacity: Axis
    dead_time: Axis
    lag: Axis
    sensor_lag: Axis
    phrasing: Phrasing
    form: str
    boost: Axis | None = None
    free: tuple[str, ...] = field(init=False, compare=False, repr=False)
    # the searches for different figures ask for the same cases again and again
    _plants: dict[Point, ProcessModel] = field(init=False, compare=False, repr=False)

    def __post_init__(self) -> None:
        held = self.ambient is not None and (self.ambient.varies or self.setpoint.varies)
        varies = {
            "strength": self.strength.varies or (self.boost is not None and self.boost.varies),
            "load": held or self.heat.varies,
            "loss": self.loss.varies,
            "capacity": self.capacity.varies,
            "dead_time": self.dead_time.varies,
            "lag": self.lag.varies,
            "sensor_lag": self.sensor_lag.varies,
        }
        object.__setattr__(self, "_plants", {})
        object.__setattr__(self, "free", tuple(name for name, does in varies.items() if does))

    def loss_at(self, point: Point) -> float:
        """Return ``G`` at a point."""
        return self.loss.at(point.loss)

    def load_at(self, point: Point) -> float:
        """Return ``D``: the strength that holds the setpoint."""
        heat = self.heat.at(point.load)
        if self.ambient is None:
            return heat
        gap = self.sign * (self.setpoint.at(point.load) - self.ambient.at(point.load))
        return self.loss.at(point.loss) * gap + heat

    def strength_at(self, point: Point) -> float:
        """Return ``P``: what full output does."""
        return self.sides_at(point)[1]

    def sides_at(self, point: Point) -> tuple[float, float]:
        """Return the load and the strength of a case."""
        load, own = self.load_at(point), self.strength.at(point.strength)
        return load, own if self.boost is None else self.boost.at(point.strength) * (own + load)

    def duty_at(self, point: Point) -> float:
        """Return the share of full output that holds the setpoint, not clipped."""
        load, strength = self.sides_at(point)
        return load / strength

    def plant_at(self, point: Point, *, whole: bool = False) -> ProcessModel:
        """Return the plant of a case; with ``whole``, with the heat capacity of every body."""
        if whole:
            return self._made(point, self.whole_capacity.at(point.capacity))
        known = self._plants.get(point)
        if known is None:
            if len(self._plants) >= MOST_KEPT:
                self._plants.clear()
            known = self._plants[point] = self._made(point, self.capacity.at(point.capacity))
        return known

    def _made(self, point: Point, capacity: float) -> ProcessModel:
        (load, strength), loss = self.sides_at(point), self.loss.at(point.loss)
        theta, lag = self.dead_time.at(point.dead_time), self.lag.at(point.lag)
        sensor_lag = self.sensor_lag.at(point.sensor_lag)
        if loss > 0:
            return SelfRegulating((strength - load) / loss, load / loss, capacity / loss, theta, lag, sensor_lag)
        return Integrating((strength - load) / capacity, load / capacity, theta, lag, sensor_lag)

    def value_at(self, point: Point, distance: float) -> float:
        """Return the real value a distance from the setpoint in the sense of more output."""
        return self.setpoint.at(point.load) + self.sign * distance

    def ends(self, *names: str) -> list[Point]:
        """Return every corner of the named axes that vary, the rest at their first end."""
        moving = [name for name in names if name in self.free or (name == "capacity" and self.whole_capacity.varies)]
        return [Point(**dict(zip(moving, ends, strict=True))) for ends in product((0.0, 1.0), repeat=len(moving))]

    @property
    def duty_low(self) -> tuple[float, Point]:
        """Return the lowest share of full output over the box, not clipped, and its case."""
        return min(((self.duty_at(p), p) for p in self.ends("strength", "load", "loss")), key=lambda pair: pair[0])

    @property
    def duty_high(self) -> tuple[float, Point]:
        """Return the highest share of full output over the box, not clipped, and its case."""
        return max(((self.duty_at(p), p) for p in self.ends("strength", "load", "loss")), key=lambda pair: pair[0])

    @property
    def rests(self) -> bool:
        """Tell whether the mildest case needs no output."""
        return self.duty_low[0] <= 0

    @property
    def reach(self) -> Reach:
        """Return by how much full output falls short in the hardest case."""
        worst: tuple[float, float, Point] | None = None
        for point in self.ends("strength", "load", "loss"):
            missing = self.load_at(point) - self.strength_at(point)
            loss = self.loss.at(point.loss)
            by = missing / loss if loss > 0 else missing / self.capacity.at(0.0)
            if worst is None or missing > worst[1]:
                worst = (by, missing, point)
        assert worst is not None  # noqa: S101 - a box has at least one corner
        return Reach(worst[0], worst[1] if self.form == "balance" else None, worst[2])

    @property
    def reaches(self) -> bool:
        """Tell whether full output passes every setpoint in every case."""
        return self.reach.shortfall < 0

    def case(self, point: Point) -> Mapping[str, float]:
        """Return the value of every declared field that varies, by its path."""
        return {f.path: f.at(t) for f, t in self._fields(point) if f.varies}

    def text(self, point: Point) -> str:
        """Return the case in words: ``supply +10 percent, setpoint 80.0 °C, surroundings 8.0 °C``."""
        return ", ".join(f.said(t, self.phrasing) for f, t in self._fields(point) if f.varies) or "the one declared case"

    def _fields(self, point: Point) -> list[tuple[Declared, float]]:
        """Return every field with how far along it the case lies."""
        held: list[tuple[tuple[Declared, ...], float]] = [
            (self.strength.fields, point.strength),
            (self.boost.fields if self.boost else (), point.strength),
            ((self.setpoint, self.ambient) if self.ambient is not None else (), point.load),
            (self.heat.fields, point.load),
            (self.loss.fields, point.loss),
            (self.capacity.fields, point.capacity),
            (self.dead_time.fields, point.dead_time),
            (self.lag.fields, point.lag),
            (self.sensor_lag.fields, point.sensor_lag),
        ]
        return list(dict.fromkeys((f, t) for fields, t in held for f in fields))
