"""Travel of a valve and the flow it gives: inherent and installed characteristic, opening, steepest gain.

Travel and flow are fractions of full travel and of the flow fully open.
"""

from math import log, sqrt
from typing import Literal

Characteristic = Literal["linear", "equal_percentage"]


def inherent(travel: float, characteristic: Characteristic, rangeability: float = 50.0) -> float:
    """Share of the full flow coefficient at a travel.

    Parameters
    ----------
    travel : float
        Travel h, 0 to 1 [1].
    characteristic : {"linear", "equal_percentage"}
        Form of the trim.
    rangeability : float
        R of the equal-percentage form, ``phi = R^(h-1)`` [1].

    Returns
    -------
    float
        Kv/Kvs [1].

    Raises
    ------
    ValueError
        A travel outside 0 to 1 or a rangeability that is not above 1.

    Notes
    -----
    The equal-percentage form ends at ``1/R`` where a real valve closes; below that flow only leakage or the seat decides.

    References
    ----------
    IEC 60534-2-4.

    Examples
    --------
    >>> inherent(0.5, "linear"), round(inherent(0.5, "equal_percentage"), 4)
    (0.5, 0.1414)
    """
    _check(travel, rangeability)
    return float(travel if characteristic == "linear" else rangeability ** (travel - 1))


def installed(travel: float, authority: float, characteristic: Characteristic, rangeability: float = 50.0) -> float:
    """Share of the full flow at a travel, with the resistance of the pipes.

    Parameters
    ----------
    travel : float
        Travel h, 0 to 1 [1].
    authority : float
        Pressure drop of the open valve over that of the whole path, above 0 to 1 [1].
    characteristic : {"linear", "equal_percentage"}
        Form of the trim.
    rangeability : float
        R of the equal-percentage form [1].

    Returns
    -------
    float
        Flow over the flow fully open, ``1/sqrt(1 - N + N/phi^2)`` [1].

    Raises
    ------
    ValueError
        An authority outside 0 to 1, or as :func:`inherent`.

    References
    ----------
    Constant total drop and square-law resistances (algebra).

    Examples
    --------
    >>> round(installed(0.5, 0.5, "equal_percentage"), 3)
    0.198
    """
    _check_authority(authority)
    phi = inherent(travel, characteristic, rangeability)
    return phi / sqrt((1 - authority) * phi * phi + authority)


def opening(flow: float, authority: float, characteristic: Characteristic, rangeability: float = 50.0) -> float:
    """Travel at which a valve passes a share of its full flow.

    Parameters
    ----------
    flow : float
        Flow over the flow fully open; with an authority of 1 also Kv over Kvs [1].
    authority : float
        Pressure drop of the open valve over that of the whole path, above 0 to 1 [1].
    characteristic : {"linear", "equal_percentage"}
        Form of the trim.
    rangeability : float
        R of the equal-percentage form [1].

    Returns
    -------
    float
        Travel [1]: above 1 where the valve is too small, below 0 where the flow is less than it can control.

    Raises
    ------
    ValueError
        A flow that is not above zero, or one so large that the pipes alone would hold it back.

    Notes
    -----
    ``phi = sqrt(N/(1/q^2 - 1 + N))``, then ``h = phi`` or ``h = 1 + ln phi/ln R``.

    References
    ----------
    Inverse of :func:`installed`.

    Examples
    --------
    >>> round(opening(0.198, 0.5, "equal_percentage"), 3)
    0.5
    """
    _check_authority(authority)
    _check(0.0, rangeability)
    left = 1 / (flow * flow) - 1 + authority if flow > 0 else 0.0
    if left <= 0:
        raise ValueError(f"no travel passes {flow:.4g} of the full flow")
    phi = sqrt(authority / left)
    return phi if characteristic == "linear" else 1 + log(phi) / log(rangeability)


def installed_gain(travel: float, authority: float, characteristic: Characteristic, rangeability: float = 50.0) -> float:
    """Slope of the installed characteristic: flow for travel.

    Parameters
    ----------
    travel : float
        Travel h, 0 to 1 [1].
    authority : float
        Pressure drop of the open valve over that of the whole path, above 0 to 1 [1].
    characteristic : {"linear", "equal_percentage"}
        Form of the trim.
    rangeability : float
        R of the equal-percentage form [1].

    Returns
    -------
    float
        ``dq/dh = N phi' / ((1 - N) phi^2 + N)^(3/2)``; 1 is the mean over the whole travel of a tight linear valve [1].

    Raises
    ------
    ValueError
        As :func:`installed`.

    References
    ----------
    Derivative of :func:`installed`.

    Examples
    --------
    >>> installed_gain(0.3, 1.0, "linear")
    1.0
    """
    _check_authority(authority)
    phi = inherent(travel, characteristic, rangeability)
    steepness = 1.0 if characteristic == "linear" else phi * log(rangeability)
    return float(authority * steepness / ((1 - authority) * phi * phi + authority) ** 1.5)


def steepest_gain(
    low: float, high: float, authority: float, characteristic: Characteristic, rangeability: float = 50.0
) -> tuple[float, float]:
    """Find the steepest part of the installed characteristic between two travels.

    Parameters
    ----------
    low, high : float
        Travel at the lowest and the highest duty, 0 to 1 [1].
    authority : float
        Pressure drop of the open valve over that of the whole path, above 0 to 1 [1].
    characteristic : {"linear", "equal_percentage"}
        Form of the trim.
    rangeability : float
        R of the equal-percentage form [1].

    Returns
    -------
    float
        Largest ``dq/dh`` [1]: the plant's gain is taken this many times its mean.
    float
        Travel at which it is found [1].

    Raises
    ------
    ValueError
        Travels in the wrong order, or as :func:`installed`.

    Notes
    -----
    A linear trim is steepest at its lowest travel. An equal-percentage one is steepest where ``phi^2 = N/(2 (1 - N))``, or at
    the nearer end of the range.

    References
    ----------
    Zero of the derivative of :func:`installed_gain`.

    Examples
    --------
    >>> gain, travel = steepest_gain(0.1, 1.0, 0.3, "equal_percentage")
    >>> round(gain, 2), round(travel, 2)
    (1.8, 0.8)
    """
    if not 0 <= low <= high <= 1:
        raise ValueError("the travels lie between 0 and 1, the lower one first")
    _check_authority(authority)
    _check(low, rangeability)
    travel = low
    if characteristic == "equal_percentage":
        travel = high if authority >= 1 else 1 + log(authority / (2 * (1 - authority))) / (2 * log(rangeability))
        travel = min(max(travel, low), high)
    return installed_gain(travel, authority, characteristic, rangeability), travel


def _check(travel: float, rangeability: float) -> None:
    """Refuse what no valve has."""
    if not 0 <= travel <= 1:
        raise ValueError(f"a travel of {travel} lies outside 0 to 1")
    if not rangeability > 1:
        raise ValueError(f"a rangeability of {rangeability} is not above 1")


def _check_authority(authority: float) -> None:
    """Refuse what is no share."""
    if not 0 < authority <= 1:
        raise ValueError(f"an authority of {authority} lies outside 0 to 1")
