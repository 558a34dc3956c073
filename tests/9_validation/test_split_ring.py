"""Keeper strains against independent numerical bending of the same bars."""

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy.integrate import quad

from fabgen.physics.split_ring import (
    largest_push_ring_outside_mm,
    neutral_radius_mm,
    push_ring_strain,
    snap_clip_strain,
)


def test_neutral_radius_of_a_rectangular_section():
    """W. C. Young, Roark's Formulas, curved beams, rectangle: n = h/ln(o/i), from memory; 10/ln 3 for 5 to 15."""
    assert neutral_radius_mm(10, 30) == pytest.approx(10 / math.log(3), rel=1e-12)
    assert neutral_radius_mm(100, 101) == pytest.approx(50.25, rel=1e-4)


@pytest.mark.parametrize(("rod_mm", "bore_mm", "outside_mm"), [(4, 3.7, 7.2), (6, 5.7, 9.2), (3, 2.7, 5.0)])
def test_push_ring_strain_is_that_of_a_bar_free_of_force_along_it(rod_mm, bore_mm, outside_mm):
    """Independent: find the angle change at which the hoop stress sums to zero, then read the inner strain."""
    i, o, opened = bore_mm / 2, outside_mm / 2, rod_mm / 2

    def hoop_strain(r, k):
        return k * (r + opened - i) / r - 1

    low, high = 0.0, 2.0
    for _ in range(60):
        k = (low + high) / 2
        low, high = (k, high) if quad(hoop_strain, i, o, args=(k,))[0] < 0 else (low, k)
    found = push_ring_strain(rod_mm=rod_mm, bore_mm=bore_mm, outside_mm=outside_mm)
    assert found == pytest.approx(hoop_strain(i, low), rel=1e-6)


def test_a_thin_ring_strains_by_half_its_wall_times_the_change_in_curvature():
    """Thin bar, elementary: ε = (t/2)(1/r − 1/(r + Δ)), here t/r = 0.01."""
    thin = push_ring_strain(rod_mm=100.5, bore_mm=100, outside_mm=101)
    assert thin == pytest.approx(0.25 * (1 / 50.25 - 1 / 50.5), rel=0.01)


def test_a_thick_ring_on_a_thin_rod_strains_more_than_the_thin_bar_says():
    thick = push_ring_strain(rod_mm=4, bore_mm=3.7, outside_mm=8)
    thin_bar = 1.075 * (1 / 2.925 - 1 / 3.075)
    assert thin_bar < 0.02 < thick


@given(st.floats(2, 20), st.floats(0.01, 0.3), st.floats(0.5, 6))
def test_the_largest_ring_meets_its_limit(rod_mm, grip_mm, wall_mm):
    bore_mm = rod_mm - grip_mm
    outside_mm = largest_push_ring_outside_mm(rod_mm=rod_mm, bore_mm=bore_mm)
    strain = push_ring_strain(rod_mm=rod_mm, bore_mm=bore_mm, outside_mm=bore_mm + 2 * wall_mm)
    if bore_mm + 2 * wall_mm < outside_mm - 1e-6:
        assert strain <= 0.02
    elif bore_mm + 2 * wall_mm > outside_mm + 1e-6:
        assert strain >= 0.02
    if bore_mm < outside_mm < 1e6:
        assert push_ring_strain(rod_mm=rod_mm, bore_mm=bore_mm, outside_mm=outside_mm) == pytest.approx(0.02)


def test_a_bore_just_under_the_rod_allows_any_thickness():
    assert largest_push_ring_outside_mm(rod_mm=4, bore_mm=3.97) == math.inf
    assert 3.7 < largest_push_ring_outside_mm(rod_mm=4, bore_mm=3.7) < 8
    assert push_ring_strain(rod_mm=4, bore_mm=4.1, outside_mm=8) == 0


@pytest.mark.parametrize("mouth_part", [0.0, 0.3, 0.8, 0.94])
def test_snap_clip_strain_against_bending_a_chain_of_small_links(mouth_part):
    """Independent: turn each link of a thin arc by its own moment and walk to the tip; 2 % from finite rotation."""
    bore_mm, outside_mm = 4.0, 4.2
    mouth_mm = mouth_part * bore_mm
    mean, half = (bore_mm + outside_mm) / 4, math.pi - math.asin(mouth_part)
    links, step = 20_000, half / 20_000

    def tip_across(rotation):
        direction, across = 0.0, 0.0
        for n in range(links):
            theta = (n + 0.5) * step
            moment = (math.cos(theta) - math.cos(half)) / (1 - math.cos(half))
            direction += step * (1 - rotation * moment)
            across += mean * step * math.cos(direction - step / 2 * (1 - rotation * moment))
        return across

    rotation = 1e-4
    opening = 2 * (tip_across(rotation) - tip_across(0))
    strain = snap_clip_strain(rod_mm=mouth_mm + opening, bore_mm=bore_mm, outside_mm=outside_mm, mouth_mm=mouth_mm)
    expected = rotation * (neutral_radius_mm(bore_mm, outside_mm) / (bore_mm / 2) - 1)
    assert strain == pytest.approx(expected, rel=0.02)


def test_a_closed_clip_opens_like_a_slit_ring():
    """W. C. Young, Roark's Formulas, slit ring: δ = 3π P R³/(E I), from memory; thin bar, strain 2 c δ/(3π R²)."""
    found = snap_clip_strain(rod_mm=1, bore_mm=100, outside_mm=101, mouth_mm=0)
    assert found == pytest.approx(2 * 0.25 * 1 / (3 * math.pi * 50.25**2), rel=0.01)


def test_a_wider_mouth_strains_less_until_the_rod_falls_through():
    strains = [
        snap_clip_strain(rod_mm=4, bore_mm=4.2, outside_mm=7, mouth_mm=mouth) for mouth in (3.2, 3.6, 3.9, 4, 4.1)
    ]
    assert strains == sorted(strains, reverse=True)
    assert strains[-2:] == [0, 0]


@pytest.mark.parametrize(
    ("function", "sizes"),
    [
        (push_ring_strain, {"rod_mm": 4, "bore_mm": 3.7, "outside_mm": 3.7}),
        (push_ring_strain, {"rod_mm": 4, "bore_mm": 0, "outside_mm": 8}),
        (snap_clip_strain, {"rod_mm": 4, "bore_mm": 4, "outside_mm": 8, "mouth_mm": 4}),
        (largest_push_ring_outside_mm, {"rod_mm": 4, "bore_mm": 4}),
    ],
)
def test_impossible_keepers_are_refused(function, sizes):
    with pytest.raises(ValueError, match="bore"):
        function(**sizes)
