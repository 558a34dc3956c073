"""Another rod diameter: the length that keeps a rod's broadside scattering reactance.

A parasitic rod acts on the array by the field it scatters back along the boom. Per incident field that is w^T Z^-1 w,
with Z the rod's own impedance matrix and w its broadside response; its inverse is an impedance whose imaginary part,
the scattering reactance, sets how the rod is tuned. Keeping it for every rod keeps the response of the whole array;
what is left over must be computed for the whole array (`array_shift`).

Range: rods of 0.38-0.50 wavelengths and d up to 0.0085 wavelengths; there a finer mesh changes the length by less than
0.00003 wavelengths. Methods in print differ from each other by up to 0.003 wavelengths for one change of diameter.

Source: own study 2026, computed, unpublished: 4 to 5 mm rods at 434 MHz leave -17 kHz of -2841 kHz, the equal input
reactance +305 kHz, the logarithmic formula -158 kHz.
"""

import math

import numpy as np
from scipy.optimize import brentq

from fabgen.frozen import frozen
from fabgen.physics.array import LIGHT_MM_MHZ
from fabgen.physics.array_loss import impedance_matrix
from fabgen.physics.array_matrix import bases, mutual_and_self

LENGTH_RANGE_WL = (0.38, 0.50)
DIAMETER_LIMIT_WL = 0.0085
SEARCH = 0.15
"""The new length is sought within this fraction of the old one."""


@frozen
class RodChange:
    """A rod length carried over to another diameter.

    Args:
        length_mm: the new length.
        change_mm: new less old length.
        reactance_ohm: the scattering reactance kept.
        within_range: false when a length or a diameter lies outside the range of the method.
    """

    length_mm: float
    change_mm: float
    reactance_ohm: float
    within_range: bool


def scattering_impedance_ohm(
    length_mm: float, diameter_mm: float, frequency_mhz: float, *, segments: int = 4
) -> complex:
    """Broadside scattering impedance 1 / (w^T Z^-1 w) of a rod with closed feed.

    Args:
        length_mm: rod length.
        diameter_mm: rod diameter.
        frequency_mhz: frequency.
        segments: nodes per half rod.

    Returns:
        impedance; zero reactance is the rod's scattering resonance.
    """
    k_per_mm = 2 * math.pi * frequency_mhz / LIGHT_MM_MHZ
    basis = bases((length_mm,), (diameter_mm,), k_per_mm, segments)
    matrix = impedance_matrix(basis, mutual_and_self(basis, (0.0,), (diameter_mm,), k_per_mm), None)
    response = basis.moment[0]
    return complex(1 / (response @ np.linalg.solve(matrix, response.astype(np.complex128))))


def equal_scattering_length(
    length_mm: float, diameter_mm: float, new_diameter_mm: float, frequency_mhz: float, *, segments: int = 4
) -> RodChange:
    """Length of a rod of another diameter with the same broadside scattering reactance.

    Args:
        length_mm: modelled length.
        diameter_mm: modelled diameter.
        new_diameter_mm: diameter of the rod at hand.
        frequency_mhz: frequency.
        segments: nodes per half rod.

    Returns:
        the new length and what was kept.

    Raises:
        ValueError: no such length within `SEARCH` of the old one.
    """
    kept_ohm = scattering_impedance_ohm(length_mm, diameter_mm, frequency_mhz, segments=segments).imag

    def miss_ohm(trial_mm: float) -> float:
        found = scattering_impedance_ohm(trial_mm, new_diameter_mm, frequency_mhz, segments=segments)
        return found.imag - kept_ohm

    low_mm, high_mm = (1 - SEARCH) * length_mm, (1 + SEARCH) * length_mm
    if miss_ohm(low_mm) * miss_ohm(high_mm) > 0:
        raise ValueError(
            f"no length from {low_mm:.1f} to {high_mm:.1f} mm gives a {new_diameter_mm} mm rod the scattering "
            f"reactance of {length_mm} mm at {diameter_mm} mm"
        )
    new_mm = float(brentq(miss_ohm, low_mm, high_mm, xtol=1e-9 * length_mm, rtol=1e-12))
    per_wavelength = frequency_mhz / LIGHT_MM_MHZ
    shortest_wl, longest_wl = LENGTH_RANGE_WL
    return RodChange(
        length_mm=new_mm,
        change_mm=new_mm - length_mm,
        reactance_ohm=kept_ohm,
        within_range=all(shortest_wl <= value * per_wavelength <= longest_wl for value in (length_mm, new_mm))
        and max(diameter_mm, new_diameter_mm) * per_wavelength <= DIAMETER_LIMIT_WL,
    )
