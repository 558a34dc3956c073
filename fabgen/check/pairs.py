"""Every near pair of parts is a declared interface or has a clearance with a limit; there is no third kind.

Parts fall into groups; a pair of groups has one limit within a mount (one owner) and one between mounts. A pair of
groups that is not in the table is an error of the program: somebody added a part and did not say what may stand
beside it.
"""

from collections.abc import Iterator

from fabgen.design.arranged import Arranged, Box, Interface, Placed
from fabgen.design.distances import bounding_box, parts_distance_mm
from fabgen.errors import ProgramError
from fabgen.frozen import frozen

REACH_MM = 12.0
"""Pairs farther apart than this are not near; no limit is larger."""

GROUPS = {
    "boom": "boom",
    "bush": "insulator",
    "clamp_plate": "clamp",
    "crush_sleeve": "inside boom",
    "feed_block": "feed",
    "feed_lid": "feed",
    "folded_rod": "rod",
    "folded_saddle": "feed",
    "nut": "fastener",
    "push_ring": "keeper",
    "rod": "rod",
    "saddle": "insulator",
    "screw": "fastener",
    "sleeve": "insulator",
    "snap_keeper": "keeper",
    "u_bolt": "clamp",
    "washer": "fastener",
}

_TOOL_MM, _FREE_MM, _METAL_MM, _CLAMP_MM = 1.0, 0.2, 3.0, 5.0
LIMITS_MM: dict[frozenset[str], tuple[float | None, float | None]] = {
    frozenset({"boom"}): (None, None),
    frozenset({"boom", "rod"}): (1.0, None),
    frozenset({"boom", "insulator"}): (0.0, None),
    frozenset({"boom", "keeper"}): (0.1, None),
    frozenset({"boom", "feed"}): (0.0, None),
    frozenset({"boom", "fastener"}): (0.2, None),
    frozenset({"boom", "clamp"}): (0.2, None),
    frozenset({"boom", "inside boom"}): (0.0, None),
    frozenset({"rod"}): (1.0, _METAL_MM),
    frozenset({"rod", "insulator"}): (_FREE_MM, _TOOL_MM),
    frozenset({"rod", "keeper"}): (_FREE_MM, _TOOL_MM),
    frozenset({"rod", "feed"}): (_FREE_MM, _METAL_MM),
    frozenset({"rod", "fastener"}): (_FREE_MM, _METAL_MM),
    frozenset({"rod", "clamp"}): (None, _CLAMP_MM),
    frozenset({"rod", "inside boom"}): (None, _METAL_MM),
    frozenset({"insulator"}): (_FREE_MM, _TOOL_MM),
    frozenset({"insulator", "keeper"}): (0.1, _TOOL_MM),
    frozenset({"insulator", "feed"}): (None, _TOOL_MM),
    frozenset({"insulator", "fastener"}): (_FREE_MM, _TOOL_MM),
    frozenset({"insulator", "clamp"}): (None, _TOOL_MM),
    frozenset({"insulator", "inside boom"}): (None, _TOOL_MM),
    frozenset({"keeper"}): (_FREE_MM, _TOOL_MM),
    frozenset({"keeper", "feed"}): (None, _TOOL_MM),
    frozenset({"keeper", "fastener"}): (_FREE_MM, _TOOL_MM),
    frozenset({"keeper", "clamp"}): (None, _TOOL_MM),
    frozenset({"keeper", "inside boom"}): (None, _FREE_MM),
    frozenset({"feed"}): (0.0, _TOOL_MM),
    frozenset({"feed", "fastener"}): (0.0, _TOOL_MM),
    frozenset({"feed", "clamp"}): (None, _TOOL_MM),
    frozenset({"feed", "inside boom"}): (None, _FREE_MM),
    frozenset({"fastener"}): (_FREE_MM, _TOOL_MM),
    frozenset({"fastener", "clamp"}): (0.0, _TOOL_MM),
    frozenset({"fastener", "inside boom"}): (0.0, _TOOL_MM),
    frozenset({"clamp"}): (0.0, None),
    frozenset({"clamp", "inside boom"}): (0.0, None),
    frozenset({"inside boom"}): (_FREE_MM, None),
}
"""Group or pair of groups → limit in mm within one mount, and between mounts; None where no such pair can be.

0 asks only that nothing overlaps; 0.2 mm keeps printed and bought parts from binding; 1 mm is room for a tool and for
what a printer is off; 3 and 5 mm keep metal from touching a rod that sways. The boom belongs to every mount. Source:
common practice, our own choice.
"""


