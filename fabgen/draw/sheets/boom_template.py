"""1:1 paper to mark a boom piece from: its walls laid flat, every hole with its station and drill."""

import math
from collections import defaultdict
from collections.abc import Iterable

from fabgen.design.arranged import Arranged, CutPlan, Hole, Piece
from fabgen.design.drawing import Box, Item, Sheet
from fabgen.design.lettering import shortened, text_width_mm
from fabgen.design.pen import Pen, spread
from fabgen.draw.clipping import clipped
from fabgen.draw.development import Development, Face, development
from fabgen.draw.lettering_place import SMALLEST_MM, Drawn, Spot, free_place, letter_hole, mark_hole, usual_height_mm
from fabgen.draw.words import ABOUT_BARS, WALLS, allowance_words, boom_size, drill_words, wall_of
from fabgen.units import format_mm

PLACE = "templates"

_LEFT_MM, _RIGHT_MM, _FOOT_MM = 20.0, 10.0, 16.5
_BAR_X_MM, _BAR_Y_MM = 8.0, 6.0
_CROSS_MM, _DOT_MM = 3.0, 0.8
_STATION_STEP_MM, _TICK_MM, _INNER_TICK_MM = 50.0, 1.5, 1.0
_END_NAME_MM = 1.5
_LINE_MM = 165.0
"""Longest line of lettering: it stays whole on a page of the shop's paper, upright or across."""
_NAME_PITCH_MM = 110.0
_TITLE_MM = 35.0
_ARROW_MM = 9.0


def sheets(arranged: Arranged, _: CutPlan) -> list[Sheet]:
    """One sheet per boom piece; x is the station, printed face outwards."""
    return [_template(arranged, piece) for piece in arranged.pieces]


def _template(arranged: Arranged, piece: Piece) -> Sheet:
    laid = development(arranged.design.boom, arranged.design.shop.paper_thickness_mm)
    left, right = _LEFT_MM, _LEFT_MM + piece.end_mm - piece.start_mm
    base = _FOOT_MM - laid.low_mm
    paper = (left, base + laid.low_mm, right, base + laid.high_mm + laid.flap_mm)
    holes = [hole for hole in arranged.holes if hole.piece == piece.name]
    pen, shift = Pen(), left - piece.start_mm
    _surface(pen, laid, paper, base)
    for hole in holes:
        _hole(pen, laid, hole, shift, base, paper)
    edges = _edges(laid, base)
    _stations(pen, piece, paper, edges)
    drawn = Drawn(pen.items)
    crowded = [hole for hole in holes if not _lettered(pen, drawn, _spot(laid, hole, shift, base, paper), hole)]
    _end_names(pen, drawn, laid, paper, base)
    _wall_names(pen, drawn, laid, paper, base)
    _inner_stations(pen, drawn, piece, left, edges[0][0])
    head_mm = _crowded(pen, crowded, shift, paper[3] + 7.0)
    _ends(pen, paper, left, right)
    top_mm = _heading(pen, arranged, piece, laid, head_mm)
    pen.bar_100(_BAR_X_MM, _FOOT_MM, up=True, label="100 mm across")
    pen.bar_100(left, _BAR_Y_MM, label="100 mm along")
    pen.text(left + 104.0, _BAR_Y_MM - 0.9, ABOUT_BARS, SMALLEST_MM, layer="scale")
    width_mm = max(right + _RIGHT_MM, left + _LINE_MM + 5.0)
    height_mm = max(top_mm + 2.0, _FOOT_MM + 106.0)
    return pen.sheet(piece.name, f"{arranged.design.title}: {piece.name}", width_mm, height_mm, piece.start_mm - left)


