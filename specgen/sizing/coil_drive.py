"""From the controller's relay to a coil, with an interposing relay where that cannot carry it."""

from dataclasses import dataclass

from specgen.catalogue.load import Catalogue
from specgen.core.figure import Figure
from specgen.model.devices import Coil, Relay
from specgen.model.panel import Panel
from specgen.sizing.candidate import Assumption, Unsized
from specgen.sizing.chain import contact, relay_rating, typical
from specgen.sizing.connection import CLOSE, control_connection
from specgen.sizing.controller import OutputSide, controller_side
from specgen.sizing.device import Contact, Drawn, Drive


@dataclass(frozen=True, slots=True)
class CoilCurrent:
    """Holding and inrush current of a coil at the control supply [A], and its power there [W]."""

    hold: float
    inrush: float
    figures: tuple[Figure, ...]
    power: float = 0.0


def coil_current(coil: Coil, name: str, panel: Panel, *, any_voltage: bool) -> CoilCurrent | Unsized:
    """Return what a coil takes at the control supply's high end.

    Parameters
    ----------
    coil : Coil
        The coil; its power is what it takes at its rated voltage.
    name : str
        The device, for the sentence.
    panel : Panel
        Its control supply.
    any_voltage : bool
        Whether the device is a typical one that is made for every usual control voltage at the same coil power.

    Returns
    -------
    CoilCurrent or Unsized
        Unsized where the coil does not fit the control supply.
    """
    control = panel.control_supply
    if coil.kind != control.kind or not (any_voltage or abs(coil.voltage / control.voltage - 1) <= CLOSE):
        there, here = f"{coil.voltage.text} {_said(coil.kind)}", f"{control.voltage.text} {_said(control.kind)}"
        return Unsized(f"the coil of {name} is for {there}, the control supply is {here}", ("control_supply",))
    fed = control_connection(panel.supply, control)
    rated = fed.voltage if any_voltage else float(coil.voltage)
    hold = float(coil.power) / rated * fed.high / rated
    power = float(coil.inrush if coil.inrush is not None else coil.power)
    inrush = power / rated * fed.high / rated
    given = {"P": (float(coil.power), "power"), "U_r": (rated, "voltage"), "U_max": (fed.high, "voltage")}
    formula = "P/U_r U_max/U_r"
    case = "" if fed.high == fed.voltage else f"supply {panel.supply.tolerance.text} high"
    figures = [Figure("I_h", f"holding current of the coil of {name}", formula, hold, "current", "Ohm's law", given, case)]
    if coil.inrush is not None:
        given_inrush = given | {"P": (power, "power")}
        figures.append(Figure("I_in", f"inrush current of the coil of {name}", formula, inrush, "current", "Ohm's law", given_inrush, case))
    return CoilCurrent(hold, inrush, tuple(figures), hold * fed.high)


def _said(kind: str) -> str:
    return "d.c." if kind == "dc" else "a.c."


@dataclass(frozen=True, slots=True)
class CoilDrive:
    """The contacts between the controller and a coil, the first being the controller's own relay.

    ``drawn`` is what the coils take from the control supply, ``power`` [W] what becomes heat in them, ``drives`` what the
    controller's own relay is asked for.
    """

    contacts: tuple[Contact, ...]
    figures: tuple[Figure, ...]
    assumptions: tuple[Assumption, ...]
    drawn: tuple[Drawn, ...] = ()
    power: float = 0.0
    drives: tuple[Drive, ...] = ()

    @property
    def shortest_life(self) -> float:
        """Return the operations of the contact that fails first."""
        return min(contact.life for contact in self.contacts if contact.life is not None)


