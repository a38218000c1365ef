"""A contactor at the load: enough poles, rated in the load's category at the interior limit, driven by the controller."""

from math import sqrt

from specgen.catalogue.load import Catalogue
from specgen.core.figure import Figure
from specgen.model.devices import Contactor
from specgen.model.loop import Loop
from specgen.model.panel import Panel
from specgen.sizing.candidate import Assumption, Unsized
from specgen.sizing.chain import contact, element_contact, typical
from specgen.sizing.coil_drive import coil_current, coil_drives
from specgen.sizing.current import LoadCurrent, load_current
from specgen.sizing.device import DeviceChoice
from specgen.sizing.drawn import load_drawn, loss_figure
from specgen.sizing.suppression import suppressors

_MOTOR_LIKE = ("AC-3", "AC-15")
_MAKE = 10.0  # times its AC-3 current a contactor makes (IEC 60947-4-1 table 7, seen in a secondary text)


def contactor_choices(loop: Loop, panel: Panel, catalogue: Catalogue) -> tuple[DeviceChoice, ...] | Unsized:
    """Return the contactors that could switch a load, the smallest first.

    Parameters
    ----------
    loop, panel, catalogue
        The loop, the panel, and what is looked up.

    Returns
    -------
    tuple of DeviceChoice, or Unsized
        Unsized where the load's category has no rating, none is large enough, or none can be driven.
    """
    load = load_current(loop.element, panel, catalogue)
    if isinstance(load, Unsized):
        return load
    if load.category not in ("AC-1", *_MOTOR_LIKE):
        return Unsized(f"no contactor is listed with a rating in {load.category}", ("devices.contactors",))
    covering = _covering(load, panel, catalogue)
    if isinstance(covering, Unsized):
        return covering
    found: list[DeviceChoice] = []
    refused: list[Unsized] = []
    for device, rating in covering:
        made = _with(device, rating, loop, load, panel, catalogue)
        if isinstance(made, Unsized):
            refused.append(made)
        else:
            found += made
    if not found:
        # a coil for another supply is passed over as long as anything else is in the way
        return next((reason for reason in refused if reason.needs != ("control_supply",)), refused[0])
    return tuple(sorted(found, key=lambda choice: (choice.rating or 0.0, choice.name, len(choice.chain))))


def _covering(load: LoadCurrent, panel: Panel, catalogue: Catalogue) -> list[tuple[Contactor, Figure]] | Unsized:
    """Return the contactors with enough poles that carry and make the load's current, with their ratings."""
    fitting = [device for device in catalogue.contactors if device.poles >= load.connection.lines]
    if not fitting:
        return Unsized(f"no contactor is listed with {load.connection.lines} poles", ("devices.contactors",))
    found: list[tuple[Contactor, Figure]] = []
    for device in fitting:
        rating = rating_at(device, load.category, panel, catalogue)
        if isinstance(rating, Unsized):
            return rating
        if load.current <= rating.value and (load.inrush or 0.0) <= _MAKE * device.motor_current:
            found.append((device, rating))
    if not found:
        largest = max(fitting, key=lambda c: c.motor_current if load.category in _MOTOR_LIKE else c.resistive_current)
        inrush = f" with {load.inrush:.3g} A of inrush" if load.inrush else ""
        told = f"the largest contactor, {largest.name}, does not carry {load.current:.3g} A{inrush} in {load.category}"
        return Unsized(told, ("devices.contactors",))
    return found


