"""Hexagon nut (ISO 4032); the thread is not drawn.

Frame: axis = local z, from z = 0 to its height, flats towards ±y.
"""

from fabgen.design.part_sizes import nut_size
from fabgen.model.kernel import cq, cut, part_of
from fabgen.model.shapes import X, Z, hexagon, upright

SOURCE = "bought"


def nut(*, thread: str = "M3") -> cq.Workplane:
    """A nut.

    Args:
        thread: for example `M3`.

    Returns:
        One solid.
    """
    size = nut_size(thread=thread)
    body = hexagon(size.across_flats_mm, (0.0, 0.0, 0.0), Z, X, size.height_mm)
    return part_of(cut(body, upright(size.bore_mm, (0.0, 0.0), (-1.0, size.height_mm + 1))))
