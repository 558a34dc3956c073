"""How far a sawn length or a station may be off."""

from fabgen.design.design import Shop
from fabgen.stock.tables import NoToleranceError, linear_tolerance_mm


def shop_tolerance_mm(shop: Shop, size_mm: float) -> float:
    """± on a length or station: the stated tolerance, or ISO 2768-1 by size and class.

    Beyond the table (a station over 4 m, or over 2 m in class f) its nearest row of that class serves: tighter than the
    standard would go, never looser. Class v has no row below 3 mm: its first serves.

    Args:
        shop: states a tolerance or a class.
        size_mm: the nominal size.
    """
    if shop.stated_tolerance_mm > 0:
        return shop.stated_tolerance_mm
    for nearest_mm in (size_mm, 4000.0, 2000.0, 6.0):
        try:
            return linear_tolerance_mm(max(nearest_mm, 0.5), shop.tolerance)
        except NoToleranceError:
            continue
    raise NoToleranceError(f"ISO 2768-1 has no class {shop.tolerance}")
