"""What was measured on a built array, as CSV: one row per element, nothing assumed.

Columns `element`, `length` and `station`, if wanted `left`, `right` (what stands out of the boom on each side) and
`remarks`. A heading may carry the unit of its bare numbers: `length_mm`, `station_in`; without one the unit of the
design file holds, or each cell writes its own.
"""

from pathlib import Path
from typing import NamedTuple

from fabgen.design.arranged import Arranged
from fabgen.design.as_built import Measured
from fabgen.errors import Place
from fabgen.read.csv_cells import Cell, all_named, cells_of, separated_by_commas
from fabgen.read.nearest import suggestion
from fabgen.read.source import Problems, Source, read_source
from fabgen.units import UnitError, parse_length_mm

COLUMNS = {
    "element": "element", "id": "element",
    "length": "length", "measured_length": "length",
    "station": "station", "measured_station": "station",
    "left": "left", "projection_left": "left", "left_projection": "left",
    "right": "right", "projection_right": "right", "right_projection": "right",
    "remarks": "remarks",
}  # fmt: skip
NEEDED = ("element", "length", "station")
HEADER = "element,length_mm,station_mm,left_mm,right_mm"
LENGTH_SHARE = 0.2
PROJECTION_PLAY_MM = 3.0
"""How far two projections may miss the rod they belong to: boom walls, burrs, a tape read twice."""


class _Column(NamedTuple):
    name: str
    unit: str | None


def read_measured(path: Path, arranged: Arranged, unit: str | None) -> tuple[Measured, ...]:
    """Read and check a table of measurements against the drawing it belongs to.

    Args:
        path: the CSV file.
        arranged: the drawing.
        unit: of bare numbers under headings without one: `mm`, `in`, or None when the design file does not say.

    Returns:
        One record per element in order of station.

    Raises:
        DesignErrors: everything that is wrong with the table, at its row and column.
        InputError: there is no such file.
        MachineError: it cannot be read.
    """
    source = read_source(path, str(path))
    problems = Problems(source.shown_as)
    numbers = [number for number, line in enumerate(source.lines, start=1) if line.strip(" \t,")]
    if not numbers:
        problems.add("D22", "the table is empty", source.place(1, 1), f"begin with the header {HEADER}")
        problems.stop()
    header = _header(source, numbers[0], unit, problems)
    problems.stop()
    known = {line.element: line for line in arranged.ledger.lines}
    rows: dict[str, tuple[Measured, int]] = {}
    for number in numbers[1:]:
        row = _Row(source, number, header, problems)
        measured = row.measured()
        if measured is None:
            continue
        if measured.element not in known:
            message = f"{measured.element} is no element of this design"
            row.refuse("element", message, suggestion(measured.element, list(known)))
        elif measured.element in rows:
            message = f"{measured.element} stands twice, first in line {rows[measured.element][1]}"
            row.refuse("element", message, "keep one row per element")
        else:
            rows[measured.element] = (measured, number)
            _judge(row, measured, arranged)
    for element in known:
        if element not in rows and not _mentioned(source, numbers[1:], element):
            place = source.place(numbers[-1], 1, max(1, len(source.lines[numbers[-1] - 1])))
            problems.add("D41", f"{element} has no row", place, f"measure it and add a row {element},…")
    problems.stop()
    return tuple(rows[element][0] for element in known)


def _mentioned(source: Source, numbers: list[int], element: str) -> bool:
    """Whether a row that could not be read belongs to an element: one report of it is enough."""
    return any(source.lines[number - 1].split(",")[0].strip(' "\t') == element for number in numbers)


def _header(source: Source, number: int, unit: str | None, problems: Problems) -> list[_Column]:
    """The columns in order; one without a name is there too."""
    if not separated_by_commas(source, number, HEADER, problems):
        return []
    cells = cells_of(source, number, problems)
    columns = [_column(cell.text, unit) for cell in cells]
    names = [column.name for column in columns]
    whole = source.place(number, 1, max(1, len(source.lines[number - 1])))
    if not any(names):
        problems.add("D22", "the first line does not name the columns", whole, f"begin with the header {HEADER}")
        return []
    for position, (cell, name) in enumerate(zip(cells, names, strict=True)):
        place = source.place(number, cell.column, max(1, cell.width))
        if cell.text and not name:
            known = list(dict.fromkeys(COLUMNS.values()))
            problems.add("D06", f"`{cell.text}` is not a column", place, suggestion(cell.text, known))
        elif name and name in names[:position]:
            problems.add("D05", f"the column `{name}` stands twice", place, "keep one of the two")
    for needed in NEEDED:
        if not problems.found and needed not in names:
            problems.add("D07", f"the column `{needed}` is missing", whole, f"the header needs {HEADER}")
    return columns


