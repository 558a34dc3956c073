"""Every row of every table: a source, numbers that are numbers, keys that are unique."""

import subprocess
import sys
from pathlib import Path

import pytest

import fabgen.stock
from fabgen.stock.read_csv import UnknownStockError, row, rows

DATA = Path(fabgen.stock.__file__).parent / "data"
TABLES = sorted(path.stem for path in DATA.glob("*.csv"))
UNITS = ("_mm", "_um", "_in", "_cv", "_gpa", "_mpa", "_per_k", "_kg_m3", "_characters")
PROVENANCE = ("secondary source", "from memory", "common practice")


def test_all_tables_are_here():
    assert len(TABLES) == 23


@pytest.mark.parametrize("table", TABLES)
def test_every_row_names_its_source_and_how_it_was_seen(table):
    for found in rows(table):
        assert list(found)[-1] == "source"
        assert any(word in found["source"] for word in PROVENANCE), found


@pytest.mark.parametrize("table", TABLES)
def test_cells_of_columns_with_a_unit_are_plain_numbers(table):
    for found in rows(table):
        assert None not in found, "more cells than columns"
        for column, cell in found.items():
            assert cell == cell.strip()
            if column.endswith(UNITS) and cell:
                assert repr(float(cell)) == repr(float(cell)).lower()
                assert set(cell) <= set("0123456789.-")


@pytest.mark.parametrize("table", [table for table in TABLES if table not in ("edge_distance", "iso286_it")])
def test_first_column_is_a_key(table):
    keys = [next(iter(found.values())) for found in rows(table)]
    assert len(set(keys)) == len(keys)
    assert row(table, keys[-1], "row") == rows(table)[-1]


def test_sources_file_names_every_table():
    text = (DATA.parent / "SOURCES.md").read_text(encoding="utf-8")
    assert [table for table in TABLES if f"`{table}.csv`" not in text] == []


def test_an_unknown_name_is_answered_with_the_nearest():
    with pytest.raises(UnknownStockError) as caught:
        row("materials", "EN AW 6060-T66", "material")
    assert caught.value.nearest == "EN AW-6060 T66"
    assert str(caught.value) == "there is no material 'EN AW 6060-T66' in the table; nearest is 'EN AW-6060 T66'"
    with pytest.raises(KeyError, match="known: EN AW-6060 T66"):
        row("materials", "unobtainium 99", "material")


def test_looking_up_reads_only_the_table_asked_for_and_nothing_heavy():
    code = (
        "import sys; from fabgen.stock import read_csv, tables; "
        "assert read_csv.rows.cache_info().currsize == 0; tables.clearance_hole_mm('M3'); "
        "assert read_csv.rows.cache_info().currsize == 1; "
        "print(sorted({'numpy', 'scipy', 'cadquery', 'OCP', 'pydantic', 'trimesh'} & set(sys.modules)))"
    )
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert done.stdout.strip() == "[]"
