"""What feeds a loop's element: protection, wiring inside, cable to the field, and whether the device survives a fault."""

from collections.abc import Sequence
from dataclasses import dataclass, field, replace
from math import ceil, floor

from specgen.catalogue.load import Catalogue
from specgen.catalogue.table import Row
from specgen.core.figure import Figure
from specgen.model.devices import Contactor, PowerController, Relay, SolidState
from specgen.model.loop import Loop
from specgen.model.panel import Panel
from specgen.model.traits import Traits
from specgen.sizing.candidate import Assumption, Device, Unsized
from specgen.sizing.conductor import Conductor, Duty, Installed, conductor_for
from specgen.sizing.controller import controller_side
from specgen.sizing.current import LoadCurrent, load_current
from specgen.sizing.device import DeviceChoice
from specgen.sizing.protection import CLOSE, Protection, protection_for

SOLID_STATE = ("ssr", "power_controller")
CABLE_LENGTH = "cable.length"


@dataclass(frozen=True, slots=True)
class NotFed(Unsized):
    """Nothing is fed from this panel: the element takes a signal alone, or its circuit is its own."""


@dataclass(frozen=True, slots=True)
class Branch:
    """One protected circuit: ``units`` of the element, their line current [A], and the conductors; no cable where none is declared."""

    units: int
    current: float
    protection: Protection
    internal: Conductor
    cable: Conductor | None = None


@dataclass(frozen=True, slots=True)
class Survival:
    """What the device stands and what its protection lets it see: let-through [A2 s] of a semiconductor, rating [A] of a contact.

    ``withstands`` is None where the device's data do not say.
    """

    dimension: str
    withstands: float | None
    sees: float
    fault_current: float | None

    @property
    def survives(self) -> bool | None:
        """Tell whether it survives; None where that is not known. A semiconductor has to stay below, a contact at its own."""
        if self.withstands is None:
            return None
        if self.dimension == "i2t":
            return self.sees < self.withstands
        return self.sees <= self.withstands * (1 + CLOSE)


@dataclass(frozen=True, slots=True)
class Feeder:
    """What feeds the element of a loop: equal branches, each with its own protection."""

    load: LoadCurrent
    branches: tuple[Branch, ...]
    survival: Survival | None = None
    figures: tuple[Figure, ...] = ()
    assumptions: tuple[Assumption, ...] = ()
    open_points: tuple[Unsized, ...] = ()
    rows: tuple[Row, ...] = field(default=(), repr=False)


def feeder_of(
    device: Device, choice: DeviceChoice | Unsized, loop: Loop, panel: Panel, traits: Traits, catalogue: Catalogue
) -> Feeder | Unsized:
    """Size what feeds a loop's element.

    Parameters
    ----------
    device, choice
        The kind of device of the candidate, and the one chosen.
    loop, panel, traits, catalogue
        The loop with its element's traits, the panel, and what is looked up; no other loop.

    Returns
    -------
    Feeder or Unsized
        NotFed where nothing is fed from here; with needs where the current is not known; without needs where nothing
        listed is large enough.
    """
    load = load_current(loop.element, panel, catalogue)
    if isinstance(load, Unsized):
        return load if load.needs else NotFed(load.because)
    if load.connection.way == "control" and load.connection.voltage != float(panel.control_supply.voltage):
        return NotFed("the circuit that is switched is the machine's own")
    branches = []
    for units in _split(load, loop.element.count, panel, traits, catalogue):
        made = _branch(load, loop.element.count, units, device, loop, panel, traits, catalogue)
        if isinstance(made, Unsized):
            return made
        branches.append(made)
    return _feeder(tuple(branches), load, device, choice, loop, panel, catalogue)


def surviving(
    device: Device, choices: Sequence[DeviceChoice] | Unsized, loop: Loop, panel: Panel, traits: Traits, catalogue: Catalogue
) -> tuple[DeviceChoice, ...] | Unsized:
    """Leave out the devices that their own protection would not save, unless none would be left; parameters as `feeder_of`.

    A loop is given the next larger device where the smallest one that carries the load would not survive a fault.
    """
    if isinstance(choices, Unsized):
        return choices
    fed = feeder_of(device, choices[0], loop, panel, traits, catalogue)
    if isinstance(fed, Unsized):
        return tuple(choices)
    # what feeds them is the same for all; only what each stands differs
    kept = []
    for choice in choices:
        survival = _survival(device, choice, fed.branches, panel, catalogue)
        if survival is None or survival.survives is not False:
            kept.append(choice)
    if not kept or kept[0] == choices[0]:
        return tuple(kept or choices)
    why = f"{choices[0].name} carries the load and would not survive its own short-circuit protection."
    return tuple(replace(choice, because=why) for choice in kept)


