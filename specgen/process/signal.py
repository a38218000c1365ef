"""Standard signals: value over the range, reversed action, NAMUR limits, burden of a current loop."""

from dataclasses import dataclass
from math import inf
from typing import Literal

Fault = Literal["valid", "not_a_measurement", "failed_low", "failed_high"]

QUARTERS = (0.0, 0.25, 0.5, 0.75, 1.0)

# NAMUR NE 43 for 4-20 mA [A]; seen in a notice and an article on it
MEASURE_LOW = 3.8e-3
MEASURE_HIGH = 20.5e-3
FAIL_LOW = 3.6e-3
FAIL_HIGH = 21.0e-3


@dataclass(frozen=True, slots=True)
class Signal:
    """A standard signal by its two ends.

    Parameters
    ----------
    low, high : float
        Value at the bottom and the top of the range [A or V].
    unit : {"A", "V"}
        Current or voltage.
    """

    low: float
    high: float
    unit: Literal["A", "V"]

    @property
    def is_live_zero(self) -> bool:
        """Whether a broken wire differs from the bottom of the range."""
        return self.low > 0

    def at(self, share: float, *, is_reversed: bool = False) -> float:
        """Return the signal at an output.

        Parameters
        ----------
        share : float
            Output as a fraction; 0 is the least action on the value, whatever the signal [1].
        is_reversed : bool
            Whether 0 lies at the top of the range, so that loss of the signal drives to full action.

        Returns
        -------
        float
            Signal [A or V].

        Examples
        --------
        >>> SIGNALS["4-20 mA"].at(0.25), SIGNALS["4-20 mA"].at(0.25, is_reversed=True)
        (0.008, 0.016)
        """
        place = 1 - share if is_reversed else share
        return self.low + (self.high - self.low) * place

    def share(self, value: float, *, is_reversed: bool = False) -> float:
        """Return the fraction that a signal stands for.

        Parameters
        ----------
        value : float
            Signal [A or V].
        is_reversed : bool
            Whether 0 lies at the top of the range.

        Returns
        -------
        float
            Fraction; outside 0 to 1 for a signal outside its range [1].
        """
        place = (value - self.low) / (self.high - self.low)
        return 1 - place if is_reversed else place


SIGNALS = {
    "4-20 mA": Signal(0.004, 0.020, "A"),
    "0-20 mA": Signal(0.0, 0.020, "A"),
    "0-10 V": Signal(0.0, 10.0, "V"),
    "2-10 V": Signal(2.0, 10.0, "V"),
    "0-5 V": Signal(0.0, 5.0, "V"),
    "1-5 V": Signal(1.0, 5.0, "V"),
}
"""IEC 60381-1 and -2 (from memory); 2-10 V is common practice: 4-20 mA over 500 ohm."""


def quarters(signal: Signal, *, is_reversed: bool = False) -> tuple[tuple[float, float], ...]:
    """Tabulate a signal at 0, 25, 50, 75 and 100 %.

    Parameters
    ----------
    signal : Signal
        The signal.
    is_reversed : bool
        Whether 0 lies at the top of the range.

    Returns
    -------
    tuple of (float, float)
        Output and signal [1, A or V].

    Examples
    --------
    >>> quarters(SIGNALS["0-10 V"])
    ((0.0, 0.0), (0.25, 2.5), (0.5, 5.0), (0.75, 7.5), (1.0, 10.0))
    """
    return tuple((share, signal.at(share, is_reversed=is_reversed)) for share in QUARTERS)


def namur_state(current: float) -> Fault:
    """Tell what a 4-20 mA measuring current says.

    Parameters
    ----------
    current : float
        Current [A].

    Returns
    -------
    {"valid", "not_a_measurement", "failed_low", "failed_high"}
        Between the limits of measurement and of failure a current is neither.

    References
    ----------
    NAMUR NE 43 (2003): measurement 3.8 mA to 20.5 mA, failure at 3.6 mA or less and 21 mA or more.

    Examples
    --------
    >>> namur_state(0.0039), namur_state(0.0037), namur_state(0.0036)
    ('valid', 'not_a_measurement', 'failed_low')
    """
    # to the nanoampere, so that 3.6 mA is 3.6 mA however it was converted
    current = round(current, 9)
    if current <= FAIL_LOW:
        return "failed_low"
    if current >= FAIL_HIGH:
        return "failed_high"
    return "valid" if MEASURE_LOW <= current <= MEASURE_HIGH else "not_a_measurement"


@dataclass(frozen=True, slots=True)
class Burden:
    """Burden of a current loop against what its output drives.

    Parameters
    ----------
    total : float
        Resistance of all inputs in series and of the cable [ohm].
    allowed : float
        Largest burden the output drives [ohm].
    voltage : float
        Voltage over the burden at the top of the range [V].
    """

    total: float
    allowed: float
    voltage: float

    @property
    def holds(self) -> bool:
        """Whether the output drives it."""
        return self.total <= self.allowed

    @property
    def margin(self) -> float:
        """Allowed burden over the total; 1 is the limit [1]."""
        return self.allowed / self.total if self.total > 0 else inf


def loop_burden(inputs: tuple[float, ...], allowed: float, cable: float = 0.0, signal: Signal = SIGNALS["4-20 mA"]) -> Burden:
    """Add up the burden of a current loop.

    Parameters
    ----------
    inputs : tuple of float
        Resistance of each input in the loop [ohm].
    allowed : float
        Largest burden the output drives [ohm].
    cable : float
        Resistance of the cable, there and back [ohm].
    signal : Signal
        The current signal.

    Returns
    -------
    Burden
        Total, allowed, and the voltage at the top of the range.

    Raises
    ------
    ValueError
        A voltage signal, whose inputs lie in parallel, or a resistance below zero.

    References
    ----------
    Ohm's law.

    Examples
    --------
    >>> found = loop_burden((250, 250), allowed=500, cable=4)
    >>> found.total, found.holds, round(found.voltage, 2)
    (504, False, 10.08)
    """
    if signal.unit != "A":
        raise ValueError("a burden belongs to a current signal")
    if min((*inputs, allowed, cable)) < 0:
        raise ValueError("a resistance is zero or more")
    total = sum(inputs) + cable
    return Burden(total, allowed, total * signal.high)


def voltage_load(inputs: tuple[float, ...]) -> float:
    """Resistance of voltage inputs in parallel, which is the least their output must stand.

    Parameters
    ----------
    inputs : tuple of float
        Resistance of each input, above zero [ohm].

    Returns
    -------
    float
        Resistance [ohm]; ``inf`` without inputs.

    Raises
    ------
    ValueError
        A resistance that is not above zero.

    Examples
    --------
    >>> voltage_load((10000, 10000))
    5000.0
    """
    if any(resistance <= 0 for resistance in inputs):
        raise ValueError("a resistance in parallel is above zero")
    return 1 / sum(1 / resistance for resistance in inputs) if inputs else inf
