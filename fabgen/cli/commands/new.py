"""`fabgen new`: start a design file."""

from pathlib import Path

import click

from fabgen.errors import InputError, MachineError


@click.command()
@click.argument("name")
def new(name: str) -> None:
    """Write NAME.yaml in the current folder: the shortest design that builds. Never overwrites."""
    from fabgen.read.starter import starter

    path = Path(name if name.endswith((".yaml", ".yml")) else f"{name}.yaml")
    if path.parent != Path():
        raise InputError(f"{name} is not a plain file name", "change to the folder first, then `fabgen new NAME`")
    text = starter(path.stem)
    try:
        with path.open("x", encoding="utf-8", newline="\n") as out:
            out.write(text)
    except FileExistsError:
        raise InputError(f"{path} is there already", "choose another name") from None
    except OSError as error:
        raise MachineError(f"cannot write {path}: {error.strerror}") from error
    click.echo(str(path))
