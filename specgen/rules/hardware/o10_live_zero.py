"""O10: signals have a live zero, so that a broken wire is seen."""

from specgen.rules.base import Case, Finding, Rule
from specgen.rules.declared import word
from specgen.sizing.settings import ContinuousSettings

rule = Rule(code="O10", name="Live zero", weight="should")


def applies(case: Case) -> bool:
    """Ask it of analogue candidates whose signal is known."""
    return case.candidate.mode == "analogue" and _signal(case) is not None


def examine(case: Case) -> Finding:
    """Tell no output from a broken wire: only a signal that does not start at nothing can."""
    signal = _signal(case) or ""
    if signal.startswith("0"):
        return rule.judge(holds=False, text="{signal} is the same at no output and with a broken wire: a break is not seen.", signal=signal)
    return rule.judge(holds=True, text="{signal} never falls to nothing: a broken wire is seen.", signal=signal)


def _signal(case: Case) -> str | None:
    if isinstance(case.settings, ContinuousSettings):
        return case.settings.signal
    return word(case, "element.signal") if case.candidate.device == "signal" else None
