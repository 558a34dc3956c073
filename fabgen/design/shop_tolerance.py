"""How far a sawn length or a station may be off."""

from fabgen.design.design import Shop
from fabgen.stock.tables import linear_tolerance_mm

_TABLED_MM = {"f": (0.5, 2000.0), "m": (0.5, 4000.0), "c": (0.5, 4000.0), "v": (6.0, 4000.0)}
"""Sizes of the first and the last row with a value, by class. Source: ISO 2768-1:1989, table 1, secondary source."""


def shop_tolerance_mm(shop: Shop, size_mm: float) -> float:
    """± on a length or station: the stated tolerance, or ISO 2768-1 by size and class.

    Beyond the table (a station over 4 m, or over 2 m in class f) its nearest row of that class serves: tighter than the
    standard would go, never looser. Class v has no row up to 3 mm: its first serves.

    Args:
        shop: states a tolerance or a class.
        size_mm: the nominal size.
    """
    if shop.stated_tolerance_mm > 0:
        return shop.stated_tolerance_mm
    smallest_mm, largest_mm = _TABLED_MM[shop.tolerance]
    return linear_tolerance_mm(min(max(size_mm, smallest_mm), largest_mm), shop.tolerance)
