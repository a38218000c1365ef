"""What can hurt someone at a loop, asked of its traits and fields; which caution each takes is data of the catalogue."""

from collections.abc import Callable

from specgen.rules.base import Case
from specgen.rules.declared import field, word
from specgen.rules.hazard import heating
from specgen.sizing.candidate import Unsized

HARMLESS_VOLTAGE = 50.0  # V, limit of extra-low voltage a.c. (IEC 60364-4-41, from memory)
WARM_WATER = (20.0, 50.0)  # degC, where legionella grows (common practice, no source)


def hazards_of(case: Case) -> tuple[str, ...]:
    """Return the hazards of a loop in the order in which they are told: what acts at once first.

    Each is the ``hazard`` of rows of the catalogue's cautions.
    """
    return tuple(name for name, applies in HAZARDS.items() if applies(case))


def _mains(case: Case) -> bool:
    voltage = field(case, "element.voltage") or field(case, "element.motor_voltage") or field(case, "element.control_voltage")
    return isinstance(voltage, float) and voltage > HARMLESS_VOLTAGE


def _solid_state(case: Case) -> bool:
    return case.candidate.device in ("ssr", "power_controller") and _mains(case)


def _live_line(case: Case) -> bool:
    return not isinstance(case.device, Unsized) and bool(case.device.isolator)


def _drive(case: Case) -> bool:
    return field(case, "element.lowest_speed") is not None


def _liquid(case: Case) -> bool:
    needs = field(case, "element.needs")
    wet = isinstance(needs, tuple) and any(need in ("level", "flow") for need in needs)
    return wet or word(case, "element.medium") in ("water", "brine")


def _scald(case: Case) -> bool:
    return heating(case) and _liquid(case)


def _dry_firing(case: Case) -> bool:
    return case.traits.electric_heat and bool(field(case, "element.needs"))


def _steam(case: Case) -> bool:
    return word(case, "element.medium") == "steam"


def _gas(case: Case) -> bool:
    return case.traits.burner or word(case, "element.medium") == "gas"


def _bacteria(case: Case) -> bool:
    need = case.loop.need
    water = _liquid(case) and word(case, "element.medium") != "brine"
    warm = need.setpoints.low <= WARM_WATER[1] and need.setpoints.high >= WARM_WATER[0]
    return water and need.quantity == "temperature" and warm


def _restarts(case: Case) -> bool:
    declared = case.loop.limits.after_power_return or case.panel.house.after_power_return
    return declared != "off"


def _moves(case: Case) -> bool:
    return case.traits.motor or case.traits.travels or _drive(case) or (case.traits.valve and case.traits.analogue_input)


HAZARDS: dict[str, Callable[[Case], bool]] = {
    "mains": _mains,
    "injury": lambda case: case.loop.limits.consequence == "injury",
    "fire": lambda case: case.loop.limits.consequence == "fire" or (case.traits.electric_heat and heating(case)),
    "gas": _gas,
    "refrigerant": lambda case: case.traits.may_refrigerate and field(case, "element.refrigerant_circuit") is True,
    "steam": _steam,
    "pressure": lambda case: case.loop.need.quantity == "pressure",
    "oil": lambda case: word(case, "element.medium") == "oil",
    "hot_surface": heating,
    "scald": _scald,
    "dry_firing": _dry_firing,
    "solid_state": _solid_state,
    "live_line": _live_line,
    "moving": _moves,
    "stored": _drive,
    "restart": _restarts,
    "inrush": lambda case: case.traits.not_burst_fired,
    "leakage": lambda case: word(case, "element.fill") == "mineral_insulated",
    "overflow": lambda case: case.loop.need.quantity == "level",
    "frost": lambda case: bool(case.loop.limits.frost_risk),
    "bacteria": _bacteria,
}
