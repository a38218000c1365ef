"""From decided loops to the panel."""

from collections.abc import Iterator, Sequence

from specgen.catalogue.load import Catalogue
from specgen.core.say import amperes
from specgen.design.decide import verdict_of
from specgen.design.missing import how_to_get
from specgen.design.panel.confirmed import unknown_confirmations
from specgen.design.panel.demand import demand_of, incoming_of
from specgen.design.panel.heat import heat_assumptions, interior
from specgen.design.panel.limiter_switch import limiter_switches
from specgen.design.panel.lines import NEUTRAL, lines_of
from specgen.design.panel.parts import part_rows
from specgen.design.panel.placing import place_loads
from specgen.design.panel.schedules import conductor_rows, protection_rows
from specgen.design.panel.supply24 import control_supply_load, supply_assumptions
from specgen.design.panel.types import Demand, PanelDesign, Placed, Remark
from specgen.design.types import DecidedLoop, Missing
from specgen.model.panel import Panel
from specgen.rules.base import Finding
from specgen.rules.engine import examine_panel
from specgen.rules.panel_case import FedLoop, OutputCount, PanelCase
from specgen.sizing.candidate import Assumption
from specgen.sizing.device import DeviceChoice

FAULT = "supply.prospective_fault_current"
SORTS = ("relay", "logic", "analogue")


def panel_of(loops: Sequence[DecidedLoop], panel: Panel, catalogue: Catalogue) -> PanelDesign:
    """Work out the panel from its loops, which stay as they are.

    Parameters
    ----------
    loops : sequence of DecidedLoop
        In any order: the result does not depend on it.
    panel : Panel
        What panel.yml declares.
    catalogue : Catalogue
        Preferred ratings and single figures.

    Returns
    -------
    PanelDesign
        Its verdict is that of its own rules; a panel is as its worst loop where that is worse.
    """
    loops = sorted(loops, key=lambda loop: loop.tag)
    lines = lines_of(panel.supply)
    placed, moved, unfit = place_loads(loops, lines)
    demand = demand_of(placed, lines, float(panel.panel.coincidence))
    by_tag = {load.tag: load for load in placed}
    protection = protection_rows(loops, by_tag)
    largest = max((row.rating for row in protection if row.loop in by_tag), default=0.0)
    incoming = incoming_of(demand, placed, largest, panel, catalogue)
    outputs = output_counts(loops, panel)
    switches = limiter_switches(loops, panel, catalogue)
    control = control_supply_load(loops, switches, panel)
    heat = interior(loops, switches, control, panel, catalogue)
    case = PanelCase(
        panel=panel,
        fed=tuple(FedLoop(loop.tag, loop.traits, loop.decision.chosen.case.feeder) for loop in loops),
        lines={line: demand.currents[line] for line in lines.lines},
        imbalance=demand.imbalance,
        carries=incoming.carries,
        incomer=incoming.rating,
        declared=incoming.declared,
        outputs=outputs,
        wiring=catalogue.wiring,
        interior=heat,
        control=control,
    )
    findings = examine_panel(case)
    return PanelDesign(
        demand=demand,
        incoming=incoming,
        findings=findings,
        verdict=verdict_of(findings),
        placed=placed,
        moved=moved,
        outputs=outputs,
        protection=protection,
        conductors=conductor_rows(loops, by_tag),
        parts=part_rows(loops, switches, incoming, panel, catalogue),
        open_points=(*unfit, *_open_points(findings, panel), *_unconfirmed(panel, catalogue)),
        assumptions=(*_assumptions(panel, catalogue), *supply_assumptions(loops), *heat_assumptions(loops, panel)),
        remarks=tuple(_remarks(demand, placed)),
        basis=(*demand.figures, *incoming.figures, *control.figures, *heat.figures),
        interior=heat,
        control=control,
    )


def output_counts(loops: Sequence[DecidedLoop], panel: Panel) -> tuple[OutputCount, ...]:
    """Count the controllers' outputs that the loops take, kind by kind, against those declared; a pair of relays takes two."""
    used = dict.fromkeys(SORTS, 0)
    for loop in loops:
        device = loop.decision.chosen.case.device
        if isinstance(device, DeviceChoice):
            if device.controller_output == "relay_pair":
                used["relay"] += 2
            else:
                used[device.controller_output] += 1
    there = dict.fromkeys(SORTS, 0)
    for controller in panel.controllers:
        for output in controller.outputs:
            there[output.kind] += output.count
    return tuple(OutputCount(sort, used[sort], there[sort]) for sort in SORTS)


def _open_points(findings: Sequence[Finding], panel: Panel) -> Iterator[Missing]:
    settles: dict[str, list[str]] = {}
    if panel.supply.prospective_fault_current is None:
        settles[FAULT] = ["O5"]
    for finding in findings:
        # what a loop lacks stands on the loop's own list
        for field in finding.needs if finding.outcome == "unanswered" else ():
            if ": " not in field:
                settles.setdefault(field, []).append(finding.rule)
    for field, rules in sorted(settles.items()):
        yield Missing(field, tuple(dict.fromkeys(rules)), how_to_get(field))


def _unconfirmed(panel: Panel, catalogue: Catalogue) -> Iterator[Missing]:
    for row in unknown_confirmations(panel, catalogue.rows):
        yield Missing("confirmed", (), f"'{row}' is no row of any table and no group of rows: it confirms nothing")


def _assumptions(panel: Panel, catalogue: Catalogue) -> tuple[Assumption, ...]:
    found = []
    if "coincidence" not in panel.panel.model_fields_set:
        found.append(Assumption("panel.coincidence", panel.panel.coincidence.text, "not written: every loop at full output at once"))
    share = catalogue.wiring.figure("supply_efficiency")
    found.append(Assumption("control supply", share.value.value, f"{share.value.what}; it draws from the incomer beside the loops"))
    if panel.supply.incomer is None:
        found.append(Assumption("supply.incomer", "chosen", "not written: the least of the series that carries the demand"))
    return tuple(found)


def _remarks(demand: Demand, placed: Sequence[Placed]) -> Iterator[Remark]:
    free = [load.tag for load in placed if not load.written and len(load.place) == 2]  # noqa: PLR2004  two conductors
    if free:
        text = "Placed to balance, so that another loop may move them until phases_on is written: {which}."
        yield Remark(text, {"which": ", ".join(free)})
    line = max(demand.upper, key=lambda name: demand.upper[name], default="")
    if line and demand.upper[line] > demand.currents[line] * (1 + 1e-9):
        text = "Phase angles are not declared: {line} carries at most {upper}, with every current that is no resistance's added as it is."
        yield Remark(text, {"line": line, "upper": amperes(demand.upper[line])})
    if demand.neutral > 0:
        text = "The neutral carries {all} with every loop on, and up to {some} while only the loops of one line are."
        yield Remark(text, {"all": amperes(demand.currents.get(NEUTRAL, 0.0)), "some": amperes(demand.neutral)})
    distorted = [load.tag for load in placed if load.distorted and NEUTRAL in load.place]
    if distorted:
        text = "Currents far from a sine add up in the neutral instead of cancelling (third harmonic): {which}."
        yield Remark(text, {"which": ", ".join(distorted)})
