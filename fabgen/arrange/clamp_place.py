"""Where the clamp goes: as stated, or the free place nearest to the balance point."""

import math
from collections.abc import Sequence

from fabgen.arrange.clamp import clamp_size
from fabgen.design.arranged import Placed
from fabgen.design.design import Clamp, Design
from fabgen.design.spans import span_mm

FREE_MM = 6.0
"""Kept free between the plate and whatever else is on the boom, for a spanner and for stations that are off.

Source: our own choice."""

END_MM = 2.0
"""From the plate to the boom's end, more than a saw is off. Source: our own choice."""


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
        for start, end in (span_mm(shape, 0) for part in placed for shape in part.shapes)
    )
    free = _gaps(low, high, taken)
    places = [_nearest_whole(start, end, balance_mm) for start, end in free]
    return min((p for p in places if p is not None), key=lambda p: (abs(p - balance_mm), p), default=None)


def _gaps(low: float, high: float, taken: Sequence[tuple[float, float]]) -> list[tuple[float, float]]:
    """What is left free of a stretch; `taken` in order of its starts."""
    gaps = []
    for start, end in (*taken, (math.inf, math.inf)):
        if low <= min(start, high):
            gaps.append((low, min(start, high)))
        low = max(low, end)
    return gaps


def _nearest_whole(start: float, end: float, wanted: float) -> float | None:
    """The whole millimetre inside a gap that is nearest to a place."""
    first, last = math.ceil(start), math.floor(end)
    return float(min(max(round(wanted), first), last)) if first <= last else None
