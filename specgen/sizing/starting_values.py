"""Starting values for a loop's worst case, with the margins they leave over all cases."""

from dataclasses import dataclass, replace
from math import isfinite

from specgen.core.figure import Figure
from specgen.model.loop import Choose, Loop
from specgen.process.box import Box, Point
from specgen.process.loop_dynamics import Dynamics
from specgen.process.loop_map import stable_cycle, stated_margins
from specgen.process.margins import Margins, margins
from specgen.process.tuning import NothingLimitsTheGainError, Pulse, Settings, cycle_delay, simc
from specgen.sizing.candidate import Assumption, Unsized
from specgen.sizing.remembered import remembered

SIMC = "Skogestad, J. Process Control 13 (2003) 291-309"
ALWAYS = (0.1, 0.9)  # duties at which the latched loop must be stable, whatever is declared
INSIDE = 0.02  # a duty nearer to an end than this is no steady cycle


@dataclass(frozen=True, slots=True)
class Hardest:
    """The case with the highest slope and longest delay, its neighbours in the remaining ranges, the laziest, and the box's duties."""

    point: Point
    dynamics: Dynamics
    others: tuple[Dynamics, ...]
    duty_low: float
    duty_high: float
    text: str


@dataclass(frozen=True, slots=True)
class Start:
    """Settings with the hardest case they were made for and the margins they leave."""

    settings: Settings
    hardest: Hardest
    cycle_time: float
    charged: float
    actuator: float
    margins: Margins
    stable: bool
    figures: tuple[Figure, ...]
    assumptions: tuple[Assumption, ...]


@remembered
def hardest_case(box: Box, gain_factor: float = 1.0) -> Hardest:
    """Find the case that starting values are made for: highest slope, longest dead time and lags.

    ``gain_factor`` is how much steeper than on average the final element acts where it is steepest (a valve) [1].
    """
    base = max(box.ends("strength", "load", "capacity"), key=lambda point: box.plant_at(point).gain_per_second)
    base = base._replace(
        dead_time=_longer(box, "dead_time"), lag=_longer(box, "lag"), sensor_lag=_longer(box, "sensor_lag")
    )
    own = dynamics_of(box, base, gain_factor)
    others = {
        dynamics_of(box, base._replace(loss=p.loss, lag=p.lag, sensor_lag=p.sensor_lag), gain_factor)
        for p in box.ends("loss", "lag", "sensor_lag")
    }
    # settings made for the steepest case can be too lively in time for the laziest: integral action outruns it
    soft = min(box.ends("strength", "load", "capacity"), key=lambda point: box.plant_at(point).gain_per_second)
    lazy = base._replace(strength=soft.strength, load=soft.load, capacity=soft.capacity)
    others |= {dynamics_of(box, lazy._replace(loss=p.loss)) for p in box.ends("loss")}
    low, high = box.duty_low[0], box.duty_high[0]
    ordered = sorted(others - {own}, key=lambda d: (d.slope, d.tau, d.lag, d.sensor_lag))
    return Hardest(base, own, tuple(ordered), inside(low), inside(high), box.text(base))


def dynamics_of(box: Box, point: Point, gain_factor: float = 1.0) -> Dynamics:
    """Return the plant of a case as a proportional controller meets it."""
    plant = box.plant_at(point)
    return Dynamics(plant.gain_per_second * gain_factor, plant.tau, plant.theta, plant.lag, plant.sensor_lag)


def _longer(box: Box, axis: str) -> float:
    held = getattr(box, axis)
    return 1.0 if held.at(1.0) >= held.at(0.0) else 0.0


def inside(duty: float) -> float:
    """Return a duty as a loop can be steady at it: a little off either end."""
    return min(max(duty, INSIDE), 1 - INSIDE)


def start_of(
    loop: Loop, hardest: Hardest, *, cycle_time: float = 0.0, pulse: Pulse = "latched", actuator: float = 0.0, scan: float = 0.0
) -> Start | Unsized:
    """Take starting values by SIMC for the hardest case, the cycle's delay included, and the margins over all cases.

    Parameters
    ----------
    loop : Loop
        The loop; ``choose.proportional_band`` and the times beside it take the place of the computed ones.
    hardest : Hardest
        As :func:`hardest_case`.
    cycle_time, actuator, scan : float
        Cycle time of a time-proportioned output, delay of the actuator, and the controller's scan [s].
    pulse : {"latched", "ramp"}
        How the controller forms the pulse.

    Returns
    -------
    Start or Unsized
        Unsized where nothing limits the gain.
    """
    return _start_of(hardest, loop.choose, cycle_time, pulse, actuator, scan)


