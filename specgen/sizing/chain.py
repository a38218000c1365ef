"""Contacts in a chain: what each is rated for, how long it lasts, and what the element itself adds."""

from collections.abc import Sequence
from typing import Literal

from specgen.catalogue.load import Catalogue
from specgen.core.figure import Figure
from specgen.model.devices import LifePoint
from specgen.model.element import Element, SolenoidValve
from specgen.sizing.candidate import Assumption, NoCandidate, Unsized
from specgen.sizing.connection import Connection
from specgen.sizing.contact_life import life_figure
from specgen.sizing.device import Contact

COIL_SHARES = {"AC-15": "relay_coil_share_ac", "DC-13": "relay_coil_share_dc"}
_FIELDS = {"contactors": "contactor", "relays": "relay", "ssrs": "solid-state switch", "power_controllers": "power controller"}


def relay_rating(resistive: float, category: str, fed: Connection, catalogue: Catalogue) -> Figure | Unsized:
    """Rated current of a relay contact in a load's category.

    Parameters
    ----------
    resistive : float
        The contact's rated resistive current [A].
    category : str
        Utilisation category of the load.
    fed : Connection
        What feeds the load.
    catalogue : Catalogue
        The trade's figures for relay contacts.

    Returns
    -------
    Figure or Unsized
        The rating [A]; Unsized above the voltages a relay is rated for and in every category but AC-1, AC-15, DC-13.

    References
    ----------
    Common practice, no source: a contact carries into coils a fifth (a.c.) or three tenths (d.c., suppressed) of its
    resistive current.
    """
    if fed.kind == "dc":
        most = catalogue.practice("relay_highest_direct_voltage")
        if fed.voltage > most.value.quantity:
            return NoCandidate(f"a relay's rating for {fed.voltage:g} V d.c. is not given, only up to {most.value.value}")
    else:
        most = catalogue.practice("relay_highest_voltage")
        if fed.voltage > most.value.quantity:
            return NoCandidate(f"a relay opens at most {most.value.value}, not {fed.voltage:g} V")
    given = {"I_r": (resistive, "current")}
    if category == "AC-1":
        return Figure("I_e", "rated current in AC-1", "I_r", resistive, "current", "the device's data", given)
    if category in COIL_SHARES:
        share = catalogue.practice(COIL_SHARES[category])
        given["s"] = (float(share.value.quantity), "fraction")
        rating = resistive * float(share.value.quantity)
        return Figure("I_e", f"rated current in {category}", "s I_r", rating, "current", share.row.cited, given)
    return NoCandidate(f"a relay has no rating in {category}")


def contact(
    what: str, role: Literal["controller", "interposing", "load"], name: str, current: float, category: str,
    points: Sequence[LifePoint], mechanical_life: float, operations_per_hour: float, pull_in: float, drop_out: float,
    catalogue: Catalogue, *, points_are_for: str = "AC-1",
) -> Contact | Unsized:  # fmt: skip
    """Make one contact of the chain with its life at the current it carries.

    Parameters
    ----------
    what, role, name
        What it switches, its place in the chain, and the device.
    current : float
        Current made and broken [A].
    category : str
        Utilisation category of what it switches.
    points, mechanical_life
        The device's life [1 at A].
    operations_per_hour, pull_in, drop_out : float
        Its highest rate [1/h] and its times [s].
    catalogue : Catalogue
        The trade's figures.
    points_are_for : str
        Category that the points were given for.

    Returns
    -------
    Contact or Unsized
        Unsized where no life is given for that current.

    Notes
    -----
    A coil wears a contact more than a heater of the same current. Where the points are for resistive loads, the life is
    taken at the current divided by the share that the contact may carry into coils: at its coil rating it is the life at
    the full resistive current.
    """
    figures: list[Figure] = []
    worn = current
    if category in COIL_SHARES and points_are_for == "AC-1":
        share = catalogue.practice(COIL_SHARES[category])
        worn = current / float(share.value.quantity)
        given = {"I": (current, "current"), "s": (float(share.value.quantity), "fraction")}
        called = f"resistive current that wears {name} as the coil does"
        figures.append(Figure("I_eq", called, "I/s", worn, "current", share.row.cited, given))
    life = life_figure(name, worn, points, mechanical_life)
    if isinstance(life, Unsized):
        return life
    return Contact(what, role, name, current, life.value, float(operations_per_hour), float(pull_in), float(drop_out), (*figures, life))


def typical(catalogue: Catalogue, kind: str, name: str) -> tuple[Assumption, ...]:
    """State that a device's values are typical ones, where the shop lists none of its class."""
    if not catalogue.is_typical(kind):
        return ()
    why = f"typical {_FIELDS[kind]}, rated at the interior limit; to be replaced by the data sheet before construction"
    return (Assumption(f"devices.{kind}", name, why),)


def element_contact(
    element: Element, current: float, catalogue: Catalogue
) -> tuple[tuple[Contact, ...], tuple[Assumption, ...], tuple[Unsized, ...]]:
    """Return what the element itself adds to the chain: a solenoid valve wears with every operation."""
    if not isinstance(element, SolenoidValve):
        return (), (), ()
    assumptions: tuple[Assumption, ...] = ()
    if element.min_pulse is not None:
        pulse = float(element.min_pulse)
    else:
        known = catalogue.practice("solenoid_pulse")
        pulse = float(known.value.quantity)
        assumptions = (Assumption("element.min_pulse", known.value.value, f"{known.value.what}; {known.row.cited}"),)
    if element.operations_life is None:
        missing = Unsized("how many operations the solenoid valve lasts is not declared", ("element.operations_life",))
        return (), assumptions, (missing,)
    life = float(element.operations_life)
    figure = Figure("N", "declared life of the solenoid valve", "N", life, "operations", "element.operations_life", {})
    part = Contact("the medium", "element", "solenoid valve", current, life, None, pulse, pulse, (figure,))
    return (part,), assumptions, ()
