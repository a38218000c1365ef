"""Checks of the first run against what was predicted, and of the hand-over."""

from collections.abc import Iterator

from specgen.core.say import Said, amperes, of_change, seconds
from specgen.design.check import Check
from specgen.design.designation import designation
from specgen.design.types import DecidedLoop
from specgen.model.panel import Panel
from specgen.process.box import Box, Unmodelled
from specgen.rules.base import Case
from specgen.sizing.candidate import Unsized
from specgen.sizing.feeder import Feeder
from specgen.sizing.settings import OnOffSettings, ProportionedSettings, ThreePointSettings, Tuning

MINUTE = 60.0
READ = 0.10  # share by which a clamp meter and the supply of the day may differ; common practice, no source


def first_run_checks(decided: DecidedLoop) -> Iterator[Check]:
    """Yield the checks of the first run: plant first, then what the settings make of it."""
    tag, case = decided.tag, decided.decision.chosen.case
    yield from _current(decided, case)
    if isinstance(case.box, Unmodelled):
        yield Check(
            f"{tag}.first_run.step",
            "first_run",
            "Record one step of the output by hand until the value has settled",
            "nothing is predicted: note dead time, rise and where it settles",
            meaning="The recording is a step test: with it as plant.step_test the loop can be decided.",
        )
    else:
        yield from _plant(tag, case.box)
    yield from _settled(tag, case)


def hand_over_checks(decided: DecidedLoop, panel: Panel) -> Iterator[Check]:
    """Yield what is left in order before the plant is handed over."""
    tag, case = decided.tag, decided.decision.chosen.case
    error = None if isinstance(case.error, Unsized) else case.error.root_sum
    yield Check(
        f"{tag}.hand_over.sensor",
        "hand_over",
        "Simulators removed, sensor back; reading against a reference beside it",
        of_change(0.0),
        tolerance=None if error is None else of_change(error),
        meaning="More than the measuring error is a sensor in the wrong place, of the wrong class, or badly seated.",
    )
    if decided.limiter is not None:
        yield Check(
            f"{tag}.hand_over.limiter",
            "hand_over",
            f"Limiter {designation(tag, 'F2')} reset, its set value sealed, its key kept apart",
            "sealed",
        )
    if decided.safety is not None and decided.safety.chain:
        yield Check(f"{tag}.hand_over.bridges", "hand_over", "No bridge or test link left in the chain", "none")
    yield Check(
        f"{tag}.hand_over.as-left",
        "hand_over",
        "Settings as left noted beside those of the sheet; every difference with its reason",
        "noted",
    )
    head = panel.panel
    yield Check(
        f"{tag}.hand_over.dossier",
        "hand_over",
        f"Dossier {head.reference} revision {head.revision} at the panel, cautions explained",
        "done",
    )


def _current(decided: DecidedLoop, case: Case) -> Iterator[Check]:
    if not isinstance(case.feeder, Feeder):
        return
    rated = case.feeder.load.rated
    meaning = "Lines that differ: one phase or unit is open. All high or low: another voltage or another element than declared."
    yield Check(
        f"{decided.tag}.first_run.current",
        "first_run",
        "Current of each line at full output, read to the rated supply",
        amperes(rated),
        tolerance=amperes(READ * rated),
        meaning=meaning,
    )


def _plant(tag: str, box: Box) -> Iterator[Check]:
    points = box.ends("strength", "load", "loss", "capacity")
    speeds = [box.plant_at(point).speed(0.0, 1.0) * MINUTE for point in points]
    least, most = max(min(speeds), 0.0), max(speeds)
    way = "rise" if box.sign > 0 else "fall"
    yield _between(
        f"{tag}.first_run.speed",
        f"The value's {way} in one minute at full output as it passes the setpoint",
        (least, most),
        "change",
        "Faster: less heat capacity or more power than declared; stuck on, the danger is reached sooner. Slower: the opposite, or "
        "something is missing from the balance. Correct the plant and decide again.",
    )
    theta = (box.dead_time.at(0.0), box.dead_time.at(1.0))
    yield _between(
        f"{tag}.first_run.dead-time",
        "Time from a change of output to the first movement of the reading",
        theta,
        "time",
        "Longer: the sensor sits badly or far off; move it, or widen band and integral time by the same factor and decide again.",
    )
    low, high = box.duty_low[0], box.duty_high[0]
    yield _between(
        f"{tag}.first_run.duty",
        "Share of full output when settled",
        (max(low, 0.0), min(max(high, 0.0), 1.0)),
        "fraction",
        "Outside: load, loss or power are others than declared.",
    )


