"""Sizes of the drill guide.

Frame: the guide's own boom axis is local x, forward; the drill axis is local y at x = 0, z = 0. The boom is pressed
against the +z face of the cavity (round: its crown), and with flat walls against the +y face, so these two are where
the boom's own faces are and all play lies on the other sides.
"""

import math
from typing import Literal

from fabgen.design import glyphs
from fabgen.design.arranged import Box
from fabgen.design.fixture_geometry import under_hexagon_mm3, under_notch_mm3, under_strip_mm3, under_teardrop_mm3
from fabgen.design.part_fasteners import Fastener, fastener
from fabgen.design.part_geometry import PI, hexagon_corners_mm, integral, teardrop_mm2
from fabgen.frozen import frozen

Side = Literal["+y", "-y", "+z", "-z"]

LIP_MM = 1.0
"""What stops the bushing short of the boom: room for chips, and a shoulder to press against."""
LIP_BEYOND_DRILL_MM = 1.0
NUT_FLOOR_MM = 3.0
NUT_PLAY_MM = 0.3
WINDOW_WALL_MM = 4.0
WINDOW_MM = 10.0
LAND_MM = 0.8
"""Thickness of the reading edge at the boom: two printed lines."""
NOTCH_MM = 1.0
RELIEF_MM = 1.6
"""Diameter of the relief in the cavity's corners, which print with a radius of their own."""
EDGE_MM = 0.4
"""Chamfer where the boom enters and where the first printed layer spreads."""
CELL_MM, MARK_DEPTH_MM = 1.0, 0.6
ARROW_MM = (5.0, 4.0)
SET_SCREW_LENGTHS_MM = (3.0, 4.0, 5.0, 6.0, 8.0, 10.0, 12.0)
"""Source: ISO 4026:2003, preferred lengths, from memory."""


