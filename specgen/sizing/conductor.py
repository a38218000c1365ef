"""Conductors: the smallest whose corrected capacity covers the protection and whose voltage drop is allowed."""

from dataclasses import dataclass

from specgen.catalogue.load import Catalogue
from specgen.catalogue.table import Known, Row
from specgen.catalogue.wiring import AmbientFactor, ConductorRow, GroupingFactor, Method
from specgen.core.figure import Figure
from specgen.sizing.candidate import Unsized
from specgen.sizing.connection import Connection
from specgen.sizing.protection import CLOSE
from specgen.sizing.voltage_drop import drop_figure

EARTH_EQUAL, EARTH_HALF = 16e-6, 35e-6  # m2: up to the first the earth is as large, up to the second 16 mm2, then half


@dataclass(frozen=True, slots=True)
class Installed:
    """How a conductor is laid: method, temperature around it [degC], loaded circuits side by side, one-way length [m] of a cable."""

    method: Method
    ambient: float
    circuits: int
    length: float | None = None


@dataclass(frozen=True, slots=True)
class Conductor:
    """One line conductor of a circuit.

    ``size`` and ``earth`` [m2] of the line and the protective conductor, ``gauge`` where it is sold by one; ``capacity``
    [A] is corrected for ambient and grouping; ``drop`` is a share of the voltage, absent without a length.
    """

    size: float
    earth: float
    gauge: str | None
    installed: Installed
    capacity: float
    drop: float | None
    figures: tuple[Figure, ...] = ()
    rows: tuple[Row, ...] = ()


@dataclass(frozen=True, slots=True)
class Duty:
    """What a conductor has to do: carry ``carry`` [A] (its protection) while ``current`` [A] flows through it."""

    current: float
    carry: float
    protection: float
    fed: Connection
    resistive: bool
    most_drop: float


def conductor_for(duty: Duty, installed: Installed, part: str, catalogue: Catalogue) -> Conductor | Unsized:
    r"""Choose a conductor.

    Parameters
    ----------
    duty : Duty
        What it carries.
    installed : Installed
        How it is laid.
    part : str
        What it is called in the figures.
    catalogue : Catalogue
        Its tables.

    Returns
    -------
    Conductor or Unsized
        Unsized, without needs, where no size listed does.

    Notes
    -----
    :math:`I_z = k_t k_g I_0 \ge I_n` and drop at most the limit. Three loaded conductors are taken for a single-phase
    circuit too, which is on the safe side; the factor of grouping counts circuits.

    References
    ----------
    IEC 60364-4-43 clause 433.1; IEC 60204-1 table 6 and annex D; NFPA 70 tables 310.16 and 310.15.
    """
    factors = corrections(installed, catalogue)
    if isinstance(factors, Unsized):
        return factors
    warm, group = factors
    least = catalogue.wiring.figure("least_control" if duty.fed.way == "control" else "least_power")
    ruled_out = ""
    for listed in catalogue.wiring.sizes(installed.method):
        row = listed.value
        if row.size < least.value.quantity * (1 - CLOSE) or (row.most is not None and duty.protection > row.most):
            continue
        capacity = float(row.capacity) * float(warm.value.factor) * (float(group.value.factor) if group else 1.0)
        if capacity < duty.carry * (1 - CLOSE):
            continue
        drop = None
        if installed.length is not None:
            drop = drop_figure(duty.current, duty.fed, installed.length, float(row.size), catalogue, resistive=duty.resistive)
            if drop.value > duty.most_drop * (1 + CLOSE):
                ruled_out = f"; over {installed.length:g} m the drop stays above {duty.most_drop * 100:g} percent"
                continue
        return _made(listed, capacity, drop, installed, part, warm, group, catalogue)
    return Unsized(f"no conductor listed carries {duty.carry:.3g} A by method {installed.method} at {installed.ambient:g} °C{ruled_out}")


def corrections(installed: Installed, catalogue: Catalogue) -> tuple[Known[AmbientFactor], Known[GroupingFactor] | None] | Unsized:
    """Return the rows that correct for ambient and grouping; between two rows the worse one. No grouping row for a single circuit."""
    basis = "north_america" if installed.method == "awg" else "iec"
    warm = next((f for f in catalogue.wiring.ambient if f.value.basis == basis and f.value.up_to >= installed.ambient), None)
    if warm is None:
        return Unsized(f"no conductor of these is rated at {installed.ambient:g} °C")
    if installed.circuits <= 1:
        return warm, None
    own = (f for f in catalogue.wiring.grouping if f.value.method == installed.method)
    group = next((f for f in own if f.value.circuits >= installed.circuits), None)
    if group is None:
        return Unsized(f"no factor is listed for {installed.circuits} circuits side by side")
    return warm, group


def _made(
    listed: Known[ConductorRow], capacity: float, drop: Figure | None, installed: Installed, part: str, warm: Known[AmbientFactor],
    group: Known[GroupingFactor] | None, catalogue: Catalogue,
) -> Conductor:  # fmt: skip
    row = listed.value
    given = {"I_0": (float(row.capacity), "current"), "k_t": (float(warm.value.factor), "number")}
    formula, rows = "k_t I_0", [listed.row, warm.row]
    if group is not None:
        given["k_g"] = (float(group.value.factor), "number")
        formula, rows = "k_t k_g I_0", [*rows, group.row]
    size = row.gauge or f"{float(row.size) * 1e6:g} mm²"
    how = "in a raceway" if installed.method == "awg" else f"method {installed.method}"
    case = f"{size}, {how}, {installed.ambient:g} °C, {installed.circuits} circuit{'s' * (installed.circuits > 1)}"
    figures = [Figure("I_z", f"capacity of the {part}", formula, capacity, "current", listed.row.cited, given, case)]
    if drop is not None:
        figures.append(drop)
        rows += [catalogue.wiring.figure(name).row for name in ("resistance", "reactance")]
    area = float(row.size)
    earth = earth_for(area, gauged=row.gauge is not None)
    return Conductor(area, earth, row.gauge, installed, capacity, None if drop is None else drop.value, tuple(figures), tuple(rows))


def earth_for(area: float, *, gauged: bool) -> float:
    """Return the protective conductor's size [m2] for a line conductor's; sizes sold by gauge keep the line's.

    References
    ----------
    IEC 60204-1:2016 table 1 (from memory).

    Examples
    --------
    >>> [round(earth_for(area * 1e-6, gauged=False) * 1e6, 1) for area in (2.5, 16, 25, 35, 70)]
    [2.5, 16.0, 16.0, 16.0, 35.0]
    """
    if gauged or area <= EARTH_EQUAL * (1 + CLOSE):
        return area
    return EARTH_EQUAL if area <= EARTH_HALF * (1 + CLOSE) else area / 2
