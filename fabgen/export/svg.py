"""SVG: one user unit is one millimetre, one group per layer.

The sheet's y axis points up, SVG's points down: y is flipped here and nowhere else. Coordinates are written to 1e-6 mm.
This is the only module that knows svgwrite, which carries no types and is easily replaced.
"""

from typing import Any

import svgwrite

from fabgen.design.drawing import LAYERS, Arc, Circle, Fill, Item, Layer, Line, Point, Polyline, Sheet, Text
from fabgen.design.lettering import CAP_EM, text_width_mm

FONT_FAMILY = "'DejaVu Sans', sans-serif"


def svg(sheet: Sheet) -> bytes:
    """Write one sheet.

    Args:
        sheet: the recording.

    Returns:
        An SVG 1.1 document in UTF-8, width and height in mm, equal for equal sheets.
    """
    width, height = _number(sheet.width_mm), _number(sheet.height_mm)
    drawing = svgwrite.Drawing(
        size=(f"{width}mm", f"{height}mm"), viewBox=f"0 0 {width} {height}", profile="full", debug=False
    )
    drawing.set_desc(title=Text("text", 0, 0, sheet.title).text)
    for layer, items in sheet.by_layer():
        if items:
            group = drawing.g(id=layer, **_style(layer))
            for item in items:
                group.add(_element(drawing, item, sheet.height_mm))
            drawing.add(group)
    return f'<?xml version="1.0" encoding="UTF-8"?>\n{drawing.tostring()}\n'.encode()


def _style(layer: Layer) -> dict[str, Any]:
    stroke = LAYERS[layer]
    style = {
        "fill": "none",
        "stroke": _colour(layer),
        "stroke_width": _number(stroke.width_mm),
        "stroke_linecap": "butt",
        "stroke_linejoin": "miter",
    }
    if stroke.dash_mm:
        style["stroke_dasharray"] = " ".join(str(_number(dash)) for dash in stroke.dash_mm)
    return style


def _element(drawing: Any, item: Item, height_mm: float) -> Any:
    """One svgwrite element for one item."""

    def at(x_mm: float, y_mm: float) -> Point:
        return (_number(x_mm), _number(height_mm - y_mm))

    match item:
        case Line():
            return drawing.line(at(item.x0_mm, item.y0_mm), at(item.x1_mm, item.y1_mm))
        case Polyline():
            points = [at(x, y) for x, y in item.points_mm]
            return drawing.polygon(points) if item.closed else drawing.polyline(points)
        case Circle():
            return drawing.circle(at(item.x_mm, item.y_mm), _number(item.radius_mm))
        case Arc():
            (x0, y0), (x1, y1) = at(*item.point(item.start_deg)), at(*item.point(item.end_deg))
            radius, large = _number(item.radius_mm), int(item.end_deg - item.start_deg > 180)
            return drawing.path(f"M {x0} {y0} A {radius} {radius} 0 {large} 0 {x1} {y1}")
        case Fill():
            points = [at(x, y) for x, y in item.points_mm]
            return drawing.polygon(points, fill=_colour(item.layer), stroke="none")
        case Text():
            return _text(drawing, item, at(item.x_mm, item.y_mm))


def _text(drawing: Any, item: Text, anchor: Point) -> Any:
    element = drawing.text(
        item.text,
        insert=anchor,
        font_family=FONT_FAMILY,
        font_size=_number(item.height_mm / CAP_EM),
        text_anchor=item.anchor,
        fill=_colour(item.layer),
        stroke="none",
        style="font-kerning:none;font-variant-ligatures:none;white-space:pre",
    )
    width = text_width_mm(item.text, item.height_mm)
    if width > 0:  # a viewer without the font squeezes its own into the room that was reckoned with
        element.attribs["textLength"] = _number(width)
        element.attribs["lengthAdjust"] = "spacingAndGlyphs"
    if item.angle_deg:
        x, y = anchor
        element.attribs["transform"] = f"rotate({_number(-item.angle_deg)} {x} {y})"
    return element


def _colour(layer: Layer) -> str:
    return "#{:02x}{:02x}{:02x}".format(*LAYERS[layer].colour)


def _number(value: float) -> float | int:
    """A coordinate to 1e-6 mm, without a negative zero and without `.0`."""
    rounded = round(value, 6) + 0.0
    return int(rounded) if rounded.is_integer() else rounded
