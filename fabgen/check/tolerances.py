"""How far real parts may be off: what the worst case of a rule is made of."""

from fabgen.stock import tables

DRILLED_GRADE = 12
"""A twist drill in thin sheet makes its hole up to IT12 too large, never smaller. Source: common practice."""


def drilled_over_mm(diameter_mm: float) -> float:
    """How much larger than its drill a hole may come out."""
    return tables.it_grade_mm(diameter_mm, DRILLED_GRADE)


def printed_accuracy_mm() -> float:
    """± on a printed size, common practice."""
    return tables.print_practice("accuracy_mm")
