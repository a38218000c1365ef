"""How often the controller looks and how it forms a pulse: the slowest and least favourable of the panel's."""

from specgen.model.panel import Controller, Panel
from specgen.process.tuning import Pulse

DEFAULT = Controller(name="any controller")


def scan_and_pulse(panel: Panel) -> tuple[float, Pulse]:
    """Return the longest scan [s] and the way pulses are formed; latched where any controller does so, since a loop may be wired to any."""
    controllers = panel.controllers or (DEFAULT,)
    pulse: Pulse = "ramp" if all(controller.pulse == "ramp" for controller in controllers) else "latched"
    return max(float(controller.scan) for controller in controllers), pulse
