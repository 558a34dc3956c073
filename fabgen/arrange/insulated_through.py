"""A rod in bushes through clearance holes, held by keepers or by one screw in the middle."""

from fabgen.arrange.drilling import Opening
from fabgen.arrange.fasteners import middle_screw, middle_screw_thread
from fabgen.arrange.layout import SIDES, Layout, Side, Value, outward, side_name
from fabgen.arrange.rods import Seat, drilled_rod, keeper_pair, straight_rod
from fabgen.design.arranged import Frame
from fabgen.design.design import Bush, Design, Element, Mount
from fabgen.design.ledger import LedgerLine
from fabgen.stock import tables


def lay_out(design: Design, element: Element, mount: Mount, line: LedgerLine) -> Layout:
    """Holes, rod, bushes and keepers of one insulated rod."""
    layout = Layout()
    station_mm, half_mm = element.station_mm, design.boom.width_mm / 2
    layout.openings.append(Opening(element.id, station_mm, ("+y", "-y"), 0.0, mount.hole_mm, "bush"))
    if mount.hold == "middle-screw":
        drilled_rod(
            layout,
            element,
            element.id,
            length_mm=line.cut_mm,
            middle=(station_mm, 0.0, 0.0),
            z=(0.0, 1.0, 0.0),
            hole_mm=tables.tap_drill_mm(middle_screw_thread(element.rod.diameter_mm)),
            hole_z_mm=0.0,
        )
    else:
        straight_rod(layout, element, line.cut_mm, 0.0)
    fit_mm = mount.hole_mm - element.rod.diameter_mm
    layout.meet(element.id, "boom", "rod in clearance hole", fit_mm / 2, fit_mm)
    seats: dict[Side, Seat] = dict.fromkeys(SIDES, Seat("boom", half_mm, mount.hole_mm))
    if mount.bush:
        seats |= _bushes(layout, design, element, mount, mount.bush)
    if mount.hold == "middle-screw":
        middle_screw(layout, design, element)
    elif mount.keeper:
        keeper_pair(layout, design, element, mount.keeper, seats, 0.0)
    return layout


def _bushes(layout: Layout, design: Design, element: Element, mount: Mount, bush: Bush) -> dict[Side, Seat]:
    """Place the bush pair, or the sleeve from the left; return what the keepers on those sides stop on."""
    boom = design.boom
    half_mm = boom.width_mm / 2
    numbers: dict[str, Value] = {
        "rod_diameter_mm": element.rod.diameter_mm,
        "hole_diameter_mm": mount.hole_mm,
        "bore_mm": bush.bore_mm,
        "spigot_diameter_mm": bush.spigot_mm,
        "flange_diameter_mm": bush.flange_mm,
        "flange_height_mm": bush.flange_height_mm,
        "boom_diameter_mm": boom.diameter_mm,
        "hole_growth_mm": design.printer.hole_growth_mm,
    }
    sides: tuple[Side, ...] = SIDES
    if bush.kind == "sleeve":
        part, what, sides = "sleeve", "sleeve", SIDES[:1]
        numbers["boom_width_mm"] = boom.width_mm
    else:
        part, what = "bush", "shoulder bush"
        numbers |= {"wall_mm": boom.wall_mm, "spigot_length_mm": bush.spigot_length_mm}
    seats: dict[Side, Seat] = {}
    for side in sides:
        placed = layout.put(
            part,
            f"{element.id} {part} {side_name(side)}",
            numbers,
            owner=element.id,
            label=f"{what} rod {element.rod.diameter_mm:g} hole {mount.hole_mm:g}",
            material=bush.material,
            frame=Frame((element.station_mm, side * half_mm, 0.0), z=outward(side)),
        )
        bore_mm, spigot_mm = bush.bore_mm - element.rod.diameter_mm, mount.hole_mm - bush.spigot_mm
        layout.meet(placed.name, element.id, "bore on rod", bore_mm / 2, bore_mm)
        layout.meet(placed.name, "boom", "spigot in hole", 0.0, spigot_mm)
        seats[side] = Seat(placed.name, half_mm + bush.flange_height_mm, bush.bore_mm)
    return seats
