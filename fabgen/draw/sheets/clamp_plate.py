"""1:1 paper to mark the clamp plate from: outline, holes by what goes through them, dimensions, which face is which."""

import math
from collections import Counter
from collections.abc import Iterator

from fabgen.design.arranged import Arranged, CutPlan, Placed, Vector
from fabgen.design.drawing import Point, Sheet
from fabgen.design.lettering import shortened
from fabgen.design.pen import Pen
from fabgen.draw.lettering_place import Drawn, Spot, letter_hole, mark_hole
from fabgen.draw.words import ABOUT_BARS
from fabgen.stock import tables
from fabgen.units import format_mm

PLACE = "templates"

_LEFT_MM, _FOOT_MM, _RIGHT_MM, _HEAD_MM = 58.0, 48.0, 14.0, 44.0
_LINE_MM = 165.0
_CROSS_MM, _DOT_MM = 3.0, 0.8
_NEAR_MM = 0.01
_UP: dict[Vector, str] = {(0.0, 0.0, 1.0): "up", (0.0, -1.0, 0.0): "to the right", (0.0, 1.0, 0.0): "to the left"}


def sheets(arranged: Arranged, _: CutPlan) -> list[Sheet]:
    """One sheet for the plate, seen from the mast; none without a clamp."""
    plates = [placed for placed in arranged.placed if placed.part == "clamp_plate"]
    return [_template(arranged, plate) for plate in plates[:1]]


def _template(arranged: Arranged, plate: Placed) -> Sheet:
    design, numbers = arranged.design, dict(plate.parameters)
    width, height = (_number(numbers[name]) for name in ("width_mm", "height_mm"))
    sheet_mm = (max(_LEFT_MM + width + _RIGHT_MM, _LINE_MM + 15.0), max(_FOOT_MM + height + _HEAD_MM, 125.0))
    x0, y0 = _LEFT_MM, _FOOT_MM
    x, y = x0 + width / 2, y0 + height / 2
    pen = Pen()
    pen.rectangle("outline", x0, y0, x0 + width, y0 + height)
    pen.line("centre", x0 - 3.0, y, x0 + width + 3.0, y)
    pen.line("centre", x, y0 - 3.0, x, y0 + height + 3.0)
    across = design.boom.height_mm if abs(plate.frame.z[1]) > abs(plate.frame.z[2]) else design.boom.width_mm
    for side in (-1, 1):
        pen.line("fold", x0, y + side * across / 2, x0 + width, y + side * across / 2)
    holes = list(_holes(arranged, plate))
    for (hx, hy), diameter, _purpose in holes:
        pen.circle("drill", x + hx, y + hy, diameter / 2)
        pen.cross(x + hx, y + hy, diameter / 2 + _CROSS_MM)
        pen.dot(x + hx, y + hy, _DOT_MM)
    drawn = Drawn(pen.items)
    for (hx, hy), diameter, purpose in holes:
        spot = Spot(x + hx, y + hy, diameter / 2, y0 + 0.5, y0 + height - 0.5, x0 + 0.5, x0 + width - 0.5)
        if not letter_hole(pen, drawn, spot, purpose.split(), ["drill", _drill(arranged, diameter)]):
            mark_hole(pen, drawn, spot, purpose.partition(" ")[0])
    _dimensions(pen, (x0, y0), (width, height), [centre for centre, _, _ in holes])
    counts = Counter((purpose, diameter) for _, diameter, purpose in holes)
    _heading(pen, arranged, plate, counts, y0 + height + 12.0)
    pen.bar_100(8.0, 16.0, up=True, label="100 mm across")
    pen.bar_100(16.0, 6.0, label="100 mm along")
    return pen.sheet("clamp-plate", f"{design.title}: clamp plate", *sheet_mm)


def _number(value: object) -> float:
    assert isinstance(value, int | float)
    return float(value)


