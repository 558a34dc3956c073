"""Published models of what a metal boom takes from a rod, held against the prints."""

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from fabgen.design.ledger import Allowance
from fabgen.physics.published_boom import (
    DL6WU_LIMIT_WL,
    FISHENDEN_WIBLIN_LIMIT_WL,
    LO_SQUARE,
    dl6wu_fraction,
    equivalent_round_mm,
    fishenden_wiblin_bonded_mm,
    lawson_bonded_mm,
    lawson_touching_mm,
    published_models,
    published_values,
)
from fabgen.units import in_to_mm, wavelength_mm

EXACT = 1e-9
"""The closed form is a polynomial: only float rounding is left."""

ROUNDED_MM = 6e-4
"""The table is rounded to 0.001 mm."""


def spread_mm(values):
    """The spread as the ledger takes it."""
    return Allowance(0.0, "published", published=values).spread_mm


def bonded_curve_mm(boom_mm, wavelength):
    """What the program adds by DL6WU's curve to a rod bonded through a round boom."""
    curve = published_values("bonded-through", boom_mm=boom_mm, wavelength_mm=wavelength)[0]
    assert curve.model == "dl6wu"
    return curve.value_mm


@pytest.mark.parametrize(
    ("boom_wl", "fraction", "correction_wl"),
    [
        (0.001, 0.024966, 0.000024966),
        (0.005, 0.120250, 0.000601250),
        (0.010, 0.229050, 0.002290500),
        (0.015, 0.326400, 0.004896000),
        (0.020, 0.412300, 0.008246000),
        (0.025, 0.486750, 0.012168750),
        (0.030, 0.549750, 0.016492500),
        (0.040, 0.641400, 0.025656000),
        (0.050, 0.687250, 0.034362500),
    ],
)
def test_dl6wu_closed_form(boom_wl, fraction, correction_wl):
    """G. Hoch, VHF Communications 3/1977; closed form 733/504 after I. White, secondary source; values computed."""
    assert dl6wu_fraction(boom_wl) == pytest.approx(fraction, abs=EXACT)
    assert dl6wu_fraction(boom_wl) * boom_wl == pytest.approx(correction_wl, abs=EXACT)
    assert dl6wu_fraction(boom_wl) == pytest.approx(25.195 * boom_wl - 229 * boom_wl**2, abs=1e-15)


@pytest.mark.parametrize(
    ("frequency_mhz", "boom_mm", "lambda_mm", "boom_wl", "bonded_mm", "half_mm"),
    [
        (50.1, 51, 5983.881, 0.008523, 10.103, 5.052),
        (144.3, 20, 2077.564, 0.009627, 4.426, 2.213),
        (144.3, 25.4, 2077.564, 0.012226, 6.955, 3.477),
        (144.3, 30, 2077.564, 0.014440, 9.482, 4.741),
        (432.2, 15, 693.643, 0.021625, 6.566, 3.283),
        (432.2, 20, 693.643, 0.028833, 10.721, 5.361),
        (432.2, 25, 693.643, 0.036042, 15.265, 7.633),
        (1296.2, 10, 231.286, 0.043237, 6.613, 3.306),
        (1296.2, 12.7, 231.286, 0.054910, 8.801, 4.401),
    ],
)
def test_dl6wu_in_millimetres(frequency_mhz, boom_mm, lambda_mm, boom_wl, bonded_mm, half_mm):
    """The same closed form at usual booms, computed; half for insulated rods: The VHF/UHF DX Book, from memory."""
    wavelength = wavelength_mm(frequency_mhz)
    assert wavelength == pytest.approx(lambda_mm, abs=ROUNDED_MM)
    assert boom_mm / wavelength == pytest.approx(boom_wl, abs=6e-7)
    assert bonded_curve_mm(boom_mm, wavelength) == pytest.approx(bonded_mm, abs=ROUNDED_MM)
    insulated = published_values("insulated-through", boom_mm=boom_mm, wavelength_mm=wavelength)[0]
    assert insulated.value_mm == pytest.approx(half_mm, abs=ROUNDED_MM)
    assert insulated.valid


