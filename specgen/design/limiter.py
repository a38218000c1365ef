"""What stops or announces a stuck output of a loop: the declared limiter or the one that rule S1 asks for, and the alarm."""

from specgen.core.figure import Figure
from specgen.core.say import Phrasing, Said
from specgen.model.traits import Traits
from specgen.process.box import Unmodelled
from specgen.process.fault_cases import LimiterCase, limiter_case
from specgen.rules.base import Case
from specgen.rules.hazard import Room, independent_lag, rooms
from specgen.sizing.candidate import Assumption, Unsized
from specgen.sizing.limiter import AlarmDesign, LimiterDesign, Switch, Window, set_value, softest
from specgen.sizing.on_off import setting_step

_MIDWAY = "(y_run + y_late)/2, on the setting step towards normal running"


def limiter_of(case: Case) -> LimiterDesign | None:
    """Return a loop's limiter; None where none is declared and a stuck output passes no danger.

    Notes
    -----
    One that is computed is set midway between the end of normal running and the latest value at which it still acts short of the
    danger, on the setting step, rounded towards normal running. Where the dead time and the second lag that follow would carry the value
    past the danger, the latest value is that from which it also comes to rest short of it, if normal running leaves any.
    Through its sensor's lag it acts at ``set + lag x speed``.
    """
    declared = case.loop.limits.limiter
    found = () if isinstance(case.faults, Unsized) else rooms(case, "on", case.faults.on)
    if declared is None and not found:
        return None
    lag = independent_lag(case, "on")
    window = _window(case, found[0], lag) if found else None
    value = float(declared.set) if declared is not None else None
    if value is None and window is not None:
        value = set_value(window, setting_step(case.loop, case.panel))
    acts = limiter_case(case.box, value, lag) if value is not None and not isinstance(case.box, Unmodelled) else None
    return LimiterDesign(
        set=value,
        sensor_lag=lag,
        acts_at=None if acts is None else acts.acts_at,
        declared=declared is not None,
        figures=tuple(_figures(case, value, lag, window, acts)),
        assumptions=tuple(_assumptions(case, value, lag)),
        peaks_at=None if acts is None else acts.peaks_at,
        outward=1 if case.loop.raises else -1,
        window=window,
        sensor=_sensor(case),
        resets=declared.resets if declared is not None else "manual",
        switch=switch_of(case.traits),
        case="" if acts is None else acts.text,
    )


def switch_of(traits: Traits) -> Switch:
    """Return what a limiter opens: never the loop's own switching device.

    Examples
    --------
    >>> switch_of(Traits(heats=True, electric_heat=True)), switch_of(Traits(valve=True, travels=True))
    ('contactor', 'shut_off_valve')
    """
    if traits.burner:
        return "burner_valves"
    if traits.valve:
        return "shut_off_valve"
    return "drive_contactor" if traits.analogue_input else "contactor"


def alarm_of(case: Case) -> AlarmDesign | None:
    """Return the alarm, independent of the loop, where an output stuck off passes a danger; None where it passes none."""
    if isinstance(case.faults, Unsized):
        return None
    room = next(iter(rooms(case, "off", case.faults.off)), None)
    if room is None:
        return None
    window = Window(room.outward, room.running, room.latest, room.danger)
    written = case.loop.alarms.high if room.outward > 0 else case.loop.alarms.low
    declared = written is not None and room.holds(written)
    value = float(written) if written is not None and declared else set_value(window, setting_step(case.loop, case.panel))
    ends = {"y_run": (room.running, "value"), "y_late": (room.latest, "value")}
    figures: list[Figure] = []
    assumed: list[Assumption] = []
    if value is not None:
        said = "declared" if declared else _MIDWAY
        source = "alarms" if declared else "rule S1"
        figures.append(Figure("y_B3", "set value of the independent alarm", said, value, "value", source, {} if declared else ends))
        sum_of = f"y_B3 {'+' if room.outward > 0 else '−'} t_B3 v"
        put_in = {"y_B3": (value, "value"), "t_B3": (room.lag, "time")}
        reached = room.reached(value)
        figures.append(Figure("y_A", "true value when the alarm comes", sum_of, reached, "value", "a ramp behind a lag", put_in))
        if not declared:
            side = "high" if room.outward > 0 else "low"
            said = Phrasing(case.loop.unit, case.loop.difference_unit).say(Said(value, "value"))
            assumed.append(Assumption(f"alarms.{side}", said, "no declared alarm lies in the room: computed (rule S1)"))
    return AlarmDesign(
        side="high" if room.outward > 0 else "low",
        set=value,
        sensor_lag=room.lag,
        acts_at=None if value is None else room.reached(value),
        window=window,
        declared=declared,
        consequence=case.loop.limits.consequence or "",
        sensor=_sensor(case),
        figures=tuple(figures),
        assumptions=tuple(assumed),
    )


