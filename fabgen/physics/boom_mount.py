"""A rod in its mount on a metal boom, as plain numbers: what the closed forms, the solver and a record share."""

from enum import Enum

from fabgen.frozen import frozen

SPEED_OF_LIGHT_M_S = 299_792_458.0
ETA_OHM = 376.730313668


class Style(Enum):
    """How the rod meets the metal of the boom."""

    BONDED_THROUGH = "bonded-through"
    INSULATED_THROUGH = "insulated-through"
    ON_TOP = "on-top"


class Section(Enum):
    """Cross-section of the boom."""

    ROUND = "round"
    SQUARE = "square"
    RECTANGULAR = "rectangular"


@frozen
class BoomMount:
    """One rod's mount on a long straight metal boom; the rod crosses the boom's axis at a right angle.

    Attributes:
        style: how the rod meets the boom; a rod held by one screw through its middle is insulated-through.
        section: the boom's cross-section.
        outside_mm: diameter or side; of a rectangular boom the width along the rods.
        rod_diameter_mm: rod diameter.
        wall_mm: boom wall; 0 is a solid bar. Does not matter to bonded-through and on-top mounts.
        height_mm: of a rectangular boom the height across the rods; 0 otherwise.
        hole_mm: hole diameter of an insulated-through mount.
        axis_height_mm: of an on-top mount the rod axis above the boom's top (round: above its crown).
        bush_permittivity: relative permittivity of what fills the hole; 1 for air.
        bush_length_mm: length of the bush in each hole (its spigot).
        film_insulation: True where only an anodic film or paint in a tight hole insulates the rod.
    """

    style: Style
    section: Section
    outside_mm: float
    rod_diameter_mm: float
    wall_mm: float = 0.0
    height_mm: float = 0.0
    hole_mm: float = 0.0
    axis_height_mm: float = 0.0
    bush_permittivity: float = 1.0
    bush_length_mm: float = 0.0
    film_insulation: bool = False

    def __post_init__(self) -> None:
        if self.outside_mm <= 0 or self.rod_diameter_mm <= 0:
            raise ValueError("boom and rod diameter must be positive")
        if not 0 <= self.wall_mm < self.outside_mm / 2:
            raise ValueError("boom wall must be at least 0 and below half the boom")
        if (self.section is Section.RECTANGULAR) != (self.height_mm > 0):
            raise ValueError("a rectangular boom, and no other, has a height")
        bushed = self.style is Style.INSULATED_THROUGH and not self.film_insulation
        if bushed and self.hole_mm <= self.rod_diameter_mm:
            raise ValueError("the hole of an insulated rod must be larger than the rod")
        if self.style is Style.ON_TOP and self.axis_height_mm < self.rod_diameter_mm / 2:
            raise ValueError("an on-top rod cannot sink into the boom")
        if self.bush_permittivity < 1 or self.bush_length_mm < 0:
            raise ValueError("bush permittivity is at least 1 and its length at least 0")

    @property
    def solid(self) -> bool:
        """True for a bar without a bore."""
        return self.wall_mm == 0

    @property
    def bore_mm(self) -> float:
        """Clear inside of the boom along the rod; of a solid bar its outside."""
        return self.outside_mm - 2 * self.wall_mm

    @property
    def gap_mm(self) -> float:
        """Air between boom top and rod of an on-top mount."""
        return self.axis_height_mm - self.rod_diameter_mm / 2


def wavelength_mm(frequency_mhz: float) -> float:
    """Free-space wavelength in mm.

    Args:
        frequency_mhz: frequency in MHz, positive.

    Returns:
        c / f in mm.
    """
    if frequency_mhz <= 0:
        raise ValueError("frequency must be positive")
    return SPEED_OF_LIGHT_M_S / (frequency_mhz * 1000)
