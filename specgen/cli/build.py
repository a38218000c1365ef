"""``specgen build``: the dossier into site/."""

from pathlib import Path

import click

from specgen.cli.common import Trouble, exit_code, folder_argument, read, show_problems
from specgen.render.site import SiteError, write_site


@click.command()
@folder_argument
@click.pass_context
def build(context: click.Context, folder: Path) -> None:
    """Write the dossier of DIR into its site/; the one before stays until the new one is whole.

    Exit code: 2 with any problem in the files (the site is still built from the good loops), else 1 with a held
    loop or panel, else 0.
    """
    design = read(folder)
    show_problems(design, err=True)
    try:
        index = write_site(folder, design) / "index.html"
    except SiteError as error:
        raise Trouble(str(error)) from None
    click.echo(f"{len(design.loops)} loop{'' if len(design.loops) == 1 else 's'}; open {index.resolve().as_uri()}")
    context.exit(exit_code(design))
