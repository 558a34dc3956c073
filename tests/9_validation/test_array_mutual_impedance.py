"""Mutual and self impedance of half-wave dipoles against the induced EMF method.

Source: closed forms of C. A. Balanis, "Antenna Theory", chapter 8, with the exact wave impedance of free space
(computed values). Balanis prints 73.1 + j42.5 ohm, 40.8 - j28.3 and -12.5 - j29.9 ohm with eta = 120 pi.
"""

import math

import pytest

from fabgen.physics.array import LIGHT_MM_MHZ, RodArray, solve_array
from fabgen.physics.array_loss import impedance_matrix
from fabgen.physics.array_matrix import bases, mutual_and_self

WAVELENGTH_MM = 1000.0
THIN_MM = 1e-6
TOLERANCE_OHM = 1e-3
"""The reference values carry four decimals."""

MUTUAL_OHM = {
    0.05: 71.6075 + 24.2519j,
    0.10: 67.2870 + 7.5326j,
    0.25: 40.7575 - 28.3294j,
    0.50: -12.5234 - 29.9079j,
    1.0: 4.0089 + 17.7298j,
    2.0: 1.0835 + 9.3580j,
}


@pytest.mark.parametrize("distance_wl", MUTUAL_OHM)
def test_mutual_impedance_side_by_side(distance_wl: float) -> None:
    """Two half-wave rods with a single sinusoid each; worst miss 5e-5 ohm, the rounding of the reference."""
    k_per_mm = 2 * math.pi / WAVELENGTH_MM
    diameters_mm = (THIN_MM, THIN_MM)
    basis = bases((500.0, 500.0), diameters_mm, k_per_mm, segments=1)
    potentials = mutual_and_self(basis, (0.0, distance_wl * WAVELENGTH_MM), diameters_mm, k_per_mm)
    matrix = impedance_matrix(basis, potentials, None)
    assert matrix[0, 1] == matrix[1, 0]
    assert abs(matrix[0, 1] - MUTUAL_OHM[distance_wl]) < TOLERANCE_OHM


def test_half_wave_dipole_thin_limit() -> None:
    """73.0790 + j42.5151 ohm and 2.1509 dBi for vanishing diameter."""
    array = RodArray((0.0,), (500.0,), (THIN_MM,), fed_index=0)
    solution = solve_array(array, LIGHT_MM_MHZ / WAVELENGTH_MM, segments=1)
    assert abs(solution.feed_impedance_ohm - (73.0790 + 42.5151j)) < TOLERANCE_OHM
    assert solution.gain_dbi == pytest.approx(2.1509, abs=1e-3)
