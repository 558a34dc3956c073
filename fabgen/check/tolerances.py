"""How far real parts may be off: what the worst case of a rule is made of."""

from fabgen.stock import tables


def printed_accuracy_mm() -> float:
    """± on a printed size, common practice."""
    return tables.print_practice("accuracy_mm")
