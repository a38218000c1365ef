"""``specgen build``: the dossier into site/."""

from pathlib import Path

import click

from specgen.cli.common import TROUBLE, Trouble, exit_code, folder_argument, read, show_problems
from specgen.render.pdf import PdfError, find_browser, print_dossier
from specgen.render.site import SiteError, write_site


@click.command()
@folder_argument
@click.option("--pdf", is_flag=True, help="Also print it to dossier.pdf in site/, by an installed Chromium, Chrome or Edge.")
@click.option("--browser", metavar="PATH", default="", help="What prints, if not found by itself; SPECGEN_BROWSER does the same.")
@click.pass_context
def build(context: click.Context, folder: Path, pdf: bool, browser: str) -> None:  # noqa: FBT001  click passes flags by name
    """Write the dossier of DIR into its site/; the one before stays until the new one is whole.

    Exit code: 2 with any problem in the files (the site is still built from the good loops) or where --pdf was asked for
    and nothing could be printed (the site is still built), else 1 with a held loop or panel, else 0.
    """
    design = read(folder)
    show_problems(design, err=True)
    printed: list[str] = []
    unprinted: list[str] = []

    def finish(fresh: Path) -> None:
        try:
            printed.extend(print_dossier(design, fresh, find_browser(browser)))
        except PdfError as error:
            unprinted.append(str(error))

    try:
        site = write_site(folder, design, finish=finish if pdf else None)
    except SiteError as error:
        raise Trouble(str(error)) from None
    click.echo(f"{len(design.loops)} loop{'' if len(design.loops) == 1 else 's'}; open {(site / 'index.html').resolve().as_uri()}")
    for name in printed:
        click.echo(f"printed {site / name}")
    for line in unprinted:
        click.echo(f"specgen: no PDF: {line}", err=True)
    context.exit(TROUBLE if unprinted else exit_code(design))
