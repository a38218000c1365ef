"""A solid-state switch or a power controller at the load."""

from dataclasses import replace

from specgen.catalogue.load import Catalogue
from specgen.core.figure import Figure
from specgen.model.devices import PowerController, SolidState
from specgen.model.loop import Loop
from specgen.model.panel import Panel
from specgen.model.traits import Traits
from specgen.sizing.burden import analogue_drive
from specgen.sizing.candidate import Assumption, ControllerOutputKind, Unsized, Unsuited
from specgen.sizing.chain import contact, typical
from specgen.sizing.connection import Connection, control_connection
from specgen.sizing.contactor_choice import contactor_choices
from specgen.sizing.controller import OutputSide, controller_side
from specgen.sizing.current import LoadCurrent, load_current
from specgen.sizing.device import Contact, DeviceChoice, Drawn, Drive
from specgen.sizing.solid_state import cooled

LEAST_SWITCHED = {3: 2, 2: 1, 1: 1}
"""Live conductors that must at least be switched so that no current flows."""
PHASES = 3
COOLINGS = ("natural", "forced", "none")
"""How a heat sink is cooled, in the order of choice."""
HOT = {
    "forced": "{} carries the load and would need a fan on its heat sink.",
    "none": "{} carries the load and gets too hot on any heat sink.",
}


def solid_state_choices(loop: Loop, panel: Panel, traits: Traits, catalogue: Catalogue) -> tuple[DeviceChoice, ...] | Unsized:
    """Return the solid-state switches that could switch a load, in the order of choice.

    Parameters
    ----------
    loop, panel, traits, catalogue
        The loop with its element's traits, the panel, and what is looked up.

    Returns
    -------
    tuple of DeviceChoice, or Unsized
        Unsized for motors and coils, for which no rating is given, and above the largest current.

    Notes
    -----
    All lines switched come before fewer, then those whose heat sink the panel's air cools before those that need a fan and
    those no heat sink keeps below the junction's limit, then the smallest. So a larger device is taken where the smallest
    that carries the current gets too hot at the interior limit.
    """
    if traits.motor:
        return Unsized("no motor rating is given for a solid-state switch")
    load = load_current(loop.element, panel, catalogue)
    if isinstance(load, Unsized):
        return load
    if load.connection.kind == "dc":
        return Unsized("a solid-state switch for a.c. does not open a d.c. load")
    if not traits.electric_heat:
        return Unsized(f"no rating in {load.category} is given for a solid-state switch")
    if load.solid_state_category != "AC-51":
        return Unsized(f"no solid-state switch is listed with a rating in {load.solid_state_category}", ("devices.ssrs",))
    lines = load.connection.lines
    fitting = [device for device in catalogue.ssrs if device.poles >= lines and device.switched_poles >= LEAST_SWITCHED[lines]]
    if not fitting:
        return Unsized(f"no solid-state switch is listed for a load of {lines} lines", ("devices.ssrs",))
    most = max(load.current, load.inrush or 0.0)  # no overload is given for a switch of this kind
    covering = [device for device in fitting if device.current >= most]
    if not covering:
        largest = max(fitting, key=lambda device: device.current)
        return Unsized(f"the largest solid-state switch, {largest.name}, does not carry {most:.3g} A", ("devices.ssrs",))
    # one that leaves a line live comes after all that open every line; poles beyond the lines are waste
    covering.sort(key=lambda device: (device.switched_poles < lines, device.poles, device.current, device.name))
    made = [_one(device, load, panel, catalogue) for device in covering]
    found = [choice for choice in made if isinstance(choice, DeviceChoice)]
    found.sort(key=lambda choice: (choice.poles < lines, COOLINGS.index(choice.cooling)))
    if not found:
        return next(choice for choice in made if isinstance(choice, Unsized))
    isolating = contactor_choices(loop, panel, catalogue) if any(_leaves_live(choice) for choice in found) else ()
    isolator = None if isinstance(isolating, Unsized) or not isolating else isolating[0]
    first = next(choice for choice in made if isinstance(choice, DeviceChoice))
    if found[0] is not first and first.cooling != found[0].cooling:
        found = [replace(choice, because=HOT[first.cooling].format(first.name)) for choice in found]
    return tuple(_isolated(choice, isolator) if _leaves_live(choice) else choice for choice in found)


def _leaves_live(choice: DeviceChoice) -> bool:
    """Tell whether one line of a three-phase load stays closed."""
    return choice.poles < choice.lines == PHASES


