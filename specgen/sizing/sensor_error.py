"""Error of the sensor itself and of the controller's input, part by part, at one value."""

from dataclasses import dataclass

from specgen.catalogue.load import Catalogue
from specgen.catalogue.rows import Converter, CoupleClass
from specgen.catalogue.table import Known
from specgen.core.figure import Figure
from specgen.core.quantity import Range
from specgen.model.sensor import ResistanceSensor, Sensor, Thermistor, Thermocouple, Transmitter
from specgen.sizing.candidate import Assumption, Unsized
from specgen.sizing.thermometry import couple_slope

ROOM = 25.0  # degC, where the cold junction is taken to be
_TYPICAL = "typical; to be replaced by the controller's data sheet before construction"


@dataclass(frozen=True, slots=True)
class Parts:
    """The parts of the error at one value, each a figure in the loop's quantity, and what was taken for granted."""

    figures: tuple[Figure, ...]
    assumptions: tuple[Assumption, ...] = ()


def sensor_parts(sensor: Sensor, at: float, catalogue: Catalogue) -> Parts | Unsized:
    """Return the errors of sensor and input at one value.

    Parameters
    ----------
    sensor : Sensor
        The sensor; all but a transmitter measure a temperature.
    at : float
        The value [degC, or the loop's base unit for a transmitter].
    catalogue : Catalogue
        Tolerance classes and typical inputs.

    Returns
    -------
    Parts or Unsized
        Unsized where a field is missing or the class does not hold at this value.

    References
    ----------
    IEC 60751 and IEC 60584-1 tolerance classes; inputs are common practice.
    """
    match sensor:
        case ResistanceSensor():
            return _platinum(sensor, at, catalogue)
        case Thermocouple():
            return _couple(sensor, at, catalogue)
        case Thermistor():
            return _thermistor(sensor, at, catalogue)
        case Transmitter():
            return _transmitter(sensor, catalogue)


def _platinum(sensor: ResistanceSensor, at: float, catalogue: Catalogue) -> Parts | Unsized:
    if sensor.wires == 2:  # noqa: PLR2004  two wires
        told = "with two wires the leads' resistance adds to the sensor's, and the sensor cable is not declared; three wires cancel it"
        return Unsized(told, ("sensor.wires",))
    known = next(k for k in catalogue.platinum_classes if k.value.class_ == sensor.class_)
    holds = next(k for k in catalogue.platinum_ranges if k.value.class_ == sensor.class_)
    if not _inside(at, holds.value.wound):
        return Unsized(f"class {sensor.class_} of IEC 60751 holds from {holds.value.wound.text}, not at {at:g} °C", ("sensor.class",))
    assumptions: tuple[Assumption, ...] = ()
    if not _inside(at, holds.value.film):
        why = f"at {at:g} °C class {sensor.class_} holds for wire-wound elements only; {holds.row.cited}"
        assumptions = (Assumption("sensor element", "wire-wound", why),)
    a, b = float(known.value.a), float(known.value.b)
    given = {"a": (a, "change"), "b": (b, "number"), "t": (at, "temperature")}
    figure = Figure("e_s", f"sensor, class {sensor.class_}", "a + b |t|", a + b * abs(at), "change", known.row.cited, given)
    converter, assumed = _input("platinum", at, catalogue)
    return Parts((figure, converter), (*assumptions, assumed))


