"""A rod in an insulating saddle above the boom, held by keepers against the saddle's sides."""

from fabgen.arrange.fasteners import hold_down
from fabgen.arrange.layout import SIDES, Layout
from fabgen.arrange.rods import Seat, keeper_pair, straight_rod
from fabgen.design.arranged import Frame
from fabgen.design.design import Design, Element, Mount, Saddle
from fabgen.design.ledger import LedgerLine
from fabgen.design.saddle_sizes import SaddleSize, saddle_size


def lay_out(design: Design, element: Element, mount: Mount, line: LedgerLine) -> Layout:
    """Saddle with its screws, rod and keepers of one rod on top."""
    if mount.saddle is None:
        raise ValueError(f"mount {mount.name} is on-top and has no saddle")
    layout = Layout()
    z_mm = design.boom.top_mm + mount.saddle.height_mm
    straight_rod(layout, element, line.cut_mm, z_mm)
    size = _saddle(layout, design, element, mount.saddle)
    if mount.keeper:
        seat = Seat(f"{element.id} saddle", size.width_mm / 2, size.bore_mm)
        keeper_pair(layout, design, element, mount.keeper, dict.fromkeys(SIDES, seat), z_mm)
    return layout


def size_of(design: Design, element: Element, saddle: Saddle) -> SaddleSize:
    """The saddle's sizes for one rod."""
    return saddle_size(
        rod_diameter_mm=element.rod.diameter_mm,
        height_mm=saddle.height_mm,
        boom_width_mm=design.boom.width_mm,
        boom_diameter_mm=design.boom.diameter_mm,
        screw=saddle.screw,
        bore_mm=saddle.bore_mm,
        hole_growth_mm=design.printer.hole_growth_mm,
    )


def _saddle(layout: Layout, design: Design, element: Element, saddle: Saddle) -> SaddleSize:
    size = size_of(design, element, saddle)
    part = layout.put(
        "saddle",
        f"{element.id} saddle",
        {
            "rod_diameter_mm": element.rod.diameter_mm,
            "height_mm": saddle.height_mm,
            "boom_width_mm": design.boom.width_mm,
            "boom_diameter_mm": design.boom.diameter_mm,
            "screw": saddle.screw,
            "bore_mm": saddle.bore_mm,
            "hole_growth_mm": design.printer.hole_growth_mm,
        },
        owner=element.id,
        label=f"saddle rod {element.rod.diameter_mm:g} height {saddle.height_mm:g}",
        material=saddle.material,
        frame=Frame((element.station_mm, 0.0, design.boom.top_mm)),
    )
    fit_mm = saddle.bore_mm - element.rod.diameter_mm
    layout.meet(part.name, element.id, "bore on rod", fit_mm / 2, fit_mm)
    layout.meet(part.name, "boom", "saddle on boom", 0.0)
    hold_down(
        layout,
        design,
        owner=element.id,
        block=part.name,
        station_mm=element.station_mm,
        offsets_mm=size.screw_x_mm,
        seat_mm=size.seat_mm,
        length_mm=size.screw_length_mm,
        thread=saddle.screw,
        purpose="saddle screw",
    )
    return size
