"""Two plants with one interface: a value that settles by itself and one that does not.

Everything is counted from the setpoint, in the sense of *more output*: with full output the value moves up, whatever the element does to
the real value. A loop that lowers its value is mirrored where the plant is made (``box``) and where results are shown.
"""

from dataclasses import dataclass
from math import inf
from typing import Protocol

from specgen.process.cycle_ripple import Ripple, integrating_ripple, lag_ripple
from specgen.process.exact_cycle import lagged_cycle, lagged_integrating_cycle
from specgen.process.limit_cycle import Cycle, integrating_cycle, timed_relay_cycle


class ProcessModel(Protocol):
    """What every plant answers; nothing downstream asks which kind it is."""

    @property
    def theta(self) -> float:
        """Return the dead time [s]."""

    @property
    def lag(self) -> float:
        """Return the second lag [s]."""

    @property
    def sensor_lag(self) -> float:
        """Return the lag of the measurement behind the true value [s]."""

    @property
    def tau(self) -> float:
        """Return the time constant, infinite for an integrating plant [s]."""

    @property
    def gain(self) -> float:
        """Return the change of the settled value from no to full output, infinite for an integrating plant [K]."""

    @property
    def gain_per_second(self) -> float:
        """Return ``k' = gain/tau``: the change of speed from no to full output [K/s]."""

    @property
    def duty(self) -> float:
        """Return the share of full output that holds the setpoint; outside 0..1 where it cannot be held."""

    @property
    def settles_on(self) -> float:
        """Return where the value settles with full output, from the setpoint [K]."""

    @property
    def settles_off(self) -> float:
        """Return where the value settles without output, from the setpoint [K]."""

    def speed(self, at: float, output: float) -> float:
        """Return the speed of the value at a distance from the setpoint [K] with a steady output [0..1], in K/s."""

    def limit_cycle(self, high: float, low: float, min_run: float = 0.0, min_rest: float = 0.0) -> Cycle:
        """Return the settled on-off cycle between two switch points, counted from the setpoint [K]."""

    def ripple(self, cycle_time: float, duty: float | None = None) -> Ripple:
        """Return the steady ripple at a cycle time [s], at the plant's own duty where none is given."""


@dataclass(frozen=True, slots=True)
class SelfRegulating:
    """A plant that settles: ``rise`` above the setpoint with full output, ``fall`` below it with none.

    Parameters
    ----------
    rise, fall : float
        Distance from the setpoint up to where full output settles and down to where no output settles [K]; negative where the setpoint
        is not between them.
    tau, theta : float
        Time constant and dead time [s].
    lag, sensor_lag : float
        Second lag ahead of the value, and the lag of the measurement behind it [s].

    Examples
    --------
    >>> plant = SelfRegulating(rise=95, fall=45, tau=600, theta=30)
    >>> round(plant.duty, 4), plant.gain
    (0.3214, 140)
    >>> round(plant.limit_cycle(high=1, low=-1).period, 1)
    169.6
    """

    rise: float
    fall: float
    tau: float
    theta: float
    lag: float = 0.0
    sensor_lag: float = 0.0

    def __post_init__(self) -> None:
        if self.tau <= 0 or min(self.theta, self.lag, self.sensor_lag) < 0 or self.rise + self.fall <= 0:
            raise ValueError("the time constant and the change are positive, dead time and lags are not negative")

    @property
    def gain(self) -> float:
        """Return the change of the settled value from no to full output [K]."""
        return self.rise + self.fall

    @property
    def gain_per_second(self) -> float:
        """Return ``k' = gain/tau`` [K/s]."""
        return (self.rise + self.fall) / self.tau

    @property
    def duty(self) -> float:
        """Return ``fall/(rise + fall)``; outside 0..1 where the setpoint cannot be held."""
        return self.fall / (self.rise + self.fall)

    @property
    def settles_on(self) -> float:
        """Return where the value settles with full output [K]."""
        return self.rise

    @property
    def settles_off(self) -> float:
        """Return where the value settles without output [K]."""
        return -self.fall

    def speed(self, at: float, output: float) -> float:
        """Return the speed at a distance from the setpoint with a steady output, lags settled [K/s]."""
        return (output * self.gain - self.fall - at) / self.tau

    def limit_cycle(self, high: float, low: float, min_run: float = 0.0, min_rest: float = 0.0) -> Cycle:
        """Return the settled on-off cycle; closed form where there is one lag.

        Raises
        ------
        NoCycle
            The plant cannot pass both switch points, or nothing keeps the switchings apart.
        """
        if self.lag <= 0 and self.sensor_lag <= 0:
            return timed_relay_cycle(self.rise, -self.fall, self.tau, self.theta, high, low, min_run, min_rest)
        return lagged_cycle(self.rise, -self.fall, self.tau, self.theta, high, low, self.lag, self.sensor_lag, min_run, min_rest)

    def ripple(self, cycle_time: float, duty: float | None = None) -> Ripple:
        """Return the steady ripple at a cycle time [s]."""
        return lag_ripple(self.gain, self.tau, cycle_time, self.duty if duty is None else duty, self.lag)


