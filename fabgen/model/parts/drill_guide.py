"""Drill guide: slides on the boom, shows the scribed station line in a window, guides the drill through both walls.

Frame: local x along the boom, forward; the drill axis is local y at the origin; z up (a guide for the top stands on
its side: local y is the boom's up). A hardened bushing is pressed from outside into each ±y wall against a lip. Set
screws press the boom against the +z face (flat walls: and the +y face); a guide for a round boom has V notches at both
ends and in the reading edge for the line along the boom's crown. Printed standing on its rear end: the drill axis then
lies in one layer, and every way across it is a teardrop.
"""

from fabgen.design.drill_guide_sizes import (
    ARROW_MM,
    CELL_MM,
    EDGE_MM,
    MARK_DEPTH_MM,
    NOTCH_MM,
    RELIEF_MM,
    WINDOW_MM,
    DrillGuideSize,
    Side,
    drill_guide_size,
)
from fabgen.model.kernel import cq, cut, on_bed, part_of, solid_of
from fabgen.model.marks import lettering
from fabgen.model.shapes import Triple, X, Y, Z, hexagon, prism, teardrop

SOURCE = "printed"
_BACK: Triple = (-1.0, 0.0, 0.0)
_RIGHT: Triple = (0.0, -1.0, 0.0)
_DOWN: Triple = (0.0, 0.0, -1.0)
_NOTCH = [(-NOTCH_MM, 0.0), (NOTCH_MM, 0.0), (0.0, NOTCH_MM)]
_OUT: dict[Side, Triple] = {"+y": Y, "-y": _RIGHT, "+z": Z, "-z": _DOWN}


def drill_guide(
    *,
    boom_width_mm: float = 20.0,
    boom_height_mm: float = 20.0,
    boom_diameter_mm: float = 0.0,
    bushing_bore_mm: float = 2.5,
    bushing_outside_mm: float = 5.0,
    bushing_length_mm: float = 6.0,
    face: str = "sides",
    screw: str | None = None,
    play_mm: float = 0.3,
    hole_growth_mm: float = 0.0,
) -> cq.Workplane:
    """A drill guide.

    Args:
        boom_width_mm: the boom's outside along the drill axis.
        boom_height_mm: the boom's outside across it.
        boom_diameter_mm: a round boom's outside; 0 for flat walls.
        bushing_bore_mm: the drill.
        bushing_outside_mm: outside of the bushing.
        bushing_length_mm: length of the bushing.
        face: `sides` or `top`, where the holes are.
        screw: thread of the set screws; left out: M4, on small booms M3.
        play_mm: how much larger the cavity is than the boom.
        hole_growth_mm: added to the drawn bores and the cavity.

    Returns:
        One solid.
    """
    size = drill_guide_size(
        boom_width_mm=boom_width_mm,
        boom_height_mm=boom_height_mm,
        boom_diameter_mm=boom_diameter_mm,
        bushing_bore_mm=bushing_bore_mm,
        bushing_outside_mm=bushing_outside_mm,
        bushing_length_mm=bushing_length_mm,
        face=face,
        screw=screw,
        play_mm=play_mm,
        hole_growth_mm=hole_growth_mm,
    )
    tube, ends = _round_tube(size) if size.boom_diameter_mm else _flat_tube(size)
    return part_of(cut(tube, *ends, *_window(size), *_bushings(size), *_clamps(size), *_marks(size)).clean())


def _tube(size: DrillGuideSize, cavity: cq.Wire) -> cq.Solid:
    """The block with its cavity, from the outline of the cavity at its rear end."""
    x, y, z = -size.length_mm / 2, size.outside_mm("+y"), size.outside_mm("+z")
    low_y, low_z = -size.outside_mm("-y"), -size.outside_mm("-z")
    corners = [(low_y, low_z), (y, low_z), (y, z), (low_y, z)]
    outside = cq.Wire.makePolygon([cq.Vector(x, *corner) for corner in corners], close=True)
    return cq.Solid.extrudeLinear(outside, [cavity], cq.Vector(size.length_mm, 0.0, 0.0))


def _flat_tube(size: DrillGuideSize) -> tuple[cq.Solid, list[cq.Shape]]:
    """Block with a rectangular cavity, its corners relieved, and the tools that widen its ends."""
    x, r = size.length_mm / 2, RELIEF_MM / 2
    y, z = (-size.reach_mm("-y"), size.reach_mm("+y")), (-size.reach_mm("-z"), size.reach_mm("+z"))
    corners = [cq.Vector(-x, *corner) for corner in ((y[0], z[0]), (y[1], z[0]), (y[1], z[1]), (y[0], z[1]))]
    edges: list[cq.Edge] = []
    for i, corner in enumerate(corners):
        inwards = (corner - corners[i - 1]).normalized()
        onwards = (corners[(i + 1) % 4] - corner).normalized()
        start, end = corner - inwards * r, corner + onwards * r
        edges.append(cq.Edge.makeThreePointArc(start, corner + (inwards - onwards).normalized() * r, end))
        edges.append(cq.Edge.makeLine(end, corners[(i + 1) % 4] - onwards * r))
    ends: list[cq.Shape] = []
    wide, high = y[1] - y[0], z[1] - z[0]
    for end_x, into in ((-x, X), (x, _BACK)):
        mouth = cq.Workplane(cq.Plane((end_x, (y[0] + y[1]) / 2, (z[0] + z[1]) / 2), Y, into))
        mouth = mouth.rect(wide + 2 * EDGE_MM, high + 2 * EDGE_MM).workplane(offset=EDGE_MM).rect(wide, high)
        ends.append(solid_of(mouth.loft(ruled=True)))
    return _tube(size, cq.Wire.assembleEdges(edges)), ends


