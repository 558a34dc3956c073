"""One line of a CSV table as cells with their places, and what shows that a table is separated by something else."""

from collections.abc import Sequence
from typing import NamedTuple

from fabgen.read.source import Problems, Source


class Cell(NamedTuple):
    """One cell: its text without quotes, its column counted from 1, and its width as written."""

    text: str
    column: int
    width: int


def separated_by_commas(source: Source, number: int, example: str, problems: Problems) -> bool:
    """Whether the header is separated by commas; reported when it is not.

    Args:
        source: the table.
        number: the header's line, from 1.
        example: a header as it should be.
        problems: takes the report.
    """
    line = source.lines[number - 1]
    for mark, called in ((";", "semicolons"), ("\t", "tabs"), ("|", "bars")):
        if mark in line and "," not in line:
            fix = f"separate cells with commas and write decimals with a point: {example}"
            problems.add("D22", f"the table is separated by {called}", source.place(number, line.index(mark) + 1), fix)
            return False
    return True


def all_named(
    source: Source, number: int, names: Sequence[str], cells: Sequence[Cell], problems: Problems, code: str = "D22"
) -> bool:
    """Whether every value of a row stands under a column's name; reported when one does not.

    Args:
        source: the table.
        number: the row's line, from 1.
        names: the columns' names; an unnamed column may only hold empty cells.
        cells: the row.
        problems: takes the report.
        code: of the report.
    """
    nameless = [cell for name, cell in zip(names, cells, strict=False) if cell.text and not name]
    beyond = [*nameless, *cells[len(names) :]]
    if not beyond:
        return True
    message = f"this row has {len(cells)} cells, the header has {len(names)} columns"
    if nameless:
        message = f"'{nameless[0].text}' stands in a column without a name"
    fix = "write decimals with a point, 1.53 and not 1,53; a text with a comma goes in quotes"
    problems.add(code, message, source.place(number, beyond[0].column, max(1, beyond[0].width)), fix)
    return False


def cells_of(source: Source, number: int, problems: Problems) -> list[Cell]:
    """Split one line at its commas; a cell in double quotes may hold commas and doubled quotes.

    Args:
        source: the table.
        number: of the line, from 1.
        problems: takes quotes that do not close.
    """
    line = source.lines[number - 1]
    cells: list[Cell] = []
    start = 0
    while True:
        begin = start + len(line[start:]) - len(line[start:].lstrip(" \t"))
        if line[begin : begin + 1] == '"':
            end = _closing_quote(line, begin)
            if end is None:
                place = source.place(number, begin + 1, len(line) - begin)
                problems.add("D22", "a quote is not closed on its line", place, "close it before the next comma")
                cells.append(Cell("", begin + 1, len(line) - begin))
                return cells
            stop = line.find(",", end + 1)
            rest = line[end + 1 : stop if stop >= 0 else None]
            if rest.strip():
                place = source.place(number, end + 2, len(rest))
                problems.add("D22", "text after a closing quote", place, "put the whole cell in quotes")
            text, width = line[begin + 1 : end].replace('""', '"').strip(), end + 1 - begin
        else:
            stop = line.find(",", start)
            text = line[start : stop if stop >= 0 else None].strip()
            width = len(text)
        cells.append(Cell(text, min(begin, stop if stop >= 0 else len(line)) + 1, width))
        if stop < 0:
            return cells
        start = stop + 1


def _closing_quote(line: str, begin: int) -> int | None:
    """Index of the quote that closes the one at `begin`."""
    at = begin + 1
    while (at := line.find('"', at)) >= 0:
        if line[at + 1 : at + 2] != '"':
            return at
        at += 2
    return None
