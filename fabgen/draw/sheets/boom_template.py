"""1:1 paper to mark a boom piece from: its walls laid flat, every hole with its station and drill."""

from fabgen.design.arranged import Arranged, Hole, Piece
from fabgen.design.drawing import Sheet
from fabgen.design.pen import Pen
from fabgen.draw.development import Development, development
from fabgen.draw.lettering_place import FreePlaces
from fabgen.units import format_mm

_SIDE_MM, _FOOT_MM, _HEAD_MM = 14.0, 20.0, 14.0
_WALL_NAMES = {"+z": "TOP", "+y": "LEFT", "-y": "RIGHT", "-z": "BOTTOM"}
_DOT_MM, _CROSS_MM = 0.8, 3.0


def sheets(arranged: Arranged) -> list[Sheet]:
    """One sheet per boom piece; station 0 is the datum face, printed face outwards."""
    return [_template(arranged, piece) for piece in arranged.pieces]


def _template(arranged: Arranged, piece: Piece) -> Sheet:
    design = arranged.design
    laid = development(design.boom, design.shop.paper_thickness_mm)
    pen = Pen()
    left, right = _SIDE_MM, _SIDE_MM + piece.end_mm - piece.start_mm
    base = _FOOT_MM - laid.low_mm
    holes = [hole for hole in arranged.holes if hole.piece == piece.name]
    width_mm = max(right + _SIDE_MM, 2 * _SIDE_MM + 100.0)
    height_mm = base + laid.high_mm + _HEAD_MM
    _surface(pen, laid, left, right, base)
    places = FreePlaces((left + 0.5, base + laid.low_mm + 0.5, right - 0.5, base + laid.high_mm - 0.5), [])
    _walls(pen, laid, left, right, base)
    for hole in holes:
        _hole(pen, laid, hole, left - piece.start_mm, base)
    places.keep_off(pen.items)
    for hole in holes:
        lines = [f"{hole.element} {format_mm(hole.station_mm)}", f"{hole.number} drill {hole.drill}"]
        x_mm, y_mm = left + hole.station_mm - piece.start_mm, base + laid.centre_mm(hole)
        places.letter(pen, lines, x_mm, y_mm, hole.diameter_mm / 2)
    pen.text(left, base + laid.high_mm + 8.0, f"{design.number} {design.revision}  {piece.name}  1:1", 3.5)
    pen.text(
        left, base + laid.high_mm + 3.0, "datum end at this edge; printed face outwards; arrow points forward", 2.0
    )
    pen.bar_100(left, 8.0)
    return pen.sheet(piece.name, f"{design.title}: {piece.name}", width_mm, height_mm, piece.start_mm - left)


def _surface(pen: Pen, laid: Development, left: float, right: float, base: float) -> None:
    """Edges, folds and cuts."""
    low, high = base + laid.low_mm, base + laid.high_mm
    if laid.cuts_mm:
        for face in laid.faces:
            pen.rectangle("outline", left, base + face.low_mm, right, base + face.high_mm)
    else:
        pen.rectangle("outline", left, low, right, high)
    for fold in laid.folds_mm:
        pen.line("fold", left, base + fold, right, base + fold)


def _walls(pen: Pen, laid: Development, left: float, right: float, base: float) -> None:
    """Centre lines, wall names and the arrow forward."""
    named = [(face.middle_mm, face.high_mm, _WALL_NAMES[face.wall]) for face in laid.faces]
    if laid.radius_mm:
        quarter = laid.radius_mm * 1.5707963267948966
        named = [(0.0, quarter / 2, "TOP"), (quarter, 1.5 * quarter, "LEFT"), (-quarter, -quarter / 2, "RIGHT")]
    for middle, edge, name in named:
        pen.line("centre", left, base + middle, right, base + middle)
        pen.text(left + 2.0, base + edge - 1.2, name, 2.0, level="top")
        end = left + 16.0
        pen.line("text", end, base + edge - 2.2, end + 8.0, base + edge - 2.2)
        pen.arrow(end + 10.0, base + edge - 2.2, 0, layer="text")


def _hole(pen: Pen, laid: Development, hole: Hole, shift: float, base: float) -> None:
    x_mm, y_mm = shift + hole.station_mm, base + laid.centre_mm(hole)
    outline = laid.outline_mm(hole)
    if outline:
        pen.polyline("drill", [(shift + x, base + y) for x, y in outline], closed=True)
    else:
        pen.circle("drill", x_mm, y_mm, hole.diameter_mm / 2)
    pen.cross(x_mm, y_mm, hole.diameter_mm / 2 + _CROSS_MM)
    pen.dot(x_mm, y_mm, _DOT_MM)
