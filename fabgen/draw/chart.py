"""A plain chart on a sheet: two axes with round numbers, curves, points, and lettering beside them."""

from collections.abc import Sequence

from fabgen.design.drawing import Box, Layer, Point
from fabgen.design.pen import Pen
from fabgen.design.scale import Axis, axis
from fabgen.frozen import frozen

LETTERS_MM = 2.2
LEFT_MM, FOOT_MM, TOP_MM, RIGHT_MM = 16.0, 11.0, 6.0, 4.0


@frozen
class Panel:
    """Axes on a sheet.

    Attributes:
        x: the axis to the right.
        y: the axis up.
    """

    x: Axis
    y: Axis

    def at(self, point: Point) -> Point:
        """Place on the sheet of a point in the axes' own units."""
        return self.x.at(point[0]), self.y.at(point[1])

    def curve(self, pen: Pen, points: Sequence[Point], layer: Layer = "outline") -> None:
        """A line through points in the axes' own units."""
        pen.polyline(layer, [self.at(point) for point in points])

    def ring(self, pen: Pen, point: Point, radius_mm: float = 0.9) -> None:
        """An open mark."""
        pen.circle("outline", *self.at(point), radius_mm)

    def dot(self, pen: Pen, point: Point, diameter_mm: float = 1.8) -> None:
        """A filled mark."""
        pen.dot(*self.at(point), diameter_mm, "outline")


def panel(pen: Pen, box: Box, points: Sequence[Point], *, title: str, below: str) -> Panel:
    """Draw axes with their numbers and a thin grid.

    Args:
        pen: records them.
        box: room for axes and lettering.
        points: everything that shall find room, in the axes' own units.
        title: what is drawn, above the axes.
        below: what stands to the right, with its unit.
    """
    left, low, right, high = box
    across, up = [x for x, _ in points], [y for _, y in points]
    x = axis(min(across), max(across), left + LEFT_MM, right - RIGHT_MM)
    y = axis(min(up), max(up), low + FOOT_MM, high - TOP_MM, 6)
    for label, at in y.marks:
        pen.line("dim", x.start_mm, at, x.end_mm, at)
        pen.text(x.start_mm - 1.5, at, label, LETTERS_MM, anchor="end", level="middle")
    for label, at in x.marks:
        pen.line("dim", at, y.start_mm, at, y.start_mm - 1.2)
        pen.text(at, y.start_mm - 1.8, label, LETTERS_MM, anchor="middle", level="top")
    pen.polyline("frame", [(x.start_mm, y.end_mm), (x.start_mm, y.start_mm), (x.end_mm, y.start_mm)])
    pen.text(x.start_mm, y.end_mm + 2.0, title, LETTERS_MM)
    pen.text(x.end_mm, y.start_mm - 6.0, below, LETTERS_MM, anchor="end", level="top")
    return Panel(x, y)
