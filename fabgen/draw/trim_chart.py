"""Pictures of trim series: what was read and fitted, or what to expect, against the director's length."""

from collections.abc import Sequence

from fabgen.design.drawing import Point, Sheet
from fabgen.design.pen import Pen
from fabgen.draw.chart import LETTERS_MM, panel
from fabgen.frozen import frozen

WIDTH_MM, PANEL_MM, HEAD_MM, FOOT_MM = 180.0, 62.0, 12.0, 8.0


@frozen
class TrimCurve:
    """One reading at one frequency.

    Attributes:
        title: which.
        free: points read, length in mm and reading.
        mounted: the same in the mount.
        free_line: the curve of the free rod.
        mounted_line: the same curve moved by the allowance.
    """

    title: str
    free: tuple[Point, ...]
    mounted: tuple[Point, ...]
    free_line: tuple[Point, ...]
    mounted_line: tuple[Point, ...]


def trim_sheet(name: str, title: str, curves: Sequence[TrimCurve], notes: Sequence[str]) -> Sheet:
    """One panel per reading, one above the other.

    Args:
        name: stem of the file.
        title: one line above.
        curves: at least one.
        notes: lines below.
    """
    height_mm = HEAD_MM + PANEL_MM * len(curves) + FOOT_MM + 4.5 * len(notes)
    pen = Pen()
    pen.text(8.0, height_mm - 7.0, title, 3.0)
    for count, curve in enumerate(curves):
        top = height_mm - HEAD_MM - PANEL_MM * count
        _panel(pen, curve, (4.0, top - PANEL_MM, WIDTH_MM, top))
    for count, note in enumerate(notes):
        pen.text(8.0, FOOT_MM + 4.5 * (len(notes) - 1 - count), note, LETTERS_MM)
    return pen.sheet(name, title, WIDTH_MM, height_mm)


def _panel(pen: Pen, curve: TrimCurve, box: tuple[float, float, float, float]) -> None:
    points = [*curve.free, *curve.mounted, *curve.free_line, *curve.mounted_line]
    axes = panel(pen, box, points, title=curve.title, below="director, tip to tip, mm")
    axes.curve(pen, curve.free_line)
    axes.curve(pen, curve.mounted_line, "fold")
    for point in curve.free:
        axes.ring(pen, point)
    for point in curve.mounted:
        axes.dot(pen, point)
