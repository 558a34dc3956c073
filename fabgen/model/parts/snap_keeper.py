"""Snap keeper: a C-shaped clip pressed on the rod from the side, for rods that are already in place.

Frame: axis = local z, origin on the face that meets the flange, mouth at +x. Printed standing on that face, the bore
upright: no support.
"""

from fabgen.design.part_sizes import snap_keeper_size
from fabgen.model.kernel import cq, cut, on_bed, part_of
from fabgen.model.shapes import X, Z, prism, upright

SOURCE = "printed"


def snap_keeper(
    *,
    rod_diameter_mm: float = 4.0,
    bore_mm: float | None = None,
    outside_diameter_mm: float | None = None,
    length_mm: float = 6.0,
    mouth_mm: float | None = None,
    hole_growth_mm: float = 0.0,
) -> cq.Workplane:
    """A clip.

    Args:
        rod_diameter_mm: the rod.
        bore_mm: left out: rod − 0.2.
        outside_diameter_mm: left out: rod + 3.2, for thin rods 1.8 × rod.
        length_mm: along the rod.
        mouth_mm: left out: 0.91 × rod.
        hole_growth_mm: added to the drawn bore.

    Returns:
        One solid.
    """
    size = snap_keeper_size(
        rod_diameter_mm=rod_diameter_mm,
        bore_mm=bore_mm,
        outside_diameter_mm=outside_diameter_mm,
        length_mm=length_mm,
        mouth_mm=mouth_mm,
        hole_growth_mm=hole_growth_mm,
    )
    high, half, end = size.length_mm, size.mouth_mm / 2, size.outside_mm / 2 + 1
    flare = half + end - size.flare_start_mm
    start = size.flare_start_mm
    # Corners are (u, v) = (−y, x).
    mouth = [(-half, 0.0), (half, 0.0), (half, start), (flare, end), (-flare, end), (-half, start)]
    ring = upright(size.outside_mm, (0.0, 0.0), (0.0, high))
    bore = upright(size.drawn_bore_mm, (0.0, 0.0), (-1.0, high + 1))
    return part_of(cut(ring, bore, prism(mouth, (0.0, 0.0, -1.0), Z, X, high + 2)))


def print_pose(part: cq.Workplane) -> cq.Workplane:
    """The part as it stands on the bed."""
    return on_bed(part)
