"""Every hole, by piece and station."""

from dataclasses import replace
from itertools import groupby

from fabgen.book.book import Book, Content
from fabgen.design.arranged import Hole
from fabgen.stock.tables import process_range

PLACE = 70
NEW_PAGE = True


def content(book: Book) -> Content:
    """Holes by boom piece, drills needed, and the practice figures of the text."""
    arranged = book.arranged
    by_piece = [
        (piece, _rows([hole for hole in arranged.holes if hole.piece == piece.name])) for piece in arranged.pieces
    ]
    drills = sorted({(hole.diameter_mm, hole.drill) for hole in arranged.holes})
    pilots = sorted({hole.pilot_mm for hole in arranged.holes if hole.pilot_mm != hole.diameter_mm})
    return {
        "by_piece": by_piece,
        "drills": drills,
        "pilots": pilots,
        "pilot_range_mm": process_range("pilot_drill_mm"),
        "step_above_mm": process_range("step_drill_above_mm")[0],
        "largest_mm": max((hole.diameter_mm for hole in arranged.holes), default=0.0),
    }


def _rows(holes: list[Hole]) -> list[tuple[Hole, list[str], list[float]]]:
    """One row per hole; openings of a through hole that differ by their wall alone share it."""
    rows = []
    for _, group in groupby(holes, key=lambda hole: replace(hole, wall="round", angle_deg=0.0)):
        openings = list(group)
        walls = list(dict.fromkeys(str(hole.wall) for hole in openings))
        rows.append((openings[0], walls, [hole.angle_deg for hole in openings]))
    return rows
