"""Where items reach on a sheet, and which lettering hits a hole, other lettering or the sheet's edge.

Used while a sheet is recorded, by the check of sheets and by the tests; the stamp is left out because it lies under
everything on purpose.
"""

import itertools
import math
from collections.abc import Iterator, Sequence
from typing import Literal

from fabgen.design.drawing import Arc, Box, Circle, Fill, Item, Line, Point, Polyline, Sheet, Text, box_of
from fabgen.design.lettering import text_box, text_corners
from fabgen.frozen import frozen

Kind = Literal["text on text", "text on hole", "text outside", "text on line"]


@frozen
class Overlap:
    """One piece of lettering that cannot be read, or that hides something.

    Attributes:
        kind: what it hits.
        text: the lettering.
        other: the item it hits; None where it leaves the sheet.
    """

    kind: Kind
    text: Text
    other: Item | None = None

    def __str__(self) -> str:
        hit = f" {self.other.text!r}" if isinstance(self.other, Text) else ""
        return f"{self.kind}: {self.text.text!r} at x {self.text.x_mm:.2f} mm, y {self.text.y_mm:.2f} mm{hit}"


def bounds(item: Item) -> Box:
    """The smallest upright box round an item's geometry, line width not counted; of a text, its lettering.

    Args:
        item: any item.

    Returns:
        Left, bottom, right, top in mm.
    """
    match item:
        case Text():
            return text_box(item)
        case Circle():
            x, y, r = item.x_mm, item.y_mm, item.radius_mm
            return (x - r, y - r, x + r, y + r)
        case Arc():
            first, last = math.ceil(item.start_deg / 90), math.floor(item.end_deg / 90)
            turns = [item.start_deg, *(90.0 * k for k in range(first, last + 1)), item.end_deg]
            return box_of(tuple(item.point(angle) for angle in turns))
        case Line() | Polyline() | Fill():
            return box_of(_outline(item))


def overlaps(sheet: Sheet, *, margin_mm: float = 0.0, lines: bool = False) -> list[Overlap]:
    """Everything that is wrong with a sheet's lettering.

    Lettering may not touch other lettering, a circle, arc or closed line of the layer `drill` or anything inside it,
    and may not come nearer to the sheet's edge than the margin.

    Args:
        sheet: the recording.
        margin_mm: strip along the sheet's edges that lettering keeps out of.
        lines: also report lettering that a line, circle or fill of another layer runs through.

    Returns:
        Overlaps in drawing order; empty when all is well.
    """
    texts = [item for item in sheet.items if isinstance(item, Text) and item.layer != "stamp" and item.text.strip()]
    texts.sort(key=lambda text: text_box(text)[0])
    obstacles = [item for item in sheet.items if not isinstance(item, Text) and item.layer != "stamp"]
    if not lines:
        obstacles = [item for item in obstacles if _is_hole(item)]
    obstacles.sort(key=lambda item: bounds(item)[0])
    return [*_outside(sheet, texts, margin_mm), *_on_text(texts), *_on_obstacle(texts, obstacles)]


def hits(text: Text, other: Item) -> bool:
    """Whether lettering touches another item, or lies inside it when that is a hole.

    Args:
        text: the lettering.
        other: any other item.
    """
    box, around = text_box(text), bounds(other)
    if box[0] >= around[2] or around[0] >= box[2] or box[1] >= around[3] or around[1] >= box[3]:
        return False
    corners = text_corners(text)
    match other:
        case Text():
            return _polygons_meet(corners, text_corners(other))
        case Circle():
            nearest, farthest = _distances(corners, (other.x_mm, other.y_mm))
            return nearest < other.radius_mm and (_is_hole(other) or farthest > other.radius_mm)
        case Line():
            return _lines_meet(corners, _outline(other))
        case Polyline() if not _is_hole(other):
            path = _outline(other)
            return _lines_meet(corners, (*path, path[0]) if other.closed else path)
        case Polyline() | Fill():
            return _polygons_meet(corners, _outline(other))
        case Arc():
            steps = max(2, math.ceil((other.end_deg - other.start_deg) / 5))
            turn = (other.end_deg - other.start_deg) / steps
            return _lines_meet(corners, tuple(other.point(other.start_deg + k * turn) for k in range(steps + 1)))


