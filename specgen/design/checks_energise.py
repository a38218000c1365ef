"""Checks before energising: isolation, insulation, bonding, resistance, protection, and the settings as entered."""

from collections.abc import Iterator
from math import isfinite

from specgen.core.say import Said, of_change, of_value, seconds
from specgen.design.check import Check
from specgen.design.designation import designation
from specgen.design.types import DecidedLoop
from specgen.model.panel import Panel
from specgen.sizing.candidate import Unsized
from specgen.sizing.feeder import Feeder
from specgen.sizing.settings import ContinuousSettings, OnOffSettings, ProportionedSettings, ThreePointSettings, Tuning

COPPER = 1.724e-8  # ohm m at 20 degC, annealed copper (IEC 60028, from memory)
JOINTS = 0.1  # ohm, common practice, no source
COLD = 0.10  # share by which a cold element may differ from its name-plate; common practice, no source
SWITCHED = {"contactor": "Q1", "ssr": "Q1", "power_controller": "Q1", "relay": "K1", "relay_pair": "K1"}


def energise_checks(decided: DecidedLoop, panel: Panel) -> Iterator[Check]:
    """Yield the checks before energising in order."""
    tag = decided.tag
    yield from _power(decided, panel)
    yield Check(
        f"{tag}.energise.polarity",
        "energise",
        "Every core on the terminal of its schedule, polarity of sensor, signal and coils",
        "as scheduled",
        meaning="A sensor or signal turned round drives the output to one end and keeps it there.",
    )
    yield Check(
        f"{tag}.energise.torque",
        "energise",
        "Torque of every terminal of this loop",
        "as on each device's data sheet",
        meaning="A loose terminal under load is the commonest start of a fire in a panel.",
    )
    yield from _settings(decided)
    limiter = decided.limiter
    if limiter is not None:
        name = designation(tag, "F2")
        farther, nearer = ("higher", "lower") if limiter.outward > 0 else ("lower", "higher")
        expected: Said | str = of_value(limiter.set) if limiter.set is not None else "no value fits: the loop is held by rule S1"
        yield Check(
            f"{tag}.energise.limiter",
            "energise",
            f"Set value of the limiter {name}, with its own sensor {designation(tag, 'B2')}",
            expected,
            meaning=f"Set {farther} it acts later; set {nearer} it stops normal running. It is locked or sealed.",
        )


def _power(decided: DecidedLoop, panel: Panel) -> Iterator[Check]:
    tag, case = decided.tag, decided.decision.chosen.case
    feeder = case.feeder
    if not isinstance(feeder, Feeder):
        return
    device = SWITCHED.get(case.candidate.device)
    at = f"at {designation(tag, device)}" if device is not None else "at the element"
    who = "the panel's isolator" if panel.supply.isolator else "the isolator upstream"
    yield Check(
        f"{tag}.energise.isolation",
        "energise",
        f"{who[0].upper()}{who[1:]} locked off; prove dead {at} and at the element",
        "dead",
        meaning="A device that is off isolates nothing; a solid-state one leaks.",
    )
    damp = " A damp element is dried at reduced power first." if decided.traits.electric_heat else ""
    yield Check(
        f"{tag}.energise.insulation",
        "energise",
        "Insulation of the load circuit to earth, 500 V d.c., solid state unplugged",
        "1 MΩ",
        bound="or more",
        meaning=f"Less is damp or a damaged cable.{damp}",
    )
    for number, branch in enumerate(feeder.branches, 1):
        if branch.cable is not None and branch.cable.installed.length is not None:
            earth = COPPER * float(branch.cable.installed.length) / branch.cable.earth + JOINTS
            yield Check(
                f"{tag}.energise.bonding-{number}",
                "energise",
                f"Earth conductor of cable {designation(tag, f'W{number}')}",
                Said(earth, "resistance"),
                bound="or less",
                meaning="More is a wrong size, a long way round or a bad joint.",
            )
        # F2 is the limiter's
        fuse = designation(tag, f"F{number + 1}" if number > 1 else "F1")
        protection = branch.protection
        if protection.setting is not None:
            yield Check(
                f"{tag}.energise.overload-{number}",
                "energise",
                f"Overload release of {fuse}",
                Said(protection.setting, "current"),
                meaning="Set higher it does not protect the motor; lower, it trips at full load.",
            )
        else:
            curve = f", curve {protection.curve}" if protection.curve else ""
            yield Check(
                f"{tag}.energise.protection-{number}",
                "energise",
                f"Rating of {fuse}{curve}",
                Said(protection.rating, "current"),
                meaning="A larger one protects neither conductor nor device.",
            )
    yield from _resistance(decided)


