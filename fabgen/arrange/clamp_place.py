"""Where the clamp goes: as stated, or the free place nearest to the balance point."""

import math
from collections.abc import Sequence

from fabgen.arrange.clamp import clamp_size
from fabgen.design.arranged import Box, Placed, Shape
from fabgen.design.design import Clamp, Design

FREE_MM = 5.0
"""Kept free between the plate and whatever else is on the boom. Source: common practice."""

END_MM = 2.0


def clamp_station_mm(design: Design, clamp: Clamp, placed: Sequence[Placed], balance_mm: float) -> float | None:
    """The clamp's station.

    Args:
        design: for the boom and the polarisation.
        clamp: stated station, or None for the free place nearest to the balance point.
        placed: everything else on the boom.
        balance_mm: the balance point.

    Returns:
        Station of the plate's middle; None where no place is free. With vertical rods only places behind the rearmost
        rod count: a mast parallel to the rods and among them would be part of the antenna.
    """
    if clamp.at_mm is not None:
        return clamp.at_mm
    half_mm = clamp_size(design, clamp).width_mm / 2
    low, high = half_mm + END_MM, design.boom.length_mm - half_mm - END_MM
    if design.polarisation == "vertical":
        high = min(high, min(element.station_mm for element in design.elements) - half_mm - FREE_MM)
    taken = sorted(
        (start - half_mm - FREE_MM, end + half_mm + FREE_MM)
        for start, end in (extent_x_mm(shape) for part in placed for shape in part.shapes)
    )
    free = _gaps(low, high, taken)
    places = [_nearest_whole(start, end, balance_mm) for start, end in free]
    return min((p for p in places if p is not None), key=lambda p: (abs(p - balance_mm), p), default=None)


def extent_x_mm(shape: Shape) -> tuple[float, float]:
    """From where to where along the boom a shape reaches."""
    box = shape if isinstance(shape, Box) else shape.box
    return box.low[0], box.high[0]


def _gaps(low: float, high: float, taken: Sequence[tuple[float, float]]) -> list[tuple[float, float]]:
    gaps = []
    for start, end in taken:
        if start >= low and start <= high:
            gaps.append((low, start))
        low = max(low, end)
    if low <= high:
        gaps.append((low, high))
    return [(start, end) for start, end in gaps if start <= end]


def _nearest_whole(start: float, end: float, wanted: float) -> float | None:
    """The whole millimetre inside a gap that is nearest to a place."""
    first, last = math.ceil(start), math.floor(end)
    return float(min(max(round(wanted), first), last)) if first <= last else None
