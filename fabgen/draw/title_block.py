"""Drawing frame and title block.

Frame: 20 mm from the left edge for binding, 10 mm from the others, centring marks (ISO 5457). Title block: 180 mm wide
in the lower right corner with the fields of ISO 7200; a field the design leaves out is a blank for the pen.
The sheet leaves ISO 5457 where a shop's printer asks for it: A4 and Letter lie across, as an array does, the frame is
as wide as outlines, centring marks end at it, and there is no grid of references (the standard's side from memory).
"""

from fabgen.design.arranged import Arranged
from fabgen.design.drawing import Box
from fabgen.design.lettering import shortened
from fabgen.design.pen import LETTERING_MM, Pen
from fabgen.draw.words import allowance_words
from fabgen.frozen import frozen
from fabgen.stock.tables import paper

WIDTH_MM, HEIGHT_MM = 180.0, 36.0

_ROW_MM = HEIGHT_MM / 4
_CAPTION_MM = 1.8


@frozen
class Format:
    """A landscape sheet: its name, size and frame."""

    name: str
    width_mm: float
    height_mm: float
    frame: Box


def landscape(name: str) -> Format:
    """A sheet of the paper table, turned so that its longer side runs along x.

    Args:
        name: as in the table, for example `A3`.
    """
    found = paper(name)
    width, height = found.height_mm, found.width_mm
    binding, other = found.binding_margin_mm, found.other_margin_mm
    return Format(name, width, height, (binding, other, width - other, height - other))


def draw_frame(pen: Pen, sheet: Format) -> None:
    """The frame with a centring mark on each side."""
    left, low, right, high = sheet.frame
    pen.rectangle("outline", *sheet.frame)
    x, y = sheet.width_mm / 2, sheet.height_mm / 2
    pen.line("outline", x, 0.0, x, low)
    pen.line("outline", x, sheet.height_mm, x, high)
    pen.line("outline", 0.0, y, left, y)
    pen.line("outline", sheet.width_mm, y, right, y)


def draw_title_block(pen: Pen, sheet: Format, arranged: Arranged, document: str, scale: str) -> None:
    """The title block in the frame's lower right corner.

    Args:
        pen: records it.
        sheet: the format.
        arranged: for the design's fields and its status.
        document: document type.
        scale: for example `1:10`.
    """
    design = arranged.design
    fields = design.sheet
    rows = (
        (
            ("creator", fields.creator, 60.0),
            ("approval person", fields.approved, 60.0),
            ("document type", document, 60.0),
        ),
        (("legal owner", fields.owner, 60.0), ("title", design.title, 120.0)),
        (("supplementary title", allowance_words(arranged.ledger), 120.0), ("scale", f"{scale}, do not drill", 60.0)),
        (
            ("identification number", design.number, 82.0),
            ("revision", design.revision, 24.0),
            ("date of issue", fields.date, 30.0),
            ("lang.", "en", 12.0),
            ("size", sheet.name, 16.0),
            ("sheet", "1 / 1", 16.0),
        ),
    )
    right, low = sheet.frame[2], sheet.frame[1]
    top = low + HEIGHT_MM
    pen.rectangle("outline", right - WIDTH_MM, low, right, top)
    for count, cells in enumerate(rows):
        x, high = right - WIDTH_MM, top - count * _ROW_MM
        if count:
            pen.line("frame", x, high, right, high)
        for caption, content, width in cells:
            if x > right - WIDTH_MM:
                pen.line("frame", x, high, x, high - _ROW_MM)
            pen.text(x + 1.2, high - 1.0, caption, _CAPTION_MM, level="top")
            pen.text(x + 1.2, high - _ROW_MM + 1.6, shortened(content, LETTERING_MM, width - 2.4))
            x += width
