"""Is enough of the wall left beside a hole?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.check.holes import drillings, place, wall_width_mm
from fabgen.design.arranged import Arranged, Hole
from fabgen.design.design import Boom
from fabgen.design.findings import Finding
from fabgen.design.shop_tolerance import shop_tolerance_mm
from fabgen.physics.sections import SectionProperties, boom_section, drilled_rectangular_section, drilled_round_section
from fabgen.stock import tables


def findings(arranged: Arranged) -> Iterator[Finding]:
    """H04 a hole in the corner fails; H03 less flat beside it than the wall is thick fails, below 1.2 d it warns."""
    design, boom = arranged.design, arranged.design.boom
    factor = tables.edge_distance_factor("edge")
    for rows in drillings(arranged):
        hole = rows[0]
        half_mm = wall_width_mm(arranged, hole) / 2
        slack_mm = shop_tolerance_mm(design.shop, half_mm)
        flat_mm = flat_beside_mm(boom, half_mm, hole)
        left_mm = flat_mm - slack_mm - tables.drilled_over_mm(hole.diameter_mm) / 2
        edge_mm = half_mm - abs(hole.across_mm)
        if flat_mm < 0:
            advice = "make the hole smaller or the boom larger: the drill wanders off a corner and cuts the next wall"
            yield finding("H04", "fail", place(hole), advice, measured=flat_mm, required=0.0, unit="mm")
        elif left_mm < boom.wall_mm:
            advice = (
                f"flat beside the hole: {flat_mm:.3f} mm on the drawing, the figure is the worst case; leave at least "
                "one wall thickness: a smaller hole, a thinner bush or a larger boom"
            )
            yield finding("H03", "fail", place(hole), advice, measured=left_mm, required=boom.wall_mm, unit="mm")
        elif edge_mm - slack_mm < factor * hole.diameter_mm:
            advice = (
                f"centre to the wall's edge: {edge_mm:.3f} mm on the drawing, the figure is the worst case; "
                f"{factor:g} d is EN 1993-1-8 Table 3.3, a steel code borrowed as common practice{_net(boom, rows)}"
            )
            yield finding(
                "H03", "warn", place(hole), advice,
                measured=edge_mm - slack_mm, required=factor * hole.diameter_mm, unit="mm",
            )  # fmt: skip


def flat_beside_mm(boom: Boom, half_mm: float, hole: Hole) -> float:
    """Flat wall beside a hole: to the corner's radius or the neighbouring wall's inside, whichever is nearer.

    Args:
        boom: for wall and corner radius.
        half_mm: half the wall's outside width; of a round boom the radius.
        hole: in that wall.
    """
    corner_mm = max(boom.corner_radius_mm, boom.wall_mm)
    return half_mm - corner_mm - abs(hole.across_mm) - hole.diameter_mm / 2


def _net(boom: Boom, rows: tuple[Hole, ...]) -> str:
    """What the section keeps at a through hole on the centre line, in words; empty for other holes."""
    hole = rows[0]
    if len(rows) < 2 or hole.across_mm:
        return ""
    full = boom_section(
        boom.section,
        width_mm=boom.width_mm,
        height_mm=boom.height_mm,
        wall_mm=boom.wall_mm,
        corner_radius_mm=boom.corner_radius_mm,
    )
    left = _drilled(boom, hole)
    area = left.area_mm2 / full.area_mm2
    bending = min(left.w_about_y_mm3 / full.w_about_y_mm3, left.w_about_z_mm3 / full.w_about_z_mm3)
    return f"; the net section keeps {area:.0%} of the metal and at least {bending:.0%} of the bending strength"


def _drilled(boom: Boom, hole: Hole) -> SectionProperties:
    if boom.section == "round":
        return drilled_round_section(diameter_mm=boom.width_mm, wall_mm=boom.wall_mm, hole_mm=hole.diameter_mm)
    return drilled_rectangular_section(
        width_mm=boom.width_mm,
        height_mm=boom.height_mm,
        wall_mm=boom.wall_mm,
        corner_radius_mm=boom.corner_radius_mm,
        hole_mm=hole.diameter_mm,
        along="y" if hole.wall in ("+y", "-y") else "z",
    )
