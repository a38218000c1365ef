"""The delay of an actuator: how long it takes to follow the small moves of a settled loop."""

from specgen.core.figure import Figure
from specgen.model.loop import Loop
from specgen.sizing.candidate import Assumption

SHARE = 0.1  # of the whole travel: the moves that matter for margins are small
WHY = "the moves of a settled loop are small: a tenth of the whole travel is charged as delay (common practice, no source)"


def actuator_delay(loop: Loop) -> tuple[float, tuple[Figure, ...], tuple[Assumption, ...]]:
    """Return the delay an actuator adds [s], with its figure and the assumption behind it; nothing where it has no travel."""
    for name in ("stroke_time", "travel_time", "ramp_time"):
        given = getattr(loop.element, name, None)
        if given is None:
            continue
        whole = float(given.high) if hasattr(given, "high") else float(given)
        delay = SHARE * whole
        figure = Figure("θa", "delay of the actuator", f"0.1 × {name.replace('_', ' ')}", delay, "time", WHY, {name: (whole, "time")})
        return delay, (figure,), (Assumption(f"element.{name}", f"a tenth of {given.text}", WHY),)
    return 0.0, (), ()
