"""Sizes of the keepers that stop a rod sliding: push-on split ring and snap-on clip.

Frame of both: axis z, origin on the face that meets the flange, z from 0 to the length, slit or mouth at local +x.
"""

import math

from fabgen.design.arranged import Cylinder
from fabgen.design.part_geometry import integral, ring_mm2, strip_mm2
from fabgen.frozen import frozen
from fabgen.stock.practice import print_practice

LEAD_IN_MM = 0.4
FLARE_MM = 0.8
KEEPER_RIM_MM = 1.0
"""What a keeper should rest on, each side. Source: common practice."""


@frozen
class PushRingSize:
    """One split ring that grips the rod.

    Attributes:
        bore_mm: as it shall come out of the printer, smaller than the rod.
        outside_mm: outside diameter.
        slit_mm: width of the slit before the ring is opened.
        hole_growth_mm: added to the drawn bore.
    """

    rod_diameter_mm: float
    bore_mm: float
    outside_mm: float
    length_mm: float
    slit_mm: float
    hole_growth_mm: float

    @property
    def drawn_bore_mm(self) -> float:
        """Bore of the solid."""
        return self.bore_mm + self.hole_growth_mm

    @property
    def wall_mm(self) -> float:
        """Radial thickness."""
        return (self.outside_mm - self.bore_mm) / 2

    @property
    def lead_in_mm(self) -> float:
        """45° chamfer on both ends of the bore."""
        return min(LEAD_IN_MM, self.wall_mm / 3, self.length_mm / 4)

    @property
    def volume_mm3(self) -> float:
        """Exact volume of the solid."""

        def area(bore_mm: float) -> float:
            slit = strip_mm2(self.outside_mm / 2, self.slit_mm) - strip_mm2(bore_mm / 2, self.slit_mm)
            return ring_mm2(self.outside_mm, bore_mm) - slit

        chamfer, bore = self.lead_in_mm, self.drawn_bore_mm
        ends = 2 * integral(lambda depth: area(bore + 2 * depth), 0.0, chamfer)
        return area(bore) * (self.length_mm - 2 * chamfer) + ends

    @property
    def shapes(self) -> tuple[Cylinder]:
        """The ring in the local frame, slit closed."""
        return (_ring(self.outside_mm, self.bore_mm, self.length_mm),)


@frozen
class SnapKeeperSize:
    """One C-shaped clip, pressed on the rod from the side.

    Attributes:
        bore_mm: as it shall come out of the printer, smaller than the rod.
        mouth_mm: width of the mouth that the rod is pressed through.
        hole_growth_mm: added to the drawn bore; the mouth stays.
    """

    rod_diameter_mm: float
    bore_mm: float
    outside_mm: float
    length_mm: float
    mouth_mm: float
    hole_growth_mm: float

    @property
    def drawn_bore_mm(self) -> float:
        """Bore of the solid."""
        return self.bore_mm + self.hole_growth_mm

    @property
    def flare_mm(self) -> float:
        """Depth of the 45° flare that leads the rod into the mouth."""
        return min(FLARE_MM, (self.outside_mm - self.mouth_mm) / 4)

    @property
    def flare_start_mm(self) -> float:
        """Where along x the flare begins."""
        return math.sqrt((self.outside_mm / 2) ** 2 - (self.mouth_mm / 2) ** 2) - self.flare_mm

    @property
    def volume_mm3(self) -> float:
        """Exact volume of the solid."""
        radius, mouth = self.outside_mm / 2, self.mouth_mm
        gap = strip_mm2(radius, mouth) - strip_mm2(self.drawn_bore_mm / 2, mouth)
        offset = self.flare_start_mm - mouth / 2
        top = (math.sqrt(2 * radius**2 - offset**2) - offset) / 2
        flare = 2 * integral(lambda y: math.sqrt(radius**2 - y**2) - (offset + y), mouth / 2, top)
        return (ring_mm2(self.outside_mm, self.drawn_bore_mm) - gap - flare) * self.length_mm

    @property
    def shapes(self) -> tuple[Cylinder]:
        """The clip in the local frame, mouth closed."""
        return (_ring(self.outside_mm, self.bore_mm, self.length_mm),)


def push_ring_size(
    *,
    rod_diameter_mm: float = 4.0,
    bore_mm: float | None = None,
    outside_diameter_mm: float | None = None,
    length_mm: float = 5.0,
    slit_mm: float = 1.0,
    hole_growth_mm: float = 0.0,
) -> PushRingSize:
    """Sizes of a split ring: bore rod − 0.3, outside rod + 3.2 (a wall of four lines and good grip, common practice).

    Raises:
        ValueError: no wall left, or a slit as wide as the bore.
    """
    size = PushRingSize(
        rod_diameter_mm=rod_diameter_mm,
        bore_mm=rod_diameter_mm - print_practice("split_keeper_grip_mm") if bore_mm is None else bore_mm,
        outside_mm=rod_diameter_mm + 3.2 if outside_diameter_mm is None else outside_diameter_mm,
        length_mm=length_mm,
        slit_mm=slit_mm,
        hole_growth_mm=hole_growth_mm,
    )
    if size.outside_mm <= size.drawn_bore_mm + 2 * size.lead_in_mm or not 0 < slit_mm < size.drawn_bore_mm:
        raise ValueError(
            f"no ring of {size.drawn_bore_mm:.3f} × {size.outside_mm:.3f} mm with a slit of {slit_mm:.3f} mm"
        )
    return size


def snap_keeper_size(
    *,
    rod_diameter_mm: float = 4.0,
    bore_mm: float | None = None,
    outside_diameter_mm: float | None = None,
    length_mm: float = 6.0,
    mouth_mm: float | None = None,
    hole_growth_mm: float = 0.0,
) -> SnapKeeperSize:
    """Sizes of a snap keeper: bore rod − 0.2, outside rod + 3.2 (thin rods 1.8 × rod), mouth 0.91 × rod.

    Raises:
        ValueError: no wall left, or a mouth that does not hold the rod.
    """
    size = SnapKeeperSize(
        rod_diameter_mm=rod_diameter_mm,
        bore_mm=rod_diameter_mm - 0.2 if bore_mm is None else bore_mm,
        outside_mm=rod_diameter_mm + min(3.2, 0.8 * rod_diameter_mm)
        if outside_diameter_mm is None
        else outside_diameter_mm,
        length_mm=length_mm,
        mouth_mm=0.91 * rod_diameter_mm if mouth_mm is None else mouth_mm,
        hole_growth_mm=hole_growth_mm,
    )
    if size.outside_mm <= size.drawn_bore_mm or not 0 < size.mouth_mm < min(size.bore_mm, rod_diameter_mm):
        raise ValueError(f"a mouth of {size.mouth_mm:.3f} mm in a bore of {size.bore_mm:.3f} mm holds no rod")
    return size


def _ring(outside_mm: float, bore_mm: float, length_mm: float) -> Cylinder:
    return Cylinder("z", (0.0, 0.0, length_mm / 2), outside_mm, length_mm, bore_mm)
