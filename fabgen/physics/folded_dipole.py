"""Folded dipole: what unequal limbs do to the impedance."""

import math


def step_up_ratio(*, fed_diameter_mm: float, other_diameter_mm: float, spacing_mm: float) -> float:
    """Impedance of a half-wave folded dipole over that of a plain one, limbs of any two diameters.

    (1 + α)² with α = acosh((v² − u² + 1)/2v) / acosh((v² + u² − 1)/2uv), u = other/fed, v = 2 spacing/fed.

    Args:
        fed_diameter_mm: diameter of the limb with the gap.
        other_diameter_mm: diameter of the closed limb.
        spacing_mm: between their centre lines.

    Returns:
        The ratio; 4 for equal limbs at any spacing.

    Raises:
        ValueError: the limbs touch or a diameter is not above zero.

    Source: S. Uda, Y. Mushiake, Yagi-Uda Antenna, 1954, as in C. A. Balanis, Antenna Theory, sec. 9.5 (from memory;
    checked against a two-dimensional moment-method charge split).
    """
    if fed_diameter_mm <= 0 or other_diameter_mm <= 0:
        raise ValueError("diameters must be above zero")
    if spacing_mm <= (fed_diameter_mm + other_diameter_mm) / 2:
        raise ValueError("the limbs of a folded dipole must not touch")
    u = other_diameter_mm / fed_diameter_mm
    v = 2 * spacing_mm / fed_diameter_mm
    alpha = math.acosh((v**2 - u**2 + 1) / (2 * v)) / math.acosh((v**2 + u**2 - 1) / (2 * u * v))
    return (1 + alpha) ** 2
