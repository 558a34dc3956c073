"""`fabgen explain`: the page of a code."""

import difflib
import re

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
    written = code.upper()
    if short := re.fullmatch("([A-Z])([0-9])", written):
        written = f"{short[1]}0{short[2]}"
    page = registry.code_page(written)
    if page is None:
        near = difflib.get_close_matches(written, registry.codes(), n=1)
        hint = f"did you mean {near[0]}?" if near else "`fabgen explain` lists all codes"
        raise InputError(f"there is no code {code}", hint)
    click.echo(f"{written}  {page}", nl=False)
