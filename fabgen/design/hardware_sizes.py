"""Sizes of rods and of metal hardware: clamp plate, U-bolt, crush sleeve, screw, nut, washer."""

import math
from typing import Literal

from fabgen.design.arranged import Box, Cylinder
from fabgen.design.part_geometry import PI, disc_mm2, hexagon_corners_mm, hexagon_mm2, integral, ring_mm2
from fabgen.frozen import frozen
from fabgen.stock import fasteners
from fabgen.stock.fasteners import HeadKind, ScrewHead


@frozen
class RodSize:
    """A straight rod, axis z, centred on the origin, optionally with one hole across.

    Attributes:
        cross_hole_mm: hole drilled along local x; 0 for none.
        cross_hole_z_mm: its place along the rod.
    """

    diameter_mm: float
    length_mm: float
    cross_hole_mm: float = 0.0
    cross_hole_z_mm: float = 0.0

    @property
    def volume_mm3(self) -> float:
        """Exact volume of the solid."""
        return disc_mm2(self.diameter_mm) * self.length_mm - crossing_mm3(self.diameter_mm, self.cross_hole_mm)

    @property
    def shapes(self) -> tuple[Cylinder]:
        """The rod in its local frame."""
        return (Cylinder("z", (0.0, 0.0, 0.0), self.diameter_mm, self.length_mm),)


def crossing_mm3(rod_mm: float, hole_mm: float) -> float:
    """What two cylinders share whose axes cross at right angles, the second not the thicker."""

    def slice_mm2(angle: float) -> float:
        y = hole_mm / 2 * math.sin(angle)
        return 4 * math.sqrt((rod_mm / 2) ** 2 - y**2) * (hole_mm / 2 * math.cos(angle)) ** 2

    return integral(slice_mm2, -PI / 2, PI / 2, 200)


@frozen
class ClampPlateSize:
    """A plate with round holes (x, y, diameter), centred in x and y, z from 0 to its thickness."""

    width_mm: float
    height_mm: float
    thickness_mm: float
    corner_mm: float
    holes: tuple[tuple[float, float, float], ...]

    @property
    def volume_mm3(self) -> float:
        """Exact volume of the solid."""
        area = self.width_mm * self.height_mm - (4 - PI) * self.corner_mm**2
        return (area - sum(disc_mm2(diameter) for _, _, diameter in self.holes)) * self.thickness_mm

    @property
    def shapes(self) -> tuple[Box]:
        """The plate in its local frame."""
        x, y = self.width_mm / 2, self.height_mm / 2
        return (Box((-x, -y, 0.0), (x, y, self.thickness_mm)),)


@frozen
class UBoltSize:
    """A round bow with two legs along −z at x = ±(inside + rod)/2, origin at the bow's centre."""

    inside_mm: float
    rod_diameter_mm: float
    leg_mm: float

    @property
    def spacing_mm(self) -> float:
        """Centre to centre of the legs."""
        return self.inside_mm + self.rod_diameter_mm

    @property
    def developed_mm(self) -> float:
        """Length of its centre line."""
        return 2 * self.leg_mm + PI * self.spacing_mm / 2

    @property
    def volume_mm3(self) -> float:
        """Exact volume of the solid."""
        return self.developed_mm * disc_mm2(self.rod_diameter_mm)

    @property
    def shapes(self) -> tuple[Cylinder, Cylinder, Box]:
        """Both legs and a box round the bow."""
        x, d = self.spacing_mm / 2, self.rod_diameter_mm
        legs = [Cylinder("z", (side * x, 0.0, -self.leg_mm / 2), d, self.leg_mm) for side in (-1, 1)]
        return legs[0], legs[1], Box((-x - d / 2, -d / 2, 0.0), (x + d / 2, d / 2, x + d / 2))


@frozen
class TubeSize:
    """A plain tube, axis z, z from 0 to its length: crush sleeve or washer."""

    length_mm: float
    bore_mm: float
    outside_mm: float

    @property
    def volume_mm3(self) -> float:
        """Exact volume of the solid."""
        return ring_mm2(self.outside_mm, self.bore_mm) * self.length_mm

    @property
    def shapes(self) -> tuple[Cylinder]:
        """The tube in its local frame."""
        return (Cylinder("z", (0.0, 0.0, self.length_mm / 2), self.outside_mm, self.length_mm, self.bore_mm),)


