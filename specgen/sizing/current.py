"""Line current of an element at the supply's worse end, with its utilisation category."""

from dataclasses import dataclass
from math import sqrt

from specgen.catalogue.load import Catalogue
from specgen.catalogue.rows import MotorProduct
from specgen.catalogue.table import Known
from specgen.core.figure import Figure
from specgen.core.quantity import Range
from specgen.model.element import (
    DirectMotor,
    Element,
    FixedSpeedCompressor,
    GasBurner,
    ResistiveHeater,
    SolenoidValve,
    SpecialHeater,
    ThreePointValve,
    VariableSpeedMachine,
)
from specgen.model.panel import Panel
from specgen.sizing.candidate import Assumption, Unsized
from specgen.sizing.connection import Connection, connect, connect_coil

OHM = "Ohm's law"
POWER = "definition of active power"
_FORMULAS = {
    # design current at the supply's high end, by the number of live conductors
    3: "n P/(sqrt(3) U_r) U_max/U_r",
    2: "n P/U_r U_max/U_r",
    1: "n P/U_r U_max/U_r",
}


@dataclass(frozen=True, slots=True)
class LoadCurrent:
    """What flows in the line conductors with all units on.

    ``current`` [A] is at the supply's worse end, ``rated`` [A] at the name-plate's voltage. ``category`` is the
    utilisation category of a contact, ``solid_state_category`` that of a semiconductor. ``inrush`` [A] is None where
    nothing above the category's own test is declared. ``power`` [W] is drawn at that end, None where it is not known.
    """

    current: float
    rated: float
    connection: Connection
    category: str
    solid_state_category: str
    inrush: float | None = None
    power: float | None = None
    figures: tuple[Figure, ...] = ()
    assumptions: tuple[Assumption, ...] = ()


def load_current(element: Element, panel: Panel, catalogue: Catalogue) -> LoadCurrent | Unsized:
    r"""Line current of an element, all its units together.

    Parameters
    ----------
    element : Element
        The final element; of a range of power the high end counts.
    panel : Panel
        Its supply and control supply.
    catalogue : Catalogue
        Typical products of efficiency and power factor, where a motor is given by its power alone.

    Returns
    -------
    LoadCurrent or Unsized
        Unsized where the voltage fits nothing, a field is missing, or nothing is fed (a valve that takes a signal).

    Notes
    -----
    Resistive: :math:`I = n P/(\sqrt3 U_r) \cdot U_{max}/U_r`, without the root for one phase: the current follows the
    voltage, the power its square. Constant power: at the lowest voltage. Motors: rated.

    References
    ----------
    Ohm's law; utilisation categories of IEC 60947-4-1, 60947-4-3 and 60947-5-1.
    """
    match element:
        case ResistiveHeater() | SpecialHeater():
            return _heater(element, panel)
        case FixedSpeedCompressor() | DirectMotor():
            return _motor(element, panel, catalogue)
        case VariableSpeedMachine():
            return _drive(element, panel, catalogue)
        case SolenoidValve():
            return _solenoid(element, panel)
        case ThreePointValve():
            return _small("motor_current", "motor_voltage", element.motor_current, element.motor_voltage, element.count, panel)
        case GasBurner():
            return _small("control_current", "control_voltage", element.control_current, element.control_voltage, element.count, panel)
        case _:
            return Unsized("it takes a signal; no load current is switched")


_CATEGORIES = {
    "infrared_lamp_heater": ("AC-5b", "AC-55b"),
    "transformer_fed_heater": ("AC-6a", "AC-56a"),
}