def _resistance(decided: DecidedLoop) -> Iterator[Check]:
    r"""Yield the cold resistance of a resistive heater: :math:`U^2/P` of one phase, :math:`2U^2/P` between two lines of three.

    Star: each branch is :math:`U^2/P`, two in series. Delta: each is :math:`3U^2/P`, one beside two. Both read the same.
    """
    element = decided.loop.element
    power, voltage = getattr(element, "power", None), getattr(element, "voltage", None)
    special = decided.traits.not_burst_fired  # their resistance is another when cold
    if not decided.traits.electric_heat or special or power is None or voltage is None:
        return
    lines = 2 if getattr(element, "phases", 1) > 1 else 1
    least, most = (lines * float(voltage) ** 2 / (element.count * end) for end in (power.high, power.low))
    where = "between any two lines" if lines > 1 else "across the element"
    yield Check(
        f"{decided.tag}.energise.resistance",
        "energise",
        f"Resistance {where}, element cold, all units",
        Said(least, "resistance"),
        to=Said(most, "resistance") if most > least else None,
        tolerance=Said(COLD * most, "resistance"),
        meaning="More: a unit is open or in star instead of delta. Less: delta instead of star, or too many units. Pairs that differ: "
        "one phase is open."
        if lines > 1
        else "More: a unit is open. Less: too many units, or a shorted turn.",
    )


def _settings(decided: DecidedLoop) -> Iterator[Check]:
    tag, loop = decided.tag, decided.loop
    case = decided.decision.chosen.case
    rows: list[tuple[str, str, Said | str]] = [
        ("action", "Action of the controller", "reverse" if loop.raises else "direct"),
        ("setpoint", "Setpoint", of_value(loop.need.setpoint)),
    ]
    settings = case.settings
    match settings:
        case OnOffSettings():
            rows += [
                ("switch-on", "Output on at", of_value(settings.switch_on)),
                ("switch-off", "Output off at", of_value(settings.switch_off)),
            ]
            for key, what, least in (
                ("least-on", "Least time on", settings.enforced.min_run),
                ("least-off", "Least time off", settings.enforced.min_rest),
            ):
                if least > 0:
                    rows.append((key, what, seconds(least)))
        case ProportionedSettings():
            rows += [("cycle", "Cycle time", seconds(settings.cycle_time)), *_tuning(settings.tuning)]
        case ContinuousSettings():
            rows += [("signal", "Output signal", settings.signal), *_tuning(settings.tuning)]
        case ThreePointSettings():
            rows += [("neutral-zone", "Neutral zone, whole", of_change(settings.neutral_zone)), *_tuning(settings.tuning)]
        case Unsized():
            pass
    rows += [
        ("alarm-high", "Alarm, high", of_value(loop.alarms.high)) if loop.alarms.high is not None else ("", "", ""),
        ("alarm-low", "Alarm, low", of_value(loop.alarms.low)) if loop.alarms.low is not None else ("", "", ""),
        ("sensor-fault", "Output on sensor fault", loop.limits.on_sensor_fault or "not declared: open point"),
        (
            "power-return",
            "After return of supply",
            loop.limits.after_power_return or case.panel.house.after_power_return or "resume, assumed",
        ),
    ]
    for key, what, value in rows:
        if key:
            yield Check(f"{tag}.energise.set-{key}", "energise", f"As entered: {what[0].lower()}{what[1:]}", value)


def _tuning(tuning: Tuning) -> list[tuple[str, str, Said | str]]:
    return [
        ("band", "Proportional band", of_change(tuning.proportional_band)),
        ("integral", "Integral time", seconds(tuning.integral_time) if isfinite(tuning.integral_time) else "none"),
        ("derivative", "Derivative time", seconds(tuning.derivative_time) if tuning.derivative_time > 0 else "none"),
    ]
