"""The candidate's settings as the mode that a rule is about."""

from specgen.rules.base import Case
from specgen.sizing.candidate import Unsized
from specgen.sizing.settings import ContinuousSettings, OnOffSettings, ProportionedSettings, ThreePointSettings, Tuning


def on_off(case: Case) -> OnOffSettings | Unsized:
    """Return the settings of an on-off candidate, or why there are none."""
    return case.settings if isinstance(case.settings, OnOffSettings | Unsized) else Unsized("the candidate is not switched on-off")


def proportioned(case: Case) -> ProportionedSettings | Unsized:
    """Return the settings of a time-proportioned candidate, or why there are none."""
    if isinstance(case.settings, ProportionedSettings | Unsized):
        return case.settings
    return Unsized("the candidate is not time-proportioned")


def continuous(case: Case) -> ContinuousSettings | Unsized:
    """Return the settings of an analogue candidate, or why there are none."""
    return case.settings if isinstance(case.settings, ContinuousSettings | Unsized) else Unsized("the candidate is not analogue")


def three_point(case: Case) -> ThreePointSettings | Unsized:
    """Return the settings of a three-point candidate, or why there are none."""
    return case.settings if isinstance(case.settings, ThreePointSettings | Unsized) else Unsized("the candidate is not three-point")


def tuning(case: Case) -> Tuning | Unsized:
    """Return the starting values of a proportional candidate, or why there are none."""
    if isinstance(case.settings, ProportionedSettings | ContinuousSettings | ThreePointSettings):
        return case.settings.tuning
    return case.settings if isinstance(case.settings, Unsized) else Unsized("an on-off loop has no starting values")
