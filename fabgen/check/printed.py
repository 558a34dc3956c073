"""What the rules need to know about printed parts: thinnest walls, bores, overhangs, how they lie on the bed."""

import functools
import math
from collections.abc import Callable, Iterator
from typing import Any

from fabgen.design.arranged import Arranged, Parameters, Placed
from fabgen.design.bush_sizes import BushSize, bush_size, sleeve_size
from fabgen.design.feed_sizes import FeedBlockSize, feed_block_size
from fabgen.design.folded_saddle_sizes import FoldedSaddleSize, folded_saddle_size
from fabgen.design.keeper_sizes import PushRingSize, SnapKeeperSize, push_ring_size, snap_keeper_size
from fabgen.design.saddle_sizes import SaddleSize, saddle_size
from fabgen.frozen import frozen

Size = BushSize | FeedBlockSize | FoldedSaddleSize | PushRingSize | SaddleSize | SnapKeeperSize

_SIZES: dict[str, Callable[..., Size]] = {
    "bush": bush_size,
    "feed_block": feed_block_size,
    "folded_saddle": folded_saddle_size,
    "push_ring": push_ring_size,
    "saddle": saddle_size,
    "sleeve": sleeve_size,
    "snap_keeper": snap_keeper_size,
}
LYING_ON_SIDE = ("saddle", "folded_saddle")
"""Printed on their −y side; all others stand with their local z axis upright."""


@frozen
class Overhang:
    """One surface that nothing supports while it is printed.

    Attributes:
        what: its name.
        slope_deg: from the vertical; 90 is flat.
        bridge_mm: span that is printed in the air; 0 where there is none.
    """

    what: str
    slope_deg: float
    bridge_mm: float = 0.0


def distinct_prints(arranged: Arranged) -> Iterator[tuple[Placed, Size]]:
    """One placed part of each kind that is printed, with its sizes; a lid goes with its block."""
    seen = set()
    for part in arranged.placed:
        if part.source == "printed" and part.part != "feed_lid" and part.key not in seen:
            seen.add(part.key)
            yield part, _size(part.part, part.parameters)


def owners(arranged: Arranged, part: Placed) -> list[str]:
    """Every element that carries this distinct part."""
    return list(dict.fromkeys(other.owner for other in arranged.placed if other.key == part.key))


@functools.cache
def _size(part: str, parameters: Parameters) -> Size:
    numbers: dict[str, Any] = dict(parameters)
    return _SIZES[part](**numbers)


def thinnest_wall_mm(size: Size) -> tuple[str, float]:
    """The thinnest wall of a part as drawn, bores widened by the printer's growth, with its name."""
    match size:
        case BushSize():
            rim_mm = (size.flange_mm - size.spigot_mm) / 2
            walls = [("spigot wall", (size.spigot_mm - size.drawn_bore_mm) / 2), ("flange rim", rim_mm)]
        case PushRingSize():
            walls = [("ring wall", (size.outside_mm - size.drawn_bore_mm) / 2)]
        case SnapKeeperSize():
            walls = [("clip wall", (size.outside_mm - size.drawn_bore_mm) / 2)]
        case SaddleSize() | FeedBlockSize() | FoldedSaddleSize():
            walls = list(size.walls_mm.items())
    return min(walls, key=lambda wall: wall[1])


def rod_bore_mm(size: Size) -> float | None:
    """The closed bore that a rod slides through, as it shall come out; None where there is none."""
    return size.bore_mm if isinstance(size, BushSize | SaddleSize) else None


def overhangs(size: Size) -> Iterator[Overhang]:
    """Surfaces over air in print orientation; chamfers and teardrops are at 45° by their construction."""
    if isinstance(size, SaddleSize) and size.boom_diameter_mm:
        slope_deg = math.degrees(math.asin(min(1.0, size.foot_width_mm / size.boom_diameter_mm)))
        yield Overhang("concave foot", slope_deg)
    if isinstance(size, FeedBlockSize) and size.boom_diameter_mm:
        apex_mm = (math.sqrt(2) - 1) * size.boom_diameter_mm / 2
        flat_mm = 2 * (apex_mm - size.roof_mm)
        yield Overhang("roof of the cradle", 90.0 if flat_mm > 0 else 45.0, flat_mm)
