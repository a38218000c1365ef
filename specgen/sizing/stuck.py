"""A stuck output set against the loop's dangers, in the worst case of its box."""

from dataclasses import replace
from math import isfinite

from specgen.core.figure import Figure
from specgen.core.quantity import Quantity
from specgen.model.loop import Loop
from specgen.process.box import Box, Unmodelled
from specgen.process.fault_cases import settles_at, time_to_reach
from specgen.sizing.candidate import Unsized
from specgen.sizing.faults import Faults, Stuck
from specgen.sizing.normal_running import normal_running
from specgen.sizing.settings import Settings

SOURCE = "plant with the output held; element hot"


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


def with_times(faults: Faults | Unsized, loop: Loop, box: Box | Unmodelled, settings: Settings | Unsized) -> Faults | Unsized:
    """Add how fast danger and spoiling are reached from the worst peak of a candidate's normal running."""
    if isinstance(faults, Unsized) or isinstance(box, Unmodelled):
        return faults
    running = normal_running(loop, settings)
    ends = (running.high, running.low) if loop.raises else (running.low, running.high)
    return Faults(_timed(faults.on, loop, box, ends[0], on=True), _timed(faults.off, loop, box, ends[1], on=False))


def _upwards(box: Box, *, on: bool) -> bool:
    return on == (box.sign > 0)


def _stuck(loop: Loop, box: Box, *, on: bool) -> Stuck:
    upwards = _upwards(box, on=on)
    found = settles_at(box, "on" if on else "off", "highest" if upwards else "lowest")
    danger = loop.limits.danger_high if upwards else loop.limits.danger_low
    passes = None
    if danger is not None:
        passes = found is None or (found.value >= danger if upwards else found.value <= danger)
    symbol, name = ("y_on", "settles with the output stuck on") if on else ("y_off", "settles with the output stuck off")
    figures = () if found is None else (Figure(symbol, name, "steady state, extreme case", found.value, "value", SOURCE, {}, found.text),)
    return Stuck(
        settles_at=None if found is None else found.value,
        passes_high=passes if upwards else None,
        passes_low=None if upwards else passes,
        case="" if found is None else found.text,
        figures=figures,
    )


def _timed(stuck: Stuck, loop: Loop, box: Box, start: float, *, on: bool) -> Stuck:
    upwards = _upwards(box, on=on)
    limits = loop.limits
    danger, spoils = (limits.danger_high, limits.spoils_high) if upwards else (limits.danger_low, limits.spoils_low)
    state = "stuck on" if on else "stuck off"
    figures = list(stuck.figures)
    times: list[float | None] = []
    formula = "τ ln((y_end − from)/(y_end − to)), or (to − from)/speed where nothing settles"
    for target, what, whole in ((danger, "danger", False), (spoils, "spoiling", True)):
        seconds = _seconds(box, start, target, upwards=upwards, on=on, whole=whole)
        times.append(None if seconds is None else seconds[0])
        if seconds is not None and target is not None:
            inputs = {"from": (start, "value"), "to": (float(target), "value")}
            figures.append(Figure("t", f"shortest time to {what}, {state}", formula, seconds[0], "time", SOURCE, inputs, seconds[1]))
    return replace(stuck, time_to_danger=times[0], time_to_spoil=times[1], figures=tuple(figures))


def _seconds(box: Box, start: float, target: Quantity | None, *, upwards: bool, on: bool, whole: bool) -> tuple[float, str] | None:
    if target is None:
        return None
    if (start >= target) if upwards else (start <= target):
        return 0.0, "normal running is there already"
    found = time_to_reach(box, "on" if on else "off", start, float(target), whole=whole)
    return (found.value, found.text) if isfinite(found.value) else None
