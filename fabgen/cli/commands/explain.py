"""`fabgen explain`: the page of a code."""

import click

from fabgen import registry
from fabgen.errors import InputError


@click.command()
@click.argument("code", required=False)
def explain(code: str | None) -> None:
    """Print what a code such as H03 means, its limit and source, and what to do; without a code, list all."""
    if code is None:
        for known in registry.codes():
            click.echo(f"{known}  {registry.code_title(known)}")
        return
    page = registry.code_page(code.upper())
    if page is None:
        import difflib

        near = difflib.get_close_matches(code.upper(), registry.codes(), n=1, cutoff=0.5)
        hint = f"did you mean {near[0]}?" if near else "`fabgen explain` lists all codes"
        raise InputError(f"there is no code {code}", hint)
    click.echo(f"{code.upper()}  {page}", nl=False)