@remembered
def _start_of(hardest: Hardest, choose: Choose | None, cycle_time: float, pulse: Pulse, actuator: float, scan: float) -> Start | Unsized:
    plant = hardest.dynamics
    charged = cycle_delay(cycle_time, max(hardest.duty_high, 0.5), pulse, plant.theta, plant.lag) if cycle_time > 0 else 0.0
    lags = tuple(lag for lag in (plant.lag, plant.sensor_lag) if lag > 0)
    # a controller looks once a scan: half of it is delay, which keeps the gain finite where no dead time was declared
    extra = actuator + scan / 2
    try:
        settings = simc(plant.slope, plant.tau, plant.theta, lags, extra, charged)
    except NothingLimitsTheGainError:
        return Unsized("nothing limits the gain: neither dead time nor lag nor a cycle", ("plant.dead_time",))
    ruled = settings
    if choose is not None:
        settings = with_choice(settings, choose)
    cases = tuple(_delayed(case, extra) for case in (plant, *hardest.others))
    duties = tuple(sorted({hardest.duty_low, hardest.duty_high}))
    if cycle_time > 0:
        found = [stated_margins(case, settings, cycle_time, duties, charged)[0] for case in cases]
    else:
        found = [margins(case, settings) for case in cases]
    worst = Margins(
        min(m.gain for m in found), min(m.phase for m in found), max(m.sensitivity for m in found), all(m.stable for m in found),
        found[0].gain_reduction, found[0].phase_crossover, found[0].gain_crossover,
    )  # fmt: skip
    stable = worst.stable
    if cycle_time > 0:
        asked = tuple(sorted({*ALWAYS, *duties}))
        stable = stable and all(stable_cycle(case, settings, cycle_time, asked) for case in cases)
    figures = tuple(_figures(settings, ruled, choose, hardest, worst, cycle_time))
    return Start(settings, hardest, cycle_time, charged, extra, worst, stable, figures, _assumed(cycle_time, pulse))


def with_choice(settings: Settings, choose: Choose) -> Settings:
    """Put the designer's own band and times in the place of the computed ones."""
    if choose.proportional_band is None and choose.integral_time is None and choose.derivative_time is None:
        return settings
    gain = settings.gain if choose.proportional_band is None else 1 / float(choose.proportional_band)
    integral = settings.integral_time if choose.integral_time is None else float(choose.integral_time)
    derivative = settings.derivative_time if choose.derivative_time is None else float(choose.derivative_time)
    return Settings(gain, integral, derivative, settings.reduced)


def _delayed(plant: Dynamics, extra: float) -> Dynamics:
    return Dynamics(plant.slope, plant.tau, plant.theta + extra, plant.lag, plant.sensor_lag) if extra > 0 else plant


def _assumed(cycle_time: float, pulse: Pulse) -> tuple[Assumption, ...]:
    if cycle_time <= 0 or pulse == "ramp":
        return ()
    return (
        Assumption(
            "controllers.pulse", "latched",
            "a duty latched at the start of the cycle delays the loop by the longest on time; an output compared with a ramp "
            "would win most of it",
        ),
    )  # fmt: skip


def _figures(
    settings: Settings, ruled: Settings, choose: Choose | None, hardest: Hardest, worst: Margins, cycle_time: float
) -> list[Figure]:
    """Return the way from the plant to the settings, ``ruled`` by the published rule, and the margins they leave."""
    case = hardest.text
    found = [*_reduced_figures(ruled, hardest), *_ruled_figures(ruled, case)]
    chosen = {} if choose is None else {name: getattr(choose, name) is not None for name in _CHOSEN}
    if any(chosen.values()):
        # the computed ones stay in the Basis under a name of their own, beside what somebody chose instead
        called = {"Kc": "proportional_band", "Xp": "proportional_band", "Ti": "integral_time", "Td": "derivative_time"}
        found = [replace(f, name=f"{f.name}, by the rule") if chosen.get(called.get(f.symbol, "")) else f for f in found]
        found += [figure for name, figure in _chosen_figures(settings).items() if chosen[name]]
    how = "exact frequency response with e^(-θs)" + ("; the latched loop's own one-cycle map where that is worse" if cycle_time > 0 else "")
    source = "frequency search, no approximation of the dead time"
    if isfinite(worst.gain):
        found.append(Figure("GM", "gain margin, worst", how, worst.gain, "number", source, {}, WORST))
    if isfinite(worst.phase):
        found.append(Figure("PM", "phase margin, worst", how, worst.phase, "degrees", source, {}, WORST))
    found.append(Figure("Ms", "peak sensitivity, worst", how, worst.sensitivity, "number", source, {}, WORST))
    return found


WORST = "worst of the steepest and the laziest case, at the longest delay and either end of loss and lags"
_CHOSEN = ("proportional_band", "integral_time", "derivative_time")


