"""Holes as the rules see them: one row per wall, named after what they serve."""

from collections.abc import Iterator
from itertools import groupby

from fabgen.design.arranged import Arranged, Hole


def drillings(arranged: Arranged) -> Iterator[tuple[Hole, ...]]:
    """The rows of each hole: one, or two when it goes through both walls."""
    for _, rows in groupby(arranged.holes, key=lambda hole: (hole.piece, hole.number)):
        yield tuple(rows)


def place(hole: Hole) -> str:
    """What a finding calls a hole: the element whose rod goes through it, else purpose and number."""
    if hole.purpose in ("rod", "bush"):
        return hole.element
    owner = "" if hole.purpose.startswith(hole.element) else f"{hole.element} "
    return f"{owner}{hole.purpose} {hole.number}"


def wall_width_mm(arranged: Arranged, hole: Hole) -> float:
    """Outside width of the wall that a hole is in, across the boom; the diameter when round."""
    boom = arranged.design.boom
    return boom.height_mm if hole.wall in ("+y", "-y") else boom.width_mm
