"""Schedule of parts: one row a designation."""

from collections.abc import Iterator, Sequence

from specgen.catalogue.load import Catalogue
from specgen.core.say import digits
from specgen.design.designation import designation
from specgen.design.panel.fitted import FUSE, interposing_product, suppressors_fitted
from specgen.design.panel.limiter_switch import Switches
from specgen.design.panel.schedules import circuits, load_letter, numbered
from specgen.design.panel.types import Incoming, PartRow
from specgen.design.types import DecidedLoop
from specgen.model.panel import Panel
from specgen.sizing.candidate import Unsized
from specgen.sizing.device import DeviceChoice
from specgen.sizing.feeder import Branch, Feeder

DEVICE_LETTER = {"contactor": "Q1", "ssr": "Q1", "power_controller": "Q1", "relay": "K1", "relay_pair": "K1"}
_KINDS = {
    "circuit_breaker": "circuit breaker", "fuse": "fuse", "motor_starter": "motor protective breaker",
    "semiconductor_fuse": "semiconductor fuse",
}  # fmt: skip


def part_rows(
    loops: Sequence[DecidedLoop], switches: Switches, incoming: Incoming, panel: Panel, catalogue: Catalogue
) -> tuple[PartRow, ...]:
    """Return every part of the loops, by tag, and what they share; ``switches`` are those of the safety chains."""
    found: list[PartRow] = []
    for loop in sorted(loops, key=lambda loop: loop.tag):
        own = [*_circuits(loop), *_devices(loop, catalogue), *_safety(loop, switches), *_suppressors(loop, switches), *_field(loop)]
        found += [PartRow(designation(loop.tag, product), what, rating, quantity, (loop.tag,)) for product, what, rating, quantity in own]
    return (*found, *_shared(loops, incoming, panel))


Part = tuple[str, str, float | None, int]


def _circuits(loop: DecidedLoop) -> Iterator[Part]:
    feeder = loop.decision.chosen.case.feeder
    poles = feeder.load.connection.lines if isinstance(feeder, Feeder) else 0
    for _, number, branch in circuits([loop]):
        curve = f" {branch.protection.curve}" if branch.protection.curve else ""
        yield numbered("F", number), f"{_KINDS[branch.protection.kind]}{curve}, {poles}-pole", branch.protection.rating, 1
        if branch.cable is not None:
            yield numbered("W", number), _cable(branch, poles), None, 1


def _cable(branch: Branch, poles: int) -> str:
    cable = branch.cable
    assert cable is not None  # noqa: S101  asked where there is one
    cores = poles if poles > 1 else 2
    size = cable.gauge or f"{cable.size * 1e6:g} mm²"
    earth = f"{cable.earth * 1e6:g} mm²" if cable.gauge is None else cable.gauge
    return f"cable, {cores} conductors of {size} and earth of {earth}, {cable.installed.length:g} m"


def _devices(loop: DecidedLoop, catalogue: Catalogue) -> Iterator[Part]:
    case = loop.decision.chosen.case
    if isinstance(case.device, Unsized) or case.candidate.device not in DEVICE_LETTER:
        return
    device = case.device
    letter = DEVICE_LETTER[case.candidate.device]
    listed = catalogue.device(device.name.removeprefix("two of ")) is not None
    sink = f", heat sink of at most {digits(device.heat_sink)} K/W" if device.heat_sink else ""
    # an output of the controller is used here and bought with the controller
    what = f"{device.name}{sink}" if listed else f"{device.name}, part of it"
    for product in ("K1", "K2") if case.candidate.device == "relay_pair" else (letter,):
        yield product, what.removeprefix("two of "), device.rating, 1
    if device.isolator:
        yield "Q3", f"{device.isolator}, opens every line", None, 1
    between = [contact for contact in device.chain if contact.role == "interposing"]
    for number, contact in enumerate(between):
        yield interposing_product(case.candidate.device, number), f"{contact.name}, interposing", None, 1


def _suppressors(loop: DecidedLoop, switches: Switches) -> Iterator[Part]:
    for fitted in suppressors_fitted(loop, switches.get(loop.tag)):
        whose = ", of the safety chain" if fitted.across == "Q2" else ""
        yield fitted.product, f"{fitted.part.part}, across {fitted.part.across}{whose}", None, 1


def _safety(loop: DecidedLoop, switches: Switches) -> Iterator[Part]:
    switch = switches.get(loop.tag)
    for part in loop.safety.parts if loop.safety is not None else ():
        if part.product == "Q2" and switch is not None:
            yield part.product, f"{switch.name}, {part.what}", switch.rating, part.quantity
        else:
            yield part.product, part.what, part.rating, part.quantity


def _field(loop: DecidedLoop) -> Iterator[Part]:
    element, letter = loop.loop.element, load_letter(loop)
    what = element.kind.replace("_", " ")
    feeder = loop.decision.chosen.case.feeder
    if isinstance(feeder, Feeder):
        share = feeder.load.rated / feeder.load.current
        for number, branch in enumerate(feeder.branches):
            yield numbered(letter, number), what, branch.current * share, branch.units
    else:
        yield f"{letter}1", what, None, element.count
    yield "B1", f"sensor, {loop.loop.sensor.kind.replace('_', ' ')}", None, 1
    yield FUSE, "protection of the loop's control circuits, rated by the data of the control supply", None, 1
    yield "X1", "terminals", None, 1


def _shared(loops: Sequence[DecidedLoop], incoming: Incoming, panel: Panel) -> Iterator[PartRow]:
    own = panel.panel.reference
    tags = tuple(sorted(loop.tag for loop in loops))
    fed = tuple(sorted(loop.tag for loop in loops if isinstance(loop.decision.chosen.case.feeder, Feeder)))
    rating = None if isinstance(incoming.rating, Unsized) else incoming.rating
    if panel.supply.isolator:
        yield PartRow(designation(own, "Q1"), "lockable isolator of the supply", rating, 1, fed)
    yield PartRow(designation(own, "F1"), "incoming protection", rating, 1, fed)
    control = panel.control_supply
    said = f"control supply, {float(control.voltage):g} V {'d.c.' if control.kind == 'dc' else 'a.c.'}"
    yield PartRow(designation(own, "T1"), said, float(control.capacity), 1, tags)
    for number, controller in enumerate(panel.controllers):
        yield PartRow(designation(own, f"K{number + 1}"), controller.name, None, 1, _controlled(loops))


def _controlled(loops: Sequence[DecidedLoop]) -> tuple[str, ...]:
    """Return the loops that take an output; which controller's is left to whoever wires them."""
    return tuple(sorted(loop.tag for loop in loops if isinstance(loop.decision.chosen.case.device, DeviceChoice)))
