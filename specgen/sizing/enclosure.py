"""Interior temperature of the enclosure: losses over the surface that cools, and what is missing where that is not enough."""

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Literal

from specgen.catalogue.enclosure import EnclosureTables
from specgen.core.figure import Figure
from specgen.model.panel import Enclosure

HOUR = 3600.0
Source = Literal["device", "safety", "drive", "wiring", "protection", "controller", "supply", "other"]
BALANCE = "heat balance of the enclosure in still air"


@dataclass(frozen=True, slots=True)
class Loss:
    """One source of heat in the panel [W], at the duty that counts; ``source`` is the sort it belongs to."""

    what: str
    watts: float
    loop: str = ""
    source: Source = "other"


@dataclass(frozen=True, slots=True)
class Interior:
    """The enclosure's heat balance.

    ``loss`` [W] less the declared ``cooling`` [W] over ``surface`` [m2] give ``interior`` [degC] against ``limit`` [degC].
    Where it is above, ``shortfall`` [W] has to be cooled away besides; ``surface_needed`` [m2] would do instead, or ``air``
    [m3/s] from outside; both None where the outside is no cooler than the limit, ``air`` also above the table's altitude.
    """

    loss: float
    surface: float
    interior: float
    limit: float
    losses: tuple[Loss, ...]
    cooling: float = 0.0
    shortfall: float | None = None
    surface_needed: float | None = None
    air: float | None = None
    figures: tuple[Figure, ...] = ()


def effective_surface(enclosure: Enclosure, tables: EnclosureTables) -> Figure:
    r"""Surface of an enclosure that cools it.

    Parameters
    ----------
    enclosure : Enclosure
        Height, width, depth [m] and mounting.
    tables : EnclosureTables
        Weight of each face.

    Returns
    -------
    Figure
        The effective surface [m2].

    Notes
    -----
    :math:`A_e = b_t W D + (b_f + b_b) H W + (b_l + b_r) H D`; the floor does not count.

    References
    ----------
    IEC TR 60890; the formulas by mounting are seen in a secondary text.
    """
    known = tables.faces_of(enclosure.mounting)
    faces = known.value
    high, wide, deep = float(enclosure.height), float(enclosure.width), float(enclosure.depth)
    front, sides = float(faces.front + faces.back), float(faces.left + faces.right)
    surface = float(faces.top) * wide * deep + front * high * wide + sides * high * deep
    given = {
        "H": (high, "length"), "W": (wide, "length"), "D": (deep, "length"), "b_t": (float(faces.top), "number"),
        "b_f + b_b": (front, "number"), "b_l + b_r": (sides, "number"),
    }  # fmt: skip
    formula = "b_t W D + (b_f + b_b) H W + (b_l + b_r) H D"
    return Figure("A_e", f"effective surface, {enclosure.mounting.replace('_', ' ')}", formula, surface, "area", known.row.cited, given)


def interior_of(enclosure: Enclosure, losses: Sequence[Loss], tables: EnclosureTables) -> Interior:
    r"""Interior temperature at the declared ambient's top, and what is missing where it is too high.

    Parameters
    ----------
    enclosure : Enclosure
        Size, mounting, surface, ambient, altitude and interior limit.
    losses : sequence of Loss
        Everything that warms it at once.
    tables : EnclosureTables
        Faces, walls, air.

    Returns
    -------
    Interior
        With shortfall, surface and air only where the limit is passed.

    Notes
    -----
    :math:`\Delta T = (P - P_c)/(k A_e)` with the cooling that is declared; a thermostat holds back what it has to spare.
    What passes the limit is :math:`P_s = P - P_c - k A_e \Delta T_a` with the rise that is allowed, :math:`\Delta T_a`; a
    surface of :math:`(P - P_c)/(k \Delta T_a)` would do instead, or :math:`\dot V = f P_s/\Delta T_a` of air from outside
    (m3/h; f = 3.1 at sea level).

    References
    ----------
    Common practice; k and f as the tables' rows say.

    Examples
    --------
    >>> from specgen.catalogue.enclosure import enclosure_tables
    >>> case = Enclosure(height="2 m", width="0.8 m", depth="0.6 m", ambient="5 degC to 30 degC", interior_limit="45 degC")
    >>> found = interior_of(case, [Loss("everything", 300.0)], enclosure_tables())
    >>> round(found.surface, 3), round(found.interior, 2), found.shortfall
    (5.712, 39.55, None)
    """
    total = sum(loss.watts for loss in losses)
    area = effective_surface(enclosure, tables)
    wall = tables.wall_of(enclosure.surface)
    k, outside, limit = float(wall.value.k), float(enclosure.ambient.high), float(enclosure.interior_limit)
    cooling = float(enclosure.cooling)
    left = total - cooling
    # what a cooling unit has to spare its thermostat holds back: no cooler than outside, or than the limit where that is lower
    rise = max(left / (k * area.value), min(0.0, limit - outside))
    given = {"P": (total, "power"), "P_c": (cooling, "power"), "k": (k, "u_value"), "A_e": (area.value, "area")}
    top = {"T_a": (outside, "temperature"), "ΔT": (rise, "difference")}
    case = f"ambient {enclosure.ambient.text}, its top"
    figures = [
        Figure("P", "losses in the panel", "Σ P_i", total, "power", "the list of losses", {}),
        area,
        Figure("ΔT", "rise of the interior", "(P - P_c)/(k A_e)", rise, "difference", f"{BALANCE}; k: {wall.row.cited}", given),
        Figure("T_i", "interior temperature", "T_a + ΔT", outside + rise, "temperature", BALANCE, top, case),
    ]
    if outside + rise <= limit * (1 + 1e-12):
        return Interior(total, area.value, outside + rise, limit, tuple(losses), cooling, figures=tuple(figures))
    allowed = limit - outside
    short = left - k * area.value * allowed
    put_in = {**given, "ΔT_a": (allowed, "difference")}
    figures.append(Figure("P_s", "heat that has to be cooled away", "P - P_c - k A_e ΔT_a", short, "power", BALANCE, put_in, case))
    needed = air = None
    if allowed > 0:
        needed = left / (k * allowed)
        figures.append(Figure("A_n", "effective surface that would do", "(P - P_c)/(k ΔT_a)", needed, "area", BALANCE, put_in, case))
        factor = tables.air_at(float(enclosure.altitude))
        if factor is not None:
            flow = float(factor.value.factor) * short / allowed
            air = flow / HOUR
            words = {"f": (float(factor.value.factor), "number"), "P_s": (short, "power"), "ΔT_a": (allowed, "difference")}
            name, source = "air from outside that would do", factor.row.cited
            figures.append(Figure("V", name, "f P_s/ΔT_a, in m³/h", air, "air_flow", source, words, case))
    return Interior(total, area.value, outside + rise, limit, tuple(losses), cooling, short, needed, air, tuple(figures))
