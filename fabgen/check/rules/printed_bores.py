"""Which printed bores must be drilled out before a rod goes through?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.check.printed import distinct_prints, owners, rod_bore_mm
from fabgen.design.arranged import Arranged
from fabgen.design.findings import Finding
from fabgen.stock import tables

SMALLEST_IN_NOZZLES = 5.0
"""A bore of fewer nozzle widths closes up by an amount no gauge foretells. Source: common practice, from memory."""


def findings(arranged: Arranged) -> Iterator[Finding]:
    """P04: bores drawn without `hole_growth`, which come out too small, and very small ones."""
    printer = arranged.design.printer
    smallest_mm = SMALLEST_IN_NOZZLES * printer.nozzle_mm
    shrinks_mm = tables.print_practice("diametral_undersize_slip_mm")
    for part, size in distinct_prints(arranged):
        bore_mm = rod_bore_mm(size)
        if bore_mm is None or (printer.hole_growth_mm and bore_mm >= smallest_mm - 1e-9):
            continue
        drill = tables.nearest_drill(bore_mm, arranged.design.shop.drills)
        advice = f"drill the printed bore out with {drill.name}, by hand"
        if printer.hole_growth_mm:
            measured_mm, required_mm = bore_mm, smallest_mm
            advice += ": a bore this small closes up when it is printed"
        else:
            measured_mm, required_mm = bore_mm - shrinks_mm, bore_mm
            advice += f"; or print the fit gauge and state hole_growth (usually {shrinks_mm:g} mm)"
        for owner in owners(arranged, part):
            yield finding("P04", "warn", owner, advice, measured=measured_mm, required=required_mm, unit="mm")
