"""Whether a loop with a latched, time-proportioned output is stable, and how far from the limit: read from its one-cycle map."""

from math import ceil, pi

import numpy as np

from specgen.process.cycle_map import EDGE, cycle_map
from specgen.process.loop_dynamics import Complexes, Dynamics
from specgen.process.margins import Margins, frequencies, margins, margins_of, slowest_frequency
from specgen.process.tuning import Settings

LONGEST = 60
"""Cycles of delay up to which stability is read from the eigenvalues; above, from the frequency response."""


def eigenvalues(plant: Dynamics, settings: Settings, cycle_time: float, duty: float) -> Complexes:
    """Eigenvalues of the one-cycle map.

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
    ndarray of complex
        All eigenvalues; stable where none is as large as 1.

    Raises
    ------
    ValueError
        As :func:`cycle_map`.

    Examples
    --------
    With ``Ti = tau`` and two cycles of delay: ``z^2 - z + a = 0``, ``a = 0.2 * 10 * 20/100``, so ``|z| = sqrt(0.4)``, beside the
    plant's own ``e^(-T/tau)``, which the controller's zero cancels.

    >>> found = eigenvalues(Dynamics(0.1, 100, 15), Settings(0.2, 100), cycle_time=20, duty=0.5)
    >>> [round(float(size), 4) for size in sorted(abs(found))]
    [0.6325, 0.6325, 0.8187]
    """
    return np.asarray(np.linalg.eigvals(cycle_map(plant, settings, cycle_time, duty).matrix()), dtype=np.complex128)


def spectral_radius(plant: Dynamics, settings: Settings, cycle_time: float, duty: float) -> float:
    """Largest size of the map's eigenvalues: below 1 a disturbance of the latched loop dies out.

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
    float
        Spectral radius [1].

    Raises
    ------
    ValueError
        As :func:`cycle_map`.
    """
    return float(np.abs(eigenvalues(plant, settings, cycle_time, duty)).max())


def latched_margins(plant: Dynamics, settings: Settings, cycle_time: float, duty: float) -> Margins:
    """Margins of the latched loop itself, from the frequency response of its one-cycle map.

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
    Margins
        Margins of the sampled loop: exact for its gain and its stability.

    Raises
    ------
    ValueError
        As :func:`cycle_map`.
    """
    found = cycle_map(plant, settings, cycle_time, duty)
    highest = pi / cycle_time
    delay = plant.theta + duty * cycle_time + cycle_time
    slow = min(slowest_frequency(plant, settings, delay), highest / 100)
    grid = frequencies(slow, delay)
    if grid[-1] < highest:
        beyond = np.linspace(float(grid[-1]), highest, 64)
        tail = float(np.abs(found.response(beyond)).max())
        return margins_of(found.response, grid, starts_turned=plant.is_integrating, tail=tail)
    grid = np.append(grid[grid < highest * (1 - EDGE)], highest)
    return margins_of(found.response, grid, starts_turned=plant.is_integrating, closes=True)


def is_stable(plant: Dynamics, settings: Settings, cycle_time: float, duty: float) -> bool:
    """Whether the latched loop is stable about a duty.

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
    bool
        True where every eigenvalue is below 1 in size.

    Raises
    ------
    ValueError
        As :func:`cycle_map`.
    """
    if plant.theta / cycle_time + duty <= LONGEST:
        return spectral_radius(plant, settings, cycle_time, duty) < 1
    return latched_margins(plant, settings, cycle_time, duty).stable


def stable_cycle(plant: Dynamics, settings: Settings, cycle_time: float, duties: tuple[float, ...]) -> bool:
    """Whether the latched loop is stable about every one of the duties.

    Parameters
    ----------
    plant : Dynamics
        The plant.
    settings : Settings
        Settings in the ideal form.
    cycle_time : float
        Cycle time T [s].
    duties : tuple of float
        Steady duties, 0 to 1: 10 %, 90 % and those of the declared range [1].

    Returns
    -------
    bool
        True where the loop is stable at all of them.

    Raises
    ------
    ValueError
        As :func:`cycle_map`.

    Examples
    --------
    >>> plant, settings = Dynamics(slope=0.1, tau=100, theta=25), Settings(gain=0.12, integral_time=100)
    >>> stable_cycle(plant, settings, 20, (0.1, 0.5, 0.9)), stable_cycle(plant, settings, 200, (0.1, 0.5, 0.9))
    (True, False)
    """
    return all(is_stable(plant, settings, cycle_time, duty) for duty in duties)


def stated_margins(
    plant: Dynamics, settings: Settings, cycle_time: float, duties: tuple[float, ...], extra_delay: float
) -> tuple[Margins, float | None]:
    """Smallest margins that may be stated: of the loop with the charged delay and of the latched loop at each duty.

    Parameters
    ----------
    plant : Dynamics
        The plant.
    settings : Settings
        Settings in the ideal form.
    cycle_time : float
        Cycle time T [s].
    duties : tuple of float
        Duties of the declared range, its ends among them [1].
    extra_delay : float
        Delay that was charged for the cycle (and the actuator, where there is one) [s].

    Returns
    -------
    Margins
        Those with the least gain margin, its peak sensitivity and phase margin the worst of all.
    float or None
        The duty they are found at, None where the charged delay is the worse [1].

    Raises
    ------
    ValueError
        As :func:`cycle_map`.

    Notes
    -----
    The charge falls short where a plant has no second lag, where derivative action cancels it, or where the cycle exceeds the
    dead time: there a pulse's end just misses a latch and waits for the next. The latched loop's own response knows.
    """
    worst, at = margins(plant, settings, extra_delay), None
    phase, peak = worst.phase, worst.sensitivity
    # among the duties that wait for the same latch the lowest may be the worst by a hundredth: its pulse only just missed the one before
    missed = ceil(plant.theta / cycle_time + max(duties) - EDGE) - 1 - plant.theta / cycle_time + 2 * EDGE
    for duty in (*duties, missed) if min(duties) < missed < max(duties) else duties:
        found = latched_margins(plant, settings, cycle_time, duty)
        phase, peak = min(phase, found.phase), max(peak, found.sensitivity)
        if found.gain < worst.gain:
            worst, at = found, duty
    lowest = Margins(worst.gain, phase, peak, worst.stable, worst.gain_reduction, worst.phase_crossover, worst.gain_crossover)
    return lowest, at