def _couple(sensor: Thermocouple, at: float, catalogue: Catalogue) -> Parts | Unsized:
    kind = sensor.kind.removeprefix("thermocouple_")
    known = next((k for k in catalogue.couple_classes if k.value.type == kind and k.value.class_ == sensor.class_), None)
    if known is None:
        return Unsized(f"there is no class {sensor.class_} for thermocouple {kind} in IEC 60584-1", ("sensor.class",))
    if not _inside(at, known.value.range):
        told = f"class {sensor.class_} of thermocouple {kind} holds from {known.value.range.text}, not at {at:g} °C"
        return Unsized(told, ("sensor.class",))
    here, room = couple_slope(at, kind, catalogue), couple_slope(ROOM, kind, catalogue)
    if isinstance(here, Unsized):
        return here
    if isinstance(room, Unsized):
        return room
    junction = catalogue.converter("cold_junction")
    error = float(junction.value.a or 0.0)
    given = {"e_r": (error, "change"), "S_r": (room, "V/K"), "S_t": (here, "V/K")}
    seen = error * abs(room / here)
    source = f"{junction.row.cited}; slopes by NIST SRD 60"
    cold = Figure("e_j", "cold junction, as far as it shows at the measuring junction", "e_r |S_r/S_t|", seen, "change", source, given)
    converter, assumed = _input("couple", at, catalogue)
    cable = Assumption("extension cable", f"of type {kind}", "its own tolerance is not counted; copper in its place adds kelvins")
    cold_assumed = Assumption("cold junction", f"±{error:g} K at {ROOM:g} °C", _TYPICAL)
    return Parts((couple_tolerance(known, at), cold, converter), (assumed, cold_assumed, cable))


def couple_tolerance(known: Known[CoupleClass], at: float) -> Figure:
    """Return the tolerance of a thermocouple's class at a temperature [degC] as a figure [K]."""
    row = known.value
    a, b = float(row.a or 0.0), float(row.b)
    given = {"a": (a, "change"), "b": (b, "number"), "t": (at, "temperature")}
    if row.above is not None:
        given["t_1"] = (float(row.above), "temperature")
        error, formula = max(a, a + b * (at - row.above)), "max(a, a + b (t - t_1))"
    else:
        error, formula = max(a, b * abs(at)), "max(a, b |t|)"
    return Figure("e_s", f"thermocouple {row.type}, class {row.class_}", formula, error, "change", known.row.cited, given)


def _thermistor(sensor: Thermistor, at: float, catalogue: Catalogue) -> Parts | Unsized:
    if sensor.accuracy is None:
        return Unsized("a thermistor has no class of its own: its error is not declared", ("sensor.accuracy",))
    error = float(sensor.accuracy)
    figure = Figure("e_s", "thermistor", "as declared", error, "change", "sensor.accuracy", {})
    converter, assumed = _input("thermistor", at, catalogue)
    return Parts((figure, converter), (assumed,))


def _transmitter(sensor: Transmitter, catalogue: Catalogue) -> Parts | Unsized:
    missing = tuple(f"sensor.{name}" for name in ("range", "accuracy") if getattr(sensor, name) is None)
    if sensor.range is None or sensor.accuracy is None:
        return Unsized("the transmitter's error follows from its range and accuracy, which are not both declared", missing)
    span = sensor.range.high - sensor.range.low
    given = {"a": (float(sensor.accuracy), "fraction"), "S": (span, "change")}
    figure = Figure("e_s", "transmitter", "a S", float(sensor.accuracy) * span, "change", "sensor.accuracy of sensor.range", given)
    known = catalogue.converter("signal")
    share = float(known.value.share or 0.0)
    given_input = {"a": (share, "fraction"), "S": (span, "change")}
    converter = Figure("e_c", "controller's input", "a S", share * span, "change", known.row.cited, given_input)
    assumed = Assumption("controller's input", f"±{share * 100:g} percent of the range", _TYPICAL)
    return Parts((figure, converter), (assumed,))


def _input(kind: str, at: float, catalogue: Catalogue) -> tuple[Figure, Assumption]:
    known: Known[Converter] = catalogue.converter(kind)
    a, b = float(known.value.a or 0.0), float(known.value.b or 0.0)
    given = {"a": (a, "change"), "b": (b, "number"), "t": (at, "temperature")}
    figure = Figure("e_c", "controller's input", "a + b |t|", a + b * abs(at), "change", known.row.cited, given)
    return figure, Assumption("controller's input", f"±({a:g} K + {b * 100:g} percent of the reading)", _TYPICAL)


def _inside(at: float, span: Range) -> bool:
    return span.low <= at <= span.high
