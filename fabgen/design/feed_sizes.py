"""Sizes of the straight dipole's feed block and its lid: envelope and volume on top of the layout."""

import itertools
import math
from collections.abc import Callable

from fabgen.design import feed_layout as layout
from fabgen.design.arranged import Box
from fabgen.design.feed_layout import FeedBlockLayout
from fabgen.design.openings import Opening, box_opening, hexagon_opening, round_opening, wall_between_mm
from fabgen.design.part_fasteners import SCREW_LENGTHS_MM, fastener
from fabgen.design.part_geometry import disc_mm2, hexagon_corners_mm, integral, teardrop_mm2, under_disc_mm3
from fabgen.design.top_block import BEYOND_NUT_MM, ENGAGEMENT_MM, terminal_for
from fabgen.frozen import frozen
from fabgen.stock.practice import print_practice

NO_WALL = (("rod", "nut"), ("cable slot", "drain"))
"""An opening over the other, and two on opposite sides of the block."""


@frozen
class FeedBlockSize(FeedBlockLayout):
    """One feed block; its lid takes its numbers from the same record."""

    @property
    def shapes(self) -> tuple[Box]:
        """The closed block in the local frame: an envelope that holds the lid too."""
        x, y = self.half_x_mm, self.half_y_mm
        return (Box((-x, -y, self.bottom_mm), (x, y, self.top_mm)),)

    @property
    def walls_mm(self) -> dict[str, float]:
        """Walls of block and lid as drawn that other numbers can make thinner than the rim; the rest never are."""
        at_lid_screws = layout.LID_SCREW_IN_MM - layout.RIM_MM - layout.LID_PLAY_MM / 2
        lid_hole, pilot = (self.drawn_mm(hole) for hole in (fastener(self.lid_screw).clearance_mm, self.pilot_mm))
        walls = {
            "rim": layout.RIM_MM,
            "rib between the rods": self.gap_mm,
            "lid's wedge": min(self.cable_mm, layout.TONGUE_MM),
            "lid's edge": at_lid_screws - lid_hole / 2,
            "wall round a lid screw": layout.POST_MM - layout.LID_SCREW_IN_MM - pilot / 2,
            "floor between rod and nut": self.height_mm - self.drawn_bore_mm / 2 - self.trap_top_mm - layout.STEP_MM,
            **self._between_openings_mm(),
        }
        if self.boom_diameter_mm:
            beside = self.slot_y_mm[0] - self.boom_diameter_mm / 2 * math.sin(math.radians(layout.CRADLE_DEG))
            walls["floor between rod and cradle"] = self._rod_to_cradle_mm()
            walls["wall between drain and cradle"] = beside - self.hole_growth_mm / 2
        return walls

    @property
    def volume_mm3(self) -> float:
        """Volume of the block's solid, exact but for integrals over the cradle taken in steps."""
        solid = 4 * self.half_x_mm * self.half_y_mm * (self.top_mm - self.bottom_mm)
        return solid - self._open_above_mm3() - self._rods_mm3() - self._upright_mm3() - self._cradle_mm3()

    @property
    def lid_volume_mm3(self) -> float:
        """Exact volume of the lid's solid."""
        x, y = self.lid_mm
        holes = 4 * disc_mm2(self.drawn_mm(fastener(self.lid_screw).clearance_mm))
        plate = (4 * x * y - holes) * layout.LID_MM
        across, along = layout.TIP_MM
        tongue = layout.TONGUE_MM * (self.lid_seat_mm - self.tongue_low_mm) - across * along / 2
        teeth = len(self.tooth_z_mm) * layout.TOOTH_MM**2
        return plate + (tongue + teeth) * self.cable_mm

    def _between_openings_mm(self) -> dict[str, float]:
        """Walls between upright openings, all looked at in the quarter +x, +y: the drain's place is turned into it.

        A hold-down screw's own hole lies inside its head's.
        """
        low, floor, y = self.bottom_mm, self.height_mm, self.terminal_y_mm
        half_bore, (drain_x, drain_y) = self.drawn_bore_mm / 2, self.drain_at_mm
        hold_x = self.screw_x_mm[1]
        openings = {
            "rod": box_opening((-half_bore, half_bore), (self.gap_mm / 2, self.half_y_mm), floor - half_bore, floor),
            "nut": hexagon_opening(self.trap_flats_mm, (0.0, y), low, self.trap_top_mm),
            "hold-down head": round_opening(self.drawn_mm(self.counterbore_mm), (hold_x, 0.0), self.seat_mm, floor),
            "cable slot": box_opening(self.slot_x_mm, self.slot_y_mm, low, floor),
            "drain": round_opening(self.drawn_mm(layout.DRAIN_MM), (-drain_x, -drain_y), low, floor),
            "lid screw": round_opening(
                self.drawn_mm(self.pilot_mm), self.lid_screw_mm, self.lid_seat_mm - layout.PILOT_DEPTH_MM, floor
            ),
        }
        pairs = (pair for pair in itertools.combinations(openings, 2) if pair not in NO_WALL)
        return {f"wall between {a} and {b}": wall_between_mm(openings[a], openings[b]) for a, b in pairs}

    def _rod_to_cradle_mm(self) -> float:
        """From the inner end of a rod's trough to a round boom's cradle, both cut across the boom."""
        radius, y, z = self.boom_diameter_mm / 2, self.gap_mm / 2, self.height_mm - self.drawn_bore_mm / 2
        if z <= self.underside_mm(y):
            return 0.0
        flat, side = (math.sqrt(2) - 1) * radius - self.roof_mm, math.sqrt(0.5) * radius
        roof = Opening(((-flat, self.roof_mm), (flat, self.roof_mm), (side, side - radius), (-side, side - radius)))
        end, boom = Opening(((y, z),)), Opening(((0.0, -radius),), radius)
        return min(wall_between_mm(end, roof), wall_between_mm(end, boom))

    def _open_above_mm3(self) -> float:
        """Rabbet, chamber less posts and rib, and the holes for the lid's screws."""
        (cx, cy), (rx, ry), (px, py) = self.chamber_mm, self.rabbet_mm, self.post_inner_mm
        posts = 4 * (cx - px) * (cy - py)
        chamber = (4 * cx * cy - posts) * (self.lid_seat_mm - self.height_mm)
        rib = 2 * self.rib_half_mm * self.gap_mm * (self.rib_top_mm - self.height_mm)
        pilots = 4 * disc_mm2(self.drawn_mm(self.pilot_mm)) * layout.PILOT_DEPTH_MM
        return 4 * rx * ry * layout.LID_MM + chamber - rib + pilots

    def _rods_mm3(self) -> float:
        """Troughs in the floor and bores through the side walls."""
        trough = disc_mm2(self.drawn_bore_mm) / 2 * (self.chamber_mm[1] - self.gap_mm / 2)
        return 2 * (trough + teardrop_mm2(self.drawn_bore_mm) * (self.half_y_mm - self.chamber_mm[1]))

    def _upright_mm3(self) -> float:
        """Terminal holes with their traps, hold-down holes, cable slot and drain."""
        hole = self.drawn_mm(self.terminal_fastener.clearance_mm)
        ceiling = self.trap_top_mm + layout.STEP_MM
        below_axis = self.height_mm - self.drawn_bore_mm / 2 - ceiling
        terminal = disc_mm2(hole) * below_axis + under_disc_mm3(self.drawn_bore_mm, hole)
        terminal += self.drawn_mm(self.step_mm) * self.trap_flats_mm * layout.STEP_MM
        trap = self._down_mm3(self.terminal_y_mm, self.trap_flats_mm, self._trap_chord_mm, self.trap_top_mm)
        hold = self._hole_down_mm3(0.0, self.drawn_mm(self.fastener.clearance_mm), self.seat_mm)
        hold += disc_mm2(self.drawn_mm(self.counterbore_mm)) * (self.height_mm - self.seat_mm)
        (x0, x1), (y0, y1) = self.slot_x_mm, self.slot_y_mm
        slot = self._down_mm3((y0 + y1) / 2, y1 - y0, lambda _: x1 - x0, self.height_mm)
        drain = self._hole_down_mm3(self.drain_at_mm[1], self.drawn_mm(layout.DRAIN_MM), self.height_mm)
        return 2 * (terminal + trap + hold) + slot + drain

    def _cradle_mm3(self) -> float:
        """The groove for a round boom."""
        if not self.boom_diameter_mm:
            return 0.0
        return (
            self.length_mm
            * 2
            * integral(lambda y: self.underside_mm(y) - self.bottom_mm, 0.0, self.boom_diameter_mm / 2, 2000)
        )

    def _trap_chord_mm(self, offset_mm: float) -> float:
        """Width along x of the hexagonal trap at a distance from its middle."""
        return hexagon_corners_mm(self.trap_flats_mm) - 2 * abs(offset_mm) / math.sqrt(3)

    def _hole_down_mm3(self, y_mm: float, diameter_mm: float, top_mm: float) -> float:
        """A round hole from a level down to the underside."""
        return self._down_mm3(y_mm, diameter_mm, lambda v: math.sqrt(max(0.0, diameter_mm**2 - 4 * v**2)), top_mm)

    def _down_mm3(self, y_mm: float, width_mm: float, chord_mm: Callable[[float], float], top_mm: float) -> float:
        """An upright opening from a level down to the underside; its chord along x by distance from its middle."""

        def slice_mm2(angle: float) -> float:
            offset = width_mm / 2 * math.sin(angle)
            depth = top_mm - self.underside_mm(y_mm + offset)
            return chord_mm(offset) * depth * width_mm / 2 * math.cos(angle)

        return integral(slice_mm2, -math.pi / 2, math.pi / 2, 400)