@frozen
class DrillGuideSize:
    """One drill guide.

    Attributes:
        boom_width_mm: along the drill axis.
        boom_height_mm: across it.
        boom_diameter_mm: round boom; 0 for flat walls.
        bushing_bore_mm: the drill.
        bushing_outside_mm: outside of the pressed-in bushing, the bore of its seat.
        bushing_length_mm: of the bushing.
        face: `sides` when the drill axis is level, `top` when it is upright; decides the marks.
        screw: thread of the set screws and their nuts.
        play_mm: how much larger the cavity is than the boom.
        hole_growth_mm: added to drawn bores and to the cavity.
    """

    boom_width_mm: float
    boom_height_mm: float
    boom_diameter_mm: float
    bushing_bore_mm: float
    bushing_outside_mm: float
    bushing_length_mm: float
    face: Literal["sides", "top"]
    screw: str
    play_mm: float
    hole_growth_mm: float

    @property
    def fastener(self) -> Fastener:
        """The set screw's thread and nut."""
        return fastener(self.screw)

    @property
    def seat_mm(self) -> float:
        """Drawn diameter of the bushings' seats."""
        return self.bushing_outside_mm + self.hole_growth_mm

    @property
    def lip_bore_mm(self) -> float:
        """Drawn diameter of the way through both lips."""
        return self.bushing_bore_mm + LIP_BEYOND_DRILL_MM + self.hole_growth_mm

    @property
    def clearance_mm(self) -> float:
        """Drawn diameter of the set screws' holes."""
        return self.fastener.clearance_mm + self.hole_growth_mm

    @property
    def nut_flats_mm(self) -> float:
        """Drawn width of the nuts' pockets."""
        return self.fastener.nut_across_flats_mm + NUT_PLAY_MM + self.hole_growth_mm

    @property
    def nut_depth_mm(self) -> float:
        """Depth of the nuts' pockets below the cavity's face."""
        return self.fastener.nut_height_mm + NUT_PLAY_MM

    @property
    def clamp_wall_mm(self) -> float:
        """Wall on the −z side, where a set screw presses."""
        return self.nut_depth_mm + NUT_FLOOR_MM

    @property
    def side_wall_mm(self) -> float:
        """Walls on both ±y sides, which hold the bushings."""
        return max(LIP_MM + self.bushing_length_mm, self.clamp_wall_mm)

    @property
    def set_screw_mm(self) -> float:
        """Length of the set screws: the longest that does not stand out."""
        return max(length for length in SET_SCREW_LENGTHS_MM if length <= self.clamp_wall_mm)

    @property
    def side_screw_x_mm(self) -> float:
        """Where the set screw in the −y wall stands, behind the bushing; flat walls only."""
        return -(self.bushing_outside_mm / 2 + 3.0 + self.nut_flats_mm / 2)

    @property
    def length_mm(self) -> float:
        """Along the boom: twice what squareness needs, with room for window, marks and set screw."""
        side = max(self.boom_width_mm, self.boom_height_mm)
        marks = self.bushing_outside_mm / 2 + 15.0
        screw = 3.0 + self.nut_flats_mm / 2 - self.side_screw_x_mm
        return max(40.0, 1.5 * side, 2 * marks, 2 * screw)

    @property
    def cavity_radius_mm(self) -> float:
        """Drawn radius of the bore for a round boom."""
        return (self.boom_diameter_mm + self.play_mm + self.hole_growth_mm) / 2

    def face_mm(self, side: Side) -> float:
        """Distance from the boom's axis to the cavity as it comes out of the printer, at its middle."""
        if self.boom_diameter_mm and side in ("+y", "-y"):
            return (self.boom_diameter_mm + self.play_mm) / 2
        half = (self.boom_width_mm if side in ("+y", "-y") else self.boom_height_mm) / 2
        return half + (self.play_mm if side in ("-y", "-z") else 0.0)

    def reach_mm(self, side: Side, t_mm: float = 0.0, wider_mm: float = 0.0) -> float:
        """Distance from the boom's axis to the drawn cavity.

        Args:
            side: which way.
            t_mm: how far from the middle of that side, along +z or +y.
            wider_mm: what a chamfer has added there.
        """
        if not self.boom_diameter_mm:
            return self.face_mm(side) + self.hole_growth_mm / 2 + wider_mm
        radius, low = self.cavity_radius_mm + wider_mm, self.play_mm / 2
        if side in ("+y", "-y"):
            return math.sqrt(radius**2 - (t_mm + low) ** 2)
        return math.sqrt(radius**2 - t_mm**2) + (low if side == "-z" else -low)

    def outside_mm(self, side: Side) -> float:
        """Distance from the boom's axis to the outer face."""
        wall = {"+y": self.side_wall_mm, "-y": self.side_wall_mm, "+z": WINDOW_WALL_MM, "-z": self.clamp_wall_mm}
        return self.face_mm(side) + wall[side]

    def lip_face_mm(self, side: Side) -> float:
        """Distance from the boom's axis to the bottom of a bushing's seat."""
        return self.face_mm(side) + LIP_MM

    def pocket_floor_mm(self, side: Side) -> float:
        """Distance from the boom's axis to the floor of a nut's pocket."""
        return self.face_mm(side) + self.nut_depth_mm

    @property
    def screws(self) -> tuple[tuple[Side, float], ...]:
        """The set screws: (wall, x)."""
        below: tuple[Side, float] = ("-z", 0.0)
        return (below,) if self.boom_diameter_mm else (below, ("-y", self.side_screw_x_mm))

    @property
    def window_half_mm(self) -> float:
        """Half the window's width across the boom."""
        return min(8.0, 0.3 * (self.boom_diameter_mm or self.boom_width_mm))

    @property
    def edge_mm(self) -> float:
        """Height of the reading edge's upper rim, where its 45° slope begins."""
        return self.face_mm("+z") + LAND_MM

    @property
    def notch_side(self) -> Side:
        """The side whose line is seen through V notches at both ends of a guide for a round boom: the boom's top."""
        return "+z" if self.face == "sides" else "+y"

    @property
    def marks(self) -> tuple[tuple[str, Side, float], ...]:
        """Sunk marks: (text, outer face, x of the text's middle)."""
        rear, fore = 8.0 - self.length_mm / 2, self.length_mm / 2 - 5.0
        drill: tuple[str, Side, float] = (f"{self.bushing_bore_mm:.3g}", "-z", rear)
        if self.face == "sides":
            return (("TOP", "+z", rear), ("L", "+y", fore), ("R", "-y", fore), drill)
        return (("TOP", "+y", rear), ("R", "+z", rear), drill)

    @property
    def arrow_x_mm(self) -> float:
        """Where the arrow that points forward begins, on the face that says TOP."""
        return self.length_mm / 2 - 8.0

    @property
    def volume_mm3(self) -> float:
        """Volume of the solid, in closed form or as smooth integrals."""
        y, z = self.outside_mm("+y") + self.outside_mm("-y"), self.outside_mm("+z") + self.outside_mm("-z")
        pierced = self._bushing_mm3("+y") + self._bushing_mm3("-y") + sum(self._clamp_mm3(s) for s, _ in self.screws)
        return y * z * self.length_mm - self._cavity_mm3 - self._window_mm3 - self._marks_mm3 - pierced

    @property
    def _cavity_mm3(self) -> float:
        if self.boom_diameter_mm:
            radius = self.cavity_radius_mm
            notch = under_notch_mm3(
                NOTCH_MM,
                lambda d, t: (
                    self.outside_mm(self.notch_side) - self.reach_mm(self.notch_side, t, max(0.0, EDGE_MM - d))
                ),
                EDGE_MM,
            )
            chamfer = PI * (radius * EDGE_MM**2 + EDGE_MM**3 / 3)
            return PI * radius**2 * self.length_mm + 2 * (chamfer + notch)
        y = self.reach_mm("+y") + self.reach_mm("-y")
        z = self.reach_mm("+z") + self.reach_mm("-z")
        r = RELIEF_MM / 2
        relief = 3 / 4 * PI * r**2

        def rim_mm2(s: float) -> float:
            beside = s * math.sqrt(r**2 - s**2) + r**2 * math.asin(s / r)
            return 2 * s * (y + z) + 4 * s**2 - 4 * (s**2 + beside)

        return (y * z + 4 * relief) * self.length_mm + 2 * integral(rim_mm2, 0.0, EDGE_MM)

    @property
    def _window_mm3(self) -> float:
        slope = self.outside_mm("+z") - self.edge_mm
        opening = under_strip_mm3(
            self.window_half_mm, WINDOW_MM, lambda t: self.outside_mm("+z") - self.reach_mm("+z", t)
        )
        notch = under_notch_mm3(NOTCH_MM, lambda d, t: self.edge_mm + d - self.reach_mm("+z", t))
        return opening + slope**2 * self.window_half_mm + (notch if self.boom_diameter_mm else 0.0)

    def _bushing_mm3(self, side: Side) -> float:
        seat = self.outside_mm(side) - self.lip_face_mm(side)
        lip = under_teardrop_mm3(self.lip_bore_mm, lambda t: self.lip_face_mm(side) - self.reach_mm(side, t))
        return teardrop_mm2(self.seat_mm) * seat + lip

    def _clamp_mm3(self, side: Side) -> float:
        below = self.outside_mm(side) - self.pocket_floor_mm(side)
        pocket = under_hexagon_mm3(self.nut_flats_mm, lambda t: self.pocket_floor_mm(side) - self.reach_mm(side, t))
        return teardrop_mm2(self.clearance_mm) * below + pocket

    @property
    def _marks_mm3(self) -> float:
        cells = sum(glyphs.area_cells(text) for text, _, _ in self.marks)
        return MARK_DEPTH_MM * (cells * CELL_MM**2 + ARROW_MM[0] * ARROW_MM[1] / 2)

    @property
    def shapes(self) -> tuple[Box]:
        """The outside: an envelope, the cavity not taken out."""
        x = self.length_mm / 2
        return (
            Box(
                (-x, -self.outside_mm("-y"), -self.outside_mm("-z")), (x, self.outside_mm("+y"), self.outside_mm("+z"))
            ),
        )


