"""Sizes of the coupon holder: the block on a test array's timber that the director is laid into, free or in its mount.

Frame: origin on the timber's top under the rod; x along the timber, y along the rod, z up. Two cheeks stand beside the
piece of boom; the rod lies in a slot in each, which fixes its station; the piece lies between them on the floor.
"""

from fabgen.design.arranged import Box
from fabgen.design.part_fasteners import Fastener, fastener, sold_length_mm
from fabgen.design.part_geometry import disc_mm2
from fabgen.design.saddle_sizes import EAR_WALL_MM, saddle_size
from fabgen.design.top_block import COUNTERBORE_PLAY_MM, ENGAGEMENT_MM
from fabgen.frozen import frozen

CHEEK_MM = 8.0
BESIDE_ROD_MM = 8.0
"""Plastic of a cheek before and behind the slot."""
OVER_ROD_MM = 3.0
SLOT_PLAY_MM = 0.2
"""Slot over rod: the rod's station is fixed to half of it either way."""
SIDE_PLAY_MM = 1.5
"""Between a cheek and the outermost part of the mount."""
UNDER_PIECE_MM = 0.5
"""The piece hangs by its rod; the floor only keeps it from tipping."""
TIE_MM = (6.0, 3.0)
"""Slot for a cable tie, along x and across."""
TIE_WALL_MM = 2.4


@frozen
class CouponHolderSize:
    """One holder.

    Attributes:
        rod_diameter_mm: the director.
        height_mm: from the timber's top to the rod's axis.
        boom_width_mm: of the piece of boom, along the rod.
        rest_mm: from the rod's axis down to the underside of the piece.
        stack_mm: what stands out of the piece's wall along the rod: flange and keeper.
        screw: thread of the two hold-down screws.
        screw_x_mm: their distance from the rod; as of the saddle that stands here in the test array.
        hole_growth_mm: added to the drawn holes and slots.
    """

    rod_diameter_mm: float
    height_mm: float
    boom_width_mm: float
    rest_mm: float
    stack_mm: float
    screw: str
    screw_x_mm: float
    hole_growth_mm: float

    @property
    def fastener(self) -> Fastener:
        """The hold-down screw's sizes."""
        return fastener(self.screw)

    @property
    def slot_mm(self) -> float:
        """Drawn width of the rod's slots."""
        return self.rod_diameter_mm + SLOT_PLAY_MM + self.hole_growth_mm

    @property
    def floor_mm(self) -> float:
        """Level of the floor."""
        return self.height_mm - self.rest_mm - UNDER_PIECE_MM

    @property
    def seat_mm(self) -> float:
        """Level of the screw heads' seats."""
        return shortest_screw_mm(self.fastener) - ENGAGEMENT_MM

    @property
    def counterbore_mm(self) -> float:
        """Drawn diameter of the hole for a screw's head."""
        return self.fastener.head_diameter_mm + COUNTERBORE_PLAY_MM + self.hole_growth_mm

    @property
    def clearance_mm(self) -> float:
        """Drawn diameter of the hole for a screw's shank."""
        return self.fastener.clearance_mm + self.hole_growth_mm

    @property
    def inner_mm(self) -> float:
        """Half the distance between the cheeks."""
        return self.boom_width_mm / 2 + self.stack_mm + SIDE_PLAY_MM

    @property
    def half_y_mm(self) -> float:
        """Half the width along the rod."""
        return self.inner_mm + CHEEK_MM

    @property
    def cheek_x_mm(self) -> float:
        """Half the length of a cheek along the timber."""
        return max(self.rod_diameter_mm / 2 + BESIDE_ROD_MM, self.height_mm / 4)

    @property
    def top_mm(self) -> float:
        """Level of the cheeks' top."""
        return self.height_mm + self.rod_diameter_mm / 2 + OVER_ROD_MM

    @property
    def tie_x_mm(self) -> float:
        """Where along x the slots for cable ties stand, before and behind the rod."""
        beyond = max(self.cheek_x_mm, self.screw_x_mm + self.counterbore_mm / 2 + EAR_WALL_MM)
        return beyond + TIE_WALL_MM + TIE_MM[0] / 2

    @property
    def tie_y_mm(self) -> float:
        """Where across they stand: beside the piece."""
        return self.boom_width_mm / 2 + TIE_WALL_MM + TIE_MM[1] / 2

    @property
    def half_x_mm(self) -> float:
        """Half the length along the timber."""
        return self.tie_x_mm + TIE_MM[0] / 2 + TIE_WALL_MM

    @property
    def volume_mm3(self) -> float:
        """Exact volume of the solid."""
        floor = 4 * self.half_x_mm * self.half_y_mm * self.floor_mm
        cheek = 2 * self.cheek_x_mm * CHEEK_MM * (self.top_mm - self.floor_mm)
        slot = CHEEK_MM * (self.slot_mm * (self.top_mm - self.height_mm) + disc_mm2(self.slot_mm) / 2)
        screw = disc_mm2(self.clearance_mm) * self.seat_mm
        screw += disc_mm2(self.counterbore_mm) * (self.floor_mm - self.seat_mm)
        ties = 4 * TIE_MM[0] * TIE_MM[1] * self.floor_mm
        return floor + 2 * (cheek - slot) - 2 * screw - ties

    @property
    def shapes(self) -> tuple[Box, Box, Box]:
        """Floor and cheeks in the local frame: an envelope, slots and holes not taken out."""
        x, y, cheek = self.half_x_mm, self.half_y_mm, self.cheek_x_mm
        return (
            Box((-x, -y, 0.0), (x, y, self.floor_mm)),
            Box((-cheek, self.inner_mm, self.floor_mm), (cheek, y, self.top_mm)),
            Box((-cheek, -y, self.floor_mm), (cheek, -self.inner_mm, self.top_mm)),
        )


