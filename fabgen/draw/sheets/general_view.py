"""General view of the array: plan and side elevation with running dimensions from the datum face, element table.

Running dimensions follow ISO 129-1, the scale is one of ISO 5455, the sheet ISO 5457; third-angle projection.
"""

import itertools
import math

from fabgen.design.arranged import Arranged, CutPlan
from fabgen.design.drawing import Sheet
from fabgen.design.lettering import shortened, text_width_mm
from fabgen.design.pen import LETTERING_MM, Pen, spread
from fabgen.draw.projection import View, draw, reach_mm
from fabgen.draw.title_block import HEIGHT_MM, WIDTH_MM, Format, draw_frame, draw_title_block, landscape
from fabgen.frozen import frozen
from fabgen.units import format_mm

PLACE = "drawings"

_SCALES = (1, 2, 5, 10, 20, 50, 100)
"""Full size and reductions. Source: ISO 5455:1979 (from memory)."""
_SHEETS = ("A3", "A2", "A1", "A0")
_PITCH = 1.5
_MARGIN_MM, _DATUM_X_MM = 6.0, 24.0
_LABEL_MM, _GAP_MM, _DIM_MM = 7.0, 8.0, 7.0
_ROW_MM, _CELL_MM = 3.6, 2.0
_NUMBERS = (("role", 14.0), ("station", 16.0), ("length", 15.0), ("rod", 11.0))
_HEIGHTS_MM = (LETTERING_MM, 2.0, 1.8)
_APART_MM = 4.0
_LEAST_SHARE = 0.35
"""Of the frame's width, for the boom: below it the next larger sheet is taken where there is one."""
_NOTES_MM = 12.0


@frozen
class _Layout:
    """A sheet and a scale on which everything has its place."""

    sheet: Format
    scale: int
    plan: View
    elevation: View
    line_y_mm: float
    blocks: int
    lettering_mm: float
    columns: tuple[tuple[str, float], ...]
    boom_share: float

    @property
    def table_mm(self) -> float:
        """Width of one block of the element table."""
        return sum(width for _, width in self.columns)


def sheets(arranged: Arranged, _: CutPlan) -> list[Sheet]:
    """One sheet, as small as the views, the dimensions and the table allow."""
    return [_draw(arranged, _choose(arranged))]


def _choose(arranged: Arranged) -> _Layout:
    """The smallest sheet, and on it the largest scale, that holds everything and shows the boom long enough."""
    found: list[_Layout] = []
    for name in (arranged.design.shop.paper, *_SHEETS):
        for scale, height_mm in itertools.product(_SCALES, _HEIGHTS_MM):
            layout, fits = _lay_out(arranged, landscape(name), scale, height_mm)
            if fits:
                found.append(layout)
                break
    good = [layout for layout in found if layout.boom_share > _LEAST_SHARE]
    return next(iter([*good, *found]), layout)


def _values(arranged: Arranged) -> list[tuple[float, str]]:
    """Station and lettering of every running dimension."""
    stations = [(line.station_mm, line.element) for line in arranged.ledger.lines]
    if arranged.clamp_mm is not None:
        stations.append((arranged.clamp_mm, "clamp"))
    stations.append((arranged.design.boom.length_mm, "front end"))
    return [(0.0, "0 datum"), *((mm, f"{format_mm(mm)} {name}") for mm, name in stations)]


def _lay_out(arranged: Arranged, sheet: Format, scale: int, height_mm: float) -> tuple[_Layout, bool]:
    left, low, right, high = sheet.frame
    ratio = 1 / scale
    plan_low, plan_high = (ratio * mm for mm in reach_mm(arranged, "y"))
    side_low, side_high = (ratio * mm for mm in reach_mm(arranged, "z"))
    x = left + _MARGIN_MM + _DATUM_X_MM
    plan_y = high - _MARGIN_MM - _LABEL_MM - _GAP_MM - plan_high
    side_y = plan_y + plan_low - _GAP_MM - _LABEL_MM - side_high
    line_y = side_y + side_low - _DIM_MM
    lettering = max(text_width_mm(words, height_mm) for _, words in _values(arranged))
    name_mm = max(text_width_mm(line.element, _CELL_MM) for line in arranged.ledger.lines)
    columns = (("element", max(15.0, name_mm + 2.0)), *_NUMBERS)
    table_mm, room_mm = sum(width for _, width in columns) + _APART_MM, right - left - WIDTH_MM
    blocks = max(1, math.floor(room_mm / table_mm))
    rows = math.ceil(len(arranged.ledger.lines) / blocks) + 1
    foot = max(HEIGHT_MM + _NOTES_MM, rows * _ROW_MM) + _APART_MM
    length = arranged.design.boom.length_mm * ratio
    slots = spread([x + ratio * mm for mm, _ in sorted(_values(arranged))], height_mm * _PITCH)
    fits = (
        x + length + _MARGIN_MM <= right
        and left + height_mm <= slots[0]
        and slots[-1] <= right - height_mm
        and line_y - 7.0 - lettering >= low + foot
        and table_mm <= room_mm
    )
    views = (View("y", x, plan_y, ratio), View("z", x, side_y, ratio))
    return _Layout(sheet, scale, *views, line_y, blocks, height_mm, columns, length / (right - left)), fits


