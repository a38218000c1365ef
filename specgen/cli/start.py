"""``specgen start``: a new dossier folder to begin with."""

from importlib import resources
from pathlib import Path

import click

from specgen.cli.common import Trouble

FILES = ("mkdocs.yml", "loops/panel.yml", "loops/first-loops.yml")


@click.command()
@click.argument("folder", type=click.Path(file_okay=False, path_type=Path), metavar="DIR")
def start(folder: Path) -> None:
    """Make a new dossier folder DIR with a commented panel and two loops; never overwrite anything."""
    standing = [name for name in FILES if (folder / name).exists()]
    if standing:
        raise Trouble(f"{folder / standing[0]} is already there; nothing was written")
    starter = resources.files("specgen.cli") / "starter"
    for name in FILES:
        target = folder / name
        target.parent.mkdir(parents=True, exist_ok=True)
        # mode x: what somebody else wrote a moment ago is not overwritten either
        with target.open("xb") as file:
            file.write(starter.joinpath(name).read_bytes())
    click.echo(f"written: {', '.join(FILES)}\nnext: specgen check {folder}")
