"""Triangle meshes with mirror planes, and the edge functions on them.

Frame: x along the boom, y along the rod, z across both; the origin is the crossing of the boom's axis and the
plane of the rod. The mesh fills x ≥ 0, y ≥ 0 and, where z is a mirror too, z ≥ 0. x = 0 and z = 0 are magnetic walls,
y = 0 is an electric wall. Unit: wavelengths.

Source: S. M. Rao, D. R. Wilton, A. W. Glisson, Electromagnetic scattering by surfaces of arbitrary shape,
IEEE Trans. Antennas and Propagation 30 (1982) 409.
"""

from collections.abc import Iterable
from dataclasses import dataclass

import numpy as np

from fabgen.physics.boom_integrals import Floats, Ints


@dataclass(frozen=True, slots=True, eq=False)
class Mesh:
    """Welded triangles and their edge functions.

    Attributes:
        corners: (T, 3 corners, 3) coordinates in wavelengths.
        function: (T, 3) number of the edge function opposite each corner, -1 where there is none.
        weight: (T, 3) edge length, negative on the triangle the current flows into; 0 where there is none.
        count: number of edge functions.
        mirror_z: True if z = 0 is a mirror.
    """

    corners: Floats
    function: Ints
    weight: Floats
    count: int
    mirror_z: bool

    @property
    def images(self) -> tuple[tuple[tuple[int, int, int], int], ...]:
        """Mirror factors of the three coordinates and the sign of the mirrored current, the original first."""
        z_factors = (1, -1) if self.mirror_z else (1,)
        return tuple(((mx, my, mz), my) for my in (1, -1) for mx in (1, -1) for mz in z_factors)


def grid(rows: Floats) -> Floats:
    """Triangles of a grid of quadrilaterals, each cut along its shorter diagonal.

    Args:
        rows: (I, J, 3) nodes.

    Returns:
        (2 (I-1)(J-1), 3, 3) corners; degenerate ones are dropped when the mesh is welded.
    """
    a, b, c, d = rows[:-1, :-1], rows[1:, :-1], rows[1:, 1:], rows[:-1, 1:]
    shorter = np.linalg.norm(a - c, axis=-1) <= np.linalg.norm(b - d, axis=-1) * (1 + 1e-9)
    first = np.where(shorter[..., None, None], np.stack([a, b, c], -2), np.stack([a, b, d], -2))
    second = np.where(shorter[..., None, None], np.stack([a, c, d], -2), np.stack([b, c, d], -2))
    return np.concatenate([first.reshape(-1, 3, 3), second.reshape(-1, 3, 3)])


def weld(pieces: Iterable[Floats], *, mirror_z: bool) -> Mesh:
    """Join pieces of surface at equal corners and number the edge functions.

    An edge of two triangles carries a full function; an edge in the plane y = 0 carries half of one, its other half
    being the mirror image; any other free edge carries none.

    Args:
        pieces: arrays of (T, 3, 3) corners in wavelengths.
        mirror_z: True if z = 0 is a mirror plane.

    Returns:
        The mesh.

    Raises:
        ValueError: more than two triangles at one edge.
    """
    corners = np.concatenate(list(pieces))
    keys = np.round(corners.reshape(-1, 3) / 1e-9).astype(np.int64)
    _, index = np.unique(keys, axis=0, return_inverse=True)
    nodes = index.reshape(-1, 3)
    whole = (nodes[:, 0] != nodes[:, 1]) & (nodes[:, 1] != nodes[:, 2]) & (nodes[:, 2] != nodes[:, 0])
    corners, nodes = corners[whole], nodes[whole]
    sides: dict[tuple[int, int], list[tuple[int, int]]] = {}
    for t, triangle in enumerate(nodes.tolist()):
        for corner in range(3):
            start, end = triangle[(corner + 1) % 3], triangle[(corner + 2) % 3]
            sides.setdefault((min(start, end), max(start, end)), []).append((t, corner))
    function = np.full(nodes.shape, -1, dtype=np.int64)
    weight = np.zeros(nodes.shape)
    count = 0
    for side in sorted(sides):
        owners = sides[side]
        if len(owners) > 2:
            raise ValueError("more than two triangles meet at one edge")
        t, corner = owners[0]
        start, end = corners[t, (corner + 1) % 3], corners[t, (corner + 2) % 3]
        on_wall = abs(start[1]) < 1e-9 and abs(end[1]) < 1e-9
        if len(owners) == 1 and not on_wall:
            continue
        for sign, (owner, opposite) in zip((1, -1), owners, strict=False):
            function[owner, opposite] = count
            weight[owner, opposite] = sign * np.linalg.norm(end - start)
        count += 1
    return Mesh(corners, function, weight, count, mirror_z)
