"""I4: a sensor break is detected, and which way it drives is known."""

from specgen.model.sensor import ResistanceSensor, Thermistor, Thermocouple
from specgen.rules.base import Case, Finding, Rule

rule = Rule(
    code="I4", name="Sensor break", weight="should", cites=("common practice, no source", "NAMUR NE 43 (failure of a live-zero signal)")
)

LIVE_ZERO = ("4-20 mA", "2-10 V", "1-5 V")


def examine(case: Case) -> Finding:
    """Tell an open circuit from a reading: only a signal that starts at zero cannot show it."""
    sensor = case.loop.sensor
    if isinstance(sensor, ResistanceSensor):
        return rule.judge(holds=True, text="An open circuit reads past the top of the range (up-scale) and is detected.")
    if isinstance(sensor, Thermistor):
        return rule.judge(holds=True, text="An open circuit reads past the cold end of the range (down-scale) and is detected.")
    if isinstance(sensor, Thermocouple):
        return rule.judge(holds=True, text="A break is detected by the input's own current, which drives it up-scale.")
    if sensor.signal is None:
        return rule.unanswered("Whether a broken wire is seen depends on the transmitter's signal.", ("sensor.signal",))
    live = sensor.signal in LIVE_ZERO
    return rule.judge(
        holds=live,
        text="A broken wire takes the signal of {signal} below its live zero (down-scale) and is detected."
        if live
        else "A broken wire takes the signal of {signal} to its low end (down-scale) and looks like a reading.",
        signal=sensor.signal,
    )
