"""Radiation patterns of a solved array: cuts in both principal planes, beamwidth, mean over the sphere.

Frame: x forward along the boom, y along the rods, z across both. The H-plane is x-z, the E-plane x-y; angles are
measured from forward.

Source: far field of sinusoidal currents in closed form, textbook; own derivation.
"""

import math
from collections.abc import Sequence

import numpy as np

from fabgen.frozen import frozen
from fabgen.physics.array import ArraySolution
from fabgen.physics.array_matrix import ETA_OHM, bases
from fabgen.physics.thin_rod_kernel import NODES, ComplexArray, FloatArray

AXIS_WIDTH = 1e-4
"""Sine of the angle from the rod axis below which the field, proportional to it, is set to zero."""


@frozen
class PatternCut:
    """Gain along a great circle.

    Args:
        angle_deg: angle from forward.
        gain_dbi: gain; minus infinity in an exact null.
    """

    angle_deg: FloatArray
    gain_dbi: FloatArray

    @property
    def relative_db(self) -> FloatArray:
        """Gain less the highest gain of the cut."""
        return np.asarray(self.gain_dbi - self.gain_dbi.max())


def field_towards(solution: ArraySolution, ahead: FloatArray, along: FloatArray) -> ComplexArray:
    """Far field in given directions, per volt at the feed, as an equivalent current.

    Args:
        solution: the solved array.
        ahead: x component of the unit vector of each direction.
        along: y component (along the rods).

    Returns:
        complex field with the phase origin of the solution; `ArraySolution.gain_of` turns it into gain.
    """
    array, k_per_mm = solution.array, solution.wavenumber_per_mm
    basis = bases(array.length_mm, array.diameter_mm, k_per_mm, solution.segments)
    charge = np.einsum("in,inp->ip", solution.current_a, basis.jump)
    node = basis.kh[:, None] * np.array(NODES[solution.segments])
    sine = np.sqrt(np.clip(1 - along**2, 0, None))
    rod = np.einsum("ip,...ip->...i", charge, np.cos(along[..., None, None] * node))
    phase = k_per_mm * (np.asarray(array.station_mm) - solution.phase_station_mm)
    total = (rod * np.exp(1j * ahead[..., None] * phase)).sum(axis=-1)
    return np.asarray(np.where(sine > AXIS_WIDTH, total / np.maximum(sine, AXIS_WIDTH), 0.0), dtype=np.complex128)


def _power_gain(solution: ArraySolution, field_a: ComplexArray) -> FloatArray:
    return np.asarray(ETA_OHM * np.abs(field_a) ** 2 / (math.pi * solution.feed_current_a.real))


def _cut(solution: ArraySolution, angle_deg: FloatArray, ahead: FloatArray, along: FloatArray) -> PatternCut:
    gain = _power_gain(solution, field_towards(solution, ahead, along))
    with np.errstate(divide="ignore"):
        return PatternCut(angle_deg, 10 * np.log10(gain))


def h_plane_cut(solution: ArraySolution, angle_deg: Sequence[float] | FloatArray) -> PatternCut:
    """Cut across the rods.

    Args:
        solution: the solved array.
        angle_deg: angles from forward towards +z.

    Returns:
        the cut.
    """
    angles = np.asarray(angle_deg, dtype=np.float64)
    ahead = np.cos(np.radians(angles))
    return _cut(solution, angles, ahead, np.zeros_like(ahead))


def e_plane_cut(solution: ArraySolution, angle_deg: Sequence[float] | FloatArray) -> PatternCut:
    """Cut that contains the rods.

    Args:
        solution: the solved array.
        angle_deg: angles from forward towards +y.

    Returns:
        the cut.
    """
    angles = np.asarray(angle_deg, dtype=np.float64)
    return _cut(solution, angles, np.cos(np.radians(angles)), np.sin(np.radians(angles)))


def half_power_beamwidth_deg(cut: PatternCut) -> float:
    """Width of the forward lobe 3.01 dB below its forward value, for a cut that is symmetric about forward.

    Args:
        cut: angles rising, from 0 at least to the edge of the lobe.

    Returns:
        full width; interpolated linearly in dB.

    Raises:
        ValueError: the cut does not start at 0 or the lobe does not end in it.
    """
    if cut.angle_deg[0] != 0:
        raise ValueError("the cut must start at 0 deg, forward")
    edge_db = cut.gain_dbi[0] - 10 * math.log10(2)
    below = np.nonzero(cut.gain_dbi < edge_db)[0]
    if not below.size:
        raise ValueError("the lobe does not end within the cut")
    outside = int(below[0])
    part = (cut.gain_dbi[outside - 1] - edge_db) / (cut.gain_dbi[outside - 1] - cut.gain_dbi[outside])
    return 2 * float(cut.angle_deg[outside - 1] + part * (cut.angle_deg[outside] - cut.angle_deg[outside - 1]))


def mean_gain(solution: ArraySolution) -> float:
    """Gain averaged over the sphere: the radiated part of the input power, a check of currents against fields.

    Args:
        solution: the solved array.

    Returns:
        1 for perfect conductors, the efficiency otherwise.
    """
    k_span = solution.wavenumber_per_mm * (max(solution.array.station_mm) - min(solution.array.station_mm))
    node, weight = np.polynomial.legendre.leggauss(16 + int(k_span))
    along = 0.5 * (node + 1)
    around = (np.arange(16 + 2 * int(k_span)) + 0.5) * math.pi / (16 + 2 * int(k_span))
    ahead = np.sqrt(1 - along**2)[:, None] * np.cos(around)
    field = field_towards(solution, ahead, np.broadcast_to(along[:, None], ahead.shape))
    return float(0.5 * weight @ _power_gain(solution, field).mean(axis=1))
