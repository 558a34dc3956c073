"""Cut a long sheet into pages of the shop's paper at exactly 1:1.

Every page carries absolute stations along both of its long edges and a 100 mm bar each way, so that it is placed by
tape and errors never add up from page to page. Neighbours overlap; at each overlap both pages print the same join line
with the same target marks, at a station that is a round number. Frame of a page: origin lower left, x right, y up, mm.
"""

import math

from fabgen.design.drawing import Box, Circle, Item, Sheet, Text, moved
from fabgen.design.lettering import shortened, text_box, text_width_mm
from fabgen.design.overlaps import bounds, hits
from fabgen.design.pen import LETTERING_MM, Pen
from fabgen.draw.clipping import clipped, contains
from fabgen.draw.stamp import stamped
from fabgen.draw.tile_plan import STATION_STEP_MM, TARGET_MM, Plan, is_tiled, near, plan_pages, stays_whole
from fabgen.frozen import frozen

_LABEL_STEP = 5
_OFF_TEXT_MM = 0.4
_LABEL_ROOM_MM = 14.0


@frozen
class Tiling:
    """A sheet cut into pages.

    Attributes:
        pages: row by row from the top, each from left to right.
        rows, columns: how they lie.
        dropped: lettering that fits on no page whole and found no free place; empty on a sheet drawn with care.
    """

    pages: tuple[Sheet, ...]
    rows: int
    columns: int
    dropped: tuple[Text, ...]


def tile(
    sheet: Sheet,
    paper_mm: tuple[float, float],
    *,
    number: str,
    revision: str,
    overlap_mm: float = 10.0,
    margin_mm: float = 10.0,
) -> Tiling:
    """Cut a sheet into pages, upright or across, whichever takes fewer; every page gets its own bars and stamp.

    Args:
        sheet: the drawing at 1:1; `station_at_x0_mm` gives the stations, without it pages carry none.
        paper_mm: width and height of the paper, in either order.
        number: drawing number for the foot.
        revision: for the foot.
        overlap_mm: least width that neighbours share, centred on the join.
        margin_mm: edge of the paper that no printer has to reach.

    Returns:
        The pages; a sheet that fits on one page comes back as one page without joins.
    """
    plans = [
        plan_pages(sheet, size, overlap_mm, margin_mm)
        for size in ((max(paper_mm), min(paper_mm)), (min(paper_mm), max(paper_mm)))
    ]
    tall = sheet.height_mm > sheet.width_mm
    plan = min(
        plans, key=lambda p: (len(p.columns_mm) * len(p.rows_mm), p.lost, (p.paper_mm[0] > p.paper_mm[1]) == tall)
    )
    windows = [(x0, y0, x1, y1) for y0, y1 in reversed(plan.rows_mm) for x0, x1 in plan.columns_mm]
    items = [item for item in sheet.items if is_tiled(item)]
    texts, dropped = _placed_texts(items, windows)
    shapes = [item for item in items if not isinstance(item, Text)] + _join_marks(plan, items)
    pages = []
    for k, window in enumerate(windows):
        kept = [part for shape in shapes for part in clipped(shape, window)] + texts[k]
        page = _page(sheet, plan, k, window, kept, f"{number} {revision}")
        pages.append(stamped(page) if sheet.on("stamp") else page)
    return Tiling(tuple(pages), len(plan.rows_mm), len(plan.columns_mm), tuple(dropped))


def _placed_texts(items: list[Item], windows: list[Box]) -> tuple[list[list[Item]], list[Text]]:
    """Lettering of each page: wherever it lies whole; otherwise pushed into the nearest page where it hits nothing."""
    placed: list[list[Item]] = [[] for _ in windows]
    dropped = []
    solid = [item for item in items if stays_whole(item)]
    for text in (item for item in items if isinstance(item, Text)):
        box = text_box(text)
        homes = [k for k, window in enumerate(windows) if contains(window, box)]
        for k in homes:
            placed[k].append(text)
        if homes:
            continue
        pushes = sorted((*_push(box, window), k) for k, window in enumerate(windows))
        for distance, dx, dy, k in pushes:
            other = moved(text, dx, dy)
            assert isinstance(other, Text)
            if math.isfinite(distance) and not any(hits(other, item) for item in solid if item is not text):
                placed[k].append(other)
                break
        else:
            dropped.append(text)
    return placed, dropped


