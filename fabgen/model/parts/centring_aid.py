"""Centring aid: two of these grip a spare rod at a rod's projection; one stops on the boom, the other on the rod's tip.

Slide two blocks on an offcut of the rod, both datum faces the same way, and set them apart by the projection in the cut
list; hold the first beside the rod against the boom's wall, its arm turned up, the second with its arm across the rod,
and push the rod until its tip meets that arm; the other side must then show the same.

Frame: the gauge rod's axis is local z, the datum face z = 0 looks along −z, the arm points to +x. Printed on its datum
face, the bore upright: no support.
"""

from fabgen.design.bush_sizes import EDGE_MM
from fabgen.design.centring_aid_sizes import ARM_MM, HEIGHT_MM, centring_aid_size
from fabgen.model.kernel import cq, cut, fused, on_bed, part_of
from fabgen.model.shapes import Z, box, revolved, teardrop, upright

SOURCE = "printed"


def centring_aid(
    *,
    rod_diameter_mm: float = 4.0,
    clear_mm: float = 12.0,
    bore_mm: float | None = None,
    screw: str | None = None,
    hole_growth_mm: float = 0.0,
) -> cq.Workplane:
    """One block of the pair.

    Args:
        rod_diameter_mm: the rod to centre, and the gauge rod.
        clear_mm: diameter of the widest part round the rod at the boom's wall: flange or keeper.
        bore_mm: left out: rod + 0.3.
        screw: thread of the clamp screw; left out: M3, on thin rods M2.
        hole_growth_mm: added to the drawn bores.

    Returns:
        One solid.
    """
    size = centring_aid_size(
        rod_diameter_mm=rod_diameter_mm,
        clear_mm=clear_mm,
        bore_mm=bore_mm,
        screw=screw,
        hole_growth_mm=hole_growth_mm,
    )
    (low, high), half = size.body_x_mm, size.half_width_mm
    body = box((low, high), (-half, half), (0.0, HEIGHT_MM))
    arm = box((0.0, size.arm_end_mm), (-half, half), (0.0, ARM_MM))
    radius = size.drawn_bore_mm / 2
    bore = revolved(
        [
            (0.0, -EDGE_MM),
            (radius + 2 * EDGE_MM, -EDGE_MM),
            (radius, EDGE_MM),
            (radius, HEIGHT_MM - EDGE_MM),
            (radius + 2 * EDGE_MM, HEIGHT_MM + EDGE_MM),
            (0.0, HEIGHT_MM + EDGE_MM),
        ]
    )
    sight = upright(size.sight_mm, (size.reach_mm, 0.0), (-1.0, ARM_MM + 1))
    slot = box(size.nut_x_mm, (-size.nut_y_mm, size.nut_y_mm), (size.slot_z_mm, HEIGHT_MM + 1))
    way = teardrop(size.clearance_mm, (low - 1, 0.0, size.screw_z_mm), (1.0, 0.0, 0.0), Z, 1 - low)
    return part_of(cut(fused(body, arm), bore, sight, slot, way))


def print_pose(part: cq.Workplane) -> cq.Workplane:
    """The part as it lies on the bed: on its datum face."""
    return on_bed(part)
