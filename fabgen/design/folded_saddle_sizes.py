"""Sizes of the saddle that carries both limbs of a folded dipole.

Frame: origin on the boom's top (round: its crown) under the fed limb; x along the boom, y along the limbs, z up.
The bent rod, which no closed bore could take, is pushed in from +x into two slots. A terminal screw along x clamps each
fed end, a screw with a large washer the middle of the upper limb; the cable is tied to the front beside the boom. The
profile is constant along y, so that the saddle prints lying on its −y side.
"""

import math

from fabgen.design.arranged import Box
from fabgen.design.part_geometry import (
    PI,
    disc_mm2,
    drop_mm,
    hexagon_corners_mm,
    hexagon_mm2,
    integral,
    teardrop_chord_mm,
    teardrop_mm2,
    under_strip_mm2,
    under_teardrop_mm3,
)
from fabgen.design.saddle_sizes import EAR_WALL_MM, FOOT_SHARE
from fabgen.design.top_block import BESIDE_BOOM_MM, BEYOND_NUT_MM, TAG_MM, FedBlock, terminal_for
from fabgen.frozen import frozen
from fabgen.stock.fasteners import tap_drill_mm, washer
from fabgen.stock.practice import print_practice

RETAINERS = ("M3", "M4", "M5", "M6")
RETAINER_WALL_MM = 1.2
PROUD_MM = 0.3
TIE_MM = (1.8, 3.6)
TIE_PLAY_MM = 1.0
FILLET_MM = 1.0


