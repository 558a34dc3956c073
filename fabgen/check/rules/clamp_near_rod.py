"""Does the clamp stand so near to a rod that it acts as a wider boom?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.check.where import names
from fabgen.design.arranged import Arranged
from fabgen.design.findings import Finding
from fabgen.design.ledger import Allowance

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
        where = names([element.id for element in design.elements], [line.element for _, line in near])
        parts = "; ".join(_by_origin([line.allowance for _, line in near]))
        advice = (
            "it changes what the boom takes by up to a tenth (own study 2026, a judgement, unpublished): "
            f"{parts}; move the clamp to a longer gap, or leave it"
        )
        yield finding("L18", "note", where, advice, measured=nearest_mm, required=limit_mm, unit="mm")


def _by_origin(allowances: list[Allowance]) -> Iterator[str]:
    """What a tenth is, and whether the ledger's u holds it, for each kind of allowance near the clamp."""
    counted = [each.value_mm for each in allowances if each.origin in ("computed", "measured")]
    if counted:
        yield f"up to {_tenth_mm(counted)} mm, which u of the computed or measured allowances counts"
    for origin in ("published", "stated"):
        values_mm = [each.value_mm for each in allowances if each.origin == origin]
        if values_mm:
            yield f"up to {_tenth_mm(values_mm)} mm, which u of the {origin} allowances does not count"
    if any(each.origin == "none" for each in allowances):
        yield "of a rod without an allowance no figure can be given, and the ledger counts nothing for it"


def _tenth_mm(values_mm: list[float]) -> str:
    return f"{max(U_SHARE * abs(value_mm) for value_mm in values_mm):.2f}"
