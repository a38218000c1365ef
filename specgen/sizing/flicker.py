"""Whether a switched load flickers the lights of a public network, and from which cycle time on it does not."""

from collections.abc import Mapping
from dataclasses import dataclass
from math import hypot, inf, isfinite, sqrt

from specgen.catalogue.load import Catalogue, load_catalogue
from specgen.core.figure import Figure
from specgen.model.loop import Loop
from specgen.model.panel import Panel, Supply
from specgen.model.traits import traits_of
from specgen.process.flicker import Curve, severity, shortest_cycle, voltage_change
from specgen.sizing.candidate import Assumption, Unsized
from specgen.sizing.connection import Connection, Way
from specgen.sizing.current import LoadCurrent, load_current

LAMPS = (220.0, 250.0)  # V to neutral: the curve is that of lamps for this
MAINS = 50.0  # Hz
_OVER = {"line_to_neutral": ("line and neutral", "I Z/U"), "line_to_line": ("both lines", "I Z/U"), "three_phase": ("one line", "I Z √3/U")}


@dataclass(frozen=True, slots=True)
class OutOfScope:
    """Why the standard's limits say nothing of a load."""

    because: str


@dataclass(frozen=True, slots=True)
class Flicker:
    """What a load's switching does to the supply's voltage.

    ``change`` is the relative voltage change of one switching [1], ``most`` the largest that is allowed whatever the rate and
    ``limit`` the long-term severity that is allowed; ``shortest`` is the cycle from which on it is kept [s], infinite where none is long
    enough. ``starts`` tells that it is the start of a motor. ``is_single`` tells that three phases would lower it.
    """

    change: float
    most: float
    limit: float
    shortest: float
    starts: bool
    is_single: bool
    impedance: float
    curve: Curve
    figures: tuple[Figure, ...]
    assumptions: tuple[Assumption, ...]

    def severity(self, cycle: float) -> float:
        """Return Plt for steady cycling [1]."""
        return severity(self.change, cycle, self.curve)

    def figures_at(self, cycle: float) -> tuple[Figure, ...]:
        """Return the figures with the severity at a cycle time."""
        given = {"d": (self.change, "fraction"), "T": (cycle, "time")}
        plt = Figure("Plt", "long-term flicker severity", "d/d(Pst = 1, 120 s/T a minute)", self.severity(cycle), "number",
                     "IEC 61000-3-3:2013 figure 2, straight in logarithms between its points", given)  # fmt: skip
        return (*self.figures, plt)


def flicker_of(loop: Loop, panel: Panel) -> Flicker | OutOfScope | Unsized:
    """Return what a loop's load does to the voltage of a public network when it is switched.

    Parameters
    ----------
    loop, panel : Loop, Panel
        The loop with its element; the panel's supply with its impedance, the reference impedance where none is declared.

    Returns
    -------
    Flicker, OutOfScope or Unsized
        Out of scope on a private network, above 16 A a phase, from the control supply, and where the lamps are others than the curve's.

    Notes
    -----
    Loads of resistance change the voltage by the supply's resistance alone. A motor is taken with six times its rated current over
    the whole impedance, as if it stayed at that: its start and stop both count as such a change, which errs to the safe side. A
    declared impedance is that of line and neutral together and is divided as the reference is.

    References
    ----------
    IEC 61000-3-3 clauses 1, 5, 6.4 and figure 2.
    """
    if panel.supply.network != "public":
        return OutOfScope("the network is private")
    catalogue = load_catalogue()
    load = load_current(loop.element, panel, catalogue)
    if isinstance(load, Unsized):
        return load
    fed = load.connection
    if fed.way == "control":
        return OutOfScope("the load is fed by the control supply")
    to_neutral = _to_neutral(panel.supply, fed)
    if not LAMPS[0] <= to_neutral <= LAMPS[1] or panel.supply.frequency != MAINS:
        said = f"the limits hold for {LAMPS[0]:g} V to {LAMPS[1]:g} V to neutral at {MAINS:g} Hz"
        return OutOfScope(f"{said}; here it is {to_neutral:.0f} V at {panel.supply.frequency:g} Hz")
    motor = traits_of(loop.element).motor
    running = _running(loop, load, fed, motor=motor)
    scope = _figure(catalogue, "flicker_scope")
    if running > scope:
        return OutOfScope(f"the load takes {running:.3g} A a phase, more than the {scope:g} A up to which the limits hold")
    return _switched(panel, catalogue, fed, running, motor=motor)