def _isolated(choice: DeviceChoice, isolator: DeviceChoice | None) -> DeviceChoice:
    """Add the contactor that opens every line upstream, with its heat and its coil; without one rule O8 is broken."""
    if isolator is None:
        return choice
    loss = (choice.loss or 0.0) + (isolator.loss or 0.0)
    given = {"P_v": (choice.loss or 0.0, "power"), "P_q": (isolator.loss or 0.0, "power")}
    source = "rule O8: the device leaves a line live"
    both = Figure("P_v+q", "loss in the panel with the isolation contactor", "P_v + P_q", loss, "power", source, given)
    return replace(
        choice, isolator=isolator.name, loss=loss, drawn=(*choice.drawn, *isolator.drawn), figures=(*choice.figures, both),
        assumptions=(*choice.assumptions, *isolator.assumptions), suppressors=(*choice.suppressors, *isolator.suppressors),
    )  # fmt: skip


def _one(device: SolidState, load: LoadCurrent, panel: Panel, catalogue: Catalogue) -> DeviceChoice | Unsized:
    driven = _driven_by(device, panel, catalogue)
    if isinstance(driven, Unsized):
        return driven
    output, contacts, figures, assumed, drawn, drives = driven
    poles = min(device.switched_poles, load.connection.lines)
    heat = cooled(device, load.current, poles, panel, catalogue)
    half_cycle = 0.5 / float(panel.supply.frequency)
    given = {"f": (float(panel.supply.frequency), "frequency")}
    pulse = Figure("t_p", "shortest pulse of a zero-crossing switch", "1/(2 f)", half_cycle, "time", "half a mains cycle", given)
    switch = Contact("the load", "load", device.name, load.current, None, None, half_cycle, half_cycle, (pulse,))
    rated = {"I_r": (float(device.current), "current")}
    rating = Figure("I_e", "rated current in AC-51 at its reference", "I_r", float(device.current), "current", "the device's data", rated)
    return DeviceChoice(
        name=device.name,
        category="AC-51",
        controller_output=output,
        chain=(*contacts, switch),
        poles=poles,
        rating=float(device.current),
        current=load.current,
        figures=(*load.figures, rating, *heat.figures, *figures),
        assumptions=(*load.assumptions, *typical(catalogue, "ssrs", device.name), *assumed),
        loss=heat.loss,
        heat_sink=heat.resistance,
        cooling=heat.cooling,
        sink_margin=heat.margin,
        leakage=float(device.leakage),
        i2t=float(device.i2t),
        lines=load.connection.lines,
        drawn=drawn,
        drives=drives,
    )


Driven = tuple[
    ControllerOutputKind, tuple[Contact, ...], tuple[Figure, ...], tuple[Assumption, ...], tuple[Drawn, ...], tuple[Drive, ...]
]


def _driven_by(device: SolidState, panel: Panel, catalogue: Catalogue) -> Driven | Unsized:
    """Drive the input from a logic output, or, where the controllers have none, from a relay and the control supply."""
    side = controller_side(panel, catalogue, "logic")
    if isinstance(side, OutputSide):
        return _by_logic(device, side)
    relay = controller_side(panel, catalogue, "relay")
    if isinstance(relay, Unsized):
        return side
    fed = control_connection(panel.supply, panel.control_supply)
    allowed = device.input.voltage
    if fed.kind != "dc" or not allowed.low <= fed.voltage <= allowed.high:
        return Unsized(f"{side.because}, and the control supply does not suit the input of {device.name}", ("controllers.outputs",))
    needed = float(device.input.current)
    name = f"the relay of {relay.controller}"
    made = contact(
        f"the input of {device.name}", "controller", name, needed, "AC-1", relay.points, relay.mechanical_life,
        relay.operations_per_hour, relay.pull_in, relay.drop_out, catalogue,
    )  # fmt: skip
    if isinstance(made, Unsized):
        return made
    why = "no controller has a logic output: its relay switches the input from the control supply, and wears"
    drawn = Drawn(f"the input of {device.name}", needed, needed)
    assumed = (*relay.assumptions, Assumption(f"input of {device.name}", "by a relay", why))
    return "relay", (made,), (), assumed, (drawn,), (Drive(drawn.what, needed, relay.rating or 0.0),)


