"""One-piece sleeve: insulates a rod through both boom walls, inserted from one side.

Frame: as the bush; the body ends 0.3 mm inside the far wall's surface, so that the far keeper bears on the boom.
Printed flange down, the bore upright: no support.
"""

from fabgen.design.part_sizes import sleeve_size
from fabgen.model.kernel import cq
from fabgen.model.parts import bush as shoulder_bush

SOURCE = "printed"


def sleeve(
    *,
    rod_diameter_mm: float = 4.0,
    hole_diameter_mm: float = 8.0,
    boom_width_mm: float = 20.0,
    bore_mm: float | None = None,
    spigot_diameter_mm: float | None = None,
    flange_diameter_mm: float | None = None,
    flange_height_mm: float = 3.0,
    boom_diameter_mm: float = 0.0,
    hole_growth_mm: float = 0.0,
) -> cq.Workplane:
    """A sleeve.

    Args:
        rod_diameter_mm: the rod.
        hole_diameter_mm: the hole in both walls.
        boom_width_mm: outside of the boom along the rod; a round boom's diameter.
        bore_mm: left out: rod + 0.2.
        spigot_diameter_mm: left out: hole − 0.2.
        flange_diameter_mm: left out: hole + 4.
        flange_height_mm: above the wall's surface.
        boom_diameter_mm: a round boom's outside; 0 for flat walls.
        hole_growth_mm: added to the drawn bore.

    Returns:
        One solid.
    """
    return shoulder_bush.turned(
        sleeve_size(
            rod_diameter_mm=rod_diameter_mm,
            hole_diameter_mm=hole_diameter_mm,
            boom_width_mm=boom_width_mm,
            bore_mm=bore_mm,
            spigot_diameter_mm=spigot_diameter_mm,
            flange_diameter_mm=flange_diameter_mm,
            flange_height_mm=flange_height_mm,
            boom_diameter_mm=boom_diameter_mm,
            hole_growth_mm=hole_growth_mm,
        )
    )


def print_pose(part: cq.Workplane) -> cq.Workplane:
    """The part as it stands on the bed: flange down."""
    return shoulder_bush.print_pose(part)
