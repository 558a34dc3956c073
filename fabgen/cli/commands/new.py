"""`fabgen new`: start a design file."""

import errno
from pathlib import Path

import click

from fabgen.errors import InputError, MachineError


@click.command()
@click.argument("name")
def new(name: str) -> None:
    """Write NAME.yaml in the current folder: the shortest design that builds. Never overwrites."""
    from fabgen.read.starter import starter

    path = Path(name if name.endswith((".yaml", ".yml")) else f"{name}.yaml")
    if path.parent != Path() or not path.name[0].isalnum() or not path.name.isprintable():
        raise InputError(
            f"{name!r} is not a plain file name",
            "begin with a letter or digit; to write it elsewhere, change to that folder first",
        )
    text = starter(path.stem)
    made = False
    try:
        with path.open("x", encoding="utf-8", newline="\n") as out:
            made = True
            out.write(text)
    except FileExistsError:
        raise InputError(f"{path} is there already", "choose another name") from None
    except OSError as error:
        if made:
            path.unlink(missing_ok=True)
        if error.errno == errno.ENAMETOOLONG:
            raise InputError("the name is too long for this disk", "choose a shorter one") from error
        fix = "change to a folder that you may write to" if isinstance(error, PermissionError) else "free some space"
        raise MachineError(f"cannot write {path}: {error.strerror}", fix) from error
    click.echo(str(path))