def _push(box: Box, window: Box) -> tuple[float, float, float]:
    """How far a box must move to lie in a window: distance, right, up; infinite when the box is too large."""
    dx = max(window[0] - box[0], 0.0) or min(window[2] - box[2], 0.0)
    dy = max(window[1] - box[1], 0.0) or min(window[3] - box[3], 0.0)
    moved_box = (box[0] + dx, box[1] + dy, box[2] + dx, box[3] + dy)
    return (math.hypot(dx, dy) if contains(window, moved_box) else math.inf, dx, dy)


def _join_marks(plan: Plan, items: list[Item]) -> list[Item]:
    """Join lines with two target marks per page side, on the sheet, so that both neighbours print the same ones.

    A join line stops short of lettering that it would run through.
    """
    pen = Pen()
    texts = [text_box(item) for item in items if isinstance(item, Text)]
    solid = [bounds(item) for item in items if stays_whole(item)]
    for x in plan.joins_x_mm:
        across = [(box[1], box[3]) for box in texts if box[0] < x < box[2]]
        for low, high in _between(plan.rows_mm[0][0], plan.rows_mm[-1][1], across):
            pen.line("frame", x, low, x, high)
        for low, high in plan.rows_mm:
            for y in _free_places(low, high, [(b[1], b[3]) for b in solid if near(b[0], b[2], x)]):
                _target(pen, x, y)
    for y in plan.joins_y_mm:
        across = [(box[0], box[2]) for box in texts if box[1] < y < box[3]]
        for low, high in _between(plan.columns_mm[0][0], plan.columns_mm[-1][1], across):
            pen.line("frame", low, y, high, y)
        for low, high in plan.columns_mm:
            for x in _free_places(low, high, [(b[0], b[2]) for b in solid if near(b[1], b[3], y)]):
                _target(pen, x, y)
    return pen.items


def _between(low: float, high: float, taken: list[tuple[float, float]]) -> list[tuple[float, float]]:
    """The parts of a span that keep a little off what is taken."""
    parts, start = [], low
    for first, last in sorted(taken):
        if first - _OFF_TEXT_MM > start:
            parts.append((start, first - _OFF_TEXT_MM))
        start = max(start, last + _OFF_TEXT_MM)
    return [*parts, (start, high)] if start < high else parts


def _free_places(low: float, high: float, taken: list[tuple[float, float]]) -> list[float]:
    """Two places, as near as possible to a third from either end of a span, that are clear of what is taken."""
    third = (high - low) / 3
    places = []
    for wanted in (low + third, high - third):
        for shift in range(math.floor(third / 2)):
            free = [p for p in (wanted + shift, wanted - shift) if not any(near(a, b, p) for a, b in taken)]
            if free:
                places.append(free[0])
                break
    return places


def _target(pen: Pen, x_mm: float, y_mm: float) -> None:
    pen.items.append(Circle("frame", x_mm, y_mm, TARGET_MM))
    pen.cross(x_mm, y_mm, 1.5 * TARGET_MM, "frame", 45.0)


