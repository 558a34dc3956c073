"""Bending strain of the two printed keepers: a split ring on a thicker rod, a C-clip that snaps over it.

Both are thick curved bars. Plane sections stay plane, so the strain at radius r is ω (r − n)/r, where ω is the
relative change of angle and n = (o − i)/ln(o/i) the neutral radius of a rectangular section from radius i to o; the
inner surface strains most (E. Winkler, H. Résal and C. Bach; in W. C. Young, Roark's Formulas for Stress and Strain,
curved beams, from memory).
"""

import math


def neutral_radius_mm(bore_mm: float, outside_mm: float) -> float:
    """Neutral radius of a ring of rectangular section in bending.

    Args:
        bore_mm: inner diameter in mm, above zero.
        outside_mm: outer diameter in mm, above the bore.

    Raises:
        ValueError: the ring has no wall or no bore.
    """
    if not 0 < bore_mm < outside_mm:
        raise ValueError("a ring needs a bore above zero and an outside above its bore")
    return (outside_mm - bore_mm) / 2 / math.log(outside_mm / bore_mm)


def push_ring_strain(*, rod_mm: float, bore_mm: float, outside_mm: float) -> float:
    """Largest strain in a split ring that sits on a rod thicker than its bore.

    The slit lets the ring open; where it lies on the rod its inner surface has the rod's radius and its neutral fibre
    keeps its length: ε = n r/((n + r − i) i) − 1, i the free inner radius and r the rod's. Towards the slit the
    moment fades to zero, so this is the largest strain at any slit width.

    Args:
        rod_mm: rod diameter in mm.
        bore_mm: free bore in mm.
        outside_mm: free outside diameter in mm.

    Returns:
        Tensile strain at the inner surface, 0.02 for 2 %; 0 when the bore is not below the rod.

    Raises:
        ValueError: the ring has no wall or no bore.
    """
    neutral = neutral_radius_mm(bore_mm, outside_mm)
    opening = (rod_mm - bore_mm) / 2
    return max(0.0, neutral * rod_mm / ((neutral + opening) * bore_mm) - 1)


def largest_push_ring_outside_mm(*, rod_mm: float, bore_mm: float, limit_strain: float = 0.02) -> float:
    """The thickest split ring that stays within a strain limit on its rod.

    Args:
        rod_mm: rod diameter in mm.
        bore_mm: free bore in mm, below the rod.
        limit_strain: 0.02 for 2 %.

    Returns:
        Outside diameter in mm; `math.inf` when any thickness will do.

    Raises:
        ValueError: the bore is not between zero and the rod.
    """
    if not 0 < bore_mm < rod_mm:
        raise ValueError("the bore must lie between zero and the rod's diameter")
    if rod_mm <= (1 + limit_strain) * bore_mm:
        return math.inf
    opening = (rod_mm - bore_mm) / 2
    neutral = opening * (1 + limit_strain) * bore_mm / (rod_mm - (1 + limit_strain) * bore_mm)
    low, high = bore_mm, 2 * bore_mm
    while neutral_radius_mm(bore_mm, high) < neutral:
        high *= 2
    for _ in range(80):
        middle = (low + high) / 2
        low, high = (middle, high) if neutral_radius_mm(bore_mm, middle) < neutral else (low, middle)
    return low


def snap_clip_strain(*, rod_mm: float, bore_mm: float, outside_mm: float, mouth_mm: float) -> float:
    """Largest strain in a C-clip while the rod passes its mouth.

    The rod pushes the two tips apart by rod − mouth. A force P at the tips bends the bar by M = P R (cos θ − cos α),
    θ from the back, α half the embraced angle, R the mean radius; the strain is largest at the back, inside.

    Args:
        rod_mm: rod diameter in mm.
        bore_mm: bore of the clip in mm.
        outside_mm: its outside diameter in mm.
        mouth_mm: clear width of its mouth in mm, below the bore; the clip embraces more than half of the rod.

    Returns:
        Tensile strain at the inner surface, 0.02 for 2 %; 0 when the mouth lets the rod through.

    Raises:
        ValueError: the clip has no wall, no bore, or a mouth as wide as the bore.

    Source: tip-loaded circular arc, Castigliano's theorem; for the closed arc it is the slit ring's 3π P R³/(E I).
    """
    if not 0 <= mouth_mm < bore_mm:
        raise ValueError("a clip's mouth must be narrower than its bore")
    opening = max(0.0, rod_mm - mouth_mm)
    neutral = neutral_radius_mm(bore_mm, outside_mm)
    mean, half = (bore_mm + outside_mm) / 4, math.pi - math.asin(mouth_mm / bore_mm)
    compliance = half * (0.5 + math.cos(half) ** 2) - 0.75 * math.sin(2 * half)
    rotation = opening * (1 - math.cos(half)) / (2 * mean * compliance)
    return rotation * (neutral - bore_mm / 2) / (bore_mm / 2)
