"""Drill series against the standards."""

from fractions import Fraction

import pytest
from hypothesis import given
from hypothesis import strategies as st

from fabgen.stock.tables import (
    UnknownStockError,
    drills,
    nearest_drill,
    smallest_drill_at_least,
)
from fabgen.units import parse_length_mm


def test_metric_series():
    """BS 328, secondary source: 0.2–0.98 in tenths + 0, 2, 5, 8 hundredths; then steps 0.05, 0.1 and 0.25 mm."""
    sizes = [round(drill.diameter_mm * 100) for drill in drills("metric")]
    small = [size for size in sizes if size < 100]
    assert all(size % 10 in (0, 2, 5, 8) for size in small)
    assert (small[0], small[-1], len(small)) == (20, 98, 32)
    assert [size for size in sizes if 100 <= size < 300] == list(range(100, 300, 5))
    assert [size for size in sizes if 300 <= size < 1400] == list(range(300, 1400, 10))
    assert [size for size in sizes if size >= 1400] == list(range(1400, 2525, 25))


TEN_THOUSANDTHS = """
2280 2210 2130 2090 2055 2040 2010 1990 1960 1935 1910 1890 1850 1820 1800 1770 1730 1695 1660 1610
1590 1570 1540 1520 1495 1470 1440 1405 1360 1285 1200 1160 1130 1110 1100 1065 1040 1015 0995 0980
"""
NUMBERS = list(enumerate(TEN_THOUSANDTHS.split(), start=1))


@pytest.mark.parametrize(("number", "inch_e4"), NUMBERS)
def test_number_drills(number, inch_e4):
    """ASME B94.11M, from memory; copies round numbers 5, 10, 18, 25 and 28 to two or three digits."""
    drill = next(drill for drill in drills("inch") if drill.name == f"No. {number}")
    assert drill.diameter_mm == pytest.approx(int(inch_e4) * 25.4e-4, abs=1e-6)


@pytest.mark.parametrize(("letter", "inch"), [("A", 0.234), ("F", 0.257), ("G", 0.261), ("Z", 0.413)])
def test_letter_drills(letter, inch):
    """ASME B94.11M, from memory."""
    drill = next(drill for drill in drills("inch") if drill.name == f"letter {letter}")
    assert drill.diameter_mm == pytest.approx(inch * 25.4, abs=1e-6)


def test_fraction_drills_are_what_they_are_called():
    """ASME B94.11M, from memory: every 1/64 in up to 1 in."""
    fractions = [drill for drill in drills("inch") if drill.name.endswith(" in")]
    assert len(fractions) == 64
    for step, drill in enumerate(fractions, start=1):
        assert parse_length_mm(drill.name, None) == pytest.approx(drill.diameter_mm, abs=1e-9)
        assert drill.diameter_mm == pytest.approx(float(Fraction(step, 64) * Fraction("25.4")), abs=1e-9)


def test_series_grow_and_their_letters_do_too():
    for series in ("metric", "inch", "both"):
        sizes = [drill.diameter_mm for drill in drills(series)]
        assert sizes == sorted(sizes)
    letters = [drill.name for drill in drills("inch") if drill.name.startswith("letter")]
    numbers = [int(drill.name[4:]) for drill in drills("inch") if drill.name.startswith("No.")]
    assert letters == sorted(letters)
    assert len(letters) == 26
    assert numbers == list(range(60, 0, -1))
    assert len(drills("both")) == len(drills("metric")) + len(drills("inch"))


def test_the_hole_for_a_bush_takes_the_next_drill_up():
    """A 4 mm rod with 2.6 mm for its bush is exactly 6.6 mm, a drill; binary floats must not push it to 6.7."""
    assert smallest_drill_at_least(4 + 2.6, "metric").name == "6.6 mm"
    assert smallest_drill_at_least(5.1 + 2.6, "metric").name == "7.7 mm"
    assert smallest_drill_at_least(3 / 16 * 25.4 + 2.6, "inch").name == "letter L"
    assert smallest_drill_at_least(30, "metric") is None


def test_named_drills_and_their_neighbours():
    assert nearest_drill(8.04, "metric").name == "8 mm"
    assert nearest_drill(6.35, "inch").name == "1/4 in"
    assert nearest_drill(0.001, "both").name == "0.2 mm"
    with pytest.raises(UnknownStockError, match="metric"):
        drills("imperial")


@given(st.floats(0.2, 25), st.sampled_from(["metric", "both"]))
def test_the_next_drill_up_is_the_first_that_is_not_smaller(size_mm, series):
    found = smallest_drill_at_least(size_mm, series)
    assert found.diameter_mm >= size_mm - 1e-6
    assert not any(size_mm <= drill.diameter_mm < found.diameter_mm for drill in drills(series))
    assert abs(nearest_drill(size_mm, series).diameter_mm - size_mm) <= found.diameter_mm - size_mm + 1e-6
