"""How deep a hole goes before it is through a boom's wall everywhere."""

import math

from fabgen.design.design import Boom


def wall_depth_mm(boom: Boom, hole_mm: float) -> float:
    """From the outer surface (round: the crown) down to where a hole leaves the wall at its lowest edge.

    Args:
        boom: a tube.
        hole_mm: the hole's diameter.
    """
    inner_mm, half_mm = boom.inside_width_mm / 2, hole_mm / 2
    if boom.section != "round" or half_mm >= inner_mm:
        return boom.wall_mm
    return boom.width_mm / 2 - math.sqrt(inner_mm**2 - half_mm**2)
