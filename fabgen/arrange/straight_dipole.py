"""A split straight dipole: two half rods in a block on the boom's top, a terminal screw through each."""

from fabgen.arrange.fasteners import DOWN, hold_down, nut, screw
from fabgen.arrange.layout import SIDES, Layout, Value, outward, side_name
from fabgen.arrange.rods import drilled_rod
from fabgen.design.arranged import Cut, Frame
from fabgen.design.design import Design, Feed
from fabgen.design.feed_layout import LID_SCREW_LENGTH_MM
from fabgen.design.feed_sizes import FeedBlockSize, feed_block_size
from fabgen.design.ledger import LedgerLine
from fabgen.design.part_fasteners import fastener


def lay_out(design: Design, feed: Feed, line: LedgerLine) -> tuple[Layout, list[Cut]]:
    """Half rods, block, lid, screws, holes and the two sawn pieces."""
    element, boom = design.element(feed.element), design.boom
    numbers: dict[str, Value] = {
        "rod_diameter_mm": element.rod.diameter_mm,
        "gap_mm": feed.gap_mm,
        "height_mm": feed.height_mm,
        "cable_mm": feed.cable_mm,
        "boom_width_mm": boom.width_mm,
        "boom_diameter_mm": boom.diameter_mm,
        "hole_growth_mm": design.printer.hole_growth_mm,
    }
    size = feed_block_size(
        rod_diameter_mm=element.rod.diameter_mm,
        gap_mm=feed.gap_mm,
        height_mm=feed.height_mm,
        cable_mm=feed.cable_mm,
        boom_width_mm=boom.width_mm,
        boom_diameter_mm=boom.diameter_mm,
        hole_growth_mm=design.printer.hole_growth_mm,
    )
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
    hold_down(
        layout,
        design,
        owner=element.id,
        block=block,
        station_mm=element.station_mm,
        offsets_mm=size.screw_x_mm,
        seat_mm=size.seat_mm,
        length_mm=size.screw_length_mm,
        thread=size.screw,
        purpose="feed screw",
    )
    _lid_screws(layout, design, feed, size)
    return layout, _halves(layout, design, feed, line, size)


def _halves(layout: Layout, design: Design, feed: Feed, line: LedgerLine, size: FeedBlockSize) -> list[Cut]:
    element, top_mm = design.element(feed.element), design.boom.top_mm
    half_mm = (line.cut_mm - feed.gap_mm) / 2
    block, bolt = f"{element.id} feed block", size.terminal_fastener
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
        name, y_mm = f"{element.id} terminal {{}} {side_name(side)}", side * size.terminal_y_mm
        bolt_name, nut_name = name.format("screw"), name.format("nut")
        head = (element.station_mm, y_mm, top_mm + size.terminal_head_mm)
        trap = (element.station_mm, y_mm, top_mm + size.trap_top_mm)
        screw(layout, bolt_name, size.terminal, size.terminal_length_mm, owner=element.id, seat=head)
        nut(layout, nut_name, size.terminal, owner=element.id, seat=trap, up=DOWN)
        layout.meet(bolt_name, piece, "screw across rod", size.rod_gap_mm, 2 * size.rod_gap_mm)
        layout.meet(bolt_name, block, "screw in block", size.terminal_gap_mm, bolt.clearance_mm - bolt.diameter_mm)
        layout.meet(nut_name, block, "nut in trap", 0.0)
        layout.meet(nut_name, bolt_name, "thread in nut", 0.0, 0.0)
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
