"""Settings of on-off control: the differential between what the machine and the product allow."""

from dataclasses import replace
from math import inf, isfinite

from specgen.core.figure import Figure
from specgen.model.loop import Loop
from specgen.model.panel import Panel
from specgen.process.box import Box, Unmodelled
from specgen.process.differential import least_differential, widest_differential
from specgen.process.fault_cases import FaultCase, warm_up
from specgen.process.limit_cycle import SECONDS_AN_HOUR, NoCycle
from specgen.process.on_off import OnOffPrediction, predict_on_off
from specgen.sizing.candidate import Assumption, Unsized
from specgen.sizing.contact_life import years_of_life
from specgen.sizing.device import DeviceChoice
from specgen.sizing.flicker import Flicker, flicker_of
from specgen.sizing.measurement import MeasuringError
from specgen.sizing.remembered import remembered
from specgen.sizing.rounding import chosen_differential
from specgen.sizing.settings import Bound, OnOffSettings, Placement
from specgen.sizing.wear import allowed_per_hour, hours_per_year, weakest

CYCLE = "settled on-off cycle in the worst case of the declared ranges; compared with numerical integration in tests/process"
_widest_differential = remembered(widest_differential)
_predict_on_off = remembered(predict_on_off)
ON = "θ + τ ln(1 + (hi − trough)/(y_on − hi)), or the exact cycle with lags"
OFF = "θ + τ ln(1 + (peak − lo)/(lo − y_off)), or the exact cycle with lags"
NOISES = 2  # D2: a differential is at least this many times the noise


def on_off_settings(
    loop: Loop, panel: Panel, box: Box | Unmodelled, device: DeviceChoice | Unsized, error: MeasuringError | Unsized,
    *, told: bool = True,
) -> OnOffSettings | Unsized:  # fmt: skip
    """Choose the differential of an on-off loop and predict its worst cases.

    Without ``told`` figures and assumptions are left out, and worst cases are looked for when they are asked for.

    Returns
    -------
    OnOffSettings or Unsized
        Unsized where the plant is not known or no case of it switches.
    """
    if isinstance(box, Unmodelled):
        return Unsized(box.because, box.needs)
    if isinstance(device, Unsized):
        return Unsized(f"no device: {device.because}", device.needs)
    placement: Placement = (loop.choose.placement if loop.choose else None) or "centred"
    step = setting_step(loop, panel)
    if step is None:
        return Unsized("neither a setting step nor the measurement's step is declared", ("sensor.step",))
    try:
        return _settled(loop, panel, box, device, error, placement, step, told=told)
    except NoCycle as none:
        return Unsized(f"the loop cannot switch: {none}", ())


def _settled(
    loop: Loop, panel: Panel, box: Box, device: DeviceChoice | Unsized, error: MeasuringError | Unsized, placement: Placement, step: float,
    *, told: bool,
) -> OnOffSettings:  # fmt: skip
    run, rest = _least_times(loop)
    bounds = _least_bounds(loop, panel, box, device, placement)
    least = max((bound.limit for bound in bounds if isfinite(bound.limit)), default=step)
    most, most_bound = _most(loop, box, error, placement, run, rest)
    chosen = loop.choose.differential if loop.choose else None
    differential = float(chosen) if chosen is not None else chosen_differential(least, most, step, even=placement == "centred")
    enforced = _predict_on_off(box, differential, placement, run, rest)
    natural = enforced
    if run > 0 or rest > 0:
        acts = enforced.shortest_on.value < run or enforced.shortest_off.value < rest
        natural = _predict_on_off(box, differential, placement) if acts else replace(enforced, min_run=0.0, min_rest=0.0)
    starts = enforced.starts_per_hour.value + _defrosts(loop)
    operations = starts * hours_per_year(loop, panel)
    last = weakest(device)
    life = years_of_life(last.operations, operations) if last else None
    setpoint = float(loop.need.setpoint)
    made = OnOffSettings(
        differential=differential, placement=placement, switch_on=setpoint + enforced.switch_on, switch_off=setpoint + enforced.switch_off,
        least=least, most=most, least_bounds=bounds, most_bound=most_bound, natural=natural, enforced=enforced, starts_per_hour=starts,
        operations_per_year=operations, contact_life=life, weakest=last.contact.what if last else "",
        chosen_by="choose" if chosen is not None else "computed",
    )  # fmt: skip
    if not told:
        return made
    near = loop.need.tolerance.below if loop.raises else loop.need.tolerance.above
    cold = warm_up(box, float(near))
    lights = flicker_of(loop, panel)
    seen = lights if isinstance(lights, Flicker) and starts > 0 else None
    placed = () if placement != "centred" or (loop.choose and loop.choose.placement) else (_CENTRED,)
    return replace(
        made,
        warm_up=cold.value if cold is not None and isfinite(cold.value) else None,
        figures=(
            *_window_figures(bounds, least, most_bound, step, differential, "choose.differential" if chosen is not None else ""),
            *_point_figures(setpoint, enforced, run, rest),
            *_figures(enforced, natural, starts, operations, life, last.operations if last else None),
            *_warm_up_figure(cold),
            *(seen.figures_at(SECONDS_AN_HOUR / starts) if seen is not None else ()),
        ),
        assumptions=(*placed, *(seen.assumptions if seen is not None else ())),
    )


