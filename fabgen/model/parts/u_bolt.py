"""U-bolt: holds mast or boom on the clamp plate; threads are not drawn.

Frame: origin at the bow's centre, bow towards +z, legs along −z at x = ±(inside + rod)/2.
"""

from fabgen.design.part_sizes import u_bolt_size
from fabgen.model.kernel import cq, fused, part_of
from fabgen.model.shapes import upright

SOURCE = "bought"


def u_bolt(*, inside_mm: float = 38.0, rod_diameter_mm: float = 6.0, leg_mm: float = 50.0) -> cq.Workplane:
    """A U-bolt.

    Args:
        inside_mm: clear width between the legs.
        rod_diameter_mm: of the rod it is bent from.
        leg_mm: length of each straight leg.

    Returns:
        One solid.
    """
    size = u_bolt_size(inside_mm=inside_mm, rod_diameter_mm=rod_diameter_mm, leg_mm=leg_mm)
    x = size.spacing_mm / 2
    circle = cq.Workplane("XY", origin=(x, 0.0, 0.0)).circle(size.rod_diameter_mm / 2)
    bow = circle.revolve(180, (-x, 0.0), (-x, -1.0)).val()
    assert isinstance(bow, cq.Shape)
    legs = [upright(size.rod_diameter_mm, (side * x, 0.0), (-size.leg_mm, 0.0)) for side in (-1, 1)]
    return part_of(fused(bow, *legs))
