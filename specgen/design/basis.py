"""The Basis: every number shown anywhere, in the order of the calculation."""

from math import isfinite

from specgen.core.figure import Figure
from specgen.process.box import Box, Point, Unmodelled
from specgen.process.plant import ProcessModel
from specgen.rules.base import Case
from specgen.sizing.candidate import Unsized
from specgen.sizing.settings import OnOffSettings

PLANT = "plant's balance at the case named"


def basis_of(case: Case, fitted: tuple[Figure, ...] = ()) -> tuple[Figure, ...]:
    """Return the figures of a fit, the plant's, the measuring error, the device's, the settings' and those of a stuck output."""
    found = list(fitted)
    if not isinstance(case.box, Unmodelled):
        found += plant_figures(case.box)
    if not isinstance(case.error, Unsized):
        found += case.error.figures
    if not isinstance(case.device, Unsized):
        found += case.device.figures
        for contact in case.device.chain:
            found += contact.figures
    if not isinstance(case.feeder, Unsized):
        found += case.feeder.figures
    if not isinstance(case.settings, Unsized):
        if not isinstance(case.settings, OnOffSettings):
            found += case.settings.tuning.figures
        found += case.settings.figures
    if not isinstance(case.faults, Unsized):
        found += [*case.faults.on.figures, *case.faults.off.figures]
    return tuple(_once(found))


def _once(figures: list[Figure]) -> list[Figure]:
    seen: set[tuple[str, str, float, str]] = set()
    kept = []
    for figure in figures:
        key = (figure.symbol, figure.name, figure.value, figure.case)
        if key not in seen:
            seen.add(key)
            kept.append(figure)
    return kept


def plant_figures(box: Box) -> list[Figure]:
    """Return settled ends, duty, time constant, gain and dead time of the plant, at the mildest and the hardest case."""
    found: list[Figure] = []
    for name, end, (duty, point) in (("mildest", "lowest", box.duty_low), ("hardest", "highest", box.duty_high)):
        plant, case = box.plant_at(point), box.text(point)
        if isfinite(plant.tau):
            found += _settling(box, point, name, case)
            inputs = {"setpoint": (box.value_at(point, 0.0), "value")}
            inputs |= {"y_on": (box.value_at(point, plant.settles_on), "value"), "y_off": (box.value_at(point, plant.settles_off), "value")}
            formula = "(setpoint − y_off)/(y_on − y_off)"
        else:
            found += _integrating(plant, name, case)
            on, off = plant.speed(0.0, 1.0), -plant.speed(0.0, 0.0)
            inputs = {"r_on": (on, "change_per_second"), "r_off": (off, "change_per_second")}
            formula = "r_off/(r_on + r_off)"
        found.append(Figure("x", f"{end} share of full output", formula, duty, "fraction", PLANT, inputs, case))
        if not 0 <= duty <= 1:
            clipped = min(max(duty, 0.0), 1.0)
            found.append(Figure("x", f"{end} share of full output that there is", "x within 0 and 1", clipped, "fraction", PLANT,
                                {"x": (duty, "fraction")}, case))  # fmt: skip
        found.append(Figure("θ", f"dead time, {name} case", "declared", plant.theta, "time", PLANT, {}, case))
    return found


def _settling(box: Box, point: Point, name: str, case: str) -> list[Figure]:
    """Return where the value settles, how fast, and the change between the ends."""
    plant, balance = box.plant_at(point), box.form == "balance"
    made = []
    for symbol, words, settles, formula in (
        ("y_on", "full", plant.settles_on, "y_off ± P/UA" if balance else "rest value ± change × supply²"),
        ("y_off", "no", plant.settles_off, "Ta ∓ Q/UA" if balance else "rest value"),
    ):
        value = box.value_at(point, settles)
        made.append(Figure(symbol, f"settles at with {words} output, {name} case", formula, value, "value", PLANT, {}, case))
    capacity = {"C": (plant.tau * box.loss_at(point), "heat_capacity"), "UA": (box.loss_at(point), "loss")} if balance else {}
    formula = "C/UA, bodies that follow fast" if balance else "declared"
    made.append(Figure("τ", f"time constant, {name} case", formula, plant.tau, "time", PLANT, capacity, case))
    inputs = {"y_on": (box.value_at(point, plant.settles_on), "value"), "y_off": (box.value_at(point, plant.settles_off), "value")}
    made.append(Figure("K", f"change from no to full output, {name} case", "|y_on − y_off|", plant.gain, "change", PLANT, inputs, case))
    return made


def _integrating(plant: ProcessModel, name: str, case: str) -> list[Figure]:
    """Return the speeds of a plant that does not settle."""
    on, off = plant.speed(0.0, 1.0), -plant.speed(0.0, 0.0)
    inputs = {"r_on": (on, "change_per_second"), "r_off": (off, "change_per_second")}
    words = f"speed with full output less speed with none, {name} case"
    return [Figure("k'", words, "r_on + r_off", plant.gain_per_second, "change_per_second", PLANT, inputs, case)]
