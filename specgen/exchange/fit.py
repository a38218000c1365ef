"""What `specgen fit` does: a recording in, a `response` block for the loop file, remarks and a drawing out."""

from dataclasses import dataclass
from math import ceil, floor, isfinite, log10
from pathlib import Path

import numpy as np

from specgen.core.diagnostic import Diagnostic
from specgen.exchange.fit_plot import Drawn, fit_plot
from specgen.process.step_test import Identified, Interval, NotIdentified, at_rated_supply, identify
from specgen.source.recording import Columns, Recording, read_recording
from specgen.source.recording_text import Problems

_DIGITS_OF_WIDTH = 3  # of an interval's width that are printed: rounding outwards widens it by a fiftieth at most
_MOST_DIGITS = 7
_FINEST_TIME = 1e-6  # s
_FAR_OFF = 6.0  # times the noise
_CORRELATED = 0.3
_MOVES_OFTEN = 0.1  # of the samples
_NO_REST = "    # rest_value: not known from this recording; write where the value settles with no output"


@dataclass(frozen=True, slots=True)
class Supply:
    """Supply of a resistive element: ``rated`` [V], ``during_test`` [V] or None where nobody noted it, ``tolerance`` [fraction]."""

    rated: float
    during_test: float | None = None
    tolerance: float = 0.1


@dataclass(frozen=True, slots=True)
class FitReport:
    """Outcome of a fit.

    ``block`` is for stdout, empty where nothing was identified; ``problems`` and ``messages`` are for stderr; ``plot`` is an SVG
    file for ``plot_path``, empty where there is nothing to draw.
    """

    block: str
    problems: tuple[Diagnostic, ...]
    messages: tuple[str, ...]
    plot: bytes
    plot_path: Path
    found: Identified | NotIdentified | None

    @property
    def exit_code(self) -> int:
        """Exit code of the command: 0 with a block, 2 without."""
        return 0 if self.block else 2


def fit_file(
    path: Path, *, columns: Columns | None = None, sensor_lag: float = 0.0, supply: Supply | None = None, plot: Path | None = None
) -> FitReport:
    r"""Identify the step test in a file; nothing is written or printed.

    Parameters
    ----------
    path : Path
        The recording, a CSV file.
    columns : Columns, optional
        Names of its columns; found by their units where absent.
    sensor_lag : float
        Lag of the sensor [s]; it is taken out, so that the response is the true value's.
    supply : Supply, optional
        Supply of a resistive element; the change is then given at the rated supply, else at that of the test.
    plot : Path, optional
        Where the drawing will go; beside the recording where absent.

    Returns
    -------
    FitReport
        Block, problems, messages, drawing and exit code.

    Examples
    --------
    >>> from math import exp
    >>> from tempfile import TemporaryDirectory
    >>> rise = lambda t: 0.0 if t < 125 else 65.0 * (1.0 - exp(-(t - 125) / 600))
    >>> rows = [f"{t},{20 if t < 100 else 70},{46 + rise(t):.1f}" for t in range(0, 4000, 10)]
    >>> with TemporaryDirectory() as folder:
    ...     path = Path(folder) / "tic-101.csv"
    ...     _ = path.write_text("\n".join(["t_s,out_percent,pv_degC", *rows]))
    ...     report = fit_file(path)
    >>> print(report.block, end="")
    plant:
      response:
        change: 129.764 K to 130.170 K
        time_constant: 598.70 s to 601.01 s
        dead_time: 24.51 s to 25.64 s
        rest_value: 19.920 degC to 20.092 degC
    >>> report.plot_path.name, report.exit_code
    ('tic-101.fit.svg', 0)
    """
    plot_path = plot or path.with_name(path.stem + ".fit.svg")
    try:
        raw = path.read_bytes()
    except OSError as error:
        problems = Problems(path.as_posix())
        problems.add("R101", f"the recording cannot be read: {error.strerror or error}")
        return FitReport("", problems.all(), (), b"", plot_path, None)
    read = read_recording(raw, path.as_posix(), columns)
    if read.recording is None:
        return FitReport("", read.problems, read.notes, b"", plot_path, None)
    record = read.recording
    found = identify(record.time, record.output, record.written, sensor_lag=sensor_lag)
    if isinstance(found, NotIdentified):
        refusal = f"{path.name}: not identified ({found.reason.replace('_', ' ')}): {found.text}", f"hint: {found.hint}"
        return FitReport("", read.problems, (*read.notes, *refusal), b"", plot_path, found)
    gain = at_rated_supply(found.gain, supply.rated, supply.during_test, supply.tolerance) if supply else found.gain
    messages = (*read.notes, *_remarks(found, record, sensor_lag, supply))
    return FitReport(_block(found, gain, record), read.problems, messages, _drawing(found, record, path.name), plot_path, found)


