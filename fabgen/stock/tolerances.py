"""Tolerance grades (ISO 286-1) and general tolerances of lengths (ISO 2768-1)."""

from typing import Literal

from fabgen.stock.read_csv import Row, UnknownStockError, rows

ToleranceClass = Literal["f", "m", "c", "v"]


DRILLED_GRADE = 12
"""A twist drill in thin sheet makes its hole up to IT12 too large, never smaller. Source: common practice."""


class NoToleranceError(ValueError):
    """A size that the standard gives no tolerance for; it must be stated on its own."""


def it_grade_mm(size_mm: float, grade: int) -> float:
    """Width of a tolerance grade (ISO 286-1), for example 0.015 for 10 mm and grade 7.

    Args:
        size_mm: nominal size in mm, above 0 and up to 120.
        grade: 6 to 14.

    Raises:
        NoToleranceError: the size lies outside the table.
        UnknownStockError: the table has no such grade.
    """
    found = _range("iso286_it", size_mm, lowest_included=False)
    column = f"iso286_1_it{grade}_um"
    if column not in found:
        raise UnknownStockError("tolerance grade", str(grade), (str(each) for each in range(6, 15)))
    return float(found[column]) / 1000


def drilled_over_mm(diameter_mm: float) -> float:
    """How much larger than its drill a hole may come out."""
    return it_grade_mm(diameter_mm, DRILLED_GRADE)


def linear_tolerance_mm(size_mm: float, tolerance_class: ToleranceClass) -> float:
    """General tolerance of a length (ISO 2768-1), to be read as ±.

    Args:
        size_mm: nominal length in mm, 0.5 to 4000; the end of a range belongs to it ("over 3 up to and including 6").
        tolerance_class: f, m, c or v.

    Raises:
        NoToleranceError: the size lies outside the table, or the class has no value there.
        UnknownStockError: there is no such class.
    """
    found = _range("iso2768_1_linear", size_mm, lowest_included=True)
    column = f"iso2768_1_{tolerance_class}_mm"
    if column not in found:
        raise UnknownStockError("tolerance class", tolerance_class, ("f", "m", "c", "v"))
    if not found[column]:
        raise NoToleranceError(f"ISO 2768-1 class {tolerance_class} has no tolerance for {size_mm:g} mm")
    return float(found[column])


def _range(table: str, size_mm: float, *, lowest_included: bool) -> Row:
    """The row whose range holds the size; a sum of floats that misses a limit by less than 1e-6 mm is on it."""
    size = round(size_mm, 6)
    first = rows(table)[0]
    if lowest_included and size == float(first["over_mm"]):
        return first
    for found in rows(table):
        if float(found["over_mm"]) < size <= float(found["to_mm"]):
            return found
    low, high = first["over_mm"], rows(table)[-1]["to_mm"]
    raise NoToleranceError(f"{size_mm:g} mm lies outside the table's range of {low} to {high} mm")
