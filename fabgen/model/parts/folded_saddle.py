"""Saddle of a folded dipole: carries both limbs of the bent rod, its terminals and the cable.

Frame: origin on the boom's top (round: its crown) under the fed limb, local x along the boom, y along the limbs, z up.
The bent rod is pushed into both slots from +x; a screw with a large washer in front of the column holds the upper limb
in its middle, two terminal screws the fed ends, cable ties the cable. Printed lying on its −y side: slots upright,
lying screw holes as teardrops, the concave foot within 45°; the roofs of the nut traps, the tie slots and the rib's
underside are bridges no longer than a slot is wide. No support.
"""

from fabgen.design import folded_saddle_sizes as sizes
from fabgen.design.part_sizes import FoldedSaddleSize, folded_saddle_size
from fabgen.model.kernel import cq, cut, fused, on_bed, part_of
from fabgen.model.shapes import X, Y, Z, boom_round, box, cylinder, fillet_prism, hexagon, teardrop

SOURCE = "printed"


def folded_saddle(
    *,
    rod_diameter_mm: float = 4.0,
    spacing_mm: float = 30.0,
    gap_mm: float = 10.0,
    height_mm: float = 18.0,
    cable_mm: float = 5.0,
    boom_width_mm: float = 20.0,
    boom_diameter_mm: float = 0.0,
    bore_mm: float | None = None,
    screw: str = "M3",
    terminal: str | None = None,
    hole_growth_mm: float = 0.0,
) -> cq.Workplane:
    """A folded dipole's saddle.

    Args:
        rod_diameter_mm: the bent rod.
        spacing_mm: centre to centre of its limbs.
        gap_mm: between its fed ends.
        height_mm: from the boom's top to the fed limb's axis.
        cable_mm: outside diameter of the cable.
        boom_width_mm: outside of the boom along the limbs; a round boom's diameter.
        boom_diameter_mm: a round boom's outside; 0 for a flat top.
        bore_mm: width of the slots; left out: rod + 0.3.
        screw: thread of the two hold-down screws.
        terminal: thread of the terminal screws; left out: by the rod.
        hole_growth_mm: added to the drawn bores and slots.

    Returns:
        One solid.
    """
    size = folded_saddle_size(
        rod_diameter_mm=rod_diameter_mm,
        spacing_mm=spacing_mm,
        gap_mm=gap_mm,
        height_mm=height_mm,
        cable_mm=cable_mm,
        boom_width_mm=boom_width_mm,
        boom_diameter_mm=boom_diameter_mm,
        bore_mm=bore_mm,
        screw=screw,
        terminal=terminal,
        hole_growth_mm=hole_growth_mm,
    )
    low, ears = 0.0 - size.foot_drop_mm, (size.y_mm[0], size.ear_y_mm)
    column = box((size.back_mm, size.front_mm), size.y_mm, (low, size.top_mm))
    base = box(size.x_mm, ears, (low, size.ear_mm))
    fillets = [
        fillet_prism((x, size.ear_mm), (side, 1), sizes.FILLET_MM, ears)
        for x, side in ((size.back_mm, -1), (size.front_mm, 1))
    ]
    tools = [*_slots(size), *_terminals(size), *_hold_downs(size), *_ties(size)]
    tools.append(
        teardrop(size.drawn_mm(size.pilot_mm), (size.back_mm - 1, 0.0, size.retainer_z_mm), X, Y, _depth(size) + 2)
    )
    if size.boom_diameter_mm:
        tools.append(boom_round(size.boom_diameter_mm, 4 * (size.x_mm[1] - size.x_mm[0])))
    return part_of(cut(fused(column, base, *fillets), *tools))


def _depth(size: FoldedSaddleSize) -> float:
    return size.front_mm - size.back_mm


def _slots(size: FoldedSaddleSize) -> list[cq.Shape]:
    (low, high), gap = size.y_mm, size.gap_mm / 2
    spans = [
        (size.height_mm, low - 1, -gap),
        (size.height_mm, gap, high + 1),
        (size.upper_mm, low - 1, high + 1),
    ]
    half = size.drawn_bore_mm / 2
    tools: list[cq.Shape] = []
    for z, start, end in spans:
        tools.append(cylinder(2 * half, (0.0, start, z), Y, end - start))
        tools.append(box((0.0, size.front_mm + 1), (start, end), (z - half, z + half)))
    return tools


def _terminals(size: FoldedSaddleSize) -> list[cq.Shape]:
    hole, behind = size.drawn_mm(size.terminal_fastener.clearance_mm), size.back_mm - 1
    tools: list[cq.Shape] = []
    for y in (-size.terminal_y_mm, size.terminal_y_mm):
        tools.append(teardrop(hole, (behind, y, size.height_mm), X, Y, -behind))
        tools.append(hexagon(size.trap_flats_mm, (behind, y, size.height_mm), X, Z, size.trap_front_mm - behind))
    return tools


def _hold_downs(size: FoldedSaddleSize) -> list[cq.Shape]:
    shank, low = size.drawn_mm(size.fastener.clearance_mm), -1.0 - size.foot_drop_mm
    tools: list[cq.Shape] = []
    for x in size.screw_x_mm:
        tools.append(teardrop(shank, (x, 0.0, low), Z, Y, size.seat_mm - low + 0.5))
        tools.append(
            teardrop(size.drawn_mm(size.counterbore_mm), (x, 0.0, size.seat_mm), Z, Y, size.ear_mm - size.seat_mm + 1)
        )
    return tools


def _ties(size: FoldedSaddleSize) -> list[cq.Shape]:
    thick, wide = sizes.TIE_MM[0] / 2, sizes.TIE_MM[1] / 2
    through = (size.back_mm - 1, size.front_mm + 1)
    return [box(through, (y - thick, y + thick), (z - wide, z + wide)) for y in size.tie_y_mm for z in size.tie_z_mm]


def print_pose(part: cq.Workplane) -> cq.Workplane:
    """The part as it lies on the bed: on its −y side."""
    return on_bed(part.rotate((0, 0, 0), (1, 0, 0), 90))
