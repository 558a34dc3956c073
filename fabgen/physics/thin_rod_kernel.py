"""Potential of sinusoidal currents on thin parallel rods, and the meshes it is sampled on.

For a piecewise sinusoidal current the Galerkin reaction between two rods needs one scalar function at differences
of node positions only:

    W(z; rho) = (j/2k) {e^{+jkz} E1(jk(R+z)) + e^{-jkz} E1(jk(R-z))},   R = sqrt(rho^2 + z^2)
    W'' + k^2 W = e^{-jkR} / R,   E1(jx) = -Ci(x) + j (Si(x) - pi/2)

Everything here works in units of 1/k: `kz` and `krho` are lengths times the wavenumber, and the values are k W.

Source: J. H. Richmond and N. H. Geary, "Mutual impedance of nonplanar-skew sinusoidal dipoles", IEEE Transactions
on Antennas and Propagation, 1975 (method, from memory); nodes, end extension, ring rule: own study 2026, computed,
unpublished.
"""

from functools import lru_cache

import numpy as np
from numpy.typing import NDArray
from scipy.special import sici

from fabgen.frozen import frozen

FloatArray = NDArray[np.float64]
ComplexArray = NDArray[np.complex128]

END_EXTENSION_RADII = 0.2
"""Modelled length beyond each end in rod radii, for the charge on the end face. Chosen against computed dipoles."""

NODES: dict[int, tuple[float, ...]] = {
    1: (0.0, 1.0),
    3: (0.0, 0.7463, 0.9904, 1.0),
    4: (0.0, 0.5255, 0.9025, 0.9953, 1.0),
    5: (0.0, 0.2715, 0.7268, 0.9489, 0.997, 1.0),
}
"""Nodes along the half rod, 0 the centre and 1 the end, by the number of unknowns; fitted to a fine mesh for rods of
0.40-0.485 wavelengths, d 0.002-0.0085. Clustered at the end: uniform nodes put the centre frequency 0.3-2 % high. One
unknown is the classic sinusoidal current (induced EMF)."""


@frozen
class Potential:
    """k W and its slopes at the same places (dimensionless).

    Args:
        value: k W.
        slope_z: dW/dz, that is d(kW)/d(kz).
        slope_rho: dW/drho, that is d(kW)/d(krho).
    """

    value: ComplexArray
    slope_z: ComplexArray
    slope_rho: ComplexArray


def _integrals(kz: FloatArray, krho: FloatArray) -> tuple[FloatArray, ...]:
    """Parts of e^{jkz}E1(+) and e^{-jkz}E1(-) for |z|: sum (re, im), difference (re, im), and kR."""
    z = np.abs(kz)
    kr = np.sqrt(z * z + krho * krho)
    far = kr + z
    near = krho * krho / far
    sine_far, cosine_far = sici(far)
    sine_near, cosine_near = sici(near)
    sine_far -= np.pi / 2
    sine_near -= np.pi / 2
    c, s = np.cos(z), np.sin(z)
    far_re, far_im = -c * cosine_far - s * sine_far, c * sine_far - s * cosine_far
    near_re, near_im = -c * cosine_near + s * sine_near, c * sine_near + s * cosine_near
    return far_re + near_re, far_im + near_im, far_re - near_re, far_im - near_im, kr


def potential(kz: FloatArray, krho: FloatArray) -> ComplexArray:
    """Value of k W(z; rho), see the module docstring.

    Args:
        kz: axial distance times the wavenumber, any sign.
        krho: distance between the axes times the wavenumber, above zero; broadcasts with `kz`.

    Returns:
        k W, dimensionless.
    """
    sum_re, sum_im, _, _, _ = _integrals(kz, krho)
    value = np.empty(sum_re.shape, dtype=np.complex128)
    value.real = -0.5 * sum_im
    value.imag = 0.5 * sum_re
    return value


def potential_with_slopes(kz: FloatArray, krho: FloatArray) -> Potential:
    """Value of k W with its slopes; costs no further sine or cosine integral.

    Args:
        kz: axial distance times the wavenumber, any sign.
        krho: distance between the axes times the wavenumber, above zero; broadcasts with `kz`.

    Returns:
        value, dW/dz and dW/drho = e^{-jkR} / (jk rho).
    """
    sum_re, sum_im, difference_re, difference_im, kr = _integrals(kz, krho)
    half_sign = -0.5 * np.sign(kz)
    return Potential(
        value=0.5j * (sum_re + 1j * sum_im),
        slope_z=np.asarray(half_sign * (difference_re + 1j * difference_im), dtype=np.complex128),
        slope_rho=np.exp(-1j * kr) / (1j * krho),
    )


@lru_cache(maxsize=4)
def ring_rule(points: int = 10) -> tuple[FloatArray, FloatArray]:
    """Quadrature of a function of the chord between two points of a rod's circumference.

    (1/pi) integral over 0..pi of f(2 a sin(phi/2)) with phi = pi u^3, Gauss-Legendre in u, so that the logarithmic
    singularity of the self term is met.

    Args:
        points: number of Gauss-Legendre points.

    Returns:
        chords in radii and weights; the weights sum to 1.
    """
    node, weight = np.polynomial.legendre.leggauss(points)
    u = 0.5 * (node + 1)
    return 2 * np.sin(0.5 * np.pi * u**3), 0.5 * weight * 3 * u**2
