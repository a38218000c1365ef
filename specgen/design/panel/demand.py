"""Currents of the supply's conductors, and the incoming protection that carries them."""

from collections.abc import Sequence

from specgen.catalogue.load import Catalogue
from specgen.core.figure import Figure
from specgen.design.panel.lines import NEUTRAL, Lines
from specgen.design.panel.types import Demand, Incoming, Placed
from specgen.model.panel import Panel
from specgen.sizing.connection import mains_voltages
from specgen.sizing.protection import next_rating

PHASORS = "Kirchhoff's law, unit power factor"
NOTHING = 1e-9  # what is left of currents that cancel


def demand_of(placed: Sequence[Placed], lines: Lines, coincidence: float) -> Demand:
    r"""Add up what the loads draw from each conductor.

    Parameters
    ----------
    placed : sequence of Placed
        Every load on its conductors.
    lines : Lines
        The supply's conductors.
    coincidence : float
        Share of the loads' demand taken at once.

    Returns
    -------
    Demand
        Of every conductor.

    Notes
    -----
    :math:`I_k = c |\sum_i \underline I_{i,k}|`, each load in phase with its own voltage. Loads of another phase angle
    lie lower together; against resistive loads between two lines they can lie up to 30 degrees nearer than this takes
    them, so that ``upper`` adds their sizes as they are. The neutral is worst while the loads of one line alone are on:
    two others at 120 degrees never add to it.
    """
    sums = dict.fromkeys(lines.potentials, 0j)
    straight = dict.fromkeys(lines.lines, 0j)
    others = dict.fromkeys(lines.lines, 0.0)
    on_neutral = dict.fromkeys(lines.lines, 0.0)
    for load in placed:
        for conductor, current in lines.drawn(load.place, load.current).items():
            sums[conductor] += current
            if conductor == NEUTRAL:
                on_neutral[load.place[0]] += load.current
            elif load.resistive:
                straight[conductor] += current
            else:
                others[conductor] += load.current
    most = max((abs(current) for current in sums.values()), default=0.0)
    currents = {conductor: coincidence * (abs(current) if abs(current) > NOTHING * most else 0.0) for conductor, current in sums.items()}
    upper = {line: coincidence * (abs(straight[line]) + others[line]) for line in lines.lines}
    own = [currents[line] for line in lines.lines]
    imbalance = (max(own) - min(own)) / max(own) if len(own) > 1 and max(own) > 0 else None
    figures = [
        Figure(f"I_{name}", f"current of {name} with the declared coincidence", "c |Σ I|", current, "current", PHASORS,
               {"c": (coincidence, "fraction"), "|Σ I|": (abs(sums[name]), "current")})
        for name, current in currents.items()
    ]  # fmt: skip
    return Demand(currents, imbalance, upper, max(on_neutral.values(), default=0.0), tuple(figures))


def incoming_of(demand: Demand, placed: Sequence[Placed], largest: float, panel: Panel, catalogue: Catalogue) -> Incoming:
    """Choose the incoming protection, or take the declared one.

    Parameters
    ----------
    demand, placed
        The conductors' currents, and what they come from.
    largest : float
        The largest protection behind it [A]: it is never smaller than that.
    panel, catalogue
        Code basis, coincidence and control supply; preferred ratings.

    Returns
    -------
    Incoming
        It carries the largest line current, or the largest load alone where the coincidence makes less of it, and the
        control supply beside it.

    References
    ----------
    Common practice, no source; the continuous factor of the code basis.
    """
    factor = catalogue.wiring.figure(f"continuous/{panel.code_basis}")
    k = float(factor.value.quantity)
    line = max(demand.upper.values(), default=0.0)
    alone = max((load.current for load in placed), default=0.0)
    offered = mains_voltages(panel.supply)
    mains = offered.get("line_to_neutral") or offered["line_to_line"]
    control = panel.control_supply
    share = catalogue.wiring.figure("supply_efficiency")
    own = float(control.voltage) * float(control.capacity) / (float(share.value.quantity) * mains)
    given = {"U_c": (float(control.voltage), "voltage"), "I_c": (float(control.capacity), "current"),
             "e": (float(share.value.quantity), "fraction"), "U": (mains, "voltage")}  # fmt: skip
    supply = Figure("I_cs", "current of the control supply at its capacity", "U_c I_c/(e U)", own, "current", share.row.cited, given)
    carries = k * max(line, alone) + own
    words = {"k": (k, "fraction"), "I_up": (line, "current"), "I_1": (alone, "current"), "I_cs": (own, "current")}
    needed = Figure("I_in", "current that the incoming protection has to carry", "k max(I_up, I_1) + I_cs", carries, "current",
                    factor.row.cited, words, "the line with the most; currents of unknown phase angle added as they are")  # fmt: skip
    if panel.supply.incomer is not None:
        return Incoming(float(panel.supply.incomer), carries, (supply, needed), (), declared=True)
    found = next_rating(max(carries, largest), panel.code_basis, catalogue)
    if not isinstance(found, tuple):
        return Incoming(found, carries, (supply, needed))
    rating, row = found
    words = {"I_in": (carries, "current"), "I_n,max": (largest, "current")}
    chosen = Figure("I_n", "rated current of the incoming protection", "least of the series >= max(I_in, I_n,max)", rating, "current",
                    row.cited, words)  # fmt: skip
    return Incoming(rating, carries, (supply, needed, chosen), (row, factor.row))


