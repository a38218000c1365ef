"""Where a load is connected: three phases, two lines, one line and neutral, or the control supply, by its voltage."""

from dataclasses import dataclass
from math import sqrt
from typing import Literal

from specgen.model.panel import ControlSupply, Supply
from specgen.sizing.candidate import Unsized

Way = Literal["three_phase", "line_to_line", "line_to_neutral", "control"]
CLOSE = 0.10 + 1e-9  # a name-plate voltage within 10 percent of the supply's is the supply's
_SAID = {"line_to_line": "between lines", "line_to_neutral": "to neutral", "control": "of the control supply"}
_LINES = {"three_phase": 3, "line_to_line": 2, "line_to_neutral": 1, "control": 1}


@dataclass(frozen=True, slots=True)
class Connection:
    """How a load is connected.

    ``voltage`` [V] is the supply's rated voltage across it (between lines where it has three phases), ``high`` and
    ``low`` the ends of its tolerance; ``kind`` is a.c. or d.c.; ``lines`` is how many live conductors feed it.
    """

    way: Way
    voltage: float
    high: float
    low: float
    kind: Literal["ac", "dc"] = "ac"

    @property
    def lines(self) -> int:
        """Return the number of live conductors that a switch has to open."""
        return _LINES[self.way]


def mains_voltages(supply: Supply) -> dict[Way, float]:
    r"""Voltages between which single-phase loads can be connected.

    Parameters
    ----------
    supply : Supply
        The incoming supply.

    Returns
    -------
    dict
        ``line_to_line`` and ``line_to_neutral``, where the system has them [V].

    Notes
    -----
    To neutral: :math:`U/\sqrt3` of a star, :math:`U/2` of a split phase and of the two near lines of a high-leg delta;
    none of a delta.
    """
    voltage = float(supply.voltage)
    if supply.phases == 1:
        if supply.system == "split":
            return {"line_to_line": voltage, **({"line_to_neutral": voltage / 2} if supply.neutral else {})}
        return {"line_to_neutral" if supply.neutral else "line_to_line": voltage}
    found: dict[Way, float] = {"line_to_line": voltage}
    if supply.neutral and supply.system != "delta":
        found["line_to_neutral"] = voltage / 2 if supply.system == "high_leg" else voltage / sqrt(3)
    return found


def connect(voltage: float, phases: int, supply: Supply) -> Connection | Unsized:
    """Find how a mains load is connected from its name-plate.

    Parameters
    ----------
    voltage : float
        Rated voltage of the load [V].
    phases : int
        Its phases, 1 or 3.
    supply : Supply
        The incoming supply.

    Returns
    -------
    Connection or Unsized
        Unsized where no voltage of the supply lies within 10 percent of the load's.

    References
    ----------
    Common practice, no source.
    """
    if phases == 3:  # noqa: PLR2004  three phases
        if supply.phases != 3:  # noqa: PLR2004  three phases
            return Unsized("the load has three phases and the supply has one", ("element.phases", "supply.phases"))
        if not _fits(voltage, supply.voltage):
            said = f"{voltage:g} V is not within 10 percent of the supply's {supply.voltage.text} between lines"
            return Unsized(said, ("element.voltage", "supply.voltage"))
        return _on_mains("three_phase", supply.voltage, supply)
    offered = mains_voltages(supply)
    fitting = [(abs(voltage / nominal - 1), way) for way, nominal in offered.items() if _fits(voltage, nominal)]
    if not fitting:
        there = ", ".join(f"{nominal:.4g} V {_SAID[way]}" for way, nominal in offered.items())
        return Unsized(f"{voltage:g} V fits none within 10 percent: {there}", ("element.voltage", "supply.voltage"))
    way = min(fitting)[1]
    return _on_mains(way, offered[way], supply)


def connect_coil(voltage: float, supply: Supply, control: ControlSupply) -> Connection | Unsized:
    """Find what feeds a coil or another small load: the control supply where its voltage fits, else the mains.

    Parameters
    ----------
    voltage : float
        Rated voltage of the load [V].
    supply, control
        The incoming supply and the control supply.

    Returns
    -------
    Connection or Unsized
        A d.c. control supply is regulated and taken at its rated voltage; an a.c. one follows the mains' tolerance.
    """
    if _fits(voltage, control.voltage):
        return control_connection(supply, control)
    found = connect(voltage, 1, supply)
    if isinstance(found, Unsized):
        said = f"{found.because}, {control.voltage.text} {_SAID['control']}"
        return Unsized(said, (*found.needs, "control_supply.voltage"))
    return found


def control_connection(supply: Supply, control: ControlSupply) -> Connection:
    """Return the connection to the control supply."""
    nominal = float(control.voltage)
    share = float(supply.tolerance) if control.kind == "ac" else 0.0
    return Connection("control", nominal, nominal * (1 + share), nominal * (1 - share), control.kind)


def _on_mains(way: Way, nominal: float, supply: Supply) -> Connection:
    share = float(supply.tolerance)
    return Connection(way, float(nominal), float(nominal) * (1 + share), float(nominal) * (1 - share))


def _fits(voltage: float, nominal: float) -> bool:
    return abs(voltage / nominal - 1) <= CLOSE
