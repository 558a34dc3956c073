"""Folded dipole's rod: one rod bent to a flat loop, with a gap in the middle of its lower limb.

Frame: loop in local y and z, origin at the middle of the gap, upper limb at z = spacing.
"""

from fabgen.design.part_sizes import FoldedRodSize, folded_rod_size
from fabgen.model.kernel import cq, cut, fused, part_of
from fabgen.model.shapes import X, Y, cylinder

SOURCE = "made"


def folded_rod(
    *,
    length_mm: float = 320.0,
    spacing_mm: float = 30.0,
    diameter_mm: float = 4.0,
    gap_mm: float = 10.0,
    cross_hole_mm: float = 0.0,
    cross_hole_from_end_mm: float = 4.4,
) -> cq.Workplane:
    """A bent rod.

    Args:
        length_mm: over the outside of both bends.
        spacing_mm: centre to centre of the limbs.
        diameter_mm: of the rod.
        gap_mm: between the fed ends.
        cross_hole_mm: hole along x through both fed ends; 0 for none.
        cross_hole_from_end_mm: from a fed end to the middle of that hole.

    Returns:
        One solid.
    """
    size = folded_rod_size(
        length_mm=length_mm,
        spacing_mm=spacing_mm,
        diameter_mm=diameter_mm,
        gap_mm=gap_mm,
        cross_hole_mm=cross_hole_mm,
        cross_hole_from_end_mm=cross_hole_from_end_mm,
    )
    d, straight = size.diameter_mm, size.straight_mm / 2
    pieces: list[cq.Shape] = []
    for side in (-1.0, 1.0):
        pieces.append(cylinder(d, (0.0, side * size.gap_mm / 2, 0.0), (0.0, side, 0.0), size.fed_mm))
        pieces.append(_bend(size, side))
    solid = fused(cylinder(d, (0.0, -straight, size.spacing_mm), Y, 2 * straight), *pieces)
    if size.cross_hole_mm:
        at = size.gap_mm / 2 + size.cross_hole_from_end_mm
        solid = cut(solid, *[cylinder(size.cross_hole_mm, (-d, side * at, 0.0), X, 2 * d) for side in (-1, 1)])
    return part_of(solid)


def _bend(size: FoldedRodSize, side: float) -> cq.Shape:
    """Half a ring from the fed limb's end up to the upper limb's."""
    straight = size.straight_mm / 2
    circle = cq.Workplane("XZ", origin=(0.0, side * straight, 0.0)).circle(size.diameter_mm / 2)
    # The turning axis lies parallel to x through the bend's centre, in the workplane's own coordinates.
    centre = size.bend_radius_mm
    bend = circle.revolve(180, (-side, centre), (side, centre)).val()
    assert isinstance(bend, cq.Shape)
    return bend
