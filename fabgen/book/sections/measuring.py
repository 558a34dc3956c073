"""Sheets to write measurements on."""

from fabgen.book.book import Book, Content

PLACE = 110
SHOWS_LENGTHS = True
NEW_PAGE = True


def content(book: Book) -> Content:
    """Elements with the lengths that stand out, and holes that a gauge must pass."""
    arranged = book.arranged
    cuts = {cut.piece: cut for cut in arranged.cuts}
    rows = []
    for line in arranged.ledger.lines:
        cut = cuts.get(line.element) or cuts.get(f"{line.element}-left")
        rows.append((line, cut.projection_mm if cut else 0.0))
    stations_mm = {hole.element: hole.tolerance_mm for hole in reversed(arranged.holes)}
    return {
        "rows": rows,
        "stations_mm": stations_mm,
        "rods_mm": sorted({element.rod.diameter_mm for element in arranged.design.elements}),
        "holes_mm": sorted({hole.diameter_mm for hole in arranged.holes}),
        "frequencies_mhz": [round(k * arranged.design.frequency_mhz, 6) for k in (0.985, 1.0, 1.015)],
    }
