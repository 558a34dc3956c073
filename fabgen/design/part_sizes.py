"""Sizes of every part as numbers, from the same keywords that build its solid: one import for the light stages.

Each `<part>_size(...)` returns a frozen record with diameters, lengths, screw and hole positions, envelope shapes in
the part's local frame and the volume of its solid; the solids take their numbers from the same records.
"""

from fabgen.design.bush_sizes import BushSize, bush_size, sleeve_size
from fabgen.design.coupon_holder_sizes import CouponHolderSize, coupon_holder_size
from fabgen.design.feed_lid_sizes import FeedLidSize, feed_lid_size
from fabgen.design.feed_sizes import FeedBlockSize, feed_block_size
from fabgen.design.folded_rod_sizes import FoldedRodSize, folded_rod_size
from fabgen.design.folded_saddle_sizes import FoldedSaddleSize, folded_saddle_size
from fabgen.design.hardware_sizes import (
    ClampPlateSize,
    NutSize,
    RodSize,
    ScrewSize,
    TubeSize,
    UBoltSize,
    clamp_plate_size,
    crush_sleeve_size,
    nut_size,
    rod_size,
    screw_size,
    u_bolt_size,
    washer_size,
)
from fabgen.design.keeper_sizes import PushRingSize, SnapKeeperSize, push_ring_size, snap_keeper_size
from fabgen.design.saddle_sizes import SaddleSize, saddle_size

__all__ = [
    "BushSize",
    "ClampPlateSize",
    "CouponHolderSize",
    "FeedBlockSize",
    "FeedLidSize",
    "FoldedRodSize",
    "FoldedSaddleSize",
    "NutSize",
    "PushRingSize",
    "RodSize",
    "SaddleSize",
    "ScrewSize",
    "SnapKeeperSize",
    "TubeSize",
    "UBoltSize",
    "bush_size",
    "clamp_plate_size",
    "coupon_holder_size",
    "crush_sleeve_size",
    "feed_block_size",
    "feed_lid_size",
    "folded_rod_size",
    "folded_saddle_size",
    "nut_size",
    "push_ring_size",
    "rod_size",
    "saddle_size",
    "screw_size",
    "sleeve_size",
    "snap_keeper_size",
    "u_bolt_size",
    "washer_size",
]
