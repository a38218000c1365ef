"""Checks with the power circuits off: simulated sensor values, and every contact that must stop the loop."""

from collections.abc import Iterator

from specgen.catalogue.load import load_catalogue
from specgen.core.figure import Figure
from specgen.core.say import Said, digits, join, of_change, of_value
from specgen.design.check import Check
from specgen.design.designation import designation
from specgen.design.types import DecidedLoop
from specgen.process.signal import SIGNALS
from specgen.rules.base import Case
from specgen.sizing.candidate import Unsized
from specgen.sizing.injection import inject_value
from specgen.sizing.settings import ContinuousSettings, OnOffSettings
from specgen.sizing.signal_table import signal_table

_FAULT = {"off": "goes off", "full": "goes to full", "hold": "stays where it was"}
_WHO = {"resistance": "a decade resistor", "voltage": "a millivolt source", "current": "a current source"}


def cold_checks(decided: DecidedLoop) -> Iterator[Check]:
    """Yield the checks with simulated values in order: reading and output, sensor fault, limiter, alarms, chain, signal."""
    tag, case = decided.tag, decided.decision.chosen.case
    for figure in decided.inject:
        yield from _injected(decided, case, figure)
    fault = case.loop.limits.on_sensor_fault
    yield Check(
        f"{tag}.cold.sensor-open",
        "cold",
        f"Lift one wire of the sensor {designation(tag, 'B1')}",
        f"the output {_FAULT[fault]} and the controller shows a sensor fault" if fault else "not declared: note what the output does",
        meaning="Another output is a wrong fault setting of the controller (rule A2).",
    )
    yield from _limiter(decided, case)
    yield from _alarms(decided)
    yield from _chain(decided)
    yield from _signal(decided, case)


def exact(figure: Figure) -> str:
    """Write what is injected with five digits: a tenth of an ohm is a quarter of a kelvin.

    Examples
    --------
    >>> exact(Figure("R", "", "", 101.9527, "resistance", "")), exact(Figure("s", "", "", 0.012, "current", ""))
    ('101.95\u202fΩ', '12\u202fmA')
    """
    scale, unit = {"resistance": (1.0, "ohm"), "voltage": (1e3, "mV"), "current": (1e3, "mA")}[figure.dimension]
    return join(digits(figure.value * scale, 5), unit)


def _injected(decided: DecidedLoop, case: Case, figure: Figure) -> Iterator[Check]:
    value = figure.with_["x"][0]
    key = figure.case.replace(" ", "-")
    error = None if isinstance(case.error, Unsized) else case.error.root_sum
    words: dict[str, Said | str] = {"given": exact(figure)}
    with_ = _WHO[figure.dimension]
    yield Check(
        f"{decided.tag}.cold.inject-{key}",
        "cold",
        f"Inject {{given}} for the sensor ({figure.case}) with {with_}: reading",
        of_value(value),
        tolerance=None if error is None else of_change(error),
        meaning="A steady offset is wiring, lead resistance or a wrong sensor type in the controller; a turned sign is polarity.",
        words=words,
    )
    yield Check(
        f"{decided.tag}.cold.output-{key}",
        "cold",
        f"Output with {{given}} injected ({figure.case})",
        _output_at(case, value),
        meaning="The other way round is a wrong action: reverse and direct exchanged.",
        words=words,
    )


def _output_at(case: Case, value: float) -> str:
    """Say what the output does with a reading held at a value, the setpoint as declared."""
    settings = case.settings
    setpoint = float(case.loop.need.setpoint)
    outward = 1.0 if case.loop.raises else -1.0
    beyond = outward * (value - setpoint)
    if isinstance(settings, OnOffSettings):
        if outward * (value - settings.switch_off) > 0:
            return "off"
        if outward * (settings.switch_on - value) > 0:
            return "on, once a least time off has passed" if settings.enforced.min_rest > 0 else "on"
        return "stays as it was: between the switch points"
    if beyond > 0:
        return "falls, and with integral action to 0 %"
    return "rises, and with integral action to 100 %" if beyond < 0 else "stays: no deviation"