def test_dl6wu_printed_worked_example():
    """I. White, public list message, secondary source: a 1.5 in boom at 6 m gives about 0.15 times, about 0.225 in.

    Recomputed at 50 MHz: 0.15085, 0.2263 in. The print rounds the fraction to two digits, hence 0.002 in.
    """
    boom_mm, wavelength = in_to_mm(1.5), wavelength_mm(50)
    assert boom_mm / wavelength == pytest.approx(0.006354, abs=1e-6)
    assert dl6wu_fraction(boom_mm / wavelength) == pytest.approx(0.15, abs=0.005)
    assert dl6wu_fraction(boom_mm / wavelength) == pytest.approx(0.15085, abs=1e-5)
    assert bonded_curve_mm(boom_mm, wavelength) == pytest.approx(in_to_mm(0.225), abs=in_to_mm(0.002))
    assert bonded_curve_mm(boom_mm, wavelength) == pytest.approx(5.748, abs=ROUNDED_MM)


@pytest.mark.parametrize("boom_wl", [0.055, 0.06, 0.2, 0.0, -0.01, math.nan])
def test_dl6wu_is_refused_outside_its_range(boom_wl):
    with pytest.raises(ValueError, match=r"0\.055"):
        dl6wu_fraction(boom_wl)


@given(st.floats(1e-6, 0.0549), st.floats(1e-6, 0.0549))
def test_dl6wu_grows_with_the_boom_over_its_whole_range(first, second):
    """The parabola's vertex lies at 0.055011, just outside the range."""
    low, high = sorted((first, second))
    assert dl6wu_fraction(low) <= dl6wu_fraction(high)
    assert 0 < dl6wu_fraction(high) < 0.6930001


def test_rules_in_parts_of_the_diameter():
    """Lawson, Yagi Antenna Design, 1986, p. 7-11 and 7-12; Fishenden and Wiblin 1949; secondary sources."""
    assert lawson_bonded_mm(51) == pytest.approx(35.7)
    assert lawson_touching_mm(20) == pytest.approx(1.2)
    assert fishenden_wiblin_bonded_mm(51) == pytest.approx(38.25)


def test_lo_equivalent_of_a_square():
    """Y. T. Lo, J. Appl. Phys. 24 (1953) 1338: radius 0.5902 of the side; Balanis, Antenna Theory, Table 9.3."""
    assert pytest.approx(0.5902, abs=5e-5) == LO_SQUARE / 2
    assert pytest.approx(0.590170, abs=5e-7) == LO_SQUARE / 2
    assert equivalent_round_mm(20, "lo") == pytest.approx(23.607, abs=ROUNDED_MM)
    assert equivalent_round_mm(20, "side") == 20


def test_spread_of_the_bonded_models_at_50_mhz():
    """51 mm boom at 50.1 MHz: 10.1, 35.7 and 38.3 mm, ratios 1, 3.5 and 3.8, spread 28 mm or 0.47 % of λ; computed."""
    wavelength = wavelength_mm(50.1)
    values = published_values("bonded-through", boom_mm=51, wavelength_mm=wavelength)
    found = {value.model: value.value_mm for value in values}
    assert found == pytest.approx({"dl6wu": 10.103, "lawson": 35.7, "fishenden-wiblin": 38.25}, abs=ROUNDED_MM)
    assert [round(value / found["dl6wu"], 1) for value in found.values()] == [1.0, 3.5, 3.8]
    assert spread_mm(values) == pytest.approx(28.147, abs=ROUNDED_MM)
    assert spread_mm(values) / wavelength == pytest.approx(0.0047, abs=5e-5)
    assert all(value.valid and not value.is_bound and value.source for value in values)