def _draw(arranged: Arranged, layout: _Layout) -> Sheet:
    design, sheet = arranged.design, layout.sheet
    pen, scale = Pen(), f"1:{layout.scale}"
    draw_frame(pen, sheet)
    draw_title_block(pen, sheet, arranged, "General view", scale)
    for view, name in ((layout.plan, "PLAN, from above"), (layout.elevation, "ELEVATION, from the right")):
        _, reach = reach_mm(arranged, view.up)
        label_y = view.y_mm + view.ratio * reach + _GAP_MM / 2
        pen.text(view.x_mm, label_y, name)
        tip = view.x_mm + text_width_mm(name, LETTERING_MM) + 34.0
        pen.text(tip - 15.0, label_y, "forward", anchor="end")
        pen.line("text", tip - 13.0, label_y + 1.25, tip - 2.5, label_y + 1.25)
        pen.arrow(tip, label_y + 1.25, 0, layer="text")
        draw(pen, arranged, view)
    _longest(pen, arranged, layout.plan)
    _running(pen, arranged, layout)
    _table(pen, arranged, layout)
    _notes(pen, arranged, layout)
    return pen.sheet("general-view", f"{design.title}: general view {scale}", sheet.width_mm, sheet.height_mm)


def _longest(pen: Pen, arranged: Arranged, plan: View) -> None:
    """Dimension of the longest rod, left of the view."""
    line = max(arranged.ledger.lines, key=lambda line: line.cut_mm)
    x, half = plan.x_mm + plan.ratio * line.station_mm, plan.ratio * line.cut_mm / 2
    offset = x - plan.x_mm + 10.0
    pen.dimension(x, plan.y_mm - half, x, plan.y_mm + half, format_mm(line.cut_mm), offset_mm=offset)


def _running(pen: Pen, arranged: Arranged, layout: _Layout) -> None:
    view = layout.elevation
    low, _ = reach_mm(arranged, "z")
    values = [(view.x_mm + view.ratio * mm, words) for mm, words in _values(arranged)]
    from_y = view.y_mm + view.ratio * low
    pen.running(
        values, origin_x_mm=view.x_mm, from_y_mm=from_y, line_y_mm=layout.line_y_mm, height_mm=layout.lettering_mm
    )


def _table(pen: Pen, arranged: Arranged, layout: _Layout) -> None:
    """The elements in blocks side by side, left of the title block."""
    lines = arranged.ledger.lines
    rows = math.ceil(len(lines) / layout.blocks)
    left, low = layout.sheet.frame[0] + _APART_MM / 2, layout.sheet.frame[1]
    for block in range(layout.blocks):
        some = lines[block * rows : (block + 1) * rows]
        if not some:
            break
        x, y = left + block * (layout.table_mm + _APART_MM), low + rows * _ROW_MM + 1.0
        _row(pen, layout, x, y, [title for title, _ in layout.columns])
        pen.line("outline", x, y - 0.9, x + layout.table_mm, y - 0.9)
        for line in some:
            y -= _ROW_MM
            cells = [line.element, line.role, *map(format_mm, (line.station_mm, line.cut_mm, line.rod_mm))]
            _row(pen, layout, x, y, cells)


def _row(pen: Pen, layout: _Layout, x: float, y: float, cells: list[str]) -> None:
    for count, (cell, (_, width)) in enumerate(zip(cells, layout.columns, strict=True)):
        words = shortened(cell, _CELL_MM, width - 1.0)
        if count < 2:
            pen.text(x, y, words, _CELL_MM)
        else:
            pen.text(x + width - 1.0, y, words, _CELL_MM, anchor="end")
        x += width


def _notes(pen: Pen, arranged: Arranged, layout: _Layout) -> None:
    """What the array weighs and where it balances, over the title block; the symbol of third-angle projection."""
    right, low = layout.sheet.frame[2], layout.sheet.frame[1] + HEIGHT_MM
    x = right - WIDTH_MM
    clamp = f", clamp at {format_mm(arranged.clamp_mm)}" if arranged.clamp_mm is not None else ""
    swing = f"; turning radius {arranged.turning_radius_mm:.0f}"
    lines = [
        "Lengths are cut lengths, tip to tip. All sizes in mm, stations from the datum face.",
        f"{arranged.mass_g:.0f} g without cable and mast; balance at {format_mm(arranged.balance_mm)}{clamp}{swing}.",
    ]
    for count, line in enumerate(lines):
        pen.text(x, low + 2.0 + 4.2 * count, shortened(line, LETTERING_MM, WIDTH_MM - 20.0))
    cx, y = right - 15.0, low + 5.5
    for radius in (1.3, 2.6):
        pen.circle("outline", cx, y, radius)
    pen.polyline(
        "outline", [(cx + 5.0, y - 1.3), (cx + 5.0, y + 1.3), (cx + 11.0, y + 2.6), (cx + 11.0, y - 2.6)], closed=True
    )
    pen.line("centre", cx - 3.8, y, cx + 12.5, y)
    pen.line("centre", cx, y - 3.8, cx, y + 3.8)
