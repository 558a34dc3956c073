"""Does anything collide, or stand too near to something it must not touch?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.check.pairs import too_near
from fabgen.design.arranged import Arranged, Box, Placed, Vector
from fabgen.design.distances import bounding_box, parts_distance_mm, point_distance_mm
from fabgen.design.findings import Finding

MAST_MM = 5.0
"""Mast to everything but clamp and boom: both sway, and the clamp is set by eye. Source: common practice."""

RODS = ("rod", "folded_rod")
MODELLED = (*RODS, "boom")
_ADVICE = "move one of them along the boom, or choose a smaller part"


def findings(arranged: Arranged) -> Iterator[Finding]:
    """C10 too near, C11 mast too near, C12 metal near a rod's tip."""
    for pair in too_near(arranged):
        where = f"{pair.first.name} / {pair.second.name}"
        yield finding("C10", "fail", where, _ADVICE, measured=pair.distance_mm, required=pair.limit_mm, unit="mm")
    yield from _mast(arranged)
    yield from _tips(arranged)


def _mast(arranged: Arranged) -> Iterator[Finding]:
    """The mast against everything that is not the clamp or the boom."""
    if arranged.mast is None:
        return
    for part in arranged.placed:
        if part.owner in ("clamp", "boom"):
            continue
        distance_mm = parts_distance_mm((arranged.mast,), part.shapes)
        if distance_mm < MAST_MM - 1e-9:
            advice = "move the clamp along the boom"
            yield finding("C11", "fail", part.name, advice, measured=distance_mm, required=MAST_MM, unit="mm")


def _tips(arranged: Arranged) -> Iterator[Finding]:
    """Metal that the model does not know near the tip of another element's rod: clamp, mast and every screw."""
    limit_mm = arranged.design.tip_clearance_mm
    metals = [(p.name, p.owner, p.shapes) for p in arranged.placed if p.metal and p.part not in MODELLED]
    if arranged.mast is not None:
        metals.append(("mast", "clamp", (arranged.mast,)))
    bodies = [(name, owner, shapes, bounding_box(shapes)) for name, owner, shapes in metals]
    for rod in arranged.placed:
        if rod.part not in RODS:
            continue
        x_mm = rod.frame.origin[0]
        beside = [body for body in bodies if body[3].low[0] - limit_mm < x_mm < body[3].high[0] + limit_mm]
        for tip in _outer_tips(rod) if beside else ():
            for name, owner, shapes, box in beside:
                if owner == rod.owner or not _near(tip, box, limit_mm):
                    continue
                distance_mm = min(point_distance_mm(tip, shape) for shape in shapes)
                if distance_mm < limit_mm - 1e-9:
                    where, advice = (
                        f"{rod.name} tip / {name}",
                        "keep metal away from rod tips: the voltage is highest there",
                    )
                    yield finding("C12", "fail", where, advice, measured=distance_mm, required=limit_mm, unit="mm")


def _near(point: Vector, box: Box, reach_mm: float) -> bool:
    return all(box.low[i] - reach_mm < point[i] < box.high[i] + reach_mm for i in range(3))


def _outer_tips(rod: Placed) -> list[tuple[float, float, float]]:
    """Both ends of a whole rod, the outer end of a half rod."""
    box = bounding_box(rod.shapes)
    x, z = (box.low[0] + box.high[0]) / 2, (box.low[2] + box.high[2]) / 2
    ends = [box.low[1], box.high[1]]
    if box.low[1] * box.high[1] > 0:
        ends = [max(ends, key=abs)]
    return [(x, y, z) for y in ends]
