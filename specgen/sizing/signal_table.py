"""What the output's signal is at 0, 25, 50, 75 and 100 percent, for the technician who checks it with a meter."""

from dataclasses import dataclass

from specgen.core.figure import Figure
from specgen.model.loop import Loop
from specgen.process.signal import SIGNALS, quarters


@dataclass(frozen=True, slots=True)
class SignalTable:
    """Output share and signal, row by row, and which way round.

    ``rows`` are (output [1], signal [A or V]); 0 is the least action on the value, whatever the signal. ``is_reversed`` tells that
    this lies at the top of the range, ``because`` why. ``figures`` are the same rows for the Basis.
    """

    signal: str
    is_reversed: bool
    because: str
    rows: tuple[tuple[float, float], ...]
    figures: tuple[Figure, ...]


def signal_table(loop: Loop, signal: str) -> SignalTable:
    """Tabulate the signal of an analogue output.

    Parameters
    ----------
    loop : Loop
        The loop; a valve that opens when its signal is lost is driven closed, so that its signal is reversed.
    signal : str
        The signal as settled, a key of ``specgen.process.signal.SIGNALS``.

    Returns
    -------
    SignalTable

    References
    ----------
    IEC 60381-1 and -2 (from memory): linear signals.
    """
    on_loss = getattr(loop.element, "on_signal_loss", None)
    is_reversed = on_loss == "open"
    because = {
        "open": "the valve opens when the signal is lost, so the signal drives it closed",
        "close": "the valve closes when the signal is lost, so the signal drives it open",
        "hold": "the valve stays when the signal is lost; the signal drives it open",
    }.get(str(on_loss), "more signal is more output")
    kind = SIGNALS[signal]
    rows = quarters(kind, is_reversed=is_reversed)
    dimension = "current" if kind.unit == "A" else "voltage"
    ends = {"s_0": (rows[0][1], dimension), "s_1": (rows[-1][1], dimension)}
    figures = tuple(
        Figure("s", f"signal at {share * 100:g} percent output", "s_0 + (s_1 − s_0) x", value, dimension,
               "IEC 60381, linear signal (from memory)", ends | {"x": (share, "fraction")})
        for share, value in rows
    )  # fmt: skip
    return SignalTable(signal, is_reversed, because, rows, figures)
