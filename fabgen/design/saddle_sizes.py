"""Sizes of the on-top saddle.

Frame: origin on the boom's top (round: its crown) under the rod; x along the boom, y along the rod, z up. A column
round the rod's bore stands between two ears with one screw each; the profile is constant along y, so that the saddle
prints lying on its −y side, the rod's bore upright.
"""

import math

from fabgen.design.arranged import Box
from fabgen.design.part_fasteners import fastener
from fabgen.design.part_geometry import (
    PI,
    disc_mm2,
    drop_mm,
    segment_mm2,
    teardrop_mm2,
    under_strip_mm2,
    under_teardrop_mm3,
)
from fabgen.design.top_block import COUNTERBORE_PLAY_MM, TopBlock
from fabgen.frozen import frozen
from fabgen.stock.practice import print_practice

EAR_WALL_MM = 1.6
FOOT_SHARE = 0.7
"""Width of a concave foot over the boom's diameter: inside 45° on both sides, so that it prints without support."""


@frozen
class SaddleSize(TopBlock):
    """One saddle.

    Attributes:
        width_mm: along the rod.
        wall_mm: plastic round the bore.
    """

    width_mm: float
    wall_mm: float

    @property
    def clearance_mm(self) -> float:
        """Diameter of the hole for the shank."""
        return self.fastener.clearance_mm

    @property
    def column_half_mm(self) -> float:
        """Half the column's thickness along the boom, and the radius of its top."""
        return self.bore_mm / 2 + self.wall_mm

    @property
    def fillet_mm(self) -> float:
        """Radius between ear and column."""
        return min(1.0, max(0.0, self.height_mm - self.ear_mm))

    @property
    def screw_x_mm(self) -> tuple[float, float]:
        """Where along x the two screws stand, on the centre line of the boom's top."""
        offset = self.column_half_mm + 1.0 + self.counterbore_mm / 2
        return -offset, offset

    @property
    def pitch_mm(self) -> float:
        """Distance between the two screws."""
        return 2 * self.screw_x_mm[1]

    @property
    def length_mm(self) -> float:
        """Footprint along the boom."""
        return self.pitch_mm + self.counterbore_mm + 2 * EAR_WALL_MM

    @property
    def top_mm(self) -> float:
        """Level of the highest point."""
        return max(self.height_mm + self.column_half_mm, self.ear_mm)

    @property
    def foot_width_mm(self) -> float:
        """Width of the concave foot; the underside beyond is flat."""
        return min(self.width_mm, FOOT_SHARE * self.boom_diameter_mm)

    @property
    def foot_drop_mm(self) -> float:
        """How far the underside reaches below the crown; 0 on a flat top."""
        return drop_mm(self.boom_diameter_mm, self.foot_width_mm / 2)

    @property
    def walls_mm(self) -> dict[str, float]:
        """Walls as drawn; a counterbore's apex points to +y."""
        counterbore = self.drawn_mm(self.counterbore_mm)
        return {
            "wall round the bore": self.column_half_mm - self.drawn_bore_mm / 2,
            "ear wall": EAR_WALL_MM - self.hole_growth_mm / 2,
            "ear wall at a counterbore's apex": self.width_mm / 2 - math.sqrt(0.5) * counterbore,
            "floor": self.height_mm - self.drawn_bore_mm / 2,
        }

    @property
    def volume_mm3(self) -> float:
        """Exact volume of the solid."""
        ears = (self.length_mm - 2 * self.column_half_mm) * self.ear_mm
        column = 2 * self.column_half_mm * max(self.height_mm, self.ear_mm)
        arch = segment_mm2(self.column_half_mm, max(0.0, self.ear_mm - self.height_mm))
        fillets = 2 * (1 - PI / 4) * self.fillet_mm**2
        profile = ears + column + arch + fillets - disc_mm2(self.drawn_bore_mm)
        foot = under_strip_mm2(self.boom_diameter_mm, self.foot_width_mm)
        if self.boom_diameter_mm:
            foot += (self.width_mm - self.foot_width_mm) * self.foot_drop_mm
        screw = teardrop_mm2(self.drawn_mm(self.clearance_mm)) * self.seat_mm
        screw += teardrop_mm2(self.drawn_mm(self.counterbore_mm)) * self.fastener.head_height_mm
        screw += under_teardrop_mm3(self.boom_diameter_mm, self.drawn_mm(self.clearance_mm))
        return profile * self.width_mm + foot * self.length_mm - 2 * screw

    @property
    def shapes(self) -> tuple[Box, ...]:
        """Base, fillets and column in the local frame: an envelope, the bore not taken out.

        A low saddle has no fillets, and no column where its ears reach over the rod's bore.
        """
        x, y, low = self.length_mm / 2, self.width_mm / 2, 0.0 - self.foot_drop_mm
        column, rounded = self.column_half_mm, self.column_half_mm + self.fillet_mm
        boxes = (
            Box((-x, -y, low), (x, y, self.ear_mm)),
            Box((-rounded, -y, self.ear_mm), (rounded, y, self.ear_mm + self.fillet_mm)),
            Box((-column, -y, self.ear_mm), (column, y, self.top_mm)),
        )
        return tuple(box for box in boxes if box.low[2] < box.high[2])


def saddle_size(
    *,
    rod_diameter_mm: float = 4.0,
    height_mm: float = 12.0,
    boom_width_mm: float = 20.0,
    boom_diameter_mm: float = 0.0,
    screw: str = "M3",
    bore_mm: float | None = None,
    width_mm: float | None = None,
    wall_mm: float = 3.0,
    hole_growth_mm: float = 0.0,
) -> SaddleSize:
    """Sizes of a saddle: bore rod + 0.3 (common practice), as wide as the boom (round: 0.7 of its diameter).

    Raises:
        ValueError: the rod lies too low for any plastic under its bore.
    """
    least_wall = print_practice("recommended_wall_mm")
    head = fastener(screw).head_diameter_mm + COUNTERBORE_PLAY_MM
    least = math.sqrt(2) * head + 2 * least_wall
    wanted = FOOT_SHARE * boom_diameter_mm if boom_diameter_mm else boom_width_mm
    size = SaddleSize(
        rod_diameter_mm=rod_diameter_mm,
        height_mm=height_mm,
        bore_mm=rod_diameter_mm + print_practice("saddle_bore_clearance_mm") if bore_mm is None else bore_mm,
        width_mm=max(wanted, least) if width_mm is None else width_mm,
        wall_mm=wall_mm,
        boom_diameter_mm=boom_diameter_mm,
        screw=screw,
        hole_growth_mm=hole_growth_mm,
    )
    if height_mm < size.bore_mm / 2 + least_wall:
        raise ValueError(
            f"a rod of {rod_diameter_mm:g} mm at {height_mm:g} mm leaves less than {least_wall:g} mm under its bore"
        )
    if size.width_mm < least:
        raise ValueError(f"a saddle {size.width_mm:g} mm wide has no room for the head of {screw}")
    return size