@frozen
class FoldedSaddleSize(FedBlock):
    """One saddle for a folded dipole; its bore is the width of both slots.

    The nut traps' flats face ±y: printed lying, a trap's roof is a short bridge.

    Attributes:
        spacing_mm: centre to centre of the limbs.
    """

    spacing_mm: float

    @property
    def front_mm(self) -> float:
        """Where along x the column ends in front: the limbs stand a little proud for tags to press on."""
        return self.rod_diameter_mm / 2 - PROUD_MM

    @property
    def tip_mm(self) -> float:
        """Where along x a terminal screw ends."""
        return self.rod_diameter_mm / 2 + TAG_MM - self.terminal_length_mm

    @property
    def trap_front_mm(self) -> float:
        """Where along x a terminal nut has its seat; the trap is open behind it."""
        return self.tip_mm + BEYOND_NUT_MM + self.terminal_fastener.nut_height_mm

    @property
    def terminal_gap_mm(self) -> float:
        """Smallest distance between a terminal screw and the saddle."""
        return (self.terminal_fastener.clearance_mm - self.terminal_fastener.diameter_mm) / 2

    @property
    def tallest_mm(self) -> float:
        """What is taken out along z at the fed limb: its slot or the nut traps."""
        return max(self.bore_mm, hexagon_corners_mm(self.trap_flats_mm))

    @property
    def back_mm(self) -> float:
        """Where along x the column ends behind: the terminal screws' tips stay inside."""
        return self.tip_mm - 0.2

    @property
    def screw_x_mm(self) -> tuple[float, float]:
        """Where along x the two hold-down screws stand, on the centre line of the boom's top; not symmetrical."""
        reach = FILLET_MM + self.counterbore_mm / 2
        return self.back_mm - reach, self.front_mm + reach

    @property
    def x_mm(self) -> tuple[float, float]:
        """Footprint along the boom."""
        reach = self.counterbore_mm / 2 + EAR_WALL_MM
        return self.screw_x_mm[0] - reach, self.screw_x_mm[1] + reach

    @property
    def upper_mm(self) -> float:
        """Level of the upper limb's axis."""
        return self.height_mm + self.spacing_mm

    @property
    def retainer(self) -> str:
        """Thread of the screw that holds the upper limb: the smallest whose large washer reaches nearly to its axis."""
        for name in RETAINERS:
            reach = washer(name, "large").outside_mm / 2 - self.retainer_offset_mm(name)
            if reach >= -self.rod_diameter_mm / 8:
                return name
        return RETAINERS[-1]

    @property
    def retainer_gap_mm(self) -> float:
        """Distance between its washer and the upper limb: 0 where the washer reaches over the limb's axis."""
        short = self.retainer_offset_mm(self.retainer) - washer(self.retainer, "large").outside_mm / 2
        radius = self.rod_diameter_mm / 2
        return math.hypot(radius, max(0.0, short)) - radius

    def retainer_offset_mm(self, name: str) -> float:
        """From the upper limb's axis to that screw's."""
        return (self.bore_mm + tap_drill_mm(name)) / 2 + RETAINER_WALL_MM

    @property
    def retainer_z_mm(self) -> float:
        """Level of that screw, at y = 0."""
        return self.upper_mm + self.retainer_offset_mm(self.retainer)

    @property
    def pilot_mm(self) -> float:
        """Diameter of that screw's hole; it forms its thread in it."""
        return tap_drill_mm(self.retainer)

    @property
    def top_mm(self) -> float:
        """Level of the top."""
        return self.retainer_z_mm + self.pilot_mm / 2 + 2.4

    @property
    def ear_y_mm(self) -> float:
        """Where along y the ears end on the cable's side."""
        return math.sqrt(0.5) * self.counterbore_mm + print_practice("recommended_wall_mm")

    @property
    def cable_at_mm(self) -> tuple[float, float]:
        """x, y of the cable's axis, going down beside the boom in front of the column."""
        beside = self.boom_width_mm / 2 + BESIDE_BOOM_MM
        clear_of_ear = self.ear_y_mm + TIE_PLAY_MM + TIE_MM[0] + 0.4
        return self.front_mm + self.cable_mm / 2, max(beside, clear_of_ear) + self.cable_mm / 2

    @property
    def tie_y_mm(self) -> tuple[float, float]:
        """±y of the slots for a cable tie, either side of the cable."""
        reach = self.cable_mm / 2 + TIE_PLAY_MM + TIE_MM[0] / 2
        return self.cable_at_mm[1] - reach, self.cable_at_mm[1] + reach

    @property
    def tie_z_mm(self) -> tuple[float, ...]:
        """Levels of the ties: two where there is room under the fed limb, else one."""
        room = self.height_mm - self.tallest_mm / 2 - 1.5
        upper = room - TIE_MM[1] / 2
        return (4.0, upper) if upper - 4.0 >= TIE_MM[1] + 2.0 else (upper,)

    @property
    def y_mm(self) -> tuple[float, float]:
        """The column across the boom."""
        low = max(self.foot_width_mm / 2, self.terminal_y_mm + self.trap_flats_mm / 2 + 2.0)
        return -low, max(self.tie_y_mm[1] + TIE_MM[0] / 2 + 2.4, low)

    @property
    def foot_width_mm(self) -> float:
        """Width of the foot on the boom; beyond it the underside is flat."""
        return FOOT_SHARE * self.boom_diameter_mm if self.boom_diameter_mm else self.boom_width_mm

    @property
    def foot_drop_mm(self) -> float:
        """How far the underside reaches below a round boom's crown; 0 on a flat top."""
        return drop_mm(self.boom_diameter_mm, self.foot_width_mm / 2)

    @property
    def walls_mm(self) -> dict[str, float]:
        """Walls as drawn; all others are thicker than the first of these or the second."""
        return {
            "wall over the upper slot": RETAINER_WALL_MM - self.hole_growth_mm,
            "rib between the rod's ends": self.gap_mm,
            "ear wall": EAR_WALL_MM - self.hole_growth_mm / 2,
        }

    @property
    def volume_mm3(self) -> float:
        """Exact volume of the solid."""
        (y0, y1), (x0, x1), bore = self.y_mm, self.x_mm, self.drawn_bore_mm
        depth = self.front_mm - self.back_mm
        ears = (x1 - x0 - depth) * ((self.ear_y_mm - y0) * self.ear_mm + self._foot_mm2(y0, self.ear_y_mm))
        fillets = 2 * (1 - PI / 4) * FILLET_MM**2 * (self.ear_y_mm - y0)
        column = depth * ((y1 - y0) * self.top_mm + self._foot_mm2(y0, y1))
        slots = (disc_mm2(bore) / 2 + bore * self.front_mm) * (2 * (y1 - y0) - self.gap_mm)
        ties = 2 * len(self.tie_z_mm) * TIE_MM[0] * TIE_MM[1] * depth
        retainer = teardrop_mm2(self.drawn_mm(self.pilot_mm)) * depth
        return ears + fillets + column - slots - ties - retainer - 2 * (self._terminal_mm3() + self._hold_down_mm3())

    @property
    def shapes(self) -> tuple[Box, Box]:
        """Base and column in the local frame: an envelope, slots not taken out."""
        (x0, x1), (y0, y1), low = self.x_mm, self.y_mm, 0.0 - self.foot_drop_mm
        base = Box((x0, y0, low), (x1, self.ear_y_mm, self.ear_mm + FILLET_MM))
        return base, Box((self.back_mm, y0, low), (self.front_mm, y1, self.top_mm))

    def _foot_mm2(self, low_mm: float, high_mm: float) -> float:
        """Area of the underside's section below the crown between two y."""

        def from_middle(y_mm: float) -> float:
            inside = min(abs(y_mm), self.foot_width_mm / 2)
            area = under_strip_mm2(self.boom_diameter_mm, 2 * inside) / 2
            return math.copysign(area + (abs(y_mm) - inside) * self.foot_drop_mm, y_mm)

        return from_middle(high_mm) - from_middle(low_mm)

    def _terminal_mm3(self) -> float:
        """One terminal's hole behind the rod and its nut trap."""
        hole, radius = self.drawn_mm(self.terminal_fastener.clearance_mm), self.drawn_bore_mm / 2

        def slice_mm2(angle: float) -> float:
            z = hole / 2 * math.sin(angle)
            length = -math.sqrt(radius**2 - z**2) - self.trap_front_mm
            return teardrop_chord_mm(hole, z) * length * hole / 2 * math.cos(angle)

        trap = hexagon_mm2(self.trap_flats_mm) * (self.trap_front_mm - self.back_mm)
        return integral(slice_mm2, -PI / 2, PI / 2, 800) + trap

    def _hold_down_mm3(self) -> float:
        """One hold-down screw's hole and counterbore."""
        clearance = self.drawn_mm(self.fastener.clearance_mm)
        shank = teardrop_mm2(clearance) * self.seat_mm + under_teardrop_mm3(self.boom_diameter_mm, clearance)
        return shank + teardrop_mm2(self.drawn_mm(self.counterbore_mm)) * self.fastener.head_height_mm


