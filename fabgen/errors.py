"""Everything that can stop the program, in one tree.

FabgenError                 carries the exit code
├── InputError         2    the design file or the command line is wrong
│   └── DesignErrors   2    every problem of one design file, each with its place
├── MachineError       3    the disk, a permission, a missing library
└── ProgramError       3    a bug: the program contradicts itself

Judgements about a readable design are not errors: they are findings (`fabgen.design.findings`).
"""

from fabgen.frozen import frozen


class FabgenError(Exception):
    """Base of all expected failures.

    Args:
        message: what is wrong, one sentence.
        fix: the cheapest way out, one sentence; empty when there is none.
    """

    exit_code = 3

    def __init__(self, message: str, fix: str = "") -> None:
        super().__init__(message)
        self.message = message
        self.fix = fix


class InputError(FabgenError):
    """The design file or the command line is wrong."""

    exit_code = 2


class MachineError(FabgenError):
    """The machine is in the way: disk, permission, missing system library."""


class ProgramError(FabgenError):
    """The program contradicts itself; never the user's fault."""


@frozen
class Place:
    """A place in a text file, counted from 1.

    Attributes:
        file: the path as the user gave it.
        line: line number.
        column: column number.
        text: the whole line, without its end.
        width: how many characters the marker underlines.
    """

    file: str
    line: int
    column: int
    text: str = ""
    width: int = 1


@frozen
class Problem:
    """One mistake in a design file.

    Attributes:
        code: a D code; `fabgen explain CODE` prints its page.
        message: what is wrong.
        place: where.
        fix: the cheapest fix, with an example.
    """

    code: str
    message: str
    place: Place
    fix: str = ""

    def __str__(self) -> str:
        place = self.place
        lines = [f"{place.file}:{place.line}:{place.column}: {self.code} {self.message}"]
        if place.text:
            text, offset = _excerpt(place.text, place.column - 1)
            marker = "^" * max(1, min(place.width, len(text) - offset))
            lines += [f"  {text}", f"  {' ' * offset}{marker}"]
        if self.fix:
            lines.append(f"  {self.fix}")
        return "\n".join(lines)


class DesignErrors(InputError):
    """All problems of one design file.

    Args:
        problems: at least one, in file order.
    """

    def __init__(self, problems: tuple[Problem, ...]) -> None:
        super().__init__("\n".join(str(problem) for problem in problems))
        self.problems = problems


def _excerpt(text: str, offset: int, longest: int = 120) -> tuple[str, int]:
    """Cut a long line round the marked column; control characters become spaces."""
    start = max(0, min(offset - longest // 2, len(text) - longest))
    cut = "".join(c if c.isprintable() else " " for c in text[start : start + longest])
    return cut, min(offset - start, len(cut))
