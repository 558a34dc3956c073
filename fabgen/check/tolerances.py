"""How far real parts may be off: what the worst case of a rule is made of."""

from fabgen.design.design import Design
from fabgen.stock import tables

DRILLED_GRADE = 12
"""A twist drill in thin sheet makes its hole up to IT12 too large, never smaller. Source: common practice."""

SMALLEST_TOLERANCED_MM = 4.0
"""ISO 2768-1 class v begins above 3 mm; shorter distances take the row of 3 to 6 mm."""


def drilled_over_mm(diameter_mm: float) -> float:
    """How much larger than its drill a hole may come out."""
    return tables.it_grade_mm(diameter_mm, DRILLED_GRADE)


def marked_tolerance_mm(design: Design, distance_mm: float) -> float:
    """± on a distance that is marked and punched: the shop's stated tolerance, or ISO 2768-1 by size."""
    if design.shop.stated_tolerance_mm > 0:
        return design.shop.stated_tolerance_mm
    return tables.linear_tolerance_mm(max(distance_mm, SMALLEST_TOLERANCED_MM), design.shop.tolerance)


def printed_accuracy_mm() -> float:
    """± on a printed size, common practice."""
    return tables.print_practice("accuracy_mm")