def _between(name: str, what: str, ends: tuple[float, float], dimension: str, meaning: str) -> Check:
    low, high = ends
    to = Said(high, dimension) if high > low else None
    return Check(name, "first_run", what, Said(low, dimension), to=to, bound="about" if to is None else "", meaning=meaning)


def _settled(tag: str, case: Case) -> Iterator[Check]:
    settings = case.settings
    if isinstance(settings, OnOffSettings):
        seen = settings.enforced
        yield Check(
            f"{tag}.first_run.period",
            "first_run",
            "Time from one start to the next, settled",
            seconds(seen.period),
            bound="or more",
            meaning="Shorter: more dead time was declared than there is; widen the differential within its range.",
        )
        yield Check(
            f"{tag}.first_run.swing",
            "first_run",
            "Swing of the true value, peak to trough",
            of_change(seen.swing.value),
            bound="or less",
            meaning="More: more dead time or less heat capacity than declared; narrow the differential within its "
            "range, and where that is no help the mode is wrong.",
        )
        for key, what, pulse in (("on", "Shortest time on", seen.shortest_on.value), ("off", "Shortest time off", seen.shortest_off.value)):
            yield Check(
                f"{tag}.first_run.pulse-{key}",
                "first_run",
                what,
                seconds(pulse),
                bound="or more",
                meaning="Shorter: widen the differential within its range.",
            )
        if settings.warm_up is not None:
            yield _warm(tag, settings.warm_up)
        return
    if isinstance(settings, ProportionedSettings):
        yield from _proportioned(tag, settings)
    elif isinstance(settings, ThreePointSettings):
        yield Check(
            f"{tag}.first_run.pulses",
            "first_run",
            "Pulses of the actuator in an hour, settled",
            Said(settings.pulses_per_hour, "per_hour") if settings.pulses_per_hour is not None else "note them",
            bound="or less",
            meaning="More: hunting; widen the neutral zone, then the band.",
        )
    if not isinstance(settings, Unsized):
        yield from _tuned(tag, settings.tuning)


def _proportioned(tag: str, settings: ProportionedSettings) -> Iterator[Check]:
    yield Check(
        f"{tag}.first_run.cycle",
        "first_run",
        "Time from one switching on to the next",
        seconds(settings.cycle_time),
        bound="about",
        meaning="Another one is a wrong cycle time in the controller.",
    )
    yield Check(
        f"{tag}.first_run.ripple",
        "first_run",
        "Swing at the period of the cycle time",
        of_change(settings.ripple.swing.value),
        bound="or less",
        meaning="More, at this period: the cycle is too long for the plant; shorten it within its range. A slower swing is "
        "too much gain: widen the proportional band by half and watch again.",
    )
    yield Check(
        f"{tag}.first_run.pulse-on",
        "first_run",
        "Shortest time on at the lowest load",
        seconds(settings.ripple.shortest_on.value),
        bound="or more",
        meaning="Shorter: the load is smaller than declared; the device skips pulses below its least.",
    )


def _tuned(tag: str, tuning: Tuning) -> Iterator[Check]:
    yield Check(
        f"{tag}.first_run.swing",
        "first_run",
        "Sustained swing slower than the output's own cycle, settled",
        "none",
        meaning="A slow swing is too much gain: widen the proportional band by half, then lengthen the integral time, and watch again.",
    )
    if tuning.overshoot is not None:
        yield Check(
            f"{tag}.first_run.overshoot",
            "first_run",
            "Overshoot on the first start",
            of_change(tuning.overshoot),
            bound="or less",
            meaning="More: more dead time or second lag than declared; widen the band, or start with the setpoint ramped.",
        )
    if tuning.time_to_band is not None:
        yield _warm(tag, tuning.time_to_band)


def _warm(tag: str, time: float) -> Check:
    return Check(
        f"{tag}.first_run.start",
        "first_run",
        "Time from the coldest start to the band",
        seconds(time),
        bound="or less",
        meaning="Longer: less power, a lower supply or more goods than declared.",
    )
