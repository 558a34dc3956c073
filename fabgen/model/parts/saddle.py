"""On-top saddle: carries a rod above the boom, insulated, held by two screws into the boom's top.

Frame: origin on the boom's top (round: its crown) under the rod, local x along the boom, y along the rod, z up. Printed
lying on its −y side, the rod's bore upright; the screw holes, which then lie, are teardrops, and the concave foot stays
within 45°: no support.
"""

from fabgen.design.part_sizes import SaddleSize, saddle_size
from fabgen.model.kernel import cq, cut, fused, on_bed, part_of
from fabgen.model.shapes import Y, Z, boom_round, box, cylinder, fillet_prism, teardrop

SOURCE = "printed"


def saddle(
    *,
    rod_diameter_mm: float = 4.0,
    height_mm: float = 12.0,
    boom_width_mm: float = 20.0,
    boom_diameter_mm: float = 0.0,
    screw: str = "M3",
    bore_mm: float | None = None,
    width_mm: float | None = None,
    wall_mm: float = 3.0,
    hole_growth_mm: float = 0.0,
) -> cq.Workplane:
    """A saddle.

    Args:
        rod_diameter_mm: the rod.
        height_mm: from the boom's top to the rod's axis.
        boom_width_mm: outside of the boom along the rod.
        boom_diameter_mm: a round boom's outside; 0 for a flat top.
        screw: thread of the two hold-down screws.
        bore_mm: left out: rod + 0.3.
        width_mm: along the rod; left out: the boom's width, on a round boom 0.7 of its diameter.
        wall_mm: plastic round the bore.
        hole_growth_mm: added to the drawn bores.

    Returns:
        One solid.
    """
    size = saddle_size(
        rod_diameter_mm=rod_diameter_mm,
        height_mm=height_mm,
        boom_width_mm=boom_width_mm,
        boom_diameter_mm=boom_diameter_mm,
        screw=screw,
        bore_mm=bore_mm,
        width_mm=width_mm,
        wall_mm=wall_mm,
        hole_growth_mm=hole_growth_mm,
    )
    x, y = size.length_mm / 2, size.width_mm / 2
    across, low, column = (-y, y), 0.0 - size.foot_drop_mm, size.column_half_mm
    arch = cylinder(2 * column, (0.0, -y, size.height_mm), Y, 2 * y)
    blocks: list[cq.Shape] = [
        box((-column, column), across, (low, max(size.height_mm, size.ear_mm))),
        cut(arch, box((-2 * column, 2 * column), (-y - 1, y + 1), (size.height_mm - 2 * column, size.height_mm))),
    ]
    if size.fillet_mm:
        blocks += [fillet_prism((side * column, size.ear_mm), (side, 1), size.fillet_mm, across) for side in (-1, 1)]
    body = fused(box((-x, x), across, (low, size.ear_mm)), *blocks)
    tools: list[cq.Shape] = [cylinder(size.drawn_bore_mm, (0.0, -y - 1, size.height_mm), Y, 2 * y + 2)]
    for screw_x in size.screw_x_mm:
        tools += screw_hole(size, screw_x)
    if size.boom_diameter_mm:
        tools.append(boom_round(size.boom_diameter_mm, 2 * size.length_mm))
    return part_of(cut(body, *tools))


def screw_hole(size: SaddleSize, x_mm: float) -> list[cq.Shape]:
    """Tools for one hold-down screw: shank and counterbore, apex towards +y."""
    low = -size.foot_drop_mm - 1
    return [
        teardrop(size.drawn_mm(size.clearance_mm), (x_mm, 0.0, low), Z, Y, size.seat_mm - low + 0.5),
        teardrop(size.drawn_mm(size.counterbore_mm), (x_mm, 0.0, size.seat_mm), Z, Y, size.ear_mm - size.seat_mm + 1),
    ]


def print_pose(part: cq.Workplane) -> cq.Workplane:
    """The part as it lies on the bed: on its −y side."""
    return on_bed(part.rotate((0, 0, 0), (1, 0, 0), 90))
