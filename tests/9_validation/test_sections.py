"""Section properties and masses against closed forms and an independent integration."""

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from fabgen.physics.sections import (
    boom_section,
    drilled_rectangular_section,
    drilled_round_section,
    rectangular_section,
    round_section,
)

REL = 1e-5
"""The table prints six to seven digits."""

INTEGRATION_REL = 2e-3
"""Counting 1200 × 1200 cells: an edge cell is wrong by half its area at worst."""


@pytest.mark.parametrize(
    ("diameter_mm", "wall_mm", "area_mm2", "i_mm4", "w_mm3", "kg_per_m"),
    [
        (12, 1, 34.5575, 527.002, 87.834, 0.09331),
        (20, 1.5, 87.1792, 3754.154, 375.415, 0.23538),
        (25, 2, 144.5133, 9628.196, 770.256, 0.39019),
        (40, 2, 238.7610, 43215.749, 2160.787, 0.64465),
    ],
)
def test_round_tube(diameter_mm, wall_mm, area_mm2, i_mm4, w_mm3, kg_per_m):
    """Elementary formulas, computed; the 25 × 2 tube also by polygon integration; density 2700 kg/m³."""
    tube = round_section(diameter_mm=diameter_mm, wall_mm=wall_mm)
    assert tube.area_mm2 == pytest.approx(area_mm2, rel=REL)
    assert tube.i_about_y_mm4 == tube.i_about_z_mm4 == pytest.approx(i_mm4, rel=REL)
    assert tube.w_about_y_mm3 == tube.w_about_z_mm3 == pytest.approx(w_mm3, rel=REL)
    assert tube.mass_kg_per_m(2700) == pytest.approx(kg_per_m, abs=6e-6)


@pytest.mark.parametrize(
    ("side_mm", "wall_mm", "area_mm2", "i_mm4", "w_mm3", "kg_per_m"),
    [(20, 1.5, 111.0, 6373.250, 637.325, 0.29970), (25, 2, 184.0, 16345.333, 1307.627, 0.49680)],
)
def test_sharp_square_tube(side_mm, wall_mm, area_mm2, i_mm4, w_mm3, kg_per_m):
    """Elementary formulas, computed; density 2700 kg/m³."""
    tube = rectangular_section(width_mm=side_mm, height_mm=side_mm, wall_mm=wall_mm)
    assert tube.area_mm2 == pytest.approx(area_mm2, rel=REL)
    assert tube.i_about_y_mm4 == tube.i_about_z_mm4 == pytest.approx(i_mm4, rel=REL)
    assert tube.w_about_y_mm3 == pytest.approx(w_mm3, rel=REL)
    assert tube.mass_kg_per_m(2700) == pytest.approx(kg_per_m, abs=6e-6)


@pytest.mark.parametrize(
    ("diameter_mm", "area_mm2", "i_mm4", "kg_per_m"),
    [
        (4, 12.566, 12.566, 0.033929),
        (6, 28.274, 63.617, 0.076341),
        (8, 50.265, 201.062, 0.135717),
        (10, 78.540, 490.874, 0.212058),
    ],
)
def test_round_rod(diameter_mm, area_mm2, i_mm4, kg_per_m):
    """Elementary formulas, computed; density 2700 kg/m³."""
    rod = round_section(diameter_mm=diameter_mm)
    assert rod.area_mm2 == pytest.approx(area_mm2, abs=6e-4)
    assert rod.i_about_y_mm4 == pytest.approx(i_mm4, abs=6e-4)
    assert rod.mass_kg_per_m(2700) == pytest.approx(kg_per_m, abs=6e-7)
    assert rod.mass_g(1000, 2700) == pytest.approx(1000 * kg_per_m, abs=6e-4)


def test_rounded_square_tube_is_one_to_three_percent_lighter_than_the_sharp_one():
    """Common practice: the corner radii of real tube take 1 to 3 %."""
    sharp = rectangular_section(width_mm=20, height_mm=20, wall_mm=1.5)
    real = rectangular_section(width_mm=20, height_mm=20, wall_mm=1.5, corner_radius_mm=2)
    assert 0.97 < real.area_mm2 / sharp.area_mm2 < 0.99
    assert real.area_mm2 == pytest.approx(111 - (4 - math.pi) * (2**2 - 0.5**2), rel=1e-12)


def counted(inside, width_mm, height_mm, cells=1200):
    """Area, ∫z² and ∫y² of a section by counting cells."""
    y = (np.arange(cells) + 0.5) / cells * width_mm - width_mm / 2
    z = (np.arange(cells) + 0.5) / cells * height_mm - height_mm / 2
    yy, zz = np.meshgrid(y, z)
    mask = inside(yy, zz)
    cell = width_mm * height_mm / cells**2
    return mask.sum() * cell, (zz[mask] ** 2).sum() * cell, (yy[mask] ** 2).sum() * cell


def rounded(width_mm, height_mm, radius_mm):
    """Membership of a rounded rectangle by its signed distance."""

    def inside(y, z):
        dy = np.maximum(np.abs(y) - width_mm / 2 + radius_mm, 0)
        dz = np.maximum(np.abs(z) - height_mm / 2 + radius_mm, 0)
        in_box = (np.abs(y) <= width_mm / 2) & (np.abs(z) <= height_mm / 2)
        return in_box & (np.hypot(dy, dz) <= radius_mm if radius_mm else in_box)

    return inside