def _is_hole(item: Item) -> bool:
    """Whether an item is part of a hole: lettering may not even lie inside it."""
    is_round = isinstance(item, Circle | Arc) or (isinstance(item, Polyline) and item.closed)
    return item.layer == "drill" and is_round


def _outside(sheet: Sheet, texts: list[Text], margin_mm: float) -> Iterator[Overlap]:
    least, grace_mm = margin_mm, 1e-9
    for text in texts:
        left, bottom, right, top = text_box(text)
        room = (left, bottom, sheet.width_mm - right, sheet.height_mm - top)
        if min(room) < least - grace_mm:
            yield Overlap("text outside", text)


def _on_text(texts: list[Text]) -> Iterator[Overlap]:
    for i, text in enumerate(texts):
        right = text_box(text)[2]
        for other in texts[i + 1 :]:
            if text_box(other)[0] >= right:
                break
            if hits(text, other):
                yield Overlap("text on text", text, other)


def _on_obstacle(texts: list[Text], obstacles: Sequence[Item]) -> Iterator[Overlap]:
    boxes = [bounds(item) for item in obstacles]
    for text in texts:
        left, _, right, _ = text_box(text)
        for item, box in zip(obstacles, boxes, strict=True):
            if box[0] >= right:
                break
            if box[2] > left and hits(text, item):
                yield Overlap("text on hole" if _is_hole(item) else "text on line", text, item)


def _outline(item: Line | Polyline | Fill) -> tuple[Point, ...]:
    if isinstance(item, Line):
        return ((item.x0_mm, item.y0_mm), (item.x1_mm, item.y1_mm))
    return item.points_mm


def _polygons_meet(first: tuple[Point, ...], second: tuple[Point, ...]) -> bool:
    """Whether two polygons share area."""
    return _inside(first[0], second) or _lines_meet(first, (*second, second[0]))


def _lines_meet(polygon: tuple[Point, ...], path: tuple[Point, ...]) -> bool:
    """Whether a path runs inside a polygon or through its edges."""
    if any(_inside(point, polygon) for point in path):
        return True
    edges = list(zip(polygon, (*polygon[1:], polygon[0]), strict=True))
    return any(_cross(a, b, c, d) for a, b in edges for c, d in itertools.pairwise(path))


def _inside(point: Point, polygon: tuple[Point, ...]) -> bool:
    """Even-odd rule."""
    x, y = point
    inside = False
    for (x0, y0), (x1, y1) in zip(polygon, (*polygon[1:], polygon[0]), strict=True):
        if (y0 > y) != (y1 > y) and x < x0 + (y - y0) / (y1 - y0) * (x1 - x0):
            inside = not inside
    return inside


def _side(a: Point, b: Point, c: Point) -> float:
    return (b[0] - a[0]) * (c[1] - a[1]) - (b[1] - a[1]) * (c[0] - a[0])


def _cross(a: Point, b: Point, c: Point, d: Point) -> bool:
    """Whether two lines cross between their ends."""
    return _side(a, b, c) * _side(a, b, d) < 0 and _side(c, d, a) * _side(c, d, b) < 0


def _distances(polygon: tuple[Point, ...], centre: Point) -> tuple[float, float]:
    """Distance of a convex polygon's nearest and farthest point from a centre; 0 when the centre lies inside."""
    farthest = max(math.dist(centre, corner) for corner in polygon)
    if _inside(centre, polygon):
        return 0.0, farthest
    nearest = math.inf
    for a, b in zip(polygon, (*polygon[1:], polygon[0]), strict=True):
        along = ((centre[0] - a[0]) * (b[0] - a[0]) + (centre[1] - a[1]) * (b[1] - a[1])) / math.dist(a, b) ** 2
        along = min(1.0, max(0.0, along))
        nearest = min(nearest, math.dist(centre, (a[0] + along * (b[0] - a[0]), a[1] + along * (b[1] - a[1]))))
    return nearest, farthest
