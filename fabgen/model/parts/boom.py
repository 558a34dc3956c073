"""Boom piece with its holes, each opened in its own wall.

Frame: origin at the centre of the piece's rear end face, local x forward, y left, z up; so local x of the piece that
carries the datum face is the station.

Two ways lead to the same solid. Where every hole of a flat-walled tube lies inside the flats of its wall and clear of
the others, the walls are drawn with their openings and share the edges (linear in the number of holes, no
intersections to compute). Everything else, such as round tube, solid bar, or a hole that reaches into a corner, is
one cut with all drills at once.
"""

import itertools
import math
from collections.abc import Iterable, Sequence
from typing import Literal, NamedTuple

from fabgen.errors import ProgramError
from fabgen.model.kernel import cq, cut
from fabgen.model.openings import Opening, with_openings

SOURCE = "made"

_CLEAR_MM = 1e-3
"""Nearer than this to an edge or to its neighbour, a hole is left to the general cut."""


class _Hole(NamedTuple):
    station_mm: float
    angle_deg: float
    across_mm: float
    diameter_mm: float

    @property
    def axis(self) -> tuple[float, float, float]:
        """Outward unit vector, exact for the flat walls."""
        angle = math.radians(self.angle_deg)
        return (0.0, round(math.sin(angle), 12), round(math.cos(angle), 12))

    def at(self, distance_mm: float) -> tuple[float, float, float]:
        """The point of the hole's axis at a distance from the boom's middle, outward."""
        _, y, z = self.axis
        # The distance across grows to +z on the ±y walls and to +y on the ±z walls.
        return (self.station_mm, y * distance_mm + abs(z) * self.across_mm, z * distance_mm + abs(y) * self.across_mm)


def boom(
    *,
    section: Literal["round", "square", "rectangular"] = "square",
    width_mm: float = 20.0,
    height_mm: float = 20.0,
    wall_mm: float = 1.5,
    corner_radius_mm: float = 1.0,
    length_mm: float = 260.0,
    holes: Sequence[tuple[float, float, float, float]] = ((40.0, 90.0, 0.0, 8.0), (40.0, 270.0, 0.0, 8.0)),
) -> cq.Workplane:
    """One sawn and drilled piece of boom.

    Args:
        section: outside shape.
        width_mm: outside along y; the diameter when round.
        height_mm: outside along z; the diameter when round.
        wall_mm: wall thickness; 0 for a solid bar.
        corner_radius_mm: outside corner radius; the inside one is smaller by the wall, at least 0.
        length_mm: along x.
        holes: (station in mm from the rear end face, direction of the outward axis in degrees from +z towards +y,
            distance across from the wall's centre line in mm, diameter in mm). A row is a drill that comes from outside
            and stops at the boom's middle: it opens one wall of a tube and is a blind hole in a solid bar. Two opposite
            rows are one drill through everything.

    Returns:
        One solid.

    Raises:
        ProgramError: the holes cut the piece in two or off, or the section is impossible.
    """
    inside_mm = min(width_mm, height_mm) - 2 * wall_mm
    if inside_mm <= 0 or wall_mm < 0 or 2 * corner_radius_mm >= min(width_mm, height_mm):
        raise ProgramError(f"a boom of {width_mm} × {height_mm} mm, wall {wall_mm} mm, corner {corner_radius_mm} mm")
    rows = sorted({_Hole(s, a % 360, c, d) for s, a, c, d in holes})
    bar = _bar(section == "round", width_mm, height_mm, wall_mm, corner_radius_mm, length_mm)
    flat = section != "round" and wall_mm > 0 and _in_flats(rows, width_mm, height_mm, wall_mm, corner_radius_mm)
    if not rows:
        solid = bar
    elif flat and _apart(rows, length_mm):
        solid = with_openings(bar, [_opening(row, width_mm, height_mm, wall_mm) for row in rows])
    else:
        solid = _cut(bar, rows, max(width_mm, height_mm))
    return cq.Workplane(obj=solid)


def _bar(round_: bool, width: float, height: float, wall: float, corner: float, length: float) -> cq.Solid:
    """The bar or tube before drilling."""

    def outline(inset: float) -> cq.Wire:
        if round_:
            return cq.Wire.makeCircle(width / 2 - inset, cq.Vector(0, 0, 0), cq.Vector(1, 0, 0))
        half_y, half_z = width / 2 - inset, height / 2 - inset
        corners = [cq.Vector(0, y, z) for y, z in ((-half_y, -half_z), (half_y, -half_z), (half_y, half_z))]
        wire = cq.Wire.makePolygon([*corners, cq.Vector(0, -half_y, half_z)], close=True)
        radius = corner - inset
        return wire.fillet2D(radius, wire.Vertices()) if radius > 0 else wire

    inner = [outline(wall)] if wall > 0 else []
    return cq.Solid.extrudeLinear(outline(0.0), inner, cq.Vector(length, 0, 0))


def _in_flats(rows: Iterable[_Hole], width: float, height: float, wall: float, corner: float) -> bool:
    """Whether each hole keeps inside the flats of its wall, outside and inside."""
    inset = max(corner, wall)
    return all(
        row.angle_deg % 90 == 0
        and abs(row.across_mm) + row.diameter_mm / 2 + _CLEAR_MM
        <= (height if row.angle_deg % 180 else width) / 2 - inset
        for row in rows
    )


def _apart(rows: Sequence[_Hole], length: float) -> bool:
    """Whether the holes of each wall are clear of each other and of the ends; `rows` are in order of station."""
    largest = max(row.diameter_mm for row in rows)
    for _, wall in itertools.groupby(sorted(rows, key=lambda row: row.angle_deg), lambda row: row.angle_deg):
        holes = list(wall)
        for i, row in enumerate(holes):
            radius = row.diameter_mm / 2 + _CLEAR_MM
            if not radius <= row.station_mm <= length - radius:
                return False
            for other in itertools.islice(holes, i + 1, None):
                if other.station_mm - row.station_mm > radius + largest / 2:
                    break
                between = math.hypot(row.station_mm - other.station_mm, row.across_mm - other.across_mm)
                if between <= radius + other.diameter_mm / 2:
                    return False
    return True


def _opening(row: _Hole, width: float, height: float, wall: float) -> Opening:
    """The opening of one hole in a flat wall."""
    outside = (width if row.angle_deg % 180 else height) / 2
    return Opening(row.at(outside), row.at(outside - wall), row.axis, row.diameter_mm)


def _cut(bar: cq.Solid, rows: Iterable[_Hole], reach: float) -> cq.Solid:
    """The bar after one cut with all drills; opposite rows become one drill.

    Args:
        bar: before drilling.
        rows: the holes.
        reach: any length that leads from the middle to outside.
    """
    left = list(rows)
    drills = []
    while left:
        row = left.pop()
        opposite = row._replace(angle_deg=(row.angle_deg + 180) % 360)
        through = opposite in left
        if through:
            left.remove(opposite)
        start = row.at(-reach if through else 0.0)
        length = 2 * reach if through else reach
        drills.append(cq.Solid.makeCylinder(row.diameter_mm / 2, length, cq.Vector(*start), cq.Vector(*row.axis)))
    solids = cut(bar, *drills).Solids()
    if len(solids) != 1:
        raise ProgramError(f"the holes leave {len(solids)} pieces of one boom")
    return solids[0]
