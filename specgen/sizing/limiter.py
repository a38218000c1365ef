"""What stops or announces a stuck output: the independent limiter and the independent alarm, as numbers and parts."""

from dataclasses import dataclass
from math import ceil, floor
from typing import Literal

from scipy.optimize import brentq

from specgen.core.figure import Figure
from specgen.process.box import Box
from specgen.process.fault_cases import limiter_case
from specgen.sizing.candidate import Assumption
from specgen.sizing.rounding import SLACK

Switch = Literal["contactor", "drive_contactor", "shut_off_valve", "burner_valves"]
SWITCHES: dict[Switch, str] = {
    "contactor": "contactor in the power path",
    "drive_contactor": "contactor in the supply of the drive",
    "shut_off_valve": "safety shut-off valve in the medium, closed without power",
    "burner_valves": "safety shut-off valves of the burner, opened by its burner control",
}


@dataclass(frozen=True, slots=True)
class Window:
    """Where something independent can be set: from the end of normal running to the latest value short of the danger.

    ``running``, ``latest`` and ``danger`` [value]; ``outward`` is +1 where the danger lies above. ``softest`` [value] is the latest
    from which the value also comes to rest short of the danger once dead time and second lag have run out, where there is one.
    """

    outward: int
    running: float
    latest: float
    danger: float
    softest: float | None = None

    @property
    def open(self) -> bool:
        """Tell whether there is any room."""
        return self.outward * (self.latest - self.running) > 0

    def clear(self, value: float) -> float:
        """Return how far a value lies beyond normal running [change]; negative where it lies within."""
        return self.outward * (value - self.running)

    def short(self, value: float) -> float:
        """Return how far a value lies short of the danger [change]; negative where it lies beyond."""
        return self.outward * (self.danger - value)


@dataclass(frozen=True, slots=True)
class LimiterDesign:
    """The independent limiter of a loop: -F2 with its own sensor -B2, the switching device -Q2 and the reset -S2.

    ``set`` [value] is None where normal running leaves no room for one: the loop is then held by rule S1, and the limiter stays part of
    it. ``acts_at`` is the true value when it acts, ``peaks_at`` the farthest that follows [value], None where the plant is not known.
    ``window`` is None where a stuck output passes no danger, or nobody knows. ``sensor`` is the kind of its own sensor.
    """

    set: float | None
    sensor_lag: float
    acts_at: float | None
    declared: bool
    figures: tuple[Figure, ...] = ()
    assumptions: tuple[Assumption, ...] = ()
    peaks_at: float | None = None
    outward: int = 1
    window: Window | None = None
    sensor: str = ""
    resets: Literal["manual", "automatic"] = "manual"
    switch: Switch = "contactor"
    case: str = ""

    @property
    def clear_of_running(self) -> float | None:
        """Return how far it is set beyond normal running [change]."""
        return None if self.window is None or self.set is None else self.window.clear(self.set)

    @property
    def short_of_danger(self) -> float | None:
        """Return how far the true value is still short of the danger when it acts [change]."""
        return None if self.window is None or self.acts_at is None else self.window.short(self.acts_at)

    @property
    def coasts_past(self) -> bool:
        """Tell whether the value still passes the danger after the limiter has acted in time: on dead time and stored heat."""
        return self.window is not None and self.peaks_at is not None and self.window.short(self.peaks_at) <= 0


@dataclass(frozen=True, slots=True)
class AlarmDesign:
    """The alarm, independent of the loop, against an output stuck off: sensor -B3 and lamp with horn -P1.

    ``set`` [value] is None where there is no room; ``acts_at`` [value] is the true value when it comes. ``declared`` tells that it is an
    alarm of the loop file, which then has to be independent of the controller.
    """

    side: Literal["high", "low"]
    set: float | None
    sensor_lag: float
    acts_at: float | None
    window: Window
    declared: bool
    consequence: str
    sensor: str
    figures: tuple[Figure, ...] = ()
    assumptions: tuple[Assumption, ...] = ()


def set_value(window: Window, step: float | None) -> float | None:
    """Return the set value midway in the room, on the setting step, rounded towards normal running: the earlier, the safer.

    Parameters
    ----------
    window : Window
        The room; the softest latest value counts where it leaves any.
    step : float or None
        Setting step [change]; None where nothing is known of it.

    Returns
    -------
    float or None
        None where there is no room. Where no step lies in the room, the middle itself.

    Examples
    --------
    >>> set_value(Window(1, 80.61, 93.39, 95.0), 0.1), set_value(Window(-1, 3.93, -2.80, -3.0), 0.1)
    (87.0, 0.6)
    >>> set_value(Window(1, 80.0, 93.0, 95.0, softest=84.0), 0.5), set_value(Window(1, 95.0, 93.0, 95.0), 0.5)
    (82.0, None)
    """
    if not window.open:
        return None
    latest = window.latest
    if window.softest is not None and window.clear(window.softest) > 0:
        latest = window.softest
    middle = (window.running + latest) / 2
    if step is None:
        return middle
    inward, outward = (floor, ceil) if window.outward > 0 else (ceil, floor)
    slack = SLACK * window.outward
    for rounded in (inward(middle / step + slack) * step, outward(middle / step - slack) * step):
        value = round(rounded, 12)
        if window.clear(value) > 0 and window.outward * (latest - value) > 0:
            return value
    return middle


def softest(box: Box, window: Window, sensor_lag: float) -> float | None:
    """Return the latest set value from which the value also comes to rest short of the danger; None where there is none in the room.

    Parameters
    ----------
    box : Box
        The loop's plant.
    window : Window
        Between normal running and the latest value by the sensor's lag alone.
    sensor_lag : float
        Lag of the limiter's own sensor [s].

    Notes
    -----
    After the limiter has acted the dead time still passes at full output, then the second lag empties (``process.fault_cases``).
    """
    if not window.open:
        return None

    def left(value: float) -> float:
        return window.short(limiter_case(box, value, sensor_lag).peaks_at)

    if left(window.running) <= 0:
        return None
    if left(window.latest) >= 0:
        return window.latest
    low, high = sorted((window.running, window.latest))
    return float(brentq(left, low, high, xtol=1e-6 * (high - low)))


__all__ = ["SWITCHES", "AlarmDesign", "LimiterDesign", "Switch", "Window", "set_value", "softest"]
