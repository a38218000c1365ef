"""What a simulated loop is watched for, and what it did."""

from dataclasses import dataclass, field
from math import inf

REST = 0.02
"""Share of the band within which a loop rests: a run may then end early."""


@dataclass(frozen=True, slots=True)
class Band:
    """Band around the setpoint.

    Parameters
    ----------
    below, above : float
        Its width on each side, zero or more [value unit].
    """

    below: float = 0.0
    above: float = 0.0

    def holds(self, mean: float, excess: float, gain: float) -> bool:
        """Tell whether a loop rests so far inside the band that it may be left alone.

        Parameters
        ----------
        mean : float
            Mean of the measurement over the last cycle [value unit].
        excess : float
            Output less the output that holds the load [1].
        gain : float
            Kc, which makes output of distance [1/value unit].

        Returns
        -------
        bool
            True where both are a small share of the band.
        """
        small = REST * (self.below + self.above)
        return abs(mean) < small and abs(excess) < small * gain


@dataclass(frozen=True, slots=True)
class Run:
    """What a simulated loop did; distances from the setpoint [value unit], times [s].

    Parameters
    ----------
    times, values : tuple of float
        True value at each change of the output and at each latch.
    outputs : tuple of float
        Output that was latched, one a cycle [1].
    highest, lowest : float
        Extremes of the true value, also between the recorded times.
    time_to_band : float
        Time after which the value stays inside the band; ``inf`` where it was outside at the end.
    highest_at : float
        When the true value was highest.
    """

    times: tuple[float, ...]
    values: tuple[float, ...]
    outputs: tuple[float, ...]
    highest: float
    lowest: float
    time_to_band: float
    highest_at: float = 0.0


@dataclass(slots=True)
class Watch:
    """Extremes of the true value, when it was last outside the band, and the record of a run."""

    band: Band
    last_outside: float
    highest: float = -inf
    lowest: float = inf
    highest_at: float = 0.0
    times: list[float] = field(default_factory=list)
    values: list[float] = field(default_factory=list)
    outputs: list[float] = field(default_factory=list)

    def see(self, time: float, value: float) -> None:
        """Take note of a value that need not be recorded."""
        if value > self.highest:
            self.highest, self.highest_at = value, time
        self.lowest = min(self.lowest, value)
        if not -self.band.below <= value <= self.band.above:
            self.last_outside = time

    def keep(self, time: float, value: float) -> None:
        """Take note of a value and record it."""
        self.see(time, value)
        self.times.append(time)
        self.values.append(value)

    def run(self) -> Run:
        """Return the run."""
        ends_outside = self.last_outside >= self.times[-1]
        found = inf if ends_outside else self.last_outside
        return Run(tuple(self.times), tuple(self.values), tuple(self.outputs), self.highest, self.lowest, found, self.highest_at)
