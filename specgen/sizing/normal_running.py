"""How far normal running reaches: the lowest and highest true value over every setpoint, in the worst case."""

from dataclasses import dataclass

from specgen.model.loop import Loop
from specgen.sizing.candidate import Unsized
from specgen.sizing.settings import ContinuousSettings, OnOffSettings, ProportionedSettings, Settings, ThreePointSettings


@dataclass(frozen=True, slots=True)
class Normal:
    """The lowest and highest true value of normal running [value]."""

    low: float
    high: float


def normal_running(loop: Loop, settings: Settings | Unsized) -> Normal:
    """Return how far normal running reaches: predicted excursions and overshoot, or the tolerance where nothing is predicted.

    A sudden load that is declared belongs to normal running.
    """
    need = loop.need
    above, below = float(need.tolerance.above), float(need.tolerance.below)
    if isinstance(settings, OnOffSettings):
        above, below = settings.enforced.above.value, settings.enforced.below.value
    elif isinstance(settings, ProportionedSettings | ContinuousSettings | ThreePointSettings):
        if isinstance(settings, ProportionedSettings):
            load = settings.tuning.load_deviation or 0.0
            above, below = settings.ripple.above.value + load, settings.ripple.below.value + load
        predicted = settings.tuning.overshoot
        allowed = need.overshoot or (need.tolerance.above if loop.raises else need.tolerance.below)
        reaches = float(allowed) if predicted is None else predicted
        # an overshoot at start-up goes the way that the output drives
        above, below = (max(above, reaches), below) if loop.raises else (above, max(below, reaches))
    return Normal(need.setpoints.low - below, need.setpoints.high + above)
