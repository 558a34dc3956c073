"""The table of elements as a CSV file beside the design file.

Header names are the keys of a row; commas separate, points are decimal marks, an empty cell is a key left out. Every
cell keeps its own line and column, so messages point into the table.
"""

from pathlib import Path

from fabgen.errors import DesignErrors, InputError
from fabgen.read.csv_cells import all_named, cells_of, separated_by_commas
from fabgen.read.gather import aliases, required
from fabgen.read.grammar import ElementKeys
from fabgen.read.nearest import nearest, suggestion
from fabgen.read.places import key_place
from fabgen.read.source import Problems, Source, read_source
from fabgen.read.yaml_tree import Map, Scalar, Seq

HEADER = "id,role,at,length"
"""The columns that a table of elements needs."""


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
        fix = error.fix if error.fix.startswith("did you mean") else "put it beside the design file"
        problems.add("D23", f"table: {error.message}", name.place, fix)
    return None


def _rows(source: Source, problems: Problems) -> Seq | None:
    """The rows as mappings; None when the header cannot be read."""
    lines = [(number, line) for number, line in enumerate(source.lines, start=1) if line.strip(" \t,")]
    if not lines:
        place = source.place(1, 1)
        problems.add("D22", "the table is empty", place, f"begin with the header {HEADER}")
        return None
    header_number, _ = lines[0]
    if not separated_by_commas(source, header_number, HEADER, problems):
        return None
    before = len(problems.found)
    header = _header(source, header_number, problems)
    if not header:
        return None
    sound = len(problems.found) == before
    rows = Seq(source, header_number, 1)
    for number, _ in lines[1:]:
        rows.append(_row(source, number, header, problems))
    return rows if sound else None


def _header(source: Source, number: int, problems: Problems) -> list[Scalar]:
    """The column names with their places, none where the line names no columns; what is wrong is reported."""
    known = aliases(ElementKeys)
    header = [
        Scalar.at(cell.text, source, number, cell.column, cell.width) for cell in cells_of(source, number, problems)
    ]
    whole = source.place(number, 1, max(1, len(source.lines[number - 1])))
    if not any(name.lower() in known for name in header):
        problems.add("D22", "the first line does not name the columns", whole, f"begin with the header {HEADER}")
        return []
    for position, name in enumerate(header):
        if name and name not in known:
            problems.add("D06", f"`{name}` is not a column", name.place, suggestion(name, known))
        elif name and name in header[:position]:
            problems.add("D05", f"the column `{name}` stands twice", name.place, "keep one of the two")
    meant = {nearest(wrong, known) for wrong in header if wrong not in known}
    for needed in required(ElementKeys):
        if needed not in header and needed not in meant:
            problems.add("D07", f"the column `{needed}` is missing", whole, f"the header needs {HEADER}")
    return header


def _row(source: Source, number: int, header: list[Scalar], problems: Problems) -> Map | Scalar:
    """One row as a mapping; a row that was refused keeps its place, so that nothing is concluded from its absence."""
    row = Map(source, number, 1, flow=True)
    before = len(problems.found)
    cells = cells_of(source, number, problems)
    if len(problems.found) > before or not all_named(source, number, header, cells, problems):
        return Scalar.absent(row)
    needed = required(ElementKeys)
    for name, cell in zip(header, cells, strict=False):
        if name and (cell.text or name in needed):
            row[name] = Scalar.at(cell.text, source, number, cell.column, max(1, cell.width))
    return row
