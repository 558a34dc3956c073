"""Every part that can be placed: where its sizes come from and who makes it."""

from collections.abc import Callable, Sequence
from dataclasses import dataclass
from typing import Any, Protocol

from fabgen.design import part_sizes
from fabgen.design.arranged import Box, Shape, Source


class Size(Protocol):
    """What a part's size record offers for placing it."""

    @property
    def volume_mm3(self) -> float:
        """Volume of the solid."""
        ...

    @property
    def shapes(self) -> Sequence[Shape]:
        """Simple shapes in the part's local frame."""
        ...


@dataclass(frozen=True, slots=True)
class LidSize:
    """A feed block's lid: a plate in the block's rabbet and the wedge that grips the cable."""

    block: part_sizes.FeedBlockSize

    @property
    def volume_mm3(self) -> float:
        """Volume of the lid's solid."""
        return self.block.lid_volume_mm3

    @property
    def shapes(self) -> Sequence[Shape]:
        """Plate and wedge."""
        block = self.block
        (x, y), (x0, x1), (y0, y1) = block.lid_mm, block.slot_x_mm, block.tongue_y_mm
        return (
            Box((-x, -y, block.lid_seat_mm), (x, y, block.top_mm)),
            Box((x0, y0, block.tongue_low_mm), (x1, y1, block.lid_seat_mm)),
        )


def _lid(**parameters: Any) -> LidSize:
    return LidSize(part_sizes.feed_block_size(**parameters))


SIZES: dict[str, tuple[Callable[..., Size], Source]] = {
    "bush": (part_sizes.bush_size, "printed"),
    "clamp_plate": (part_sizes.clamp_plate_size, "made"),
    "crush_sleeve": (part_sizes.crush_sleeve_size, "made"),
    "feed_block": (part_sizes.feed_block_size, "printed"),
    "feed_lid": (_lid, "printed"),
    "folded_rod": (part_sizes.folded_rod_size, "made"),
    "folded_saddle": (part_sizes.folded_saddle_size, "printed"),
    "nut": (part_sizes.nut_size, "bought"),
    "push_ring": (part_sizes.push_ring_size, "printed"),
    "rod": (part_sizes.rod_size, "made"),
    "saddle": (part_sizes.saddle_size, "printed"),
    "screw": (part_sizes.screw_size, "bought"),
    "sleeve": (part_sizes.sleeve_size, "printed"),
    "snap_keeper": (part_sizes.snap_keeper_size, "printed"),
    "u_bolt": (part_sizes.u_bolt_size, "bought"),
    "washer": (part_sizes.washer_size, "bought"),
}
"""Part name in `model/parts` → function of its sizes, and whether it is printed, bought or made in the shop."""
