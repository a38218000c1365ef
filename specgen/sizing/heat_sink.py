"""The heat sink of a solid-state device: how low its thermal resistance has to be."""

SHORT = 0.1  # of the heat sink's time constant: a cycle up to that leaves its temperature even


def sink_resistance(
    loss: float, junction: float, ambient: float, junction_to_case: float, case_to_sink: float, *,
    duty: float = 1.0, cycle: float | None = None, time_constant: float | None = None,
) -> float:  # fmt: skip
    r"""Highest thermal resistance a heat sink may have.

    Parameters
    ----------
    loss : float
        Loss of all switched poles while the output is on [W].
    junction, ambient : float
        Highest junction temperature, and the air at the heat sink [degC].
    junction_to_case, case_to_sink : float
        Thermal resistances of the device [K/W].
    duty : float
        Share of the time that the output is on, 0 to 1.
    cycle, time_constant : float, optional
        Cycle of the bursts and time constant of the heat sink [s].

    Returns
    -------
    float
        Thermal resistance from heat sink to air [K/W]; zero or negative where no heat sink would do.

    Raises
    ------
    ValueError
        A loss that is not positive, or a duty that is no share above zero.

    Notes
    -----
    :math:`R \le (T_j - T_a)/P - R_{jc} - R_{cs}`. The mean of bursts warms the heat sink where a cycle is at most a tenth
    of its time constant, :math:`R \le (T_j - T_a - P (R_{jc} + R_{cs}))/(x P)`; a longer cycle, and one against an unknown
    time constant, counts as full output. The junction follows each burst and always counts in full.

    References
    ----------
    Heat flow through thermal resistances in series.

    Examples
    --------
    >>> round(sink_resistance(30, 125, 45, 0.85, 0.1), 3)
    1.717
    >>> round(sink_resistance(30, 125, 45, 0.85, 0.1, duty=0.5, cycle=1, time_constant=600), 3)
    3.433
    """
    if loss <= 0:
        raise ValueError(f"a loss of {loss:g} W needs no heat sink")
    if not 0 < duty <= 1:
        raise ValueError(f"a duty of {duty:g} is no share of the time")
    even = cycle is not None and time_constant is not None and cycle <= SHORT * time_constant
    rise = junction - ambient - loss * (junction_to_case + case_to_sink)
    return rise / (loss * (duty if even else 1.0))
