"""The recording: one sheet as plain primitives in mm, made once and replayed to SVG, DXF and PDF.

Frame of a sheet: origin at its lower left corner, x to the right, y up, mm at 1:1. A drawing is recorded with
`fabgen.design.pen.Pen`; writers only replay it, so formats cannot disagree. An item's layer says what it means;
width, dash and colour follow from the layer in `LAYERS`, in the order in which layers are printed, lowest first.
"""

import math
from dataclasses import replace
from typing import Literal

from fabgen.frozen import frozen

Point = tuple[float, float]
Box = tuple[float, float, float, float]
"""Left, bottom, right, top in mm."""
Anchor = Literal["start", "middle", "end"]
Layer = Literal["stamp", "frame", "fold", "centre", "dim", "scale", "outline", "drill", "text"]


@frozen
class Stroke:
    """How a layer is printed.

    Attributes:
        width_mm: line width.
        dash_mm: dash, gap, dash, gap …; empty for a continuous line. A dash starts at a line's first point.
        colour: red, green, blue, 0 to 255.
    """

    width_mm: float
    dash_mm: tuple[float, ...] = ()
    colour: tuple[int, int, int] = (0, 0, 0)


WIDE_MM, NARROW_MM = 0.35, 0.18
_CHAIN = (24 * NARROW_MM, 3 * NARROW_MM, 0.5 * NARROW_MM, 3 * NARROW_MM)
_DASHED = (12 * NARROW_MM, 3 * NARROW_MM)

LAYERS: dict[Layer, Stroke] = {
    "stamp": Stroke(WIDE_MM, colour=(240, 176, 176)),
    "frame": Stroke(NARROW_MM),
    "fold": Stroke(NARROW_MM, _DASHED),
    "centre": Stroke(NARROW_MM, _CHAIN),
    "dim": Stroke(NARROW_MM),
    "scale": Stroke(NARROW_MM),
    "outline": Stroke(WIDE_MM),
    "drill": Stroke(NARROW_MM),
    "text": Stroke(NARROW_MM),
}
"""Line group 0.35: wide 0.35 mm, narrow 0.18 mm; dashes 12 d and 3 d, chain 24 d, 3 d, 0.5 d, 3 d of the width d.

Drill circles are narrow because a punch is set to them by eye; the stamp is pale and lies under everything else.
Source: ISO 128-2:2020, line types and line groups (from memory); the layers' names are this program's own.
"""


@frozen
class Line:
    """A straight line between two points."""

    layer: Layer
    x0_mm: float
    y0_mm: float
    x1_mm: float
    y1_mm: float


@frozen
class Polyline:
    """Straight lines through at least two points; closed joins the last to the first."""

    layer: Layer
    points_mm: tuple[Point, ...]
    closed: bool = False


@frozen
class Arc:
    """A circular arc, counter-clockwise from the start angle to the end angle, less than a full turn.

    Angles in degrees from the x axis; the end angle may be above 360 but never below the start angle.
    """

    layer: Layer
    x_mm: float
    y_mm: float
    radius_mm: float
    start_deg: float
    end_deg: float

    def point(self, angle_deg: float) -> Point:
        """The point of the arc's circle at an angle."""
        angle = math.radians(angle_deg)
        return (self.x_mm + self.radius_mm * math.cos(angle), self.y_mm + self.radius_mm * math.sin(angle))


@frozen
class Circle:
    """A full circle about a point."""

    layer: Layer
    x_mm: float
    y_mm: float
    radius_mm: float


@frozen
class Fill:
    """A filled polygon without an edge line: arrow heads, dots, marks."""

    layer: Layer
    points_mm: tuple[Point, ...]


@frozen
class Text:
    """One line of lettering; characters that cannot be printed become spaces.

    Attributes:
        x_mm, y_mm: the anchor on the baseline.
        text: what is lettered, taken as written: no format may read markup in it.
        height_mm: height of capitals (ISO 3098-1's nominal size h).
        anchor: which point of the baseline stands at the anchor.
        angle_deg: direction of reading, counter-clockwise from the x axis.
    """

    layer: Layer
    x_mm: float
    y_mm: float
    text: str
    height_mm: float = 2.5
    anchor: Anchor = "start"
    angle_deg: float = 0.0

    def __post_init__(self) -> None:
        object.__setattr__(self, "text", "".join(c if c.isprintable() else " " for c in self.text))


Item = Line | Polyline | Arc | Circle | Fill | Text


@frozen
class Sheet:
    """One drawing, ready to be written in any format.

    Attributes:
        name: ASCII, the stem of its file.
        title: one line for people and for document properties.
        width_mm, height_mm: the paper, or the piece of paper that is cut from it.
        items: in the order they were drawn.
        station_at_x0_mm: boom station at the sheet's left edge when x runs along the boom; None otherwise.
    """

    name: str
    title: str
    width_mm: float
    height_mm: float
    items: tuple[Item, ...]
    station_at_x0_mm: float | None = None

    def on(self, layer: Layer) -> tuple[Item, ...]:
        """The items of one layer, in drawing order."""
        return tuple(item for item in self.items if item.layer == layer)

    def by_layer(self) -> list[tuple[Layer, tuple[Item, ...]]]:
        """Every layer in printing order with its items, empty layers too."""
        return [(layer, self.on(layer)) for layer in LAYERS]


def moved(item: Item, dx_mm: float, dy_mm: float) -> Item:
    """The same item somewhere else on the sheet.

    Args:
        item: any item.
        dx_mm: to the right.
        dy_mm: up.
    """
    match item:
        case Line():
            x0, y0, x1, y1 = item.x0_mm + dx_mm, item.y0_mm + dy_mm, item.x1_mm + dx_mm, item.y1_mm + dy_mm
            return Line(item.layer, x0, y0, x1, y1)
        case Polyline() | Fill():
            return replace(item, points_mm=tuple((x + dx_mm, y + dy_mm) for x, y in item.points_mm))
        case Arc() | Circle() | Text():
            return replace(item, x_mm=item.x_mm + dx_mm, y_mm=item.y_mm + dy_mm)


def box_of(points_mm: tuple[Point, ...]) -> Box:
    """The smallest upright box round some points: left, bottom, right, top in mm."""
    xs, ys = [x for x, _ in points_mm], [y for _, y in points_mm]
    return (min(xs), min(ys), max(xs), max(ys))
