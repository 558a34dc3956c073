"""What the printed blocks on the boom's top share: a rod's bore, two hold-down screws and, fed, two terminal screws."""

from fabgen.design.part_fasteners import Fastener, fastener, sold_length_mm
from fabgen.frozen import frozen

ENGAGEMENT_MM = 3.5
"""Screw length below its part: through a tapped boom wall of 1.5 mm and two threads beyond (common practice)."""

COUNTERBORE_PLAY_MM = 0.8

# Plays and reaches at the terminals are our own choice, made for M2 to M5; none is measured.
TERMINALS = ("M2", "M2.5", "M3", "M4", "M5")
BESIDE_HOLE_MM = 0.35  # metal left beside a terminal's hole in the thinnest rod
TAG_MM = 0.8  # a solder tag under the terminal's head
NUT_PLAY_MM = 0.25
BEYOND_NUT_MM = 0.4
LEAST_UNDER_ROD_MM = 2.5  # plastic between rod and nut
BESIDE_BOOM_MM = 0.8  # between the boom's side and the cable


@frozen
class TopBlock:
    """One block with two hold-down screws.

    Attributes:
        height_mm: from the boom's top to the rod's axis.
        boom_diameter_mm: round boom; 0 for a flat top.
        bore_mm: as it shall come out of the printer.
        screw: thread of the two hold-down screws.
        hole_growth_mm: added to the drawn bores.
    """

    rod_diameter_mm: float
    height_mm: float
    boom_diameter_mm: float
    bore_mm: float
    screw: str
    hole_growth_mm: float

    def drawn_mm(self, hole_mm: float) -> float:
        """What a printed hole is drawn as."""
        return hole_mm + self.hole_growth_mm

    @property
    def drawn_bore_mm(self) -> float:
        """Bore of the solid."""
        return self.drawn_mm(self.bore_mm)

    @property
    def fastener(self) -> Fastener:
        """The hold-down screw's sizes."""
        return fastener(self.screw)

    @property
    def counterbore_mm(self) -> float:
        """Diameter of the hole for a hold-down head."""
        return self.fastener.head_diameter_mm + COUNTERBORE_PLAY_MM

    @property
    def screw_length_mm(self) -> float:
        """Hold-down length to buy: the shortest with enough plastic under its head."""
        least = max(4.0, 1.2 * self.fastener.diameter_mm) + ENGAGEMENT_MM
        return sold_length_mm(least)

    @property
    def seat_mm(self) -> float:
        """Level of a hold-down head's seat."""
        return self.screw_length_mm - ENGAGEMENT_MM

    @property
    def ear_mm(self) -> float:
        """Level of a hold-down head's top, the height of a saddle's ears."""
        return self.seat_mm + self.fastener.head_height_mm


@frozen
class FedBlock(TopBlock):
    """One block that carries the ends of a dipole, a terminal screw across each.

    Attributes:
        gap_mm: between the rod's fed ends.
        cable_mm: outside diameter of the cable.
        boom_width_mm: outside of the boom along the rods.
        terminal: thread of the two terminal screws.
    """

    gap_mm: float
    cable_mm: float
    boom_width_mm: float
    terminal: str

    @property
    def terminal_fastener(self) -> Fastener:
        """The terminal screw's sizes."""
        return fastener(self.terminal)

    @property
    def rod_hole_mm(self) -> float:
        """Hole drilled across each fed end: ISO 273 fine."""
        return self.terminal_fastener.clearance_fine_mm

    @property
    def rod_hole_from_end_mm(self) -> float:
        """From a fed end to the middle of that hole."""
        return max(2 * self.rod_hole_mm, 3.5)

    @property
    def rod_gap_mm(self) -> float:
        """Distance between a terminal screw and its hole in the rod, all round."""
        return (self.rod_hole_mm - self.terminal_fastener.diameter_mm) / 2

    @property
    def terminal_y_mm(self) -> float:
        """±y of the terminal screws."""
        return self.gap_mm / 2 + self.rod_hole_from_end_mm

    @property
    def terminal_length_mm(self) -> float:
        """Screw length to buy: the shortest that leaves enough plastic between rod and nut."""
        bolt = self.terminal_fastener
        least = self.rod_diameter_mm + TAG_MM + LEAST_UNDER_ROD_MM + bolt.nut_height_mm + BEYOND_NUT_MM
        return sold_length_mm(least)

    @property
    def trap_flats_mm(self) -> float:
        """Nut trap across flats, flats towards ±y."""
        return self.terminal_fastener.nut_across_flats_mm + NUT_PLAY_MM


def terminal_for(rod_diameter_mm: float, wanted: str | None = None) -> str:
    """The terminal thread for a rod: the wanted one, else the largest whose hole takes at most 0.6 of the rod.

    Raises:
        ValueError: the rod is too thin to be drilled for it.
    """
    holes = {name: fastener(name).clearance_fine_mm for name in TERMINALS}
    fitting = [name for name, hole_mm in holes.items() if hole_mm <= 0.6 * rod_diameter_mm]
    thread = wanted or (fitting[-1] if fitting else TERMINALS[0])
    hole_mm = fastener(thread).clearance_fine_mm
    if rod_diameter_mm < hole_mm + 2 * BESIDE_HOLE_MM:
        raise ValueError(
            f"a rod of {rod_diameter_mm:g} mm is too thin for a terminal screw {thread} in a hole of {hole_mm:g} mm"
        )
    return thread
