"""Impedance matrix of parallel thin rods with symmetric piecewise sinusoidal currents.

Lengths enter as products with the wavenumber, so the matrix keeps the scale law exactly. Arrays over node pairs have
the axes rod i, node p, rod j, node q; each holds W(z_p - z'_q) + W(z_p + z'_q), times k.

Source: J. H. Richmond's piecewise sinusoidal Galerkin method (from memory); own derivation of the symmetric form.
"""

import math
from collections.abc import Sequence
from functools import lru_cache

import numpy as np
from numpy.typing import NDArray

from fabgen.frozen import frozen
from fabgen.physics.thin_rod_kernel import (
    END_EXTENSION_RADII,
    NODES,
    ComplexArray,
    FloatArray,
    Potential,
    potential,
    potential_with_slopes,
    ring_rule,
)

ETA_OHM = 376.730313668
IMPEDANCE_FACTOR_OHM = 2j * ETA_OHM / (4 * math.pi)
"""Z = this times B (kW) B^T."""

IntArray = NDArray[np.intp]


@frozen
class _Places:
    """Which distinct node distances occur: t_first * h_i + sign * t_second * h_j, and where each is used.

    `minus` and `plus` are node by node: the place of z_p - z'_q and z_p + z'_q; `plus_sign` is -1 where the place
    holds the negative of z_p + z'_q, `minus_sign` where it holds that of z_p - z'_q (W is even, its slope is odd).
    """

    first: FloatArray
    second: FloatArray
    minus: IntArray
    plus: IntArray
    minus_sign: FloatArray
    plus_sign: FloatArray


@lru_cache(maxsize=8)
def _mutual_places(segments: int) -> _Places:
    """Places between two different rods: all differences, and the sums of nodes off the centre."""
    t = NODES[segments]
    size = len(t)
    first: list[float] = []
    second: list[float] = []
    minus, plus = np.zeros((size, size), dtype=np.intp), np.zeros((size, size), dtype=np.intp)
    plus_sign = np.ones((size, size))
    for p in range(size):
        for q in range(size):
            minus[p, q] = len(first)
            first.append(t[p])
            second.append(-t[q])
    for p in range(size):
        for q in range(size):
            if p and q:
                plus[p, q] = len(first)
                first.append(t[p])
                second.append(t[q])
            else:
                plus[p, q] = minus[p, q]
                plus_sign[p, q] = 1.0 if p or not q else -1.0
    return _Places(np.array(first), np.array(second), minus, plus, np.ones((size, size)), plus_sign)


@lru_cache(maxsize=8)
def _self_places(segments: int) -> _Places:
    """Places on one rod: as between two rods, but each distance once."""
    t = NODES[segments]
    size = len(t)
    place: dict[float, int] = {}
    minus, plus = np.zeros((size, size), dtype=np.intp), np.zeros((size, size), dtype=np.intp)
    minus_sign = np.ones((size, size))
    for p in range(size):
        for q in range(size):
            minus[p, q] = place.setdefault(abs(t[p] - t[q]), len(place))
            plus[p, q] = place.setdefault(t[p] + t[q], len(place))
            minus_sign[p, q] = -1.0 if t[p] < t[q] else 1.0
    distance = np.array(list(place))
    return _Places(distance, np.zeros_like(distance), minus, plus, minus_sign, np.ones((size, size)))


@frozen
class Bases:
    """Symmetric sinusoidal basis functions of every rod, by the jumps of slope at their nodes.

    Args:
        kh: half lengths with the end extension, times the wavenumber.
        jump: rods by bases by nodes: slope jumps over k of each basis (half of it at the centre node).
        jump_slope: derivative of `jump` to kh.
        segments: bases per rod.
    """

    kh: FloatArray
    jump: FloatArray
    jump_slope: FloatArray
    segments: int

    @property
    def moment(self) -> FloatArray:
        """Rods by bases: the broadside response, see `broadside_moment`."""
        return broadside_moment(self.kh, self.segments)


def broadside_moment(kh: FloatArray, segments: int) -> FloatArray:
    """Response of each basis function to a field broadside to the rod: k/2 times its integral.

    Args:
        kh: half lengths with the end extension, times the wavenumber; any shape.
        segments: bases per rod.

    Returns:
        the shape of `kh` with the bases as a last axis.
    """
    flank = np.tan(0.5 * kh[..., None] * np.diff(NODES[segments]))
    flank[..., 1:] += flank[..., :-1].copy()
    return np.asarray(flank)


