"""A rod straight through wood or glass-fibre, held by keepers against the boom's sides."""

from fabgen.arrange.drilling import Opening
from fabgen.arrange.layout import SIDES, Layout
from fabgen.arrange.rods import Seat, keeper_pair, straight_rod
from fabgen.design.design import Design, Element, Mount
from fabgen.design.ledger import LedgerLine


def lay_out(design: Design, element: Element, mount: Mount, line: LedgerLine) -> Layout:
    """Holes, rod and keepers of one rod through a boom that conducts nothing."""
    layout = Layout()
    layout.openings.append(Opening(element.id, element.station_mm, ("+y", "-y"), 0.0, mount.hole_mm, "rod"))
    straight_rod(layout, element, line.cut_mm, 0.0)
    fit_mm = mount.hole_mm - element.rod.diameter_mm
    layout.meet(element.id, "boom", "rod in hole", fit_mm / 2, fit_mm)
    if mount.keeper:
        seat = Seat("boom", design.boom.width_mm / 2, mount.hole_mm)
        keeper_pair(layout, design, element, mount.keeper, dict.fromkeys(SIDES, seat), 0.0)
    return layout
