"""Feed block of a split straight dipole: two half rods, a rib that sets the gap, terminals, cable grip, drain.

Frame: origin on the boom's top (round: its crown) under the rods, local x along the boom, y along the rods, z up. Half
rods enter from ±y as far as the rib. Nuts go into their traps from below before the block is screwed on the boom.
Printed standing on its foot: the lying bores are teardrops, a round boom's cradle is a teardrop too and carries the
boom between 45° and 60°, and the nut traps' roofs are stepped, so that each layer is a short bridge.
"""

from fabgen.design import feed_layout as layout
from fabgen.design.part_sizes import FeedBlockSize, feed_block_size
from fabgen.model.kernel import cq, cut, on_bed, part_of
from fabgen.model.shapes import X, Z, box, cylinder, hexagon, teardrop, upright

SOURCE = "printed"


def feed_block(
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
    """A feed block without its lid.

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
    x, y = size.half_x_mm, size.half_y_mm
    body = box((-x, x), (-y, y), (size.bottom_mm, size.top_mm))
    tools = [*_opened_above(size), *_rods(size), *_terminals(size), *_hold_downs(size), *_cable(size)]
    if size.boom_diameter_mm:
        tools.append(_cradle(size))
    return part_of(cut(body, *tools))


def _opened_above(size: FeedBlockSize) -> list[cq.Shape]:
    (cx, cy), (rx, ry), above = size.chamber_mm, size.rabbet_mm, size.top_mm + 1
    half_rib, gap = size.rib_half_mm, size.gap_mm / 2
    keep: list[cq.Shape] = [box((-half_rib, half_rib), (-gap, gap), (size.height_mm, size.rib_top_mm))]
    pilots: list[cq.Shape] = []
    (px, py), (sx, sy) = size.post_inner_mm, size.lid_screw_mm
    for x, post_x in ((-sx, (-cx, -px)), (sx, (px, cx))):
        for y, post_y in ((-sy, (-cy, -py)), (sy, (py, cy))):
            keep.append(box(post_x, post_y, (size.height_mm, size.lid_seat_mm)))
            pilots.append(
                upright(size.drawn_mm(size.pilot_mm), (x, y), (size.lid_seat_mm - layout.PILOT_DEPTH_MM, above))
            )
    chamber = cut(box((-cx, cx), (-cy, cy), (size.height_mm, size.lid_seat_mm)), *keep)
    return [chamber, box((-rx, rx), (-ry, ry), (size.lid_seat_mm, above)), *pilots]


def _rods(size: FeedBlockSize) -> list[cq.Shape]:
    inner, outer, end = size.gap_mm / 2, size.chamber_mm[1], size.half_y_mm + 1
    tools: list[cq.Shape] = []
    for side in (-1, 1):
        along = (0.0, float(side), 0.0)
        tools.append(cylinder(size.drawn_bore_mm, (0.0, side * inner, size.height_mm), along, outer - inner))
        tools.append(teardrop(size.drawn_bore_mm, (0.0, side * outer, size.height_mm), along, Z, end - outer))
    return tools


def _terminals(size: FeedBlockSize) -> list[cq.Shape]:
    hole, low, roof = size.drawn_mm(size.terminal_fastener.clearance_mm), size.bottom_mm - 1, size.trap_top_mm
    step, half = size.drawn_mm(size.step_mm) / 2, size.trap_flats_mm / 2
    tools: list[cq.Shape] = []
    for y in (-size.terminal_y_mm, size.terminal_y_mm):
        tools.append(hexagon(size.trap_flats_mm, (0.0, y, low), Z, X, roof - low))
        tools.append(box((-step, step), (y - half, y + half), (roof, roof + layout.STEP_MM)))
        tools.append(upright(hole, (0.0, y), (roof + layout.STEP_MM, size.height_mm)))
    return tools


def _hold_downs(size: FeedBlockSize) -> list[cq.Shape]:
    shank = size.drawn_mm(size.fastener.clearance_mm)
    tools: list[cq.Shape] = []
    for x in size.screw_x_mm:
        tools.append(upright(shank, (x, 0.0), (size.bottom_mm - 1, size.seat_mm + 0.5)))
        tools.append(upright(size.drawn_mm(size.counterbore_mm), (x, 0.0), (size.seat_mm, size.height_mm)))
    return tools


def _cable(size: FeedBlockSize) -> list[cq.Shape]:
    through = (size.bottom_mm - 1, size.height_mm)
    return [
        box(size.slot_x_mm, size.slot_y_mm, through),
        upright(size.drawn_mm(layout.DRAIN_MM), size.drain_at_mm, through),
    ]


def _cradle(size: FeedBlockSize) -> cq.Shape:
    start = (-size.half_x_mm - 1, 0.0, -size.boom_diameter_mm / 2)
    length = 2 * size.half_x_mm + 2
    groove = teardrop(size.boom_diameter_mm, start, X, Z, length)
    wide = size.boom_diameter_mm
    flat_roof = box((start[0], start[0] + length), (-wide, wide), (size.roof_mm, size.roof_mm + wide))
    return cut(groove, flat_roof)


def print_pose(part: cq.Workplane) -> cq.Workplane:
    """The part as it stands on the bed: on its foot."""
    return on_bed(part)
