"""Sizes of the parts that hold a rod in a boom wall: shoulder bush and one-piece sleeve.

Frame of both: local z outward along the rod, origin on the boom wall's outer surface (round tube: the crown) at the
hole's axis. Fits are diametral, from the table of printing practice: bore = rod + 0.2, spigot = hole − 0.2, spigot
length = wall + 1, flange = hole + 4.
"""

from fabgen.design.arranged import Cylinder
from fabgen.design.part_geometry import (
    bore_chamfer_mm3,
    drop_mm,
    outer_chamfer_mm3,
    ring_mm2,
    under_disc_mm3,
)
from fabgen.frozen import frozen
from fabgen.stock.practice import print_practice

EDGE_MM = 0.3
"""Chamfer where a first printed layer spreads."""


@frozen
class BushSize:
    """One shoulder bush, or a sleeve, whose body then reaches through both walls.

    Attributes:
        bore_mm: as it shall come out of the printer.
        spigot_mm: diameter of the body that stands in the hole.
        spigot_length_mm: from the wall's outer surface inwards.
        flange_mm: flange diameter.
        flange_height_mm: above the wall's outer surface.
        boom_diameter_mm: round tube with its axis along local x; 0 for a flat wall.
        hole_growth_mm: added to the drawn bore.
    """

    rod_diameter_mm: float
    hole_diameter_mm: float
    bore_mm: float
    spigot_mm: float
    spigot_length_mm: float
    flange_mm: float
    flange_height_mm: float
    boom_diameter_mm: float
    hole_growth_mm: float

    @property
    def drawn_bore_mm(self) -> float:
        """Bore of the solid."""
        return self.bore_mm + self.hole_growth_mm

    @property
    def spigot_wall_mm(self) -> float:
        """Plastic between rod bore and hole."""
        return (self.spigot_mm - self.bore_mm) / 2

    @property
    def lead_in_mm(self) -> float:
        """45° chamfer on the spigot's tip."""
        return min(0.4, self.spigot_wall_mm / 3)

    @property
    def bore_edge_mm(self) -> float:
        """45° chamfer on both ends of the bore."""
        return min(EDGE_MM, self.spigot_wall_mm / 4)

    @property
    def flange_edge_mm(self) -> float:
        """45° chamfer on the flange's outer rim."""
        return min(EDGE_MM, self.flange_height_mm / 4)

    @property
    def foot_drop_mm(self) -> float:
        """How far the concave foot reaches below the crown at the flange's rim; 0 on a flat wall."""
        return drop_mm(self.boom_diameter_mm, self.flange_mm / 2)

    @property
    def volume_mm3(self) -> float:
        """Exact volume of the solid."""
        flange = ring_mm2(self.flange_mm, self.drawn_bore_mm) * self.flange_height_mm
        spigot = ring_mm2(self.spigot_mm, self.drawn_bore_mm) * self.spigot_length_mm
        foot = under_disc_mm3(self.boom_diameter_mm, self.flange_mm)
        foot -= under_disc_mm3(self.boom_diameter_mm, self.spigot_mm)
        edges = outer_chamfer_mm3(self.spigot_mm, self.lead_in_mm)
        edges += outer_chamfer_mm3(self.flange_mm, self.flange_edge_mm)
        edges += 2 * bore_chamfer_mm3(self.drawn_bore_mm, self.bore_edge_mm)
        return flange + spigot + foot - edges

    @property
    def shapes(self) -> tuple[Cylinder, Cylinder]:
        """Flange and spigot in the local frame; on a round tube the flange is drawn down to its rim's foot."""
        low, high = -self.foot_drop_mm, self.flange_height_mm
        flange = Cylinder("z", (0.0, 0.0, (low + high) / 2), self.flange_mm, high - low, self.bore_mm)
        length = self.spigot_length_mm
        spigot = Cylinder("z", (0.0, 0.0, -length / 2), self.spigot_mm, length, self.bore_mm)
        return flange, spigot


def bush_size(
    *,
    rod_diameter_mm: float = 4.0,
    hole_diameter_mm: float = 8.0,
    wall_mm: float = 1.5,
    bore_mm: float | None = None,
    spigot_diameter_mm: float | None = None,
    spigot_length_mm: float | None = None,
    flange_diameter_mm: float | None = None,
    flange_height_mm: float = 3.0,
    boom_diameter_mm: float = 0.0,
    hole_growth_mm: float = 0.0,
) -> BushSize:
    """Sizes of a shoulder bush; what is None follows the fits above.

    Raises:
        ValueError: a bush that cannot be: no wall left, no shoulder, or a flange wider than the round tube.
    """
    size = BushSize(
        rod_diameter_mm=rod_diameter_mm,
        hole_diameter_mm=hole_diameter_mm,
        bore_mm=rod_diameter_mm + print_practice("bush_bore_clearance_mm") if bore_mm is None else bore_mm,
        spigot_mm=hole_diameter_mm - print_practice("spigot_clearance_mm")
        if spigot_diameter_mm is None
        else spigot_diameter_mm,
        spigot_length_mm=wall_mm + print_practice("spigot_beyond_wall_mm")
        if spigot_length_mm is None
        else spigot_length_mm,
        flange_mm=hole_diameter_mm + print_practice("flange_beyond_hole_mm")
        if flange_diameter_mm is None
        else flange_diameter_mm,
        flange_height_mm=flange_height_mm,
        boom_diameter_mm=boom_diameter_mm,
        hole_growth_mm=hole_growth_mm,
    )
    _require_possible(size)
    return size


def sleeve_size(
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
) -> BushSize:
    """Sizes of a one-piece sleeve, inserted from one side and ending 0.3 mm inside the far wall's surface.

    Raises:
        ValueError: a sleeve that cannot be.
    """
    return bush_size(
        rod_diameter_mm=rod_diameter_mm,
        hole_diameter_mm=hole_diameter_mm,
        bore_mm=bore_mm,
        spigot_diameter_mm=spigot_diameter_mm,
        spigot_length_mm=boom_width_mm - print_practice("keeper_play_mm"),
        flange_diameter_mm=flange_diameter_mm,
        flange_height_mm=flange_height_mm,
        boom_diameter_mm=boom_diameter_mm,
        hole_growth_mm=hole_growth_mm,
    )


def _require_possible(size: BushSize) -> None:
    if size.spigot_mm <= size.drawn_bore_mm + 2 * size.bore_edge_mm + 2 * size.lead_in_mm:
        raise ValueError(f"a bore of {size.drawn_bore_mm:.3f} mm leaves no wall in a spigot of {size.spigot_mm:.3f} mm")
    if size.flange_mm <= size.spigot_mm:
        raise ValueError(
            f"a flange of {size.flange_mm:.3f} mm makes no shoulder on a spigot of {size.spigot_mm:.3f} mm"
        )
    if 0 < size.boom_diameter_mm <= size.flange_mm:
        raise ValueError(
            f"a flange of {size.flange_mm:.3f} mm is wider than a round boom of {size.boom_diameter_mm:.3f} mm"
        )
    if size.spigot_length_mm <= drop_mm(size.boom_diameter_mm, size.spigot_mm / 2) + size.lead_in_mm:
        raise ValueError(f"a spigot of {size.spigot_length_mm:.3f} mm does not reach into the round tube's hole")
