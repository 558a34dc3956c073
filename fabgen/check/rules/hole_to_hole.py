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
    apart_mm = _apart_mm(arranged, first, second)
    worst_mm = apart_mm - shop_tolerance_mm(arranged.design.shop, apart_mm)
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
    reach_mm = WANTED * max(hole.diameter_mm for hole in ordered) + 10.0
    for i, first in enumerate(ordered):
        for second in ordered[i + 1 :]:
            if second.station_mm - first.station_mm > reach_mm:
                break
            if first.number != second.number:
                yield first, second


def _apart_mm(arranged: Arranged, first: Hole, second: Hole) -> float:
    """Distance of two centres on the boom's surface; round the boom along the arc."""
    across_mm = second.across_mm - first.across_mm
    if first.wall == "round":
        turn_deg = (second.angle_deg - first.angle_deg + 180) % 360 - 180
        across_mm += math.radians(turn_deg) * arranged.design.boom.width_mm / 2
    return math.hypot(second.station_mm - first.station_mm, across_mm)