def _surface(pen: Pen, laid: Development, paper: Box, base: float) -> None:
    """Edges, folds, seam and centre lines."""
    left, low, right, high = paper
    if laid.folds_mm or laid.radius_mm:
        pen.rectangle("outline", left, low, right, high - laid.flap_mm)
        pen.polyline("frame", [(left, high - laid.flap_mm), (left, high), (right, high), (right, high - laid.flap_mm)])
    else:
        for face in laid.faces:
            pen.rectangle("outline", left, base + face.low_mm, right, base + face.high_mm)
    for fold in laid.folds_mm:
        if fold < laid.high_mm:
            pen.line("fold", left, base + fold, right, base + fold)
    for _, middle in laid.centre_lines_mm:
        if laid.low_mm < middle < laid.high_mm:
            pen.line("centre", left, base + middle, right, base + middle)


def _hole(pen: Pen, laid: Development, hole: Hole, shift: float, base: float, paper: Box) -> None:
    """Circle or developed outline, cross and pilot dot, cut where the paper ends; at a seam drawn at both edges."""
    x_mm, reach_mm = shift + hole.station_mm, hole.diameter_mm / 2 + _CROSS_MM
    for centre in laid.centres_mm(hole):
        mark, y_mm = Pen(), base + centre
        outline = laid.outline_mm(hole)
        if outline:
            rise = y_mm - laid.centre_mm(hole)
            mark.polyline("drill", [(shift + x, rise + y) for x, y in outline], closed=True)
        else:
            mark.circle("drill", x_mm, y_mm, hole.diameter_mm / 2)
        mark.cross(x_mm, y_mm, reach_mm)
        mark.dot(x_mm, y_mm, _DOT_MM)
        pen.add(part for item in mark.items for part in clipped(item, paper))


def _edges(laid: Development, base: float) -> list[tuple[float, float]]:
    """Lower and upper edge of each part of the paper that stays in sight on the boom, from below."""
    if laid.folds_mm or laid.radius_mm:
        return [(base + laid.low_mm, base + laid.high_mm)]
    return [(base + face.low_mm, base + face.high_mm) for face in reversed(laid.faces)]


def _stations(pen: Pen, piece: Piece, paper: Box, edges: Iterable[tuple[float, float]]) -> None:
    """Ticks to place the paper by tape: outside with their station, inside for when it is cut out."""
    left, low, right, high = paper
    first = math.ceil(piece.start_mm / _STATION_STEP_MM)
    for k in range(first, math.floor(piece.end_mm / _STATION_STEP_MM) + 1):
        x = left + k * _STATION_STEP_MM - piece.start_mm
        pen.line("dim", x, low, x, low - _TICK_MM)
        pen.line("dim", x, high, x, high + _TICK_MM)
        for lower, upper in edges if left < x < right else ():
            pen.line("dim", x, lower, x, lower + _INNER_TICK_MM)
            pen.line("dim", x, upper, x, upper - _INNER_TICK_MM)
        if k % 2 == 0 and right - x > 6.0:
            label = f"{k * _STATION_STEP_MM:.0f}"
            pen.text(x, low - _TICK_MM - 0.8, label, 2.0, anchor="middle", level="top", layer="dim")
            pen.text(x, high + _TICK_MM + 0.8, label, 2.0, anchor="middle", layer="dim")


def _inner_stations(pen: Pen, drawn: Drawn, piece: Piece, left: float, low: float) -> None:
    """The number of every second tick along the paper's lower edge, inside, where there is a free place."""
    step_mm = 2 * _STATION_STEP_MM
    for k in range(math.ceil((piece.start_mm + 1.0) / step_mm), math.floor((piece.end_mm - 8.0) / step_mm) + 1):
        x, label = left + k * step_mm - piece.start_mm, f"{k * step_mm:.0f}"
        width = text_width_mm(label, SMALLEST_MM)
        found = free_place(drawn, width, SMALLEST_MM, [(x + 0.8, low + 0.8), (x - 0.8 - width, low + 0.8)])
        if found:
            drawn.add([pen.text(found[0], found[1], label, SMALLEST_MM, layer="dim")])