def coil_drives(coil: CoilCurrent, name: str, panel: Panel, catalogue: Catalogue) -> tuple[CoilDrive, ...] | Unsized:
    """Return the ways to drive a coil from the controller's relay: directly, and through an interposing relay.

    Parameters
    ----------
    coil : CoilCurrent
        What the coil takes.
    name : str
        The device the coil belongs to.
    panel : Panel
        Control supply and controllers.
    catalogue : Catalogue
        Relays and the trade's figures.

    Returns
    -------
    tuple of CoilDrive, or Unsized
        Directly first, where the controller's relay carries the coil; through the smallest interposing relay where it
        does not, or where the weakest contact then lasts longer. Unsized where neither carries it.
    """
    side = controller_side(panel, catalogue, "relay")
    if isinstance(side, Unsized):
        return side
    direct = _carry(side, coil, name, panel, catalogue)
    between: CoilDrive | Unsized = Unsized("no relay is listed", ("devices.relays",))
    for relay in sorted(catalogue.relays, key=lambda relay: relay.resistive_current):
        between = _through(relay, side, coil, name, panel, catalogue)
        if isinstance(between, CoilDrive):
            break
    if isinstance(direct, Unsized):
        if isinstance(between, Unsized):
            return Unsized(f"{direct.because}; no interposing relay helps: {between.because}", (*direct.needs, *between.needs))
        return (between,)
    if isinstance(between, CoilDrive) and between.shortest_life > direct.shortest_life:
        return direct, between
    return (direct,)


def _carry(side: OutputSide, coil: CoilCurrent, name: str, panel: Panel, catalogue: Catalogue) -> CoilDrive | Unsized:
    fed = control_connection(panel.supply, panel.control_supply)
    category = "DC-13" if fed.kind == "dc" else "AC-15"
    resistive = side.rating or 0.0
    what = f"the relay of {side.controller}"
    rating = relay_rating(resistive, category, fed, catalogue)
    if isinstance(rating, Unsized):
        return rating
    if coil.hold > rating.value or coil.inrush > resistive:
        told = f"{what} carries {rating.value:.3g} A in {category}, the coil of {name} takes {coil.hold:.3g} A"
        return Unsized(told, ("controllers.outputs",))
    made = contact(
        f"the coil of {name}", "controller", what, coil.hold, category, side.points, side.mechanical_life,
        side.operations_per_hour, side.pull_in, side.drop_out, catalogue,
    )  # fmt: skip
    if isinstance(made, Unsized):
        return made
    drawn = Drawn(f"the coil of {name}", coil.hold, coil.inrush)
    drives = [Drive(f"the holding current of the coil of {name}, in {category}", coil.hold, rating.value)]
    if coil.inrush > coil.hold:
        drives.append(Drive(f"the inrush current of the coil of {name}", coil.inrush, resistive))
    return CoilDrive((made,), (*coil.figures, rating), side.assumptions, (drawn,), coil.power, tuple(drives))


def _through(relay: Relay, side: OutputSide, coil: CoilCurrent, name: str, panel: Panel, catalogue: Catalogue) -> CoilDrive | Unsized:
    if relay.coil is None:
        return Unsized(f"{relay.name} has no coil of its own")
    fed = control_connection(panel.supply, panel.control_supply)
    category = "DC-13" if fed.kind == "dc" else "AC-15"
    rating = relay_rating(float(relay.resistive_current), category, fed, catalogue)
    if isinstance(rating, Unsized):
        return rating
    if coil.hold > rating.value or coil.inrush > relay.resistive_current:
        return Unsized(f"{relay.name} carries {rating.value:.3g} A in {category}")
    own = coil_current(relay.coil, relay.name, panel, any_voltage=catalogue.is_typical("relays"))
    if isinstance(own, Unsized):
        return own
    first = _carry(side, own, relay.name, panel, catalogue)
    if isinstance(first, Unsized):
        return first
    second = contact(
        f"the coil of {name}", "interposing", relay.name, coil.hold, category, relay.electrical_life, relay.mechanical_life,
        relay.operations_per_hour, relay.pull_in, relay.drop_out, catalogue,
    )  # fmt: skip
    if isinstance(second, Unsized):
        return second
    assumed = (*first.assumptions, *typical(catalogue, "relays", relay.name))
    drawn = (Drawn(f"the coil of {name}", coil.hold, coil.inrush), *first.drawn)
    figures = (*coil.figures, *first.figures, rating)
    return CoilDrive((*first.contacts, second), figures, assumed, drawn, coil.power + first.power, first.drives)
