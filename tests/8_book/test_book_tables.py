"""The book's tables against the package's CSV tables, cell by cell: two ways from the same records to the builder."""

import csv
import io
from collections.abc import Callable
from dataclasses import replace
from html.parser import HTMLParser

import pytest

from fabgen.book.book import Book, book_html
from fabgen.export import tables

DESIGNS = ["meter-reading-169", "river-gauge-434", "sonde-finder-401", "valley-television-637"]
ROUNDED_MM = 5.1e-4
"""Three decimals are printed."""
WALLS = {"left": "+y", "right": "-y", "top": "+z", "bottom": "-z", "round": "round"}


class Cells(HTMLParser):
    """Rows of cells by the section that they stand in."""

    def __init__(self) -> None:
        super().__init__()
        self.section = ""
        self.tables: list[tuple[str, list[list[str]]]] = []
        self.cell: str | None = None

    def handle_starttag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        if tag == "section":
            self.section = dict(attrs)["id"] or ""
        elif tag == "table":
            self.tables.append((self.section, []))
        elif tag == "tr":
            self.tables[-1][1].append([])
        elif tag in ("td", "th"):
            self.cell = ""

    def handle_endtag(self, tag: str) -> None:
        if tag in ("td", "th") and self.cell is not None:
            self.tables[-1][1][-1].append(self.cell.strip())
            self.cell = None

    def handle_data(self, data: str) -> None:
        if self.cell is not None:
            self.cell += data


def rows(book: Book, section: str, head: str) -> list[list[str]]:
    """The full rows of the section's table whose heading row names `head`."""
    cells = Cells()
    cells.feed(book_html(book).decode())
    found = [table for place, table in cells.tables if place == section and any(head in cell for cell in table[0])]
    assert found
    return [row for table in found for row in table[1:] if len(row) == len(table[0])]


def number(cell: str) -> float:
    return 0.0 if cell == "–" else float(cell.replace("−", "-"))


def records(text: bytes) -> list[dict[str, str]]:
    return list(csv.DictReader(io.StringIO(text.decode("utf-8"))))


def same(cells: list[str], record: dict[str, str], names: list[str]) -> None:
    wanted = [float(record[name] or 0) for name in names]
    assert [number(cell) for cell in cells] == pytest.approx(wanted, abs=ROUNDED_MM), record


@pytest.mark.parametrize("stem", DESIGNS)
def test_lengths_and_trims_are_those_of_the_ledger(book_of: Callable[..., Book], stem: str) -> None:
    book = book_of(stem)
    ledger = {record["element"]: record for record in records(tables.lengths_csv(book.arranged.ledger))}
    found = rows(book, "lengths", "Modelled")
    assert [row[0] for row in found] == list(ledger)
    names = ["rod_mm", "modelled_mm", "allowance_mm", "rod_change_mm", "rounding_mm", "cut_mm", "tolerance_mm"]
    for row in found:
        same([*row[2:5], *row[6:]], ledger[row[0]], names)
    for row in rows(book, "trimming", "Trim to leave"):
        same(row[2:4], ledger[row[0]], ["cut_mm", "trim_mm"])
        assert number(row[4]) == pytest.approx(number(row[2]) + number(row[3]), abs=ROUNDED_MM)
    stations_mm = {record["element"]: record["tolerance_mm"] for record in records(tables.drilling_csv(book.arranged))}
    for row in rows(book, "measuring", "Station"):
        same([row[1], row[4], row[5]], ledger[row[0]], ["station_mm", "cut_mm", "tolerance_mm"])
        assert number(row[2]) == pytest.approx(float(stations_mm.get(row[0], 0)), abs=ROUNDED_MM)


@pytest.mark.parametrize("stem", DESIGNS)
def test_pieces_are_those_of_the_cut_list(book_of: Callable[..., Book], stem: str) -> None:
    book = book_of(stem)
    cuts = {record["piece"]: record for record in records(tables.cut_list_csv(book.arranged, book.cut_plan))}
    found = rows(book, "cutting", "Piece")
    assert [row[0] for row in found] == list(cuts)
    for row in found:
        same(row[2:7], cuts[row[0]], ["cut_mm", "tolerance_mm", "trim_mm", "half_mm", "projection_mm"])


@pytest.mark.parametrize("stem", DESIGNS)
def test_holes_are_those_of_the_drilling_table(book_of: Callable[..., Book], stem: str) -> None:
    book = book_of(stem)
    openings = records(tables.drilling_csv(book.arranged))
    seen = 0
    for row in rows(book, "drilling", "Station"):
        of_hole = [record for record in openings if record["hole"] == row[0]]
        seen += len(of_hole)
        for record in of_hole:
            same([row[2], row[3], row[6], row[8]], record, ["station_mm", "tolerance_mm", "across_mm", "diameter_mm"])
            assert number(row[7]) in (0.0, float(record["pilot_mm"]))
            assert (row[1], row[9]) == (record["element"], record["drill"])
        walls = dict.fromkeys(record["wall"] for record in of_hole)
        assert [WALLS[wall] for wall in row[4].split(", ")] == list(walls)
        assert [number(angle) for angle in row[5].split(", ")] == [float(record["angle_deg"]) for record in of_hole]
    assert seen == len(openings)


@pytest.mark.parametrize("stem", DESIGNS)
def test_parts_are_counted_as_in_the_bill(book_of: Callable[..., Book], stem: str) -> None:
    book = book_of(stem)
    bill = {(r["size"], r["material"]): int(r["quantity"]) for r in records(tables.parts_csv(book.arranged))}
    found = {(row[1], row[2]): int(row[0]) for row in rows(book, "parts", "Mass of all") if row[0]}
    assert found == bill


def test_what_is_zero_in_every_demo_design_has_its_sign_and_its_column(book_of: Callable[..., Book]) -> None:
    book = book_of("river-gauge-434")
    arranged = book.arranged
    holes = tuple(replace(hole, across_mm=-1.25) for hole in arranged.holes)
    lines = tuple(replace(line, rod_change_mm=-0.75) for line in arranged.ledger.lines)
    book = replace(book, arranged=replace(arranged, holes=holes, ledger=replace(arranged.ledger, lines=lines)))
    assert {row[6] for row in rows(book, "drilling", "Station")} == {"−1.250"}
    assert {row[6] for row in rows(book, "lengths", "Modelled")} == {"−0.750"}
