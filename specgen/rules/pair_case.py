"""What is known of two loops that act on one body in opposite directions."""

from dataclasses import dataclass

from specgen.core.figure import Figure
from specgen.rules.base import Case
from specgen.sizing.candidate import Unsized
from specgen.sizing.normal_running import normal_running


@dataclass(frozen=True, slots=True)
class PairCase:
    """The chosen candidates of a loop that raises and one that lowers the same value of the same body."""

    raising: Case
    lowering: Case

    @property
    def dead_band(self) -> float:
        """Return the distance from the highest setpoint of the one to the lowest of the other [change]; negative where they overlap."""
        return self.lowering.loop.need.setpoints.low - self.raising.loop.need.setpoints.high

    @property
    def needs_interlock(self) -> bool:
        """Tell whether there is a dead band, too narrow to keep the two apart by itself."""
        return 0 < self.dead_band <= self.reach

    @property
    def figures(self) -> tuple[Figure, ...]:
        """Return both numbers with their formulas."""
        up, down = self.raising.loop, self.lowering.loop
        ends = {"s_up": (up.need.setpoints.high, "value"), "s_down": (down.need.setpoints.low, "value")}
        band = f"dead band between {up.tag} and {down.tag}"
        reach = f"worst excursions of {up.tag} and {down.tag} towards each other"
        return (
            Figure("b", band, "s_down − s_up", self.dead_band, "change", "rule A5", ends),
            Figure("e", reach, "excursions and measuring errors of both, added", self.reach, "change", "rule A5"),
        )

    @property
    def reach(self) -> float:
        """Return how far both together leave their setpoints towards each other [change].

        The one's worst excursion upwards and the other's downwards, a start-up's overshoot and both measuring errors included; the
        tolerance where nothing is predicted.
        """
        up = normal_running(self.raising.loop, self.raising.settings).high - self.raising.loop.need.setpoints.high
        down = self.lowering.loop.need.setpoints.low - normal_running(self.lowering.loop, self.lowering.settings).low
        errors = sum(case.error.root_sum for case in (self.raising, self.lowering) if not isinstance(case.error, Unsized))
        return up + down + errors