@dataclass(frozen=True, slots=True)
class Integrating:
    """A plant that does not settle: ``r_on`` with full output, ``r_off`` back again with none.

    Parameters
    ----------
    r_on, r_off : float
        Speeds [K/s]; negative where full output does not suffice, or where the value needs no output.
    theta, lag, sensor_lag : float
        Dead time, lag ahead of the value, lag of the measurement behind it [s].

    Examples
    --------
    >>> plant = Integrating(r_on=0.2, r_off=0.1, theta=5)
    >>> round(plant.duty, 4), round(plant.limit_cycle(high=1, low=-1).swing, 9)
    (0.3333, 3.5)
    """

    r_on: float
    r_off: float
    theta: float
    lag: float = 0.0
    sensor_lag: float = 0.0

    def __post_init__(self) -> None:
        if min(self.theta, self.lag, self.sensor_lag) < 0 or self.r_on + self.r_off <= 0:
            raise ValueError("the sum of the speeds is positive, dead time and lags are not negative")

    @property
    def tau(self) -> float:
        """Return infinity: the value does not settle."""
        return inf

    @property
    def gain(self) -> float:
        """Return infinity: the value does not settle."""
        return inf

    @property
    def gain_per_second(self) -> float:
        """Return ``r_on + r_off`` [K/s]."""
        return self.r_on + self.r_off

    @property
    def duty(self) -> float:
        """Return ``r_off/(r_on + r_off)``; outside 0..1 where the value cannot be held."""
        return self.r_off / (self.r_on + self.r_off)

    @property
    def settles_on(self) -> float:
        """Return infinity with its sign, the end that full output moves towards."""
        return inf if self.r_on > 0 else -inf

    @property
    def settles_off(self) -> float:
        """Return infinity with its sign, the end that the value moves towards without output."""
        return -inf if self.r_off > 0 else inf

    def speed(self, at: float, output: float) -> float:  # noqa: ARG002 - the same everywhere, that is what integrating means
        """Return the speed with a steady output [K/s]."""
        return output * self.gain_per_second - self.r_off

    def limit_cycle(self, high: float, low: float, min_run: float = 0.0, min_rest: float = 0.0) -> Cycle:
        """Return the settled on-off cycle; closed form where there is no lag and no least time binds.

        Raises
        ------
        NoCycle
            A speed is not positive, or nothing keeps the switchings apart.
        """
        if self.lag <= 0 and self.sensor_lag <= 0 and (self.theta > 0 or high > low):
            cycle = integrating_cycle(self.r_on, self.r_off, self.theta, high, low)
            if cycle.t_on >= min_run and cycle.t_off >= min_rest:
                return cycle
        return lagged_integrating_cycle(self.r_on, self.r_off, self.theta, high, low, self.lag, self.sensor_lag, min_run, min_rest)

    def ripple(self, cycle_time: float, duty: float | None = None) -> Ripple:
        """Return the steady ripple at a cycle time [s]."""
        return integrating_ripple(self.gain_per_second, cycle_time, self.duty if duty is None else duty, self.lag)
