"""Where everything is in the straight dipole's feed block and its lid.

Frame of both: origin on the boom's top (round: its crown) under the rod; x along the boom, y along the rods, z up. The
half rods enter from ±y through the side walls, lie in troughs of the chamber's floor and end at a rib as wide as the
gap. A terminal screw crosses each of them from above, its nut in a trap under the floor. The cable comes up beside the
boom at +y and is gripped by a wedge on the lid; water leaves by a drain at −y. Two screws hold the block on the boom's
top.
"""

import math

from fabgen.design.part_fasteners import SCREW_LENGTHS_MM
from fabgen.design.part_geometry import hexagon_corners_mm
from fabgen.design.top_block import BESIDE_BOOM_MM, BEYOND_NUT_MM, ENGAGEMENT_MM, LEAST_UNDER_ROD_MM, TAG_MM, FedBlock
from fabgen.frozen import frozen
from fabgen.stock.fasteners import tap_drill_mm

# Walls, plays and reaches are our own choice, made for lines of 0.4 mm; none is measured. What a standard sets
# (threads, heads, nuts, holes) comes from the stock tables.
WALL_X_MM = 2.4
WALL_Y_MM = 3.0
RIM_MM = 1.2  # outside the lid: the block's thinnest wall
LID_MM = 3.0
LID_PLAY_MM = 0.3
POST_MM = 7.0
LID_SCREW_IN_MM = 4.4
PILOT_DEPTH_MM = 11.0
LID_SCREW_LENGTH_MM = 12.0
STEP_MM = 0.4
LAND_MM = 1.4
GRIP = 0.85  # of the cable's diameter, what the wedge leaves
TONGUE_MM = 3.0
TONGUE_PLAY_MM = 0.2
TONGUE_REACH_MM = 10.0
TONGUE_OVER_FOOT_MM = 2.0
LEAST_GRIP_MM = 5.0
TOOTH_MM = 0.5
TIP_MM = (1.2, 4.0)
DRAIN_MM = 4.0
CRADLE_DEG = 60.0  # from the crown, how far down a round boom the foot reaches


