"""Reference functions of platinum thermometers, thermocouples and thermistors."""

from math import exp

from specgen.catalogue.load import Catalogue
from specgen.catalogue.rows import CoupleFunction
from specgen.catalogue.table import Known
from specgen.sizing.candidate import Unsized

ZERO_KELVIN = -273.15  # degC


def platinum_resistance(temperature: float, nominal: float, catalogue: Catalogue) -> float | Unsized:
    r"""Return the resistance of a platinum thermometer.

    Parameters
    ----------
    temperature : float
        Temperature [degC].
    nominal : float
        Resistance at 0 degC [ohm]: 100 for Pt100, 1000 for Pt1000.
    catalogue : Catalogue
        The equation's coefficients.

    Returns
    -------
    float or Unsized
        Resistance [ohm]; Unsized outside the equation's range.

    Notes
    -----
    :math:`R = R_0 (1 + A t + B t^2)`, below 0 degC :math:`+ R_0 C (t - 100) t^3` (Callendar-Van Dusen).

    References
    ----------
    IEC 60751:2008, clause 4.2; compared with its printed table in ``tests/sizing/test_thermometry.py``.

    Examples
    --------
    >>> from specgen.catalogue.load import load_catalogue
    >>> round(platinum_resistance(100.0, 100.0, load_catalogue()), 2)
    138.51
    """
    row = catalogue.platinum.value
    if not row.range.low <= temperature <= row.range.high:
        return Unsized(f"{temperature:g} °C is outside the platinum equation, {row.range.text}")
    ratio = 1 + row.A * temperature + row.B * temperature**2
    if temperature < 0:
        ratio += row.C * (temperature - 100) * temperature**3
    return nominal * ratio


def couple_voltage(temperature: float, couple: str, catalogue: Catalogue) -> float | Unsized:
    """Return the voltage of a thermocouple with its reference junction at 0 degC.

    Parameters
    ----------
    temperature : float
        Temperature of the measuring junction [degC].
    couple : str
        Its type: K, J, T, N, E, S, R or B.
    catalogue : Catalogue
        The reference functions.

    Returns
    -------
    float or Unsized
        Voltage [V]; Unsized outside the function's range.

    References
    ----------
    NIST SRD 60 (Monograph 175), the functions of IEC 60584-1:2013.

    Examples
    --------
    >>> from specgen.catalogue.load import load_catalogue
    >>> round(couple_voltage(100.0, "K", load_catalogue()) * 1000, 3)
    4.096
    """
    piece = _piece(temperature, couple, catalogue)
    if isinstance(piece, Unsized):
        return piece
    total = 0.0
    for coefficient in reversed(piece.value.coefficients):
        total = total * temperature + coefficient
    if piece.value.exponential is not None:
        a0, a1, a2 = piece.value.exponential
        total += a0 * exp(a1 * (temperature - a2) ** 2)
    return total * 1e-3


def couple_slope(temperature: float, couple: str, catalogue: Catalogue) -> float | Unsized:
    """Return the slope of a thermocouple's function.

    Parameters
    ----------
    temperature, couple, catalogue
        As in `couple_voltage`.

    Returns
    -------
    float or Unsized
        Slope [V/K].

    Examples
    --------
    >>> from specgen.catalogue.load import load_catalogue
    >>> round(couple_slope(25.0, "K", load_catalogue()) * 1e6, 1)
    40.5
    """
    piece = _piece(temperature, couple, catalogue)
    if isinstance(piece, Unsized):
        return piece
    total = 0.0
    coefficients = piece.value.coefficients
    for power in range(len(coefficients) - 1, 0, -1):
        total = total * temperature + power * coefficients[power]
    if piece.value.exponential is not None:
        a0, a1, a2 = piece.value.exponential
        total += 2 * a0 * a1 * (temperature - a2) * exp(a1 * (temperature - a2) ** 2)
    return total * 1e-3


def _piece(temperature: float, couple: str, catalogue: Catalogue) -> Known[CoupleFunction] | Unsized:
    pieces = [known for known in catalogue.couple_functions if known.value.type == couple]
    for known in pieces:
        if known.value.range.low <= temperature <= known.value.range.high:
            return known
    return Unsized(f"{temperature:g} °C is outside the function of thermocouple {couple}")


def thermistor_resistance(temperature: float, r25: float, beta: float) -> float:
    r"""Return the resistance of a thermistor with negative coefficient.

    Parameters
    ----------
    temperature : float
        Temperature [degC].
    r25 : float
        Resistance at 25 degC [ohm].
    beta : float
        Its constant [K].

    Returns
    -------
    float
        Resistance [ohm].

    Notes
    -----
    :math:`R = R_{25} e^{\beta (1/T - 1/298.15)}`, temperatures in kelvin.

    References
    ----------
    Common practice, no source: the two-constant model that makers give r25 and beta for.

    Examples
    --------
    >>> thermistor_resistance(25.0, 10e3, 3950.0)
    10000.0
    """
    return r25 * exp(beta * (1 / (temperature - ZERO_KELVIN) - 1 / (25.0 - ZERO_KELVIN)))