def shortest_screw_mm(thread: Fastener) -> float:
    """Length of a hold-down screw, the same as of a saddle."""
    least = max(4.0, 1.2 * thread.diameter_mm) + ENGAGEMENT_MM
    return sold_length_mm(least)


def least_height_mm(*, rest_mm: float, screw: str = "M3") -> float:
    """Lowest rod axis over the timber at which the floor holds the screws' heads.

    Args:
        rest_mm: from the rod's axis down to the underside of the piece.
        screw: thread of the hold-down screws.
    """
    thread = fastener(screw)
    return rest_mm + UNDER_PIECE_MM + shortest_screw_mm(thread) - ENGAGEMENT_MM + thread.head_height_mm


def coupon_holder_size(
    *,
    rod_diameter_mm: float = 4.0,
    height_mm: float = 20.0,
    boom_width_mm: float = 20.0,
    rest_mm: float = 10.0,
    stack_mm: float = 8.0,
    screw: str = "M3",
    hole_growth_mm: float = 0.0,
) -> CouponHolderSize:
    """Sizes of a holder; its screws stand where those of the test array's saddle would.

    Raises:
        ValueError: the rod lies too low for the piece and a floor under it.
    """
    least = least_height_mm(rest_mm=rest_mm, screw=screw)
    if height_mm < least - 1e-9:
        raise ValueError(f"a holder for this piece needs a rod {least:g} mm over the timber, not {height_mm:g} mm")
    saddle = saddle_size(rod_diameter_mm=rod_diameter_mm, height_mm=height_mm, screw=screw)
    return CouponHolderSize(
        rod_diameter_mm=rod_diameter_mm,
        height_mm=height_mm,
        boom_width_mm=boom_width_mm,
        rest_mm=rest_mm,
        stack_mm=stack_mm,
        screw=screw,
        screw_x_mm=saddle.screw_x_mm[1],
        hole_growth_mm=hole_growth_mm,
    )
