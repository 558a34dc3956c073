"""Sizes of the feed block's lid; frame and numbers are the block's."""

from typing import Any

from fabgen.design.arranged import Box
from fabgen.design.feed_layout import TOOTH_MM
from fabgen.design.feed_sizes import FeedBlockSize, feed_block_size
from fabgen.frozen import frozen


@frozen
class FeedLidSize:
    """A feed block's lid: a plate in the block's rabbet and the wedge that grips the cable."""

    block: FeedBlockSize

    @property
    def volume_mm3(self) -> float:
        """Exact volume of the solid."""
        return self.block.lid_volume_mm3

    @property
    def shapes(self) -> tuple[Box, Box]:
        """Plate and wedge, its ridges held."""
        block = self.block
        (x, y), (x0, x1), (y0, y1) = block.lid_mm, block.slot_x_mm, block.tongue_y_mm
        return (
            Box((-x, -y, block.lid_seat_mm), (x, y, block.top_mm)),
            Box((x0, y0 - TOOTH_MM, block.tongue_low_mm), (x1, y1, block.lid_seat_mm)),
        )


def feed_lid_size(**parameters: Any) -> FeedLidSize:
    """Sizes of a lid, from the keywords of its block.

    Raises:
        ValueError: no such block can be made.
    """
    return FeedLidSize(feed_block_size(**parameters))
