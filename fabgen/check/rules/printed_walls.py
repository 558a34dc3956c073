"""Is every printed wall at least two lines of the nozzle thick?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.check.printed import distinct_prints, owners, thinnest_wall_mm
from fabgen.design.arranged import Arranged
from fabgen.design.findings import Finding
from fabgen.stock import tables


def findings(arranged: Arranged) -> Iterator[Finding]:
    """P01: a thinner wall is left out or falls apart."""
    lines = tables.print_practice("lines_in_thinnest_wall")
    least_mm = lines * arranged.design.printer.nozzle_mm
    for part, size in distinct_prints(arranged):
        name, wall_mm = thinnest_wall_mm(size)
        if wall_mm >= least_mm - 1e-9:
            continue
        what = part.part.replace("_", " ")
        advice = (
            f"the {name} of the {what} is under {lines:g} lines of the nozzle: make the part thicker or print finer"
        )
        for owner in owners(arranged, part):
            yield finding("P01", "fail", owner, advice, measured=wall_mm, required=least_mm, unit="mm")