def _running(loop: Loop, load: LoadCurrent, fed: Connection, *, motor: bool) -> float:
    """Return the current at the supply's rated voltage [A]: a resistance follows the voltage, a motor's is its name-plate's."""
    rated = float(getattr(loop.element, "voltage", None) or fed.voltage)
    return load.rated if motor else load.rated * fed.voltage / rated


def _switched(panel: Panel, catalogue: Catalogue, fed: Connection, running: float, *, motor: bool) -> Flicker:
    factor = _figure(catalogue, "motor_starting_current") if motor else 1.0
    impedance, assumptions = _impedance(panel.supply, catalogue, fed.way, whole=motor)
    against = fed.voltage / sqrt(3) if fed.way == "three_phase" else fed.voltage
    change = voltage_change(factor * running, impedance, against)
    curve = tuple((float(point.value.rate), float(point.value.change)) for point in catalogue.flicker)
    limit = _figure(catalogue, "flicker_long_term")
    # a heater's change is steady, a motor's start a passing one
    most = _figure(catalogue, "flicker_highest_change") if motor else _figure(catalogue, "flicker_steady_change")
    shortest = shortest_cycle(change, limit, curve)
    path, formula = _OVER[fed.way]
    given = {"I": (factor * running, "current"), "Z": (impedance, "resistance"), "U": (fed.voltage, "voltage")}
    figures = [
        Figure("d", f"relative voltage change at each switching, over {path}", formula, change, "fraction",
               "Ohm's law; IEC 61000-3-3:2013 clause 6.4 (from memory)", given),
    ]  # fmt: skip
    if isfinite(shortest) and shortest > 0:
        figures.append(
            Figure("T_f", "shortest cycle without flicker", "120 s/r, d(r) = d/0.65", shortest, "time",
                   "IEC 61000-3-3:2013 figure 2, straight in logarithms between its points", {"d": (change, "fraction")})
        )  # fmt: skip
    if motor:
        why = "of its rated current, direct on line (common practice, no source)"
        assumptions = (*assumptions, Assumption("starting current", f"{factor:g} times", why))
    return Flicker(change, most, limit, shortest if change <= most else inf, motor, fed.way != "three_phase", impedance, curve,
                   tuple(figures), assumptions)  # fmt: skip


def _impedance(supply: Supply, catalogue: Catalogue, way: Way, *, whole: bool) -> tuple[float, tuple[Assumption, ...]]:
    """Return what the supply opposes to a load's current [ohm]: its resistance, or with ``whole`` its impedance."""
    line = complex(_figure(catalogue, "flicker_line_resistance"), _figure(catalogue, "flicker_line_reactance"))
    neutral = complex(_figure(catalogue, "flicker_neutral_resistance"), _figure(catalogue, "flicker_neutral_reactance"))
    parts: Mapping[str, complex] = {"line_to_neutral": line + neutral, "line_to_line": 2 * line, "three_phase": line}
    part = parts[way]
    reference = hypot(part.real, part.imag) if whole else part.real
    if supply.impedance is None:
        said = f"{(line + neutral).real:g} + j {(line + neutral).imag:g} ohm, line and neutral"
        return reference, (Assumption("supply.impedance", said, "not declared: the reference impedance of IEC 61000-3-3 (from memory)"),)
    # a declared impedance may all be resistance, and counts so
    return float(supply.impedance) * part.real / (line + neutral).real, ()


def _to_neutral(supply: Supply, fed: Connection) -> float:
    """Return the voltage that the lamps of the network have [V]."""
    if fed.way == "line_to_neutral":
        return fed.voltage
    if supply.phases == 1 or supply.system == "delta":
        return fed.voltage
    return fed.voltage / sqrt(3)


def _figure(catalogue: Catalogue, name: str) -> float:
    return float(catalogue.practice(name).value.quantity)
