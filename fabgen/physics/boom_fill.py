"""Impedance matrix of the electric field integral equation with edge functions and mirror images.

The kernel is split: 1/R between near triangles in closed form, everything else by quadrature.

Source: S. M. Rao, D. R. Wilton, A. W. Glisson, IEEE Trans. Antennas and Propagation 30 (1982) 409;
Wilton et al., the same 32 (1984) 276.
"""

import numpy as np
from numpy.typing import NDArray
from scipy import sparse

from fabgen.physics.boom_integrals import (
    SEVEN_POINTS,
    THREE_POINTS,
    Floats,
    Ints,
    points_in,
    static_potentials,
)
from fabgen.physics.boom_mesh import Mesh
from fabgen.physics.boom_mount import ETA_OHM

Complexes = NDArray[np.complex128]

WAVE_NUMBER = 2 * np.pi
_BLOCK_TRIANGLES = 48
_NEAR_FACTOR = 1.5
_NEAR_CHUNK = 20_000


def impedance_matrix(mesh: Mesh) -> Complexes:
    """Impedance matrix of a mesh and its mirror images at one wavelength per unit length.

    Args:
        mesh: perfectly conducting surface; lengths in wavelengths.

    Returns:
        (N, N) symmetric matrix in ohm, tested over the meshed part only.
    """
    area = triangle_areas(mesh)
    near = [_near_pairs(mesh, image) for image, _ in mesh.images]
    matrix = _quadrature_part(mesh, area, near)
    matrix += 0.5 * _static_part(mesh, area, near)
    matrix = matrix + matrix.T
    return 1j * WAVE_NUMBER * ETA_OHM / (4 * np.pi) * matrix


def triangle_areas(mesh: Mesh) -> Floats:
    """Areas of a mesh's triangles.

    Args:
        mesh: the mesh.

    Returns:
        (T,) areas in square wavelengths.
    """
    c = mesh.corners
    return np.asarray(0.5 * np.linalg.norm(np.cross(c[:, 1] - c[:, 0], c[:, 2] - c[:, 0]), axis=1))


def uniform_field(mesh: Mesh) -> Floats:
    """Excitation by a uniform field of 1 V per wavelength along the rod.

    Args:
        mesh: the mesh.

    Returns:
        (N,) voltages.
    """
    from_corner = mesh.corners.mean(axis=1)[:, None, 1] - mesh.corners[..., 1]
    return _gather(mesh, 0.5 * mesh.weight * from_corner)


def centre_current(mesh: Mesh, current: Complexes) -> complex:
    """Current through the plane y = 0 inside the meshed part.

    Args:
        mesh: the mesh.
        current: (N,) edge currents.

    Returns:
        The sum over the edges that lie in the plane.
    """
    lone = np.bincount(mesh.function[mesh.function >= 0], minlength=mesh.count) == 1
    lengths = np.zeros(mesh.count)
    used = mesh.function >= 0
    lengths[mesh.function[used]] = np.abs(mesh.weight[used])
    return complex(np.sum(current[lone] * lengths[lone]))


def _gather(mesh: Mesh, local: Floats) -> Floats:
    used = mesh.function >= 0
    total = np.bincount(mesh.function[used], weights=local[used], minlength=mesh.count)
    return np.asarray(total, dtype=np.float64)


def _near_pairs(mesh: Mesh, image: tuple[int, int, int]) -> sparse.csr_matrix:
    centre = mesh.corners.mean(axis=1)
    radius = np.linalg.norm(mesh.corners - centre[:, None], axis=2).max(axis=1)
    away = np.linalg.norm(centre[:, None] - (centre * np.array(image))[None], axis=2)
    return sparse.csr_matrix(away < _NEAR_FACTOR * (radius[:, None] + radius[None]))


def _point_operators(mesh: Mesh, area: Floats) -> tuple[Floats, list[sparse.csr_matrix], sparse.csr_matrix]:
    """Quadrature points, and the maps from edge currents to weighted current and charge at them."""
    barycentric, weights = THREE_POINTS
    points = points_in(mesh.corners, barycentric)
    per_triangle = len(weights)
    t, corner = np.nonzero(mesh.function >= 0)
    column = np.repeat(mesh.function[t, corner], per_triangle)
    row = (t[:, None] * per_triangle + np.arange(per_triangle)).ravel()
    shape = (len(area) * per_triangle, mesh.count)
    scale = mesh.weight[t, corner][:, None] * weights
    vectors = points[t] - mesh.corners[t, corner][:, None]
    currents = [
        sparse.csr_matrix(((0.5 * scale * vectors[..., axis]).ravel(), (row, column)), shape=shape) for axis in range(3)
    ]
    charges = sparse.csr_matrix((scale.ravel(), (row, column)), shape=shape)
    return points.reshape(-1, 3), currents, charges