def _spot(laid: Development, hole: Hole, shift: float, base: float, paper: Box) -> Spot:
    centre = laid.centre_mm(hole)
    face = min(laid.faces, key=lambda face: max(face.low_mm - centre, centre - face.high_mm))
    high_mm = face.high_mm + (laid.flap_mm if centre == laid.high_mm else 0.0)
    x_mm, radius_mm = shift + hole.station_mm, hole.diameter_mm / 2
    return Spot(x_mm, base + centre, radius_mm, base + face.low_mm, base + high_mm, paper[0], paper[2])


def _lettered(pen: Pen, drawn: Drawn, spot: Spot, hole: Hole) -> bool:
    """Letter a hole on its wall: element, station and its ± over its axis, number and drill under it."""
    above = [hole.element, format_mm(hole.station_mm), _tolerance(hole)]
    if letter_hole(pen, drawn, spot, above, [hole.number, *drill_words(hole)]):
        return True
    mark_hole(pen, drawn, spot, hole.number)
    return False


def _tolerance(hole: Hole) -> str:
    return f"±{hole.tolerance_mm:g}"


def _levels_mm(laid: Development, face: Face, base: float) -> tuple[float, tuple[float, ...]]:
    """Height of a wall's name, and on which baselines it may stand: over and under the centre line."""
    half = laid.radius_mm and face.wall == "-z"
    middle = face.middle_mm if half else dict(laid.centre_lines_mm)[face.wall]
    height = usual_height_mm((face.high_mm - face.low_mm) / 2)
    over, under = base + middle + 0.75, base + middle - 0.75 - 1.06 * height
    return height, (base + middle - height / 2,) if half else (over, under)


def _end_names(pen: Pen, drawn: Drawn, laid: Development, paper: Box, base: float) -> None:
    """Which end is which on every wall of the paper, so that it is still told when the paper is cut out."""
    left, _, right, _ = paper
    for face in laid.faces:
        _, levels = _levels_mm(laid, face, base)
        for words, at_end in (("DATUM END", False), ("FRONT END", True)):
            width = text_width_mm(words, SMALLEST_MM)
            x = right - _END_NAME_MM - width if at_end else left + _END_NAME_MM
            found = free_place(drawn, width, 1.06 * SMALLEST_MM, [(x, y) for y in reversed(levels)])
            if found:
                drawn.add([pen.text(found[0], found[1], words, SMALLEST_MM)])


def _wall_names(pen: Pen, drawn: Drawn, laid: Development, paper: Box, base: float) -> None:
    """Each wall's name with an arrow forward, again and again along it, and what to do with the flap."""
    left, _, right, high = paper
    for face in laid.faces:
        height, levels = _levels_mm(laid, face, base)
        _along(pen, drawn, WALLS[face.wall], height, levels, (left, right))
    if laid.flap_mm:
        seam = "Flap for tape, goes under the opposite edge."
        _along(pen, drawn, seam, 2.0, (high - laid.flap_mm / 2 - 1.0,), (left, right), arrow=False)


def _along(
    pen: Pen,
    drawn: Drawn,
    words: str,
    height_mm: float,
    levels_mm: tuple[float, ...],
    ends_mm: tuple[float, float],
    *,
    arrow: bool = True,
) -> None:
    """Letter words at every step along the paper where a free place is near, without their arrow where it must be."""
    width, pitch = text_width_mm(words, height_mm), _NAME_PITCH_MM if arrow else 2 * _NAME_PITCH_MM
    trials = [(y, tail, 2.5) for tail in ([_ARROW_MM + 2.0] if arrow else [0.0]) for y in levels_mm]
    trials += [(y, 0.0, 1.0) for y in levels_mm]
    start = ends_mm[0] + 3.0
    while start < ends_mm[1] - width:
        for y, tail, apart in trials:
            last = ends_mm[1] - 3.0 - width - tail
            xs = [x for k in range(28) for x in (start + 2.0 * k, start - 2.0 * k) if ends_mm[0] + 3.0 <= x <= last]
            found = free_place(drawn, width + tail + 2 * apart, 1.06 * height_mm, [(x - apart, y) for x in xs])
            if found:
                items = _name(words, height_mm, found[0] + apart, y, tail)
                pen.add(items)
                drawn.add(items)
                break
        start += pitch


