"""Every part that can be placed: which function of `design` knows its sizes, and who makes it."""

import functools
import importlib
from collections.abc import Sequence
from typing import Protocol, cast

from fabgen.design.arranged import Parameters, Shape, Source


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


PARTS: dict[str, tuple[str, Source]] = {
    "bush": ("bush_sizes.bush_size", "printed"),
    "clamp_plate": ("hardware_sizes.clamp_plate_size", "made"),
    "crush_sleeve": ("hardware_sizes.crush_sleeve_size", "made"),
    "feed_block": ("feed_sizes.feed_block_size", "printed"),
    "feed_lid": ("feed_lid_sizes.feed_lid_size", "printed"),
    "folded_rod": ("folded_rod_sizes.folded_rod_size", "made"),
    "folded_saddle": ("folded_saddle_sizes.folded_saddle_size", "printed"),
    "nut": ("hardware_sizes.nut_size", "bought"),
    "push_ring": ("keeper_sizes.push_ring_size", "printed"),
    "rod": ("hardware_sizes.rod_size", "made"),
    "saddle": ("saddle_sizes.saddle_size", "printed"),
    "screw": ("hardware_sizes.screw_size", "bought"),
    "sleeve": ("bush_sizes.sleeve_size", "printed"),
    "snap_keeper": ("keeper_sizes.snap_keeper_size", "printed"),
    "u_bolt": ("hardware_sizes.u_bolt_size", "bought"),
    "washer": ("hardware_sizes.washer_size", "bought"),
}
"""Part in `model/parts` → module and function in `design`, loaded when the part is first placed; and who makes it."""


@functools.cache
def size_of(part: str, parameters: Parameters) -> tuple[float, tuple[Shape, ...]]:
    """Volume in mm³ and local shapes of a distinct part, worked out once.

    Raises:
        ValueError: no such part can be made with these numbers.
    """
    module, _, function = PARTS[part][0].partition(".")
    found = getattr(importlib.import_module(f"fabgen.design.{module}"), function)
    size = cast(Size, found(**dict(parameters)))
    return size.volume_mm3, tuple(size.shapes)
