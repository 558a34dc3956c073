"""Does the shop have a drill of every hole's size?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.check.holes import drillings, place
from fabgen.design.arranged import Arranged
from fabgen.design.findings import Finding, Severity
from fabgen.stock import tables

PRINTED_MM = 0.001
"""What the rounding of printed diameters may be off by."""


def findings(arranged: Arranged) -> Iterator[Finding]:
    """H05: the nearest drill is off by more than half of what a drilled hole varies (IT12), or smaller than the hole.

    A drill makes its hole too large, never too small: a larger drill within half of IT12 is no matter, a smaller one
    takes play from whatever goes through, which is a note.
    """
    series = arranged.design.shop.drills
    largest_mm = tables.drills(series)[-1].diameter_mm
    nearest_of = {mm: tables.nearest_drill(mm, series) for mm in {hole.diameter_mm for hole in arranged.holes}}
    for hole, *_ in drillings(arranged):
        nearest = nearest_of[hole.diameter_mm]
        smaller_mm = hole.diameter_mm - nearest.diameter_mm
        far = abs(smaller_mm) > tables.drilled_over_mm(hole.diameter_mm) / 2
        if not far and smaller_mm <= PRINTED_MM:
            continue
        advice = f"the nearest {_series(series)} drill is {nearest.name} ({nearest.diameter_mm:.3f} mm)"
        if far:
            advice += ": change the hole, or " + (
                "bore it with a hole saw or step drill" if hole.diameter_mm > largest_mm else "ream it to size"
            )
        else:
            advice += (
                f", {smaller_mm:.3f} mm smaller than the hole, less than a drilled hole varies (IT12): what goes "
                "through has that much less play, a thread that much more metal; ream it to size where that matters"
            )
        severity: Severity = "warn" if far else "note"
        yield finding(
            "H05", severity, place(hole), advice, measured=hole.diameter_mm, required=nearest.diameter_mm, unit="mm"
        )


def _series(series: str) -> str:
    return "metric or inch" if series == "both" else series
