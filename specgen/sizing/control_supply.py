"""What the control supply has to carry: every coil, input, controller and valve, holding and at switch-on."""

from collections.abc import Sequence
from dataclasses import dataclass

from specgen.core.figure import Figure
from specgen.model.panel import ControlSupply

RESERVE = 0.2  # of what it carries is kept in reserve (rule E4)


@dataclass(frozen=True, slots=True)
class Taken:
    """One taker of the control supply: what holds it and what flows at switch-on [A]."""

    what: str
    hold: float
    inrush: float
    loop: str = ""


@dataclass(frozen=True, slots=True)
class ControlLoad:
    """Everything the control supply carries.

    ``continuous`` [A] with everything on, ``inrush`` [A] with everything switched on at once, as when the supply returns;
    ``capacity`` [A] is the declared one, ``needed`` [A] the larger of the two with the reserve.
    """

    continuous: float
    inrush: float
    capacity: float
    taken: tuple[Taken, ...]
    figures: tuple[Figure, ...] = ()

    @property
    def needed(self) -> float:
        """Return the capacity that is needed [A]."""
        return (1 + RESERVE) * max(self.continuous, self.inrush)


def control_load(supply: ControlSupply, taken: Sequence[Taken]) -> ControlLoad:
    r"""Add up what the control supply carries.

    Parameters
    ----------
    supply : ControlSupply
        Its declared capacity.
    taken : sequence of Taken
        Everything fed from it.

    Returns
    -------
    ControlLoad
        No coincidence is taken off: a supply that returns switches everything on at once.

    Notes
    -----
    :math:`I = \sum I_h`, :math:`I_{in} = \sum I_{in,i}`, and with the reserve :math:`1.2 \max(I, I_{in})`.

    References
    ----------
    Common practice, no source: 20 to 30 percent of reserve.

    Examples
    --------
    >>> found = control_load(ControlSupply(capacity="2 A"), [Taken("coil", 0.5, 0.5), Taken("valve", 0.2, 0.9)])
    >>> round(found.continuous, 3), round(found.inrush, 3), round(found.needed, 3)
    (0.7, 1.4, 1.68)
    """
    continuous = sum(part.hold for part in taken)
    inrush = sum(max(part.hold, part.inrush) for part in taken)
    needed = (1 + RESERVE) * max(continuous, inrush)
    given = {"I_c": (continuous, "current"), "I_in": (inrush, "current")}
    source = "the list of what is fed from it"
    figures = (
        Figure("I_c", "continuous current of the control supply", "Σ I_h", continuous, "current", source, {}),
        Figure("I_in", "current at switch-on, everything at once", "Σ I_in", inrush, "current", source, {}),
        Figure("I_n", "capacity needed with the reserve", "1.2 max(I_c, I_in)", needed, "current", "rule E4", given),
    )
    return ControlLoad(continuous, inrush, float(supply.capacity), tuple(taken), figures)
