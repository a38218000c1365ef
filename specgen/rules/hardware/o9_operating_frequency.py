"""O9: the device runs at no more than its highest operating frequency."""

from specgen.core.say import per_hour
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.margin import at_most, over
from specgen.sizing.candidate import Unsized
from specgen.sizing.settings import OnOffSettings, ProportionedSettings

rule = Rule(code="O9", name="Operating frequency", weight="should", cites=("IEC 60947-1:2020, 4.3.4.3 (from memory)",))

HOUR = 3600.0  # s


def applies(case: Case) -> bool:
    """Ask it of pulses through contacts that have a highest rate; what moves a travelling valve is V4's matter."""
    rated = not isinstance(case.device, Unsized) and any(part.operations_per_hour for part in case.device.chain)
    return rated and case.candidate.mode in ("on_off", "time_proportioned")


def examine(case: Case) -> Finding:
    """Compare the fastest switching with the lowest rate of any contact in the chain."""
    settings = case.settings
    if isinstance(settings, Unsized):
        return rule.unsized(settings)
    if isinstance(case.device, Unsized) or not isinstance(settings, OnOffSettings | ProportionedSettings):
        return rule.does_not_apply()
    rate = settings.starts_per_hour if isinstance(settings, OnOffSettings) else HOUR / settings.cycle_time
    slowest = min((p for p in case.device.chain if p.operations_per_hour), key=lambda part: part.operations_per_hour or 0.0)
    most = slowest.operations_per_hour or 0.0
    return rule.judge(
        holds=at_most(rate, most),
        margin=over(most, rate),
        text="It switches up to {rate}; {name}, the slowest in the chain, is made for {most}.",
        rate=per_hour(rate), name=slowest.name, most=per_hour(most),
    )  # fmt: skip
