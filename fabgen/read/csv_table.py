"""The table of elements as a CSV file beside the design file.

Header names are the keys of a row; commas separate, points are decimal marks, an empty cell is a key left out. Every
cell keeps its own line and column, so messages point into the table.
"""

from pathlib import Path
from typing import NamedTuple

from fabgen.errors import DesignErrors, InputError
from fabgen.read.gather import aliases, required
from fabgen.read.grammar import ElementKeys
from fabgen.read.nearest import nearest, suggestion
from fabgen.read.places import key_place
from fabgen.read.source import Problems, Source, read_source
from fabgen.read.yaml_tree import Map, Scalar, Seq


class Cell(NamedTuple):
    """One cell: its text without quotes, its column counted from 1, and its width as written."""

    text: str
    column: int
    width: int


def insert_table(tree: Map, path: Path, shown: str, problems: Problems) -> bytes:
    """Put the rows of `elements: {table: file.csv}` where rows of the design file would stand.

    Args:
        tree: the design file; its `elements` are replaced.
        path: the design file.
        shown: its name in messages.
        problems: takes what is wrong with the table.

    Returns:
        The table's bytes; none when the rows stand in the design file.
    """
    elements = tree.get("elements")
    if not isinstance(elements, Map):
        return b""
    broken = Scalar.absent(elements)
    key = tree.key("elements")
    assert key is not None
    tree[key] = broken
    for extra in elements:
        if extra != "table" and isinstance(extra, Scalar):
            fix = "write table: file.csv, or rows that begin with `- `"
            problems.add("D06", f"`{extra}` is not a key here", extra.place, fix)
    name = elements.get("table")
    if not isinstance(name, Scalar) or name.empty:
        if "table" in elements or not elements:
            place = key_place(elements, "table") if "table" in elements else key.place
            problems.add("D07", "`table` needs the name of a CSV file", place, "for example table: elements.csv")
        return b""
    source = _open(name, path, shown, problems)
    if source is None:
        return b""
    rows = _rows(source, problems)
    if rows is not None:
        tree[key] = rows
    return source.data


def _open(name: Scalar, path: Path, shown: str, problems: Problems) -> Source | None:
    """The table's text, when it is a plain file in the design file's own folder."""
    if name.broken:
        return None
    if not name.isprintable() or any(mark in name for mark in "/\\:") or name.startswith("."):
        message = f"table: '{name}' is not a plain file name"
        problems.add("D23", message, name.place, "put the table beside the design file; for example elements.csv")
        return None
    folder = path.parent
    table = folder / str(name)
    if table.is_symlink() and table.resolve().parent != folder.resolve():
        message = f"table: {name} is a link that leads out of the design file's folder"
        problems.add("D23", message, name.place, "copy the table beside the design file")
        return None
    try:
        return read_source(table, str(Path(shown).with_name(table.name)))
    except DesignErrors as error:
        problems.found += error.problems
    except InputError as error:
        beside = sorted(each.name for each in folder.glob("*.csv"))
        near = nearest(name, beside)
        fix = f"did you mean {near}?" if near else "put it beside the design file"
        problems.add("D23", f"table: {error.message}", name.place, fix)
    return None


def _rows(source: Source, problems: Problems) -> Seq | None:
    """The rows as mappings; None when the header cannot be read."""
    lines = [(number, line) for number, line in enumerate(source.lines, start=1) if line.strip(" \t,")]
    if not lines:
        place = source.place(1, 1)
        problems.add("D22", "the table is empty", place, "begin with the header id,role,at,length")
        return None
    header_number, header_line = lines[0]
    for mark, called in ((";", "semicolons"), ("\t", "tabs")):
        if mark in header_line and "," not in header_line:
            place = source.place(header_number, header_line.index(mark) + 1)
            fix = "separate cells with commas and write decimals with a point: id,role,at,length"
            problems.add("D22", f"the table is separated by {called}", place, fix)
            return None
    before = len(problems.found)
    header = _header(source, header_number, problems)
    sound = len(problems.found) == before
    rows = Seq(source, header_number, 1)
    for number, _ in lines[1:]:
        row = _row(source, number, header, problems)
        if row is not None:
            rows.append(row)
    return rows if sound else None


def _header(source: Source, number: int, problems: Problems) -> list[Scalar]:
    """The column names with their places; what is wrong with them is reported."""
    known = aliases(ElementKeys)
    header: list[Scalar] = []
    for cell in cells_of(source, number, problems):
        name = Scalar.at(cell.text, source, number, cell.column, cell.width)
        if name not in known:
            problems.add("D06", f"`{name}` is not a column", name.place, suggestion(name, known))
        elif name in header:
            problems.add("D05", f"the column `{name}` stands twice", name.place, "keep one of the two")
        header.append(name)
    meant = {nearest(wrong, known) for wrong in header if wrong not in known}
    for needed in required(ElementKeys):
        if needed not in header and needed not in meant:
            place = source.place(number, 1, max(1, len(source.lines[number - 1])))
            problems.add("D07", f"the column `{needed}` is missing", place, "the header needs id,role,at,length")
    return header


def _row(source: Source, number: int, header: list[Scalar], problems: Problems) -> Map | None:
    before = len(problems.found)
    cells = cells_of(source, number, problems)
    if len(problems.found) > before:
        return None
    if len(cells) > len(header):
        place = source.place(number, cells[len(header)].column, cells[len(header)].width)
        message = f"this row has {len(cells)} cells, the header has {len(header)} columns"
        fix = "write decimals with a point, not a comma; a text with a comma goes in quotes"
        problems.add("D22", message, place, fix)
        return None
    row = Map(source, number, 1, flow=True)
    needed = required(ElementKeys)
    for name, cell in zip(header, cells, strict=False):
        if cell.text or name in needed:
            row[name] = Scalar.at(cell.text, source, number, cell.column, max(1, cell.width))
    return row


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
