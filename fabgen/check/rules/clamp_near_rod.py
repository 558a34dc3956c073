"""Does the clamp stand so near to a rod that it acts as a wider boom?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.check.where import names
from fabgen.design.arranged import Arranged
from fabgen.design.findings import Finding

NEAR_IN_BOOMS = 2.0
"""Plate to rod, in boom widths. Source: own study 2026, a judgement, unpublished."""

U_SHARE = 0.10
"""Standard uncertainty that it adds, as a share of the allowance. Source: as above."""


def findings(arranged: Arranged) -> Iterator[Finding]:
    """L18: told once, with the nearest rod's distance."""
    design, limit_mm = arranged.design, NEAR_IN_BOOMS * arranged.design.boom.width_mm
    if arranged.clamp_mm is None or not design.boom.material.conductive:
        return
    half_mm = arranged.clamp_width_mm / 2
    near = [
        (abs(line.station_mm - arranged.clamp_mm) - half_mm, line)
        for line in arranged.ledger.lines
        if line.allowance.needed and abs(line.station_mm - arranged.clamp_mm) - half_mm < limit_mm - 1e-9
    ]
    if near:
        nearest_mm = max(0.0, min(mm for mm, _ in near))
        worst_mm = max(U_SHARE * abs(line.allowance.value_mm) for _, line in near)
        where = names([element.id for element in design.elements], [line.element for _, line in near])
        advice = (
            f"it adds up to {worst_mm:.2f} mm of uncertainty in quadrature, counted in the ledger of computed and "
            "measured allowances (own study 2026, a judgement, unpublished); move the clamp to a longer gap, or leave "
            "it"
        )
        yield finding("L18", "note", where, advice, measured=nearest_mm, required=limit_mm, unit="mm")
