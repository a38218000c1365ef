"""``specgen fit``: a recorded step test to a ``plant:`` block for the loop file."""

from collections.abc import Callable
from math import inf
from pathlib import Path

import click

from specgen.core.quantity import Quantity, QuantityError, parse_quantity
from specgen.exchange.fit import FitReport, Supply, fit_file
from specgen.source.excerpt import excerpt
from specgen.source.recording import Columns
from specgen.source.recording_text import Problems, decoded

TROUBLE = 2
WHOLE = 1.0  # a tolerance of the whole supply is none


def _quantity(dimension: str, below: float = inf) -> Callable[[click.Context, click.Parameter, str | None], Quantity | None]:
    """Return what reads an option as a quantity with its unit, as a loop file would."""

    def read(_context: click.Context, _parameter: click.Parameter, given: str | None) -> Quantity | None:
        if given is None:
            return None
        try:
            found = parse_quantity(given, dimension)
        except QuantityError as error:
            raise click.BadParameter(f"{error.text}; {error.hint}" if error.hint else error.text) from None
        if found >= below:
            raise click.BadParameter(f"'{given}' is not below the whole")
        return found

    return read


def _units(_context: click.Context, _parameter: click.Parameter, given: tuple[str, ...]) -> dict[str, str]:
    pairs = [one.partition("=") for one in given]
    for (name, sign, unit), one in zip(pairs, given, strict=True):
        if not (name and sign and unit):
            raise click.BadParameter(f"'{one}' is not COLUMN=UNIT, as in --unit reading=degC")
    return {name: unit for name, _, unit in pairs}


@click.command()
@click.argument("recording", type=click.Path(path_type=Path), metavar="CSV")
@click.option("--time", metavar="COLUMN", help="Column of the time; found by its unit otherwise, as the others are.")
@click.option("--output", metavar="COLUMN", help="Column of the controller's output.")
@click.option("--value", metavar="COLUMN", help="Column of the measured value.")
@click.option("--unit", "units", metavar="COLUMN=UNIT", multiple=True, callback=_units, help="Unit of a column whose header has none.")
@click.option("--sensor-lag", callback=_quantity("time"), default="0 s", metavar="TIME", help="Lag of the sensor, taken out: '12 s'.")
@click.option("--rated", callback=_quantity("voltage"), metavar="VOLTAGE", help="Rated supply of a resistive heater: '400 V'.")
@click.option("--supply", callback=_quantity("voltage"), metavar="VOLTAGE", help="Supply during the test: '398 V'; goes with --rated.")
@click.option("--tolerance", callback=_quantity("fraction", WHOLE), default="10 percent", show_default=True,
              metavar="SHARE", help="Tolerance of the supply, where nobody noted it during the test.")  # fmt: skip
@click.option("--plot", type=click.Path(dir_okay=False, path_type=Path), metavar="FILE", help="Where the drawing goes, if not beside CSV.")
@click.pass_context
def fit(
    context: click.Context, recording: Path, time: str | None, output: str | None, value: str | None, units: dict[str, str],
    sensor_lag: Quantity, rated: Quantity | None, supply: Quantity | None, tolerance: Quantity, plot: Path | None,
) -> None:  # fmt: skip
    """Identify the step test recorded in CSV and print a plant block for a loop file.

    Only the block goes to the standard output, so that it can be sent to a file; remarks, problems and the place of the
    drawing go to the standard error.

    Exit code: 0 with a block, 2 without one, or where a drawing that was asked for cannot be written.
    """
    for name, volts in (("--rated", rated), ("--supply", supply)):
        if volts is not None and volts <= 0:
            raise click.UsageError(f"{name} is above zero, for example {name} '400 V'")
    if supply is not None and rated is None:
        raise click.UsageError("--supply says what the test was made at; --rated says what it is scaled to: give both")
    if plot is not None and _same(plot, recording):
        raise click.UsageError("--plot would overwrite the recording; name another file")
    made_at = Supply(float(rated), None if supply is None else float(supply), float(tolerance)) if rated is not None else None
    report = fit_file(recording, columns=Columns(time, output, value, units), sensor_lag=float(sensor_lag), supply=made_at, plot=plot)
    click.echo(report.block, nl=False)
    _tell(report, recording)
    written = _draw(report)
    context.exit(report.exit_code if written or plot is None else TROUBLE)


def _same(one: Path, other: Path) -> bool:
    try:
        return one.samefile(other)
    except OSError:
        return False


def _tell(report: FitReport, recording: Path) -> None:
    text = _text(recording) if report.problems else ""
    for problem in report.problems:
        click.echo(problem.line(), err=True)
        below = excerpt(problem.span, text, problem.hint)
        if below or problem.hint:
            click.echo(below or f"  {problem.hint}", err=True)
    for message in report.messages:
        click.echo(message, err=True)


def _text(recording: Path) -> str:
    """Return the recording as it was read, to show the lines that are at fault."""
    try:
        return decoded(recording.read_bytes(), Problems(recording.as_posix()), [])
    except OSError:
        return ""


def _draw(report: FitReport) -> bool:
    """Write the drawing where there is one; tell whether that went well."""
    if not report.plot:
        return True
    try:
        report.plot_path.write_bytes(report.plot)
    except OSError as error:
        click.echo(f"the drawing cannot be written to {report.plot_path}: {(error.strerror or str(error)).lower()}", err=True)
        return False
    click.echo(f"drawing: {report.plot_path}", err=True)
    return True
