"""Distance between simple shapes by formula: exact where it can be, never too large.

A box is a rectangle along an axis, a cylinder a disc along one; two such bodies along a common axis are as far apart as
their outlines across it and their spans along it, in quadrature. Cylinders at right angles to each other are as far
apart as any plane can show.
"""

import math
from collections.abc import Sequence

from fabgen.design.arranged import Axis, Box, Cylinder, Shape, Vector

_INDEX: dict[Axis, int] = {"x": 0, "y": 1, "z": 2}


def distance_mm(first: Shape, second: Shape) -> float:
    """Distance of two shapes; 0 where they touch or overlap.

    Exact for two boxes, a box and a cylinder, and parallel cylinders (a ring's bore counts as open). For cylinders at
    right angles it is a lower bound, exact where their middles cross or their boxes are nearest.

    Args:
        first: any shape.
        second: any shape.
    """
    if isinstance(first, Box) and isinstance(second, Box):
        return math.hypot(*(_gap(first, second, i) for i in range(3)))
    if isinstance(first, Cylinder) and isinstance(second, Cylinder):
        return _cylinders(first, second)
    box, cylinder = (first, second) if isinstance(first, Box) else (second, first)
    assert isinstance(box, Box)
    assert isinstance(cylinder, Cylinder)
    return _box_and_cylinder(box, cylinder)


def parts_distance_mm(first: Sequence[Shape], second: Sequence[Shape]) -> float:
    """Distance of two parts, each given by the shapes that hold it."""
    return min(distance_mm(a, b) for a in first for b in second)


def point_distance_mm(point: Vector, shape: Shape) -> float:
    """Distance from a point to a shape; 0 inside it."""
    return distance_mm(Box(point, point), shape)


def box_of(shape: Shape) -> Box:
    """The smallest box round a shape."""
    return shape if isinstance(shape, Box) else shape.box


def bounding_box(shapes: Sequence[Shape]) -> Box:
    """The smallest box round some shapes."""
    boxes = [box_of(shape) for shape in shapes]
    if len(boxes) == 1:
        return boxes[0]
    low = [min(box.low[i] for box in boxes) for i in range(3)]
    high = [max(box.high[i] for box in boxes) for i in range(3)]
    return Box((low[0], low[1], low[2]), (high[0], high[1], high[2]))


def _gap(first: Box, second: Box, index: int) -> float:
    return max(0.0, first.low[index] - second.high[index], second.low[index] - first.high[index])


def _box_and_cylinder(box: Box, cylinder: Cylinder) -> float:
    along = _INDEX[cylinder.axis]
    across = [i for i in range(3) if i != along]
    centre, radius, bore = cylinder.centre, cylinder.diameter_mm / 2, cylinder.bore_mm / 2
    near = math.hypot(*(max(0.0, box.low[i] - centre[i], centre[i] - box.high[i]) for i in across))
    far = math.hypot(*(max(abs(box.low[i] - centre[i]), abs(box.high[i] - centre[i])) for i in across))
    radial = max(0.0, near - radius, bore - far)
    half = cylinder.length_mm / 2
    apart = max(0.0, box.low[along] - centre[along] - half, centre[along] - half - box.high[along])
    return math.hypot(radial, apart)


def _cylinders(first: Cylinder, second: Cylinder) -> float:
    if first.axis != second.axis:
        boxes = math.hypot(*(_gap(first.box, second.box, i) for i in range(3)))
        normal = 3 - _INDEX[first.axis] - _INDEX[second.axis]
        apart = abs(first.centre[normal] - second.centre[normal])
        return max(boxes, apart - (first.diameter_mm + second.diameter_mm) / 2)
    along = _INDEX[first.axis]
    centres = math.hypot(*(first.centre[i] - second.centre[i] for i in range(3) if i != along))
    radii = (first.diameter_mm / 2, second.diameter_mm / 2)
    inside = (first.bore_mm / 2 - centres - radii[1], second.bore_mm / 2 - centres - radii[0])
    radial = max(0.0, centres - sum(radii), *inside)
    apart = abs(first.centre[along] - second.centre[along]) - (first.length_mm + second.length_mm) / 2
    return math.hypot(radial, max(0.0, apart))
