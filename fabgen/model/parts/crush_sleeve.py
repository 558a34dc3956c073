"""Crush sleeve: a metal spacer round a bolt that keeps a thin tube from being squeezed flat.

Frame: axis = local z, from z = 0 to its length.
"""

from fabgen.design.part_sizes import TubeSize, crush_sleeve_size
from fabgen.model.kernel import cq, cut, part_of
from fabgen.model.shapes import upright

SOURCE = "made"


def crush_sleeve(*, length_mm: float = 17.0, bore_mm: float = 6.6, outside_mm: float = 10.0) -> cq.Workplane:
    """A spacer.

    Args:
        length_mm: the tube's inside height.
        bore_mm: clearance for the bolt.
        outside_mm: outside diameter.

    Returns:
        One solid.
    """
    return tube(crush_sleeve_size(length_mm=length_mm, bore_mm=bore_mm, outside_mm=outside_mm))


def tube(size: TubeSize) -> cq.Workplane:
    """The solid of a plain tube."""
    outer = upright(size.outside_mm, (0.0, 0.0), (0.0, size.length_mm))
    return part_of(cut(outer, upright(size.bore_mm, (0.0, 0.0), (-1.0, size.length_mm + 1))))
