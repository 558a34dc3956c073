"""How the printed parts lie on the bed and are printed, with a picture of each."""

import functools
from pathlib import Path

from fabgen.book.book import Book, Content
from fabgen.book.sections.parts import rows
from fabgen.stock.tables import print_practice

PLACE = 85
FOLDER = Path(__file__).parent.parent / "words" / "poses"


@functools.cache
def pose(part: str) -> str:
    """How a part lies on the bed, one sentence."""
    path = FOLDER / f"{part}.txt"
    return path.read_text(encoding="utf-8").strip() if path.is_file() else "As oriented in its file."


def content(book: Book) -> Content | None:
    """The printed parts with pose and picture; left out when nothing is printed."""
    printed = rows(book, "printed")
    if not printed:
        return None
    nozzle_mm = book.arranged.design.printer.nozzle_mm
    wall_mm = print_practice("recommended_wall_mm")
    return {
        "printed": [(row, pose(row.placed.part)) for row in printed],
        "printer": book.arranged.design.printer,
        "wall_mm": wall_mm,
        "lines": max(2, round(wall_mm / nozzle_mm + 0.499)),
        "materials": sorted({row.placed.material for row in printed}),
    }