def folded_saddle_size(
    *,
    rod_diameter_mm: float = 4.0,
    spacing_mm: float = 30.0,
    gap_mm: float = 10.0,
    height_mm: float = 18.0,
    cable_mm: float = 5.0,
    boom_width_mm: float = 20.0,
    boom_diameter_mm: float = 0.0,
    bore_mm: float | None = None,
    screw: str = "M3",
    terminal: str | None = None,
    hole_growth_mm: float = 0.0,
) -> FoldedSaddleSize:
    """Sizes of a folded dipole's saddle: slots rod + 0.3 wide.

    Raises:
        ValueError: the fed limb lies too low over the ears, or the limbs too near to each other.
    """
    play = print_practice("saddle_bore_clearance_mm")
    size = FoldedSaddleSize(
        rod_diameter_mm=rod_diameter_mm,
        spacing_mm=spacing_mm,
        gap_mm=gap_mm,
        height_mm=height_mm,
        cable_mm=cable_mm,
        boom_width_mm=boom_width_mm,
        boom_diameter_mm=boom_diameter_mm,
        bore_mm=rod_diameter_mm + play if bore_mm is None else bore_mm,
        screw=screw,
        terminal=terminal_for(rod_diameter_mm, terminal),
        hole_growth_mm=hole_growth_mm,
    )
    least = size.ear_mm + FILLET_MM + size.tallest_mm / 2
    if height_mm < least:
        raise ValueError(f"a folded dipole's saddle for a rod of {rod_diameter_mm:g} mm needs a height of {least:g} mm")
    if spacing_mm < size.tallest_mm + 2 * print_practice("structural_wall_mm"):
        raise ValueError(f"limbs {spacing_mm:g} mm apart leave no wall between their slots")
    return size
