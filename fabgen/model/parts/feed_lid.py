"""Lid of the feed block: seats in the rabbet, and its wedge grips the cable.

Frame: the feed block's. Drawing the four screws pushes the wedge down beside the cable and squeezes it to 0.85 of its
diameter against the block; two ridges bite into its jacket. Printed upside down: no support.
"""

from fabgen.design import feed_layout as layout
from fabgen.design.part_fasteners import fastener
from fabgen.design.part_sizes import FeedBlockSize, feed_block_size
from fabgen.model.kernel import cq, cut, fused, on_bed, part_of
from fabgen.model.shapes import X, Z, box, prism, upright

SOURCE = "printed"


def feed_lid(
    *,
    rod_diameter_mm: float = 4.0,
    gap_mm: float = 10.0,
    height_mm: float = 18.0,
    cable_mm: float = 5.0,
    boom_width_mm: float = 20.0,
    boom_diameter_mm: float = 0.0,
    bore_mm: float | None = None,
    screw: str = "M3",
    terminal: str | None = None,
    lid_screw: str = "M3",
    hole_growth_mm: float = 0.0,
) -> cq.Workplane:
    """The lid of the feed block of the same arguments.

    Args:
        rod_diameter_mm: the half rods.
        gap_mm: between their ends.
        height_mm: from the boom's top to the rods' axis.
        cable_mm: outside diameter of the cable.
        boom_width_mm: outside of the boom along the rods; a round boom's diameter.
        boom_diameter_mm: a round boom's outside; 0 for a flat top.
        bore_mm: left out: rod + 0.3.
        screw: thread of the two hold-down screws.
        terminal: thread of the terminal screws; left out: by the rod.
        lid_screw: thread of the four lid screws.
        hole_growth_mm: added to the drawn bores.

    Returns:
        One solid.
    """
    size = feed_block_size(
        rod_diameter_mm=rod_diameter_mm,
        gap_mm=gap_mm,
        height_mm=height_mm,
        cable_mm=cable_mm,
        boom_width_mm=boom_width_mm,
        boom_diameter_mm=boom_diameter_mm,
        bore_mm=bore_mm,
        screw=screw,
        terminal=terminal,
        lid_screw=lid_screw,
        hole_growth_mm=hole_growth_mm,
    )
    (x, y), (px, py) = size.lid_mm, size.lid_screw_mm
    plate = box((-x, x), (-y, y), (size.lid_seat_mm, size.top_mm))
    hole = size.drawn_mm(fastener(size.lid_screw).clearance_mm)
    holes = [
        upright(hole, (side_x * px, side_y * py), (size.lid_seat_mm - 1, size.top_mm + 1))
        for side_x in (-1, 1)
        for side_y in (-1, 1)
    ]
    return part_of(cut(fused(plate, _wedge(size)), *holes))


def _wedge(size: FeedBlockSize) -> cq.Shape:
    """Side view of the wedge, pushed along x: inner face towards the cable with its ridges, tapered tip."""
    (inner, outer), low, high = size.tongue_y_mm, size.tongue_low_mm, size.lid_seat_mm + layout.LID_MM / 2
    across, along = layout.TIP_MM
    side = [(outer, high), (outer, low), (inner + across, low), (inner, low + along)]
    for z in sorted(size.tooth_z_mm):
        tooth = layout.TOOTH_MM
        side += [(inner, z - tooth), (inner - tooth, z), (inner, z + tooth)]
    side.append((inner, high))
    start = (size.cable_at_mm[0] - size.cable_mm / 2, 0.0, 0.0)
    # up × along = z × x = y: the outline's u is y and its v is z.
    return prism(side, start, X, Z, size.cable_mm)


def print_pose(part: cq.Workplane) -> cq.Workplane:
    """The part as it lies on the bed: upside down."""
    return on_bed(part.rotate((0, 0, 0), (1, 0, 0), 180))
