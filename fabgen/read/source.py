"""A text file with its lines, and the list that gathers every problem found in it.

Refused before anything is parsed: files over 1 MB, bytes that are not UTF-8, characters that cannot be printed.
"""

import contextlib
import errno
import re
from dataclasses import replace
from pathlib import Path
from typing import NamedTuple

from fabgen.errors import DesignErrors, InputError, MachineError, Place, Problem
from fabgen.read.nearest import nearest

LARGEST_BYTES = 1_000_000
"""A design file of a thousand elements has about 100 kB."""

MOST_PROBLEMS = 500
"""A file with more problems than this is told the first of them and the number of the rest."""

_UNPRINTABLE = re.compile(
    "[\x00-\x08\x0b\x0c\x0e-\x1f\x7f-\x9f\xad\u200b\u200e\u200f\u2028-\u202e\u2060\u2066-\u2069\ufeff\ufffe\uffff]"
)
_ENDINGS = (".yaml", ".yml", ".csv")
_ZIP = b"PK\x03\x04"
"""First bytes of a zip archive, which a workbook of a spreadsheet is."""

_LINE_END = re.compile(r"\r\n|\r|\n")


class Source(NamedTuple):
    """A text file as read.

    Attributes:
        shown_as: the name that messages use.
        data: its bytes.
        text: its text, without a byte order mark.
        lines: the text in lines, without their ends.
    """

    shown_as: str
    data: bytes
    text: str
    lines: tuple[str, ...]

    def place(self, line: int, column: int, width: int = 1) -> Place:
        """The place of a line and column, both counted from 1."""
        text = self.lines[line - 1] if 0 < line <= len(self.lines) else ""
        return Place(self.shown_as, line, column, text, width)


class Problems:
    """Every problem found so far.

    Args:
        first_file: the design file's name; its problems are told before those of its table.
    """

    def __init__(self, first_file: str) -> None:
        self.first_file = first_file
        self.found: list[Problem] = []

    def add(self, code: str, message: str, place: Place, fix: str = "") -> None:
        """Note one problem; a file that is nothing but problems is given up.

        Raises:
            DesignErrors: there are far too many.
        """
        self.found.append(Problem(code, message, place, fix))
        if len(self.found) >= 20 * MOST_PROBLEMS:
            self.stop()

    def stop(self) -> None:
        """Raise what was found, in file order; nothing happens when nothing was.

        Raises:
            DesignErrors: there is at least one problem.
        """
        if not self.found:
            return
        ordered = sorted(dict.fromkeys(self.found), key=lambda problem: _order(problem, self.first_file))
        told = ordered[:MOST_PROBLEMS]
        if len(ordered) > len(told):
            last = told[-1]
            told[-1] = replace(last, message=f"{last.message} (and {len(ordered) - len(told)} more problems below)")
        raise DesignErrors(tuple(told))


def _order(problem: Problem, first_file: str) -> tuple[bool, str, int, int, str, str]:
    place = problem.place
    return (place.file != first_file, place.file, place.line, place.column, problem.code, problem.message)


def read_source(path: Path, shown_as: str) -> Source:
    """Read a text file whole.

    Args:
        path: the file.
        shown_as: the name that messages use.

    Raises:
        InputError: there is no such file.
        MachineError: it cannot be read.
        DesignErrors: it is too large, not UTF-8, or holds characters that cannot be printed.
    """
    try:
        if path.is_dir():
            raise InputError(f"{shown_as} is a folder, not a file", "name the file in it")
        if not path.exists():
            raise _missing(path, shown_as)
        if not path.is_file():
            raise InputError(f"{shown_as} is not a regular file", "name a plain text file")
        with path.open("rb") as stream:
            data = stream.read(LARGEST_BYTES + 1)
    except OSError as error:
        if error.errno == errno.ENAMETOOLONG:
            raise _missing(path, shown_as) from error
        reason = error.strerror or type(error).__name__
        fix = "check its permissions" if isinstance(error, PermissionError) else "check the disk, or copy the file"
        raise MachineError(f"{shown_as} cannot be read: {reason}", fix) from error
    return as_source(data, shown_as)


def _missing(path: Path, shown_as: str) -> InputError:
    """The refusal of a file that is not there, with the nearest that is."""
    endings = [path.suffix] if path.suffix in _ENDINGS else list(_ENDINGS)
    beside: list[str] = []
    with contextlib.suppress(OSError):
        if path.is_symlink():
            return InputError(f"{shown_as} is a link that leads nowhere", "name the file itself")
        beside = sorted(each.name for each in path.parent.iterdir() if each.suffix in endings)
    near = nearest(path.name, beside)
    fix = f"did you mean {near}?" if near else "check the name and the folder"
    return InputError(f"there is no file {shown_as}", fix)


def as_source(data: bytes, shown_as: str) -> Source:
    """The text of some bytes.

    Args:
        data: the bytes of a file.
        shown_as: the name that messages use.

    Raises:
        DesignErrors: they are too many, not UTF-8, or hold characters that cannot be printed.
    """
    problems = Problems(shown_as)
    if len(data) > LARGEST_BYTES:
        place = Place(shown_as, 1, 1)
        problems.add("D02", "the file is larger than 1 MB", place, "check that this is the right file")
        problems.stop()
    if data.startswith(_ZIP):
        message, fix = "the file is a workbook or another archive, not text", "export it as plain text: CSV for a table"
        problems.add("D01", message, Place(shown_as, 1, 1), fix)
        problems.stop()
    text, bad_byte = _decode(data)
    source = Source(shown_as, data, text, tuple(_LINE_END.split(text)))
    if bad_byte is not None:
        start = max(text.rfind("\n"), text.rfind("\r")) + 1
        place = source.place(len(source.lines), len(text) - start + 1)
        problems.add("D01", f"byte 0x{bad_byte:02x} is not UTF-8 text", place, "save the file as UTF-8")
    for number, line in enumerate(source.lines, start=1):
        if match := _UNPRINTABLE.search(line):
            name = f"U+{ord(match[0]):04X}"
            place = source.place(number, match.start() + 1)
            problems.add("D01", f"the character {name} cannot be printed", place, "delete it")
    problems.stop()
    return source


def _decode(data: bytes) -> tuple[str, int | None]:
    """The text up to the first byte that is not UTF-8, and that byte."""
    data = data.removeprefix(b"\xef\xbb\xbf")
    try:
        return data.decode("utf-8"), None
    except UnicodeDecodeError as error:
        return data[: error.start].decode("utf-8"), data[error.start]
