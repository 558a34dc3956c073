"""Simple solids that parts are made of and cut with, placed by their limits."""

import math
from collections.abc import Sequence

from fabgen.model.kernel import cq, cut

Range = tuple[float, float]
Point = tuple[float, float]
Triple = tuple[float, float, float]
X: Triple = (1.0, 0.0, 0.0)
Y: Triple = (0.0, 1.0, 0.0)
Z: Triple = (0.0, 0.0, 1.0)


def box(x_mm: Range, y_mm: Range, z_mm: Range) -> cq.Solid:
    """A box between limits."""
    size = [high - low for low, high in (x_mm, y_mm, z_mm)]
    return cq.Solid.makeBox(size[0], size[1], size[2], cq.Vector(x_mm[0], y_mm[0], z_mm[0]))


def cylinder(diameter_mm: float, start_mm: Triple, along: Triple, length_mm: float) -> cq.Solid:
    """A cylinder from a point along a unit vector."""
    return cq.Solid.makeCylinder(diameter_mm / 2, length_mm, cq.Vector(*start_mm), cq.Vector(*along))


def upright(diameter_mm: float, at_mm: Point, z_mm: Range) -> cq.Solid:
    """A cylinder parallel to z."""
    return cylinder(diameter_mm, (*at_mm, z_mm[0]), Z, z_mm[1] - z_mm[0])


def prism(outline: Sequence[Point], start_mm: Triple, along: Triple, up: Triple, length_mm: float) -> cq.Solid:
    """A straight-sided outline pushed along a unit vector.

    Args:
        outline: corners (u, v); v points along `up`, u along `up` × `along`.
        start_mm: where the outline's (0, 0) stands.
        along: unit vector of the push.
        up: unit vector of v.
        length_mm: how far.
    """
    start, high, right = cq.Vector(*start_mm), cq.Vector(*up), cq.Vector(*up).cross(cq.Vector(*along))
    wire = cq.Wire.makePolygon([start + right * u + high * v for u, v in outline], close=True)
    return cq.Solid.extrudeLinear(wire, [], cq.Vector(*along) * length_mm)


def teardrop(diameter_mm: float, start_mm: Triple, along: Triple, apex: Triple, length_mm: float) -> cq.Solid:
    """A cylinder closed by two planes at 45° that meet above it: a lying bore that prints without support.

    Args:
        diameter_mm: of the cylinder.
        start_mm: on its axis.
        along: unit vector of its axis.
        apex: unit vector that points up when the part is printed.
        length_mm: how far.
    """
    r = diameter_mm / 2
    side = r * math.sqrt(0.5)
    start, up, right = cq.Vector(*start_mm), cq.Vector(*apex), cq.Vector(*apex).cross(cq.Vector(*along))
    left_end, right_end = start + (up - right) * side, start + (up + right) * side
    tip = start + up * (r * math.sqrt(2))
    edges = [
        cq.Edge.makeThreePointArc(left_end, start - up * r, right_end),
        cq.Edge.makeLine(right_end, tip),
        cq.Edge.makeLine(tip, left_end),
    ]
    return cq.Solid.extrudeLinear(cq.Wire.assembleEdges(edges), [], cq.Vector(*along) * length_mm)


def hexagon(flats_mm: float, start_mm: Triple, along: Triple, corner: Triple, length_mm: float) -> cq.Solid:
    """A hexagonal prism, one corner towards a unit vector."""
    reach = flats_mm / math.sqrt(3)
    angles = [math.radians(30 + 60 * i) for i in range(6)]
    outline = [(reach * math.cos(a), reach * math.sin(a)) for a in angles]
    return prism(outline, start_mm, along, corner, length_mm)


def revolved(profile: Sequence[Point]) -> cq.Solid:
    """A closed profile of (radius, z) corners turned round the z axis."""
    wire = cq.Wire.makePolygon([cq.Vector(radius, 0.0, z) for radius, z in profile], close=True)
    return cq.Solid.revolve(wire, [], 360.0, cq.Vector(), cq.Vector(*Z))


def boom_round(diameter_mm: float, length_mm: float) -> cq.Solid:
    """A round boom along x whose crown passes through the origin, centred on it."""
    return cylinder(diameter_mm, (-length_mm / 2, 0.0, -diameter_mm / 2), X, length_mm)


def fillet_prism(corner_mm: Point, towards: Point, radius_mm: float, y_mm: Range) -> cq.Solid:
    """What a fillet adds to an inner edge parallel to y.

    Args:
        corner_mm: the edge's (x, z).
        towards: signs of x and z from the edge into the open.
        radius_mm: of the fillet.
        y_mm: limits along the edge.
    """
    (x, z), (sx, sz), r = corner_mm, towards, radius_mm
    block = box(_ordered(x, x + sx * r), y_mm, _ordered(z, z + sz * r))
    tool = cylinder(2 * r, (x + sx * r, y_mm[0] - 1, z + sz * r), Y, y_mm[1] - y_mm[0] + 2)
    return _solid(cq.Workplane(cut(block, tool)))


def _ordered(first: float, second: float) -> Range:
    return min(first, second), max(first, second)


def _solid(part: cq.Workplane) -> cq.Solid:
    solid = part.val()
    if isinstance(solid, cq.Shape) and len(solid.Solids()) == 1:
        found = solid.Solids()[0]
        assert isinstance(found, cq.Solid)
        return found
    raise AssertionError("a simple solid came out in pieces")
