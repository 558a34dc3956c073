"""What to trim, how far and which way, for someone who will measure."""

from fabgen.book.book import Book, Content
from fabgen.physics.half_wave import shift_khz

PLACE = 58
SHOWS_LENGTHS = True


def content(book: Book) -> Content | None:
    """Rods with a trim, and what a millimetre does to each; left out when there is none."""
    design = book.arranged.design
    rows = [
        (line, shift_khz(frequency_mhz=design.frequency_mhz, length_mm=line.modelled_mm, change_mm=-1.0))
        for line in book.arranged.ledger.lines
        if line.trim_mm > 0
    ]
    folded = any(feed.kind == "folded-dipole" for feed in design.feeds)
    return {"rows": rows, "folded": folded} if rows else None