def range_text(interval: Interval, unit: str, scale: float = 1.0, finest: float = 0.0) -> str:
    """Write an interval as a range of the loop file, rounded outwards to the digits that its width deserves.

    ``scale`` is the size of the unit; no digit below ``finest`` is written.

    Examples
    --------
    >>> range_text(Interval(600.0, 598.7214, 601.0423), "s"), range_text(Interval(2.0, 2.0, 2.0), "K")
    ('598.72 s to 601.05 s', '2 K')
    """
    low, high = interval.low / scale, interval.high / scale
    size = max(abs(low), abs(high))
    least = 10.0 ** (floor(log10(size)) + 1 - _MOST_DIGITS) if size > 0.0 else 1.0
    step = max(10.0 ** (floor(log10(high - low)) + 1 - _DIGITS_OF_WIDTH) if high > low else least, least, finest)
    digits = max(0, -round(log10(step)))
    # a ten-thousandth of a step keeps a number that is round already where it is
    ends = floor(low / step + 1e-4) * step, ceil(high / step - 1e-4) * step
    first, last = (f"{end + 0.0:.{digits}f}" for end in ends)
    if high == low:
        return f"{interval.value / scale:.{_MOST_DIGITS}g} {unit}"
    return f"{first} {unit}" if first == last else f"{first} {unit} to {last} {unit}"


def _time_text(interval: Interval) -> str:
    if interval.value < 600.0:  # noqa: PLR2004 - ten minutes
        return range_text(interval, "s", finest=_FINEST_TIME)
    return range_text(interval, "min", 60.0) if interval.value < 36_000.0 else range_text(interval, "h", 3600.0)  # noqa: PLR2004 - ten hours


def _block(found: Identified, gain: Interval, record: Recording) -> str:
    unit, scale = _difference(record)
    lines = [
        "plant:",
        "  response:",
        f"    change: {range_text(gain.magnitude(), unit, scale)}",
        f"    time_constant: {_time_text(found.tau)}",
        f"    dead_time: {_time_text(found.theta)}",
        f"    rest_value: {_rest_text(found.rest, record)}" if found.rest else _NO_REST,
    ]
    return "\n".join(lines) + "\n"


def _difference(record: Recording) -> tuple[str, float]:
    """Return the unit of a difference of the value, and how many of the recorded unit make one."""
    if record.dimension.name == "temperature":
        return "K", record.unit.scale
    return record.unit.symbol.removesuffix(" absolute"), 1.0


def _rest_text(rest: Interval, record: Recording) -> str:
    if record.unit.symbol != "K":
        return range_text(rest, record.unit.symbol)
    low, value, high = (end - record.unit.offset for end in (rest.low, rest.value, rest.high))
    return range_text(Interval(value, low, high), "degC")


def _remarks(found: Identified, record: Recording, sensor_lag: float, supply: Supply | None) -> list[str]:
    """Say what the numbers rest on and what a reader would otherwise take for granted."""
    unit, scale = _difference(record)
    used = found.record
    course, direction = ("rises", "raise") if found.gain.value > 0.0 else ("falls", "lower")
    length = _short(used.times[-1] - used.times[0])
    out = [
        f"{len(used.times)} samples, {length} s; ranges are 95 % intervals for a first-order plant with dead time",
        f"the value {course} with more output: need.direction: {direction}",
        f"noise {_short(found.noise / scale)} {unit} (standard deviation), response {_short(found.response / scale)} {unit}",
    ]
    if used.every > 1:
        out.append(f"the recording is long: every {used.every}. sample was used")
    moves = int(np.sum(np.diff(record.output) != 0.0))
    if moves > _MOVES_OFTEN * len(record.output):
        out.append(f"the output moves {moves} times: it is taken as exact, the loop as open, and the value as at rest at the first output")
    if sensor_lag > 0.0:
        out.append(f"a sensor lag of {_short(sensor_lag)} s is taken out: time constant and dead time are the true value's")
    if found.last_before_change > found.theta.width / 2.0:
        out.append(
            f"the output is taken to move when a sample first shows it; if it moved earlier the dead time is up to "
            f"{_short(found.last_before_change)} s longer"
        )
    if found.drift.low > 0.0 or found.drift.high < 0.0:
        out.append(f"the value drifts by {_short(found.drift.value * 3600.0 / scale)} {unit}/h besides; the drift is taken out")
    worst = int(np.argmax(np.abs(used.residuals)))
    if abs(used.residuals[worst]) > _FAR_OFF * found.noise:
        out.append(f"the sample at {_short(used.times[worst])} s lies far off the fit: empty its cell if it is a misreading")
    if found.correlation > _CORRELATED:
        out.append(
            f"residuals hang together (correlation {found.correlation:.2f}): the intervals are widened for it; look at the drawing, "
            "the plant may not be first order"
        )
    if not found.at_rest_before:
        out.append("the value was not at rest when the recording began; its decay is fitted too")
    out.append(f"{'rest value' if found.rest else 'no rest value'}: {found.rest_because}")
    out.append(_supply_remark(supply))
    return out


def _supply_remark(supply: Supply | None) -> str:
    if supply is None:
        return "the change is that at the supply of the test; of a resistive heater give the rated supply and the supply during the test"
    if supply.during_test is None:
        share = _short(100.0 * supply.tolerance)
        return (
            f"the supply during the test is not known: the change is widened by {share} % of supply both ways, at {_short(supply.rated)} V"
        )
    return f"the change is scaled from {_short(supply.during_test)} V to {_short(supply.rated)} V by the square of the voltage"


def _drawing(found: Identified, record: Recording, name: str) -> bytes:
    used = found.record
    symbol = record.unit.symbol
    return fit_plot(Drawn(name, used.times, used.output, used.value, used.fitted, "value", symbol, "K" if symbol == "degC" else symbol))


def _short(number: float) -> str:
    return f"{number:.3g}" if isfinite(number) and abs(number) < 1000.0 else f"{number:.0f}"  # noqa: PLR2004 - 3 digits carry no exponent below
