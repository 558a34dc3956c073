"""Straight rod, sawn from stock, optionally with a hole across for a terminal or middle screw.

Frame: axis = local z, centred on the origin.
"""

from fabgen.design.part_sizes import rod_size
from fabgen.model.kernel import cq, cut, part_of
from fabgen.model.shapes import X, cylinder, upright

SOURCE = "made"


def rod(
    *, diameter_mm: float = 4.0, length_mm: float = 300.0, cross_hole_mm: float = 0.0, cross_hole_z_mm: float = 0.0
) -> cq.Workplane:
    """A rod.

    Args:
        diameter_mm: of the rod.
        length_mm: cut length.
        cross_hole_mm: hole drilled along local x; 0 for none.
        cross_hole_z_mm: its place along the rod, from the middle.

    Returns:
        One solid.
    """
    size = rod_size(
        diameter_mm=diameter_mm,
        length_mm=length_mm,
        cross_hole_mm=cross_hole_mm,
        cross_hole_z_mm=cross_hole_z_mm,
    )
    half = size.length_mm / 2
    solid: cq.Shape = upright(size.diameter_mm, (0.0, 0.0), (-half, half))
    if size.cross_hole_mm:
        reach = size.diameter_mm
        solid = cut(solid, cylinder(size.cross_hole_mm, (-reach, 0.0, size.cross_hole_z_mm), X, 2 * reach))
    return part_of(solid)
