"""Parts, rules, sheets and writers are found by listing their folders.

A file is an entry; its name is the entry's name and the first line of its docstring is the summary. Both are read as
text, so listing imports nothing.
"""

import ast
import functools
import importlib
from collections.abc import Callable
from pathlib import Path
from typing import Any, cast

from fabgen.errors import ProgramError
from fabgen.frozen import frozen

ROOT = Path(__file__).parent


@frozen
class Entry:
    """One file of a listed folder.

    Attributes:
        name: the file's stem; the folder's convention says which function of that module it offers.
        module: dotted import path.
        path: the file.
    """

    name: str
    module: str
    path: Path

    @property
    def summary(self) -> str:
        """First line of the module's docstring, read when it is asked for."""
        return summary(self.path)

    def function(self, name: str | None = None) -> Callable[..., Any]:
        """Import the module and return its function `name` (by default the one named like the file).

        Raises:
            ProgramError: the module has no such function.
        """
        found = getattr(importlib.import_module(self.module), name or self.name, None)
        if not callable(found):
            raise ProgramError(f"{self.module} has no function {name or self.name}")
        return cast(Callable[..., Any], found)


@functools.cache
def entries(folder: str) -> tuple[Entry, ...]:
    """List one folder of the package, for example `check/rules`, in alphabetical order."""
    place = ROOT / folder
    package = "fabgen." + folder.replace("/", ".")
    return tuple(
        Entry(path.stem, f"{package}.{path.stem}", path)
        for path in sorted(place.glob("*.py"))
        if not path.stem.startswith("_")
    )


def entry(folder: str, name: str) -> Entry:
    """The entry `name` of a folder, without reading its neighbours.

    Raises:
        ProgramError: there is no such file.
    """
    path = ROOT / folder / f"{name}.py"
    if not path.is_file():
        raise ProgramError(f"fabgen/{folder} has no {name}.py")
    return Entry(name, f"fabgen.{folder.replace('/', '.')}.{name}", path)


def summary(path: Path) -> str:
    """First line of a module's docstring, without importing it."""
    docstring = ast.get_docstring(ast.parse(path.read_text(encoding="utf-8"))) or ""
    return docstring.partition("\n")[0]


@functools.cache
def code_page(code: str) -> str | None:
    """The page of a finding's or problem's code, title line first; None when there is no such code."""
    if code not in codes():
        return None
    return (ROOT / "codes" / f"{code}.md").read_text(encoding="utf-8")


def code_title(code: str) -> str:
    """What a code means, in one line.

    Raises:
        ProgramError: the code has no page.
    """
    page = code_page(code)
    if page is None:
        raise ProgramError(f"code {code} has no page in fabgen/codes")
    return page.partition("\n")[0].strip()


@functools.cache
def codes() -> tuple[str, ...]:
    """All codes that have a page, in order."""
    return tuple(sorted(path.stem for path in (ROOT / "codes").glob("*.md")))