def _quadrature_part(mesh: Mesh, area: Floats, near: list[sparse.csr_matrix]) -> Complexes:
    """Half of the matrix without near static parts: adding its transpose makes it whole."""
    points, currents, charges = _point_operators(mesh, area)
    per_triangle = len(points) // len(area)
    result = np.zeros((mesh.count, mesh.count), dtype=np.complex128)
    for start in range(0, len(area), _BLOCK_TRIANGLES):
        field = slice(start, min(start + _BLOCK_TRIANGLES, len(area)))
        rows = slice(field.start * per_triangle, field.stop * per_triangle)
        onward = slice(rows.start, None)
        kernels = np.zeros((4, rows.stop - rows.start, len(points) - rows.start), dtype=np.complex128)
        for (image, sign), pairs in zip(mesh.images, near, strict=True):
            static = np.repeat(~pairs[field, field.start :].toarray(), per_triangle, axis=1)
            source = points[onward] * np.array(image)
            kernel = _kernel(points[rows], source, np.repeat(static, per_triangle, axis=0))
            for slot, factor in enumerate((*image, 1)):
                if sign * factor > 0:
                    kernels[slot] += kernel
                else:
                    kernels[slot] -= kernel
        kernels[:, :, : rows.stop - rows.start] *= 0.5
        for axis in range(3):
            result += currents[axis][rows].T @ (currents[axis][onward].T @ kernels[axis].T).T
        result -= charges[rows].T @ (charges[onward].T @ kernels[3].T).T / WAVE_NUMBER**2
    return result


def _kernel(field: Floats, source: Floats, with_static: NDArray[np.bool_]) -> Complexes:
    """exp(-jkR)/R, its static part only where asked for."""
    r = np.zeros(with_static.shape)
    for axis in range(3):
        r += (field[:, None, axis] - source[None, :, axis]) ** 2
    np.sqrt(r, out=r)
    np.maximum(r, 1e-12, out=r)
    half_sine, half_cosine = np.sin(0.5 * WAVE_NUMBER * r), np.cos(0.5 * WAVE_NUMBER * r)
    kernel = np.empty(r.shape, dtype=np.complex128)
    kernel.real = (with_static - 2 * half_sine**2) / r
    kernel.imag = -2 * half_sine * half_cosine / r
    return kernel


def _static_part(mesh: Mesh, area: Floats, near: list[sparse.csr_matrix]) -> Floats:
    result = np.zeros(mesh.count * mesh.count)
    for (image, sign), pairs in zip(mesh.images, near, strict=True):
        field, source = pairs.nonzero()
        for start in range(0, len(field), _NEAR_CHUNK):
            part = slice(start, start + _NEAR_CHUNK)
            _add_static(mesh, area, (field[part], source[part]), (np.array(image), sign), result)
    return result.reshape(mesh.count, mesh.count)


def _add_static(mesh: Mesh, area: Floats, pairs: tuple[Ints, Ints], mirror: tuple[Ints, int], result: Floats) -> None:
    barycentric, weights = SEVEN_POINTS
    field, source = pairs
    image, sign = mirror
    field_corners, source_corners = mesh.corners[field], mesh.corners[source] * image
    points = points_in(field_corners, barycentric)
    uniform, linear = static_potentials(points, source_corners)
    scale = sign / area[source]
    uniform, linear = uniform * scale[:, None] * weights, linear * (scale[:, None] * weights)[..., None]
    charge = uniform.sum(axis=1)[:, None, None] / WAVE_NUMBER**2
    arms = points[:, :, None] - field_corners[:, None]
    flows = linear[:, :, None] - uniform[..., None, None] * source_corners[:, None]
    local = 0.25 * np.einsum("kqac,kqbc->kab", arms, flows, optimize=True) - charge
    local *= mesh.weight[field][:, :, None] * mesh.weight[source][:, None, :]
    used = (mesh.function[field] >= 0)[:, :, None] & (mesh.function[source] >= 0)[:, None, :]
    place = mesh.function[field][:, :, None] * mesh.count + mesh.function[source][:, None, :]
    result += np.bincount(place[used], weights=local[used], minlength=len(result))
