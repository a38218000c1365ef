"""A stuck output set against the loop's dangers, in the worst case of its box."""

from math import isfinite

from specgen.core.figure import Figure
from specgen.model.loop import Loop
from specgen.process.box import Box, Unmodelled
from specgen.sizing.candidate import Unsized
from specgen.sizing.faults import Faults, Stuck

SOURCE = "steady state of the plant with the output held"


def faults_of(loop: Loop, box: Box | Unmodelled) -> Faults | Unsized:
    """Return where the value goes with the output stuck on and stuck off.

    Returns
    -------
    Faults or Unsized
        Unsized where there is no plant. A plant that does not settle passes every danger declared on its side: how far
        it would go nobody knows.
    """
    if isinstance(box, Unmodelled):
        return Unsized(box.because, box.needs)
    return Faults(_stuck(loop, box, on=True), _stuck(loop, box, on=False))


def _stuck(loop: Loop, box: Box, *, on: bool) -> Stuck:
    upwards = on == (box.sign > 0)
    reached = {}
    for point in box.ends("strength", "load", "loss"):
        plant = box.plant_at(point)
        reached[box.value_at(point, plant.settles_on if on else plant.settles_off)] = point
    extreme = max(reached) if upwards else min(reached)
    case = box.text(reached[extreme])
    danger = loop.limits.danger_high if upwards else loop.limits.danger_low
    passes = None if danger is None else (extreme >= danger if upwards else extreme <= danger)
    settles = extreme if isfinite(extreme) else None
    symbol, name = ("y_on", "settles with the output stuck on") if on else ("y_off", "settles with the output stuck off")
    figures = (Figure(symbol, name, "steady state, extreme case", extreme, "value", SOURCE, {}, case),) if settles is not None else ()
    return Stuck(
        settles_at=settles,
        passes_high=passes if upwards else None,
        passes_low=None if upwards else passes,
        case=case,
        figures=figures,
    )
