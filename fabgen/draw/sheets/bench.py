"""The pages that go to the drill press: checks, holes in drilling order, fits, saw cuts."""

from collections import defaultdict

from fabgen.design.arranged import Arranged, CutPlan, Hole
from fabgen.design.drawing import Sheet
from fabgen.design.lettering import shortened, text_width_mm
from fabgen.design.pen import LETTERING_MM, Pen
from fabgen.draw.bench_cuts import cuts
from fabgen.draw.bench_fits import fits
from fabgen.draw.bench_sketch import HEIGHT_MM, sketch
from fabgen.draw.flow import LEFT_MM, RIGHT_MM, Column, Flow
from fabgen.draw.words import allowance_words, boom_size, wall_of
from fabgen.stock.tables import paper_size_mm
from fabgen.units import format_mm

PLACE = "bench"

_COLUMNS = (
    Column("hole", 12.0),
    Column("element", 36.0),
    Column("station", 21.0, "end"),
    Column("±", 11.0, "end"),
    Column("wall", 29.0),
    Column("across", 13.0, "end"),
    Column("pilot", 10.0, "end"),
    Column("drill", 17.0, "end"),
    Column("for", 25.0),
    Column("P", 5.0, "middle", box=True),
    Column("D", 5.0, "middle", box=True),
)
_STEP_DRILL_MM = 6.0
_FOOT_LINE_MM = 13.0


def sheets(arranged: Arranged, plan: CutPlan) -> list[Sheet]:
    """As many pages of the shop's paper as it takes, two for most arrays."""
    design = arranged.design
    flow = Flow(paper_size_mm(design.shop.paper))
    _head(flow, arranged)
    _checks(flow, arranged)
    _holes(flow, arranged)
    _procedure(flow, arranged)
    fits(flow, arranged)
    cuts(flow, arranged, plan)

    def foot(pen: Pen, number: int, count: int) -> None:
        right = flow.paper_mm[0] - RIGHT_MM
        place = f"bench page {number} of {count}"
        room = right - LEFT_MM - text_width_mm(place, LETTERING_MM) - 6.0
        name = f"{design.number} {design.revision}   {allowance_words(arranged.ledger)}   {design.title}"
        pen.line("frame", LEFT_MM, _FOOT_LINE_MM + 4.0, right, _FOOT_LINE_MM + 4.0)
        pen.text(LEFT_MM, _FOOT_LINE_MM, shortened(name, LETTERING_MM, room))
        pen.text(right, _FOOT_LINE_MM, place, anchor="end")

    return flow.sheets("bench", f"{design.title}: bench", foot)


def _head(flow: Flow, arranged: Arranged) -> None:
    design = arranged.design
    top = flow.need(12.5)
    name = f"{design.number} {design.revision}   bench"
    flow.pen.text(LEFT_MM, top - 5.0, shortened(name, 5.0, flow.width_mm), 5.0)
    flow.pen.text(LEFT_MM, top - 10.5, shortened(design.title, LETTERING_MM, flow.width_mm))
    flow.paragraph(
        f"Boom: {boom_size(design.boom)}, {design.boom.material.name}, {format_mm(design.boom.length_mm)} mm. "
        f"Status: {allowance_words(arranged.ledger)}."
    )
    top = flow.need(HEIGHT_MM)
    sketch(flow.pen, arranged, LEFT_MM, top, flow.width_mm)


def _checks(flow: Flow, arranged: Arranged) -> None:
    """What to look at before the first punch mark."""
    design, boom = arranged.design, arranged.design.boom
    flow.heading("Check first", keep_mm=46.0)
    flow.pen.bar_100(LEFT_MM + flow.width_mm - 101.0, flow.y_mm + 2.5, label="100 mm")
    flow.paragraph("This bar and both bars on every template page measure 100 mm.", box=True)
    flow.paragraph("Datum end sawn square, faced and deburred: every station is measured from it.", box=True)
    flow.paragraph("TOP line scribed along the whole boom, LEFT and RIGHT marked looking forward.", box=True)
    sizes = [("diameter", boom.width_mm)] if boom.section == "round" else []
    sizes = sizes or [("width", boom.width_mm), ("height", boom.height_mm)]
    sizes += [("wall", boom.wall_mm)] if boom.hollow else []
    sizes += [("corner radius", boom.corner_radius_mm)] if boom.corner_radius_mm else []
    listed = ", ".join(f"{what} {mm:g}: ________" for what, mm in sizes)
    flow.paragraph(f"Your boom measured, {listed}. If it differs, correct the design file, build again.", box=True)
    flow.paragraph(
        f"Paper {design.shop.paper_thickness_mm:g} mm thick; each hole size tried in an offcut with its rod or bush.",
        box=True,
    )


def _holes(flow: Flow, arranged: Arranged) -> None:
    """Holes in drilling order: side walls first, then top, each by station; both walls of a through hole in one row."""
    groups: dict[str, list[Hole]] = defaultdict(list)
    for hole in arranged.holes:
        groups[hole.number].append(hole)
    flow.heading("Holes, in drilling order", keep_mm=40.0)
    flow.paragraph("P: piloted, a through hole from both sides. D: drilled and deburred. All sizes in mm.")
    set_ups = ("Boom on its side, LEFT up; then RIGHT up.", "Boom upright, TOP up; then BOTTOM up where it is drilled.")
    for count, words in enumerate(set_ups):
        rows = [_row(group) for group in groups.values() if _set_up(group[0]) == count]
        if rows:
            flow.paragraph(words)
            flow.table(_COLUMNS, rows)


def _set_up(hole: Hole) -> int:
    """0 for holes across the boom, 1 for the others: the boom is turned once."""
    return 0 if round(hole.angle_deg) % 180 == 90 else 1


def _row(group: list[Hole]) -> list[str]:
    hole = group[0]
    return [
        hole.number,
        hole.element,
        format_mm(hole.station_mm),
        format_mm(hole.tolerance_mm, 2),
        " + ".join(wall_of(other) for other in group),
        format_mm(hole.across_mm) if hole.across_mm else "centre",
        f"{hole.pilot_mm:g}" if hole.pilot_mm < hole.diameter_mm else "–",
        hole.drill,
        hole.purpose,
        "",
        "",
    ]


def _procedure(flow: Flow, arranged: Arranged) -> None:
    flow.heading("How to drill", keep_mm=40.0)
    large = any(hole.diameter_mm > _STEP_DRILL_MM for hole in arranged.holes)
    thin = large and arranged.design.boom.hollow
    steps = [
        "Clamp the boom; no gloves near the spindle, eyes protected. Set the template by its datum edge and TOP line.",
        "Punch every centre, both walls of a through hole. Check each station with a tape from the datum face.",
        "Pilot each wall from its own side. Never drill through both walls from one side: the far hole wanders.",
        "Open to size through the drill guide, again from each side"
        + (f"; above {_STEP_DRILL_MM:g} mm in thin wall with a step drill or a reamer." if thin else "."),
        "Deburr inside and outside, clear out the swarf, push the rod or bush through by hand before going on.",
    ]
    for count, step in enumerate(steps, start=1):
        flow.paragraph(f"{count}. {step}")
    across = any(hole.across_mm for hole in arranged.holes)
    if across:
        flow.paragraph(
            "Across: from the wall's centre line, towards TOP on LEFT and RIGHT, towards LEFT on TOP and BOTTOM."
        )
    if arranged.clamp_mm is not None:
        flow.paragraph(f"Clamp: middle of the plate at station {format_mm(arranged.clamp_mm)}.")
