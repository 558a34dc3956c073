"""Shoulder bush: insulates a rod in one boom wall, flange outside, spigot in the hole.

Frame: axis = local z outward, origin on the boom wall's outer surface at the hole's axis; flange z ≥ 0, spigot below.
On a round boom, whose axis is local x, the flange's foot is concave. Printed flange down, the bore upright: no support.
"""

from fabgen.design.part_sizes import BushSize, bush_size
from fabgen.model.kernel import cq, cut, fused, on_bed, part_of
from fabgen.model.shapes import boom_round, revolved

SOURCE = "printed"


def bush(
    *,
    rod_diameter_mm: float = 4.0,
    hole_diameter_mm: float = 8.0,
    wall_mm: float = 1.5,
    bore_mm: float | None = None,
    spigot_diameter_mm: float | None = None,
    spigot_length_mm: float | None = None,
    flange_diameter_mm: float | None = None,
    flange_height_mm: float = 3.0,
    boom_diameter_mm: float = 0.0,
    hole_growth_mm: float = 0.0,
) -> cq.Workplane:
    """A shoulder bush.

    Args:
        rod_diameter_mm: the rod.
        hole_diameter_mm: the hole in the boom's wall.
        wall_mm: thickness of that wall.
        bore_mm: left out: rod + 0.2.
        spigot_diameter_mm: left out: hole − 0.2.
        spigot_length_mm: left out: wall + 1.
        flange_diameter_mm: left out: hole + 4.
        flange_height_mm: above the wall's surface.
        boom_diameter_mm: a round boom's outside; 0 for a flat wall.
        hole_growth_mm: added to the drawn bore.

    Returns:
        One solid.
    """
    return turned(
        bush_size(
            rod_diameter_mm=rod_diameter_mm,
            hole_diameter_mm=hole_diameter_mm,
            wall_mm=wall_mm,
            bore_mm=bore_mm,
            spigot_diameter_mm=spigot_diameter_mm,
            spigot_length_mm=spigot_length_mm,
            flange_diameter_mm=flange_diameter_mm,
            flange_height_mm=flange_height_mm,
            boom_diameter_mm=boom_diameter_mm,
            hole_growth_mm=hole_growth_mm,
        )
    )


def turned(size: BushSize) -> cq.Workplane:
    """The solid of a bush or sleeve."""
    flange, spigot, bore = size.flange_mm / 2, size.spigot_mm / 2, size.drawn_bore_mm / 2
    high, low = size.flange_height_mm, -size.spigot_length_mm
    rim, lead, edge = size.flange_edge_mm, size.lead_in_mm, size.bore_edge_mm
    foot = -1.0 - size.foot_drop_mm if size.boom_diameter_mm else 0.0
    shoulder: cq.Shape = revolved([(0, foot), (flange, foot), (flange, high - rim), (flange - rim, high), (0, high)])
    if size.boom_diameter_mm:
        shoulder = cut(shoulder, boom_round(size.boom_diameter_mm, 2 * size.flange_mm))
    body = revolved([(0, low), (spigot - lead, low), (spigot, low + lead), (spigot, high / 2), (0, high / 2)])
    hole = revolved(
        [
            (0, low - edge),
            (bore + 2 * edge, low - edge),
            (bore, low + edge),
            (bore, high - edge),
            (bore + 2 * edge, high + edge),
            (0, high + edge),
        ]
    )
    return part_of(cut(fused(shoulder, body), hole))


def print_pose(part: cq.Workplane) -> cq.Workplane:
    """The part as it lies on the bed: flange down."""
    return on_bed(part.rotate((0, 0, 0), (1, 0, 0), 180))
