"""Views of the array from its simple shapes: seen from above, and from its right side.

A view's frame: x along the boom from the datum face, `up` across it, mm at full size; `View` scales and moves it.
"""

from collections.abc import Iterator

from fabgen.design.arranged import Arranged, Axis, Cylinder, Placed, Shape
from fabgen.design.drawing import Box
from fabgen.design.pen import Pen
from fabgen.frozen import frozen

RODS = ("rod", "folded_rod")
BODIES = ("saddle", "folded_saddle", "feed_block", "clamp_plate")
"""What is drawn besides boom and rods; bushes, keepers and screws are too small at a general view's scale."""

_THIN_MM = 0.8
_DOT_MM = 0.35


@frozen
class View:
    """One view on a sheet.

    Attributes:
        up: the array's axis that points up on paper: `y` in the plan, `z` in the elevation from the right.
        x_mm: where the datum face stands on paper.
        y_mm: where the boom's axis lies on paper.
        ratio: paper over array.
    """

    up: Axis
    x_mm: float
    y_mm: float
    ratio: float

    @property
    def away(self) -> Axis:
        """The axis along which one looks."""
        return "z" if self.up == "y" else "y"

    def box(self, shape: Shape) -> Box:
        """The shape's box on paper."""
        block = shape.box if isinstance(shape, Cylinder) else shape
        k = "xyz".index(self.up)
        x0, x1 = (self.x_mm + self.ratio * x for x in (block.low[0], block.high[0]))
        y0, y1 = (self.y_mm + self.ratio * y for y in (block.low[k], block.high[k]))
        return (x0, y0, x1, y1)


def shown(arranged: Arranged, parts: tuple[str, ...]) -> Iterator[Placed]:
    """The placed parts of some kinds, in order of placing."""
    return (placed for placed in arranged.placed if placed.part in parts)


def reach_mm(arranged: Arranged, up: Axis) -> tuple[float, float]:
    """Lowest and highest point of a view at full size, the mast's length not counted."""
    k = "xyz".index(up)
    blocks = [
        shape.box if isinstance(shape, Cylinder) else shape
        for placed in shown(arranged, ("boom", *RODS, *BODIES))
        for shape in placed.shapes
    ]
    if arranged.mast is not None and arranged.mast.axis != up:
        blocks.append(arranged.mast.box)
    return min(block.low[k] for block in blocks), max(block.high[k] for block in blocks)


def draw(pen: Pen, arranged: Arranged, view: View) -> None:
    """Boom, rods, blocks, clamp plate and mast of one view.

    Args:
        pen: records them.
        arranged: the arranged design.
        view: which way, where and how large.
    """
    for placed in shown(arranged, ("boom",)):
        pen.rectangle("outline", *view.box(placed.shapes[0]))
    for placed in shown(arranged, RODS):
        for shape in placed.shapes:
            _rod(pen, arranged, view, shape)
    for placed in shown(arranged, BODIES):
        for shape in placed.shapes:
            pen.rectangle("frame", *view.box(shape))
    if arranged.mast is not None:
        _mast(pen, arranged, view, arranged.mast)
    boom = view.box(next(shown(arranged, ("boom",))).shapes[0])
    pen.line("centre", boom[0] - 3.0, view.y_mm, boom[2] + 3.0, view.y_mm)


def _rod(pen: Pen, arranged: Arranged, view: View, shape: Shape) -> None:
    """A rod end on as a circle, else as a line or a narrow rectangle; what the boom hides is left out."""
    x0, y0, x1, y1 = view.box(shape)
    middle = (x0 + x1) / 2
    if isinstance(shape, Cylinder) and shape.axis == view.away:
        pen.circle("outline", middle, (y0 + y1) / 2, max((x1 - x0) / 2, _DOT_MM))
        return
    block = shape.box if isinstance(shape, Cylinder) else shape
    boom = arranged.design.boom
    hidden = view.away == "z" and block.low[2] < boom.top_mm
    half = boom.width_mm / 2 * view.ratio
    spans = [(y0, view.y_mm - half), (view.y_mm + half, y1)] if hidden else [(y0, y1)]
    for low, high in spans:
        if high <= low:
            continue
        if x1 - x0 >= _THIN_MM:
            pen.rectangle("outline", x0, low, x1, high)
        else:
            pen.line("outline", middle, low, middle, high)


def _mast(pen: Pen, arranged: Arranged, view: View, mast: Cylinder) -> None:
    """The mast as a narrow outline, cut off where the view ends."""
    x0, y0, x1, y1 = view.box(mast)
    if mast.axis == view.away:
        pen.circle("frame", (x0 + x1) / 2, (y0 + y1) / 2, (x1 - x0) / 2)
        return
    k = "xyz".index(view.up)
    low, high = reach_mm(arranged, view.up)
    y0, y1 = (
        view.y_mm + view.ratio * (mast.centre[k] + side) for side in (low - mast.centre[k], high - mast.centre[k])
    )
    for x in (x0, x1):
        pen.line("frame", x, y0 - 2.0, x, y1 + 2.0)
