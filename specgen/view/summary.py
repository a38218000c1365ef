"""A candidate in short: what it is, what is entered, how far it lets the value go, how long its contacts last."""

from dataclasses import dataclass
from math import isfinite

from specgen.design.designation import designation
from specgen.design.record_loop import DEVICE_LETTER
from specgen.design.types import DecidedLoop, Examined
from specgen.sizing.candidate import Unsized
from specgen.sizing.settings import ContinuousSettings, OnOffSettings, ProportionedSettings, Settings, ThreePointSettings
from specgen.view.words import DEVICES
from specgen.view.writer import Writer

HOUR = 3600.0


@dataclass(frozen=True, slots=True)
class Summary:
    """What a candidate does in the worst case.

    ``above`` and ``below`` are how far the true value leaves the setpoint: switching, the sudden load where one is
    declared, and the measuring error, together; None where they could not be computed. ``includes`` names the parts.
    """

    mode: str
    device: str
    settings: Settings | Unsized
    above: float | None
    below: float | None
    includes: tuple[str, ...]
    allowed_above: float
    allowed_below: float
    operations_per_hour: float | None
    operations_per_year: float | None
    contact_life: float | None
    weakest: str

    @property
    def _worse_above(self) -> bool:
        if self.above is None or self.below is None:
            return self.allowed_above <= self.allowed_below
        return self.above / self.allowed_above >= self.below / self.allowed_below

    @property
    def excursion(self) -> float | None:
        """Return the excursion on the side where it takes the larger share of what is allowed."""
        return self.above if self._worse_above else self.below

    @property
    def allowed(self) -> float:
        """Return what is allowed on that side."""
        return self.allowed_above if self._worse_above else self.allowed_below

    def entered_with(self, writer: Writer) -> str:
        """Say the one setting that makes it."""
        settings = self.settings
        if isinstance(settings, OnOffSettings):
            return f"differential {writer.setting(settings.differential)}"
        if isinstance(settings, ProportionedSettings):
            return f"{writer.time(settings.cycle_time)} cycle"
        if isinstance(settings, ContinuousSettings):
            return settings.signal
        if isinstance(settings, ThreePointSettings):
            return f"neutral zone {writer.setting(settings.neutral_zone)}"
        return ""


def summary_of(decided: DecidedLoop) -> Summary:
    """Return a loop's chosen candidate in short."""
    return summary_of_examined(decided.decision.chosen)


def summary_of_examined(examined: Examined) -> Summary:
    """Return any candidate in short."""
    case = examined.case
    settings = case.settings
    tolerance = case.loop.need.tolerance
    above, below, includes = _excursions(examined)
    rate, yearly, life, weakest = _switching(settings)
    return Summary(
        mode=case.candidate.mode,
        device=DEVICES[case.candidate.device],
        settings=settings,
        above=above,
        below=below,
        includes=includes,
        allowed_above=float(tolerance.above),
        allowed_below=float(tolerance.below),
        operations_per_hour=rate,
        operations_per_year=yearly,
        contact_life=life,
        weakest=weakest,
    )


def _excursions(examined: Examined) -> tuple[float | None, float | None, tuple[str, ...]]:
    """Add up what lets the true value leave the setpoint."""
    case = examined.case
    settings = case.settings
    if isinstance(settings, Unsized):
        return None, None, ()
    above = below = 0.0
    includes: list[str] = []
    if isinstance(settings, OnOffSettings):
        above, below = settings.enforced.above.value, settings.enforced.below.value
        includes.append("switching")
    elif isinstance(settings, ProportionedSettings):
        above, below = settings.ripple.above.value, settings.ripple.below.value
        includes.append("switching")
    elif isinstance(settings, ThreePointSettings):
        above = below = settings.neutral_zone / 2
        includes.append("neutral zone")
    deviation = None if isinstance(settings, OnOffSettings) else settings.tuning.load_deviation
    if deviation is not None:
        above, below = above + deviation, below + deviation
        includes.append("the sudden load")
    if not isinstance(case.error, Unsized):
        above, below = above + case.error.root_sum, below + case.error.root_sum
        includes.append("measuring error")
    if not includes:
        return None, None, ()
    return above, below, tuple(includes)


def _switching(settings: Settings | Unsized) -> tuple[float | None, float | None, float | None, str]:
    """Return operations an hour and a year, contact life [year] and the weakest contact; None where nothing operates."""
    if isinstance(settings, OnOffSettings):
        return settings.starts_per_hour, settings.operations_per_year, _finite(settings.contact_life), settings.weakest
    if isinstance(settings, ProportionedSettings):
        return HOUR / settings.cycle_time, settings.operations_per_year, _finite(settings.contact_life), settings.weakest
    return None, None, None, ""


def _finite(value: float | None) -> float | None:
    return value if value is not None and isfinite(value) else None


def designated(tag: str, device: str) -> str:
    """Return the designation of the device that switches or throttles the element, empty where there is none of its own.

    Examples
    --------
    >>> designated("TIC-101", "contactor"), designated("TIC-101", "signal")
    ('=TIC101-Q1', '')
    """
    letter = DEVICE_LETTER.get(device)
    return designation(tag, letter) if letter else ""