def _name(words: str, height_mm: float, x_mm: float, y_mm: float, tail_mm: float) -> list[Item]:
    """Words, and an arrow forward behind them when there is a tail."""
    pen = Pen()
    pen.text(x_mm, y_mm, words, height_mm)
    if tail_mm:
        start, level = x_mm + text_width_mm(words, height_mm) + 2.0, y_mm + height_mm / 2
        tip = start + tail_mm - 2.0
        pen.line("text", start, level, tip - 2.5, level)
        pen.arrow(tip, level, 0, layer="text")
    return pen.items


def _crowded(pen: Pen, holes: Iterable[Hole], shift: float, from_y_mm: float) -> float:
    """Holes whose lettering has no place on their wall: upright above the paper; returns where that ends."""
    rows: dict[str, list[Hole]] = defaultdict(list)
    for hole in holes:
        rows[hole.number].append(hole)
    if not rows:
        return from_y_mm
    groups = sorted(rows.values(), key=lambda group: group[0].station_mm)
    xs = [shift + group[0].station_mm for group in groups]
    y_mm, longest = from_y_mm + 4.0, 0.0
    for group, x, slot in zip(groups, xs, spread(xs, 1.6 * SMALLEST_MM), strict=True):
        walls = " + ".join(wall_of(hole) for hole in group)
        first = group[0]
        station = f"{format_mm(first.station_mm)} {_tolerance(first)}"
        words = f"{first.number} {walls}  {first.element} {station} {' '.join(drill_words(first))}"
        pen.polyline("dim", [(x, from_y_mm), (x, from_y_mm + 1.0), (slot, y_mm - 0.5)])
        pen.text(slot, y_mm, words, SMALLEST_MM, angle_deg=90, level="middle")
        longest = max(longest, text_width_mm(words, SMALLEST_MM))
    return y_mm + longest + 2.0


def _ends(pen: Pen, paper: Box, left: float, right: float) -> None:
    """Which end is which, lettered along them outside the paper."""
    middle = (paper[1] + paper[3]) / 2
    pen.text(left - 2.0, middle, "DATUM END", 2.5, anchor="middle", angle_deg=90)
    pen.text(right + 4.5, middle, "FRONT END", 2.5, anchor="middle", angle_deg=90)


def _heading(pen: Pen, arranged: Arranged, piece: Piece, laid: Development, from_y_mm: float) -> float:
    """What this is and how to use it; returns where it ends."""
    design, x = arranged.design, _LEFT_MM
    if laid.radius_mm:
        how = "Cut out, wrap round the boom, TOP on the scribed line; the edges meet on the thick line, at the bottom."
    elif laid.folds_mm:
        how = "Cut out, fold on the dashed lines, wrap round the boom; the edges meet on the thick line, bottom right."
    else:
        how = "Cut the strips apart; each lies on the face it names, its edges along the boom's edges."
    paper = f", paper {design.shop.paper_thickness_mm:g} mm thick" if laid.flap_mm else ""
    lines = [
        f"{allowance_words(arranged.ledger).capitalize()}.",
        f"Reckoned for {boom_size(design.boom)}{paper}.",
        "Stations in mm from the datum face; LEFT and RIGHT looking forward; arrows point forward.",
        "Scale 1:1. Printed face outwards, DATUM END flush with the sawn rear end.",
        how,
    ]
    y = from_y_mm
    for line in lines:
        pen.text(x, y, shortened(line, 2.0, _LINE_MM), 2.0)
        y += 3.4
    name = f"{design.number} {design.revision}   {piece.name}   {format_mm(piece.end_mm - piece.start_mm)} mm"
    name = shortened(name, 3.5, _LINE_MM - _TITLE_MM)
    pen.text(x, y + 0.6, name, 3.5)
    after_mm = text_width_mm(name, 3.5) + 5.0
    pen.text(x + after_mm, y + 0.6, shortened(design.title, 2.0, _LINE_MM - after_mm), 2.0)
    return y + 5.0
