"""Life of contacts: operations at a current, and the years they last."""

from collections.abc import Sequence
from itertools import pairwise
from math import exp, inf, log

from specgen.core.figure import Figure
from specgen.model.devices import LifePoint
from specgen.sizing.candidate import Unsized

SOURCE = "log-log between the points of the device's data, never above the highest; common practice, no source"


def life_at(current: float, points: Sequence[LifePoint], mechanical_life: float) -> float | Unsized:
    r"""Electrical life of a contact at a current.

    Parameters
    ----------
    current : float
        Current that is made and broken [A].
    points : sequence of LifePoint
        Operations at currents, as the device's data give them, in any order [1, A].
    mechanical_life : float
        Operations without load, which the life never exceeds [1].

    Returns
    -------
    float or Unsized
        Operations [1]; Unsized above the highest point, or where no point is given.

    Raises
    ------
    ValueError
        A negative current.

    Notes
    -----
    Between two points :math:`\ln N` is linear in :math:`\ln I`. Below the lowest point its own value holds: what a
    light load gains is not known. Above the highest nothing is known.

    References
    ----------
    Common practice, no source: data sheets draw the life over the current as straight lines on log-log paper.

    Examples
    --------
    >>> points = (LifePoint(current="25 A", operations="1.0e6"), LifePoint(current="6.25 A", operations="4.0e6"))
    >>> round(life_at(12.5, points, 10e6)), life_at(1.0, points, 10e6), life_at(1.0, points, 3e6)
    (2000000, 4000000.0, 3000000.0)
    """
    if current < 0:
        raise ValueError(f"a current of {current} A")
    if not points:
        return Unsized("no point of electrical life is given")
    ordered = sorted(points, key=lambda point: point.current)
    lowest, highest = ordered[0], ordered[-1]
    if current > highest.current:
        return Unsized(f"{current:.3g} A is above {float(highest.current):.3g} A, the highest current that a life is given for")
    if current <= lowest.current:
        return min(float(lowest.operations), float(mechanical_life))
    low, high = next((a, b) for a, b in pairwise(ordered) if a.current < current <= b.current)
    share = log(current / low.current) / log(high.current / low.current)
    life = exp(log(low.operations) + share * (log(high.operations) - log(low.operations)))
    # exp and log round: never outside the two points
    return min(max(life, float(high.operations)), float(low.operations), float(mechanical_life))


def life_figure(name: str, current: float, points: Sequence[LifePoint], mechanical_life: float) -> Figure | Unsized:
    """Electrical life as a figure of the Basis.

    Parameters
    ----------
    name : str
        The contact, for the figure's name.
    current, points, mechanical_life
        As in `life_at`.

    Returns
    -------
    Figure or Unsized
        ``value`` in operations, with the points that were used.
    """
    life = life_at(current, points, mechanical_life)
    if isinstance(life, Unsized):
        return Unsized(f"{name}: {life.because}", life.needs)
    ordered = sorted(points, key=lambda point: point.current)
    below = [p for p in ordered if p.current <= current] or ordered[:1]
    above = [p for p in ordered if p.current >= current]
    first, second = below[-1], above[0] if above else below[-1]
    used = {"I": (float(current), "current"), "I_1": (float(first.current), "current"), "N_1": (float(first.operations), "operations")}
    if second.current > first.current:
        used |= {"I_2": (float(second.current), "current"), "N_2": (float(second.operations), "operations")}
        formula = "min(N_mech, N_1 (I/I_1)^(ln(N_2/N_1)/ln(I_2/I_1)))"
    else:
        formula = "min(N_mech, N_1)"
    used["N_mech"] = (float(mechanical_life), "operations")
    return Figure("N", f"electrical life of {name}", formula, life, "operations", SOURCE, used)


def years_of_life(life: float | None, operations_per_year: float) -> float:
    """Years that a contact lasts.

    Parameters
    ----------
    life : float or None
        Operations it lasts [1]; None where nothing wears.
    operations_per_year : float
        Operations a year, one make and one break each [1/year].

    Returns
    -------
    float
        Years; infinite where nothing wears or nothing operates.

    Raises
    ------
    ValueError
        A negative number of operations.

    References
    ----------
    ISO 13849-1:2015, C.4.2: ``T10D = B10D/n_op`` has the same form.

    Examples
    --------
    >>> years_of_life(1.0e6, 250_000), years_of_life(None, 250_000)
    (4.0, inf)
    """
    if operations_per_year < 0:
        raise ValueError(f"{operations_per_year} operations a year")
    if life is None or operations_per_year == 0:
        return inf
    return life / operations_per_year
