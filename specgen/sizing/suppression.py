"""What is fitted across a coil so that the contact that switches it survives, suited to the kind of supply."""

from collections.abc import Iterable
from math import pi

from specgen.core.say import digits
from specgen.model.panel import Panel
from specgen.sizing.chain import COIL_SHARES
from specgen.sizing.current import LoadCurrent
from specgen.sizing.device import Drawn, Suppressor

CAPACITANCE = 100e-9  # F, the usual RC unit across a coil (common practice)
HOLDS = 0.1  # of a coil's holding current: leakage below it holds nothing in (common practice)
COILS = "the coil of "


def rc_leakage(voltage: float, frequency: float) -> float:
    r"""Return what flows through the usual RC unit at mains frequency [A].

    Parameters
    ----------
    voltage, frequency : float
        R.m.s. voltage [V] and frequency [Hz].

    Notes
    -----
    :math:`I = 2 \pi f C U`; the resistor of about 100 ohm hardly counts against 32 kilohm.

    Examples
    --------
    >>> round(rc_leakage(230, 50) * 1000, 2)
    7.23
    """
    return 2 * pi * frequency * CAPACITANCE * voltage


def suppressors(drawn: Iterable[Drawn], load: LoadCurrent, panel: Panel) -> tuple[Suppressor, ...]:
    """Return what is fitted across each coil of a chain, and across a load that is one itself.

    Parameters
    ----------
    drawn : iterable of Drawn
        What takes current from the control supply; inputs of solid-state switches have no coil.
    load : LoadCurrent
        The load: a coil where its utilisation category says so.
    panel : Panel
        Kind, voltage and frequency of the supplies.

    Returns
    -------
    tuple of Suppressor
        Direct current: a diode with a Zener diode, since a plain diode lets the coil drop out several times later.
        Alternating current: an RC unit where its leakage is far below the holding current, else a varistor.

    References
    ----------
    Common practice, no source.
    """
    control, frequency = panel.control_supply, float(panel.supply.frequency)
    coils = [coil for coil in drawn if coil.what.startswith(COILS)]
    found = [_across(coil.what, control.kind, float(control.voltage), frequency, coil.hold) for coil in coils]
    if load.category in COIL_SHARES:
        found.append(_across("the element", load.connection.kind, load.connection.voltage, frequency, load.current))
    return tuple(found)


def _across(what: str, kind: str, voltage: float, frequency: float, hold: float) -> Suppressor:
    if kind == "dc":
        return Suppressor(what, "diode with Zener diode", "a plain diode would let it drop out several times later")
    leaks = rc_leakage(voltage, frequency)
    if leaks <= HOLDS * hold:
        why = f"it leaks {digits(leaks * 1000)} mA of {digits(hold * 1000)} mA that hold the coil"
        return Suppressor(what, "RC unit 100 nF, 100 ohm", why, leaks)
    return Suppressor(what, "varistor", f"an RC unit would leak {digits(leaks * 1000)} mA of {digits(hold * 1000)} mA that hold the coil")