def bases(length_mm: Sequence[float], diameter_mm: Sequence[float], k_per_mm: float, segments: int) -> Bases:
    """Basis functions of rods of given lengths.

    Args:
        length_mm: rod lengths.
        diameter_mm: rod diameters; each end is extended by `END_EXTENSION_RADII` radii.
        k_per_mm: wavenumber.
        segments: bases per rod.

    Returns:
        the bases.
    """
    half_mm = 0.5 * np.asarray(length_mm) + END_EXTENSION_RADII * 0.5 * np.asarray(diameter_mm)
    kh = k_per_mm * half_mm
    step = np.diff(NODES[segments])
    cell = kh[:, None] * step
    sine = np.sin(cell)
    cotangent = np.cos(cell) / sine
    jump = np.zeros((kh.size, segments, segments + 1))
    slope = np.zeros_like(jump)
    n = np.arange(segments)
    jump[:, n, n] = -cotangent
    slope[:, n, n] = step / sine**2
    jump[:, n, n + 1] = 1 / sine
    slope[:, n, n + 1] = -step * cotangent / sine
    later = n[1:]
    jump[:, later, later] -= cotangent[:, :-1]
    slope[:, later, later] += (step / sine**2)[:, :-1]
    jump[:, later, later - 1] = 1 / sine[:, :-1]
    slope[:, later, later - 1] = (-step * cotangent / sine)[:, :-1]
    return Bases(kh, jump, slope, segments)


@frozen
class NodePotentials:
    """Node potentials of all rods; axes rod i, node p, rod j, node q; slopes only where asked for.

    Args:
        value: k {W(z_p - z'_q) + W(z_p + z'_q)}.
        to_half_length: derivative to kh of rod i; on one rod half of it, so that D X + (D X)^T is the whole change
            for the diagonal matrix D of the changes of kh.
        to_station: derivative to k times the station of rod i; D X + (D X)^T likewise.
        to_radius: rods by nodes by nodes: derivative of the self term to k times the radius.
    """

    value: ComplexArray
    to_half_length: ComplexArray
    to_station: ComplexArray
    to_radius: ComplexArray


def _arguments(
    basis: Bases, station_mm: Sequence[float], diameter_mm: Sequence[float], k_per_mm: float
) -> tuple[IntArray, IntArray, FloatArray, FloatArray, FloatArray, FloatArray]:
    """Pairs of rods, and (kz, krho) of every mutual and every self place."""
    count = basis.kh.size
    i, j = np.triu_indices(count, 1)
    k_station = k_per_mm * np.asarray(station_mm)
    mutual, own = _mutual_places(basis.segments), _self_places(basis.segments)
    mutual_z = basis.kh[i, None] * mutual.first + basis.kh[j, None] * mutual.second
    mutual_rho = np.broadcast_to(np.abs(k_station[i] - k_station[j])[:, None], mutual_z.shape)
    chord, _ = ring_rule()
    own_rho = (0.5 * k_per_mm * np.asarray(diameter_mm))[:, None, None] * chord
    own_z = (basis.kh[:, None] * own.first)[:, :, None]
    own_z, own_rho = np.broadcast_arrays(own_z, own_rho)
    return i, j, mutual_z, mutual_rho, own_z, own_rho


def mutual_and_self(
    basis: Bases, station_mm: Sequence[float], diameter_mm: Sequence[float], k_per_mm: float
) -> ComplexArray:
    """Node potentials of all rods, without slopes.

    Args:
        basis: the bases of the rods.
        station_mm: stations.
        diameter_mm: diameters; the self term is averaged over the rod's circumference.
        k_per_mm: wavenumber.

    Returns:
        axes rod i, node p, rod j, node q.
    """
    i, j, mutual_z, mutual_rho, own_z, own_rho = _arguments(basis, station_mm, diameter_mm, k_per_mm)
    flat = potential(
        np.concatenate([mutual_z.ravel(), own_z.ravel()]), np.concatenate([mutual_rho.ravel(), own_rho.ravel()])
    )
    between = flat[: mutual_z.size].reshape(mutual_z.shape)
    _, weight = ring_rule()
    own = flat[mutual_z.size :].reshape(own_z.shape) @ weight
    return _spread(basis, i, j, between, own)


