"""PDF: one page per sheet, the page is the paper, everything vector at exactly 1:1.

Sheets travel to the typesetter as JSON data beside a fixed program (`sheet.typ`), so no text of a design is ever read
as markup. The font is a file of this environment, the time stamp is fixed: equal sheets give equal bytes.
"""

import json
import math
from collections.abc import Sequence
from pathlib import Path
from typing import Any

import typst

from fabgen.design.drawing import LAYERS, Arc, Circle, Fill, Item, Line, Point, Polyline, Sheet, Text
from fabgen.design.lettering import CAP_EM
from fabgen.errors import ProgramError
from fabgen.export.fonts import FAMILY, font_file

_PROGRAM = Path(__file__).with_name("sheet.typ")
_SCALED = b"/Lang(en)/ViewerPreferences<</Direction/L2R>>"
_UNSCALED = b"/ViewerPreferences<</PrintScaling/None>>".ljust(len(_SCALED))
"""Asks print dialogs to offer 100 % first, not fit-to-page; of equal length, so that no offset in the file moves.

Source: ISO 32000-1:2008, table 150, viewer preferences (from memory).
"""

_LARGEST_TURN_DEG = 45.0
"""A cubic over 45° leaves its circle by 4e-6 of the radius, over 90° by 3e-4."""


def pdf(sheets: Sequence[Sheet], title: str) -> bytes:
    """Write sheets as the pages of one document.

    Args:
        sheets: at least one; sizes may differ.
        title: the document's title.

    Returns:
        A PDF document, equal for equal sheets.

    Raises:
        MachineError: the font is missing.
        ProgramError: there is no sheet, or the typesetter refuses the program or warns, as it does when a font is lost.
    """
    if not sheets:
        raise ProgramError("a PDF needs at least one sheet")
    data = {
        "title": Text("text", 0, 0, title).text,
        "font": FAMILY,
        "styles": {
            name: {"width": stroke.width_mm, "dash": stroke.dash_mm, "colour": stroke.colour}
            for name, stroke in LAYERS.items()
        },
        "sheets": [_page(sheet) for sheet in sheets],
    }
    try:
        written, warnings = typst.compile_with_warnings(
            str(_PROGRAM),
            font_paths=[str(font_file().parent)],
            ignore_system_fonts=True,
            format="pdf",
            sys_inputs={"sheets": json.dumps(data)},
            timestamp=0,
            pdf_tags=False,
        )
    except typst.TypstError as error:
        raise ProgramError(f"the PDF could not be typeset: {error}") from error
    if warnings or not isinstance(written, bytes):
        raise ProgramError(f"the PDF was not typeset as planned: {'; '.join(map(str, warnings))}")
    start = written.rfind(b"/Type/Catalog")
    catalog = written[start:]
    if start < 0 or _SCALED not in catalog:
        raise ProgramError("the PDF's catalogue has another form than expected, print scaling cannot be switched off")
    return written[:start] + catalog.replace(_SCALED, _UNSCALED, 1)


def _page(sheet: Sheet) -> dict[str, Any]:
    layers = [(name, [_data(item, sheet.height_mm) for item in items]) for name, items in sheet.by_layer()]
    return {"width": sheet.width_mm, "height": sheet.height_mm, "layers": layers}


def _data(item: Item, height_mm: float) -> dict[str, Any]:
    """An item as the program reads it: coordinates from above left, curves as cubics."""

    def at(point: Point) -> Point:
        return (round(point[0], 6), round(height_mm - point[1], 6))

    match item:
        case Text():
            return {
                "text": item.text,
                "at": at((item.x_mm, item.y_mm)),
                "size": item.height_mm / CAP_EM,
                "anchor": item.anchor,
                "angle": item.angle_deg,
            }
        case Line():
            points: list[list[Point]] = [[(item.x0_mm, item.y0_mm)], [(item.x1_mm, item.y1_mm)]]
        case Polyline() | Fill():
            points = [[point] for point in item.points_mm]
        case Arc():
            points = _cubics(item)
        case Circle():
            points = _cubics(Arc(item.layer, item.x_mm, item.y_mm, item.radius_mm, 0, 360))
    filled = isinstance(item, Fill)
    closed = filled or isinstance(item, Circle) or (isinstance(item, Polyline) and item.closed)
    steps = [[at(point) for point in step] for step in points]
    return {"start": steps[0][0], "steps": steps[1:], "closed": closed, "filled": filled}


def _cubics(arc: Arc) -> list[list[Point]]:
    """The start of an arc, then for each piece of it two control points and the end."""
    pieces = math.ceil((arc.end_deg - arc.start_deg) / _LARGEST_TURN_DEG)
    turn_deg = (arc.end_deg - arc.start_deg) / pieces
    reach_mm = 4 / 3 * math.tan(math.radians(turn_deg) / 4) * arc.radius_mm
    steps = [[arc.point(arc.start_deg)]]
    for k in range(pieces):
        first, last = arc.start_deg + k * turn_deg, arc.start_deg + (k + 1) * turn_deg
        (x0, y0), (x1, y1) = arc.point(first), arc.point(last)
        a, b = math.radians(first), math.radians(last)
        out = (x0 - reach_mm * math.sin(a), y0 + reach_mm * math.cos(a))
        back = (x1 + reach_mm * math.sin(b), y1 - reach_mm * math.cos(b))
        steps.append([out, back, (x1, y1)])
    return steps
