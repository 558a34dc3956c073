"""Boom-to-mast clamp plate: metal, with holes for the U-bolts; never printed.

Frame: local z = normal, plate from z = 0 to its thickness, centred in x and y.
"""

from fabgen.design.part_sizes import clamp_plate_size
from fabgen.model.kernel import cq, cut, part_of
from fabgen.model.shapes import Z, box, cylinder

SOURCE = "made"


def clamp_plate(
    *,
    width_mm: float = 80.0,
    height_mm: float = 80.0,
    thickness_mm: float = 5.0,
    holes: tuple[tuple[float, float, float], ...] = (
        (-22.5, -15.0, 6.6),
        (22.5, -15.0, 6.6),
        (-22.5, 15.0, 6.6),
        (22.5, 15.0, 6.6),
    ),
    corner_mm: float = 3.0,
) -> cq.Workplane:
    """A clamp plate.

    Args:
        width_mm: along local x.
        height_mm: along local y.
        thickness_mm: along local z.
        holes: x, y and diameter of each hole.
        corner_mm: radius of the four corners; 0 leaves them sharp.

    Returns:
        One solid.
    """
    size = clamp_plate_size(
        width_mm=width_mm, height_mm=height_mm, thickness_mm=thickness_mm, holes=holes, corner_mm=corner_mm
    )
    x, y = size.width_mm / 2, size.height_mm / 2
    plate = cq.Workplane(box((-x, x), (-y, y), (0.0, size.thickness_mm)))
    if size.corner_mm:
        plate = plate.edges("|Z").fillet(size.corner_mm)
    solid = plate.solids().val()
    assert isinstance(solid, cq.Solid)
    tools = [cylinder(d, (hx, hy, -1.0), Z, size.thickness_mm + 2) for hx, hy, d in size.holes]
    return part_of(cut(solid, *tools) if tools else solid)
