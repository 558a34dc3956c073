"""Where a sheet is cut into pages: the joins along both axes and what each page shows.

Coordinates are the sheet's, in mm: origin lower left, x right, y up.
"""

import itertools
import math
from collections.abc import Sequence
from dataclasses import replace

from fabgen.design.drawing import Box, Item, Line, Sheet, Text
from fabgen.design.overlaps import bounds
from fabgen.frozen import frozen

GUTTER_MM, FOOT_MM, HEAD_MM = 9.0, 16.5, 10.0
"""Strips of a page left, below and above the drawing, for the bars, the foot and the stations."""

STATION_STEP_MM = 10.0
TARGET_MM = 2.0
"""Radius of a target mark on a join."""

_DETOUR_MM = 40.0


@frozen
class Plan:
    """Where a sheet is cut on one orientation of the paper.

    Attributes:
        paper_mm: width and height of a page.
        margin_mm: edge of the paper that stays empty.
        joins_x_mm, joins_y_mm: places of the joins on the sheet.
        columns_mm, rows_mm: from where to where each column and row of pages shows the sheet; rows from below.
        lost: how many items that should stay whole are on no page whole.
    """

    paper_mm: tuple[float, float]
    margin_mm: float
    joins_x_mm: tuple[float, ...]
    joins_y_mm: tuple[float, ...]
    columns_mm: tuple[tuple[float, float], ...]
    rows_mm: tuple[tuple[float, float], ...]
    lost: int

    @property
    def room(self) -> Box:
        """The part of the page for the drawing."""
        width, height = self.paper_mm
        m = self.margin_mm
        return (m + GUTTER_MM, m + FOOT_MM, width - m, height - m - HEAD_MM)


def plan_pages(sheet: Sheet, paper_mm: tuple[float, float], overlap_mm: float, margin_mm: float) -> Plan:
    """Plan the pages of one orientation of the paper.

    Args:
        sheet: the drawing at 1:1.
        paper_mm: width and height of the page.
        overlap_mm: least width that neighbours share.
        margin_mm: edge of the paper that stays empty.
    """
    empty = Plan(paper_mm, margin_mm, (), (), (), (), 0)
    left, bottom, right, top = empty.room
    whole = [bounds(item) for item in sheet.items if stays_whole(item)]
    along, across = [(box[0], box[2]) for box in whole], [(box[1], box[3]) for box in whole]
    station_mm = sheet.station_at_x0_mm or 0.0
    joins_x, lost_x = _joins(sheet.width_mm, right - left, overlap_mm, station_mm, STATION_STEP_MM, along)
    joins_y, lost_y = _joins(sheet.height_mm, top - bottom, overlap_mm, 0.0, 1.0, across)
    columns = _spans(joins_x, sheet.width_mm, right - left, overlap_mm, along)
    rows = _spans(joins_y, sheet.height_mm, top - bottom, overlap_mm, across)
    return replace(
        empty, joins_x_mm=joins_x, joins_y_mm=joins_y, columns_mm=columns, rows_mm=rows, lost=lost_x + lost_y
    )


def stays_whole(item: Item) -> bool:
    """Whether joins look for a place where no page cuts this item: lettering and holes."""
    return item.layer != "stamp" and (isinstance(item, Text) or (item.layer == "drill" and not isinstance(item, Line)))


def _joins(
    length_mm: float,
    room_mm: float,
    overlap_mm: float,
    origin_mm: float,
    step_mm: float,
    whole: Sequence[tuple[float, float]],
) -> tuple[tuple[float, ...], int]:
    """Places of the joins along one axis, each at a multiple of the step counted from the origin's value at 0.

    As far apart as the room allows, then moved back, by half a page at most, to where the fewest whole items are lost
    (those that start before the next page and end after this one), and by 40 mm at most to keep the join line off them.
    """
    joins: list[float] = []
    lost, start = 0, 0.0
    while length_mm - start > room_mm:
        end = start + room_mm
        farthest = math.floor((end - overlap_mm / 2 + origin_mm) / step_mm) * step_mm - origin_mm
        nearest = max(start + overlap_mm, end - room_mm / 2)
        costs = []
        for k in range(max(1, math.ceil((farthest - nearest) / step_mm))):
            join = farthest - k * step_mm
            cut = sum(1 for low, high in whole if start <= low < join - overlap_mm / 2 and high > end)
            crossed = any(near(low, high, join) for low, high in whole)
            costs.append((cut, crossed or farthest - join > _DETOUR_MM, -join))
        cut, _, place = min(costs)
        lost += cut
        joins.append(-place)
        start = joins[-1] - overlap_mm / 2
    return tuple(joins), lost


def _spans(
    joins: tuple[float, ...], length_mm: float, room_mm: float, overlap_mm: float, whole: Sequence[tuple[float, float]]
) -> tuple[tuple[float, float], ...]:
    """From where to where each row or column of pages shows the sheet.

    A page ends half an overlap behind its join, or later where an item that the next page cuts needs it.
    """
    starts = [0.0, *(join - overlap_mm / 2 for join in joins)]
    spans = []
    for start, following in itertools.pairwise([*starts, length_mm]):
        end = min(start + room_mm, length_mm)
        needed = [high for low, high in whole if start <= low < following and high <= end]
        spans.append((start, min(end, max(following + overlap_mm, *needed, 0.0))))
    return tuple(spans)


def near(low_mm: float, high_mm: float, place_mm: float) -> bool:
    """Whether a target mark at a place would touch what reaches from low to high."""
    reach = TARGET_MM + 1
    return low_mm - reach < place_mm < high_mm + reach
