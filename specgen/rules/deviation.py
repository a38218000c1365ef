"""How far the true value leaves the setpoint, measuring error included, set against the tolerance."""

from dataclasses import dataclass

from specgen.core.say import Said, of_change
from specgen.rules.base import Case
from specgen.rules.margin import SEARCHED, at_most, least, over
from specgen.sizing.candidate import Unsized


@dataclass(frozen=True, slots=True)
class Deviation:
    """Worst deviation on each side with the measuring error in it, and the tolerance there [in the loop's quantity]."""

    above: float
    below: float
    error: float
    allowed_above: float
    allowed_below: float

    @property
    def inside(self) -> bool:
        """Tell whether both sides stay inside the tolerance."""
        return at_most(self.above, self.allowed_above, SEARCHED) and at_most(self.below, self.allowed_below, SEARCHED)

    @property
    def margin(self) -> float | None:
        """Return the smaller of tolerance over deviation."""
        return least(over(self.allowed_above, self.above), over(self.allowed_below, self.below))

    @property
    def words(self) -> dict[str, Said]:
        """Return the numbers by the names that sentences use."""
        return {
            "above": of_change(self.above), "below": of_change(self.below), "error": of_change(self.error),
            "allowed_above": of_change(self.allowed_above), "allowed_below": of_change(self.allowed_below),
        }  # fmt: skip


def deviation(case: Case, above: float, below: float) -> Deviation | Unsized:
    """Return the deviation for excursions of the true value above and below the setpoint [in the loop's quantity]."""
    if isinstance(case.error, Unsized):
        return case.error
    error, tolerance = case.error.root_sum, case.loop.need.tolerance
    return Deviation(above + error, below + error, error, float(tolerance.above), float(tolerance.below))


def allowed_overshoot(case: Case) -> float:
    """Return the overshoot allowed at start-up: the declared one, or the tolerance on the side that the output drives to."""
    need = case.loop.need
    if need.overshoot is not None:
        return float(need.overshoot)
    return float(need.tolerance.above if case.loop.raises else need.tolerance.below)
