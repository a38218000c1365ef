"""Recorded step tests: found beside the loop files, read, identified, and given to the loops that name them."""

import stat
from collections.abc import Iterable, Sequence
from dataclasses import dataclass, field, replace
from pathlib import Path, PurePosixPath

from specgen.core.diagnostic import Diagnostic
from specgen.core.figure import Figure
from specgen.core.quantity import Range
from specgen.core.say import Phrasing, Said
from specgen.core.unit import fits
from specgen.model.fields import shown
from specgen.model.fitted import Fitted
from specgen.model.loop import Loop
from specgen.model.loops import ReadLoop
from specgen.model.plant import StepTest
from specgen.process.step_test import Identified, Interval, NotIdentified, identify
from specgen.source.recording import Columns, ReadRecording, Recording, read_recording
from specgen.source.recording_text import LARGEST_RECORDING

DATA = "data"
FILE = ("plant", "step_test", "file")
LEAST_SQUARES = "least squares, 95 % interval from the Jacobian"
BESIDE = "it lies in loops/ or in loops/data/, for example file: data/tic-101.csv"


@dataclass(frozen=True, slots=True)
class Recordings:
    """Loops with what their recordings say, without those whose recording cannot be used; the problems; the files that were read."""

    loops: tuple[ReadLoop, ...]
    problems: tuple[Diagnostic, ...]
    files: tuple[tuple[str, bytes], ...]


def with_recordings(loops: Sequence[ReadLoop], folder: Path | None, label: str) -> Recordings:
    """Identify every step test that a loop names.

    Parameters
    ----------
    loops : sequence of ReadLoop
        Every loop that was read.
    folder : pathlib.Path or None
        The folder of the loop files; None where they were not read from a disk, so that no recording can be found.
    label : str
        How the folder is called in problems: ``"loops"``.

    Returns
    -------
    Recordings
        Nothing is raised for what the folder or a recording holds.
    """
    shelf = _Shelf(folder, label)
    kept: list[ReadLoop] = []
    problems: list[Diagnostic] = []
    for read in loops:
        test = read.loop.plant.step_test if read.loop.plant is not None else None
        if test is None:
            kept.append(read)
            continue
        found = _fitted(read, test, shelf)
        if isinstance(found, Fitted):
            kept.append(replace(read, fitted=found))
        else:
            problems += found
    return Recordings(tuple(kept), tuple(sorted(set(problems))), tuple(sorted(shelf.files.items())))


@dataclass(slots=True)
class _Shelf:
    """The files beside the loop files, each read once."""

    folder: Path | None
    label: str
    files: dict[str, bytes] = field(default_factory=dict)

    def named(self, written: str) -> str:
        return f"{self.label}/{PurePosixPath(written)}"

    def take(self, written: str) -> bytes | str:
        """Return the bytes of a file, or why there are none."""
        name = self.named(written)
        if name in self.files:
            return self.files[name]
        if self.folder is None:
            return "there is no folder to look in"
        path = self.folder / PurePosixPath(written)
        try:
            if not path.resolve().is_relative_to(self.folder.resolve()):
                return "it leads out of the folder of the loop files"
            if not stat.S_ISREG(path.stat().st_mode):
                return "it is no plain file"
            with path.open("rb") as opened:
                # a byte more than is allowed, so that what is too large is seen to be
                raw = opened.read(LARGEST_RECORDING + 1)
        except (OSError, ValueError) as error:
            return (getattr(error, "strerror", None) or "its name is no file name").lower()
        self.files[name] = raw
        return raw


def _fitted(read: ReadLoop, test: StepTest, shelf: _Shelf) -> Fitted | list[Diagnostic]:
    if not inside(test.file):
        text = f"the recording '{shown(test.file)}' does not lie beside the loop files"
        return [_problem(read, "L311", text, f"a path from loops/ without '..': {BESIDE}")]
    raw = shelf.take(test.file)
    if isinstance(raw, str):
        return [_problem(read, "L312", f"the recording {shown(test.file)} cannot be read: {raw}", BESIDE)]
    name = shelf.named(test.file)
    units = {test.value: test.unit} if test.unit is not None else {}
    recording = read_recording(raw, name, Columns(test.time, test.output, test.value, units))
    if recording.recording is None:
        return [*recording.problems, _problem(read, "L312", *_unread(recording, name))]
    return _of_recording(read, test, recording.recording, name)


def inside(written: str) -> bool:
    r"""Tell whether a path stays in the folder of the loop files or in its ``data``.

    Examples
    --------
    >>> [inside(path) for path in ("data/a.csv", "a.csv", "../a.csv", "/a.csv", "data/../../a.csv", "C:\\a.csv", "issued/A/a.csv")]
    [True, True, False, False, False, False, False]
    """
    parts = written.split("/")
    plain = all(part not in ("", ".", "..") for part in parts) and not any(sign in written for sign in "\\:\0")
    return plain and (len(parts) == 1 or parts[0] == DATA)


def _unread(recording: ReadRecording, name: str) -> tuple[str, str]:
    count = len(recording.problems)
    first = recording.problems[0].span if recording.problems else None
    where = f"the first at {first.file}:{first.line}:{first.column}" if first else ""
    return f"the recording {name} cannot be used: {count} problem{'' if count == 1 else 's'} in it", where


