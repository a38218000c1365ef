"""The error of the measurement at the setpoint."""

from dataclasses import dataclass, replace
from math import hypot

from specgen.catalogue.load import Catalogue
from specgen.core.figure import Figure
from specgen.model.loop import Loop
from specgen.model.panel import Panel
from specgen.model.sensor import Transmitter
from specgen.sizing.candidate import Assumption, Unsized
from specgen.sizing.sensor_error import Parts, sensor_parts


@dataclass(frozen=True, slots=True)
class MeasuringError:
    """Largest error of the measurement over the setpoints [in the loop's quantity].

    ``root_sum`` is the root of the sum of squares of the parts, ``sum`` their plain sum; rules use ``root_sum``.
    """

    root_sum: float
    sum: float
    figures: tuple[Figure, ...] = ()
    assumptions: tuple[Assumption, ...] = ()


def measuring_error(loop: Loop, panel: Panel, catalogue: Catalogue) -> MeasuringError | Unsized:
    r"""Return the largest error of the measurement over the setpoints.

    Parameters
    ----------
    loop : Loop
        The loop with its sensor.
    panel : Panel
        The step of a setting, where the sensor declares no step of its own.
    catalogue : Catalogue
        Tolerance classes and typical inputs.

    Returns
    -------
    MeasuringError or Unsized
        In the loop's quantity, with one figure a part, the root sum and the sum; Unsized with the fields that are missing.

    Notes
    -----
    Sensor, cold junction, input and half of the measuring step: :math:`\sqrt{\sum e_i^2}` and :math:`\sum e_i`. Every
    part grows with the distance from 0 degC or is constant but the cold junction's, which is small: both ends of the
    setpoints are computed and the larger error counts.

    References
    ----------
    IEC 60751, IEC 60584-1 tolerance classes; the root sum of independent errors: JCGM 100 (GUM), clause 5.1.2.
    """
    if loop.need.quantity != "temperature" and not isinstance(loop.sensor, Transmitter):
        told = f"a {loop.sensor.kind.replace('_', ' ')} measures a temperature, the loop's quantity is {loop.need.quantity}"
        return Unsized(told, ("sensor.kind",))
    step = _step(loop, panel)
    if isinstance(step, Unsized):
        return step
    span = loop.need.setpoints
    found: list[MeasuringError] = []
    for at in dict.fromkeys((span.high, span.low)):
        parts = sensor_parts(loop.sensor, at, catalogue)
        if isinstance(parts, Unsized):
            return parts
        case = "" if span.high == span.low else f"at the {'highest' if at == span.high else 'lowest'} setpoint"
        found.append(_together(parts, step, case))
    return max(found, key=lambda error: error.root_sum)


def _together(parts: Parts, step: Parts, case: str) -> MeasuringError:
    figures = tuple(replace(figure, case=case) for figure in (*parts.figures, *step.figures))
    given = {figure.symbol: (figure.value, "change") for figure in figures}
    names = list(given)
    root, plain = hypot(*(figure.value for figure in figures)), sum(figure.value for figure in figures)
    squares = " + ".join(f"{name}^2" for name in names)
    rule = "independent errors: JCGM 100 clause 5.1.2"
    together = (
        Figure("e", "measuring error, root sum", f"sqrt({squares})", root, "change", rule, given, case),
        Figure("e_sum", "measuring error, plain sum", " + ".join(names), plain, "change", "all errors at once", given, case),
    )
    return MeasuringError(root, plain, (*figures, *together), (*parts.assumptions, *step.assumptions))


def _step(loop: Loop, panel: Panel) -> Parts | Unsized:
    """Return half of the measuring step, that of a setting where the sensor declares none."""
    assumptions: tuple[Assumption, ...] = ()
    if loop.sensor.step is not None:
        step = float(loop.sensor.step)
    else:
        steps = panel.house.setting_step
        house = {"temperature": steps.temperature, "pressure": steps.pressure, "humidity": steps.humidity, "level": steps.level}
        taken = house.get(loop.need.quantity)
        # a level may be a length, where the house's step, a share, says nothing
        if taken is None or (loop.need.quantity == "level" and loop.unit.symbol not in ("percent", "%")):
            return Unsized("the smallest step of the measurement is not declared", ("sensor.step",))
        step = float(taken)
        assumptions = (Assumption("sensor.step", taken.text, "not declared: the step of a setting is taken"),)
    given = {"s": (step, "change")}
    return Parts((Figure("e_q", "half of the measuring step", "s/2", step / 2, "change", "rounding to the step", given),), assumptions)
