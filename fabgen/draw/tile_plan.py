"""Where a sheet is cut into pages: the joins along both axes and what each page shows.

Coordinates are the sheet's, in mm: origin lower left, x right, y up.
"""

import itertools
import math
from bisect import bisect_left
from collections.abc import Iterator, Sequence
from dataclasses import replace
from typing import NamedTuple

from fabgen.design.drawing import Box, Item, Line, Sheet, Text, box_of
from fabgen.design.overlaps import bounds
from fabgen.frozen import frozen

GUTTER_MM, FOOT_MM, HEAD_MM = 9.0, 16.5, 10.0
"""Strips of a page left, below and above the drawing, for the bars, the foot and the stations."""

STATION_STEP_MM = 10.0
TARGET_MM = 2.0
"""Radius of a target mark on a join."""

_REACH_MM = TARGET_MM + 1.0
_LEAST_SHARE = 1 / 3
"""Of a page's room, for what a page shows before the next begins."""
_AIR_MM, _EDGE_MM = 0.5, 1.0
_BESIDE_MM = 1.5
"""Lettering no farther than this from a hole's edge belongs to the hole."""
_CROSSED = 0.05
"""What a join through lettering or a hole costs: as much as to move it by 40 mm on an A4 page lying across."""


@frozen
class Plan:
    """Where a sheet is cut on one orientation of the paper.

    Attributes:
        paper_mm: width and height of a page.
        margin_mm: edge of the paper that stays empty.
        joins_x_mm, joins_y_mm: places of the joins on the sheet.
        columns_mm, rows_mm: from where to where each column and row of pages shows the sheet; rows from below.
        lost: weight of what should stay whole and is on no page whole: 3 for a hole, 1 for lettering by itself.
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


class _Span(NamedTuple):
    """From where to where something that should stay whole reaches along one axis."""

    low_mm: float
    high_mm: float
    weight: int


def _span(low_mm: float, high_mm: float, length_mm: float, weight: int) -> _Span:
    """With a little air, so that no page's frame runs along lettering."""
    return _Span(max(0.0, low_mm - _AIR_MM), min(length_mm, high_mm + _AIR_MM), weight)


class _Way(NamedTuple):
    """Pages up to some place; the smaller is the better.

    Attributes:
        cost: two for every page, and the weight of what is lost.
        pages: how many.
        uneven: sum of the squares of their share of the room, and what crossed lettering costs.
        joins_mm: between them.
    """

    cost: float
    pages: float
    uneven: float
    joins_mm: tuple[float, ...]

    def page(
        self, width_mm: float, room_mm: float, join_mm: float | None = None, lost: int = 0, crossed: bool = False
    ) -> "_Way":
        """One page more, up to a join or to the end."""
        uneven = self.uneven + round((width_mm / room_mm) ** 2, 9) + _CROSSED * crossed
        joins = self.joins_mm if join_mm is None else (*self.joins_mm, join_mm)
        return _Way(self.cost + 2 + lost, self.pages + 1, uneven, joins)


_NO_WAY = _Way(math.inf, math.inf, math.inf, ())


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
    whole = list(_whole(sheet))
    along = [_span(box[0], box[2], sheet.width_mm, weight) for box, weight in whole]
    low, high = _reach_across(sheet)
    across = [_span(box[1] - low, box[3] - low, high - low, weight) for box, weight in whole]
    station_mm = sheet.station_at_x0_mm or 0.0
    joins_x, lost_x = _joins(sheet.width_mm, right - left, overlap_mm, station_mm, STATION_STEP_MM, along)
    joins_y, lost_y = _joins(high - low, top - bottom, overlap_mm, low, 1.0, across)
    columns = _spans(joins_x, sheet.width_mm, right - left, overlap_mm, along)
    rows = _spans(joins_y, high - low, top - bottom, overlap_mm, across)
    return replace(
        empty,
        joins_x_mm=joins_x,
        joins_y_mm=tuple(low + join for join in joins_y),
        columns_mm=columns,
        rows_mm=tuple((low + first, low + last) for first, last in rows),
        lost=lost_x + lost_y,
    )


def _reach_across(sheet: Sheet) -> tuple[float, float]:
    """From where to where pages must show the sheet across: pages have bars of their own in place of the sheet's."""
    boxes = [bounds(item) for item in sheet.items if is_tiled(item)]
    low, high = min(box[1] for box in boxes), max(box[3] for box in boxes)
    return max(0.0, low - _EDGE_MM), min(sheet.height_mm, high + _EDGE_MM)


def is_tiled(item: Item) -> bool:
    """Whether pages show an item of the sheet: its bars and its stamp they have of their own."""
    return item.layer not in ("stamp", "scale")


def stays_whole(item: Item) -> bool:
    """Whether joins look for a place where no page cuts this item: lettering and holes."""
    return is_tiled(item) and (isinstance(item, Text) or (item.layer == "drill" and not isinstance(item, Line)))


