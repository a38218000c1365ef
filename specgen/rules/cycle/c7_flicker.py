"""C7: on a public network the switching does not flicker the lights."""

from math import isinf

from specgen.core.say import Said, plain, seconds, share
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.margin import at_most, least, over
from specgen.sizing.candidate import Unsized
from specgen.sizing.flicker import Flicker, OutOfScope, flicker_of
from specgen.sizing.settings import OnOffSettings, ProportionedSettings

rule = Rule(
    code="C7",
    name="Flicker",
    weight="should",
    cites=("IEC 61000-3-3:2013 figure 2 (seen in a secondary text)", "IEC 61000-3-3:2013 clause 5 (from memory)"),
)


def applies(case: Case) -> bool:
    """Ask it of what is switched on a public network."""
    return case.panel.supply.network == "public" and case.candidate.mode in ("on_off", "time_proportioned")


def examine(case: Case) -> Finding:
    """Count two changes of voltage a cycle, at the fastest: of on-off by its most starts an hour.

    Each load is judged alone, as the standard judges an apparatus. It can ask for a longer cycle than control allows: then the window
    is shown, and what opens it.
    """
    found = flicker_of(case.loop, case.panel)
    if isinstance(found, OutOfScope):
        return rule.does_not_apply(f"The limits of flicker do not apply: {found.because}.")
    if isinstance(found, Unsized):
        return rule.unsized(found)
    settings = case.settings
    if isinstance(settings, Unsized):
        return rule.unsized(settings)
    if not isinstance(settings, OnOffSettings | ProportionedSettings):
        return rule.does_not_apply("Nothing is switched.")
    cycle = _cycle(settings)
    plt = found.severity(cycle)
    words: dict[str, Said | str] = {
        "change": share(found.change), "most": share(found.most), "cycle": seconds(cycle), "plt": plain(plt), "limit": plain(found.limit),
        "shortest": seconds(found.shortest),
    }  # fmt: skip
    text = ("Each start dips" if found.starts else "Each switching changes") + " the voltage by {change} of {most} allowed"
    text += "; at a cycle of {cycle} the flicker severity is {plt} of {limit} allowed"
    holds = at_most(found.change, found.most) and at_most(plt, found.limit)
    if not holds:
        text += _way_out(settings, found, words)
    return rule.judge(
        holds=holds, margin=least(over(found.most, found.change), over(found.limit, plt)), text=text + ".", **words
    )  # fmt: skip


def _cycle(settings: OnOffSettings | ProportionedSettings) -> float:
    if isinstance(settings, ProportionedSettings):
        return settings.cycle_time
    return 3600.0 / settings.starts_per_hour if settings.starts_per_hour > 0 else float("inf")


def _way_out(settings: OnOffSettings | ProportionedSettings, found: Flicker, words: dict[str, Said | str]) -> str:
    """Say what the cycle would have to be, what control allows, and what opens the window."""
    said = "; no cycle is long enough" if isinf(found.shortest) else "; it would take {shortest} or more"
    if isinstance(settings, ProportionedSettings):
        words["control"] = seconds(settings.most)
        said += ", and control allows {control}" if settings.most < found.shortest else ""
    if found.starts:
        return said + ": a soft starter or a supply of less impedance opens it"
    three = "a three-phase connection, " if found.is_single else ""
    return said + f": smaller stages, {three}phase angle or a supply of less impedance opens it"
