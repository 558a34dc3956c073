"""Sizes of the centring aid.

Frame: the gauge rod's axis is local z, the datum face z = 0 looks along −z, the arm points to +x and crosses the rod
that is to be centred at x = reach; a clamp screw comes from −x.
"""

import math

from fabgen.design.arranged import Box
from fabgen.design.bush_sizes import EDGE_MM
from fabgen.design.part_fasteners import Fastener, fastener, sold_length_mm
from fabgen.design.part_geometry import PI, bore_chamfer_mm3, disc_mm2, integral, teardrop_chord_mm
from fabgen.frozen import frozen
from fabgen.stock.practice import print_practice

WALL_MM = 3.0
HEIGHT_MM = 12.0
ARM_MM = 6.0
NUT_WALL_MM = 2.0
"""Plastic between the nut and the gauge rod."""
SCREW_WALL_MM = 2.5
"""Plastic outside the nut."""
NUT_PLAY_MM = 0.3
BEYOND_MM = 2.0
CLEAR_MM = 1.0
"""Between the block on the boom's wall and the flange or keeper beside it."""


@frozen
class CentringAidSize:
    """One of the two equal blocks.

    Attributes:
        rod_diameter_mm: of the rod to centre and of the gauge rod, an offcut of the same bar.
        reach_mm: from the gauge rod's axis to the axis of the rod to centre.
        bore_mm: as it shall come out of the printer.
        screw: thread of the clamp screw.
        hole_growth_mm: added to the drawn bores.
    """

    rod_diameter_mm: float
    reach_mm: float
    bore_mm: float
    screw: str
    hole_growth_mm: float

    @property
    def fastener(self) -> Fastener:
        """The clamp screw's thread and nut."""
        return fastener(self.screw)

    @property
    def drawn_bore_mm(self) -> float:
        """Bore of the solid."""
        return self.bore_mm + self.hole_growth_mm

    @property
    def clearance_mm(self) -> float:
        """Drawn diameter of the clamp screw's hole."""
        return self.fastener.clearance_mm + self.hole_growth_mm

    @property
    def sight_mm(self) -> float:
        """Drawn diameter of the hole in the arm through which the rod's tip is seen."""
        return self.rod_diameter_mm / 2 + self.hole_growth_mm

    @property
    def nut_x_mm(self) -> tuple[float, float]:
        """Limits of the nut's slot along the screw."""
        near = -(self.bore_mm / 2 + NUT_WALL_MM)
        return near - self.fastener.nut_height_mm - NUT_PLAY_MM, near

    @property
    def nut_y_mm(self) -> float:
        """Half the width of the nut's slot, which holds the nut by its flats."""
        return (self.fastener.nut_across_flats_mm + NUT_PLAY_MM) / 2

    @property
    def screw_z_mm(self) -> float:
        """Height of the screw's axis over the datum face."""
        return HEIGHT_MM / 2

    @property
    def slot_z_mm(self) -> float:
        """Floor of the nut's slot: a corner of the nut stands on it."""
        return self.screw_z_mm - (self.fastener.nut_across_flats_mm + NUT_PLAY_MM) / math.sqrt(3)

    @property
    def body_x_mm(self) -> tuple[float, float]:
        """Limits of the body along the arm."""
        return self.nut_x_mm[0] - SCREW_WALL_MM, self.bore_mm / 2 + WALL_MM

    @property
    def half_width_mm(self) -> float:
        """Half the width of body and arm, across the arm."""
        return max(self.bore_mm / 2 + WALL_MM, self.nut_y_mm + NUT_WALL_MM)

    @property
    def arm_end_mm(self) -> float:
        """Where the arm ends."""
        return self.reach_mm + self.rod_diameter_mm / 2 + BEYOND_MM

    @property
    def screw_length_mm(self) -> float:
        """Length to buy: the shortest that reaches the gauge rod with a turn to spare."""
        least = -self.body_x_mm[0] - self.rod_diameter_mm / 2 + 1.0
        return sold_length_mm(least)

    @property
    def volume_mm3(self) -> float:
        """Volume of the solid."""
        low, high = self.body_x_mm
        width = 2 * self.half_width_mm
        blocks = width * ((high - low) * HEIGHT_MM + (self.arm_end_mm - high) * ARM_MM)
        bore = disc_mm2(self.drawn_bore_mm) * HEIGHT_MM + 2 * bore_chamfer_mm3(self.drawn_bore_mm, EDGE_MM)
        slot = (self.nut_x_mm[1] - self.nut_x_mm[0]) * 2 * self.nut_y_mm * (HEIGHT_MM - self.slot_z_mm)
        outside = (self.nut_x_mm[0] - low) * (1 + 0.75 * PI) * (self.clearance_mm / 2) ** 2
        return blocks - bore - disc_mm2(self.sight_mm) * ARM_MM - slot - outside - self._way_to_rod_mm3

    @property
    def _way_to_rod_mm3(self) -> float:
        """The screw's hole from the nut's slot to the bore."""
        radius, bore, near = self.clearance_mm / 2, self.drawn_bore_mm / 2, -self.nut_x_mm[1]

        def piece(angle: float) -> float:
            y = radius * math.sin(angle)
            return teardrop_chord_mm(2 * radius, y) * radius * math.cos(angle) * (near - math.sqrt(bore**2 - y**2))

        return 2 * (integral(piece, 0.0, PI / 4) + integral(piece, PI / 4, PI / 2))

    @property
    def shapes(self) -> tuple[Box, Box]:
        """Body and arm: an envelope, holes not taken out."""
        (low, high), y = self.body_x_mm, self.half_width_mm
        return Box((low, -y, 0.0), (high, y, HEIGHT_MM)), Box((high, -y, 0.0), (self.arm_end_mm, y, ARM_MM))


def centring_aid_size(
    *,
    rod_diameter_mm: float = 4.0,
    clear_mm: float = 12.0,
    bore_mm: float | None = None,
    screw: str | None = None,
    hole_growth_mm: float = 0.0,
) -> CentringAidSize:
    """Sizes of a centring aid: bore rod + 0.3, clamp screw M3, on rods under 4 mm M2 (common practice).

    Raises:
        ValueError: the clamp screw is wider than the gauge rod.
    """
    thread = ("M2" if rod_diameter_mm < 4.0 else "M3") if screw is None else screw
    bore = rod_diameter_mm + print_practice("saddle_bore_clearance_mm") if bore_mm is None else bore_mm
    trial = CentringAidSize(rod_diameter_mm, 0.0, bore, thread, hole_growth_mm)
    if trial.clearance_mm >= trial.drawn_bore_mm:
        raise ValueError(f"a gauge rod of {rod_diameter_mm:.3f} mm is thinner than the hole for {thread}")
    reach = max(clear_mm, rod_diameter_mm) / 2 + CLEAR_MM + trial.half_width_mm
    return CentringAidSize(rod_diameter_mm, reach, bore, thread, hole_growth_mm)
