"""The safety of one loop: what stops a stuck output, what announces it, and the chain that stands in its way."""

from dataclasses import dataclass, replace

from specgen.core.figure import Figure
from specgen.design.interlocks import Interlock, Own, chain_of, own_parts, switches_off
from specgen.design.limiter import alarm_of, limiter_of
from specgen.rules.base import Case
from specgen.sizing.candidate import Assumption
from specgen.sizing.limiter import AlarmDesign, LimiterDesign, Switch


@dataclass(frozen=True, slots=True)
class SafetyDesign:
    """What stands beside the loop and not in it.

    ``chain`` is in the order of its wiring; ``switch`` is what -Q2 is, None where there is none; ``pairs`` are the loops that must
    never be on together with this one. ``parts`` has one entry a designation.
    """

    limiter: LimiterDesign | None
    alarm: AlarmDesign | None
    switch: Switch | None
    chain: tuple[Interlock, ...]
    parts: tuple[Own, ...]
    pairs: tuple[str, ...] = ()

    @property
    def figures(self) -> tuple[Figure, ...]:
        """Return every number with its formula."""
        limiter = self.limiter.figures if self.limiter is not None else ()
        return (*limiter, *(self.alarm.figures if self.alarm is not None else ()))

    @property
    def assumptions(self) -> tuple[Assumption, ...]:
        """Return what was taken for granted."""
        limiter = self.limiter.assumptions if self.limiter is not None else ()
        return (*limiter, *(self.alarm.assumptions if self.alarm is not None else ()))


def safety_of(case: Case) -> SafetyDesign:
    """Return the safety of a loop by its chosen candidate."""
    limiter, alarm = limiter_of(case), alarm_of(case)
    return SafetyDesign(limiter, alarm, switches_off(case, limiter), chain_of(case, limiter), own_parts(case, limiter, alarm))


def with_pairs(safety: SafetyDesign, case: Case, pairs: tuple[str, ...]) -> SafetyDesign:
    """Make the interlock against other loops part of the chain (rule A5)."""
    if not pairs:
        return safety
    return replace(
        safety, pairs=pairs, chain=chain_of(case, safety.limiter, pairs), parts=own_parts(case, safety.limiter, safety.alarm, pairs)
    )
