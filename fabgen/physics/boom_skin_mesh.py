"""Surface meshes of a boom: unrolled, a polar patch round the rod's hole, strips beyond it, folded back.

Unrolled coordinates: x along the boom, u round it from the side line (z = 0, +y) up to the top line (y = 0, +z)
and, negative, down to the bottom line. Unit: wavelengths.
"""

import math

import numpy as np

from fabgen.frozen import frozen
from fabgen.physics.boom_integrals import Floats
from fabgen.physics.boom_mesh import grid
from fabgen.physics.boom_rod_mesh import circumradius, graded


@frozen
class RoundSkin:
    """A round boom, its nodes on the circle round the polygon of equal conformal radius.

    Attributes:
        diameter_wl: boom diameter.
        quarter_cells: cells per quarter circumference.
    """

    diameter_wl: float
    quarter_cells: int

    @property
    def radius_wl(self) -> float:
        """Radius on which the nodes lie."""
        return circumradius(self.diameter_wl / 2, 4 * self.quarter_cells)

    @property
    def quarter_wl(self) -> float:
        """Unrolled length from side line to top line."""
        return self.radius_wl * math.pi / 2

    @property
    def fold_wl(self) -> float:
        """Unrolled length from the side line to where the patch must end."""
        return self.quarter_wl

    def unroll(self, z: Floats) -> Floats:
        """Unrolled coordinate of points on the +y side."""
        return np.asarray(self.radius_wl * np.arcsin(z / self.radius_wl))

    def place(self, x: Floats, u: Floats) -> Floats:
        """Nodes in space, (..., 3)."""
        angle = u / self.radius_wl
        y, z = self.radius_wl * np.cos(angle), self.radius_wl * np.sin(angle)
        y = np.where(np.abs(np.abs(u) - self.quarter_wl) < 1e-9, 0.0, y)
        return np.stack([x, y, z], axis=-1)


@frozen
class FlatSkin:
    """A square or rectangular boom with sharp corners.

    Attributes:
        width_wl: outside along the rod.
        height_wl: outside across the rod.
    """

    width_wl: float
    height_wl: float

    @property
    def quarter_wl(self) -> float:
        """Unrolled length from side line to top line."""
        return (self.width_wl + self.height_wl) / 2

    @property
    def fold_wl(self) -> float:
        """Unrolled length from the side line to where the patch must end: the corner."""
        return self.height_wl / 2

    def unroll(self, z: Floats) -> Floats:
        """Unrolled coordinate of points on the +y side."""
        return z

    def place(self, x: Floats, u: Floats) -> Floats:
        """Nodes in space, (..., 3)."""
        beyond = np.maximum(np.abs(u) - self.fold_wl, 0.0)
        y = np.maximum(self.width_wl / 2 - beyond, 0.0)
        y = np.where(np.abs(np.abs(u) - self.quarter_wl) < 1e-9, 0.0, y)
        z = np.sign(u) * np.minimum(np.abs(u), self.fold_wl)
        return np.stack([x, y, z], axis=-1)


Skin = RoundSkin | FlatSkin


@frozen
class SkinCells:
    """How finely a skin is divided.

    Attributes:
        up: cells of the patch from the side line to the fold.
        along: cells of the patch from the rod's plane along the boom; up + along is the hole's quarter polygon.
        over: cells from the fold to the top line, none on a round boom.
        growth: ratio of neighbouring steps.
        largest_wl: largest step along the boom.
    """

    up: int
    along: int
    over: int
    growth: float
    largest_wl: float


def hole_on(skin: Skin, section: Floats) -> Floats:
    """Points of a skin where a cylinder along y with the given section meets it.

    Args:
        skin: the boom's surface.
        section: (K, 2) x and z of the cylinder's corners.

    Returns:
        (K, 3) points on the +y side.
    """
    return skin.place(section[:, 0], skin.unroll(section[:, 1]))


def skin_with_hole(skin: Skin, section: Floats, length_wl: float, cells: SkinCells) -> list[Floats]:
    """One eighth of a boom's surface with a hole.

    Args:
        skin: the surface.
        section: (up + along + 1, 2) x and z of the hole's quarter polygon, from +x to +z.
        length_wl: boom length from the rod's plane to the open end.
        cells: fineness.

    Returns:
        Pieces of surface.
    """
    inner = np.stack([section[:, 0], skin.unroll(section[:, 1])], axis=1)
    hole = float(inner[0, 0])
    reach = max(skin.fold_wl * cells.along / cells.up, 1.5 * hole)
    reach = min(reach, length_wl / 2)
    side = _towards_fold(skin, cells.up) * skin.fold_wl
    top = np.linspace(reach, 0.0, cells.along + 1)
    outer = np.concatenate(
        [np.stack([np.full(side.shape, reach), side], 1), np.stack([top, np.full(top.shape, skin.fold_wl)], 1)[1:]]
    )
    segment = hole * math.pi / 2 / (cells.up + cells.along)
    rings = graded(reach - hole, segment, reach / cells.along, cells.growth, reach)
    patch = inner[:, None] + (outer - inner)[:, None] * rings[None, :, None]
    step = max(reach / cells.along, side[1])
    beyond = reach + (length_wl - reach) * graded(length_wl - reach, step, step, cells.growth, cells.largest_wl)
    pieces = [grid(skin.place(patch[..., 0], patch[..., 1])), _strip(skin, beyond, side)]
    if cells.over:
        over = skin.fold_wl + (skin.quarter_wl - skin.fold_wl) * (1 - _towards_fold(skin, cells.over)[::-1])
        pieces.append(_strip(skin, np.concatenate([top[::-1], beyond[1:]]), over))
    return pieces


def whole_skin(skin: Skin, along: Floats, around: Floats) -> list[Floats]:
    """A quarter of a boom's surface without a hole.

    Args:
        skin: the surface.
        along: positions along the boom.
        around: unrolled positions, bottom line to top line.

    Returns:
        Pieces of surface.
    """
    return [_strip(skin, along, around)]


def hole_wall(inner: Floats, outer: Floats, steps: Floats) -> Floats:
    """The wall of a hole between two curves.

    Args:
        inner: (K, 3) curve nearer to the boom's axis.
        outer: (K, 3) curve on the outside.
        steps: positions from 0 to 1 between them.

    Returns:
        A piece of surface.
    """
    return grid(inner[:, None] + (outer - inner)[:, None] * steps[None, :, None])


def _towards_fold(skin: Skin, cells: int) -> Floats:
    """Positions from 0 to 1; towards the corner of a flat skin they crowd."""
    even = np.linspace(0.0, 1.0, cells + 1)
    return even if isinstance(skin, RoundSkin) else np.sin(np.pi / 2 * even)


def _strip(skin: Skin, along: Floats, around: Floats) -> Floats:
    x, u = np.meshgrid(along, around, indexing="ij")
    return grid(skin.place(x, u))
