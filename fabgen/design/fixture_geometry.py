"""Integrals over the outlines that fixtures are pierced with, each over the direction across the boom.

Every function takes a depth as a function of the distance t from the outline's axis of symmetry and returns the volume
of that depth under the outline; where the outline has a corner or an upright tangent the integral is taken in pieces.
"""

import itertools
import math
from collections.abc import Callable

from fabgen.design.part_geometry import PI, hexagon_corners_mm, integral, teardrop_chord_mm

Depth = Callable[[float], float]


def under_teardrop_mm3(diameter_mm: float, depth: Depth) -> float:
    """Under a teardrop whose apex points along the boom."""
    radius = diameter_mm / 2

    def piece(angle: float) -> float:
        t = radius * math.sin(angle)
        # On the boundary between arc and tangents the chord is the same from both sides.
        return teardrop_chord_mm(diameter_mm, t) * radius * math.cos(angle) * depth(t)

    stops = (-PI / 2, -PI / 4, 0.0, PI / 4, PI / 2)
    return sum(integral(piece, low, high) for low, high in itertools.pairwise(stops))


def under_hexagon_mm3(across_flats_mm: float, depth: Depth) -> float:
    """Under a hexagon with two corners across the boom."""
    corner = hexagon_corners_mm(across_flats_mm) / 2

    def piece(t: float) -> float:
        return min(1.0, 2 * (1 - abs(t) / corner)) * across_flats_mm * depth(t)

    stops = (-corner, -corner / 2, 0.0, corner / 2, corner)
    return sum(integral(piece, low, high) for low, high in itertools.pairwise(stops))


def under_strip_mm3(half_mm: float, length_mm: float, depth: Depth) -> float:
    """Under a rectangle of 2 × half across the boom and a length along it."""
    return length_mm * integral(depth, -half_mm, half_mm)


def under_notch_mm3(notch_mm: float, depth: Callable[[float, float], float], stop_mm: float = 0.0) -> float:
    """Under a V with an angle of 90° whose mouth lies across the boom.

    Args:
        notch_mm: depth of the V, half its mouth.
        depth: of the distance from the mouth and the distance t from the V's axis.
        stop_mm: distance from the mouth where the depth has a bend; 0 for none.
    """

    def slice_mm2(d: float) -> float:
        half = notch_mm - d
        return integral(lambda t: depth(d, t), -half, half) if half > 0 else 0.0

    return (integral(slice_mm2, 0.0, stop_mm) if stop_mm else 0.0) + integral(slice_mm2, stop_mm, notch_mm)
