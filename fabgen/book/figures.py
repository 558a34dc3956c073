"""Drawings on the page: SVG that other stages wrote, made part of the document."""

import re

from markupsafe import Markup

from fabgen.design.drawing import Sheet
from fabgen.frozen import frozen

_PROLOGUE = re.compile(r"\A\s*(?:<\?xml[^>]*\?>\s*)?(?:<!DOCTYPE[^>]*>\s*)?")
_OPENING = re.compile(r"<svg\b[^>]*>")
_SIZE = re.compile(r'\s(?:width|height|baseProfile|version|xmlns:(?:ev|xlink))="[^"]*"')
_ID = re.compile(r'\sid="[^"]*"')


@frozen
class Figure:
    """One drawing.

    Attributes:
        name: what it shows; for a part its size name of the parts list.
        caption: one line below it.
        svg: a whole SVG document, written by the program itself.
        width_mm: at the drawing's own scale.
        height_mm: at the drawing's own scale.
    """

    name: str
    caption: str
    svg: str
    width_mm: float
    height_mm: float

    @property
    def wide(self) -> bool:
        """Whether it needs a page across."""
        return self.width_mm > self.height_mm and self.width_mm > 200.0

    @property
    def inline(self) -> Markup:
        """The drawing as an element of the page: its width set by the style sheet, without names that could clash."""
        body = _PROLOGUE.sub("", self.svg).strip()
        body = _OPENING.sub(lambda found: _SIZE.sub("", found[0]), body, count=1)
        sized = body.replace("<svg", f'<svg role="img" style="width:{self.width_mm:g}mm"', 1)
        return Markup(_ID.sub("", sized))  # noqa: S704 # the program's own writer escapes text


def figure(sheet: Sheet, svg: bytes) -> Figure:
    """A recorded sheet as a figure.

    Args:
        sheet: what was drawn; its title becomes the caption.
        svg: the same sheet, written.
    """
    return Figure(sheet.name, sheet.title, svg.decode("utf-8"), sheet.width_mm, sheet.height_mm)
