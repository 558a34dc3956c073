"""Conductor loss of thin rods: skin-effect surface impedance times closed-form overlaps of the basis functions.

Range: rods thick against the skin depth (4 mm aluminium at 144 MHz: 7 um). Permeability of vacuum.

Source: surface impedance of a good conductor, textbook; overlaps of sinusoids in closed form, own derivation.
"""

import math
from collections.abc import Sequence

import numpy as np

from fabgen.frozen import frozen
from fabgen.physics.array_matrix import IMPEDANCE_FACTOR_OHM, Bases, project
from fabgen.physics.thin_rod_kernel import NODES, ComplexArray, FloatArray

MU_0_H_PER_M = 4e-7 * math.pi


@frozen
class RodLoss:
    """Surface loss of each rod; arrays are rods by bases by bases, in ohm.

    Args:
        value_ohm: addition to the rod's own block of the impedance matrix.
        to_half_length_ohm: derivative to kh.
        to_radius_ohm: derivative to k times the radius.
    """

    value_ohm: ComplexArray
    to_half_length_ohm: ComplexArray
    to_radius_ohm: ComplexArray


def _tridiagonal(own: FloatArray, cross: FloatArray) -> FloatArray:
    """Overlaps of neighbouring bases from cell integrals, both halves of the rod."""
    count, segments = own.shape
    n = np.arange(segments)
    overlap = np.zeros((count, segments, segments))
    overlap[:, n, n] = 2 * own
    overlap[:, n[1:], n[1:]] += 2 * own[:, :-1]
    overlap[:, n[:-1], n[1:]] = overlap[:, n[1:], n[:-1]] = 2 * cross[:, :-1]
    return overlap


def rod_loss(
    basis: Bases, diameter_mm: Sequence[float], k_per_mm: float, frequency_mhz: float, conductivity_s_per_m: float
) -> RodLoss | None:
    """Surface loss of every rod.

    Args:
        basis: the bases of the rods.
        diameter_mm: diameters.
        k_per_mm: wavenumber.
        frequency_mhz: frequency.
        conductivity_s_per_m: conductivity in S/m.

    Returns:
        the loss, or None for a perfect conductor.
    """
    if math.isinf(conductivity_s_per_m):
        return None
    surface_ohm = (1 + 1j) * math.sqrt(math.pi * frequency_mhz * 1e6 * MU_0_H_PER_M / conductivity_s_per_m)
    k_radius = 0.5 * k_per_mm * np.asarray(diameter_mm)
    per_k_length_ohm: ComplexArray = np.asarray(surface_ohm / (2 * math.pi * k_radius), dtype=np.complex128)[
        :, None, None
    ]
    step = np.diff(NODES[basis.segments])
    c = basis.kh[:, None] * step
    sine, cosine = np.sin(c), np.cos(c)
    own = (c / 2 - sine * cosine / 2) / sine**2
    cross = (sine - c * cosine) / (2 * sine**2)
    own_slope = step * (1 - 2 * own * cosine / sine)
    cross_slope = step * (c / (2 * sine) - 2 * cross * cosine / sine)
    value = per_k_length_ohm * _tridiagonal(own, cross)
    return RodLoss(
        value_ohm=value,
        to_half_length_ohm=per_k_length_ohm * _tridiagonal(own_slope, cross_slope),
        to_radius_ohm=-value / k_radius[:, None, None],
    )


def impedance_matrix(basis: Bases, potentials: ComplexArray, loss: RodLoss | None) -> ComplexArray:
    """Impedance matrix over rods and bases.

    Args:
        basis: the bases.
        potentials: node potentials.
        loss: surface loss of the rods, None for perfect conductors.

    Returns:
        symmetric matrix in ohm.
    """
    matrix = IMPEDANCE_FACTOR_OHM * project(basis.jump, potentials, basis.jump)
    if loss is not None:
        count, segments = basis.kh.size, basis.segments
        rod = np.arange(count)
        matrix.reshape(count, segments, count, segments)[rod, :, rod, :] += loss.value_ohm
    return matrix