def _by_logic(device: SolidState, side: OutputSide) -> Driven | Unsized:
    allowed, needed = device.input.voltage, float(device.input.current)
    if side.voltage is None or side.drive is None:
        return Unsized(f"the logic output of {side.controller} has no voltage or drive", ("controllers.outputs",))
    if not allowed.low <= side.voltage <= allowed.high:
        told = f"{side.voltage:g} V of {side.controller} is outside the input of {device.name}, {allowed.text}"
        return Unsized(told, ("controllers.outputs",))
    if needed > side.drive:
        told = f"{device.name} takes {needed * 1000:.3g} mA, the logic output of {side.controller} gives {side.drive * 1000:.3g} mA"
        return Unsized(told, ("controllers.outputs",))
    given = {"I_in": (needed, "current"), "I_out": (side.drive, "current")}
    used = needed / side.drive
    share = Figure("s", "share of the logic output's drive that is used", "I_in/I_out", used, "fraction", "the devices' data", given)
    return "logic", (), (share,), side.assumptions, (), (Drive(f"the input of {device.name}", needed, side.drive),)


def power_controller_choices(loop: Loop, panel: Panel, traits: Traits, catalogue: Catalogue) -> tuple[DeviceChoice, ...] | Unsized:
    """Return the power controllers that could throttle a heater, the smallest first.

    Parameters
    ----------
    loop, panel, traits, catalogue
        The loop with its element's traits, the panel, and what is looked up.

    Returns
    -------
    tuple of DeviceChoice, or Unsized
        Unsuited for anything but electric heaters, Unsized above the largest current. A load that must not be switched whole
        gets phase angle with soft start or current limit only.
    """
    if not traits.electric_heat:
        return Unsuited("a power controller throttles electric heaters only")
    load = load_current(loop.element, panel, catalogue)
    if isinstance(load, Unsized):
        return load
    wanted = 3 if load.connection.way == "three_phase" else 1
    fitting = [device for device in catalogue.power_controllers if device.poles >= wanted and _gentle(device, traits)]
    if not fitting:
        return Unsized("no power controller is listed that suits this load", ("devices.power_controllers",))
    covering = sorted((device for device in fitting if device.current >= load.current), key=lambda d: (d.poles, d.current, d.name))
    if not covering:
        largest = max(fitting, key=lambda device: device.current)
        return Unsized(f"the largest power controller, {largest.name}, does not carry {load.current:.3g} A", ("devices.power_controllers",))
    made = [_throttled(device, load, panel, catalogue) for device in covering]
    found = tuple(choice for choice in made if isinstance(choice, DeviceChoice))
    return found or next(choice for choice in made if isinstance(choice, Unsized))


def _gentle(device: PowerController, traits: Traits) -> bool:
    if not traits.not_burst_fired:
        return True
    return device.firing != "burst" and "yes" in (device.soft_start, device.current_limit)


def _throttled(device: PowerController, load: LoadCurrent, panel: Panel, catalogue: Catalogue) -> DeviceChoice | Unsized:
    side = controller_side(panel, catalogue, "analogue", signal=device.signal)
    if isinstance(side, Unsized):
        return side
    resistance = None if device.input_resistance is None else float(device.input_resistance)
    drives, undriven = analogue_drive(device.signal, resistance, 1, side, "devices.power_controllers.input_resistance")
    given = {"I_r": (float(device.current), "current")}
    category = load.solid_state_category
    rating = Figure("I_e", "rated current of the power controller", "I_r", float(device.current), "current", "the device's data", given)
    poles = _poles(load.connection, device)
    loss = poles * float(device.loss_per_ampere) * load.current
    put_in = {"p": (float(poles), "number"), "U": (float(device.loss_per_ampere), "voltage"), "I_b": (load.current, "current")}
    said = "the device's data, watts an ampere and pole"
    lost = Figure("P_v", "loss in the panel at full output", "p U I_b", loss, "power", said, put_in)
    return DeviceChoice(
        name=device.name,
        category=category,
        controller_output="analogue",
        chain=(),
        poles=poles,
        rating=float(device.current),
        current=load.current,
        figures=(*load.figures, rating, lost),
        assumptions=(*load.assumptions, *typical(catalogue, "power_controllers", device.name), *side.assumptions),
        open_points=(Unsized(f"its rated current is not yet held against a data sheet, in {category} and at the interior limit"),),
        loss=loss,
        i2t=None if device.i2t is None else float(device.i2t),
        lines=load.connection.lines,
        drives=drives,
        undriven=undriven,
    )


def _poles(fed: Connection, device: PowerController) -> int:
    return min(fed.lines, device.poles)
