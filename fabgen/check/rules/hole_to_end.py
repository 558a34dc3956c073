"""Does enough metal stand between a hole and the boom's end?"""

from collections.abc import Iterator

from fabgen.check.finding import finding, too_small
from fabgen.check.holes import drillings, place
from fabgen.design.arranged import Arranged, Hole
from fabgen.design.findings import Finding
from fabgen.stock import tables

SOURCE = "EN 1993-1-8 Table 3.3, a steel code borrowed as common practice"


def findings(arranged: Arranged) -> Iterator[Finding]:
    """H08 past the end; H01 below 1.2 d fails and below 2 d warns, at the worst of the tolerances."""
    least = tables.edge_distance_factor("end")
    wanted = tables.edge_distance_factor("end", "preferred")
    for hole, *_ in drillings(arranged):
        nominal_mm, worst_mm = to_end_mm(arranged, hole)
        d_mm = hole.diameter_mm
        if nominal_mm < d_mm / 2:
            advice = f"{_way_out(hole)} by {wanted * d_mm - nominal_mm:.0f} mm"
            yield finding("H08", "fail", place(hole), advice, measured=nominal_mm, required=d_mm / 2, unit="mm")
        elif missed := too_small(worst_mm, fail_mm=least * d_mm, warn_mm=wanted * d_mm):
            severity, limit_mm = missed
            source = SOURCE if severity == "fail" else "the shop rule of two diameters"
            advice = (
                f"centre to end: {nominal_mm:.3f} mm on the drawing, the figure is the worst case; "
                f"{limit_mm / d_mm:g} d is {source}; {_way_out(hole)}"
            )
            yield finding("H01", severity, place(hole), advice, measured=worst_mm, required=limit_mm, unit="mm")


def _way_out(hole: Hole) -> str:
    return "move the clamp inwards" if hole.element == "clamp" else "lengthen the overhang"


def to_end_mm(arranged: Arranged, hole: Hole) -> tuple[float, float]:
    """From a hole's centre to the nearer end of its piece: on the drawing, and at the worst of the tolerances."""
    piece = next(piece for piece in arranged.pieces if piece.name == hole.piece)
    sawn_mm = next((cut.tolerance_mm for cut in arranged.cuts if cut.piece == piece.name), 0.0)
    rear_mm, front_mm = hole.station_mm - piece.start_mm, piece.end_mm - hole.station_mm
    return min(rear_mm, front_mm), min(rear_mm - hole.tolerance_mm, front_mm - hole.tolerance_mm - sawn_mm)
