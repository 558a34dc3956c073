"""A boom's surface laid flat: where on the paper a point of each wall lies.

Paper frame: x is the station, y = 0 the middle of the top wall, y grows towards the left wall (+y); printed face
outwards. Wrapped round a tube with flat walls the paper turns a corner on a strip (π/2)(r + t/2) wide, t its own
thickness; on a round tube it is a wrap as wide as the circumference at the paper's mid-thickness. On a solid bar with
flat faces each face has a strip of its own.
"""

import math
from dataclasses import dataclass

from fabgen.design.arranged import Hole, Wall
from fabgen.design.design import Boom
from fabgen.design.drawing import Point

APART_MM = 8.0
"""Between the strips of a solid bar, for the scissors."""

_STEPS = 72


@dataclass(frozen=True, slots=True)
class Face:
    """One flat wall on the paper.

    Attributes:
        wall: which wall.
        low_mm, high_mm: its flat on the paper.
        up: +1 where across grows up the paper, −1 where it grows down.
    """

    wall: Wall
    low_mm: float
    high_mm: float
    up: int

    @property
    def middle_mm(self) -> float:
        """The wall's centre line."""
        return (self.low_mm + self.high_mm) / 2


@dataclass(frozen=True, slots=True)
class Development:
    """The whole surface on the paper.

    Attributes:
        faces: flat walls from the top of the paper down; empty when round.
        radius_mm: of the paper's mid-thickness round a round boom; 0 with flat walls.
        low_mm, high_mm: the paper's edges.
        folds_mm: fold lines.
        cuts_mm: lines to cut along, between the strips of a solid bar.
    """

    faces: tuple[Face, ...]
    radius_mm: float
    low_mm: float
    high_mm: float
    folds_mm: tuple[float, ...] = ()
    cuts_mm: tuple[float, ...] = ()

    def centre_mm(self, hole: Hole) -> float:
        """Height on the paper of a hole's centre."""
        if self.radius_mm:
            angle_deg = (hole.angle_deg + 180.0) % 360.0 - 180.0
            return self.radius_mm * math.radians(angle_deg)
        face = next(face for face in self.faces if face.wall == hole.wall)
        return face.middle_mm + face.up * hole.across_mm

    def outline_mm(self, hole: Hole) -> tuple[Point, ...]:
        """The developed outline of a radial drill on a round boom; empty on a flat wall, where it is a circle."""
        if not self.radius_mm:
            return ()
        radius, middle = hole.diameter_mm / 2, self.centre_mm(hole)
        turns = [2 * math.pi * k / _STEPS for k in range(_STEPS)]
        return tuple(
            (
                hole.station_mm + radius * math.cos(turn),
                middle + self.radius_mm * math.asin(radius * math.sin(turn) / self.radius_mm),
            )
            for turn in turns
        )


def development(boom: Boom, paper_mm: float) -> Development:
    """Lay a boom's surface flat.

    Args:
        boom: any section.
        paper_mm: thickness of the paper.
    """
    if boom.section == "round":
        radius_mm = (boom.width_mm + paper_mm) / 2
        return Development((), radius_mm, -math.pi * radius_mm, math.pi * radius_mm)
    corner_mm = boom.corner_radius_mm
    strip_mm = math.pi / 2 * (corner_mm + paper_mm / 2) if boom.hollow else APART_MM
    top, side = boom.width_mm - 2 * corner_mm, boom.height_mm - 2 * corner_mm
    order: tuple[tuple[Wall, float, int], ...] = (("-y", side, 1), ("+z", top, 1), ("+y", side, -1), ("-z", top, -1))
    faces, low = [], -top / 2 - strip_mm - side
    for wall, flat, up in order:
        faces.append(Face(wall, low, low + flat, up))
        low += flat + strip_mm
    edges = tuple(edge for face in faces for edge in (face.low_mm, face.high_mm))
    low_mm, high_mm = faces[0].low_mm, faces[-1].high_mm
    if boom.hollow:
        return Development(tuple(reversed(faces)), 0.0, low_mm, high_mm + strip_mm, folds_mm=edges[1:])
    return Development(tuple(reversed(faces)), 0.0, low_mm, high_mm, cuts_mm=edges)
