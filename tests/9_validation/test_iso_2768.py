"""General tolerances of ISO 2768-1."""

import pytest

from fabgen.stock.tables import NoToleranceError, UnknownStockError, linear_tolerance_mm

ENDS_MM = (3, 6, 30, 120, 400, 1000, 2000, 4000)
TABLE_MM = {
    "f": (0.05, 0.05, 0.1, 0.15, 0.2, 0.3, 0.5, None),
    "m": (0.1, 0.1, 0.2, 0.3, 0.5, 0.8, 1.2, 2.0),
    "c": (0.2, 0.3, 0.5, 0.8, 1.2, 2.0, 3.0, 4.0),
    "v": (None, 0.5, 1.0, 1.5, 2.5, 4.0, 6.0, 8.0),
}
CELLS = [
    (tolerance_class, end_mm, start_mm, value_mm)
    for tolerance_class, row in TABLE_MM.items()
    for end_mm, start_mm, value_mm in zip(ENDS_MM, (0.5, *ENDS_MM), row, strict=False)
]


@pytest.mark.parametrize(("tolerance_class", "end_mm", "start_mm", "value_mm"), CELLS)
def test_linear_tolerances(tolerance_class, end_mm, start_mm, value_mm):
    """ISO 2768-1:1989, table 1, secondary source; c up to 6 mm from memory, where copies print 0.15 and 0.2 instead.

    A range's end belongs to it, its start to the range below.
    """
    for size_mm in (end_mm, start_mm + 0.001, (start_mm + end_mm) / 2):
        if value_mm is None:
            with pytest.raises(NoToleranceError, match="no tolerance"):
                linear_tolerance_mm(size_mm, tolerance_class)
        else:
            assert linear_tolerance_mm(size_mm, tolerance_class) == value_mm


def test_half_a_millimetre_is_the_smallest_size():
    """ISO 2768-1: below 0.5 mm the tolerance stands beside the size."""
    assert linear_tolerance_mm(0.5, "m") == 0.1
    for size_mm in (0.499, 0.0, -3, 4000.1):
        with pytest.raises(NoToleranceError, match=r"outside the table's range of 0\.5 to 4000 mm"):
            linear_tolerance_mm(size_mm, "m")


def test_an_unknown_class_is_refused():
    with pytest.raises(UnknownStockError, match="known: f, m, c, v"):
        linear_tolerance_mm(10, "x")