@pytest.mark.parametrize(
    ("width_mm", "height_mm", "wall_mm", "radius_mm"),
    [(20, 20, 1.5, 2), (30, 20, 2, 3), (40, 25, 3, 1), (15, 15, 0, 2), (20, 10, 0, 0), (20, 20, 2, 10)],
)
def test_rectangular_section_against_counted_cells(width_mm, height_mm, wall_mm, radius_mm):
    """Independent of the closed form: a million cells, each tested for being inside."""
    outer = rounded(width_mm, height_mm, radius_mm)
    bore = rounded(width_mm - 2 * wall_mm, height_mm - 2 * wall_mm, max(0, radius_mm - wall_mm))
    area, z2, y2 = counted(lambda y, z: outer(y, z) & ~(bool(wall_mm) & bore(y, z)), width_mm, height_mm)
    found = rectangular_section(width_mm=width_mm, height_mm=height_mm, wall_mm=wall_mm, corner_radius_mm=radius_mm)
    assert found.area_mm2 == pytest.approx(area, rel=INTEGRATION_REL)
    assert found.i_about_y_mm4 == pytest.approx(z2, rel=INTEGRATION_REL)
    assert found.i_about_z_mm4 == pytest.approx(y2, rel=INTEGRATION_REL)
    assert found.w_about_y_mm3 == pytest.approx(z2 / (height_mm / 2), rel=INTEGRATION_REL)
    assert found.w_about_z_mm3 == pytest.approx(y2 / (width_mm / 2), rel=INTEGRATION_REL)


@pytest.mark.parametrize("along", ["y", "z"])
@pytest.mark.parametrize(("wall_mm", "hole_mm"), [(2, 8), (0, 6)])
def test_drilled_rectangular_section_against_counted_cells(along, wall_mm, hole_mm):
    outer, bore = rounded(30, 20, 2), rounded(30 - 2 * wall_mm, 20 - 2 * wall_mm, 0)

    def inside(y, z):
        metal = outer(y, z) & ~(bool(wall_mm) & bore(y, z))
        return metal & (np.abs(z if along == "y" else y) > hole_mm / 2)

    area, z2, y2 = counted(inside, 30, 20)
    found = drilled_rectangular_section(
        width_mm=30, height_mm=20, wall_mm=wall_mm, corner_radius_mm=2, hole_mm=hole_mm, along=along
    )
    assert found.area_mm2 == pytest.approx(area, rel=INTEGRATION_REL)
    assert found.i_about_y_mm4 == pytest.approx(z2, rel=INTEGRATION_REL)
    assert found.i_about_z_mm4 == pytest.approx(y2, rel=INTEGRATION_REL)


@pytest.mark.parametrize(("wall_mm", "hole_mm"), [(1.5, 8), (0, 4)])
def test_drilled_round_section_against_counted_cells(wall_mm, hole_mm):
    bore = 10 - wall_mm

    def inside(y, z):
        r = np.hypot(y, z)
        return (r <= 10) & ((r >= bore) | (wall_mm == 0)) & (np.abs(z) > hole_mm / 2)

    area, z2, y2 = counted(inside, 20, 20)
    found = drilled_round_section(diameter_mm=20, wall_mm=wall_mm, hole_mm=hole_mm)
    assert found.area_mm2 == pytest.approx(area, rel=INTEGRATION_REL)
    assert found.i_about_y_mm4 == pytest.approx(z2, rel=INTEGRATION_REL)
    assert found.i_about_z_mm4 == pytest.approx(y2, rel=INTEGRATION_REL)


def test_drilled_sharp_tube_by_hand():
    """20 × 20 × 1.5, 8 mm along y: two strips of 1.5 × 8 less; I loses 2 · 1.5 · 8³/12 = 128."""
    found = drilled_rectangular_section(width_mm=20, height_mm=20, wall_mm=1.5, hole_mm=8, along="y")
    assert found.area_mm2 == pytest.approx(111 - 24)
    assert found.i_about_y_mm4 == pytest.approx(6373.25 - 128)


@given(st.floats(5, 100), st.floats(0.01, 0.45))
def test_a_square_with_corners_of_half_its_side_is_round(side_mm, wall_part):
    wall_mm = wall_part * side_mm
    square = rectangular_section(width_mm=side_mm, height_mm=side_mm, wall_mm=wall_mm, corner_radius_mm=side_mm / 2)
    tube = round_section(diameter_mm=side_mm, wall_mm=wall_mm)
    assert square.area_mm2 == pytest.approx(tube.area_mm2, rel=1e-9)
    assert square.i_about_y_mm4 == pytest.approx(tube.i_about_y_mm4, rel=1e-9)


def test_a_boom_is_looked_up_by_its_shape():
    assert boom_section("round", width_mm=20, height_mm=20, wall_mm=1) == round_section(diameter_mm=20, wall_mm=1)
    assert boom_section("rectangular", width_mm=30, height_mm=20) == rectangular_section(width_mm=30, height_mm=20)


@pytest.mark.parametrize(
    "sizes",
    [
        {"width_mm": 0, "height_mm": 20},
        {"width_mm": 20, "height_mm": 20, "wall_mm": 10},
        {"width_mm": 20, "height_mm": 20, "wall_mm": -1},
        {"width_mm": 20, "height_mm": 10, "corner_radius_mm": 6},
    ],
)
def test_impossible_sections_are_refused(sizes):
    with pytest.raises(ValueError, match=r"section|corner"):
        rectangular_section(**sizes)


def test_holes_that_leave_no_wall_are_refused():
    with pytest.raises(ValueError, match="corner"):
        drilled_rectangular_section(width_mm=20, height_mm=20, wall_mm=1.5, hole_mm=18, along="y")
    with pytest.raises(ValueError, match="as wide"):
        drilled_round_section(diameter_mm=20, wall_mm=1.5, hole_mm=17)
