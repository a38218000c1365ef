"""Whether an analogue output can drive the inputs wired to it: in series for a current, in parallel for a voltage."""

from specgen.sizing.candidate import Unsized
from specgen.sizing.controller import OutputSide
from specgen.sizing.device import Drive

Driven = tuple[tuple[Drive, ...], Unsized | None]


def analogue_drive(signal: str, resistance: float | None, count: int, side: OutputSide, field: str) -> Driven:
    """Return what the inputs ask of an analogue output.

    Parameters
    ----------
    signal : str
        Such as ``4-20 mA`` or ``0-10 V``.
    resistance : float or None
        Of one input [ohm]; None where it is not declared.
    count : int
        Inputs wired to the output.
    side : OutputSide
        The controller's output.
    field : str
        The path that would declare the resistance.

    Returns
    -------
    tuple of Drive, and Unsized or None
        Inputs of a current loop in series against the highest burden; inputs of a voltage in parallel, at the signal's top,
        against the output's current.

    References
    ----------
    Ohm's law.
    """
    if resistance is None:
        return (), Unsized("the resistance of the input is not declared", (field,))
    inputs = "the input" if count == 1 else f"{count} inputs"
    if signal.endswith("mA"):
        if side.burden is None:
            return (), Unsized(f"the highest burden of the output of {side.controller} is not declared", ("controllers.outputs.burden",))
        joined = "" if count == 1 else " in series"
        return (Drive(f"the resistance of {inputs}{joined}", count * resistance, side.burden, "resistance"),), None
    if side.drive is None:
        return (), Unsized(f"the current of the output of {side.controller} is not declared", ("controllers.outputs.drive",))
    top = float(signal.partition("-")[2].split()[0])
    joined = "" if count == 1 else " in parallel"
    return (Drive(f"the current into {inputs}{joined} at {top:g} V", count * top / resistance, side.drive),), None
