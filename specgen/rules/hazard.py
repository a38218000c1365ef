"""Which elements can overheat something, where a valve goes by itself, and what room is left to something independent."""

from dataclasses import dataclass
from typing import Literal

from specgen.core.say import Said, of_value, seconds
from specgen.process.box import Unmodelled
from specgen.rules.base import Case
from specgen.rules.declared import word
from specgen.sizing.faults import Stuck
from specgen.sizing.normal_running import normal_running

Position = Literal["close", "open", "hold"]
_POSITIONS: dict[str, Position] = {"close": "close", "closed": "close", "open": "open", "hold": "hold"}
POSITION_OF: dict[str, Position] = {"off": "close", "full": "open", "hold": "hold"}  # 0 % output is the least action on the value
LEAST_LAG = 20.0  # s, assumed of an independent sensor that is not chosen yet; common practice, no source
GOES = {"close": "closes", "open": "opens", "hold": "stays where it is"}


def heating(case: Case) -> bool:
    """Tell whether full output heats: a heater, a burner, or a valve whose opening raises a temperature."""
    warms = case.loop.raises and case.loop.need.quantity == "temperature"
    return case.traits.heats or (case.traits.valve and warms)


def lost_positions(case: Case) -> dict[str, Position | None]:
    """Return where a valve goes without signal and without supply, by the field that says so; None where it is not declared."""
    fields: tuple[str, ...] = ("element.on_supply_loss",)
    if case.traits.coil:
        fields = ("element.fails",)
    elif case.traits.analogue_input:
        fields = ("element.on_signal_loss", "element.on_supply_loss")
    return {field: _POSITIONS.get(word(case, field) or "") for field in fields}


@dataclass(frozen=True, slots=True)
class Room:
    """Where the set value of something independent can lie: past normal running, and early enough to stay short of the danger.

    ``running``, ``danger`` and ``setpoint`` [value]; ``lag`` of its sensor [s]; ``outward`` is +1 where the danger lies above.
    """

    case: Case
    state: Literal["on", "off"]
    outward: int
    running: float
    danger: float
    setpoint: float
    lag: float

    def reached(self, value: float) -> float:
        """Return the true value when something set at ``value`` acts: beyond it by its sensor's lag times the speed there."""
        return value + self.outward * self.lag * speed(self.case, self.state, value, self.outward)

    @property
    def latest(self) -> float:
        """Return how late it may be set, with the speed at the end of normal running."""
        return self.danger - (self.reached(self.running) - self.running)

    @property
    def open(self) -> bool:
        """Tell whether there is any room at all."""
        return self.outward * (self.latest - self.running) > 0

    @property
    def margin(self) -> float | None:
        """Return distance to the latest set value over distance of normal running, both from the setpoint."""
        reach, distance = abs(self.running - self.setpoint), self.outward * (self.latest - self.setpoint)
        return distance / reach if reach > 0 else None

    def holds(self, value: float) -> bool:
        """Tell whether a set value is clear of normal running and acts short of the danger."""
        return self.outward * (value - self.running) > 0 and self.outward * (self.danger - self.reached(value)) > 0

    @property
    def words(self) -> dict[str, Said]:
        """Return the numbers by the names that sentences use."""
        return {
            "running": of_value(self.running), "danger": of_value(self.danger), "latest": of_value(self.latest), "lag": seconds(self.lag)
        }  # fmt: skip


def speed(case: Case, state: Literal["on", "off"], value: float, outward: int) -> float:
    """Return the fastest outward speed at a value with the output stuck [value/s]; 0 where nothing moves it that way."""
    box = case.box
    if isinstance(box, Unmodelled):
        return 0.0
    output = 1.0 if state == "on" else 0.0
    fastest = 0.0
    for point in box.ends("strength", "load", "loss", "capacity"):
        distance = box.sign * (value - box.setpoint.at(point.load))
        fastest = max(fastest, outward * box.sign * box.plant_at(point).speed(distance, output))
    return fastest


def independent_lag(case: Case, state: Literal["on", "off"]) -> float:
    """Return the lag of an independent sensor: the declared limiter's, else the loop's own, at least 20 s [s]."""
    limiter = case.loop.limits.limiter
    if state == "on" and limiter is not None and limiter.sensor_lag is not None:
        return float(limiter.sensor_lag)
    own = case.loop.sensor.lag
    return max(LEAST_LAG, own.high if own is not None else 0.0)


def rooms(case: Case, state: Literal["on", "off"], stuck: Stuck) -> tuple[Room, ...]:
    """Return the room on each side whose declared danger is passed."""
    reach, limits, setpoints = normal_running(case.loop, case.settings), case.loop.limits, case.loop.need.setpoints
    lag = independent_lag(case, state)
    found = []
    if stuck.passes_high and limits.danger_high is not None:
        found.append(Room(case, state, 1, reach.high, float(limits.danger_high), setpoints.high, lag))
    if stuck.passes_low and limits.danger_low is not None:
        found.append(Room(case, state, -1, reach.low, float(limits.danger_low), setpoints.low, lag))
    return tuple(found)
