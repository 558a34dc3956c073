"""`fabgen schema`: the design file's JSON Schema."""

import click

from fabgen.cli.report import print_json


@click.command()
def schema() -> None:
    """Print the JSON Schema of design files, for an editor."""
    from fabgen.read.schema import schema as design_schema

    print_json(design_schema())
