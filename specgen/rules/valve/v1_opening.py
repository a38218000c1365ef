"""V1: the opening at highest and lowest duty lies within 10 to 90 percent of travel."""

from specgen.core.say import Said, share
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.margin import at_most, least, over
from specgen.rules.settled import continuous
from specgen.sizing.candidate import Unsized

LOW, HIGH = 0.10, 0.90
# in the order in which a data sheet and a flow diagram are asked for them
READS = (
    "element.kvs", "element.characteristic", "element.medium", "element.flow", "element.inlet_pressure", "element.outlet_pressure",
    "element.medium_temperature", "element.density",
)  # fmt: skip

rule = Rule(
    code="V1",
    name="Opening of the valve",
    weight="should",
    cites=("common practice, no source", "IEC 60534-2-1 (flow coefficient)", "IEC 60534-2-4 (characteristics)"),
)


def applies(case: Case) -> bool:
    """Ask it of a valve with an input; of a motor-driven one neither size nor characteristic is declared."""
    return case.traits.valve and case.traits.analogue_input and case.candidate.mode == "analogue"


def examine(case: Case) -> Finding:
    """Look at the travel at both duties: above, the valve has nothing to spare; below, the seat and friction decide and not the trim.

    A mildest case without any flow is left out: the valve shuts there, and V2 says what it does on the way. Without the pressures the
    openings are the most that they can be, so that only the lowest can be judged.
    """
    settings = continuous(case)
    if isinstance(settings, Unsized):
        return rule.unsized(settings)
    valve = settings.valve
    if valve is None:
        return rule.unanswered("How far the valve opens was not computed.")
    lacking = {path for point in valve.open_points for path in point.needs}
    needs = tuple(path for path in READS if path in lacking)
    why = "; ".join(point.because for point in valve.open_points)
    if valve.opening_high is None:
        return rule.unanswered("{why}.", needs, why=why[:1].upper() + why[1:])
    low, high = valve.opening_low, valve.opening_high
    words: dict[str, Said | str] = {"high": share(high), "least": share(LOW), "most": share(HIGH)}
    text = "The valve is {high} open at the highest duty and shut where no flow is needed"
    if low is not None:
        words["low"] = share(low)
        text = "The valve is {low} open at the lowest duty and {high} at the highest"
    above_seat = low is None or at_most(LOW, low)
    if not valve.is_installed:
        text += ", the pipes not counted"
        if above_seat:
            return rule.unanswered(text + ": {why}.", needs, why=why, **words)
    margin = least(over(HIGH, high) if valve.is_installed else None, None if low is None else max(low, 0.0) / LOW)
    return rule.judge(
        holds=above_seat and (not valve.is_installed or at_most(high, HIGH)),
        margin=margin,
        text=text + ", of {least} to {most}" + ("; the valve is too small." if high > 1 else "."),
        **words,
    )