def _split(load: LoadCurrent, count: int, panel: Panel, traits: Traits, catalogue: Catalogue) -> list[int]:
    """Return the units of each circuit: one motor a circuit; where the code asks for it, heaters in groups."""
    if traits.motor:
        return [1] * count
    if panel.code_basis != "north_america" or not traits.resistive_power:
        return [count]
    most = float(catalogue.wiring.figure("subdivide").value.quantity)
    together = min(count, max(1, floor(most * (1 + CLOSE) / (load.current / count))))
    circuits = ceil(count / together)
    # as equal as whole units allow, the larger ones first
    return [count // circuits + (1 if number < count % circuits else 0) for number in range(circuits)]


def _branch(
    load: LoadCurrent, count: int, units: int, device: Device, loop: Loop, panel: Panel, traits: Traits, catalogue: Catalogue
) -> Branch | Unsized:
    parts = count / units
    protection = protection_for(load, parts, traits, panel.code_basis, catalogue, solid_state=device in SOLID_STATE)
    if isinstance(protection, Unsized):
        return protection
    current = load.current / parts
    carry = max(protection.rating, protection.sized_for)
    limit = float(panel.house.voltage_drop)
    duty = Duty(current, carry, protection.rating, load.connection, traits.resistive_power, limit)
    awg = panel.code_basis == "north_america"
    inside = Installed("awg" if awg else "B1", float(panel.enclosure.interior_limit), 1)
    internal = conductor_for(duty, inside, "wiring inside", catalogue)
    if isinstance(internal, Unsized):
        return internal
    if loop.cable is None:
        return Branch(units, current, protection, internal)
    around = loop.cable.ambient.high if loop.cable.ambient is not None else panel.enclosure.ambient.high
    laid = Installed("awg" if awg else loop.cable.method, around, loop.cable.grouped, float(loop.cable.length))
    cable = conductor_for(duty, laid, "cable", catalogue)
    return cable if isinstance(cable, Unsized) else Branch(units, current, protection, internal, cable)


def _feeder(
    branches: tuple[Branch, ...], load: LoadCurrent, device: Device, choice: DeviceChoice | Unsized, loop: Loop, panel: Panel,
    catalogue: Catalogue,
) -> Feeder:  # fmt: skip
    largest = branches[0]
    figures = [*load.figures]
    if len(branches) > 1 or largest.current != load.current:
        given = {"I_b": (load.current, "current"), "n": (float(loop.element.count), "number"), "m": (float(largest.units), "number")}
        figures.append(Figure("I_b1", "line current of the largest circuit", "I_b m/n", largest.current, "current", "equal units", given))
    figures += [*largest.protection.figures, *largest.internal.figures, *(largest.cable.figures if largest.cable else ())]
    assumed = [*load.assumptions, *largest.protection.assumptions, _inside(panel)]
    points = []
    if loop.cable is None:
        points.append(Unsized("no cable is declared: what is sized is the wiring inside alone", (CABLE_LENGTH,)))
    elif loop.cable.ambient is None:
        assumed.append(Assumption("cable.ambient", panel.enclosure.ambient.text, "not written: the panel's own ambient"))
    survival = _survival(device, choice, branches, panel, catalogue)
    if survival is not None and survival.survives is None:
        told = "let-through that the device stands: its data sheet; the maker's fuse decides"
        points.append(Unsized(told, ("devices.power_controllers",)))
    rows = [*largest.protection.rows, *largest.internal.rows, *(largest.cable.rows if largest.cable else ())]
    if largest.cable is not None and "voltage_drop" not in panel.house.model_fields_set:
        rows.append(catalogue.wiring.figure("voltage_drop").row)
    return Feeder(load, branches, survival, tuple(figures), tuple(assumed), tuple(points), tuple({row.id: row for row in rows}.values()))


def _inside(panel: Panel) -> Assumption:
    how = "as in a raceway" if panel.code_basis == "north_america" else "as by method B1"
    why = "ducts that are part filled and circuits that are never all loaded at once; common practice, no source"
    return Assumption("wiring inside", f"{how}, at {panel.enclosure.interior_limit.text}, circuits not derated for each other", why)


def _survival(
    device: Device, choice: DeviceChoice | Unsized, branches: tuple[Branch, ...], panel: Panel, catalogue: Catalogue
) -> Survival | None:
    if isinstance(choice, Unsized) or choice.rating is None:
        return None
    fault = panel.supply.prospective_fault_current
    current = None if fault is None else float(fault)
    protections = [branch.protection for branch in branches]
    if device in SOLID_STATE:
        found = catalogue.device(choice.name)
        given = found.i2t if isinstance(found, SolidState | PowerController) else None
        sees = max(protection.let_through or 0.0 for protection in protections)
        return Survival("i2t", None if given is None else float(given), sees, current)
    # one contact feeds every branch
    stands = _thermal(choice, panel, catalogue)
    return None if stands is None else Survival("current", stands, sum(protection.rating for protection in protections), current)


def _thermal(choice: DeviceChoice, panel: Panel, catalogue: Catalogue) -> float | None:
    """Return what a contact carries without switching [A]: its resistive current; of a controller's relay its own."""
    found = catalogue.device(choice.name)
    if isinstance(found, Contactor | Relay):
        return float(found.resistive_current)
    side = controller_side(panel, catalogue, "relay")
    return None if isinstance(side, Unsized) else side.rating
