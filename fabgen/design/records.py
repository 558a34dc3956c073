"""What was found out about a mount and stored beside the design file, solved or measured, with the geometry it is of.

A record keeps reactance: g, the removed reactance over η B, from which every rod of the mount gets its own allowance.
"""

from collections.abc import Iterator
from dataclasses import fields

from fabgen.frozen import frozen

_TIDY = 4


@frozen
class MountGeometry:
    """One rod's mount on a metal boom, in the numbers that decide what the boom takes from the rod.

    Attributes:
        style: how the rod meets the boom.
        section: the boom's cross-section.
        outside_mm: boom diameter or side; of a rectangular one the width along the rods.
        height_mm: of a rectangular boom the height across the rods; 0 otherwise.
        wall_mm: boom wall; 0 for a solid bar.
        rod_diameter_mm: rod diameter.
        hole_mm: hole of an insulated rod; 0 otherwise.
        axis_height_mm: rod axis over the boom's top; 0 for a rod through it.
        bush_material: what fills the hole; empty without a bush.
        bush_permittivity: relative permittivity of that material.
        bush_length_mm: length of the bush in each wall.
        keeper: kind and material of what holds the rod.
        film_insulation: an anodic film or paint stands between rod and boom, and nothing else.
        frequency_mhz: design frequency.
    """

    style: str
    section: str
    outside_mm: float
    height_mm: float
    wall_mm: float
    rod_diameter_mm: float
    hole_mm: float
    axis_height_mm: float
    bush_material: str
    bush_permittivity: float
    bush_length_mm: float
    keeper: str
    film_insulation: bool
    frequency_mhz: float

    def differing(self, other: "MountGeometry") -> Iterator[tuple[str, str, str]]:
        """Name, own value and the other's value of every item that differs by more than 0.0001."""
        for field in fields(self):
            mine, theirs = getattr(self, field.name), getattr(other, field.name)
            same = round(mine, _TIDY) == round(theirs, _TIDY) if isinstance(mine, float) else mine == theirs
            if not same:
                yield field.name, _said(mine), _said(theirs)


@frozen
class SolvedRod:
    """One rod of a solved mount.

    Attributes:
        modelled_mm: its free length.
        allowance_mm: length to add, bush left out.
        reactance_factor: g that this allowance stands for.
    """

    modelled_mm: float
    allowance_mm: float
    reactance_factor: float


@frozen
class SolvedRecord:
    """A mount solved in full.

    Attributes:
        file: the file it stands in, below the folder of records.
        mount: the user's name for the mount.
        geometry: what was solved.
        rods: one to three, in order of length.
        mesh_difference_relative: finer over coarser mesh, less one.
    """

    file: str
    mount: str
    geometry: MountGeometry
    rods: tuple[SolvedRod, ...]
    mesh_difference_relative: float

    def covers(self, modelled_mm: float, beyond_mm: float) -> bool:
        """Whether a rod's length lies between the solved ones, or no farther outside them than `beyond_mm`."""
        return self.rods[0].modelled_mm - beyond_mm <= modelled_mm <= self.rods[-1].modelled_mm + beyond_mm

    def factor_at(self, modelled_mm: float) -> float:
        """The factor g for a rod of some length, by the polynomial through the solved rods (Lagrange)."""
        total = 0.0
        for rod in self.rods:
            weight = 1.0
            for other in self.rods:
                if other is not rod:
                    weight *= (modelled_mm - other.modelled_mm) / (rod.modelled_mm - other.modelled_mm)
            total += weight * rod.reactance_factor
        return total


@frozen
class MeasuredRecord:
    """A mount measured with a coupon.

    Attributes:
        file: the file it stands in, below the folder of records.
        mount: the user's name for the mount.
        date: of the measurement, as the user gave it.
        geometry: of the coupon.
        modelled_mm: free length of the coupon's rod at which the allowance holds.
        allowance_mm: measured allowance of that rod.
        u_mm: its standard uncertainty from the fit.
        reactance_factor: g that it stands for.
        boom_end_relative: how much too low the piece's two sawn ends may make it read.
    """

    file: str
    mount: str
    date: str
    geometry: MountGeometry
    modelled_mm: float
    allowance_mm: float
    u_mm: float
    reactance_factor: float
    boom_end_relative: float


Record = SolvedRecord | MeasuredRecord


def _said(value: object) -> str:
    if isinstance(value, bool):
        return "yes" if value else "no"
    return f"{value:g}" if isinstance(value, float) else str(value) or "none"
