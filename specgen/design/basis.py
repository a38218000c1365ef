"""The Basis: every number shown anywhere, in the order of the calculation."""

from math import isfinite

from specgen.core.figure import Figure
from specgen.process.box import Box, Unmodelled
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
    """Return duty, time constant, dead time and settled ends of the plant, each at the case where it matters."""
    found: list[Figure] = []
    for name, (duty, point) in (("lowest", box.duty_low), ("highest", box.duty_high)):
        found.append(Figure("x", f"{name} share of full output", "load/full output", duty, "fraction", PLANT, {}, box.text(point)))
    for name, (_, point) in (("mildest", box.duty_low), ("hardest", box.duty_high)):
        plant = box.plant_at(point)
        case = box.text(point)
        if isfinite(plant.tau):
            found.append(Figure("τ", f"time constant, {name} case", "C/UA", plant.tau, "time", PLANT, {}, case))
            found.append(Figure("K", f"change from no to full output, {name} case", "y_on − y_off", plant.gain, "change", PLANT, {}, case))
        else:
            found.append(Figure("k'", f"speed with full output less speed with none, {name} case", "r_on + r_off", plant.gain_per_second,
                                "change_per_second", PLANT, {}, case))
        found.append(Figure("θ", f"dead time, {name} case", "declared", plant.theta, "time", PLANT, {}, case))
    return found
