"""The independent limiter of a loop: the declared one, or the one that rule S1 asks for, with where it acts."""

from dataclasses import dataclass

from specgen.core.figure import Figure
from specgen.core.say import Phrasing, Said
from specgen.process.box import Unmodelled
from specgen.rules.base import Case
from specgen.rules.hazard import Room, independent_lag, rooms, speed
from specgen.sizing.candidate import Assumption, Unsized
from specgen.sizing.on_off import setting_step
from specgen.sizing.rounding import nearest_step


@dataclass(frozen=True, slots=True)
class IndependentLimiter:
    """Set value [value], its sensor's lag [s], and the true value when it acts [value], None where the plant is not known."""

    set: float
    sensor_lag: float
    acts_at: float | None
    declared: bool
    figures: tuple[Figure, ...] = ()
    assumptions: tuple[Assumption, ...] = ()


def limiter_of(case: Case) -> IndependentLimiter | None:
    """Return a loop's limiter; None where none is declared and a stuck output passes no danger, or leaves no room for one.

    Notes
    -----
    One that is computed is set midway between the end of normal running and the latest value at which it still acts short of the
    danger, on the setting step. Through its sensor's lag it acts at ``set + lag x speed``.
    """
    declared = case.loop.limits.limiter
    lag = independent_lag(case, "on")
    if declared is not None:
        return _made(case, float(declared.set), lag, declared=True)
    if isinstance(case.faults, Unsized):
        return None
    room = next((room for room in rooms(case, "on", case.faults.on) if room.open), None)
    if room is None:
        return None
    step = setting_step(case.loop, case.panel)
    middle = (room.running + room.latest) / 2
    value = middle if step is None else nearest_step(middle, step)
    return _made(case, value if room.holds(value) else middle, lag, declared=False, room=room)


def _made(case: Case, value: float, lag: float, *, declared: bool, room: Room | None = None) -> IndependentLimiter:
    outward = 1 if case.loop.raises else -1
    acts: float | None = None
    figures: list[Figure] = []
    if room is not None:
        ends = {"end of normal running": (room.running, "value"), "latest": (room.latest, "value")}
        figures.append(Figure("y_F2", "set value of the limiter", "midway, on the setting step", value, "value", "rule S1", ends))
    else:
        figures.append(Figure("y_F2", "set value of the limiter", "declared", value, "value", "limits.limiter"))
    own = case.loop.limits.limiter
    lag_declared = own is not None and own.sensor_lag is not None
    formula, source = "max(the loop's own sensor's, 20 s)", "common practice, no source"
    if lag_declared:
        formula, source = "declared", "limits.limiter.sensor_lag"
    figures.append(Figure("t_F2", "lag of the limiter's sensor", formula, lag, "time", source))
    if not isinstance(case.box, Unmodelled):
        rate = speed(case, "on", value, outward)
        acts = value + outward * lag * rate
        put_in = {"y_F2": (value, "value"), "t_F2": (lag, "time"), "v": (rate, "change_per_second")}
        sum_of = f"y_F2 {'+' if outward > 0 else '−'} t_F2 v"
        figures.append(Figure("y_F", "true value when the limiter acts", sum_of, acts, "value", "a ramp behind a lag", put_in))
    assumptions: list[Assumption] = []
    phrasing = Phrasing(case.loop.unit, case.loop.difference_unit)
    if not declared:
        why = "not declared: midway between the end of normal running and the latest value that keeps short of the danger (rule S1)"
        assumptions.append(Assumption("limits.limiter.set", phrasing.say(Said(value, "value")), why))
    if not lag_declared:
        why = "not declared: the loop's own sensor's lag, at least 20 s (common practice, no source)"
        assumptions.append(Assumption("limits.limiter.sensor_lag", phrasing.say(Said(lag, "time")), why))
    return IndependentLimiter(value, lag, acts, declared, tuple(figures), tuple(assumptions))