_CENTRED = Assumption("choose.placement", "centred", "not written: a switch point lies half the differential on each side of the setpoint")


def setting_step(loop: Loop, panel: Panel) -> float | None:
    """Return the step in which a differential can be entered: the house's, or the measurement's for flow and other quantities."""
    house = panel.house.setting_step
    quantity = loop.need.quantity
    if quantity == "temperature":
        return float(house.temperature)
    if quantity == "pressure":
        return float(house.pressure)
    if quantity == "humidity":
        return float(house.humidity)
    if quantity == "level" and loop.unit.symbol == "percent":
        return float(house.level)
    return float(loop.sensor.step) if loop.sensor.step is not None else None


def _least_times(loop: Loop) -> tuple[float, float]:
    return float(getattr(loop.element, "min_run", None) or 0.0), float(getattr(loop.element, "min_rest", None) or 0.0)


def _defrosts(loop: Loop) -> float:
    """Return starts an hour that defrosts add (M12)."""
    defrost = getattr(loop.element, "defrost", None)
    return defrost.per_day / 24 if defrost is not None else 0.0


def _least_bounds(loop: Loop, panel: Panel, box: Box, device: DeviceChoice | Unsized, placement: Placement) -> tuple[Bound, ...]:
    bounds: list[Bound] = []
    if loop.sensor.step is not None:
        bounds.append(Bound("D1", float(loop.sensor.step), "one step of the measurement"))
    if loop.sensor.noise is not None:
        bounds.append(Bound("D2", NOISES * float(loop.sensor.noise), "twice the measurement noise"))
    starts = getattr(loop.element, "starts_per_hour", None)
    run, rest = _least_times(loop)
    last = weakest(device)
    per_hour = allowed_per_hour(last.operations, panel, loop) - _defrosts(loop) if last else None
    own = max(starts - _defrosts(loop), 0.0) if starts is not None else None
    found = least_differential(
        box, placement, starts_per_hour=own or None, min_run=run, min_rest=rest,
        switchings_per_hour=per_hour if per_hour and per_hour > 0 else None, known=_known(box, placement, run, rest),
    )  # fmt: skip
    words = {
        "starts": ("D3", f"{starts} starts an hour"), "life": ("D5", "the house's contact life"), "run": ("D6", "the least run"),
        "rest": ("D6", "the least rest"),
    }  # fmt: skip
    bounds += [Bound(words[name][0], value, words[name][1]) for name, value in found.items()]
    if per_hour is not None and per_hour <= 0:
        bounds.append(Bound("D5", inf, "the defrosts alone use up the house's contact life"))
    if own == 0.0:
        bounds.append(Bound("D3", inf, "the defrosts alone use up the starts"))
    return tuple(bounds)


@remembered
def _known(box: Box, placement: Placement, run: float, rest: float) -> dict[tuple[str, float, float], float]:  # noqa: ARG001  told apart by them
    """Return what was found so far of a box: of its devices only the contacts' life differs."""
    return {}


def _most(
    loop: Loop, box: Box, error: MeasuringError | Unsized, placement: Placement, run: float, rest: float
) -> tuple[float, Bound | None]:
    if isinstance(error, Unsized):
        return inf, None
    above, below = float(loop.need.tolerance.above) - error.root_sum, float(loop.need.tolerance.below) - error.root_sum
    most = _widest_differential(box, above, below, placement, run, rest)
    return most, Bound("D4", most, "the tolerance less the measuring error")


def _warm_up_figure(cold: FaultCase | None) -> tuple[Figure, ...]:
    if cold is None or not isfinite(cold.value):
        return ()
    source = "first rise from the coldest rest at the lowest supply, every body counted"
    formula = "θ + τ ln((y_on − y_cold)/(y_on − y_near)), a second lag starting empty"
    return (Figure("t_b", "time to the band, longest", formula, cold.value, "time", source, {}, cold.text),)


