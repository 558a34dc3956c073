"""What a shop's class says of any length or station, on the table's borders and beyond its ends."""

from collections.abc import Callable
from dataclasses import replace

import pytest

from fabgen.design.design import Design
from fabgen.design.shop_tolerance import shop_tolerance_mm

Variant = Callable[..., Design]


@pytest.mark.parametrize(
    ("tolerance", "size_mm", "expected_mm"),
    [
        ("m", 120.0, 0.3),
        ("m", 120.001, 0.5),
        ("m", 400.0, 0.5),
        ("m", 400.001, 0.8),
        ("m", 1000.0, 0.8),
        ("m", 1000.001, 1.2),
        ("m", 0.1 + 0.2 + 119.7, 0.3),  # 120.00000000000001
        ("v", 2.0, 0.5),
        ("v", 3.0, 0.5),
        ("v", 0.0, 0.5),
        ("f", 0.0, 0.05),
        ("f", 2500.0, 0.5),
        ("f", 4500.0, 0.5),
        ("m", 4500.0, 2.0),
        ("c", 4500.0, 4.0),
        ("v", 4500.0, 8.0),
    ],
)
def test_class_and_size(variant: Variant, tolerance: str, size_mm: float, expected_mm: float) -> None:
    """ISO 2768-1:1989, table 1 (secondary source): a border belongs to the lower row; beyond the ends the nearest row
    of the class serves."""
    assert shop_tolerance_mm(variant((": m,", f": {tolerance},")).shop, size_mm) == expected_mm


def test_a_stated_tolerance_replaces_the_class(variant: Variant) -> None:
    shop = replace(variant().shop, stated_tolerance_mm=0.25)
    assert shop_tolerance_mm(shop, 2.0) == shop_tolerance_mm(shop, 4500.0) == 0.25
