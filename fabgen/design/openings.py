"""Upright openings of a printed block and the walls between them."""

import math
from collections.abc import Iterator

from fabgen.frozen import frozen

Point = tuple[float, float]


@frozen
class Opening:
    """A convex outline in plan, widened by a radius, between two levels; a round hole is one point and its radius."""

    corners_mm: tuple[Point, ...]
    radius_mm: float = 0.0
    low_mm: float = 0.0
    high_mm: float = 0.0


def round_opening(diameter_mm: float, at_mm: Point, low_mm: float, high_mm: float) -> Opening:
    """A round hole."""
    return Opening((at_mm,), diameter_mm / 2, low_mm, high_mm)


def box_opening(x_mm: Point, y_mm: Point, low_mm: float, high_mm: float) -> Opening:
    """A hole with four sides, from its limits along x and y."""
    (x0, x1), (y0, y1) = x_mm, y_mm
    return Opening(((x0, y0), (x1, y0), (x1, y1), (x0, y1)), 0.0, low_mm, high_mm)


def hexagon_opening(flats_mm: float, at_mm: Point, low_mm: float, high_mm: float) -> Opening:
    """A nut trap, corners towards ±x."""
    (x, y), reach = at_mm, flats_mm / math.sqrt(3)
    angles = [math.radians(60 * i) for i in range(6)]
    corners = tuple((x + reach * math.cos(a), y + reach * math.sin(a)) for a in angles)
    return Opening(corners, 0.0, low_mm, high_mm)


def wall_between_mm(first: Opening, second: Opening) -> float:
    """Thickness of the wall between two openings that do not meet."""
    across = min(
        _point_to_edge_mm(corner, edge)
        for one, other in ((first, second), (second, first))
        for corner in one.corners_mm
        for edge in _edges(other)
    )
    across = max(0.0, across - first.radius_mm - second.radius_mm)
    return math.hypot(across, max(0.0, first.low_mm - second.high_mm, second.low_mm - first.high_mm))


def _edges(opening: Opening) -> Iterator[tuple[Point, Point]]:
    corners = opening.corners_mm
    return zip(corners, corners[1:] + corners[:1], strict=True)


def _point_to_edge_mm(point: Point, edge: tuple[Point, Point]) -> float:
    (px, py), ((ax, ay), (bx, by)) = point, edge
    along_x, along_y = bx - ax, by - ay
    length2 = along_x**2 + along_y**2
    share = min(1.0, max(0.0, ((px - ax) * along_x + (py - ay) * along_y) / length2)) if length2 else 0.0
    return math.hypot(px - ax - share * along_x, py - ay - share * along_y)