def _page(sheet: Sheet, plan: Plan, index: int, window: Box, kept: list[Item], mark: str) -> Sheet:
    """One page: the window's items moved to their place, and everything printed round them."""
    width, height = plan.paper_mm
    left, bottom, _, top = plan.room
    x0 = left
    y0 = bottom + (top - bottom - (window[3] - window[1])) / 2
    dx, dy = x0 - window[0], y0 - window[1]
    frame = (x0, y0, x0 + window[2] - window[0], y0 + window[3] - window[1])
    station = None if sheet.station_at_x0_mm is None else sheet.station_at_x0_mm - dx
    pen = Pen()
    pen.rectangle("frame", *frame)
    pen.add(moved(item, dx, dy) for item in kept)
    joins_x = [x + dx for x in plan.joins_x_mm if window[0] < x < window[2]]
    if station is not None:
        _ruler(pen, frame, station, joins_x, (left - 1.5, width - plan.margin_mm))
    count, columns = len(plan.rows_mm) * len(plan.columns_mm), len(plan.columns_mm)
    row, column = divmod(index, columns)
    _neighbours(pen, plan, frame, (row, column), index)
    pen.bar_100(left - 4, (bottom + top) / 2 - 50, up=True, label="100 mm across")
    _foot(pen, plan, f"{mark}   {sheet.title}", f"sheet {index + 1} of {count}, row {row + 1}, column {column + 1}")
    if station is not None:
        pen.text(
            width - plan.margin_mm,
            plan.margin_mm + 10.6,
            "Stations in mm from the datum face, arrows forward.",
            anchor="end",
        )
    return pen.sheet(f"{sheet.name}-{index + 1:02d}", f"{sheet.title} ({index + 1}/{count})", width, height, station)


def _ruler(pen: Pen, frame: Box, station_at_x0_mm: float, joins: list[float], room: tuple[float, float]) -> None:
    """Ticks at every 10 mm of station below and above the window; joins, ends and every 50 mm have their number."""
    left, bottom, right, top = frame
    first = math.ceil((left + station_at_x0_mm) / STATION_STEP_MM - 1e-9)
    last = math.floor((right + station_at_x0_mm) / STATION_STEP_MM + 1e-9)
    steps = range(first, last + 1)
    wanted = [round((x + station_at_x0_mm) / STATION_STEP_MM) for x in joins]
    wanted += [first, first + 1, last, last - 1, *(step for step in steps if step % _LABEL_STEP == 0)]
    lettered: list[int] = []
    for step in wanted:
        x, half = step * STATION_STEP_MM - station_at_x0_mm, text_width_mm(_station(step), LETTERING_MM) / 2
        fits = room[0] <= x - half and x + half <= room[1]
        if fits and all(abs(step - other) * STATION_STEP_MM >= _LABEL_ROOM_MM for other in lettered):
            lettered.append(step)
    for step in steps:
        x, tick = step * STATION_STEP_MM - station_at_x0_mm, 2.0 if step in lettered else 1.2
        pen.line("dim", x, top, x, top + tick)
        pen.line("dim", x, bottom, x, bottom - tick)
        if step in lettered:
            pen.text(x, top + 2.6, _station(step), anchor="middle", layer="dim")


def _station(step: int) -> str:
    return f"{step * STATION_STEP_MM:.0f}"


def _neighbours(pen: Pen, plan: Plan, frame: Box, place: tuple[int, int], index: int) -> None:
    """Which page joins on each side."""
    left, _, right, top = frame
    (row, column), columns = place, len(plan.columns_mm)
    if column > 0:
        pen.text(left, top + 6.8, f"← join to sheet {index}")
    if column < columns - 1:
        pen.text(right, top + 6.8, f"join to sheet {index + 2} →", anchor="end")
    if row > 0:
        pen.text(plan.room[0] - 5, plan.room[3], f"sheet {index + 1 - columns} →", anchor="end", angle_deg=90)
    if row < len(plan.rows_mm) - 1:
        pen.text(plan.room[0] - 5, plan.room[1], f"← sheet {index + 1 + columns}", angle_deg=90)


def _foot(pen: Pen, plan: Plan, name: str, place: str) -> None:
    """The bar along, and two lines of lettering."""
    left, right, base = plan.margin_mm, plan.paper_mm[0] - plan.margin_mm, plan.margin_mm
    pen.bar_100(left + 0.5, base + 7, label="100 mm along")
    advice = "Print at 100 %; both bars must measure 100 mm."
    pen.text(right, base + 6, advice, anchor="end")
    room = right - left - text_width_mm(place, LETTERING_MM) - 6
    pen.text(left, base + 1, shortened(name, LETTERING_MM, room))
    pen.text(right, base + 1, place, anchor="end")
