"""What the identification of a step test answers: the numbers with their intervals, or why there are none."""

from dataclasses import dataclass
from typing import Literal

from specgen.process.step_test_response import Array

Reason = Literal[
    "bad_output",
    "coarse_sampling",
    "constant_value",
    "gaps",
    "no_step",
    "short_record",
    "time_not_increasing",
    "too_few_points",
    "weak_step",
    "wide_interval",
]


@dataclass(frozen=True, slots=True)
class Interval:
    """A fitted number with the ends of its 95 % interval, ``low <= value <= high``."""

    value: float
    low: float
    high: float

    @property
    def width(self) -> float:
        """Distance between the ends."""
        return self.high - self.low

    def times(self, low: float, high: float) -> "Interval":
        """Return the interval of the number times a positive factor that lies anywhere from ``low`` to ``high``.

        Examples
        --------
        >>> Interval(10.0, 9.0, 11.0).times(0.5, 2.0)
        Interval(value=10.0, low=4.5, high=22.0)
        """
        ends = [end * factor for end in (self.low, self.high) for factor in (low, high)]
        return Interval(self.value * (low * high) ** 0.5, min(ends), max(ends))

    def magnitude(self) -> "Interval":
        """Return the interval of the size of the number; the ends are swapped where it is negative.

        Examples
        --------
        >>> Interval(-10.0, -11.0, -9.0).magnitude()
        Interval(value=10.0, low=9.0, high=11.0)
        """
        return Interval(-self.value, -self.high, -self.low) if self.value < 0.0 else self


@dataclass(frozen=True, slots=True)
class NotIdentified:
    """Why a recording says nothing that could be designed with, and what to record instead."""

    reason: Reason
    text: str
    hint: str


@dataclass(frozen=True, slots=True)
class Record:
    """The samples that were used: time [s], output [fraction], value, its fit, and how many rows were left out.

    ``dropped`` rows had an empty cell; of the others every ``every``-th was used.
    """

    times: Array
    output: Array
    value: Array
    fitted: Array
    dropped: int
    every: int

    @property
    def residuals(self) -> Array:
        """What the fit leaves of each sample."""
        return self.value - self.fitted


@dataclass(frozen=True, slots=True)
class Identified:
    """A first-order response with dead time, found in a recording; each interval is the 95 % interval.

    Attributes
    ----------
    gain : Interval
        Steady change from no output to full output, negative where the value falls [value].
    tau, theta : Interval
        Time constant and dead time of the true value, the sensor's lag taken out [s].
    start : Interval
        Fitted value when the recording begins [value].
    drift : Interval
        Slow change that the output does not explain [value/s].
    rest : Interval or None
        Where the value settles with no output [value]; None where the value was not seen at rest first.
    rest_because : str
        On what the rest value stands, or why there is none.
    at_rest_before : bool
        False where the fit needed a decay from an earlier disturbance.
    response : float
        Largest change of the value that the output made in the recording [value].
    noise, correlation, resolution : float
        Standard deviation of the residuals [value], correlation of one with the next [1], step of the recorded value [value].
    last_before_change : float
        Time between the first sample that shows the output's first change and the one before [s]; the true dead time is longer by as
        much of it as the output really moved earlier.
    record : Record
        The samples and their fit.
    """

    gain: Interval
    tau: Interval
    theta: Interval
    start: Interval
    drift: Interval
    rest: Interval | None
    rest_because: str
    at_rest_before: bool
    response: float
    noise: float
    correlation: float
    resolution: float
    last_before_change: float
    record: Record


def at_rated_supply(gain: Interval, rated: float, during_test: float | None, tolerance: float = 0.0) -> Interval:
    """Gain of a resistive element at its rated supply, from the one seen in a test.

    Parameters
    ----------
    gain : Interval
        Gain at the supply of the test [value].
    rated : float
        Rated supply [V].
    during_test : float or None
        Supply during the test [V]; None where nobody noted it.
    tolerance : float
        Tolerance of the supply [fraction]; used only where the supply of the test is not known.

    Returns
    -------
    Interval
        Gain at rated supply [value]; widened by the whole tolerance both ways where the supply of the test is not known.

    Raises
    ------
    ValueError
        A voltage is not positive, or the tolerance not within 0 to 1.

    Notes
    -----
    The power of a resistance goes with the square of its voltage: :math:`K_r = K (V_r/V_t)^2`.

    Examples
    --------
    >>> at_rated_supply(Interval(100.0, 98.0, 102.0), rated=400.0, during_test=200.0)
    Interval(value=400.0, low=392.0, high=408.0)
    >>> wide = at_rated_supply(Interval(100.0, 98.0, 102.0), rated=400.0, during_test=None, tolerance=0.1)
    >>> round(wide.low, 1), round(wide.high, 1)
    (81.0, 125.9)
    """
    if rated <= 0.0 or (during_test is not None and during_test <= 0.0) or not 0.0 <= tolerance < 1.0:
        raise ValueError("voltages are positive and the tolerance lies within 0 to 1")
    if during_test is not None:
        factor = (rated / during_test) ** 2
        return gain.times(factor, factor)
    widened = gain.times(1.0 / (1.0 + tolerance) ** 2, 1.0 / (1.0 - tolerance) ** 2)
    return Interval(gain.value, widened.low, widened.high)