def _reduced_figures(ruled: Settings, hardest: Hardest) -> list[Figure]:
    """Return slope and delay of the hardest case, and of the plant that the half rule makes of it."""
    plant, case, reduced = hardest.dynamics, hardest.text, ruled.reduced
    settles = isfinite(plant.tau)
    tau = {"τ": (plant.tau, "time")} if settles else {}
    put_in = {"K": (plant.slope * plant.tau, "change")} | tau if settles else {}
    formula = "K/τ" if settles else "r_on + r_off"
    found = [Figure("k'", "highest slope with full output", formula, plant.slope, "change_per_second", "plant", put_in, case)]
    if reduced is None:
        return found
    parts = {
        "θ": (reduced.delay.dead_time, "time"), "actuator and scan": (reduced.delay.actuator, "time"),
        "cycle": (reduced.delay.cycle, "time"), "half of the largest lag left out": (reduced.delay.half_lag, "time"),
        "other lags": (reduced.delay.other_lags, "time"),
    }  # fmt: skip
    used = {name: part for name, part in parts.items() if part[0] > 0}
    source = SIMC + ", half rule"
    found.append(Figure("θe", "effective delay", " + ".join(used) or "0", reduced.delay.total, "time", source, used, case))
    if settles:
        lags = {"lag": (plant.lag, "time"), "sensor lag": (plant.sensor_lag, "time")}
        given = tau | {name: lag for name, lag in lags.items() if lag[0] > 0}
        kept = "τ, and half of the largest lag left out where there is no derivative action"
        found.append(Figure("τ1", "time constant that is kept", kept, reduced.tau, "time", source, given, case))
        flatter = plant.slope * plant.tau / reduced.tau
        slope = {"k'": (plant.slope, "change_per_second")} | tau | {"τ1": (reduced.tau, "time")}
        found.append(Figure("k1", "slope of the plant that is kept", "k' τ/τ1", flatter, "change_per_second", source, slope, case))
    if reduced.lag > 0:
        found.append(Figure("τ2", "second time constant that is kept", "half rule", reduced.lag, "time", source, {}, case))
    return found


def _ruled_figures(ruled: Settings, case: str) -> list[Figure]:
    """Return the settings of the rule, by way of the series form where there is derivative action."""
    reduced = ruled.reduced
    assert reduced is not None  # noqa: S101  the rule starts from a reduced plant
    theta = {"θe": (reduced.delay.total, "time")}
    slope = 1 / ((ruled.series or (ruled.gain,))[0] * 2 * reduced.delay.total)
    settles = isfinite(reduced.tau)
    name = "k1" if settles else "k'"
    gain_of = {name: (slope, "change_per_second")} | theta
    time_of = theta | ({"τ1": (reduced.tau, "time")} if settles else {})
    gain, time = f"1/({name} · 2 θe)", "min(τ1, 8 θe)" if settles else "8 θe"
    gained = {"Kc": (ruled.gain, "share_per_change")}
    band = Figure("Xp", "proportional band", "100 %/Kc", ruled.proportional_band, "change", "definition", gained)
    if ruled.series is None:
        return [
            Figure("Kc", "gain", gain, ruled.gain, "share_per_change", SIMC, gain_of, case),
            band,
            Figure("Ti", "integral time", time, ruled.integral_time, "time", SIMC, time_of, case),
        ]
    own_gain, own_time, own_derivative = ruled.series
    series = {"Kc'": (own_gain, "share_per_change"), "Ti'": (own_time, "time"), "Td'": (own_derivative, "time")}
    times = {key: series[key] for key in ("Ti'", "Td'")}
    ideal = "series form multiplied out"
    return [
        Figure("Kc'", "gain of the series form", gain, own_gain, "share_per_change", SIMC, gain_of, case),
        Figure("Ti'", "integral time of the series form", time, own_time, "time", SIMC, time_of, case),
        Figure("Td'", "derivative time of the series form", "τ2", own_derivative, "time", SIMC, {"τ2": (reduced.lag, "time")}, case),
        Figure("Kc", "gain", "Kc' (1 + Td'/Ti')", ruled.gain, "share_per_change", ideal, series, case),
        band,
        Figure("Ti", "integral time", "Ti' + Td'", ruled.integral_time, "time", ideal, times, case),
        Figure("Td", "derivative time", "Td'/(1 + Td'/Ti')", ruled.derivative_time, "time", ideal, times, case),
    ]


def _chosen_figures(settings: Settings) -> dict[str, Figure]:
    """Return what somebody chose in the place of the rule's settings, by its field."""
    band, said = settings.proportional_band, "chosen"
    return {
        "proportional_band": Figure("Xp", "proportional band, chosen", said, band, "change", "choose.proportional_band"),
        "integral_time": Figure("Ti", "integral time, chosen", said, settings.integral_time, "time", "choose.integral_time"),
        "derivative_time": Figure("Td", "derivative time, chosen", said, settings.derivative_time, "time", "choose.derivative_time"),
    }