def drill_guide_size(
    *,
    boom_width_mm: float = 20.0,
    boom_height_mm: float = 20.0,
    boom_diameter_mm: float = 0.0,
    bushing_bore_mm: float = 2.5,
    bushing_outside_mm: float = 5.0,
    bushing_length_mm: float = 6.0,
    face: str = "sides",
    screw: str | None = None,
    play_mm: float = 0.3,
    hole_growth_mm: float = 0.0,
) -> DrillGuideSize:
    """Sizes of a drill guide: play 0.3, set screws M4, below 15 mm of boom M3 (common practice).

    Raises:
        ValueError: a guide that cannot be.
    """
    if face not in ("sides", "top"):
        raise ValueError(f"a drill guide is for the sides or the top, not for '{face}'")
    least = boom_diameter_mm or min(boom_width_mm, boom_height_mm)
    size = DrillGuideSize(
        boom_width_mm=boom_diameter_mm or boom_width_mm,
        boom_height_mm=boom_diameter_mm or boom_height_mm,
        boom_diameter_mm=boom_diameter_mm,
        bushing_bore_mm=bushing_bore_mm,
        bushing_outside_mm=bushing_outside_mm,
        bushing_length_mm=bushing_length_mm,
        face="top" if face == "top" else "sides",
        screw=("M3" if least < 15.0 else "M4") if screw is None else screw,
        play_mm=play_mm,
        hole_growth_mm=hole_growth_mm,
    )
    if size.lip_bore_mm > size.seat_mm - 1.0:
        raise ValueError(
            f"a bushing of {bushing_outside_mm:.3f} mm has no shoulder round a drill of {bushing_bore_mm:.3f} mm"
        )
    if hexagon_corners_mm(size.nut_flats_mm) / 2 + RELIEF_MM / 2 > least / 2:
        raise ValueError(f"a boom of {least:.3f} mm has no room for a nut {size.screw} in the guide's wall")
    if size.seat_mm / 2 + 2.0 > size.outside_mm("+z"):
        raise ValueError(f"a bushing of {bushing_outside_mm:.3f} mm leaves no wall in a guide for this boom")
    return size
