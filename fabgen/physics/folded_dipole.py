"""Folded dipole: the rod it is bent from, and what unequal limbs do to the impedance."""

import math


def bend_radius_mm(spacing_mm: float) -> float:
    """Centre-line radius of the two end bends: half the limbs' centre spacing."""
    return spacing_mm / 2


def developed_length_mm(*, length_mm: float, spacing_mm: float, diameter_mm: float, gap_mm: float) -> float:
    """Length of straight rod that one folded dipole is bent from, on the centre line.

    2 (L − s − d) + π s − g: two straight limbs between the bends and two half circles, less the gap in the fed limb.
    The centre line neither stretches nor shrinks in bending; a bender's own allowance is found on a trial piece.

    Args:
        length_mm: L, over the outside of both bends.
        spacing_mm: s, between the centre lines of the limbs.
        diameter_mm: d, of the rod.
        gap_mm: g, between the two fed ends.

    Returns:
        Developed length in mm.

    Raises:
        ValueError: the limbs touch, or no straight is left for the gap.

    Source: geometry.
    """
    straight_mm = length_mm - spacing_mm - diameter_mm
    if spacing_mm <= diameter_mm:
        raise ValueError("the limbs of a folded dipole must be further apart than the rod is thick")
    if not 0 <= gap_mm < straight_mm:
        raise ValueError("the gap must fit into the straight part of the fed limb")
    return 2 * straight_mm + math.pi * spacing_mm - gap_mm


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