def _window_figures(
    bounds: tuple[Bound, ...], least: float, most: Bound | None, step: float, differential: float, chosen: str
) -> list[Figure]:
    """Return what bounds the differential, and the differential."""
    how = "the differential at which the exact cycle just keeps the limit, found by its root"
    given: dict[str, tuple[float, str]] = {}
    made = []
    for bound in bounds:
        if isfinite(bound.limit):
            declared = bound.rule in ("D1", "D2")
            made.append(Figure(f"d_{bound.rule}", f"least differential for {bound.words}", "declared" if declared else how,
                               bound.limit, "change", f"rule {bound.rule}"))  # fmt: skip
            given[f"d_{bound.rule}"] = max(given.get(f"d_{bound.rule}", (0.0, ""))[0], bound.limit), "change"
    all_of = f"max({', '.join(given) or 'setting step'})"
    made.append(Figure("d_min", "least differential", all_of, least, "change", "rules D1 to D6", given))
    if most is not None:
        made.append(Figure("d_max", "most differential", how, most.limit, "change", f"rule {most.rule}: {most.words}"))
    window = {"d_min": (least, "change"), "step": (step, "change")} | ({"d_max": (most.limit, "change")} if most is not None else {})
    called, formula = "differential, the whole distance between the switch points", "sqrt(d_min d_max) on the setting step, not below d_min"
    if chosen:
        made.append(Figure("d", f"{called}, chosen", "chosen", differential, "change", chosen))
    else:
        made.append(Figure("d", called, formula, differential, "change", "rules D1 to D6", window))
    return made


def _point_figures(setpoint: float, enforced: OnOffPrediction, run: float, rest: float) -> list[Figure]:
    """Return the switch points at the declared setpoint, and the least times as declared."""
    made = []
    for name, apart, words in (("y_1", enforced.switch_on, "switches on at"), ("y_0", enforced.switch_off, "switches off at")):
        put_in = {"setpoint": (setpoint, "value"), "Δ": (apart, "change")}
        made.append(Figure(name, words, "setpoint + Δ, by the placement", setpoint + apart, "value", "definition", put_in))
    for name, least, words in (("run", run, "least run, enforced"), ("rest", rest, "least rest, enforced")):
        if least > 0:
            made.append(Figure(f"t_{name}", words, "declared", least, "time", f"element.min_{name}"))
    return made


def _figures(
    enforced: OnOffPrediction, natural: OnOffPrediction, starts: float, operations: float, life: float | None, lasts: float | None
) -> tuple[Figure, ...]:
    d = {"d": (enforced.differential, "change")}
    above, below = enforced.above, enforced.below
    fastest = "t_on + t_off of the fastest case, least times enforced"
    found = [
        Figure("e+", "largest excursion above the setpoint", "peak − setpoint", above.value, "change", CYCLE, d, above.text),
        Figure("e−", "largest excursion below the setpoint", "setpoint − trough", below.value, "change", CYCLE, d, below.text),
        Figure("s", "largest swing", "peak − trough", enforced.swing.value, "change", CYCLE, d, enforced.swing.text),
        Figure("P", "shortest period, from start to start", fastest, enforced.period, "time", CYCLE, d, enforced.starts_per_hour.text),
        Figure("N", "most starts", "3600 s/P + N_d", starts, "per_hour", CYCLE, {
            "P": (enforced.period, "time"), "N_d": (starts - enforced.starts_per_hour.value, "per_hour")
        }),
        Figure("t_on", "shortest on time, without timers", ON, natural.shortest_on.value, "time", CYCLE, d, natural.shortest_on.text),
        Figure("t_off", "shortest off time, without timers", OFF, natural.shortest_off.value, "time", CYCLE, d, natural.shortest_off.text),
        Figure(
            "n_op", "operations a year", "N × hours × days", operations, "per_year", "ISO 13849-1 annex C, n_op (from memory)",
            {"N": (starts, "per_hour"), "hours a year": (operations / starts if starts else 0.0, "number")},
        ),
    ]  # fmt: skip
    if life is not None and lasts is not None and isfinite(life):
        inputs = {"operations": (lasts, "operations"), "n_op": (operations, "per_year")}
        found.append(Figure("L", "contact life of the weakest contact", "operations/n_op", life, "years", "rule D5", inputs))
    return tuple(found)


