"""Does a hole lie under the clamp, or under a block that it does not belong to?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.check.holes import drillings, place
from fabgen.design.arranged import Arranged, Hole, Placed
from fabgen.design.findings import Finding
from fabgen.design.spans import part_span_mm

BLOCKS = ("feed_block", "folded_saddle", "saddle")


def findings(arranged: Arranged) -> Iterator[Finding]:
    """H06 under the clamp's plate, or between its walls (warns); H07 under a feed block or saddle."""
    blocks = [part for part in arranged.placed if part.part in BLOCKS]
    plates = [part for part in arranged.placed if part.part == "clamp_plate"]
    for rows in drillings(arranged):
        for plate in plates:
            if rows[0].element != plate.owner and (over_mm := _over_mm(plate, rows[0])) > 0:
                yield _under_clamp(plate, rows, over_mm)
        for block in blocks:
            top = [hole for hole in rows if _on_top(hole)]
            if top and top[0].element != block.owner and (over_mm := _over_mm(block, top[0])) > 0:
                advice = f"it lies under {block.name}, which would cover or cut it; move one of them along the boom"
                yield finding("H07", "fail", place(top[0]), advice, measured=over_mm, required=0.0, unit="mm")


def _under_clamp(plate: Placed, rows: tuple[Hole, ...], over_mm: float) -> Finding:
    upright = abs(plate.frame.z[2]) > 0.5
    covered = [hole for hole in rows if hole.wall == "round" or (hole.wall in ("+z", "-z")) == upright]
    hole = (covered or rows)[0]
    if covered:
        advice = "the plate or a bolt's washer covers it; move the clamp, or write clamp: {at: balance}"
    else:
        advice = "it weakens the boom where the clamp grips; move the clamp, or write clamp: {at: balance}"
    return finding("H06", "fail" if covered else "warn", place(hole), advice, measured=over_mm, required=0.0, unit="mm")


def _on_top(hole: Hole) -> bool:
    return hole.wall == "+z" or (hole.wall == "round" and hole.angle_deg == 0.0)


def _over_mm(part: Placed, hole: Hole) -> float:
    """How far a hole reaches into a part's length along the boom."""
    (low, high), radius_mm = part_span_mm(part, 0), hole.diameter_mm / 2
    return min(hole.station_mm + radius_mm, high) - max(hole.station_mm - radius_mm, low)
