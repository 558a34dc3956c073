"""The sheet of readings of a coupon: a CSV table with a few named values above it.

Lines that begin with `#` hold a name and its value, parted by a comma; the first other line names the columns. Rows
without a reading are steps that nobody took and are left out. Every mistake is told with its row and column.
"""

import cmath
import hashlib
import math
from pathlib import Path

from fabgen.design.readings import COLUMNS, REFLECTION_NOISE, SWR_NOISE, Reading, ReadingSheet, Setup
from fabgen.read.csv_cells import Cell, all_named, cells_of, separated_by_commas
from fabgen.read.nearest import suggestion
from fabgen.read.source import Problems, Source, read_source

NAMES = ("mount", "mount_key", "boom_piece_mm", "reflection_noise", "swr_noise")
_NEEDED = ("setup", "length_mm", "frequency_mhz")
_KINDS = (("re", "im"), ("magnitude", "phase_deg"), ("swr",))
_RANGES = {
    "length_mm": (5.0, 12_000.0),
    "frequency_mhz": (20.0, 6000.0),
    "re": (-1.0, 1.0),
    "im": (-1.0, 1.0),
    "magnitude": (0.0, 1.0),
    "phase_deg": (-360.0, 360.0),
    "swr": (1.0, 100.0),
    "boom_piece_mm": (5.0, 12_000.0),
    "reflection_noise": (1e-5, 0.2),
    "swr_noise": (1e-5, 1.0),
}

Row = dict[str, Cell]
"""Every cell that is not empty, by the name of its column."""


def read_readings(path: Path) -> ReadingSheet:
    """Read a sheet of readings.

    Args:
        path: the CSV file.

    Raises:
        DesignErrors: everything that is wrong with it, each with its row and column.
        InputError: there is no such file.
        MachineError: it cannot be read.
    """
    source = read_source(path, str(path))
    problems = Problems(source.shown_as)
    named = _Named()
    header: tuple[str, ...] = ()
    readings: list[Reading] = []
    for number, line in enumerate(source.lines, start=1):
        if line.startswith("#"):
            named.take(source, number, line, problems)
        elif line.strip(" ,\t") and not header:
            if not separated_by_commas(source, number, ",".join(COLUMNS), problems):
                break
            header = _header(source, number, problems)
        elif line.strip(" ,\t"):
            reading = _reading(source, number, _row(source, number, header, problems), problems)
            readings += [reading] if reading else []
    if not header and not problems.found:
        problems.add("D41", f"no line names the columns: {','.join(COLUMNS)}", source.place(1, 1))
    problems.stop()
    return ReadingSheet(
        readings=tuple(readings),
        mount_key=named.texts.get("mount_key", ""),
        piece_mm=named.numbers.get("boom_piece_mm"),
        reflection_noise_ratio=named.numbers.get("reflection_noise", REFLECTION_NOISE),
        swr_noise_ratio=named.numbers.get("swr_noise", SWR_NOISE),
        sha256=hashlib.sha256(source.data).hexdigest(),
    )


class _Named:
    """The named values above the table."""

    def __init__(self) -> None:
        self.texts: dict[str, str] = {}
        self.numbers: dict[str, float] = {}

    def take(self, source: Source, number: int, line: str, problems: Problems) -> None:
        """Read one line `#name,value`; other remarks are left alone."""
        name, _, text = (part.strip() for part in line[1:].partition(","))
        text = text.strip(" ,\t")
        if name not in NAMES or not text:
            return
        self.texts[name] = text
        if name in _RANGES:
            value = _number(source, number, name, text, line.index(",") + 2, problems)
            if value is not None:
                self.numbers[name] = value


def _header(source: Source, number: int, problems: Problems) -> tuple[str, ...]:
    """The columns' names."""
    cells = cells_of(source, number, problems)
    names = tuple(cell.text.lower() for cell in cells)
    for cell, name in zip(cells, names, strict=True):
        place = source.place(number, cell.column, max(1, cell.width))
        if name and name not in COLUMNS:
            problems.add("D41", f"column `{name}` is not known", place, suggestion(name, COLUMNS))
        if name and names.count(name) > 1:
            problems.add("D41", f"column `{name}` stands there twice", place)
    for name in _NEEDED:
        if name not in names:
            problems.add("D41", f"column `{name}` is missing", source.place(number, 1), f"add {name} to this line")
    if not any(set(kind) <= set(names) for kind in _KINDS):
        problems.add("D41", "no column holds readings", source.place(number, 1),
                     "add re and im, or magnitude and phase_deg, or swr")  # fmt: skip
    return names


def _row(source: Source, number: int, header: tuple[str, ...], problems: Problems) -> Row:
    cells = cells_of(source, number, problems)
    if not all_named(source, number, header, cells, problems, "D41"):
        return {}
    return {name: cell for name, cell in zip(header, cells, strict=False) if cell.text}


def _reading(source: Source, number: int, row: Row, problems: Problems) -> Reading | None:
    """The reading of one row; None for a step that was not taken or does not read."""
    kinds = [kind for kind in _KINDS if any(name in row for name in kind)]
    if not kinds:
        return None
    if len(kinds) > 1:
        first = row[next(name for name in kinds[1] if name in row)]
        problems.add("D41", f"row {number} holds two kinds of reading", source.place(number, first.column, first.width),
                     "keep re and im, or magnitude and phase_deg, or swr")  # fmt: skip
        return None
    wanted = ("length_mm", "frequency_mhz", *kinds[0])
    for name in ("setup", *wanted):
        if name not in row:
            problems.add("D41", f"row {number}: `{name}` is empty", source.place(number, 1), f"fill in {name}")
    values = [
        _number(source, number, name, row[name].text, row[name].column, problems) for name in wanted if name in row
    ]
    setup = _setup(source, number, row, problems)
    if setup is None or len(values) < len(wanted) or None in values:
        return None
    length_mm, frequency_mhz, *found = (value for value in values if value is not None)
    if kinds[0] == ("swr",):
        return Reading(setup, length_mm, frequency_mhz, "swr", complex((found[0] - 1) / (found[0] + 1)))
    reflection = complex(*found) if kinds[0] == ("re", "im") else cmath.rect(found[0], math.radians(found[1]))
    if abs(reflection) > 1.0:
        problems.add("D41", f"row {number}: a reflection of {abs(reflection):.3f} gives back more than came in",
                     source.place(number, row[kinds[0][0]].column), "check sign and decimal point")  # fmt: skip
        return None
    return Reading(setup, length_mm, frequency_mhz, "reflection", reflection)


def _setup(source: Source, number: int, row: Row, problems: Problems) -> Setup | None:
    cell = row.get("setup", Cell("", 1, 1))
    match cell.text.lower():
        case "":
            return None
        case "free":
            return "free"
        case "mounted":
            return "mounted"
    problems.add("D41", f"row {number}, setup: '{cell.text}' is neither free nor mounted",
                 source.place(number, cell.column, cell.width), "write free or mounted")  # fmt: skip
    return None


def _number(source: Source, number: int, name: str, text: str, column: int, problems: Problems) -> float | None:
    """A number within its column's range."""
    low, high = _RANGES[name]
    try:
        value = float(text)
    except ValueError:
        value = math.nan
    place = source.place(number, column, len(text))
    if not math.isfinite(value):
        problems.add("D41", f"row {number}, {name}: '{text}' is no number", place, "a plain number, for example 0.231")
        return None
    if not low <= value <= high:
        problems.add("D41", f"row {number}, {name}: {text} is out of range", place, f"from {low:g} to {high:g}")
        return None
    return value