def _heater(element: ResistiveHeater | SpecialHeater, panel: Panel) -> LoadCurrent | Unsized:
    fed = connect(element.voltage, element.phases, panel.supply)
    if isinstance(fed, Unsized):
        return fed
    power, voltage, count = element.power.high, float(element.voltage), element.count
    root = sqrt(3) if fed.lines == 3 else 1.0  # noqa: PLR2004  three phases
    rated = count * power / (root * voltage)
    current = rated * fed.high / voltage
    drawn = count * power * (fed.high / voltage) ** 2
    case = f"supply {panel.supply.tolerance.text} high"
    given = {"n": (float(count), "number"), "P": (power, "power"), "U_r": (voltage, "voltage"), "U_max": (fed.high, "voltage")}
    figures = [
        Figure("I_b", "line current at the highest supply", _FORMULAS[fed.lines], current, "current", OHM, given, case),
        Figure("P_max", "power at the highest supply", "n P (U_max/U_r)^2", drawn, "power", OHM, given, case),
    ]
    if element.connection == "delta" and fed.way == "three_phase":
        branch = current / sqrt(3)
        given_delta = {"I_b": (current, "current")}
        figures.append(Figure("I_ph", "current in each branch of the delta", "I_b/sqrt(3)", branch, "current", OHM, given_delta, case))
    inrush = None
    if isinstance(element, SpecialHeater) and element.inrush_factor is not None:
        inrush = float(element.inrush_factor) * current
        given_inrush = {"k": (float(element.inrush_factor), "number"), "I_b": (current, "current")}
        figures.append(Figure("I_in", "inrush current", "k I_b", inrush, "current", "declared factor", given_inrush, case))
    contact, solid = _CATEGORIES.get(element.kind, ("AC-1", "AC-51"))
    return LoadCurrent(current, rated, fed, contact, solid, inrush, drawn, tuple(figures), _high_end(element.power, "element.power"))


def _motor(element: FixedSpeedCompressor | DirectMotor, panel: Panel, catalogue: Catalogue) -> LoadCurrent | Unsized:
    fed = connect(element.voltage, element.phases, panel.supply)
    if isinstance(fed, Unsized):
        return fed
    declared = element.current if isinstance(element, FixedSpeedCompressor) else None
    if declared is not None:
        current = element.count * float(declared)
        given = {"n": (float(element.count), "number"), "I_r": (float(declared), "current")}
        figure = Figure("I_b", "rated line current of the motor", "n I_r", current, "current", "name-plate", given)
        return LoadCurrent(current, current, fed, "AC-3", "AC-53a", None, None, (figure,))
    if element.power is None:
        return Unsized("neither current nor power is declared", ("element.current", "element.power"))
    known = _product(element.power.high, catalogue, drive=False)
    if isinstance(known, Unsized):
        return known
    figure = _from_power(element.power.high, element.count, float(element.voltage), fed, known)
    assumed = (_assumed_product(known, "name-plate power is the shaft's"), *_high_end(element.power, "element.power"))
    return LoadCurrent(figure.value, figure.value, fed, "AC-3", "AC-53a", None, None, (figure,), assumed)


def _drive(element: VariableSpeedMachine, panel: Panel, catalogue: Catalogue) -> LoadCurrent | Unsized:
    missing = tuple(f"element.{name}" for name in ("voltage", "phases") if getattr(element, name) is None)
    if element.voltage is None or element.phases is None:
        return Unsized("the drive's supply is not declared", missing)
    fed = connect(element.voltage, element.phases, panel.supply)
    if isinstance(fed, Unsized):
        return fed
    known = _product(element.power.high, catalogue, drive=True)
    if isinstance(known, Unsized):
        return known
    figure = _from_power(element.power.high, element.count, fed.low, fed, known, f"supply {panel.supply.tolerance.text} low")
    rated = figure.value * fed.low / fed.voltage
    product = _assumed_product(known, "drive and motor together, a rectifier's current being far from a sine")
    assumed = (product, *_high_end(element.power, "element.power"))
    return LoadCurrent(figure.value, rated, fed, "AC-1", "AC-51", None, None, (figure,), assumed)


