"""``specgen explain``: one loop's reasoning in the terminal, and what a change would make of it."""

from dataclasses import replace
from pathlib import Path

import click

from specgen.cli.common import exit_code, folder_argument, read, show_problems
from specgen.core.say import digits
from specgen.core.table import aligned
from specgen.design.project import LOOPS, worst_verdict
from specgen.design.trial import Difference, Trial, differences, try_values
from specgen.design.types import DecidedLoop, Design
from specgen.source.folder import read_folder
from specgen.view.terminal import reasoning

TROUBLE = 2
_WIDEST = 60
_SECONDS = (
    "period", "shortest_on", "shortest_off", "cycle_time", "integral_time", "derivative_time", "minimum_on", "minimum_off", "time_to_band",
    "time_to_danger", "time_to_spoil", "sensor_lag",
)  # fmt: skip
_CHANGES = (
    "differential", "above", "below", "swing", "proportional_band", "neutral_zone", "load_deviation", "measuring_error", "overshoot",
)  # fmt: skip
_VALUES = ("switch_on", "switch_off", "settles_at", "set", "acts_at")
_FIXED = {
    "rating": "A", "current": "A", "loss": "W", "heat_sink": "K/W", "starts_per_hour": "an hour", "operations_per_year": "a year",
    "contact_life": "years", "phase_margin": "degrees",
}  # fmt: skip


@click.command()
@click.argument("tag")
@folder_argument
@click.option("--set", "wanted", multiple=True, metavar="PATH=VALUE", help='Try a value: --set need.tolerance="1 K"; may be repeated.')
@click.pass_context
def explain(context: click.Context, tag: str, folder: Path, wanted: tuple[str, ...]) -> None:
    """Print why loop TAG is decided as it is: every rule that bore on it and every alternative.

    With --set, lay other values over the loop's own and print side by side what changes; nothing is written.
    """
    design = read(folder)
    found = next((loop for loop in design.loops if loop.tag.lower() == tag.lower()), None)
    if found is None:
        if design.problems:
            show_problems(design, err=True)
        known = ", ".join(loop.tag for loop in design.loops)
        raise click.ClickException(f"no loop {tag} could be read; there are: {known or 'none'}")
    if not wanted:
        click.echo(reasoning(found))
        context.exit(exit_code(design))
    trial = try_values(read_folder(folder / LOOPS, LOOPS), folder / LOOPS, found, wanted, design.loops)
    for problem in trial.problems:
        click.echo(problem.line(), err=True)
        if problem.hint:
            click.echo(f"  {problem.hint}", err=True)
    if trial.after is None:
        context.exit(TROUBLE)
    click.echo(side_by_side(trial, wanted))
    context.exit(exit_code(_with(design, trial.after)))


def _with(design: Design, tried: DecidedLoop) -> Design:
    """Return the design with the tried loop in the place of its own."""
    loops = tuple(tried if loop.tag == tried.tag else loop for loop in design.loops)
    return replace(design, loops=loops, verdict=worst_verdict([loop.verdict for loop in loops]))


def side_by_side(trial: Trial, wanted: tuple[str, ...]) -> str:
    """Return what a trial changes as a table: what it is, as declared, as tried."""
    loop = trial.before.loop
    head = f"{loop.tag}  {loop.service}, with {', '.join(wanted)}"
    found = differences(trial)
    if not found:
        return f"{head}\n\nNothing changes."
    units = {**_FIXED, **dict.fromkeys(_SECONDS, "s"), **dict.fromkeys(_CHANGES, loop.difference_unit.symbol)}
    units |= dict.fromkeys(_VALUES, loop.unit.symbol)
    whole = [one for one in found if one.key == "because"]
    rows = [(_name(one), _said(one.before, one.key, units), _said(one.after, one.key, units)) for one in found if one.key != "because"]
    lines = [head, "", aligned(("", "declared", "tried"), rows)] if rows else [head]
    for one in whole:
        lines += ["", f"declared: {one.before}", f"tried:    {one.after}"]
    return "\n".join(lines)


def _name(one: Difference) -> str:
    key = one.key.replace("_", " ")
    return {"decision": key, "rules": f"rule {one.key}"}.get(one.section, f"{one.section}: {key}")


def _said(value: object, key: str, units: dict[str, str]) -> str:
    if value is None:
        return "-"
    if isinstance(value, float | int) and not isinstance(value, bool):
        unit = units.get(key.rpartition(" ")[2], "")
        return f"{digits(float(value), 4)} {unit}".rstrip()
    text = str(value).replace("_", " ")
    return text if len(text) <= _WIDEST else text[: _WIDEST - 3] + "..."
