"""The group of commands and what is common to them: one clear line for what goes wrong outside specgen."""

import sys
from collections.abc import Sequence

import click

from specgen import __version__
from specgen.cli.build import build
from specgen.cli.check import check
from specgen.cli.explain import explain
from specgen.cli.fit import fit
from specgen.cli.preview import preview
from specgen.cli.schema import schema
from specgen.cli.start import start

INTERRUPTED = 130
TROUBLE = 2


@click.group(context_settings={"help_option_names": ["-h", "--help"], "max_content_width": 110})
@click.version_option(__version__, prog_name="specgen")
def commands() -> None:
    """Decide the control loops of a panel and write the design dossier."""


for command in (start, check, explain, build, preview, fit, schema):
    commands.add_command(command)


def main(arguments: Sequence[str] | None = None) -> None:
    """Run a command; Ctrl-C, a full disk and an unwritable folder end it with one line."""
    for stream in (sys.stdout, sys.stderr):
        # a Windows console may not know every sign; a question mark is better than a traceback
        if hasattr(stream, "reconfigure"):
            stream.reconfigure(errors="replace")
    try:
        sys.exit(commands.main(args=None if arguments is None else list(arguments), prog_name="specgen", standalone_mode=False) or 0)
    except click.exceptions.Abort:
        click.echo("specgen: stopped; nothing was changed", err=True)
        sys.exit(INTERRUPTED)
    except KeyboardInterrupt:
        click.echo("specgen: stopped; nothing was changed", err=True)
        sys.exit(INTERRUPTED)
    except click.ClickException as error:
        error.show()
        sys.exit(error.exit_code)
    except BrokenPipeError:
        sys.stderr.close()
        sys.exit(0)
    except OSError as error:
        what = f"{error.filename}: " if error.filename else ""
        click.echo(f"specgen: {what}{error.strerror or error}", err=True)
        sys.exit(TROUBLE)
