"""``specgen check``: read, decide, print the verdict table and every problem."""

from pathlib import Path

import click

from specgen.cli.common import exit_code, folder_argument, read, show_problems
from specgen.core.table import aligned
from specgen.design.record import dump, record_of
from specgen.design.types import Design
from specgen.view.terminal import one_line


@click.command()
@folder_argument
@click.option("--format", "form", type=click.Choice(["text", "json"]), default="text", show_default=True, help="json prints the record.")
@click.pass_context
def check(context: click.Context, folder: Path, form: str) -> None:
    """Read and decide every loop; print the verdicts and every problem.

    Exit code: 2 with any problem in the files, else 1 with a held loop or panel, else 0.
    """
    design = read(folder)
    if form == "json":
        click.echo(dump(record_of(design)).decode("utf-8"), nl=False)
    else:
        _print_text(design)
    context.exit(exit_code(design))


def _panel_lines(design: Design) -> list[str]:
    """Return what the panel's own rules found wrong or could not answer; a broken must holds the panel whatever its loops do."""
    panel = design.panel_design
    if panel is None:
        return []
    told = [f for f in panel.findings if f.outcome in ("broken", "unanswered")]
    return [f"panel {f.outcome} {f.rule} ({f.weight}): {panel.phrasing.fill(f.text, f.words)}" for f in told]


def _print_text(design: Design) -> None:
    rows = [(loop.tag, loop.verdict, one_line(loop)) for loop in design.loops]
    if rows:
        click.echo(aligned(("loop", "verdict", "decision"), rows))
    found = _panel_lines(design)
    if found:
        click.echo("\n" + "\n".join(found))
    if design.problems:
        click.echo("")
        show_problems(design, err=False)
    counts = ", ".join(f"{n} {v}" for v in ("meets", "deviates", "open", "held") if (n := sum(1 for x in design.loops if x.verdict == v)))
    problems = f"{len(design.problems)} problem{'' if len(design.problems) == 1 else 's'} in the files"
    held = "; the panel is held" if design.panel_design is not None and design.panel_design.verdict == "held" else ""
    loops = f"{len(design.loops)} loop{'' if len(design.loops) == 1 else 's'}"
    click.echo(f"\n{loops}: {counts or 'none'}{held}; {problems}")
