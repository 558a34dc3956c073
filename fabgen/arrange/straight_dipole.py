"""A split straight dipole: two half rods in a block on the boom's top, a terminal screw through each."""

from fabgen.arrange.fasteners import UP, screw
from fabgen.arrange.fed_block import numbers_of, screwed_down, terminal
from fabgen.arrange.layout import SIDES, Layout, outward, side_name
from fabgen.arrange.rods import drilled_rod
from fabgen.design.arranged import Cut, Frame
from fabgen.design.design import Design, Feed
from fabgen.design.feed_layout import LID_SCREW_LENGTH_MM
from fabgen.design.feed_sizes import FeedBlockSize, feed_block_size
from fabgen.design.ledger import LedgerLine
from fabgen.design.part_fasteners import fastener


def lay_out(design: Design, feed: Feed, line: LedgerLine) -> tuple[Layout, list[Cut]]:
    """Half rods, block, lid, screws, holes and the two sawn pieces."""
    element, boom, numbers = design.element(feed.element), design.boom, numbers_of(design, feed)
    size = feed_block_size(**numbers)
    layout = Layout()
    block, lid = f"{element.id} feed block", f"{element.id} feed lid"
    for part, name in (("feed_block", block), ("feed_lid", lid)):
        layout.put(
            part,
            name,
            numbers,
            owner=element.id,
            label=f"{part.replace('_', ' ')} rod {element.rod.diameter_mm:g} height {feed.height_mm:g}",
            material=feed.material,
            frame=Frame((element.station_mm, 0.0, boom.top_mm)),
        )
    layout.meet(block, "boom", "block on boom", 0.0)
    layout.meet(lid, block, "lid in rabbet", 0.0)
    screwed_down(layout, design, feed, block, size)
    _lid_screws(layout, design, feed, size)
    return layout, _halves(layout, design, feed, line, size)


def _halves(layout: Layout, design: Design, feed: Feed, line: LedgerLine, size: FeedBlockSize) -> list[Cut]:
    element, top_mm = design.element(feed.element), design.boom.top_mm
    half_mm = (line.cut_mm - feed.gap_mm) / 2
    block = f"{element.id} feed block"
    cuts = []
    for side in SIDES:
        piece = f"{element.id}-{side_name(side)}"
        drilled_rod(
            layout,
            element,
            piece,
            length_mm=half_mm,
            middle=(element.station_mm, side * (feed.gap_mm + half_mm) / 2, top_mm + feed.height_mm),
            z=outward(side),
            hole_mm=size.rod_hole_mm,
            hole_z_mm=size.rod_hole_from_end_mm - half_mm / 2,
        )
        layout.meet(piece, block, "bore on rod", 0.0, size.bore_mm - element.rod.diameter_mm)
        y_mm = side * size.terminal_y_mm
        seat = (element.station_mm, y_mm, top_mm + size.terminal_head_mm)
        trap = (element.station_mm, y_mm, top_mm + size.trap_top_mm)
        terminal(layout, element.id, side, size, block=block, rod=piece, seat=seat, trap=trap, up=UP)
        cuts.append(
            Cut(
                piece=piece,
                element=element.id,
                stock="rod",
                rod_mm=element.rod.diameter_mm,
                material=element.rod.material.name,
                cut_mm=half_mm,
                trim_mm=line.trim_mm / 2,
                half_mm=0.0,
                projection_mm=feed.gap_mm / 2 + half_mm - size.half_y_mm,
                tolerance_mm=line.tolerance_mm / 2,
                note=f"hole {size.rod_hole_mm:g} across, {size.rod_hole_from_end_mm:g} from the inner end",
            )
        )
    return cuts


def _lid_screws(layout: Layout, design: Design, feed: Feed, size: FeedBlockSize) -> None:
    element = design.element(feed.element)
    (x_mm, y_mm), top_mm = size.lid_screw_mm, design.boom.top_mm + size.top_mm
    pilot_fit_mm = size.pilot_mm - fastener(size.lid_screw).diameter_mm
    for count, (along, across) in enumerate(((1, 1), (1, -1), (-1, 1), (-1, -1)), start=1):
        name = f"{element.id} lid screw {count}"
        seat = (element.station_mm + along * x_mm, across * y_mm, top_mm)
        screw(layout, name, size.lid_screw, LID_SCREW_LENGTH_MM, owner=element.id, seat=seat, head="pan")
        layout.meet(name, f"{element.id} feed lid", "screw head on lid", 0.0)
        layout.meet(name, f"{element.id} feed block", "thread in plastic", 0.0, pilot_fit_mm)
