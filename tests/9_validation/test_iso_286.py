"""Tolerance grades of ISO 286-1."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from fabgen.stock.tables import NoToleranceError, UnknownStockError, it_grade_mm

TABLE_UM = {
    3: (6, 10, 14, 25, 40, 60, 100, 140, 250),
    6: (8, 12, 18, 30, 48, 75, 120, 180, 300),
    10: (9, 15, 22, 36, 58, 90, 150, 220, 360),
    18: (11, 18, 27, 43, 70, 110, 180, 270, 430),
    30: (13, 21, 33, 52, 84, 130, 210, 330, 520),
    50: (16, 25, 39, 62, 100, 160, 250, 390, 620),
}
FACTORS = (10, 16, 25, 40, 64, 100, 160, 250, 400)


@pytest.mark.parametrize(("size_mm", "row_um"), TABLE_UM.items())
def test_grades_at_the_end_of_each_range(size_mm, row_um):
    """ISO 286-1, table 1, from memory; the end belongs to the lower range ("over 3 up to and including 6")."""
    assert [round(it_grade_mm(size_mm, grade) * 1000) for grade in range(6, 15)] == list(row_um)


def test_usual_fits():
    """H7 is +IT7/0 and h9 is 0/−IT9: 6 H7 0.012, 10 H7 0.015, 25 H7 0.021, 6 h9 0.030, 10 h9 0.036, 25 h9 0.052."""
    assert [it_grade_mm(size, 7) for size in (6, 10, 25)] == [0.012, 0.015, 0.021]
    assert [it_grade_mm(size, 9) for size in (6, 10, 25)] == [0.030, 0.036, 0.052]
    assert it_grade_mm(10, 14) == 0.36
    assert it_grade_mm(100, 14) == 0.87


@pytest.mark.parametrize(("low_mm", "high_mm"), [(3, 6), (6, 10), (10, 18), (18, 30), (30, 50), (50, 80), (80, 120)])
def test_grades_follow_the_tolerance_unit(low_mm, high_mm):
    """ISO 286-1: i = 0.45 D^(1/3) + 0.001 D in µm, D the geometric mean of the range, factors 10 to 400; from memory.

    The standard rounds: by up to 0.8 µm in the fine grades, and by 4.4 % at most (grade 12 from 144 to 150).
    """
    mean_mm = (low_mm * high_mm) ** 0.5
    unit_um = 0.45 * mean_mm ** (1 / 3) + 0.001 * mean_mm
    for grade, factor in zip(range(6, 15), FACTORS, strict=True):
        assert it_grade_mm(high_mm, grade) * 1000 == pytest.approx(factor * unit_um, rel=0.045, abs=0.8)


@given(st.floats(0.01, 120), st.integers(6, 13))
def test_coarser_grades_are_wider(size_mm, grade):
    assert it_grade_mm(size_mm, grade) < it_grade_mm(size_mm, grade + 1)


def test_sums_of_floats_do_not_jump_a_range():
    assert it_grade_mm(0.1 + 0.2 + 2.7, 7) == it_grade_mm(3, 7) == 0.010
    assert it_grade_mm(3.001, 7) == 0.012


@pytest.mark.parametrize("size_mm", [0, -1, 120.001])
def test_sizes_outside_the_table_are_refused(size_mm):
    with pytest.raises(NoToleranceError, match="outside"):
        it_grade_mm(size_mm, 7)


def test_grades_outside_the_table_are_refused():
    with pytest.raises(UnknownStockError, match="grade"):
        it_grade_mm(10, 15)
