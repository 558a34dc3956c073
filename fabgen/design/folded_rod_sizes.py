"""Sizes of the folded dipole's bent rod.

Frame: a flat loop in y and z, origin at the middle of the gap in the lower, fed limb; upper limb at z = spacing.
"""

from fabgen.design.arranged import Box, Cylinder
from fabgen.design.hardware_sizes import crossing_mm3
from fabgen.design.part_geometry import PI, disc_mm2
from fabgen.frozen import frozen


@frozen
class FoldedRodSize:
    """A rod bent to a flat loop in y and z, origin at the middle of the gap in the lower limb.

    Attributes:
        length_mm: over the outside of both bends.
        spacing_mm: centre to centre of the limbs; the bend radius is half of it.
        gap_mm: between the fed ends.
        cross_hole_mm: hole along x through both fed ends; 0 for none.
        cross_hole_from_end_mm: from a fed end to the middle of that hole.
    """

    length_mm: float
    spacing_mm: float
    diameter_mm: float
    gap_mm: float
    cross_hole_mm: float
    cross_hole_from_end_mm: float

    @property
    def bend_radius_mm(self) -> float:
        """Radius of the bends' centre line."""
        return self.spacing_mm / 2

    @property
    def straight_mm(self) -> float:
        """Length of the upper limb between the bends."""
        return self.length_mm - self.spacing_mm - self.diameter_mm

    @property
    def fed_mm(self) -> float:
        """Length of each straight fed half."""
        return (self.straight_mm - self.gap_mm) / 2

    @property
    def developed_mm(self) -> float:
        """Length to saw: the centre line's."""
        return 2 * self.straight_mm + PI * self.spacing_mm - self.gap_mm

    @property
    def volume_mm3(self) -> float:
        """Exact volume of the solid."""
        holes = 2 * crossing_mm3(self.diameter_mm, self.cross_hole_mm)
        return self.developed_mm * disc_mm2(self.diameter_mm) - holes

    @property
    def shapes(self) -> tuple[Cylinder | Box, ...]:
        """Limbs as cylinders, bends as boxes, in the local frame."""
        r, y, s = self.diameter_mm / 2, self.straight_mm / 2, self.spacing_mm
        fed_middle = self.gap_mm / 2 + self.fed_mm / 2
        limbs = [Cylinder("y", (0.0, side * fed_middle, 0.0), 2 * r, self.fed_mm) for side in (-1, 1)]
        end = self.length_mm / 2
        bends = [Box((-r, low, -r), (r, high, s + r)) for low, high in ((-end, -y), (y, end))]
        return (*limbs, Cylinder("y", (0.0, 0.0, s), 2 * r, 2 * y), *bends)


def folded_rod_size(
    *,
    length_mm: float = 320.0,
    spacing_mm: float = 30.0,
    diameter_mm: float = 4.0,
    gap_mm: float = 10.0,
    cross_hole_mm: float = 0.0,
    cross_hole_from_end_mm: float = 4.4,
) -> FoldedRodSize:
    """Sizes of a bent rod.

    Raises:
        ValueError: too short for its bends and gap, limbs that touch, or ends without room for their holes.
    """
    size = FoldedRodSize(length_mm, spacing_mm, diameter_mm, gap_mm, cross_hole_mm, cross_hole_from_end_mm)
    if size.fed_mm <= 0 or spacing_mm <= diameter_mm:
        raise ValueError(f"a folded rod of {length_mm:g} mm has no room for limbs {spacing_mm:g} mm apart and its gap")
    beyond_mm = cross_hole_from_end_mm + cross_hole_mm / 2
    if cross_hole_mm and (cross_hole_mm >= diameter_mm or beyond_mm > size.fed_mm):
        raise ValueError(f"fed limbs {diameter_mm:g} mm thick and {size.fed_mm:g} mm long have no room for their holes")
    return size