def feed_block_size(
    *,
    rod_diameter_mm: float = 4.0,
    gap_mm: float = 10.0,
    height_mm: float = 18.0,
    cable_mm: float = 5.0,
    boom_width_mm: float = 20.0,
    boom_diameter_mm: float = 0.0,
    bore_mm: float | None = None,
    screw: str = "M3",
    terminal: str | None = None,
    lid_screw: str = "M3",
    hole_growth_mm: float = 0.0,
) -> FeedBlockSize:
    """Sizes of a feed block; the terminal screw is the largest whose hole takes at most 0.6 of the rod.

    Raises:
        ValueError: the rods lie too low for nut traps, hold-down screws and cable grip, or are too thin to drill.
    """
    size = FeedBlockSize(
        rod_diameter_mm=rod_diameter_mm,
        gap_mm=gap_mm,
        height_mm=height_mm,
        cable_mm=cable_mm,
        boom_width_mm=boom_width_mm,
        boom_diameter_mm=boom_diameter_mm,
        bore_mm=rod_diameter_mm + print_practice("saddle_bore_clearance_mm") if bore_mm is None else bore_mm,
        screw=screw,
        terminal=terminal_for(rod_diameter_mm, terminal),
        lid_screw=lid_screw,
        hole_growth_mm=hole_growth_mm,
    )
    least = least_height_mm(size)
    if height_mm < least:
        raise ValueError(
            f"a feed block for a rod of {rod_diameter_mm:g} mm needs a height of {least:g} mm, not {height_mm:g} mm"
        )
    return size


def least_height_mm(size: FeedBlockLayout) -> float:
    """Lowest rod axis over the boom's top: a whole nut above it, hold-down heads below the floor, the cable gripped."""
    # Head, tag and screw move with the rod, so the seat of the nut keeps its distance to the rod's axis.
    nut = size.height_mm - size.trap_top_mm + size.terminal_fastener.nut_height_mm + BEYOND_NUT_MM
    shortest = next(length for length in SCREW_LENGTHS_MM if length - ENGAGEMENT_MM >= 4.0)
    head = shortest - ENGAGEMENT_MM + size.fastener.head_height_mm
    grip = size.bottom_mm + layout.TONGUE_OVER_FOOT_MM + layout.TIP_MM[1] + layout.LEAST_GRIP_MM
    return max(nut, head, grip)
