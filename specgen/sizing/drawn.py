"""What a contact device leaves in the panel as heat, and what its load takes from the control supply."""

from specgen.core.figure import Figure
from specgen.model.devices import Contactor, Relay
from specgen.model.panel import Panel
from specgen.sizing.connection import CLOSE
from specgen.sizing.current import LoadCurrent
from specgen.sizing.device import Drawn

JOULE = "Joule heat in the poles, and the power of the coils"


def loss_figure(device: Contactor | Relay, load: LoadCurrent, coils: float) -> Figure:
    r"""Heat that a contactor or relay leaves in the panel while it is on.

    Parameters
    ----------
    device : Contactor or Relay
        The device; its loss per pole holds at its resistive current.
    load : LoadCurrent
        What its poles carry.
    coils : float
        Power of its coil and of an interposing relay's [W].

    Returns
    -------
    Figure
        The loss [W].

    Notes
    -----
    :math:`P_v = p P_p (I_b/I_{ref})^2 + P_{coil}`, one pole a live conductor.

    References
    ----------
    Joule heat.
    """
    poles, at = load.connection.lines, float(device.resistive_current)
    loss = poles * float(device.loss_per_pole) * (load.current / at) ** 2 + coils
    given = {
        "p": (float(poles), "number"), "P_p": (float(device.loss_per_pole), "power"), "I_b": (load.current, "current"),
        "I_ref": (at, "current"), "P_coil": (coils, "power"),
    }  # fmt: skip
    return Figure("P_v", "loss in the panel at full output", "p P_p (I_b/I_ref)^2 + P_coil", loss, "power", JOULE, given)


def load_drawn(load: LoadCurrent, panel: Panel) -> tuple[Drawn, ...]:
    """Return what the load itself takes from the control supply; nothing where it is fed from the mains or from the machine."""
    fed, control = load.connection, panel.control_supply
    if fed.way != "control" or fed.kind != control.kind or abs(fed.voltage / control.voltage - 1) > CLOSE:
        return ()
    return (Drawn("the element", load.current, max(load.current, load.inrush or 0.0), inside=False),)