@frozen
class ScrewSize:
    """A screw with a plain shank of the thread's diameter: origin under the head, head z ≥ 0, shank below.

    Attributes:
        head: its table row; a cross recess is left out of the solid, a hexagon socket is as deep as half the head.
    """

    diameter_mm: float
    length_mm: float
    head: ScrewHead

    @property
    def socket_mm(self) -> float:
        """Depth of the key's hexagon; 0 without one."""
        return self.head.height_mm / 2 if self.head.kind == "socket" else 0.0

    @property
    def outside_mm(self) -> float:
        """Largest head width: a hexagon's is across its sharp corners."""
        if self.head.kind == "hex":
            return hexagon_corners_mm(self.head.across_flats_mm)
        return self.head.diameter_mm

    @property
    def volume_mm3(self) -> float:
        """Exact volume of the solid."""
        shank = disc_mm2(self.diameter_mm) * self.length_mm
        if self.head.kind == "hex":
            return shank + hexagon_mm2(self.head.across_flats_mm) * self.head.height_mm
        head = disc_mm2(self.head.diameter_mm) * self.head.height_mm
        return shank + head - hexagon_mm2(self.head.across_flats_mm) * self.socket_mm

    @property
    def shapes(self) -> tuple[Cylinder, Cylinder]:
        """Head and shank."""
        high, low = self.head.height_mm, self.length_mm
        return (
            Cylinder("z", (0.0, 0.0, high / 2), self.outside_mm, high),
            Cylinder("z", (0.0, 0.0, -low / 2), self.diameter_mm, low),
        )


@frozen
class NutSize:
    """A hexagon nut with a plain bore of the thread's diameter, axis z, z from 0 to its height, flats towards ±y."""

    bore_mm: float
    across_flats_mm: float
    height_mm: float

    @property
    def volume_mm3(self) -> float:
        """Exact volume of the solid."""
        return (hexagon_mm2(self.across_flats_mm) - disc_mm2(self.bore_mm)) * self.height_mm

    @property
    def shapes(self) -> tuple[Cylinder]:
        """The cylinder round its corners."""
        corners = hexagon_corners_mm(self.across_flats_mm)
        return (Cylinder("z", (0.0, 0.0, self.height_mm / 2), corners, self.height_mm, self.bore_mm),)


def rod_size(
    *,
    diameter_mm: float = 4.0,
    length_mm: float = 300.0,
    cross_hole_mm: float = 0.0,
    cross_hole_z_mm: float = 0.0,
) -> RodSize:
    """Sizes of a straight rod."""
    return RodSize(diameter_mm, length_mm, cross_hole_mm, cross_hole_z_mm)


def clamp_plate_size(
    *,
    width_mm: float = 80.0,
    height_mm: float = 80.0,
    thickness_mm: float = 5.0,
    holes: tuple[tuple[float, float, float], ...] = (
        (-22.5, -15.0, 6.6),
        (22.5, -15.0, 6.6),
        (-22.5, 15.0, 6.6),
        (22.5, 15.0, 6.6),
    ),
    corner_mm: float = 3.0,
) -> ClampPlateSize:
    """Sizes of a boom-to-mast plate; the corners are rounded."""
    return ClampPlateSize(width_mm, height_mm, thickness_mm, corner_mm, holes)


def u_bolt_size(*, inside_mm: float = 38.0, rod_diameter_mm: float = 6.0, leg_mm: float = 50.0) -> UBoltSize:
    """Sizes of a U-bolt."""
    return UBoltSize(inside_mm, rod_diameter_mm, leg_mm)


def crush_sleeve_size(*, length_mm: float = 17.0, bore_mm: float = 6.6, outside_mm: float = 10.0) -> TubeSize:
    """Sizes of a spacer that keeps a bolt from crushing a thin tube."""
    return TubeSize(length_mm, bore_mm, outside_mm)


def screw_size(*, thread: str = "M3", length_mm: float = 8.0, head: HeadKind = "socket") -> ScrewSize:
    """Sizes of a screw.

    Raises:
        UnknownStockError: no such thread or head in the tables.
    """
    return ScrewSize(fasteners.thread(thread).diameter_mm, length_mm, fasteners.screw_head(thread, head))


def nut_size(*, thread: str = "M3") -> NutSize:
    """Sizes of a hexagon nut.

    Raises:
        UnknownStockError: no such thread in the tables.
    """
    row = fasteners.nut(thread)
    return NutSize(fasteners.thread(thread).diameter_mm, row.across_flats_mm, row.height_mm)


def washer_size(*, thread: str = "M3", series: Literal["normal", "large"] = "normal") -> TubeSize:
    """Sizes of a plain washer.

    Raises:
        UnknownStockError: no such thread in the tables.
    """
    row = fasteners.washer(thread, series)
    return TubeSize(row.thickness_mm, row.bore_mm, row.outside_mm)
