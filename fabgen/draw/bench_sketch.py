"""The sketch on top of the bench page: the boom's end seen forward, its side with every hole, datum, TOP and forward.

Not to scale; it says which end, which wall and which way, the numbers stand in the tables.
"""

from fabgen.design.arranged import Arranged
from fabgen.design.pen import Pen
from fabgen.draw.words import WALLS, wall_of
from fabgen.units import format_mm

HEIGHT_MM = 42.0

_END_MM, _SIDE_X_MM, _SIDE_MM = 16.0, 62.0, 9.0
_DOT_MM = 1.4


def sketch(pen: Pen, arranged: Arranged, left_mm: float, top_mm: float, width_mm: float) -> None:
    """Draw the sketch below a height, `HEIGHT_MM` high.

    Args:
        pen: records it.
        arranged: the arranged design.
        left_mm: its left edge.
        top_mm: its upper edge.
        width_mm: its width.
    """
    _end(pen, arranged, left_mm + 24.0, top_mm - 20.0)
    _side(pen, arranged, left_mm + _SIDE_X_MM, left_mm + width_mm - 4.0, top_mm - 20.0)


def _end(pen: Pen, arranged: Arranged, x: float, y: float) -> None:
    """The boom from its datum end, looking forward: left is on the left hand."""
    boom, half = arranged.design.boom, _END_MM / 2
    inner = half * 0.82 if boom.hollow else 0.0
    high = half * min(1.3, max(0.6, boom.height_mm / boom.width_mm))
    if boom.section == "round":
        for radius in (half, inner):
            if radius:
                pen.circle("outline", x, y, radius)
    else:
        for wide, tall in ((half, high), (inner, high - (half - inner))):
            if wide > 0:
                pen.rectangle("outline", x - wide, y - tall, x + wide, y + tall)
        half_high = high
    reach = half if boom.section == "round" else half_high
    pen.line("centre", x, y + reach + 2.5, x, y - reach - 2.5)
    pen.text(x, y + reach + 3.5, "TOP", anchor="middle")
    pen.text(x, y - reach - 3.5, "BOTTOM", anchor="middle", level="top")
    pen.text(x - half - 2.0, y, "LEFT", anchor="end", level="middle")
    pen.text(x + half + 2.0, y, "RIGHT", level="middle")
    pen.text(x, y - reach - 11.0, "from the datum end, looking forward", 1.8, anchor="middle")


def _side(pen: Pen, arranged: Arranged, left: float, right: float, y: float) -> None:
    """The boom from its right side, holes at their share of its length."""
    length_mm = arranged.design.boom.length_mm
    low, high = y - _SIDE_MM / 2, y + _SIDE_MM / 2
    pen.rectangle("outline", left, low, right, high)
    pen.line("centre", left - 3.0, y, right + 3.0, y)
    for hole in arranged.holes:
        x = left + hole.station_mm / length_mm * (right - left)
        wall = wall_of(hole)
        if wall == WALLS["-y"]:
            pen.circle("drill", x, y, _DOT_MM / 2)
        elif wall in (WALLS["+z"], WALLS["-z"]):
            edge, tip = (high, high - 1.6) if wall == WALLS["+z"] else (low, low + 1.6)
            pen.line("drill", x, edge, x, tip)
    pen.line("outline", left, low - 6.0, left, high + 6.0)
    pen.text(left - 1.5, high + 4.0, "datum", anchor="end")
    pen.text(left - 1.5, high + 0.6, "face", anchor="end")
    middle = (left + right) / 2
    pen.text(left + 2.5, high + 2.0, "TOP")
    pen.line("text", right - 30.0, high + 6.5, right - 2.5, high + 6.5)
    pen.arrow(right, high + 6.5, 0, layer="text")
    pen.text(right - 32.0, high + 5.3, "forward", anchor="end")
    pen.dimension(left, low - 5.0, right, low - 5.0, format_mm(length_mm), offset_mm=-5.0)
    pen.text(
        middle,
        low - 15.0,
        "right side, not to scale; ticks at the edges are holes in TOP or BOTTOM",
        1.8,
        anchor="middle",
    )
