"""Coupon holder: the rod drops into its slots and can hardly shift; the piece of boom clears cheeks and floor."""

import pytest

from fabgen.design.coupon_holder_sizes import SLOT_PLAY_MM, coupon_holder_size, least_height_mm
from fabgen.design.saddle_sizes import saddle_size
from fabgen.model.kernel import cq, solid_of, volume_mm3
from fabgen.model.parts.coupon_holder import coupon_holder

CASES = [
    {},
    {"rod_diameter_mm": 8.0, "height_mm": 40.0, "boom_width_mm": 30.0, "rest_mm": 15.0, "hole_growth_mm": 0.2},
    {"rod_diameter_mm": 2.5, "height_mm": 60.0, "boom_width_mm": 15.0, "rest_mm": 40.0, "stack_mm": 0.0},
]


def common_mm3(part: cq.Workplane, *tools: cq.Shape) -> float:
    return sum(max(0.0, solid_of(part).intersect(tool).Volume()) for tool in tools)


def rod(size, x_mm: float, z_mm: float) -> cq.Solid:
    start = cq.Vector(x_mm, -size.half_y_mm - 20, z_mm)
    return cq.Solid.makeCylinder(size.rod_diameter_mm / 2, 2 * size.half_y_mm + 40, start, cq.Vector(0, 1, 0))


@pytest.mark.parametrize("numbers", CASES)
def test_volume_is_the_closed_form(numbers) -> None:
    assert volume_mm3(coupon_holder(**numbers)) == pytest.approx(coupon_holder_size(**numbers).volume_mm3, rel=1e-7)


@pytest.mark.parametrize("numbers", CASES)
def test_the_slots_hold_the_station(numbers) -> None:
    """The rod goes in from above, lies at its height and can shift by no more than 0.2 mm between its two ends."""
    part, size = coupon_holder(**numbers), coupon_holder_size(**numbers)
    growth = numbers.get("hole_growth_mm", 0.0)
    play = (SLOT_PLAY_MM + growth) / 2
    for z in (size.height_mm - play + 0.001, size.height_mm, size.top_mm + 10):
        assert common_mm3(part, rod(size, 0.0, z)) == pytest.approx(0.0, abs=1e-6)
    assert common_mm3(part, rod(size, 0.0, size.height_mm - play - 0.05)) > 0
    for side in (-1, 1):
        assert common_mm3(part, rod(size, side * (play - 0.001), size.height_mm)) == pytest.approx(0.0, abs=1e-3)
        assert common_mm3(part, rod(size, side * (play + 0.05), size.height_mm)) > 0.01
    assert 2 * (SLOT_PLAY_MM / 2) <= 0.2


@pytest.mark.parametrize("numbers", CASES)
def test_the_piece_of_boom_hangs_free_between_the_cheeks(numbers) -> None:
    part, size = coupon_holder(**numbers), coupon_holder_size(**numbers)
    wide = size.boom_width_mm / 2 + size.stack_mm
    low = size.height_mm - size.rest_mm
    piece = cq.Solid.makeBox(400, size.boom_width_mm, 30, cq.Vector(-200, -size.boom_width_mm / 2, low))
    mount = cq.Solid.makeBox(10, 2 * wide, 10, cq.Vector(-5, -wide, size.height_mm - 5))
    assert common_mm3(part, piece, mount) == pytest.approx(0.0, abs=1e-6)


def test_its_screws_stand_where_the_saddles_do() -> None:
    assert coupon_holder_size().screw_x_mm == saddle_size(height_mm=20.0).screw_x_mm[1]


def test_a_rod_too_low_is_refused() -> None:
    least = least_height_mm(rest_mm=10.0)
    assert coupon_holder_size(height_mm=least).floor_mm > 0
    with pytest.raises(ValueError, match="needs a rod 18 mm over the timber"):
        coupon_holder_size(height_mm=least - 0.5)