def _whole(sheet: Sheet) -> Iterator[tuple[Box, int]]:
    """What should be whole on some page: lettering together with the hole that it stands beside, and holes.

    Each with its weight, a page being 2: a hole and its lettering are worth more than a page, lettering alone less.
    """
    items = [item for item in sheet.items if stays_whole(item)]
    holes = sorted(bounds(item) for item in items if item.layer == "drill")
    yield from ((box, 3) for box in holes)
    starts, widest_mm = [hole[0] for hole in holes], max((hole[2] - hole[0] for hole in holes), default=0.0)
    for item in items:
        if isinstance(item, Text):
            box = bounds(item)
            first = bisect_left(starts, box[0] - widest_mm - _BESIDE_MM)
            last = bisect_left(starts, box[2] + _BESIDE_MM)
            beside = [hole for hole in holes[first:last] if _is_beside(box, hole)][:1]
            corners = tuple(corner for low in (box, *beside) for corner in (low[:2], low[2:]))
            yield box_of(corners), 1 + 2 * len(beside)


def _is_beside(box: Box, hole: Box) -> bool:
    apart = max(box[0] - hole[2], hole[0] - box[2])
    return 0 < apart < _BESIDE_MM and box[1] < hole[3] + _BESIDE_MM and hole[1] < box[3] + _BESIDE_MM


def _joins(
    length_mm: float,
    room_mm: float,
    overlap_mm: float,
    origin_mm: float,
    step_mm: float,
    whole: Sequence[_Span],
) -> tuple[tuple[float, ...], int]:
    """Places of the joins along one axis, each at a multiple of the step counted from the origin's value at 0.

    Of all ways to cut the sheet the one with the fewest pages, where a hole or its lettering that is on no page whole
    counts like one page and a half, other lettering like half a page; of those the one with the most equal pages, whose
    joins keep off lettering and holes. Returns the joins and the weight of what is lost: what starts before the next
    page and ends beyond this one.
    """
    half_mm = overlap_mm / 2
    steps = range(math.ceil((origin_mm + overlap_mm) / step_mm), math.ceil((origin_mm + length_mm) / step_mm))
    joins = [k * step_mm - origin_mm for k in steps]
    crossed = _near_any(joins, whole)
    ways = {0.0: _Way(0, 0, 0.0, ())}
    for start in (0.0, *(join - half_mm for join in joins)):
        way = ways.get(start)
        if way is None:
            continue
        if length_mm - start <= room_mm:
            ways[length_mm] = min(way.page(length_mm - start, room_mm), ways.get(length_mm, _NO_WAY))
            continue
        cut = [span for span in whole if start <= span.low_mm < start + room_mm < span.high_mm]
        for join, is_crossed in zip(joins, crossed, strict=True):
            advance_mm = join - half_mm - start
            if _LEAST_SHARE * room_mm <= advance_mm <= room_mm - overlap_mm:
                lost = sum(span.weight for span in cut if span.low_mm < join - half_mm)
                longer = way.page(advance_mm + overlap_mm, room_mm, join, lost, is_crossed)
                ways[join - half_mm] = min(longer, ways.get(join - half_mm, _NO_WAY))
    best = ways[length_mm]
    return best.joins_mm, round(best.cost - 2 * best.pages)


def _near_any(joins_mm: Sequence[float], whole: Sequence[_Span]) -> list[bool]:
    """For each join whether a target mark on it would touch anything that should stay whole."""
    found, reach_mm, waiting = [], -math.inf, sorted(whole, reverse=True)
    for join in joins_mm:
        while waiting and waiting[-1].low_mm - _REACH_MM < join:
            reach_mm = max(reach_mm, waiting.pop().high_mm + _REACH_MM)
        found.append(join < reach_mm)
    return found


def _spans(
    joins: tuple[float, ...], length_mm: float, room_mm: float, overlap_mm: float, whole: Sequence[_Span]
) -> tuple[tuple[float, float], ...]:
    """From where to where each row or column of pages shows the sheet.

    A page ends half an overlap behind its join, or later where an item that the next page cuts needs it.
    """
    starts = [0.0, *(join - overlap_mm / 2 for join in joins)]
    spans = []
    for start, following in itertools.pairwise([*starts, length_mm]):
        end = min(start + room_mm, length_mm)
        needed = [span.high_mm for span in whole if start <= span.low_mm < following and span.high_mm <= end]
        spans.append((start, min(end, max(following + overlap_mm, *needed, 0.0))))
    return tuple(spans)


def near(low_mm: float, high_mm: float, place_mm: float) -> bool:
    """Whether a target mark at a place would touch what reaches from low to high."""
    return low_mm - _REACH_MM < place_mm < high_mm + _REACH_MM
