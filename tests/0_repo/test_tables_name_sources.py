"""Every row of a table says where its numbers come from, and its cells are numbers, never expressions."""

import csv
import io
from pathlib import Path

import pytest

pytestmark = pytest.mark.house

DATA = sorted((Path(__file__).resolve().parents[2] / "fabgen").rglob("*.csv"))
UNITS = ("_mm", "_mm2", "_deg", "_g", "_kg_m3", "_mhz", "_ohm", "_db", "_wl", "_mpa", "_gpa", "_v")


def faults(text: str) -> list[str]:
    """What is wrong with a table: a row without source, of another width, or with a cell that is no number."""
    rows = list(csv.reader(io.StringIO(text)))
    header, wrong = rows[0], []
    if "source" not in header:
        return ["no column `source`"]
    if len(set(header)) != len(header):
        wrong.append("two columns of one name")
    for number, row in enumerate(rows[1:], start=2):
        if len(row) != len(header):
            wrong.append(f"row {number} has {len(row)} cells, the header {len(header)}")
            continue
        cells = dict(zip(header, row, strict=True))
        if not cells["source"].strip():
            wrong.append(f"row {number} names no source")
        wrong.extend(
            f"row {number} {name}: {cell!r} is no number"
            for name, cell in cells.items()
            if name.endswith(UNITS) and cell and not is_number(cell)
        )
    return wrong


def is_number(cell: str) -> bool:
    try:
        return float(cell) == float(cell)
    except ValueError:
        return False


@pytest.mark.parametrize("path", DATA, ids=lambda path: path.name)
def test_rows_name_their_source(path: Path) -> None:
    assert faults(path.read_text(encoding="utf-8")) == []


def test_the_tables_are_there(root: Path) -> None:
    assert DATA
    assert (root / "fabgen/stock/SOURCES.md").is_file()


@pytest.mark.parametrize(
    "text",
    [
        "name,size_mm\nM3,3\n",
        "name,size_mm,source\nM3,3,\n",
        "name,size_mm,source\nM3,3\n",
        "name,size_mm,source\nM3,3+1,ISO 261\n",
        "name,size_mm,source\nM3,nan,ISO 261\n",
        "name,name,source\nM3,3,ISO 261\n",
    ],
)
def test_a_faulty_table_is_noticed(text: str) -> None:
    assert len(faults(text)) == 1