def _round_tube(size: DrillGuideSize) -> tuple[cq.Solid, list[cq.Shape]]:
    """Block with a round cavity, and the tools that widen and notch its ends."""
    x, radius, low = size.length_mm / 2, size.cavity_radius_mm, -size.play_mm / 2
    out, reach = _OUT[size.notch_side], size.outside_mm(size.notch_side) + 1
    ends: list[cq.Shape] = []
    for end, into in ((-x, X), (x, _BACK)):
        ends.append(cq.Solid.makeCone(radius + EDGE_MM, radius, EDGE_MM, cq.Vector(end, 0.0, low), cq.Vector(*into)))
        ends.append(prism(_NOTCH, (end, 0.0, 0.0), out, into, reach))
    return _tube(size, cq.Wire.makeCircle(radius, cq.Vector(-x, 0.0, low), cq.Vector(*X))), ends


def _window(size: DrillGuideSize) -> list[cq.Shape]:
    half, edge, top = size.window_half_mm, size.edge_mm, size.outside_mm("+z")
    # Corners are (u, v) = (x, z).
    outline = [(0.0, 0.0), (WINDOW_MM, 0.0), (WINDOW_MM, top + 1), (edge - top - 1, top + 1), (0.0, edge)]
    tools: list[cq.Shape] = [prism([(-u, v) for u, v in outline], (0.0, -half, 0.0), Y, Z, 2 * half)]
    if size.boom_diameter_mm:
        tools.append(prism(_NOTCH, (0.0, 0.0, 0.0), Z, _BACK, top + 1))
    return tools


def _bushings(size: DrillGuideSize) -> list[cq.Shape]:
    left, right = size.outside_mm("+y") + 1, size.outside_mm("-y") + 1
    sides: tuple[Side, ...] = ("+y", "-y")
    seats = [_from_face(size, side, size.seat_mm, 0.0, size.lip_face_mm(side)) for side in sides]
    return [teardrop(size.lip_bore_mm, (0.0, -right, 0.0), Y, X, left + right), *seats]


def _clamps(size: DrillGuideSize) -> list[cq.Shape]:
    tools: list[cq.Shape] = []
    for side, x in size.screws:
        out, floor = _OUT[side], size.pocket_floor_mm(side)
        tools.append(_from_face(size, side, size.clearance_mm, x, floor - 0.5))
        across = Y if side == "-z" else Z
        tools.append(hexagon(size.nut_flats_mm, (x, 0.0, 0.0), out, across, floor))
    return tools


def _from_face(size: DrillGuideSize, side: Side, diameter_mm: float, x_mm: float, to_mm: float) -> cq.Shape:
    """A teardrop from beyond an outer face down to a distance from the boom's axis."""
    out = _OUT[side]
    return teardrop(diameter_mm, (x_mm, out[1] * to_mm, out[2] * to_mm), out, X, size.outside_mm(side) + 1 - to_mm)


def _marks(size: DrillGuideSize) -> list[cq.Shape]:
    reading: dict[Side, tuple[Triple, Triple]]
    if size.face == "sides":
        reading = {"+z": (X, Y), "+y": (_BACK, Z), "-y": (X, Z), "-z": (X, _RIGHT)}
    else:
        reading = {"+y": (X, _DOWN), "+z": (X, Y), "-z": (X, _RIGHT)}
    tools: list[cq.Shape] = []
    for text, side, x in size.marks:
        out, depth = _OUT[side], size.outside_mm(side) - MARK_DEPTH_MM
        right, up = reading[side]
        tools += lettering(text, (x, out[1] * depth, out[2] * depth), right, up, CELL_MM, MARK_DEPTH_MM + 1)
    top = size.notch_side
    out, depth = _OUT[top], size.outside_mm(top) - MARK_DEPTH_MM
    long, wide = ARROW_MM
    arrow = [(-wide / 2, 0.0), (wide / 2, 0.0), (0.0, long)]
    tools.append(prism(arrow, (size.arrow_x_mm, out[1] * depth, out[2] * depth), out, X, MARK_DEPTH_MM + 1))
    return tools


def print_pose(part: cq.Workplane) -> cq.Workplane:
    """The part as it stands on the bed: on its rear end."""
    return on_bed(part.rotate((0, 0, 0), (0, 1, 0), -90))
