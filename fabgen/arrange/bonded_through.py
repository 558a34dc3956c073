"""A rod in metal contact with both boom walls: welded, pressed, or held by a screw at each wall."""

from fabgen.arrange.drilling import Opening
from fabgen.arrange.fasteners import screw
from fabgen.arrange.layout import SIDES, Layout, side_name
from fabgen.arrange.rods import straight_rod
from fabgen.design.design import Design, Element, Mount
from fabgen.design.ledger import LedgerLine
from fabgen.design.part_fasteners import fastener, sold_length_mm
from fabgen.stock import tables

BOND_SCREW = "M3"
BOND_SCREW_FROM_WALL_MM = 3.0
"""From a side wall's inner surface to the bond screw's axis, so that the contact is where the rod leaves the metal."""


def lay_out(design: Design, element: Element, mount: Mount, line: LedgerLine) -> Layout:
    """Holes, rod and bond screws of one bonded rod."""
    layout = Layout()
    layout.openings.append(Opening(element.id, element.station_mm, ("+y", "-y"), 0.0, mount.hole_mm, "rod"))
    straight_rod(layout, element, line.cut_mm, 0.0)
    fit_mm = mount.hole_mm - element.rod.diameter_mm
    layout.meet(element.id, "boom", "rod in hole", fit_mm / 2, fit_mm)
    if mount.bond == "wall-screws":
        _bond_screws(layout, design, element)
    return layout


def _bond_screws(layout: Layout, design: Design, element: Element) -> None:
    boom = design.boom
    inside_mm = boom.width_mm / 2 - boom.wall_mm
    rod_top_mm = element.rod.diameter_mm / 2
    length_mm = sold_length_mm(boom.top_mm - rod_top_mm)
    tap_mm = tables.tap_drill_mm(BOND_SCREW)
    for side in SIDES:
        y_mm, name = side * (inside_mm - BOND_SCREW_FROM_WALL_MM), f"{element.id} bond screw {side_name(side)}"
        layout.openings.append(Opening(element.id, element.station_mm, ("+z",), y_mm, tap_mm, "bond screw"))
        seat = (element.station_mm, y_mm, rod_top_mm + length_mm)
        screw(layout, name, BOND_SCREW, length_mm, owner=element.id, seat=seat)
        layout.meet(name, element.id, "screw on rod", 0.0)
        layout.meet(name, "boom", "thread in wall", 0.0, tap_mm - fastener(BOND_SCREW).diameter_mm)
