"""Every hole, by piece and station."""

from fabgen.book.book import Book, Content
from fabgen.stock.tables import process_range

PLACE = 70


def content(book: Book) -> Content:
    """Holes by boom piece, drills needed, and the practice figures of the text."""
    arranged = book.arranged
    by_piece = [(piece, [hole for hole in arranged.holes if hole.piece == piece.name]) for piece in arranged.pieces]
    drills = sorted({(hole.diameter_mm, hole.drill) for hole in arranged.holes})
    pilots = sorted({hole.pilot_mm for hole in arranged.holes if hole.pilot_mm != hole.diameter_mm})
    return {
        "by_piece": by_piece,
        "drills": drills,
        "pilots": pilots,
        "through": any(hole.element not in ("feed", "clamp") for hole in arranged.holes),
        "pilot_range_mm": process_range("pilot_drill_mm"),
        "step_above_mm": process_range("step_drill_above_mm")[0],
        "largest_mm": max((hole.diameter_mm for hole in arranged.holes), default=0.0),
    }
