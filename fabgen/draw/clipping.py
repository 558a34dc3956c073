"""Cut items along the edges of an upright window, exactly.

A line stays a line and an arc an arc; nothing is approximated. Lettering is never cut: it is kept whole or left to the
caller. Coordinates are the sheet's, in mm.
"""

import itertools
import math

from fabgen.design.drawing import Arc, Box, Circle, Fill, Item, Line, Point, Polyline, Text
from fabgen.design.overlaps import bounds

_LEAST_MM = 1e-9


def clipped(item: Item, window: Box) -> list[Item]:
    """The parts of an item inside a window.

    Args:
        item: any item; a text is kept only when it lies in the window as a whole.
        window: left, bottom, right, top in mm.

    Returns:
        No, one or several items of the same layer; a cut circle comes back as arcs.
    """
    box = bounds(item)
    if contains(window, box):
        return [item]
    if box[0] > window[2] or box[2] < window[0] or box[1] > window[3] or box[3] < window[1]:
        return []
    match item:
        case Line():
            ends = _segment((item.x0_mm, item.y0_mm), (item.x1_mm, item.y1_mm), window)
            return [Line(item.layer, *ends[0], *ends[1])] if ends else []
        case Polyline():
            return [Polyline(item.layer, path) for path in _paths(item, window)]
        case Circle():
            return _arcs(Arc(item.layer, item.x_mm, item.y_mm, item.radius_mm, 0, 360), window)
        case Arc():
            return _arcs(item, window)
        case Fill():
            points = _polygon(item.points_mm, window)
            return [Fill(item.layer, points)] if len(points) > 2 else []
        case Text():
            return []


def contains(window: Box, box: Box) -> bool:
    """Whether a box lies in a window, edges included; both as left, bottom, right, top in mm."""
    low = window[0] <= box[0] + _LEAST_MM and window[1] <= box[1] + _LEAST_MM
    return low and box[2] <= window[2] + _LEAST_MM and box[3] <= window[3] + _LEAST_MM


def _segment(start: Point, end: Point, window: Box) -> tuple[Point, Point] | None:
    """The part of a straight line in a window (Liang and Barsky's method)."""
    dx, dy = end[0] - start[0], end[1] - start[1]
    first, last = 0.0, 1.0
    rows = (
        (-dx, start[0] - window[0]),
        (dx, window[2] - start[0]),
        (-dy, start[1] - window[1]),
        (dy, window[3] - start[1]),
    )
    for rate, room in rows:
        if rate == 0:
            if room < 0:
                return None
        elif rate < 0:
            first = max(first, room / rate)
        else:
            last = min(last, room / rate)
    if (last - first) * math.hypot(dx, dy) <= _LEAST_MM:
        return None
    cut_start = start if first == 0 else (start[0] + first * dx, start[1] + first * dy)
    cut_end = end if last == 1 else (start[0] + last * dx, start[1] + last * dy)
    return cut_start, cut_end


def _paths(item: Polyline, window: Box) -> list[tuple[Point, ...]]:
    """The runs of a polyline in a window."""
    points = (*item.points_mm, item.points_mm[0]) if item.closed else item.points_mm
    runs: list[list[Point]] = []
    for start, end in itertools.pairwise(points):
        part = _segment(start, end, window)
        if part is None:
            continue
        if runs and runs[-1][-1] == part[0]:
            runs[-1].append(part[1])
        else:
            runs.append(list(part))
    if item.closed and len(runs) > 1 and runs[-1][-1] == runs[0][0]:
        runs[0] = runs.pop()[:-1] + runs[0]
    return [tuple(run) for run in runs]


def _arcs(arc: Arc, window: Box) -> list[Item]:
    """The pieces of an arc in a window; pieces that meet where a full circle starts are joined.

    Where the arc only touches an edge it is parted too, so that the middle of every piece is clear of the edges.
    """
    left, bottom, right, top = window
    crossings = {arc.start_deg, arc.end_deg}
    for edge, centre, is_x in (
        (left, arc.x_mm, True),
        (right, arc.x_mm, True),
        (bottom, arc.y_mm, False),
        (top, arc.y_mm, False),
    ):
        share = (edge - centre) / arc.radius_mm
        if abs(share) <= 1:
            angle = math.degrees(math.acos(share) if is_x else math.asin(share))
            for crossing in (angle, -angle) if is_x else (angle, 180 - angle):
                turned = arc.start_deg + (crossing - arc.start_deg) % 360
                if turned < arc.end_deg:
                    crossings.add(turned)
    kept: list[tuple[float, float]] = []
    for start, end in itertools.pairwise(sorted(crossings)):
        x, y = arc.point((start + end) / 2)
        if not (left <= x <= right and bottom <= y <= top):
            continue
        if kept and kept[-1][1] == start:
            kept[-1] = (kept[-1][0], end)
        else:
            kept.append((start, end))
    if len(kept) > 1 and arc.end_deg - arc.start_deg == 360 and kept[0][0] == 0 and kept[-1][1] == 360:
        kept[0] = (kept.pop()[0], kept[0][1] + 360)
    return [Arc(arc.layer, arc.x_mm, arc.y_mm, arc.radius_mm, start, end) for start, end in kept]


def _polygon(points: tuple[Point, ...], window: Box) -> tuple[Point, ...]:
    """A filled polygon cut to a window (Sutherland and Hodgman's method)."""
    for axis, edge, sign in ((0, window[0], 1), (0, window[2], -1), (1, window[1], 1), (1, window[3], -1)):
        kept: list[Point] = []
        for start, end in zip(points, (*points[1:], *points[:1]), strict=True):
            in_start, in_end = sign * (start[axis] - edge) >= 0, sign * (end[axis] - edge) >= 0
            if in_start:
                kept.append(start)
            if in_start != in_end:
                share = (edge - start[axis]) / (end[axis] - start[axis])
                kept.append((start[0] + share * (end[0] - start[0]), start[1] + share * (end[1] - start[1])))
        points = tuple(kept)
    return points
