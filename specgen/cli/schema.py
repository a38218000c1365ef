"""``specgen schema``: JSON Schema of the files for editors, and the field reference."""

import json

import click

from specgen.design.fields import reference
from specgen.model.documents import DocumentKind
from specgen.model.schema import json_schema


@click.command()
@click.argument("which", type=click.Choice(["loop", "panel", "devices"]), default="loop")
@click.option("--fields", is_flag=True, help="Print the field reference as Markdown instead.")
def schema(which: DocumentKind, fields: bool) -> None:  # noqa: FBT001  click gives flags so
    """Print the JSON Schema of a loop (or of the panel or devices file), for editors."""
    if fields:
        click.echo(reference(which))
    else:
        click.echo(json.dumps(json_schema(which), indent=2, sort_keys=True))
