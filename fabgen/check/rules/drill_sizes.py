"""Does the shop have a drill of every hole's size?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.check.holes import drillings, place
from fabgen.check.tolerances import drilled_over_mm
from fabgen.design.arranged import Arranged
from fabgen.design.findings import Finding
from fabgen.stock import tables


def findings(arranged: Arranged) -> Iterator[Finding]:
    """H05: the nearest drill is off by more than half of what a drilled hole varies (IT12)."""
    series = arranged.design.shop.drills
    largest_mm = tables.drills(series)[-1].diameter_mm
    nearest_of = {mm: tables.nearest_drill(mm, series) for mm in {hole.diameter_mm for hole in arranged.holes}}
    for hole, *_ in drillings(arranged):
        nearest = nearest_of[hole.diameter_mm]
        if abs(nearest.diameter_mm - hole.diameter_mm) <= drilled_over_mm(hole.diameter_mm) / 2:
            continue
        advice = (
            f"the nearest {_series(series)} drill is {nearest.name} ({nearest.diameter_mm:.3f} mm): change the hole"
        )
        advice += (
            ", or bore it with a hole saw or step drill" if hole.diameter_mm > largest_mm else ", or ream it to size"
        )
        yield finding(
            "H05", "warn", place(hole), advice, measured=hole.diameter_mm, required=nearest.diameter_mm, unit="mm"
        )


def _series(series: str) -> str:
    return "metric or inch" if series == "both" else series
