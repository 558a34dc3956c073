"""From a measured allowance to the reactance that the mount removes, and from there to every rod of the table.

A record keeps reactance, not millimetres: the same mount takes more length from a longer rod.

Source: own study 2026, computed, unpublished.
"""

from fabgen.physics.boom_closed_form import rod_slope_ohm_per_wl
from fabgen.physics.boom_mount import ETA_OHM, wavelength_mm

TRANSFER_U_RELATIVE = 0.06
"""Of the allowance, for carrying what three rods say to the full array."""


def reactance_factor_from_allowance(
    allowance_mm: float, *, boom_mm: float, rod_diameter_mm: float, rod_length_mm: float, frequency_mhz: float
) -> float:
    """Removed reactance of a mount over η B, from the allowance of one rod in it: g = A S / (η B).

    Args:
        allowance_mm: measured or solved allowance A of that rod.
        boom_mm: boom diameter or side B.
        rod_diameter_mm: rod diameter.
        rod_length_mm: free length L0 of the same rod, at which S is taken.
        frequency_mhz: frequency of the measurement.

    Returns:
        g, a pure number.
    """
    wl_mm = wavelength_mm(frequency_mhz)
    slope = rod_slope_ohm_per_wl(rod_diameter_mm / wl_mm, rod_length_mm / wl_mm)
    return allowance_mm * slope / (ETA_OHM * boom_mm)


def allowance_from_reactance_factor_mm(
    reactance_factor: float,
    *,
    boom_mm: float,
    rod_diameter_mm: float,
    rod_length_mm: float,
    frequency_mhz: float,
) -> float:
    """Allowance of a rod of another length in the same mount: A = g η B / S.

    Args:
        reactance_factor: g of the mount.
        boom_mm: boom diameter or side B.
        rod_diameter_mm: rod diameter.
        rod_length_mm: modelled (free) length of this rod.
        frequency_mhz: design frequency, that of the measurement.

    Returns:
        The allowance in mm.
    """
    wl_mm = wavelength_mm(frequency_mhz)
    slope = rod_slope_ohm_per_wl(rod_diameter_mm / wl_mm, rod_length_mm / wl_mm)
    return reactance_factor * ETA_OHM * boom_mm / slope


def end_fall_factor(boom_mm: float, end_distance_mm: float) -> float:
    """How much g falls for one sawn boom end; a coupon has two.

    Args:
        boom_mm: boom diameter or side.
        end_distance_mm: rod axis to the end.

    Returns:
        0.25 B / (e + 0.1 B), to be compared with g; solved coupons fall 15 % more at e = 2 B.
    """
    return 0.25 * boom_mm / (end_distance_mm + 0.1 * boom_mm)


def shortest_coupon_boom_mm(boom_mm: float) -> float:
    """Shortest piece of boom that a coupon may use, the rod in its middle.

    Shorter pieces read 5 to 20 % low bonded and 20 to 60 % low on top.

    Args:
        boom_mm: boom diameter or side.

    Returns:
        4 boom widths on each side.
    """
    return 8 * boom_mm


def good_coupon_boom_mm(boom_mm: float, frequency_mhz: float) -> float:
    """Length of a coupon's piece of boom that leaves little to doubt, the rod in its middle.

    Args:
        boom_mm: boom diameter or side.
        frequency_mhz: frequency of the measurement.

    Returns:
        0.15 wavelengths on each side, and no less than the shortest.
    """
    return max(shortest_coupon_boom_mm(boom_mm), 0.3 * wavelength_mm(frequency_mhz))
