"""Values to inject at site in place of the sensor: ohm, millivolt or milliampere for a value of the loop."""

from collections.abc import Iterator

from specgen.catalogue.load import Catalogue
from specgen.core.figure import Figure
from specgen.model.loop import Loop
from specgen.model.sensor import ResistanceSensor, Thermistor, Thermocouple, Transmitter
from specgen.process.signal import SIGNALS
from specgen.sizing.candidate import Unsized
from specgen.sizing.thermometry import couple_voltage, platinum_resistance, thermistor_resistance

ROOM = 25.0  # degC, terminals of the controller
_NOMINAL = {"pt100": 100.0, "pt1000": 1000.0}


def inject_values(loop: Loop, catalogue: Catalogue) -> tuple[Figure, ...] | Unsized:
    """Return what to inject for the lowest setpoint, the setpoint, the highest and the dangers.

    Parameters
    ----------
    loop : Loop
        The loop with its sensor and limits.
    catalogue : Catalogue
        Reference functions.

    Returns
    -------
    tuple of Figure, or Unsized
        One figure a value: resistance [ohm], voltage [V] with the terminals at 25 degC, or current [A]; its ``case``
        says which value it stands for. Unsized where a field is missing or a value lies outside the sensor's function.

    References
    ----------
    IEC 60751 clause 4.2, NIST SRD 60; a linear transmitter.
    """
    made: list[Figure] = []
    for name, value in _wanted(loop):
        figure = inject_value(loop, value, name, catalogue)
        if isinstance(figure, Unsized):
            return figure
        made.append(figure)
    return tuple(made)


def _wanted(loop: Loop) -> Iterator[tuple[str, float]]:
    span = loop.need.setpoints
    if loop.limits.danger_low is not None:
        yield "danger low", float(loop.limits.danger_low)
    if span.low < loop.need.setpoint:
        yield "lowest setpoint", span.low
    yield "setpoint", float(loop.need.setpoint)
    if span.high > loop.need.setpoint:
        yield "highest setpoint", span.high
    if loop.limits.danger_high is not None:
        yield "danger high", float(loop.limits.danger_high)


def inject_value(loop: Loop, value: float, name: str, catalogue: Catalogue) -> Figure | Unsized:
    """Return what to inject for one value [in the loop's base unit]; parameters as `inject_values`."""
    sensor = loop.sensor
    at = {"x": (value, "value")}
    match sensor:
        case ResistanceSensor():
            nominal = _NOMINAL[sensor.kind]
            resistance = platinum_resistance(value, nominal, catalogue)
            if isinstance(resistance, Unsized):
                return resistance
            given = at | {"R_0": (nominal, "resistance")}
            formula = "R_0 (1 + A x + B x^2), below 0 degC + R_0 C (x - 100) x^3"
            return Figure("R", "resistance to inject", formula, resistance, "resistance", catalogue.platinum.row.cited, given, name)
        case Thermistor():
            if sensor.r25 is None or sensor.beta is None:
                missing = tuple(f"sensor.{field}" for field in ("r25", "beta") if getattr(sensor, field) is None)
                return Unsized("the thermistor's curve is not declared", missing)
            given = at | {"R_25": (float(sensor.r25), "resistance"), "beta": (float(sensor.beta), "difference")}
            resistance = thermistor_resistance(value, float(sensor.r25), float(sensor.beta))
            return Figure("R", "resistance to inject", "R_25 exp(beta (1/(x + 273.15) - 1/298.15))", resistance, "resistance",
                          "two-constant model, common practice", given, name)  # fmt: skip
        case Thermocouple():
            kind = sensor.kind.removeprefix("thermocouple_")
            hot, cold = couple_voltage(value, kind, catalogue), couple_voltage(ROOM, kind, catalogue)
            if isinstance(hot, Unsized):
                return hot
            if isinstance(cold, Unsized):
                return cold
            given = at | {"t_r": (ROOM, "temperature"), "E(x)": (hot, "voltage"), "E(t_r)": (cold, "voltage")}
            return Figure("E", f"voltage to inject, terminals at {ROOM:g} °C", "E(x) - E(t_r)", hot - cold, "voltage",
                          "NIST SRD 60:Monograph 175 (seen in a secondary text)", given, name)  # fmt: skip
        case Transmitter():
            return _of_transmitter(sensor, value, name)


def _of_transmitter(sensor: Transmitter, value: float, name: str) -> Figure | Unsized:
    if sensor.range is None or sensor.signal is None:
        missing = tuple(f"sensor.{field}" for field in ("range", "signal") if getattr(sensor, field) is None)
        return Unsized("the transmitter's range and signal are not both declared", missing)
    span = sensor.range
    if not span.low <= value <= span.high:
        return Unsized(f"the {name} lies outside the transmitter's range {span.text}", ("sensor.range",))
    signal = SIGNALS[sensor.signal]
    dimension = "current" if signal.unit == "A" else "voltage"
    given = {
        "x": (value, "value"), "x_0": (span.low, "value"), "x_1": (span.high, "value"), "s_0": (signal.low, dimension),
        "s_1": (signal.high, dimension),
    }  # fmt: skip
    shown = signal.at((value - span.low) / (span.high - span.low))
    formula = "s_0 + (s_1 - s_0)(x - x_0)/(x_1 - x_0)"
    return Figure("s", f"{dimension} to inject", formula, shown, dimension, "a linear transmitter", given, name)
