"""Voltage drop along a cable, as a share of the supply's voltage."""

from math import cos, hypot, sin, sqrt

from specgen.catalogue.load import Catalogue
from specgen.core.figure import Figure
from specgen.sizing.connection import Connection


def voltage_drop(
    current: float, voltage: float, length: float, resistance: float, reactance: float, *, three_phase: bool, angle: float | None = 0.0
) -> float:
    r"""Share of the voltage that a cable takes.

    Parameters
    ----------
    current : float
        Line current [A].
    voltage : float
        Between the lines of a three-phase load, across a single-phase one [V].
    length : float
        One way [m].
    resistance, reactance : float
        Of one conductor [ohm/m].
    three_phase : bool
        Whether the load has three phases.
    angle : float, optional
        Phase angle of the current [rad]; None where it is not known: then the worst one counts.

    Returns
    -------
    float
        Drop over voltage [0..1].

    Notes
    -----
    :math:`\Delta U = b L I (r \cos\varphi + x \sin\varphi)` with b = 2 for a single-phase circuit and
    :math:`\sqrt3` between the lines of a three-phase one. Over every angle the bracket is at most
    :math:`\sqrt{r^2 + x^2}`.

    References
    ----------
    IEC 60364-5-52:2009 annex G (from memory).

    Examples
    --------
    >>> round(voltage_drop(10.0, 230.0, 20.0, 0.0225 / 2.5, 0.08e-3, three_phase=False), 5)
    0.01565
    """
    factor = sqrt(3) if three_phase else 2.0
    bracket = hypot(resistance, reactance) if angle is None else resistance * cos(angle) + reactance * sin(angle)
    return factor * length * current * bracket / voltage


def drop_figure(current: float, fed: Connection, length: float, area: float, catalogue: Catalogue, *, resistive: bool) -> Figure:
    """Return the drop of a cable of a size [m2] as a figure; of anything but a resistance at the worst phase angle."""
    wiring = catalogue.wiring
    ohm, x = wiring.figure("resistance"), wiring.figure("reactance")
    square = area * 1e6
    r, reactance = float(ohm.value.quantity) / square, float(x.value.quantity) if fed.kind == "ac" else 0.0
    three = fed.way == "three_phase"
    straight = resistive or fed.kind == "dc"
    share = voltage_drop(current, fed.voltage, length, r, reactance, three_phase=three, angle=0.0 if straight else None)
    root, bracket = ("√3" if three else "2"), ("r" if straight else "√(r² + x²)")
    given = {"L": (length, "length"), "I_b": (current, "current"), "U": (fed.voltage, "voltage"), "S": (area, "area"),
             "r S": (float(ohm.value.quantity), "resistance"), "x": (reactance, "resistance")}  # fmt: skip
    case = "" if straight else "at whatever phase angle is worst"
    return Figure("ΔU/U", "voltage drop of the cable", f"{root} L I_b {bracket}/U", share, "fraction", ohm.row.cited, given, case)
