"""DXF: millimetres in the header, one layer per kind of line, for CAD and cutting machines.

A sheet's frame is DXF's own (x right, y up), so coordinates pass unchanged. Time stamps, library version and file
identity are fixed, so equal sheets give equal bytes.
"""

import io

from ezdxf import options, units  # type: ignore[attr-defined]  # public, but not marked as exported
from ezdxf.colors import rgb2int
from ezdxf.document import Drawing
from ezdxf.enums import TextEntityAlignment
from ezdxf.filemanagement import new
from ezdxf.layouts.layout import Modelspace

from fabgen.design.drawing import LAYERS, Arc, Circle, Fill, Item, Line, Polyline, Sheet, Text

_VERSION = "R2010"
_STYLE = "lettering"
_ALIGN = {
    "start": TextEntityAlignment.LEFT,
    "middle": TextEntityAlignment.CENTER,
    "end": TextEntityAlignment.RIGHT,
}


def dxf(sheet: Sheet) -> bytes:
    """Write one sheet.

    Args:
        sheet: the recording.

    Returns:
        A DXF R2010 document in UTF-8, equal for equal sheets.
    """
    fixed = options.write_fixed_meta_data_for_testing
    options.write_fixed_meta_data_for_testing = True
    try:
        document = _document(sheet)
        space = document.modelspace()
        for _, items in sheet.by_layer():
            for item in items:
                _add(space, item)
        for kind in sorted(document.entitydb.dxf_types_in_use()):  # the library would take them in order of a set
            document.classes.add_class(kind)
        stream = io.StringIO(newline="\n")
        document.write(stream)
    finally:
        options.write_fixed_meta_data_for_testing = fixed
    return stream.getvalue().encode("utf-8")


def _document(sheet: Sheet) -> Drawing:
    """An empty document with units, sheet size, layers, line types and the lettering style."""
    document = new(_VERSION, units=units.MM)
    document.header["$MEASUREMENT"] = 1
    document.header["$LTSCALE"] = 1.0
    low, high = (0.0, 0.0), (sheet.width_mm, sheet.height_mm)
    document.header["$LIMMIN"], document.header["$LIMMAX"] = low, high
    document.header["$EXTMIN"], document.header["$EXTMAX"] = (*low, 0.0), (*high, 0.0)
    document.modelspace().reset_extents((*low, 0.0), (*high, 0.0))
    document.modelspace().reset_limits(low, high)
    document.styles.add(_STYLE, font="DejaVuSans.ttf")
    for name, stroke in LAYERS.items():
        line_type = "CONTINUOUS"
        if stroke.dash_mm:
            line_type = name.upper()
            pattern = [length if i % 2 == 0 else -length for i, length in enumerate(stroke.dash_mm)]
            document.linetypes.add(line_type, [sum(stroke.dash_mm), *pattern], description=f"{name} line")
        layer = document.layers.add(name, linetype=line_type, lineweight=round(stroke.width_mm * 100))
        if any(stroke.colour):
            layer.dxf.true_color = rgb2int(stroke.colour)
    return document


def _add(space: Modelspace, item: Item) -> None:
    on = {"layer": item.layer}
    match item:
        case Line():
            space.add_line((item.x0_mm, item.y0_mm), (item.x1_mm, item.y1_mm), dxfattribs=on)
        case Polyline():
            space.add_lwpolyline(item.points_mm, close=item.closed, dxfattribs=on)
        case Circle():
            space.add_circle((item.x_mm, item.y_mm), item.radius_mm, dxfattribs=on)
        case Arc():
            centre = (item.x_mm, item.y_mm)
            space.add_arc(centre, item.radius_mm, item.start_deg % 360, item.end_deg % 360, dxfattribs=on)
        case Fill():
            hatch = space.add_hatch(color=256, dxfattribs=on)
            hatch.paths.add_polyline_path(item.points_mm, is_closed=True)
        case Text():
            text = space.add_text(_escaped(item.text), height=item.height_mm, rotation=item.angle_deg, dxfattribs=on)
            text.dxf.style = _STYLE
            text.set_placement((item.x_mm, item.y_mm), align=_ALIGN[item.anchor])


def _escaped(text: str) -> str:
    """Text in which CAD reads no codes: `%%` starts one, `^` makes the next character a control character."""
    return text.replace("%%", "%%%%%%").replace("^", "^ ")
