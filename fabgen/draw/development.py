"""A boom's surface laid flat: where on the paper a point of each wall lies.

Paper frame: x is the station, y = 0 the middle of the top wall, y grows towards the left wall (+y); printed face
outwards. Wrapped round a tube with flat walls the paper turns a corner on a strip (π/2)(r + t/2) wide, t its own
thickness; on a round boom it is a wrap as wide as the circumference at the paper's mid-thickness. Both close at a
seam: the paper's upper edge goes on as a flap under its lower edge, which then lies on the seam line. On a solid bar
with flat faces each face has a strip of its own.
"""

import math

from fabgen.design.arranged import Hole, Wall
from fabgen.design.design import Boom
from fabgen.design.drawing import Point
from fabgen.frozen import frozen

APART_MM = 4.0
"""Between the strips of a solid bar, for the scissors."""
FLAP_MM = 8.0
"""Beyond the seam, for the tape."""

_STEPS = 180
"""Corners of a developed outline: the chord of a 10 mm hole leaves its curve by 0.0008 mm."""


@frozen
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


@frozen
class Development:
    """The whole surface on the paper.

    Attributes:
        faces: walls from the top of the paper down; of a round boom its four quarters, the bottom one in two halves.
        radius_mm: of the paper's mid-thickness round a round boom; 0 with flat walls.
        low_mm, high_mm: the paper's edges; the flap not counted.
        folds_mm: fold lines.
        flap_mm: how far the paper goes on above its upper edge; 0 where there is no seam.
    """

    faces: tuple[Face, ...]
    radius_mm: float
    low_mm: float
    high_mm: float
    folds_mm: tuple[float, ...] = ()
    flap_mm: float = 0.0

    @property
    def centre_lines_mm(self) -> tuple[tuple[Wall, float], ...]:
        """Each wall with its centre line; on a round boom the bottom's is the seam and stands at both edges."""
        if not self.radius_mm:
            return tuple((face.wall, face.middle_mm) for face in self.faces)
        quarter_mm = self.high_mm / 2
        return (("-z", self.high_mm), ("+y", quarter_mm), ("+z", 0.0), ("-y", -quarter_mm), ("-z", self.low_mm))

    def centre_mm(self, hole: Hole) -> float:
        """Height on the paper of a hole's centre."""
        if self.radius_mm:
            return self._height_mm(hole, 0.0)
        face = next(face for face in self.faces if face.wall == hole.wall)
        return face.middle_mm + face.up * hole.across_mm

    def centres_mm(self, hole: Hole) -> tuple[float, ...]:
        """Heights at which a hole is drawn: twice when it reaches across the seam of a round boom."""
        centre_mm, round_mm = self.centre_mm(hole), self.high_mm - self.low_mm
        if not self.radius_mm:
            return (centre_mm,)
        return tuple(
            place
            for place in (centre_mm, centre_mm - round_mm, centre_mm + round_mm)
            if place + hole.diameter_mm > self.low_mm and place - hole.diameter_mm < self.high_mm
        )

    def outline_mm(self, hole: Hole) -> tuple[Point, ...]:
        """The developed outline of a drill on a round boom; empty on a flat wall, where it is a circle.

        Every corner lies on the curve in which the drill's cylinder meets the paper's mid-thickness.
        """
        if not self.radius_mm:
            return ()
        turns = [2 * math.pi * k / _STEPS for k in range(_STEPS)]
        radius = hole.diameter_mm / 2
        return tuple(
            (hole.station_mm + radius * math.cos(turn), self._height_mm(hole, radius * math.sin(turn)))
            for turn in turns
        )

    def _height_mm(self, hole: Hole, aside_mm: float) -> float:
        """Height of the point that lies a distance up the paper aside of a hole's axis, square to that axis."""
        angle_deg = 180.0 - (180.0 - hole.angle_deg) % 360.0
        up = 1 if -135.0 < angle_deg <= 45.0 else -1
        share = (up * hole.across_mm + aside_mm) / self.radius_mm
        turned = math.asin(min(1.0, max(-1.0, share)))
        return self.radius_mm * (math.radians(angle_deg) + turned)


def development(boom: Boom, paper_mm: float) -> Development:
    """Lay a boom's surface flat.

    Args:
        boom: any section.
        paper_mm: thickness of the paper.
    """
    if boom.section == "round":
        return _wrap((boom.width_mm + paper_mm) / 2)
    corner_mm = boom.corner_radius_mm
    strip_mm = math.pi / 2 * (corner_mm + paper_mm / 2) if boom.hollow else APART_MM
    top, side = boom.width_mm - 2 * corner_mm, boom.height_mm - 2 * corner_mm
    order: tuple[tuple[Wall, float, int], ...] = (("-y", side, 1), ("+z", top, 1), ("+y", side, -1), ("-z", top, -1))
    faces, low = [], -top / 2 - strip_mm - side
    for wall, flat, up in order:
        faces.append(Face(wall, low, low + flat, up))
        low += flat + strip_mm
    low_mm, high_mm, walls = faces[0].low_mm, faces[-1].high_mm, tuple(reversed(faces))
    if not boom.hollow:
        return Development(walls, 0.0, low_mm, high_mm)
    folds_mm = tuple(edge for face in faces for edge in (face.low_mm, face.high_mm))[1:]
    return Development(walls, 0.0, low_mm, high_mm + strip_mm, folds_mm, FLAP_MM)


def _wrap(radius_mm: float) -> Development:
    """A round boom: four quarters, the seam along the bottom."""
    half, eighth = math.pi * radius_mm, math.pi * radius_mm / 4
    faces = (
        Face("-z", 3 * eighth, half, -1),
        Face("+y", eighth, 3 * eighth, -1),
        Face("+z", -eighth, eighth, 1),
        Face("-y", -3 * eighth, -eighth, 1),
        Face("-z", -half, -3 * eighth, -1),
    )
    return Development(faces, radius_mm, -half, half, flap_mm=FLAP_MM)
