"""Push-on keeper: a split ring that grips the rod and stops it sliding through its bushes.

Frame: axis = local z, origin on the face that meets the flange, slit at +x. Printed standing on that face, the bore
upright: no support.
"""

from fabgen.design.part_sizes import push_ring_size
from fabgen.model.kernel import cq, cut, on_bed, part_of
from fabgen.model.shapes import box, revolved

SOURCE = "printed"


def push_ring(
    *,
    rod_diameter_mm: float = 4.0,
    bore_mm: float | None = None,
    outside_diameter_mm: float | None = None,
    length_mm: float = 5.0,
    slit_mm: float = 1.0,
    hole_growth_mm: float = 0.0,
) -> cq.Workplane:
    """A split ring.

    Args:
        rod_diameter_mm: the rod.
        bore_mm: left out: rod − 0.3.
        outside_diameter_mm: left out: rod + 3.2.
        length_mm: along the rod.
        slit_mm: width of the slit before the ring is opened.
        hole_growth_mm: added to the drawn bore.

    Returns:
        One solid.
    """
    size = push_ring_size(
        rod_diameter_mm=rod_diameter_mm,
        bore_mm=bore_mm,
        outside_diameter_mm=outside_diameter_mm,
        length_mm=length_mm,
        slit_mm=slit_mm,
        hole_growth_mm=hole_growth_mm,
    )
    outer, bore, lead, high = size.outside_mm / 2, size.drawn_bore_mm / 2, size.lead_in_mm, size.length_mm
    ring = revolved(
        [(bore + lead, 0), (outer, 0), (outer, high), (bore + lead, high), (bore, high - lead), (bore, lead)]
    )
    half = size.slit_mm / 2
    return part_of(cut(ring, box((0.0, outer + 1), (-half, half), (-1.0, high + 1))))


def print_pose(part: cq.Workplane) -> cq.Workplane:
    """The part as it stands on the bed."""
    return on_bed(part)
