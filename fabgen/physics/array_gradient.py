"""Derivatives of an array's response to every length, station and diameter, from one factorisation.

The impedance matrix Z is symmetric, so with Z lam = w for a far-field weight w the change of the field y = w . I is
dy = dw . I - lam^T dZ I, and that of the feed current dI_0 = -I^T dZ I. Three right-hand sides serve all derivatives.

Source: adjoint method, textbook; own derivation.
"""

import math
from collections.abc import Sequence

import numpy as np

from fabgen.frozen import frozen
from fabgen.physics.array import LIGHT_MM_MHZ, ArraySolution, RodArray, solution_from_current
from fabgen.physics.array_loss import RodLoss, impedance_matrix, rod_loss
from fabgen.physics.array_matrix import (
    IMPEDANCE_FACTOR_OHM,
    Bases,
    NodePotentials,
    bases,
    mutual_and_self_with_slopes,
)
from fabgen.physics.blas_threads import one_blas_thread
from fabgen.physics.thin_rod_kernel import END_EXTENSION_RADII, ComplexArray, FloatArray


@frozen
class Sensitivity:
    """What one more millimetre changes, one entry per rod.

    Args:
        gain_db_per_mm: of the forward gain.
        back_front_per_mm: of the complex back/front ratio.
        feed_impedance_ohm_per_mm: of the feed impedance.
    """

    gain_db_per_mm: FloatArray
    back_front_per_mm: ComplexArray
    feed_impedance_ohm_per_mm: ComplexArray


@frozen
class ArrayGradient:
    """Response of an array at one frequency with all its derivatives.

    Args:
        solution: the response itself.
        length: to the rod lengths.
        station: to the stations.
        diameter: to the rod diameters.
    """

    solution: ArraySolution
    length: Sensitivity
    station: Sensitivity
    diameter: Sensitivity


def solve_gradient(array: RodArray, frequency_mhz: float, *, segments: int = 4) -> ArrayGradient:
    """Response and all its derivatives at one frequency.

    Args:
        array: the rods.
        frequency_mhz: frequency.
        segments: nodes per half rod.

    Returns:
        response and derivatives.
    """
    k_per_mm = 2 * math.pi * frequency_mhz / LIGHT_MM_MHZ
    basis = bases(array.length_mm, array.diameter_mm, k_per_mm, segments)
    potentials = mutual_and_self_with_slopes(basis, array.station_mm, array.diameter_mm, k_per_mm)
    loss = rod_loss(basis, array.diameter_mm, k_per_mm, frequency_mhz, array.conductivity_s_per_m)
    matrix = impedance_matrix(basis, potentials.value, loss)

    k_ahead = k_per_mm * (np.asarray(array.station_mm) - array.station_mm[array.fed_index])
    forward = np.asarray(np.exp(1j * k_ahead), dtype=np.complex128)
    drives = np.zeros((3, array.count, segments), dtype=np.complex128)
    drives[0, array.fed_index, 0] = 1.0
    drives[1] = basis.moment * forward[:, None]
    drives[2] = drives[1].conj()
    with one_blas_thread():
        solved = np.linalg.solve(matrix, drives.reshape(3, -1).T)
    adjoint = np.ascontiguousarray(solved.T, dtype=np.complex128).reshape(3, array.count, segments)
    solution = solution_from_current(array, frequency_mhz, basis, loss, adjoint[0])

    to_kh, to_k_station, to_k_radius = _bilinear_changes(basis, potentials, loss, adjoint)
    to_k_radius += END_EXTENSION_RADII * to_kh
    moment_slope = np.einsum("in,inp->i", adjoint[0], basis.jump_slope)
    both_ways = np.stack([forward, forward.conj()])
    fields_to_kh: ComplexArray = moment_slope * both_ways
    fields_to_k_station: ComplexArray = np.array([[1j], [-1j]]) * solution.moment_a * both_ways
    fields_to_k_station[:, array.fed_index] -= fields_to_k_station.sum(axis=1)
    return ArrayGradient(
        solution=solution,
        length=_sensitivity(solution, 0.5 * k_per_mm, to_kh, fields_to_kh),
        station=_sensitivity(solution, k_per_mm, to_k_station, fields_to_k_station),
        diameter=_sensitivity(solution, 0.5 * k_per_mm, to_k_radius, END_EXTENSION_RADII * fields_to_kh),
    )


def gradient_band(
    array: RodArray, frequency_mhz: Sequence[float] | FloatArray, *, segments: int = 4
) -> tuple[ArrayGradient, ...]:
    """Response and derivatives over a band.

    Args:
        array: the rods.
        frequency_mhz: frequencies.
        segments: nodes per half rod.

    Returns:
        one gradient per frequency.
    """
    return tuple(solve_gradient(array, float(value), segments=segments) for value in frequency_mhz)


def _bilinear_changes(
    basis: Bases, potentials: NodePotentials, loss: RodLoss | None, adjoint: ComplexArray
) -> tuple[ComplexArray, ComplexArray, ComplexArray]:
    """lam^T dZ I for the three adjoint vectors (rows), to kh, k station and k radius of each rod (columns)."""
    count, nodes = basis.kh.size, basis.segments + 1
    charge = np.einsum("uin,inp->uip", adjoint, basis.jump)
    charge_slope = np.einsum("uin,inp->uip", adjoint, basis.jump_slope)
    flat = charge.reshape(3, count * nodes)

    def applied(between: ComplexArray) -> ComplexArray:
        product = flat @ between.reshape(count * nodes, count * nodes).T
        return np.asarray(product.reshape(3, count, nodes))

    def both_sides(left: ComplexArray, right: ComplexArray) -> ComplexArray:
        """Sum over nodes of left(u) right(I) + left(I) right(u)."""
        return np.asarray((left * right[0] + left[0] * right).sum(axis=2))

    to_kh = both_sides(charge_slope, applied(potentials.value)) + both_sides(charge, applied(potentials.to_half_length))
    to_k_station = both_sides(charge, applied(potentials.to_station))
    to_k_radius = np.einsum("uip,ipq,iq->ui", charge, potentials.to_radius, charge[0])
    changes = [IMPEDANCE_FACTOR_OHM * change for change in (to_kh, to_k_station, to_k_radius)]
    if loss is not None:
        changes[0] += np.einsum("uim,imn,in->ui", adjoint, loss.to_half_length_ohm, adjoint[0])
        changes[2] += np.einsum("uim,imn,in->ui", adjoint, loss.to_radius_ohm, adjoint[0])
    return changes[0], changes[1], changes[2]


def _sensitivity(solution: ArraySolution, k_per_mm: float, bilinear: ComplexArray, fields: ComplexArray) -> Sensitivity:
    """Chain rule from changes of feed current and fields to the response.

    Args:
        solution: the response.
        k_per_mm: change of the wavenumber-scaled quantity per millimetre.
        bilinear: lam^T dZ I; rows feed, forward, backward.
        fields: explicit change of the field weights; rows forward, backward.

    Returns:
        derivatives per millimetre.
    """
    feed = -k_per_mm * bilinear[0]
    front = solution.field(1.0)
    front_change, back_change = k_per_mm * (fields - bilinear[1:])
    current = solution.feed_current_a
    gain = 2 * (front_change / front).real - feed.real / current.real
    return Sensitivity(
        gain_db_per_mm=10 / math.log(10) * gain,
        back_front_per_mm=back_change / front - solution.back_front * front_change / front,
        feed_impedance_ohm_per_mm=-feed / current**2,
    )