@frozen
class FeedBlockLayout(FedBlock):
    """One feed block with its lid; its height is also the level of the chamber's floor, the gap the rib's width.

    Attributes:
        lid_screw: thread of the four lid screws, formed in the plastic.
    """

    lid_screw: str

    # Terminals.

    @property
    def terminal_head_mm(self) -> float:
        """Level under the terminal screw's head, a solder tag below it on the rod."""
        return self.height_mm + self.rod_diameter_mm / 2 + TAG_MM

    @property
    def trap_top_mm(self) -> float:
        """Level of the nut's seat: the trap is open below it."""
        tip = self.terminal_head_mm - self.terminal_length_mm
        return tip + BEYOND_NUT_MM + self.terminal_fastener.nut_height_mm

    @property
    def step_mm(self) -> float:
        """Width along x of the step in the trap's roof, narrower than the screw's hole and wider than the screw.

        The roof prints in two bridges, first along y beside the step, then across it: no support and no drilling out.
        """
        bolt = self.terminal_fastener
        return (bolt.diameter_mm + bolt.clearance_mm) / 2

    @property
    def terminal_gap_mm(self) -> float:
        """Smallest distance between a terminal screw and the block."""
        return (self.step_mm - self.terminal_fastener.diameter_mm) / 2

    # Rib and hold-down screws.

    @property
    def rib_half_mm(self) -> float:
        """Half the rib's length along the boom."""
        return self.bore_mm / 2 + 1.5

    @property
    def rib_top_mm(self) -> float:
        """Level of the rib's top, above the rods."""
        return self.height_mm + self.rod_diameter_mm / 2 + 1.0

    @property
    def screw_x_mm(self) -> tuple[float, float]:
        """Where along x the two hold-down screws stand, on the centre line of the boom's top."""
        offset = self.rib_half_mm + 0.6 + self.counterbore_mm / 2
        return -offset, offset

    @property
    def screw_length_mm(self) -> float:
        """Hold-down length to buy: the longest whose head stays below the floor."""
        most = self.height_mm - self.fastener.head_height_mm + ENGAGEMENT_MM
        return max((length for length in SCREW_LENGTHS_MM if length <= most), default=0.0)

    # Cable.

    @property
    def slot_x_mm(self) -> tuple[float, float]:
        """The cable slot along the boom."""
        trap = hexagon_corners_mm(self.trap_flats_mm)
        low = max(self.bore_mm, trap) / 2 + LAND_MM
        return low, low + self.cable_mm + 2 * TONGUE_PLAY_MM

    @property
    def slot_y_mm(self) -> tuple[float, float]:
        """The cable slot along the rods: squeezed cable inboard, wedge outboard."""
        low = max(self.boom_width_mm / 2 + BESIDE_BOOM_MM, self.counterbore_mm / 2 + LAND_MM)
        return low, low + self.grip_mm + TONGUE_MM + TONGUE_PLAY_MM

    @property
    def grip_mm(self) -> float:
        """What the wedge leaves of the cable's diameter."""
        return GRIP * self.cable_mm

    @property
    def cable_at_mm(self) -> tuple[float, float]:
        """x, y of the cable's axis, going down beside the boom."""
        return sum(self.slot_x_mm) / 2, self.slot_y_mm[0] + self.cable_mm / 2

    @property
    def drain_at_mm(self) -> tuple[float, float]:
        """x, y of the drain: opposite the cable, or as far from the trap as its slot where the cable is thinner."""
        return -max(self.cable_at_mm[0], self.slot_x_mm[0] + DRAIN_MM / 2), -(self.slot_y_mm[0] + DRAIN_MM / 2)

    @property
    def tongue_y_mm(self) -> tuple[float, float]:
        """The lid's wedge along the rods: it stands between the squeezed cable and the slot's outer wall."""
        low = self.slot_y_mm[0] + self.grip_mm
        return low, low + TONGUE_MM

    @property
    def tongue_low_mm(self) -> float:
        """Level of the wedge's tip."""
        return max(self.height_mm - TONGUE_REACH_MM, self.bottom_mm + TONGUE_OVER_FOOT_MM)

    @property
    def tooth_z_mm(self) -> tuple[float, ...]:
        """Levels of the ridges that bite into the cable."""
        return tuple(self.height_mm - 1.0 - 2.0 * i for i in range(2))

    # Outside, chamber, lid.

    @property
    def half_x_mm(self) -> float:
        """Half the block's length along the boom."""
        openings = max(self.slot_x_mm[1], DRAIN_MM / 2 - self.drain_at_mm[0])
        return max(openings + POST_MM, self.screw_x_mm[1] + self.counterbore_mm / 2 + 0.5 + WALL_X_MM)

    @property
    def half_y_mm(self) -> float:
        """Half the block's width along the rods."""
        return max(self.slot_y_mm[1], self.terminal_y_mm + 3.5) + WALL_Y_MM

    @property
    def chamber_mm(self) -> tuple[float, float]:
        """Half the chamber in x and y."""
        return self.half_x_mm - WALL_X_MM, self.half_y_mm - WALL_Y_MM

    @property
    def lid_seat_mm(self) -> float:
        """Level of the rabbet's floor: the lid's underside."""
        head = self.rod_diameter_mm / 2 + TAG_MM + self.terminal_fastener.head_height_mm + 2.0
        return self.height_mm + max(8.0, head)

    @property
    def top_mm(self) -> float:
        """Level of the top, flush with the lid."""
        return self.lid_seat_mm + LID_MM

    @property
    def rabbet_mm(self) -> tuple[float, float]:
        """Half the rabbet in x and y."""
        return self.half_x_mm - RIM_MM, self.half_y_mm - RIM_MM

    @property
    def lid_mm(self) -> tuple[float, float]:
        """Half the lid in x and y."""
        return self.rabbet_mm[0] - LID_PLAY_MM / 2, self.rabbet_mm[1] - LID_PLAY_MM / 2

    @property
    def pilot_mm(self) -> float:
        """Diameter of the holes in which the lid's screws form their thread."""
        return tap_drill_mm(self.lid_screw)

    @property
    def post_inner_mm(self) -> tuple[float, float]:
        """±x, ±y of the posts' inner faces."""
        return self.half_x_mm - POST_MM, self.half_y_mm - POST_MM

    @property
    def lid_screw_mm(self) -> tuple[float, float]:
        """±x, ±y of the four lid screws."""
        return self.half_x_mm - LID_SCREW_IN_MM, self.half_y_mm - LID_SCREW_IN_MM

    # Foot.

    @property
    def foot_drop_mm(self) -> float:
        """How far the cradle reaches below a round boom's crown; 0 on a flat top."""
        return self.boom_diameter_mm / 2 * (1 - math.cos(math.radians(CRADLE_DEG)))

    @property
    def bottom_mm(self) -> float:
        """Level of the underside."""
        return 0.0 - self.foot_drop_mm

    @property
    def roof_mm(self) -> float:
        """Level of the cradle's roof over a round boom: the boom's circle closed by tangents at 45°, or cut flat.

        Cut where plastic under a hold-down head or a rod asks for it.
        """
        apex = (math.sqrt(2) - 1) * self.boom_diameter_mm / 2
        under_rod = self.height_mm - self.bore_mm / 2 - LEAST_UNDER_ROD_MM
        return min(apex, self.seat_mm - 3.0, under_rod) if self.boom_diameter_mm else 0.0

    def underside_mm(self, y_mm: float) -> float:
        """Level of the underside at a distance y across: the cradle carries the boom between 45° and 60°."""
        radius, y = self.boom_diameter_mm / 2, abs(y_mm)
        if y >= radius * math.sin(math.radians(CRADLE_DEG)):
            return self.bottom_mm
        if y > radius * math.sqrt(0.5):
            return math.sqrt(radius**2 - y**2) - radius
        return min(self.roof_mm, (math.sqrt(2) - 1) * radius - y)

    @property
    def length_mm(self) -> float:
        """Footprint along the boom."""
        return 2 * self.half_x_mm