def _spread(basis: Bases, i: IntArray, j: IntArray, between: ComplexArray, own: ComplexArray) -> ComplexArray:
    """Values at places, spread over the node pairs of all rods and summed over z_p - z'_q and z_p + z'_q."""
    count, size = basis.kh.size, basis.segments + 1
    mutual, single = _mutual_places(basis.segments), _self_places(basis.segments)
    full = np.empty((count, size, count, size), dtype=np.complex128)
    pair = between[:, mutual.minus] + between[:, mutual.plus]
    full[i, :, j, :] = pair
    full[j, :, i, :] = pair.transpose(0, 2, 1)
    rod = np.arange(count)
    full[rod, :, rod, :] = own[:, single.minus] + own[:, single.plus]
    return full


def mutual_and_self_with_slopes(
    basis: Bases, station_mm: Sequence[float], diameter_mm: Sequence[float], k_per_mm: float
) -> NodePotentials:
    """Node potentials of all rods with their slopes to half lengths, stations and radii.

    Args:
        basis: the bases of the rods.
        station_mm: stations.
        diameter_mm: diameters.
        k_per_mm: wavenumber.

    Returns:
        values and slopes.
    """
    i, j, mutual_z, mutual_rho, own_z, own_rho = _arguments(basis, station_mm, diameter_mm, k_per_mm)
    both: Potential = potential_with_slopes(
        np.concatenate([mutual_z.ravel(), own_z.ravel()]), np.concatenate([mutual_rho.ravel(), own_rho.ravel()])
    )
    split, shape = mutual_z.size, mutual_z.shape
    chord, weight = ring_rule()
    value = both.value[:split].reshape(shape)
    own_value = both.value[split:].reshape(own_z.shape) @ weight
    count, size = basis.kh.size, basis.segments + 1
    mutual, own = _mutual_places(basis.segments), _self_places(basis.segments)
    t = np.array(NODES[basis.segments])
    row, column = t[:, None], t[None, :]

    slope = both.slope_z[:split].reshape(shape)
    at_minus = slope[:, mutual.minus] * mutual.minus_sign
    at_plus = slope[:, mutual.plus] * mutual.plus_sign
    to_half = np.empty((count, size, count, size), dtype=np.complex128)
    to_half[i, :, j, :] = row * (at_plus + at_minus)
    to_half[j, :, i, :] = (column * (at_plus - at_minus)).transpose(0, 2, 1)
    own_slope = both.slope_z[split:].reshape(own_z.shape) @ weight
    rod = np.arange(count)
    from_minus = (row - column) * own.minus_sign * own_slope[:, own.minus]
    to_half[rod, :, rod, :] = 0.5 * (from_minus + (row + column) * own_slope[:, own.plus])

    ahead = np.sign(np.asarray(station_mm)[i] - np.asarray(station_mm)[j])[:, None]
    rho_slope = both.slope_rho[:split].reshape(shape) * ahead
    to_station = np.zeros((count, size, count, size), dtype=np.complex128)
    pair = rho_slope[:, mutual.minus] + rho_slope[:, mutual.plus]
    to_station[i, :, j, :] = pair
    to_station[j, :, i, :] = -pair.transpose(0, 2, 1)
    own_rho_slope = both.slope_rho[split:].reshape(own_z.shape) @ (weight * chord)
    return NodePotentials(
        value=_spread(basis, i, j, value, own_value),
        to_half_length=to_half,
        to_station=to_station,
        to_radius=own_rho_slope[:, own.minus] + own_rho_slope[:, own.plus],
    )


def project(left: FloatArray, between: ComplexArray, right: FloatArray) -> ComplexArray:
    """B_i X_ij B_j^T for all rods at once.

    Args:
        left: rods by bases by nodes.
        between: axes rod i, node p, rod j, node q.
        right: rods by bases by nodes.

    Returns:
        square matrix over rods and bases.
    """
    count, size_left, nodes = left.shape
    half = left.astype(np.complex128) @ between.reshape(count, nodes, count * nodes)
    half = half.reshape(count * size_left, count, nodes).transpose(1, 2, 0)
    full = right.astype(np.complex128) @ half
    return np.asarray(full.reshape(-1, count * size_left).T)
