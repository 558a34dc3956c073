"""Letters and digits as solids, to be raised on a fixture or sunk into it."""

from fabgen.design import glyphs
from fabgen.model.kernel import cq
from fabgen.model.shapes import Triple


def lettering(
    text: str, middle_mm: Triple, right: Triple, up: Triple, cell_mm: float, height_mm: float
) -> list[cq.Shape]:
    """The letters of a text, standing on a plane.

    Args:
        text: letters of `glyphs.LETTERS`.
        middle_mm: middle of the text, on the plane.
        right: unit vector of reading.
        up: unit vector from the text's foot to its head; right × up points at the reader.
        cell_mm: side of one cell.
        height_mm: of the letters over the plane.
    """
    across, along = cq.Vector(*right), cq.Vector(*up)
    push = across.cross(along) * height_mm
    corner = cq.Vector(*middle_mm)
    corner -= across * (glyphs.width_cells(text) * cell_mm / 2) + along * (glyphs.HEIGHT_CELLS * cell_mm / 2)
    letters: list[cq.Shape] = []
    for letter, start in zip(text, glyphs.starts(text), strict=True):
        wires = [
            cq.Wire.makePolygon(
                [corner + across * (start + u) * cell_mm + along * v * cell_mm for u, v in loop], close=True
            )
            for loop in glyphs.outlines(letter)
        ]
        letters.append(cq.Solid.extrudeLinear(wires[0], wires[1:], push))
    return letters
