"""Does enough metal stand between two holes of one wall?"""

import math
from collections import defaultdict
from collections.abc import Iterator

from fabgen.check.finding import finding, too_small
from fabgen.check.holes import place
from fabgen.design.arranged import Arranged, Hole
from fabgen.design.findings import Finding
from fabgen.design.shop_tolerance import shop_tolerance_mm
from fabgen.stock import tables

SOURCE = "EN 1993-1-8 Table 3.3, a steel code borrowed as common practice"

WANTED = 3.0
"""Centre to centre in diameters: two diameters of metal between the holes. Source: shop rule, common practice."""


def findings(arranged: Arranged) -> Iterator[Finding]:
    """H02: centre to centre below 2.2 d fails and below 3 d warns; d is the mean of two unequal holes."""
    walls: dict[str, list[Hole]] = defaultdict(list)
    for hole in arranged.holes:
        walls[hole.wall].append(hole)
    for wall in walls.values():
        for first, second in _near_pairs(wall):
            yield from _pair(arranged, first, second)


def _pair(arranged: Arranged, first: Hole, second: Hole) -> Iterator[Finding]:
    apart_mm, worst_mm = _apart_mm(arranged, first, second)
    d_mm = (first.diameter_mm + second.diameter_mm) / 2
    least = tables.edge_distance_factor("pitch along")
    if missed := too_small(worst_mm, fail_mm=least * d_mm, warn_mm=WANTED * d_mm):
        severity, limit_mm = missed
        source = SOURCE if severity == "fail" else "two diameters of metal between, a shop rule"
        advice = (
            f"centre to centre: {apart_mm:.3f} mm on the drawing, the figure is the worst case; "
            f"{limit_mm / d_mm:g} d is {source}; move one of them along the boom"
        )
        where = f"{place(first)} to {place(second)}"
        yield finding("H02", severity, where, advice, measured=worst_mm, required=limit_mm, unit="mm")


def _near_pairs(wall: list[Hole]) -> Iterator[tuple[Hole, Hole]]:
    """Pairs of different holes of one wall whose stations could bring them too near."""
    ordered = sorted(wall, key=lambda hole: (hole.station_mm, hole.number))
    reach_mm = WANTED * max(hole.diameter_mm for hole in ordered) + 2 * max(hole.tolerance_mm for hole in ordered)
    for i, first in enumerate(ordered):
        for second in ordered[i + 1 :]:
            if second.station_mm - first.station_mm > reach_mm:
                break
            if first.number != second.number:
                yield first, second


def _apart_mm(arranged: Arranged, first: Hole, second: Hole) -> tuple[float, float]:
    """Distance of two centres on the boom's surface, round the boom along the arc: on the drawing, and at the worst.

    Stations are marked one by one from the datum face; the holes of one block are marked from each other.
    """
    shop = arranged.design.shop
    along_mm, across_mm = abs(second.station_mm - first.station_mm), second.across_mm - first.across_mm
    if first.wall == "round":
        turn_deg = (second.angle_deg - first.angle_deg + 180) % 360 - 180
        across_mm += math.radians(turn_deg) * arranged.design.boom.width_mm / 2
    across_mm = abs(across_mm)
    one_block = first.element == second.element
    along_off_mm = shop_tolerance_mm(shop, along_mm) if one_block else first.tolerance_mm + second.tolerance_mm
    least_along_mm = max(0.0, along_mm - along_off_mm)
    least_across_mm = max(0.0, across_mm - shop_tolerance_mm(shop, across_mm))
    return math.hypot(along_mm, across_mm), math.hypot(least_along_mm, least_across_mm)
