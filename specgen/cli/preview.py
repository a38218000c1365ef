"""``specgen preview``: the dossier in a browser, renewed on save."""

import webbrowser
from pathlib import Path

import click

from specgen.cli.common import Trouble, folder_argument, show_problems
from specgen.design.types import Design
from specgen.render.preview import serve
from specgen.render.site import SiteError


@click.command()
@folder_argument
@click.option("--port", type=click.IntRange(1, 65535), default=8000, show_default=True, help="Port on 127.0.0.1; no other machine sees it.")
@click.option("--open", "shown", is_flag=True, help="Show it in the web browser.")
def preview(folder: Path, port: int, shown: bool) -> None:  # noqa: FBT001  click passes flags by name
    """Serve the dossier of DIR on this machine and renew the shown page on save, until Ctrl-C.

    Problems in the files stand on the pages and here. Firmness is left out, since it takes longer than all else; build
    has it. Decisions are remembered in DIR/.specgen; nothing else is written into DIR.
    """
    if not (folder / "loops").is_dir():
        raise Trouble(f"{folder} has no folder loops/; `specgen start {folder}` makes one to begin with")

    def tell(design: Design, seconds: float) -> None:
        show_problems(design, err=True)
        click.echo(f"{len(design.loops)} loop{'' if len(design.loops) == 1 else 's'} in {seconds:.1f} s")

    def ready(url: str) -> None:
        click.echo(f"serving {url} and watching {folder / 'loops'}; Ctrl-C ends it")
        if shown:
            webbrowser.open(url)

    try:
        serve(folder, port, tell, ready)
    except SiteError as error:
        raise Trouble(str(error)) from None
