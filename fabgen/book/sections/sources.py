"""Every source that the numbers of this book come from, and what its letters and signs stand for."""

from collections.abc import Iterable, Iterator
from pathlib import Path

from fabgen.book.book import Book, Content
from fabgen.design.design import Design, Material
from fabgen.stock.read_csv import rows

PLACE = 900
LETTERS = Path(__file__).parent.parent / "words" / "letters.txt"


def content(book: Book) -> Content:
    """Source lines by what they stand for, and the abbreviations."""
    arranged = book.arranged
    allowances = [line.allowance for line in arranged.ledger.lines]
    lengths = [allowance.source for allowance in allowances if allowance.origin != "none"]
    lengths += [value.source for allowance in allowances for value in allowance.published]
    return {
        "lengths": _once(lengths),
        "materials": sorted({(material.name, material.source) for material in _materials(arranged.design)}),
        "tables": [(table, _once(row["source"] for row in rows(table))) for table in _tables(book)],
        "computed": book.computed,
        "letters": letters(),
    }


def letters() -> tuple[tuple[str, str], ...]:
    """Every abbreviation of `words/letters.txt` with its meaning."""
    lines = LETTERS.read_text(encoding="utf-8").splitlines()
    return tuple((short, meaning) for short, _, meaning in (line.partition(": ") for line in lines))


def _materials(design: Design) -> Iterator[Material]:
    yield design.boom.material
    for element in design.elements:
        yield element.rod.material
        if element.mount is not None:
            holders = (element.mount.bush, element.mount.keeper, element.mount.saddle)
            yield from (holder.material for holder in holders if holder is not None)
    yield from (feed.material for feed in design.feeds)
    if design.clamp is not None:
        yield design.clamp.material


def _tables(book: Book) -> Iterator[str]:
    """Names of the stock tables that this design took a number from."""
    design, placed = book.arranged.design, book.arranged.placed
    parts = {each.part for each in placed}
    if not design.shop.stated_tolerance_mm:
        yield "iso2768_1_linear"
    for series in ("metric", "inch"):
        if design.shop.drills in (series, "both"):
            yield f"drills_{series}"
    if parts & {"screw", "u_bolt"}:
        yield "iso273_clearance"
        yield "iso261_threads"
    heads = {str(dict(each.parameters).get("head")) for each in placed if each.part == "screw"}
    for head, table in (("socket", "iso4762_socket"), ("hex", "iso4017_hexagon"), ("pan", "iso7045_pan")):
        if head in heads:
            yield table
    if "nut" in parts:
        yield "iso4032_nuts"
    if "washer" in parts:
        yield "iso7089_washers"
    yield "edge_distance"
    yield "process"
    yield from _tables_of_the_solver(book)
    if book.aids:
        yield "din179_bushings"
    if any(each.source == "printed" for each in placed):
        yield "print_practice"
    yield "paper"


def _tables_of_the_solver(book: Book) -> Iterator[str]:
    if book.response is not None:
        yield "conductivity"
        if book.response.allotment is not None:
            yield "tolerance_classes"


def _once(sources: Iterable[str]) -> list[str]:
    """Each source once, in order of appearance, empty ones left out."""
    return [source for source in dict.fromkeys(sources) if source]