def _of_recording(read: ReadLoop, test: StepTest, record: Recording, name: str) -> Fitted | list[Diagnostic]:
    loop = read.loop
    if not _suits(record, loop):
        text = f"the recording's column {test.value} is in {record.unit.symbol}; the loop's quantity is {loop.need.quantity}"
        return [_problem(read, "L314", text, f"its unit is for example {loop.unit.symbol}")]
    value = record.written if loop.need.quantity == "other" else record.value
    lag = loop.sensor.lag
    # a lag that is a range is taken out at both its ends, and the intervals are joined
    lags = (0.0,) if lag is None else tuple(dict.fromkeys((float(lag.low), float(lag.high))))
    found = [identify(record.time, record.output, value, sensor_lag=known) for known in lags]
    for one in found:
        if isinstance(one, NotIdentified):
            text = f"the recording {name} does not identify the plant ({one.reason.replace('_', ' ')}): {one.text}"
            return [_problem(read, "L313", text, one.hint)]
    fits_ = [one for one in found if isinstance(one, Identified)]
    first = fits_[0]
    if (first.gain.value > 0) != loop.raises:
        course = "rises" if first.gain.value > 0 else "falls"
        text = f"in the recording {name} the value {course} with more output; need.direction is {loop.need.direction}"
        return [_problem(read, "L315", text, "correct the direction, or the columns of the recording")]
    rests = [one.rest for one in fits_ if one.rest is not None]
    if len(rests) < len(fits_):
        text = f"the recording {name} does not tell where the value settles with no output: {first.rest_because}"
        hint = "record from rest, the output still for a few minutes before the change; or declare a response: `specgen fit` prints one"
        return [_problem(read, "L316", text, hint)]
    joined = {
        "change": _joined(one.gain.magnitude() for one in fits_),
        "time_constant": _joined(one.tau for one in fits_),
        "dead_time": _joined(one.theta for one in fits_),
        "rest_value": _joined(rests),
    }
    phrasing = Phrasing(loop.unit, loop.difference_unit)
    ranges = {key: _range(interval, _DIMENSION[key], phrasing) for key, interval in joined.items()}
    return Fitted(ranges, _figures(joined, first, name, loop))


_DIMENSION = {"change": "change", "time_constant": "time", "dead_time": "time", "rest_value": "value"}
_NAMES = {
    "change": ("K", "change from no to full output, fitted"),
    "time_constant": ("τ", "time constant, fitted"),
    "dead_time": ("θ", "dead time, fitted"),
    "rest_value": ("y_off", "value at rest with no output, fitted"),
}


def _suits(record: Recording, loop: Loop) -> bool:
    """Tell whether a recorded value is of the loop's quantity."""
    if loop.need.quantity == "other":
        return record.unit.symbol == loop.unit.symbol
    return fits(loop.unit.symbol, record.dimension)


def _joined(intervals: Iterable[Interval]) -> Interval:
    each = tuple(intervals)
    return Interval(each[0].value, min(one.low for one in each), max(one.high for one in each))


def _range(interval: Interval, dimension: str, phrasing: Phrasing) -> Range:
    low, high = (phrasing.say(Said(end, dimension), 4) for end in (interval.low, interval.high))
    return Range(interval.low, interval.high, low if low == high else f"{low} to {high}")


def _figures(joined: dict[str, Interval], first: Identified, name: str, loop: Loop) -> tuple[Figure, ...]:
    count = len(first.record.times)
    source = f"step test {name}, {count} samples; {LEAST_SQUARES}"
    lag = loop.sensor.lag
    known = {} if lag is None else {"sensor lag": (float(lag.high), "time")}
    made = []
    for key, interval in joined.items():
        symbol, what = _NAMES[key]
        ends = {"least": (interval.low, _DIMENSION[key]), "most": (interval.high, _DIMENSION[key])}
        given = ends | known if key in ("time_constant", "dead_time") else ends
        formula = "y0 − K u0" if key == "rest_value" else "fit of y0 + drift t + K x(t; τ, θ)"
        made.append(Figure(symbol, what, formula, interval.value, _DIMENSION[key], source, given))
    recorded = f"step test {name}"
    made += [
        Figure("s", "noise of the recording, standard deviation", "residuals of the fit", first.noise, "change", recorded),
        Figure("Δy", "response in the recording", "largest change by the output", first.response, "change", recorded,
               {"noise": (first.noise, "change")}),
        Figure("ρ", "correlation of neighbouring residuals", "residuals of the fit", first.correlation, "number",
               f"{recorded}; the intervals are widened by it"),
    ]  # fmt: skip
    if first.drift.low > 0 or first.drift.high < 0:
        what = "drift that the output does not explain, taken out"
        made.append(Figure("drift", what, "fit", first.drift.value, "change_per_second", source))
    return tuple(made)


def _problem(read: ReadLoop, code: str, text: str, hint: str = "") -> Diagnostic:
    return Diagnostic(read.spans[FILE], code, text, hint)
