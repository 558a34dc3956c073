"""Coupon holder: the director of a test array is laid into its slots, free or with its mount on a piece of boom.

Frame: origin on the timber's top under the rod, local x along the timber, y along the rod, z up. The rod lies in an
open slot in each cheek, which fixes its station to 0.1 mm either way; the piece of boom hangs on it between the cheeks
and is tied down through the four slots of the floor. Printed on its floor, the slots open upwards: no support.
"""

from fabgen.design.coupon_holder_sizes import CHEEK_MM, TIE_MM, coupon_holder_size
from fabgen.model.kernel import cq, cut, fused, on_bed, part_of
from fabgen.model.shapes import Y, box, cylinder, upright

SOURCE = "printed"


def coupon_holder(
    *,
    rod_diameter_mm: float = 4.0,
    height_mm: float = 20.0,
    boom_width_mm: float = 20.0,
    rest_mm: float = 10.0,
    stack_mm: float = 8.0,
    screw: str = "M3",
    hole_growth_mm: float = 0.0,
) -> cq.Workplane:
    """A holder.

    Args:
        rod_diameter_mm: the director.
        height_mm: from the timber's top to the rod's axis.
        boom_width_mm: of the piece of boom, along the rod.
        rest_mm: from the rod's axis down to the underside of the piece.
        stack_mm: what stands out of the piece's wall along the rod: flange and keeper.
        screw: thread of the two hold-down screws.
        hole_growth_mm: added to the drawn holes and slots.

    Returns:
        One solid.
    """
    size = coupon_holder_size(
        rod_diameter_mm=rod_diameter_mm,
        height_mm=height_mm,
        boom_width_mm=boom_width_mm,
        rest_mm=rest_mm,
        stack_mm=stack_mm,
        screw=screw,
        hole_growth_mm=hole_growth_mm,
    )
    x, y, cheek = size.half_x_mm, size.half_y_mm, size.cheek_x_mm
    upwards = (0.0, size.top_mm)
    body = fused(
        box((-x, x), (-y, y), (0.0, size.floor_mm)),
        box((-cheek, cheek), (size.inner_mm, y), upwards),
        box((-cheek, cheek), (-y, -size.inner_mm), upwards),
    )
    half_slot, tools = size.slot_mm / 2, []
    for low in (size.inner_mm, -y):
        tools.append(box((-half_slot, half_slot), (low, low + CHEEK_MM), (size.height_mm, size.top_mm + 1)))
        tools.append(cylinder(size.slot_mm, (0.0, low, size.height_mm), Y, CHEEK_MM))
    for side in (-1, 1):
        at = (side * size.screw_x_mm, 0.0)
        tools.append(upright(size.clearance_mm, at, (-1.0, size.seat_mm + 0.5)))
        tools.append(upright(size.counterbore_mm, at, (size.seat_mm, size.floor_mm + 1)))
        for across in (-1, 1):
            tie_x, tie_y = side * size.tie_x_mm, across * size.tie_y_mm
            along, wide = TIE_MM[0] / 2, TIE_MM[1] / 2
            tools.append(box((tie_x - along, tie_x + along), (tie_y - wide, tie_y + wide), (-1.0, size.floor_mm + 1)))
    return part_of(cut(body, *tools))


def print_pose(part: cq.Workplane) -> cq.Workplane:
    """The part as it lies on the bed: on its floor."""
    return on_bed(part)
