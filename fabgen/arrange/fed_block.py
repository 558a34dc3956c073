"""What the blocks of both dipoles share: their numbers, how they are screwed to the boom, and their terminals."""

from typing import Any

from fabgen.arrange.fasteners import hold_down, nut, screw
from fabgen.arrange.layout import Layout, Side, side_name
from fabgen.design.arranged import Vector
from fabgen.design.design import Design, Feed
from fabgen.design.feed_sizes import FeedBlockSize
from fabgen.design.folded_saddle_sizes import FoldedSaddleSize

Size = FeedBlockSize | FoldedSaddleSize


def numbers_of(design: Design, feed: Feed) -> dict[str, Any]:
    """The keywords that size and solid of both take from a design."""
    return {
        "rod_diameter_mm": design.element(feed.element).rod.diameter_mm,
        "gap_mm": feed.gap_mm,
        "height_mm": feed.height_mm,
        "cable_mm": feed.cable_mm,
        "boom_width_mm": design.boom.width_mm,
        "boom_diameter_mm": design.boom.diameter_mm,
        "hole_growth_mm": design.printer.hole_growth_mm,
    }


def screwed_down(layout: Layout, design: Design, feed: Feed, block: str, size: Size) -> None:
    """Two screws into the boom's top."""
    hold_down(
        layout,
        design,
        owner=feed.element,
        block=block,
        station_mm=design.element(feed.element).station_mm,
        offsets_mm=size.screw_x_mm,
        seat_mm=size.seat_mm,
        length_mm=size.screw_length_mm,
        thread=size.screw,
        purpose="feed screw",
    )


def terminal(
    layout: Layout, owner: str, side: Side, size: Size, *, block: str, rod: str, seat: Vector, trap: Vector, up: Vector
) -> None:
    """A screw through one fed end, its head on `seat`, its nut under `trap` in the block; `up` is from nut to head."""
    bolt = size.terminal_fastener
    bolt_name, nut_name = (f"{owner} terminal {what} {side_name(side)}" for what in ("screw", "nut"))
    down = (0.0 - up[0], 0.0 - up[1], 0.0 - up[2])
    screw(layout, bolt_name, size.terminal, size.terminal_length_mm, owner=owner, seat=seat, up=up)
    nut(layout, nut_name, size.terminal, owner=owner, seat=trap, up=down)
    layout.meet(bolt_name, rod, "screw across rod", size.rod_gap_mm, 2 * size.rod_gap_mm)
    layout.meet(bolt_name, block, "screw in block", size.terminal_gap_mm, bolt.clearance_mm - bolt.diameter_mm)
    layout.meet(nut_name, block, "nut in trap", 0.0)
    layout.meet(nut_name, bolt_name, "thread in nut", 0.0, 0.0)