def _sensor(case: Case) -> str:
    return case.loop.sensor.kind.replace("_", " ")


def _window(case: Case, room: Room, lag: float) -> Window:
    window = Window(room.outward, room.running, room.latest, room.danger)
    if isinstance(case.box, Unmodelled) or case.loop.limits.limiter is not None:
        return window
    return Window(room.outward, room.running, room.latest, room.danger, softest(case.box, window, lag))


def _figures(case: Case, value: float | None, lag: float, window: Window | None, acts: LimiterCase | None) -> list[Figure]:
    own = case.loop.limits.limiter
    made: list[Figure] = []
    if value is not None and own is not None:
        made.append(Figure("y_F2", "set value of the limiter", "declared", value, "value", "limits.limiter"))
    elif value is not None and window is not None:
        latest = window.softest if window.softest is not None else window.latest
        ends = {"y_run": (window.running, "value"), "y_late": (latest, "value")}
        made.append(Figure("y_F2", "set value of the limiter", _MIDWAY, value, "value", "rule S1", ends))
    formula, source = "max(the loop's own sensor's, 20 s)", "common practice, no source"
    if own is not None and own.sensor_lag is not None:
        formula, source = "declared", "limits.limiter.sensor_lag"
    made.append(Figure("t_F2", "lag of the limiter's sensor", formula, lag, "time", source))
    if acts is None or value is None:
        return made
    sign = "+" if case.loop.raises else "−"
    speed = abs(acts.acts_at - value) / lag if lag > 0 else 0.0
    put_in = {"y_F2": (value, "value"), "t_F2": (lag, "time"), "v": (speed, "change_per_second")}
    made.append(
        Figure("y_F", "true value when the limiter acts", f"y_F2 {sign} t_F2 v", acts.acts_at, "value", "a ramp behind a lag", put_in,
               acts.text),
    )  # fmt: skip
    made.append(
        Figure("y_P", "farthest true value after the limiter has acted", "y_F, dead time at full output, second lag emptying",
               acts.peaks_at, "value", "first-order step response", {"y_F": (acts.acts_at, "value")}, acts.text),
    )  # fmt: skip
    if window is not None:
        clear = {"y_F2": (value, "value"), "y_run": (window.running, "value")}
        short = {"y_F": (acts.acts_at, "value"), "y_D": (window.danger, "value")}
        beyond, left = window.clear(value), window.short(acts.acts_at)
        made.append(Figure("d_F2", "limiter's distance from normal running", "|y_F2 − y_run|", beyond, "change", "rule S1", clear))
        made.append(Figure("d_F", "distance left to the danger when it acts", "|y_D − y_F|", left, "change", "rule S1", short))
    return made


def _assumptions(case: Case, value: float | None, lag: float) -> list[Assumption]:
    phrasing = Phrasing(case.loop.unit, case.loop.difference_unit)
    own = case.loop.limits.limiter
    made: list[Assumption] = []
    if own is None and value is not None:
        why = "not declared: midway between the end of normal running and the latest value that keeps short of the danger (rule S1)"
        made.append(Assumption("limits.limiter.set", phrasing.say(Said(value, "value")), why))
    if own is None or own.sensor_lag is None:
        why = "not declared: the loop's own sensor's lag, at least 20 s (common practice, no source)"
        made.append(Assumption("limits.limiter.sensor_lag", phrasing.say(Said(lag, "time")), why))
    return made
