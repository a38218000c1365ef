"""``specgen explain``: one loop's reasoning in the terminal."""

from pathlib import Path

import click

from specgen.cli.common import Trouble, exit_code, folder_argument, read, show_problems
from specgen.view.terminal import reasoning


@click.command()
@click.argument("tag")
@folder_argument
@click.pass_context
def explain(context: click.Context, tag: str, folder: Path) -> None:
    """Print why loop TAG is decided as it is: every rule that bore on it and every alternative."""
    design = read(folder)
    found = next((loop for loop in design.loops if loop.tag.lower() == tag.lower()), None)
    if found is None:
        if design.problems:
            show_problems(design, err=True)
        known = ", ".join(loop.tag for loop in design.loops)
        raise Trouble(f"no loop {tag} could be read; there are: {known or 'none'}")
    click.echo(reasoning(found))
    context.exit(exit_code(design))
