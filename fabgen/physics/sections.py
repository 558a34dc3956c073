"""Area, second moments, section moduli and mass of booms and rods.

Frame: x along the bar, y across it, z up; y = z = 0 at the centroid. `about_y` resists bending in the vertical plane
(I = ∫ z² dA), `about_z` bending sideways. Closed forms by geometry; a rounded corner is a quarter circle.
"""

import math
from typing import Literal

from fabgen.frozen import frozen


@frozen
class SectionProperties:
    """Properties of one cross-section.

    Attributes:
        area_mm2: area of the material.
        i_about_y_mm4: second moment of area against vertical bending.
        i_about_z_mm4: second moment of area against sideways bending.
        w_about_y_mm3: section modulus against vertical bending, for the outermost fibre.
        w_about_z_mm3: section modulus against sideways bending.
    """

    area_mm2: float
    i_about_y_mm4: float
    i_about_z_mm4: float
    w_about_y_mm3: float
    w_about_z_mm3: float

    def mass_kg_per_m(self, density_kg_m3: float) -> float:
        """Mass of one metre in kg."""
        return self.area_mm2 * 1e-6 * density_kg_m3

    def mass_g(self, length_mm: float, density_kg_m3: float) -> float:
        """Mass of a length in g."""
        return self.mass_kg_per_m(density_kg_m3) * length_mm


def round_section(*, diameter_mm: float, wall_mm: float = 0.0) -> SectionProperties:
    """A round rod, or a round tube when it has a wall.

    Args:
        diameter_mm: outside diameter in mm.
        wall_mm: wall thickness in mm; 0 for a solid bar.

    Raises:
        ValueError: the diameter is not above zero or the walls meet.
    """
    _check(diameter_mm, diameter_mm, wall_mm, 0.0)
    bore_mm = diameter_mm - 2 * wall_mm if wall_mm else 0.0
    area = math.pi / 4 * (diameter_mm**2 - bore_mm**2)
    i = math.pi / 64 * (diameter_mm**4 - bore_mm**4)
    w = i / (diameter_mm / 2)
    return SectionProperties(area, i, i, w, w)


def rectangular_section(
    *, width_mm: float, height_mm: float, wall_mm: float = 0.0, corner_radius_mm: float = 0.0
) -> SectionProperties:
    """A rectangular or square bar, or a tube when it has a wall; inner corner radius: outer less wall, at least 0.

    Args:
        width_mm: outside along y in mm.
        height_mm: outside along z in mm.
        wall_mm: wall thickness in mm; 0 for a solid bar.
        corner_radius_mm: outside corner radius in mm.

    Raises:
        ValueError: a side is not above zero, the walls meet, or the corner radius is over half a side.
    """
    _check(width_mm, height_mm, wall_mm, corner_radius_mm)
    area, i_y, i_z = _rounded_rectangle(width_mm, height_mm, corner_radius_mm)
    if wall_mm:
        inner_radius_mm = max(0.0, corner_radius_mm - wall_mm)
        bore = _rounded_rectangle(width_mm - 2 * wall_mm, height_mm - 2 * wall_mm, inner_radius_mm)
        area, i_y, i_z = area - bore[0], i_y - bore[1], i_z - bore[2]
    return SectionProperties(area, i_y, i_z, i_y / (height_mm / 2), i_z / (width_mm / 2))


def boom_section(
    shape: Literal["round", "square", "rectangular"],
    *,
    width_mm: float,
    height_mm: float,
    wall_mm: float = 0.0,
    corner_radius_mm: float = 0.0,
) -> SectionProperties:
    """The section of a boom by its shape; a round boom takes its diameter from `width_mm`."""
    if shape == "round":
        return round_section(diameter_mm=width_mm, wall_mm=wall_mm)
    return rectangular_section(
        width_mm=width_mm, height_mm=height_mm, wall_mm=wall_mm, corner_radius_mm=corner_radius_mm
    )


