"""Shift of a half-wave rod per millimetre."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from fabgen.physics.half_wave import shift_khz
from fabgen.units import wavelength_mm


def test_one_millimetre_on_a_rod_for_434_mhz():
    """First order, by hand: 434 000 kHz / 340 mm = 1276.5 kHz per mm, downwards when the rod grows."""
    assert shift_khz(frequency_mhz=434, length_mm=340, change_mm=1) == pytest.approx(-1276.47, abs=0.01)
    assert shift_khz(frequency_mhz=434, length_mm=340, change_mm=-0.5) == pytest.approx(638.24, abs=0.01)


@given(st.floats(50, 1300), st.floats(0.40, 0.5), st.floats(-0.001, 0.001))
def test_the_first_order_is_that_of_resonance_at_a_fixed_part_of_the_wavelength(frequency_mhz, part, change):
    """Independent: a rod resonant at L = part · λ, made longer, resonates where that part holds again."""
    length_mm = part * wavelength_mm(frequency_mhz)
    longer_mm = length_mm * (1 + change)
    new_mhz = part * wavelength_mm(1) / longer_mm
    found = shift_khz(frequency_mhz=frequency_mhz, length_mm=length_mm, change_mm=longer_mm - length_mm)
    assert found == pytest.approx((new_mhz - frequency_mhz) * 1000, rel=2e-3, abs=1e-6)


def test_a_rod_needs_a_length():
    with pytest.raises(ValueError, match="above zero"):
        shift_khz(frequency_mhz=434, length_mm=0, change_mm=1)
