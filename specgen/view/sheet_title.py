"""A loop's decision in one sentence that a reviewer can repeat."""

from math import isfinite

from specgen.core.quantity import Range
from specgen.design.types import DecidedLoop
from specgen.sizing.candidate import Unsized
from specgen.sizing.settings import ContinuousSettings, OnOffSettings, ProportionedSettings, ThreePointSettings
from specgen.view.summary import Summary, summary_of
from specgen.view.words import DONE, THROUGH, capital, counted, listed
from specgen.view.writer import Writer

MOST_NAMED = 3


def title_sentence(decided: DecidedLoop, writer: Writer) -> str:
    """Say mode, output, setting, what it holds and how long it lasts.

    An excursion is never rounded back to the tolerance that it passes.
    """
    short = summary_of(decided)
    parts = [decision_words(decided, writer)]
    held = _held(decided, short, writer)
    if held:
        parts.append(held)
    if short.contact_life is not None:
        parts.append(f"contacts last {writer.years(short.contact_life)}")
    sentence = "; ".join(parts) + "."
    before = _before(decided)
    return before + sentence[:1].lower() + sentence[1:] if before else sentence


def _before(decided: DecidedLoop) -> str:
    """Say first what stands in the way: the must-rules that are broken, or the inputs that are missing."""
    if decided.verdict == "held":
        broken = [f.rule for f in decided.findings if f.outcome == "broken" and f.weight == "must"]
        what = "As chosen" if decided.decision.by_designer else "The nearest that was found"
        return f"Held by {listed(broken)}, which {'is' if len(broken) == 1 else 'are'} broken. {what}: "
    if decided.verdict == "open":
        asked = {f.rule for f in decided.findings if f.outcome == "unanswered" and f.weight == "must"}
        fields = [missing.field for missing in decided.missing if asked.intersection(missing.settles)]
        named = listed(fields) if 0 < len(fields) <= MOST_NAMED else counted(len(fields), "input") if fields else listed(sorted(asked))
        return f"Open until {named} {'is' if len(fields) == 1 else 'are'} known. As far as it can be decided: "
    return ""


def decision_words(decided: DecidedLoop, writer: Writer) -> str:
    """Say mode, output and the one setting."""
    candidate = decided.decision.chosen.case.candidate
    start = f"{DONE[candidate.mode]} {THROUGH[candidate.device]}"
    settings = decided.decision.chosen.case.settings
    if isinstance(settings, OnOffSettings):
        return f"{start} with a differential of {writer.setting(settings.differential)}"
    if isinstance(settings, ProportionedSettings):
        return f"{start}, {writer.time(settings.cycle_time)} cycle"
    if isinstance(settings, ContinuousSettings):
        return f"{start}, {settings.signal}"
    if isinstance(settings, ThreePointSettings):
        return f"{start}, neutral zone {writer.setting(settings.neutral_zone)}"
    return start


def _held(decided: DecidedLoop, short: Summary, writer: Writer) -> str:
    if short.above is None or short.below is None or not isfinite(short.above + short.below):
        if isinstance(short.settings, Unsized):
            return f"what it holds cannot be said: {short.settings.because}"
        return ""
    value = writer.value(float(decided.loop.need.setpoint))
    included = f"{listed(short.includes)} included"
    above, below = writer.excursion(short.above, short.allowed_above), writer.excursion(short.below, short.allowed_below)
    if short.allowed_above != short.allowed_below:
        allowed = f"{writer.setting(short.allowed_above)} and {writer.setting(short.allowed_below)}"
        return f"expected to hold {value} within {above} above and {below} below of the {allowed} allowed, {included}"
    worse, allowed = max(short.above, short.below), writer.setting(short.allowed_above)
    leaves = writer.excursion(worse, short.allowed_above)
    if worse > short.allowed_above:
        return f"expected to leave {value} by up to {leaves} where {allowed} is allowed, {included}"
    return f"expected to hold {value} within ±{leaves} of the ±{allowed} allowed, {included}"


def kicker(decided: DecidedLoop, writer: Writer) -> str:
    """Say what the loop is for, where, and what it acts with."""
    loop = decided.loop
    element = loop.element
    facts = [capital(element.kind.replace("_", " "))]
    for name in ("power", "current", "capacity", "voltage"):
        value = getattr(element, name, None)
        text = getattr(value, "text", "")
        if isinstance(value, Range) and name == "power" and not decided.traits.electric_heat and value.low == value.high:
            text = writer.say(value.low, "motor_power")
        if text:
            facts.append(text)
    phases = getattr(element, "phases", None)
    if phases:
        facts.append("three-phase" if phases == 3 else "single-phase")  # noqa: PLR2004  three phases
    if element.count > 1:
        facts.append(f"{element.count} units")
    return " · ".join((loop.service, loop.area, ", ".join(facts)))