def _limiter(decided: DecidedLoop, case: Case) -> Iterator[Check]:
    limiter, tag = decided.limiter, decided.tag
    if limiter is None:
        return
    names = {product: designation(tag, product) for product in ("F2", "Q2", "B2", "S2")}
    if limiter.set is None:
        yield Check(f"{tag}.cold.limiter", "cold", f"Limiter {names['F2']}", "no value fits: not to be run (rule S1)")
        return
    given = inject_value(case.loop, limiter.set, "limiter", load_catalogue())
    words: dict[str, Said | str] = {} if isinstance(given, Unsized) else {"given": exact(given)}
    means = " ({given}, with a sensor of the loop's own kind)" if words else ""
    side = "rise" if limiter.outward > 0 else "fall"
    yield Check(
        f"{tag}.cold.limiter",
        "cold",
        f"Let the simulated value at {names['B2']} {side}{means} until {names['F2']} opens",
        of_value(limiter.set),
        meaning=f"{names['Q2']} has to open at this value by its own path, with the controller's output held on.",
        words=words,
    )
    stays = "stays open" if limiter.resets == "manual" else "closes again by itself: a declared limiter that resets so breaks rule S1"
    yield Check(
        f"{tag}.cold.limiter-reset",
        "cold",
        f"Bring the value at {names['B2']} back without touching {names['S2']}",
        stays,
        meaning=f"{names['Q2']} may close only after {names['S2']} was pressed; nor may a loss of supply reset it.",
    )
    yield Check(
        f"{tag}.cold.limiter-fault",
        "cold",
        f"Lift one wire of {names['B2']}",
        f"{names['Q2']} opens",
        meaning="A limiter that goes on without its sensor is no limiter.",
    )


def _alarms(decided: DecidedLoop) -> Iterator[Check]:
    tag, loop = decided.tag, decided.loop
    alarm = decided.safety.alarm if decided.safety is not None else None
    if alarm is not None and alarm.set is not None:
        sensor, lamp = designation(tag, "B3"), designation(tag, "P1")
        yield Check(
            f"{tag}.cold.alarm",
            "cold",
            f"Let the simulated value at {sensor} pass until {lamp} shows",
            of_value(alarm.set),
            meaning="It has to come with the controller switched off.",
        )
    for key, value in (("high", loop.alarms.high), ("low", loop.alarms.low)):
        if value is not None:
            yield Check(
                f"{tag}.cold.alarm-{key}",
                "cold",
                f"Inject past the alarm, {key}: it comes at",
                of_value(value),
                meaning="Another value is a wrong setting; no alarm is a wrong output or lamp.",
            )


def _chain(decided: DecidedLoop) -> Iterator[Check]:
    safety = decided.safety
    for contact in safety.chain if safety is not None else ():
        if contact.kind in ("limiter", "emergency_stop"):
            continue  # the limiter has its own checks, the stops are the panel's
        ends = " and ".join(contact.acts_on)
        own = contact.designation.startswith(designation(decided.tag, ""))
        key = contact.designation.rpartition("-")[2].lower() if own else contact.designation.lstrip("=").lower()
        if contact.kind == "burner_control":
            what, expected = f"Open the chain before {contact.designation}", "the burner stops and does not start"
        elif contact.kind == "proof":
            what, expected = f"Stop what is proven at {contact.designation} ({contact.what})", f"{ends} opens within seconds"
        elif contact.kind == "pair":
            what, expected = f"Put the other loop on ({contact.designation}: {contact.what})", f"{ends} opens"
        else:
            what, expected = f"Open {contact.designation} ({contact.what})", f"{ends} opens"
        meaning = "A contact that only tells the controller stops nothing when the output sticks."
        yield Check(f"{decided.tag}.cold.chain-{contact.kind}-{key}", "cold", what, expected, meaning=meaning)


def _signal(decided: DecidedLoop, case: Case) -> Iterator[Check]:
    if not isinstance(case.settings, ContinuousSettings):
        return
    made = signal_table(case.loop, case.settings.signal)
    dimension = "current" if SIGNALS[made.signal].unit == "A" else "voltage"
    for share, value in made.rows:
        percent = f"{share * 100:g}"
        yield Check(
            f"{decided.tag}.cold.signal-{percent}",
            "cold",
            f"Output by hand at {percent} %: signal",
            Said(value, dimension),
            meaning="Turned round, the valve or drive goes the other way: see the signal table.",
        )
