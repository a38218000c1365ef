"""The exact one-cycle map of a loop whose time-proportioned output is latched.

At the start of each cycle the controller reads the value and latches the duty; the output is then on for ``x T`` and off for
the rest. A small change of the duty moves the end of the pulse: a short extra impulse at the plant, ``x T`` after the latch and
``theta`` later at the value. From latch to latch that is linear with constant coefficients, whatever the dead time.
"""

from dataclasses import dataclass
from math import ceil, exp

import numpy as np

from specgen.process.loop_dynamics import Complexes, Dynamics, Reals, grown, modes_of
from specgen.process.tuning import Settings

EDGE = 1e-9
"""An edge this close before a latch, as a share of the cycle, counts as seen by it: the boundary itself is not resolved."""


@dataclass(frozen=True, slots=True)
class CycleMap:
    """Linear map from latch to latch: ``X' = step X + push delta``, ``delta = -reads X``, the push ``delay`` cycles old.

    Parameters
    ----------
    cycle_time : float
        Cycle time T [s].
    delay : int
        Latches from one that sets a duty to the first that sees its pulse end, ``n = ceil(theta/T + x)`` [1].
    decay : tuple of float
        What each mode keeps over a cycle [1].
    gathers : tuple of float
        What the integral of the measurement gathers over a cycle from each mode [s].
    push : tuple of float
        State of each mode, then of the integral, at the first latch that sees a unit change of duty.
    reads : tuple of float
        What the controller makes of each mode, then of the integral [1/value unit].
    """

    cycle_time: float
    delay: int
    decay: tuple[float, ...]
    gathers: tuple[float, ...]
    push: tuple[float, ...]
    reads: tuple[float, ...]

    def response(self, omega: Reals) -> Complexes:
        """Return the open loop's frequency response from duty to duty, up to ``pi/T`` [rad/s]."""
        z = np.exp(1j * omega * self.cycle_time)
        integral = np.full(z.shape, self.push[-1], dtype=complex)
        total = np.zeros(z.shape, dtype=complex)
        for decay, gathers, push, reads in zip(self.decay, self.gathers, self.push, self.reads, strict=False):
            mode = push / (z - decay)
            integral += gathers * mode
            total += reads * mode
        total += self.reads[-1] * integral / (z - 1)
        found: Complexes = total * np.exp(-1j * omega * self.cycle_time * (self.delay - 1))
        return found

    def matrix(self) -> Reals:
        """Return the closed loop's map: modes, integral, then the duties that are still on their way."""
        size, states = len(self.push) + self.delay - 1, len(self.push)
        full = np.zeros((size, size))
        for index, (decay, gathers) in enumerate(zip(self.decay, self.gathers, strict=True)):
            full[index, index] = decay
            full[states - 1, index] = gathers
        full[states - 1, states - 1] = 1
        if self.delay == 1:
            full -= np.outer(self.push, self.reads)
            return full
        full[:states, -1] = self.push
        full[states, :states] = [-reads for reads in self.reads]
        for row in range(states + 1, size):
            full[row, row - 1] = 1
        return full


def cycle_map(plant: Dynamics, settings: Settings, cycle_time: float, duty: float) -> CycleMap:
    """Build the map about a steady duty.

    Parameters
    ----------
    plant : Dynamics
        The plant.
    settings : Settings
        Settings in the ideal form.
    cycle_time : float
        Cycle time T [s].
    duty : float
        Steady duty x, 0 to 1 [1].

    Returns
    -------
    CycleMap
        The linear map.

    Raises
    ------
    ValueError
        A cycle time that is not above zero or a duty outside 0 to 1.

    Notes
    -----
    The controller integrates all the time, and takes proportional and derivative action from the value at the latch. The extra
    impulse of a change of duty lands ``s = x T + theta`` after the latch; the first latch to see it is the n-th, ``n T - s`` later.

    References
    ----------
    Impulse response of the chain, sampled; for ``Ti = tau`` without further lag the characteristic equation is
    ``z^n - z^(n-1) + a = 0`` with ``a = Kc K T/tau``, the test of ``tests/process/test_loop_map.py``.

    Examples
    --------
    >>> plant = Dynamics(slope=0.1, tau=100, theta=25)
    >>> cycle_map(plant, Settings(gain=0.2, integral_time=100), cycle_time=20, duty=0.5).delay
    2
    """
    if cycle_time <= 0 or not 0 <= duty <= 1:
        raise ValueError("the cycle time is above zero and the duty lies between 0 and 1")
    cycles = plant.theta / cycle_time + duty
    delay = max(1, ceil(cycles - EDGE))
    seen = max(0.0, (delay - cycles) * cycle_time)
    modes = modes_of(plant)
    decay, gathers, push, reads = [], [], [], []
    integral = 0.0
    for rate, enters, shows in zip(modes.rate, modes.output, modes.measured, strict=True):
        kept, answer, _ = grown(rate, cycle_time)
        decay.append(kept)
        gathers.append(shows * answer)
        push.append(cycle_time * enters * exp(-rate * seen))
        integral += cycle_time * enters * shows * grown(rate, seen)[1]
        # the slope of a mode left to itself is -rate times the mode
        reads.append(settings.gain * shows * (1 - settings.derivative_time * rate))
    push.append(integral)
    reads.append(settings.gain / settings.integral_time)
    return CycleMap(cycle_time, delay, tuple(decay), tuple(gathers), tuple(push), tuple(reads))