def _column(written: str, unit: str | None) -> _Column:
    """What a heading means, with its own unit or the file's; without a name where it means nothing known."""
    plain = "_".join(written.lower().replace("(", " ").replace(")", " ").split())
    own = next((each for each in ("mm", "in") if plain.endswith(f"_{each}")), None)
    return _Column(COLUMNS.get(plain.removesuffix(f"_{own}") if own else plain, ""), own or unit)


class _Row:
    """The cells of one line by column, and what is wrong with them."""

    def __init__(self, source: Source, number: int, header: list[_Column], problems: Problems) -> None:
        self.source, self.number, self.problems = source, number, problems
        self.units = {column.name: column.unit for column in header}
        before = len(problems.found)
        found = cells_of(source, number, problems)
        self.sound = len(problems.found) == before
        self.cells = {column.name: cell for column, cell in zip(header, found, strict=False)}
        self.sound = self.sound and all_named(source, number, [column.name for column in header], found, problems)

    def place(self, name: str) -> Place:
        """Where a cell stands; the row's end where it is left out."""
        cell = self.cells.get(name, Cell("", len(self.source.lines[self.number - 1]) + 1, 1))
        return self.source.place(self.number, cell.column, max(1, cell.width))

    def refuse(self, name: str, message: str, fix: str, code: str = "D41") -> None:
        """Report one cell."""
        self.problems.add(code, message, self.place(name), fix)

    def text(self, name: str) -> str:
        """A cell's text; empty where the column or the cell is left out."""
        return self.cells[name].text if name in self.cells else ""

    def length_mm(self, name: str) -> float | None:
        """A measured length, None where none was written."""
        text = self.text(name)
        if not text:
            return None
        try:
            return parse_length_mm(text, self.units[name])
        except UnitError as error:
            code = "D11" if self.units[name] is None and text.replace(".", "", 1).isdigit() else "D10"
            self.refuse(name, f"{name}: {error.message}", error.fix, code)
            return None

    def measured(self) -> Measured | None:
        """The row as a record, None when something is wrong with it."""
        if not self.sound:
            return None
        before = len(self.problems.found)
        values = {name: self.length_mm(name) for name in ("length", "station", "left", "right")}
        for name in NEEDED:
            if not self.text(name):
                self.refuse(name, f"`{name}` is empty", "measure it: nothing is filled in")
        length_mm, station_mm = values["length"], values["station"]
        if length_mm is None or station_mm is None or len(self.problems.found) > before:
            return None
        return Measured(self.text("element"), length_mm, station_mm, values["left"], values["right"])


def _judge(row: _Row, measured: Measured, arranged: Arranged) -> None:
    """Report what no build of this drawing can measure."""
    line = arranged.ledger.line(measured.element)
    if abs(measured.length_mm - line.cut_mm) > LENGTH_SHARE * line.cut_mm:
        message = f"length: {measured.length_mm:g} mm cannot be {line.element}, drawn {line.cut_mm:.3f} mm"
        row.refuse("length", message, "was another rod measured, or one half of it?")
        return
    others = (each.station_mm for each in arranged.ledger.lines if each.element != line.element)
    nearest_mm = min(others, key=lambda other: abs(other - measured.station_mm), default=line.station_mm)
    boom_mm = arranged.design.boom.length_mm
    if not 0 <= measured.station_mm <= boom_mm:
        message = f"station: {measured.station_mm:g} mm is not on the boom of {boom_mm:.3f} mm"
        row.refuse("station", message, "stations count from the datum face, the sawn rear end")
    elif abs(nearest_mm - measured.station_mm) < abs(line.station_mm - measured.station_mm):
        message = f"station: {measured.station_mm:g} mm is nearer to another rod than to {line.element}"
        row.refuse("station", message, f"{line.element} is drawn at {line.station_mm:.3f} mm")
    _judge_projections(row, measured, _hidden_mm(arranged, measured.element))


def _judge_projections(row: _Row, measured: Measured, hidden_mm: float | None) -> None:
    for name, side_mm in (("left", measured.left_mm), ("right", measured.right_mm)):
        if side_mm is not None and not 0 < side_mm < measured.length_mm:
            row.refuse(name, f"{name}: {side_mm:g} mm of a rod of {measured.length_mm:g} mm", "measure it again")
            return
    if measured.left_mm is None or measured.right_mm is None or hidden_mm is None:
        return
    sum_mm = measured.left_mm + measured.right_mm + hidden_mm
    if abs(sum_mm - measured.length_mm) > PROJECTION_PLAY_MM:
        message = f"left, right and the {hidden_mm:.3f} mm between add up to {sum_mm:.3f} mm"
        row.refuse("right", message, f"the rod is {measured.length_mm:.3f} mm long: measure the three again")


def _hidden_mm(arranged: Arranged, element: str) -> float | None:
    """What boom or block hides of a rod, as drawn; None where nothing stands out on both sides."""
    line = arranged.ledger.line(element)
    for cut in arranged.cuts:
        if cut.element == element and cut.projection_mm > 0:
            return line.cut_mm - 2 * cut.projection_mm
    return None
