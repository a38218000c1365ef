"""The Basis of a time-proportioned loop: what bounds the cycle time, the cycle, its ripple, and what it wears."""

from math import isfinite

from specgen.core.figure import Figure
from specgen.process.time_proportioned import RipplePrediction
from specgen.sizing.settings import Bound

Bounds = tuple[tuple[Bound, ...], tuple[Bound, ...]]
RIPPLE = "steady ripple of a pulse train in the worst case of the declared ranges; exact, tests/process"

_TAKEN = {
    True: "longest of the house's series up to the least of the T_max",
    False: "shortest of the house's series from the largest of the T_min",
}


def _window(bounds: Bounds) -> dict[str, tuple[float, str]]:
    """Return the limits on the cycle time that are finite, by symbol."""
    named = [(f"T_min,{b.rule}", b.limit) for b in bounds[0]] + [(f"T_max,{b.rule}", b.limit) for b in bounds[1]]
    return {name: (limit, "time") for name, limit in named if isfinite(limit)}


def bound_figures(bounds: Bounds) -> list[Figure]:
    """Return what bounds the cycle time."""
    made = []
    for least, given in zip((True, False), bounds, strict=True):
        for bound in given:
            symbol, name = ("T_min", "least cycle time") if least else ("T_max", "longest cycle time")
            if isfinite(bound.limit):
                made.append(Figure(f"{symbol},{bound.rule}", f"{name} for {bound.words}", _HOW[bound.rule], bound.limit, "time",
                                   f"rule {bound.rule}"))  # fmt: skip
    return made


_HOW = {
    "C1": "the cycle at which the exact ripple takes its share, found by its root", "C2": "tried through the house's series",
    "C3": "hours × 3600 × life/operations", "C4": "t_min/x, t_min/(1 − x)", "C7": "120 s/r at the rate r where the curve allows d/0.65",
    "C8": "θ0/2 over the highest duty, at least one half", "T2": "tried through the house's series",
}  # fmt: skip


def cycle_figure(cycle: float, bounds: Bounds, *, wears: bool, by_designer: bool) -> Figure:
    """Return the cycle time [s] with what it was chosen between."""
    if by_designer:
        return Figure("T", "cycle time, chosen", "chosen", cycle, "time", "choose.cycle_time")
    return Figure("T", "cycle time", _TAKEN[wears], cycle, "time", "rules C1 to C8", _window(bounds))


def ripple_figures(cycle: float, ripple: RipplePrediction, duties: tuple[float, float]) -> list[Figure]:
    """Return the ripple of a cycle [s], and its shortest pulses at the lowest and the highest duty."""
    t, above, below, swing = {"T": (cycle, "time")}, ripple.above, ripple.below, ripple.swing
    low, high = duties
    how = "K (1 − e^(−xT/τ))(1 − e^(−(1−x)T/τ))/(1 − e^(−T/τ)) about the mean, or exact with a second lag"
    return [
        Figure("r+", "ripple above the mean", how, above.value, "change", RIPPLE, t, above.text),
        Figure("r−", "ripple below the mean", how, below.value, "change", RIPPLE, t, below.text),
        Figure("s", "largest ripple, peak to trough", how, swing.value, "change", RIPPLE, t, swing.text),
        Figure("t_on", "shortest on time", "x T", low * cycle, "time", "rule C4", {**t, "x": (low, "fraction")}),
        Figure("t_off", "shortest off time", "(1 − x) T", (1 - high) * cycle, "time", "rule C4", {**t, "x": (high, "fraction")}),
    ]


def wear_figures(cycle: float, hours: float, operations: float, life: float | None, lasts: float | None) -> list[Figure]:
    """Return operations a year, and the life [year] of a contact that lasts so many operations."""
    put_in = {"T": (cycle, "time"), "h": (hours, "number")}
    found = [Figure("n_op", "operations a year", "3600 h/T", operations, "per_year", "ISO 13849-1 annex C, n_op (from memory)", put_in)]
    if life is None or lasts is None or not isfinite(life):
        return found
    inputs = {"operations": (lasts, "operations"), "n_op": (operations, "per_year")}
    return [*found, Figure("L", "contact life of the weakest contact", "operations/n_op", life, "years", "rule C3", inputs)]
