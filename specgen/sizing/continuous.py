"""Settings of analogue and three-point loops: signal or neutral zone, and the tuning."""

from math import inf

from specgen.core.figure import Figure
from specgen.model.loop import Loop
from specgen.model.panel import Panel
from specgen.process.box import Box, Unmodelled
from specgen.process.three_point import motor_work, three_point
from specgen.sizing.actuator import actuator_delay
from specgen.sizing.candidate import Assumption, Candidate, Unsized
from specgen.sizing.device import DeviceChoice
from specgen.sizing.scan import scan_and_pulse
from specgen.sizing.settings import ContinuousSettings, ThreePointSettings, Tuning
from specgen.sizing.signal_table import signal_table
from specgen.sizing.simulated import load_share, simulated_deviation, tuning_later, tuning_of
from specgen.sizing.starting_values import hardest_case, start_of
from specgen.sizing.valve_sizing import valve_sizing

SWEEP = 3600.0  # s, in which the load is taken to sweep its whole declared range there and back
SWEPT = "every step of travel by a pulse of its own; how often the load sweeps its range is common practice, no source"
USUAL_PULSE = 0.01  # of the travel time: what a motor follows reliably where nothing is declared


def continuous_settings(
    candidate: Candidate, loop: Loop, panel: Panel, box: Box | Unmodelled, device: DeviceChoice | Unsized, *, told: bool = True
) -> ContinuousSettings | Unsized:
    """Return signal and tuning of an analogue candidate; without ``told`` the start-up is simulated when it is asked for."""
    if isinstance(device, Unsized):
        return Unsized(f"no device: {device.because}", device.needs)
    valve = valve_sizing(loop, box) if candidate.device == "signal" and isinstance(box, Box) else None
    tuned = _tuned(loop, panel, box, with_actuator=candidate.device == "signal", gain_factor=valve.gain_factor if valve else 1.0, told=told)
    if isinstance(tuned, Unsized):
        return tuned
    tuning, figures, assumptions, duties = tuned
    signal = getattr(loop.element, "signal", None)
    if signal is None:
        signal = "4-20 mA"
        assumptions = (*assumptions, Assumption("element.signal", signal, "the power controller takes a live-zero signal"))
    figures = (*(valve.figures if valve else ()), *figures, *signal_table(loop, signal).figures)
    assumptions = (*assumptions, *(valve.assumptions if valve else ()))
    return ContinuousSettings(signal, tuning, *duties, figures, assumptions, valve)


def three_point_settings(
    loop: Loop, panel: Panel, box: Box | Unmodelled, device: DeviceChoice | Unsized, *, told: bool = True
) -> ThreePointSettings | Unsized:
    """Return neutral zone and tuning of a three-point candidate; ``told`` as `continuous_settings`."""
    if isinstance(device, Unsized):
        return Unsized(f"no device: {device.because}", device.needs)
    if isinstance(box, Unmodelled):
        return Unsized(box.because, box.needs)
    travel = getattr(loop.element, "travel_time", None)
    if travel is None:
        return Unsized("the element does not travel")
    if loop.sensor.step is None:
        return Unsized("the measurement's step is not declared", ("sensor.step",))
    tuned = _tuned(loop, panel, box, with_actuator=True, told=told)
    if isinstance(tuned, Unsized):
        return tuned
    tuning, figures, assumptions, duties = tuned
    pulse = getattr(loop.element, "min_pulse", None)
    if pulse is None:
        shortest = USUAL_PULSE * float(travel)
        assumptions = (
            *assumptions,
            Assumption("element.min_pulse", f"{shortest:.2g} s", "a hundredth of the travel time (common practice, no source)"),
        )
    else:
        shortest = float(pulse)
    gain = _highest_gain(box, tuning)
    zone = three_point(shortest, float(travel), gain, float(loop.sensor.step))
    inputs = {"t_p": (shortest, "time"), "t_v": (float(travel), "time")}
    formula = "max(2 K t_p/t_v, step of the measurement)"
    figures = (
        *figures,
        Figure("h", "travel of the shortest pulse", "t_p/t_v", zone.travel_step, "fraction", "definition", inputs),
        Figure("z", "neutral zone, whole width", formula, zone.neutral_zone, "change", "rule V3", {**inputs, "K": (gain, "change")}),
    )
    swing = min(box.duty_high[0], 1.0) - max(box.duty_low[0], 0.0)
    work = motor_work(max(swing, 0.0), SWEEP, zone.travel_step, float(travel))
    swept = {"Δx": (swing, "fraction"), "P": (SWEEP, "time")}
    pulse, whole = {"h": (zone.travel_step, "fraction")}, {"t_v": (float(travel), "time")}
    figures = (
        *figures,
        Figure("n_p", "pulses an hour, at most", "2 Δx/(h P)", work.pulses_per_hour, "per_hour", SWEPT, swept | pulse),
        Figure("D", "share of the time that the motor runs", "2 Δx t_v/P", work.duty, "fraction", SWEPT, swept | whole),
    )
    assumptions = (*assumptions, Assumption("load", "its declared range there and back once an hour", SWEPT))
    return ThreePointSettings(zone.neutral_zone, zone.travel_step, tuning, *duties, figures, assumptions, work.pulses_per_hour, work.duty)


def _highest_gain(box: Box, tuning: Tuning) -> float:
    """Return the largest change of the settled value; where the value does not settle, what one effective delay makes of it."""
    gain = max(box.plant_at(point).gain for point in box.ends("strength", "load", "loss"))
    if gain < inf:
        return gain
    slope = max(box.plant_at(point).gain_per_second for point in box.ends("strength", "load", "capacity"))
    return slope * tuning.effective_delay


_Tuned = tuple[Tuning, tuple[Figure, ...], tuple[Assumption, ...], tuple[float, float]]


def _tuned(
    loop: Loop, panel: Panel, box: Box | Unmodelled, *, with_actuator: bool, gain_factor: float = 1.0, told: bool
) -> _Tuned | Unsized:
    if isinstance(box, Unmodelled):
        return Unsized(box.because, box.needs)
    change = load_share(loop, box)
    if isinstance(change, Unsized):
        return change
    delay, figures, assumptions = actuator_delay(loop) if with_actuator else (0.0, (), ())
    scan, _ = scan_and_pulse(panel)
    start = start_of(loop, hardest_case(box, gain_factor), actuator=delay, scan=scan)
    if isinstance(start, Unsized):
        return start
    deviation = simulated_deviation(start, change) if change is not None else None
    tuning = (tuning_of if told else tuning_later)(start, box, loop, deviation)
    return tuning, figures, assumptions, (start.hardest.duty_low, start.hardest.duty_high)