def _holes(arranged: Arranged, plate: Placed) -> Iterator[tuple[Point, float, str]]:
    """Centre from the plate's middle, diameter, and what goes through."""
    legs = list(_legs(arranged))
    holes = dict(plate.parameters)["holes"]
    assert isinstance(holes, tuple)
    for x, y, diameter in holes:
        place = plate.frame.point((x, y, 0.0))
        normal = plate.frame.z
        near = (purpose for point, purpose in legs if _aside(point, place, normal) < _NEAR_MM)
        yield (x, y), diameter, next(near, "bolt")


def _legs(arranged: Arranged) -> Iterator[tuple[Vector, str]]:
    """A point on the axis of every bolt of the clamp, and what it holds."""
    for placed in arranged.placed:
        if placed.owner != "clamp":
            continue
        if placed.part == "u_bolt":
            sizes = dict(placed.parameters)
            reach = (_number(sizes["inside_mm"]) + _number(sizes["rod_diameter_mm"])) / 2
            what = "mast U-bolt" if placed.name.startswith("mast") else "boom U-bolt"
            yield from ((placed.frame.point((side * reach, 0.0, 0.0)), what) for side in (-1, 1))
        elif placed.part == "screw":
            yield placed.frame.origin, "boom bolt"


def _aside(point: Vector, other: Vector, normal: Vector) -> float:
    """Distance of two points seen along a normal."""
    apart = [a - b for a, b in zip(point, other, strict=True)]
    depth = sum(a * n for a, n in zip(apart, normal, strict=True))
    return math.sqrt(sum((a - depth * n) ** 2 for a, n in zip(apart, normal, strict=True)))


def _dimensions(pen: Pen, corner: Point, size_mm: Point, centres: list[Point]) -> None:
    """Running dimensions from the left edge, and from the lower edge one beside the other."""
    (x0, y0), (width, height) = corner, size_mm
    xs = sorted({round(x + width / 2, 6) for x, _ in centres} | {width})
    pen.running([(x0, "0"), *((x0 + x, _short(x)) for x in xs)], origin_x_mm=x0, from_y_mm=y0, line_y_mm=y0 - 7.0)
    for count, y in enumerate(sorted({round(y + height / 2, 6) for _, y in centres} | {height})):
        pen.dimension(x0, y0, x0, y0 + y, _short(y), offset_mm=7.0 + 6.0 * count)


def _short(length_mm: float) -> str:
    return format_mm(length_mm).rstrip("0").rstrip(".")


def _drill(arranged: Arranged, diameter_mm: float) -> str:
    return tables.nearest_drill(diameter_mm, arranged.design.shop.drills).name


def _heading(pen: Pen, arranged: Arranged, plate: Placed, counts: Counter[tuple[str, float]], from_y_mm: float) -> None:
    up = _UP.get(plate.frame.y, "outwards")
    design, thickness_mm = arranged.design, _number(dict(plate.parameters)["thickness_mm"])
    kinds = [f"{count} for {what}s, drill {_drill(arranged, mm)}" for (what, mm), count in counts.items()]
    lines = [
        f"Holes: {'; '.join(kinds)}. Pilot every hole first.",
        f"Plate's middle at station {format_mm(plate.frame.origin[0])}. Arrow forward; the upper edge points {up}.",
        "Printed face towards the mast; the boom lies behind the plate, between the dashed lines.",
        f"{plate.material}, {thickness_mm:g} mm thick. Scale 1:1. {ABOUT_BARS}",
    ]
    lines.append(design.title)
    y = from_y_mm
    for line in lines:
        pen.text(16.0, y, shortened(line, 2.0, _LINE_MM), 2.0)
        y += 3.6
    pen.text(16.0, y + 0.6, shortened(f"{design.number} {design.revision}   clamp plate", 3.5, _LINE_MM), 3.5)
    right = _LEFT_MM + _number(dict(plate.parameters)["width_mm"])
    pen.line("text", right - 14.0, from_y_mm - 5.0, right - 2.5, from_y_mm - 5.0)
    pen.arrow(right, from_y_mm - 5.0, 0, layer="text")
    pen.text(right - 16.0, from_y_mm - 6.0, "forward", 2.0, anchor="end")
