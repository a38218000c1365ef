"""O7: coils have suppression suited to kind and output."""

from specgen.core.say import Said
from specgen.rules.base import Case, Finding, Rule
from specgen.sizing.candidate import Unsized

rule = Rule(code="O7", name="Suppression of coils", weight="should")


def applies(case: Case) -> bool:
    """Ask it where a coil is switched: of a contactor, a relay, or the load itself."""
    return not isinstance(case.device, Unsized) and bool(case.device.suppressors)


def examine(case: Case) -> Finding:
    """Name what is fitted across each coil, at the coil, and why that kind; it belongs to the parts."""
    if isinstance(case.device, Unsized):
        return rule.does_not_apply()
    words: dict[str, Said | str] = {}
    parts = []
    for number, fitted in enumerate(case.device.suppressors):
        words |= {f"part{number}": fitted.part, f"across{number}": fitted.across, f"because{number}": fitted.because}
        parts.append(f"{{part{number}}} across {{across{number}}}: {{because{number}}}")
    return rule.judge(holds=True, margin=None, text="Fitted at the coil: " + "; ".join(parts) + ".", **words)
