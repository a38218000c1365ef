"""Heat of a solid-state device: what its poles lose, and whether a heat sink keeps the junction cool enough."""

from dataclasses import dataclass
from math import pi, sqrt
from typing import Literal

from specgen.catalogue.load import Catalogue
from specgen.core.figure import Figure
from specgen.model.devices import SolidState
from specgen.model.panel import Panel
from specgen.sizing.heat_sink import sink_resistance

SINE = "sine current through a threshold voltage and a slope resistance"
SERIES = "thermal resistances in series; the interior limit is the air at the heat sink"
SINK = "(T_j - T_i)/P_v - R_jc - R_cs"
Cooling = Literal["natural", "forced", "none"]


def pole_loss(current: float, on_drop: float, slope_resistance: float) -> float:
    r"""Loss of one pole that conducts a sine current.

    Parameters
    ----------
    current : float
        Current [A].
    on_drop : float
        Threshold voltage [V].
    slope_resistance : float
        Slope resistance [ohm].

    Returns
    -------
    float
        Loss while the pole conducts [W].

    Notes
    -----
    :math:`P = V_0 I_{av} + r I^2` with the mean of the rectified sine, :math:`I_{av} = 2\sqrt2/\pi \, I`.

    References
    ----------
    Derived from the straight-line characteristic of a thyristor; about 1 W an ampere (seen in a secondary text).

    Examples
    --------
    >>> round(pole_loss(25, 1.0, 0.014), 2)
    31.26
    """
    return on_drop * 2 * sqrt(2) / pi * current + slope_resistance * current**2


@dataclass(frozen=True, slots=True)
class Cooled:
    """Loss of all switched poles [W], the heat sink they need [K/W], and how that is cooled.

    ``resistance`` is None where no heat sink keeps the junction below its limit; ``margin`` is it over what a fan reaches.
    """

    loss: float
    resistance: float | None
    cooling: Cooling
    margin: float | None
    figures: tuple[Figure, ...]


def cooled(device: SolidState, current: float, poles: int, panel: Panel, catalogue: Catalogue) -> Cooled:
    """Compute loss and heat sink of a device at the interior limit.

    Parameters
    ----------
    device : SolidState
        The device; its thermal resistances are those of the whole device with all switched poles loaded alike.
    current : float
        Current of the load at the supply's worse end [A].
    poles : int
        Poles that carry it.
    panel : Panel
        Its interior limit.
    catalogue : Catalogue
        What heat sinks reach with and without a fan.

    Returns
    -------
    Cooled
        The duty counts as full: a heat sink's time constant is not known before it is bought.
    """
    pole = pole_loss(current, float(device.on_drop), float(device.slope_resistance))
    total = poles * pole
    interior = float(panel.enclosure.interior_limit)
    junction, to_case, to_sink = float(device.highest_junction), float(device.junction_to_case), float(device.case_to_sink)
    found = sink_resistance(total, junction, interior, to_case, to_sink)
    given_pole = {"V_0": (float(device.on_drop), "voltage"), "r": (float(device.slope_resistance), "resistance"), "I": (current, "current")}
    given_all = {"p": (float(poles), "number"), "P_p": (pole, "power")}
    given = {
        "T_j": (junction, "temperature"), "T_i": (interior, "temperature"), "P_v": (total, "power"),
        "R_jc": (to_case, "thermal_resistance"), "R_cs": (to_sink, "thermal_resistance"),
    }  # fmt: skip
    figures = (
        Figure("P_p", "loss of one pole at full output", "V_0 2 sqrt(2)/pi I + r I^2", pole, "power", SINE, given_pole),
        Figure("P_v", "loss in the panel at full output", "p P_p", total, "power", SINE, given_all),
        Figure("R_s", "highest thermal resistance of the heat sink", SINK, found, "thermal_resistance", SERIES, given),
    )
    natural, forced = (float(catalogue.practice(f"heat_sink_{how}").value.quantity) for how in ("natural", "forced"))
    cooling: Cooling = "natural" if found >= natural else "forced" if found >= forced else "none"
    return Cooled(total, found if found > 0 else None, cooling, found / forced if found > 0 else None, figures)