def _from_power(power: float, count: int, voltage: float, fed: Connection, known: Known[MotorProduct], case: str = "") -> Figure:
    product = float(known.value.product)
    root = sqrt(3) if fed.way == "three_phase" else 1.0
    given = {"n": (float(count), "number"), "P": (power, "power"), "U": (voltage, "voltage"), "k": (product, "number")}
    formula = "n P/(sqrt(3) U k)" if fed.way == "three_phase" else "n P/(U k)"
    return Figure("I_b", "line current from the power", formula, count * power / (root * voltage * product), "current",
                  f"{POWER}; k = efficiency x power factor: {known.row.cited}", given, case)  # fmt: skip


def _product(power: float, catalogue: Catalogue, *, drive: bool) -> Known[MotorProduct] | Unsized:
    fitting = [known for known in catalogue.motors if known.value.drive is drive and power <= known.value.up_to]
    if not fitting:
        return Unsized(f"no typical efficiency and power factor is tabulated for {power / 1000:g} kW", ("element.power",))
    return min(fitting, key=lambda known: known.value.up_to)


def _assumed_product(known: Known[MotorProduct], why: str) -> Assumption:
    said = f"{float(known.value.product):g}"
    return Assumption("efficiency x power factor", said, f"{why}; typical, to be replaced by the name-plate's current")


def _solenoid(element: SolenoidValve, panel: Panel) -> LoadCurrent | Unsized:
    fed = connect_coil(element.voltage, panel.supply, panel.control_supply)
    if isinstance(fed, Unsized):
        return fed
    voltage, power = float(element.voltage), float(element.coil_power)
    rated = element.count * power / voltage
    current = rated * fed.high / voltage
    case = "" if fed.high == fed.voltage else f"supply {panel.supply.tolerance.text} high"
    given = {"n": (float(element.count), "number"), "P": (power, "power"), "U_r": (voltage, "voltage"), "U_max": (fed.high, "voltage")}
    figures = [Figure("I_b", "holding current of the coil", _FORMULAS[1], current, "current", OHM, given, case)]
    inrush = None
    if element.coil_inrush is not None:
        inrush = current * float(element.coil_inrush) / power
        given_inrush = {"I_b": (current, "current"), "P_in": (float(element.coil_inrush), "power"), "P": (power, "power")}
        figures.append(Figure("I_in", "inrush current of the coil", "I_b P_in/P", inrush, "current", OHM, given_inrush, case))
    drawn = element.count * power * (fed.high / voltage) ** 2
    return LoadCurrent(current, rated, fed, _coil_category(fed), "AC-51", inrush, drawn, tuple(figures))


def _small(
    current_name: str, voltage_name: str, current: float | None, voltage: float | None, count: int, panel: Panel
) -> LoadCurrent | Unsized:
    """Return the declared current of a valve's motor or a burner's control, which the makers give as it flows."""
    if current is None or voltage is None:
        pairs = ((current_name, current), (voltage_name, voltage))
        needs = tuple(f"element.{name}" for name, value in pairs if value is None)
        return Unsized("what its contact carries is not declared", needs)
    assumptions: tuple[Assumption, ...] = ()
    fed = connect_coil(voltage, panel.supply, panel.control_supply)
    if isinstance(fed, Unsized):
        # a potential-free contact in a circuit of the machine's own
        fed = Connection("control", float(voltage), float(voltage), float(voltage), "ac")
        why = "fits no supply of the panel: taken as the machine's own"
        assumptions = (Assumption(f"element.{voltage_name}", f"{float(voltage):g} V a.c.", why),)
    total = count * float(current)
    given = {"n": (float(count), "number"), "I_r": (float(current), "current")}
    figure = Figure("I_b", "current of the contact", "n I_r", total, "current", "declared", given)
    return LoadCurrent(total, total, fed, _coil_category(fed), "AC-51", None, None, (figure,), assumptions)


def _coil_category(fed: Connection) -> str:
    return "DC-13" if fed.kind == "dc" else "AC-15"


def _high_end(power: Range, field: str) -> tuple[Assumption, ...]:
    if power.high == power.low:
        return ()
    return (Assumption(field, f"{power.high:g} W", f"of {power.text} the high end counts for what carries it"),)
