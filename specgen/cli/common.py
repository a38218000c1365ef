"""What several commands share: the folder argument, the reading of a design, problems on the terminal, the exit code."""

import sys
from pathlib import Path
from typing import IO, Any

import click

from specgen.core.diagnostic import Diagnostic
from specgen.design.project import load_design
from specgen.design.types import Design
from specgen.source.excerpt import excerpt

TROUBLE = 2  # exit code
folder_argument = click.argument("folder", default=".", type=click.Path(file_okay=False, path_type=Path), metavar="[DIR]")


class Trouble(click.ClickException):
    """What ends a command in one line; its exit code is not that of a held loop."""

    exit_code = TROUBLE

    def show(self, file: IO[Any] | None = None) -> None:
        """Print the line."""
        click.echo(f"specgen: {self.format_message()}", err=file is None, file=file)


def read(folder: Path) -> Design:
    """Read and decide a folder, or say in one line why that cannot be."""
    if not folder.is_dir():
        raise Trouble(f"{folder} is no folder; name the one that holds mkdocs.yml and loops/")
    if not (folder / "loops").is_dir():
        raise Trouble(f"{folder} has no folder loops/; `specgen start {folder}` makes one to begin with")
    with click.progressbar(length=1, label="deciding", file=sys.stderr, hidden=not _on_terminal()) as bar:

        def progress(done: int, of: int) -> None:
            bar.length = of
            bar.pos = done
            bar.update(0)

        return load_design(folder, progress, firmness=True, workers=0, remember=True)


def _on_terminal() -> bool:
    return sys.stderr.isatty()


def exit_code(design: Design) -> int:
    """Return 2 with any input problem, else 1 with anything held, else 0."""
    if any(problem.severity == "error" for problem in design.problems):
        return TROUBLE
    return 1 if design.verdict == "held" else 0


def show_problems(design: Design, *, err: bool) -> None:
    """Print every problem with its line of text and a hint below the place."""
    texts = {source.name: source.content for source in design.sources}
    for problem in design.problems:
        click.echo(problem.line(), err=err)
        shown = _excerpt(problem, texts)
        if shown:
            click.echo(shown, err=err)
        elif problem.hint:
            click.echo(f"  {problem.hint}", err=err)


def _excerpt(problem: Diagnostic, texts: dict[str, bytes]) -> str:
    content = texts.get(problem.span.file)
    if content is None:
        return ""
    return excerpt(problem.span, content.decode("utf-8", errors="replace"), problem.hint)