def _with(
    device: Contactor, rating: Figure, loop: Loop, load: LoadCurrent, panel: Panel, catalogue: Catalogue
) -> tuple[DeviceChoice, ...] | Unsized:
    coil = coil_current(device.coil, device.name, panel, any_voltage=catalogue.is_typical("contactors"))
    if isinstance(coil, Unsized):
        return coil
    drives = coil_drives(coil, device.name, panel, catalogue)
    if isinstance(drives, Unsized):
        return drives
    motor = load.category in _MOTOR_LIKE
    if motor and not device.motor_life:
        return Unsized(f"{device.name} carries the load but no life in AC-3 is given for it", ("devices.contactors.motor_life",))
    made = contact(
        "the load", "load", device.name, load.current, load.category, device.motor_life if motor else device.electrical_life,
        device.mechanical_life, device.operations_per_hour, device.pull_in, device.drop_out, catalogue,
        points_are_for="AC-3" if motor else "AC-1",
    )  # fmt: skip
    if isinstance(made, Unsized):
        return made
    parts, more, missing = element_contact(loop.element, load.current, catalogue)
    assumed = (*load.assumptions, *typical(catalogue, "contactors", device.name), *_stands_for(load))
    fed = load_drawn(load, panel)
    return tuple(
        DeviceChoice(
            name=device.name,
            category=load.category,
            controller_output="relay",
            chain=(*drive.contacts, made, *parts),
            poles=load.connection.lines,
            rating=rating.value,
            current=load.current,
            figures=(*load.figures, rating, *drive.figures, lost),
            assumptions=(*assumed, *drive.assumptions, *more),
            open_points=missing,
            loss=lost.value,
            lines=load.connection.lines,
            drawn=(*drive.drawn, *fed),
            drives=drive.drives,
            suppressors=suppressors(drive.drawn, load, panel),
        )
        for drive, lost in ((drive, loss_figure(device, load, drive.power)) for drive in drives)
    )


def _stands_for(load: LoadCurrent) -> tuple[Assumption, ...]:
    if load.category != "AC-15":
        return ()
    why = "a power contactor has no rating for coils; a motor makes and breaks more than a coil of the same current"
    return (Assumption("contactor rating in AC-15", "its rating and life in AC-3", why),)


def rating_at(device: Contactor, category: str, panel: Panel, catalogue: Catalogue) -> Figure | Unsized:
    r"""Return a contactor's rated current in a category at the interior limit.

    Parameters
    ----------
    device : Contactor
        The contactor, with the temperature its resistive current holds at.
    category : str
        AC-1, AC-3 or AC-15.
    panel : Panel
        Its interior limit.
    catalogue : Catalogue
        The terminals' limit.

    Returns
    -------
    Figure or Unsized
        The rating [A]; Unsized where the interior is as hot as the terminals may get.

    Notes
    -----
    Above the reference temperature the rise that is left to the terminals shrinks, and heat follows the square of the
    current: :math:`I = I_{ref} \sqrt{(T_t - T_i)/(T_t - T_{ref})}`. A motor rating is set by making and breaking, not by
    heat; it is never above the resistive one.

    References
    ----------
    Derived from Joule heat; the terminals' limit of 65 K above 40 degC is IEC 60947-1 table 2 (from memory).
    """
    interior, reference = float(panel.enclosure.interior_limit), float(device.reference_temperature)
    limit = catalogue.practice("terminal_limit")
    top = float(limit.value.quantity)
    base = {"I_ref": (float(device.resistive_current), "current")}
    if interior <= reference:
        resistive, formula, source = float(device.resistive_current), "I_ref", "the device's data"
    elif interior >= top:
        return Unsized(f"{device.name} has no rating at {interior:g} °C", ("enclosure.interior_limit",))
    else:
        resistive = float(device.resistive_current) * sqrt((top - interior) / (top - reference))
        formula, source = "I_ref sqrt((T_t - T_i)/(T_t - T_ref))", f"Joule heat; {limit.row.cited}"
        base |= {"T_t": (top, "temperature"), "T_i": (interior, "temperature"), "T_ref": (reference, "temperature")}
    if category == "AC-1":
        return Figure("I_e", "rated current in AC-1 at the interior limit", formula, resistive, "current", source, base)
    base["I_AC3"] = (float(device.motor_current), "current")
    rating = min(float(device.motor_current), resistive)
    return Figure("I_e", f"rated current in {category} at the interior limit", f"min(I_AC3, {formula})", rating, "current", source, base)
