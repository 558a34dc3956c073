"""A coupon's allowance carried to other rods by the removed reactance.

Source: own study 2026, computed, unpublished.
"""

import pytest

from fabgen.physics.boom_closed_form import closed_form_allowance
from fabgen.physics.boom_coupon import (
    allowance_from_reactance_factor_mm,
    good_coupon_boom_mm,
    reactance_factor_from_allowance,
    shortest_coupon_boom_mm,
)
from fabgen.physics.boom_mount import BoomMount, Section, Style, wavelength_mm


@pytest.mark.parametrize("length_mm", [285.0, 300.0, 335.0])
def test_there_and_back(length_mm: float) -> None:
    case = {"boom_mm": 20.0, "rod_diameter_mm": 4.0, "rod_length_mm": length_mm, "frequency_mhz": 434.0}
    factor = reactance_factor_from_allowance(4.6, **case)
    assert allowance_from_reactance_factor_mm(factor, **case) == pytest.approx(4.6, rel=1e-12)


def test_one_coupon_calibrates_the_whole_table() -> None:
    """Measured on one director, a mount that obeys the closed form gives the closed form's value at every length."""
    mount = BoomMount(Style.INSULATED_THROUGH, Section.ROUND, 20, 4, wall_mm=1.5, hole_mm=8)
    case = {"boom_mm": 20.0, "rod_diameter_mm": 4.0, "frequency_mhz": 434.0}
    measured = closed_form_allowance(mount, 300, 434)
    assert measured.allowance_mm is not None
    factor = reactance_factor_from_allowance(measured.allowance_mm, rod_length_mm=300, **case)
    assert factor == pytest.approx(measured.reactance_factor)
    for length_mm in (285.0, 320.0, 338.0):
        expected = closed_form_allowance(mount, length_mm, 434)
        assert allowance_from_reactance_factor_mm(factor, rod_length_mm=length_mm, **case) == pytest.approx(
            expected.allowance_mm
        )


def test_coupon_boom_lengths() -> None:
    assert shortest_coupon_boom_mm(20) == 160
    assert good_coupon_boom_mm(20, 434) == pytest.approx(0.3 * wavelength_mm(434))
    assert good_coupon_boom_mm(40, 434) == 320
