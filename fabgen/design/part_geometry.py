"""Areas and volumes that part sizes are made of, in closed form or as a smooth integral taken to rounding error."""

import math
from collections.abc import Callable

PI = math.pi


def disc_mm2(diameter_mm: float) -> float:
    """Area of a disc."""
    return PI / 4 * diameter_mm**2


def ring_mm2(outside_mm: float, bore_mm: float) -> float:
    """Area between two concentric circles."""
    return disc_mm2(outside_mm) - disc_mm2(bore_mm)


def hexagon_mm2(across_flats_mm: float) -> float:
    """Area of a regular hexagon."""
    return math.sqrt(3) / 2 * across_flats_mm**2


def hexagon_corners_mm(across_flats_mm: float) -> float:
    """Width across the corners of a regular hexagon."""
    return 2 / math.sqrt(3) * across_flats_mm


def teardrop_mm2(diameter_mm: float) -> float:
    """Area of a circle closed by two tangents at 45°: three quarters of the disc and a square of its radius."""
    radius = diameter_mm / 2
    return radius**2 * (1 + 0.75 * PI)


def strip_mm2(radius_mm: float, width_mm: float) -> float:
    """Area of a half disc x ≥ 0 within |y| ≤ width/2."""
    half = width_mm / 2
    return half * math.sqrt(radius_mm**2 - half**2) + radius_mm**2 * math.asin(half / radius_mm)


def outer_chamfer_mm3(diameter_mm: float, chamfer_mm: float) -> float:
    """What a 45° chamfer takes off a cylinder's edge."""
    return PI * chamfer_mm**2 * (diameter_mm / 2 - chamfer_mm / 3)


def bore_chamfer_mm3(bore_mm: float, chamfer_mm: float) -> float:
    """What a 45° chamfer takes off a bore's edge."""
    return PI * chamfer_mm**2 * (bore_mm / 2 + chamfer_mm / 3)


def integral(function: Callable[[float], float], low: float, high: float, steps: int = 64) -> float:
    """Simpson's rule over an even number of steps."""
    width = (high - low) / steps
    inner = sum((4 if i % 2 else 2) * function(low + i * width) for i in range(1, steps))
    return width / 3 * (function(low) + inner + function(high))


def drop_mm(boom_diameter_mm: float, y_mm: float) -> float:
    """How far a round boom's surface lies below its crown at a distance y across; 0 for flat walls.

    Raises:
        ValueError: the distance reaches beyond the boom.
    """
    if boom_diameter_mm == 0:
        return 0.0
    radius = boom_diameter_mm / 2
    if abs(y_mm) > radius:
        raise ValueError(f"{abs(y_mm):.3f} mm across reaches beyond a boom of {boom_diameter_mm:.3f} mm diameter")
    return radius - math.sqrt(radius**2 - y_mm**2)


def under_disc_mm3(boom_diameter_mm: float, disc_diameter_mm: float) -> float:
    """Volume between a round boom's surface and the level of its crown, under a disc centred on the crown."""
    if boom_diameter_mm == 0:
        return 0.0
    radius = disc_diameter_mm / 2
    # y = radius sin θ makes the integrand smooth and periodic; the mean over equal steps is then exact.
    steps = 64
    angles = [(i + 0.5) * PI / steps - PI / 2 for i in range(steps)]
    terms = (drop_mm(boom_diameter_mm, radius * math.sin(a)) * 2 * (radius * math.cos(a)) ** 2 for a in angles)
    return PI / steps * sum(terms)


def under_strip_mm2(boom_diameter_mm: float, width_mm: float) -> float:
    """Area between a round boom's outline and the level of its crown, over |y| ≤ width/2."""
    if boom_diameter_mm == 0:
        return 0.0
    return boom_diameter_mm / 2 * width_mm - strip_mm2(boom_diameter_mm / 2, width_mm)


def under_teardrop_mm3(boom_diameter_mm: float, diameter_mm: float) -> float:
    """As `under_disc_mm3`, under a teardrop whose apex points along y."""
    if boom_diameter_mm == 0:
        return 0.0
    radius = diameter_mm / 2
    apex = math.sqrt(2) * radius

    def beside_arc(angle: float) -> float:
        y = radius * math.sin(angle)
        return drop_mm(boom_diameter_mm, y) * 2 * (apex - y - radius * math.cos(angle)) * radius * math.cos(angle)

    def above_arc(y: float) -> float:
        return drop_mm(boom_diameter_mm, y) * 2 * (apex - y)

    cap = integral(beside_arc, PI / 4, PI / 2) + integral(above_arc, radius, apex)
    return under_disc_mm3(boom_diameter_mm, diameter_mm) + cap


def segment_mm2(radius_mm: float, distance_mm: float) -> float:
    """Area of a disc beyond a chord at a distance from its centre (0 to the radius)."""
    if distance_mm >= radius_mm:
        return 0.0
    chord = math.sqrt(radius_mm**2 - distance_mm**2)
    return radius_mm**2 * math.acos(distance_mm / radius_mm) - distance_mm * chord


def teardrop_chord_mm(diameter_mm: float, offset_mm: float) -> float:
    """Length of a teardrop along its apex's direction, at a distance from its axis of symmetry."""
    radius, offset = diameter_mm / 2, abs(offset_mm)
    arc = math.sqrt(max(0.0, radius**2 - offset**2))
    return arc + (math.sqrt(2) * radius - offset if offset < math.sqrt(0.5) * radius else arc)