def test_spread_of_the_bonded_models_at_432_mhz():
    """20 mm boom at 432.2 MHz: the models converge to a ratio of 1.4, spread 4.3 mm or 0.6 % of λ; computed."""
    wavelength = wavelength_mm(432.2)
    values = published_values("bonded-through", boom_mm=20, wavelength_mm=wavelength)
    assert spread_mm(values) == pytest.approx(15 - 10.721, abs=ROUNDED_MM)
    assert max(v.value_mm for v in values) / min(v.value_mm for v in values) == pytest.approx(1.4, abs=0.01)
    assert spread_mm(values) / wavelength == pytest.approx(0.006, abs=2e-4)


def test_insulated_rods_have_one_rule_and_a_printed_range():
    """Half of DL6WU's curve (from memory), bounded by 0.15 to 0.25 D (secondary source that quotes a range)."""
    values = published_values("insulated-through", boom_mm=20, wavelength_mm=wavelength_mm(432.2))
    assert [(value.model, value.is_bound) for value in values] == [
        ("dl6wu", False),
        ("dobricic-low", True),
        ("dobricic-high", True),
    ]
    assert [value.value_mm for value in values] == pytest.approx([5.361, 3.0, 5.0], abs=ROUNDED_MM)
    assert spread_mm(values) == pytest.approx(2.361, abs=ROUNDED_MM)


def test_on_top_is_valid_only_for_a_rod_that_touches():
    """Lawson p. 7-12: 0.06 D on the boom, vanishing with spacing; the bound keeps the uncertainty from being zero."""
    wavelength = wavelength_mm(432.2)
    touching = published_values("on-top", boom_mm=20, wavelength_mm=wavelength)
    raised = published_values("on-top", boom_mm=20, wavelength_mm=wavelength, gap_mm=5)
    assert [value.value_mm for value in touching] == pytest.approx([1.2, 5.361], abs=ROUNDED_MM)
    assert [value.valid for value in touching] == [True, True]
    assert [value.valid for value in raised] == [False, True]
    assert spread_mm(touching) == pytest.approx(4.161, abs=ROUNDED_MM)


def test_no_metal_boom_takes_nothing():
    values = published_values("through-nonmetal", boom_mm=20, wavelength_mm=693.6)
    assert values == ()
    assert spread_mm(values) == 0


def test_beyond_its_range_the_curve_is_held_and_marked():
    for boom_mm in (55.0, 60.0, 200.0):
        curve = published_values("bonded-through", boom_mm=boom_mm, wavelength_mm=1000)[0]
        assert not curve.valid
        assert curve.value_mm == pytest.approx(0.693 * boom_mm, rel=1e-6)
    assert published_values("bonded-through", boom_mm=54.99, wavelength_mm=1000)[0].valid
    for boom_mm, valid in ((50.0, True), (50.01, False)):
        found = published_values("bonded-through", boom_mm=boom_mm, wavelength_mm=1000)[2]
        assert (found.model, found.valid) == ("fishenden-wiblin", valid)
    assert pytest.approx(0.05) == FISHENDEN_WIBLIN_LIMIT_WL
    assert pytest.approx(0.055) == DL6WU_LIMIT_WL


@given(st.floats(1, 54), st.sampled_from(["bonded-through", "insulated-through", "on-top"]))
def test_models_that_can_be_chosen_are_the_rules_that_are_listed(boom_mm, style):
    values = published_values(style, boom_mm=boom_mm, wavelength_mm=1000)
    assert tuple(value.model for value in values if not value.is_bound) == published_models(style)
    chosen = [value.value_mm for value in values if not value.is_bound]
    assert all(abs(value - other.value_mm) <= spread_mm(values) + 1e-12 for value in chosen for other in values)


def test_sizes_must_be_above_zero():
    for boom_mm, wavelength in ((0, 1000), (20, 0), (-1, 1000)):
        with pytest.raises(ValueError, match="above zero"):
            published_values("on-top", boom_mm=boom_mm, wavelength_mm=wavelength)