def drilled_rectangular_section(
    *,
    width_mm: float,
    height_mm: float,
    wall_mm: float = 0.0,
    corner_radius_mm: float = 0.0,
    hole_mm: float,
    along: Literal["y", "z"],
) -> SectionProperties:
    """A rectangular bar or tube at a hole drilled through both walls on the centre line.

    Args:
        width_mm: outside along y in mm.
        height_mm: outside along z in mm.
        wall_mm: wall thickness in mm; 0 for a solid bar.
        corner_radius_mm: outside corner radius in mm.
        hole_mm: hole diameter in mm; it must lie in the flat of the wall.
        along: axis of the hole: y for rods, z for bolts from the top.

    Raises:
        ValueError: the section is impossible, or the hole reaches a corner.
    """
    full = rectangular_section(
        width_mm=width_mm, height_mm=height_mm, wall_mm=wall_mm, corner_radius_mm=corner_radius_mm
    )
    across, deep = (height_mm, width_mm) if along == "y" else (width_mm, height_mm)
    if hole_mm > across - 2 * max(corner_radius_mm, wall_mm):
        raise ValueError("the hole reaches into a corner of the section")
    bore = deep - 2 * wall_mm if wall_mm else 0.0
    area = hole_mm * (deep - bore)
    i_near = (deep - bore) * hole_mm**3 / 12
    i_far = hole_mm * (deep**3 - bore**3) / 12
    i_y, i_z = (i_near, i_far) if along == "y" else (i_far, i_near)
    return _less(full, (area, i_y, i_z), width_mm, height_mm)


def drilled_round_section(*, diameter_mm: float, wall_mm: float = 0.0, hole_mm: float) -> SectionProperties:
    """A round bar or tube at a hole along y, drilled through both walls on the centre line.

    Args:
        diameter_mm: outside diameter in mm.
        wall_mm: wall thickness in mm; 0 for a solid bar.
        hole_mm: hole diameter in mm, below the bore of a tube.

    Raises:
        ValueError: the section is impossible, or the hole is as wide as the bar or its bore.
    """
    full = round_section(diameter_mm=diameter_mm, wall_mm=wall_mm)
    bore_mm = diameter_mm - 2 * wall_mm if wall_mm else 0.0
    if hole_mm >= (bore_mm or diameter_mm):
        raise ValueError("the hole is as wide as the bar or its bore")
    outer, inner = _strip(diameter_mm / 2, hole_mm / 2), _strip(bore_mm / 2, hole_mm / 2)
    area, i_y, i_z = (o - i for o, i in zip(outer, inner, strict=True))
    return _less(full, (area, i_y, i_z), diameter_mm, diameter_mm)


def _less(
    full: SectionProperties, removed: tuple[float, float, float], width_mm: float, height_mm: float
) -> SectionProperties:
    area, i_y, i_z = removed
    rest_y, rest_z = full.i_about_y_mm4 - i_y, full.i_about_z_mm4 - i_z
    w_y, w_z = rest_y / (height_mm / 2), rest_z / (width_mm / 2)
    return SectionProperties(full.area_mm2 - area, rest_y, rest_z, w_y, w_z)


def _strip(radius: float, half: float) -> tuple[float, float, float]:
    """Area, ∫z² and ∫y² of the part of a disc with |z| up to `half`; zeros for no disc."""
    if radius == 0:
        return 0.0, 0.0, 0.0
    angle, chord = math.asin(half / radius), math.sqrt(radius**2 - half**2)
    area = 2 * (half * chord + radius**2 * angle)
    z2 = radius**4 / 4 * (2 * angle - math.sin(4 * angle) / 2)
    y2 = radius**4 / 6 * (3 * angle + 2 * math.sin(2 * angle) + math.sin(4 * angle) / 4)
    return area, z2, y2


def _rounded_rectangle(width: float, height: float, radius: float) -> tuple[float, float, float]:
    """Area, ∫z² and ∫y² of a solid rectangle with rounded corners."""
    area = width * height - (4 - math.pi) * radius**2
    return area, _second_moment(width, height, radius), _second_moment(height, width, radius)


def _second_moment(width: float, height: float, radius: float) -> float:
    """∫z² of a solid rounded rectangle, z along `height`: the sharp one less four corners."""
    square = radius**4 / 12 + radius**2 * ((height - radius) / 2) ** 2
    centroid = 4 * radius / (3 * math.pi)
    quarter = (math.pi / 16 - 4 / (9 * math.pi)) * radius**4
    quarter += math.pi / 4 * radius**2 * (height / 2 - radius + centroid) ** 2
    return width * height**3 / 12 - 4 * (square - quarter)


def _check(width_mm: float, height_mm: float, wall_mm: float, corner_radius_mm: float) -> None:
    smaller = min(width_mm, height_mm)
    if smaller <= 0 or not 0 <= wall_mm < smaller / 2:
        raise ValueError("a section needs sides above zero and a wall below half its smaller side")
    if not 0 <= corner_radius_mm <= smaller / 2:
        raise ValueError("the corner radius must not be over half the smaller side")
