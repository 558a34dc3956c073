"""Screw: socket head (ISO 4762), hexagon head (ISO 4017), button (ISO 7380-1) or pan head (ISO 7045); thread not drawn.

Frame: axis = local z, origin under the head, head at z ≥ 0, shank from z = −length to 0.
"""

from fabgen.design.part_sizes import screw_size
from fabgen.model.kernel import cq, cut, fused, part_of
from fabgen.model.shapes import Y, Z, hexagon, upright
from fabgen.stock.fasteners import HeadKind

SOURCE = "bought"


def screw(*, thread: str = "M3", length_mm: float = 8.0, head: HeadKind = "socket") -> cq.Workplane:
    """A screw.

    Args:
        thread: for example `M3`.
        length_mm: under the head.
        head: its kind.

    Returns:
        One solid.
    """
    size = screw_size(thread=thread, length_mm=length_mm, head=head)
    high, flats = size.head.height_mm, size.head.across_flats_mm
    if size.head.kind == "hex":
        top: cq.Shape = hexagon(flats, (0.0, 0.0, 0.0), Z, Y, high)
    else:
        top = upright(size.head.diameter_mm, (0.0, 0.0), (0.0, high))
    solid = fused(top, upright(size.diameter_mm, (0.0, 0.0), (-size.length_mm, 0.0)))
    if size.socket_mm:
        solid = cut(solid, hexagon(flats, (0.0, 0.0, high - size.socket_mm), Z, Y, size.socket_mm + 1))
    return part_of(solid)
