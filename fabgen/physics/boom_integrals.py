"""Integrals of the surface integral equation over flat triangles: quadrature rules and the static potential.

Source: D. R. Wilton, S. M. Rao, A. W. Glisson, D. H. Schaubert, O. M. Al-Bundak, C. M. Butler, Potential integrals
for uniform and linear source distributions on polygonal and polyhedral domains, IEEE Trans. Antennas and
Propagation 32 (1984) 276; quadrature: D. A. Dunavant, Int. J. Numerical Methods in Engineering 21 (1985) 1129.
"""

import numpy as np
from numpy.typing import NDArray

Floats = NDArray[np.float64]
Ints = NDArray[np.int64]

THREE_POINTS: tuple[Floats, Floats] = (
    np.array([[2 / 3, 1 / 6, 1 / 6], [1 / 6, 2 / 3, 1 / 6], [1 / 6, 1 / 6, 2 / 3]]),
    np.full(3, 1 / 3),
)
"""Barycentric points and weights of degree 2; weights add up to 1."""

_A, _B = 0.059715871789770, 0.797426985353087
_C, _D = 0.470142064105115, 0.101286507323456
SEVEN_POINTS: tuple[Floats, Floats] = (
    np.array(
        [[1 / 3, 1 / 3, 1 / 3], [_A, _C, _C], [_C, _A, _C], [_C, _C, _A], [_B, _D, _D], [_D, _B, _D], [_D, _D, _B]]
    ),
    np.array([0.225] + [0.132394152788506] * 3 + [0.125939180544827] * 3),
)
"""Barycentric points and weights of degree 5; weights add up to 1."""


def points_in(corners: Floats, barycentric: Floats) -> Floats:
    """Quadrature points of triangles.

    Args:
        corners: (..., 3 corners, 3) coordinates.
        barycentric: (Q, 3).

    Returns:
        (..., Q, 3) coordinates.
    """
    return np.asarray(barycentric @ corners)


def static_potentials(points: Floats, corners: Floats) -> tuple[Floats, Floats]:
    """Potential integrals of 1/R and r'/R over flat triangles, in closed form.

    Args:
        points: (K, Q, 3) field points, Q for each of K triangles.
        corners: (K, 3 corners, 3) the triangles.

    Returns:
        (K, Q) integral of 1/R and (K, Q, 3) integral of r'/R over each triangle.

    Source: Wilton et al. 1984, equations for uniform and linear sources.
    """
    first = corners[:, 1] - corners[:, 0]
    normal = np.cross(first, corners[:, 2] - corners[:, 0])
    normal /= np.linalg.norm(normal, axis=1)[:, None]
    to_point = points - corners[:, None, 0]
    height = np.einsum("kqc,kc->kq", to_point, normal)
    away = np.abs(height)
    uniform = np.zeros(height.shape)
    linear = (points - height[..., None] * normal[:, None]) * 0.0
    for corner in range(3):
        start, end = corners[:, corner], corners[:, (corner + 1) % 3]
        length = np.linalg.norm(end - start, axis=1)
        along = (end - start) / length[:, None]
        outward = np.cross(along, normal)
        from_point = start[:, None] - points
        low = np.einsum("kqc,kc->kq", from_point, along)
        high = low + length[:, None]
        distance = np.einsum("kqc,kc->kq", from_point, outward)
        squared = np.maximum(distance**2 + height**2, (1e-12 * length[:, None]) ** 2)
        nearest = np.sqrt(squared)
        r_low, r_high = np.sqrt(squared + low**2), np.sqrt(squared + high**2)
        logarithm = np.arcsinh(high / nearest) - np.arcsinh(low / nearest)
        angle = np.arctan(distance * high / (squared + away * r_high))
        angle -= np.arctan(distance * low / (squared + away * r_low))
        uniform += distance * logarithm - away * angle
        edge_term = 0.5 * (squared * logarithm + high * r_high - low * r_low)
        linear += edge_term[..., None] * outward[:, None]
    linear += (points - height[..., None] * normal[:, None]) * uniform[..., None]
    return uniform, linear