@frozen
class NearPair:
    """Two parts that stand near each other.

    Attributes:
        interface: how they are meant to meet; None where they are meant to stay apart.
        limit_mm: least distance of parts meant to stay apart; 0 for an interface.
        distance_mm: by formula; never more than the true distance.
    """

    first: Placed
    second: Placed
    interface: Interface | None
    limit_mm: float
    distance_mm: float


def near_pairs(arranged: Arranged) -> Iterator[NearPair]:
    """Every pair nearer than `REACH_MM` and every declared one, with its class.

    Left out: the boom with a part whose middle lies beyond its end and which so cannot meet it. That is the design's
    mistake, judged by the rules of the boom's ends and holes.

    Raises:
        ProgramError: a pair that nobody declared, or a declared one that does not stand near.
    """
    seen: set[Interface] = set()
    for first, second, interface in _classed(arranged):
        distance_mm = parts_distance_mm(first.shapes, second.shapes)
        if interface:
            seen.add(interface)
            if not _parted_by_the_end(arranged, first, second):
                yield NearPair(first, second, interface, 0.0, distance_mm)
        elif distance_mm <= REACH_MM:
            yield NearPair(first, second, None, _limit_mm(first, second), distance_mm)
    for interface in arranged.interfaces:
        if interface not in seen:
            first, second = arranged.part(interface.first), arranged.part(interface.second)
            if not _parted_by_the_end(arranged, first, second):
                raise ProgramError(
                    f"{first.name} and {second.name} are to meet by '{interface.kind}', and are far apart"
                )


def too_near(arranged: Arranged) -> Iterator[NearPair]:
    """The pairs meant to stay apart that do not, worked out without measuring the others.

    Raises:
        ProgramError: a pair that nobody declared.
    """
    for first, second, interface in _classed(arranged):
        if interface is None:
            limit_mm = _limit_mm(first, second)
            distance_mm = parts_distance_mm(first.shapes, second.shapes) if limit_mm > 0 else 0.0
            if distance_mm < limit_mm - 1e-9:
                yield NearPair(first, second, None, limit_mm, distance_mm)


def _classed(arranged: Arranged) -> Iterator[tuple[Placed, Placed, Interface | None]]:
    """Pairs whose boxes are near, each with the interface that was declared for it."""
    declared = {(i.first, i.second): i for i in arranged.interfaces}
    for first, second in _sweep(arranged):
        yield first, second, declared.get((first.name, second.name)) or declared.get((second.name, first.name))


def _parted_by_the_end(arranged: Arranged, first: Placed, second: Placed) -> bool:
    """Whether one of the two is the boom and the other's middle lies beyond its end."""
    if "boom" not in (first.part, second.part):
        return False
    box = bounding_box((second if first.part == "boom" else first).shapes)
    return not 0 <= (box.low[0] + box.high[0]) / 2 <= arranged.design.boom.length_mm


def _limit_mm(first: Placed, second: Placed) -> float:
    try:
        groups = frozenset({GROUPS[first.part], GROUPS[second.part]})
    except KeyError as error:
        raise ProgramError(f"part {error} belongs to no group of check/pairs.py") from error
    together = first.owner == second.owner or "boom" in (first.owner, second.owner)
    limit_mm = LIMITS_MM.get(groups, (None, None))[0 if together else 1]
    if limit_mm is None:
        raise ProgramError(f"{first.name} and {second.name} stand near each other and nobody declared that pair")
    return limit_mm


def _sweep(arranged: Arranged) -> Iterator[tuple[Placed, Placed]]:
    """Pairs whose boxes are near, by sweeping along the boom; each pair once, in order of its first part's start."""
    boxes = sorted(((bounding_box(part.shapes), part) for part in arranged.placed), key=_start)
    active: list[tuple[Box, Placed]] = []
    for box, part in boxes:
        active = [(other, placed) for other, placed in active if other.high[0] + REACH_MM >= box.low[0]]
        for other, placed in active:
            if all(other.low[i] - REACH_MM <= box.high[i] and box.low[i] - REACH_MM <= other.high[i] for i in (1, 2)):
                yield placed, part
        active.append((box, part))


def _start(entry: tuple[Box, Placed]) -> tuple[float, str]:
    return entry[0].low[0], entry[1].name
