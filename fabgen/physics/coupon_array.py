"""The three-rod array of a coupon: its rods, how the director is trimmed, and what its feed should read.

Reflector and driven rod stay; the director is shortened in steps, free and in its mount. The driven rod is as long as
makes the feed resistive with the director in mid-range: there the SWR is 1.5 to 2 and grows with every step, away from
its minimum, where a reading says three times as much.

Source: own study 2026, computed, unpublished.
"""

import math
from collections.abc import Sequence

from scipy.optimize import brentq

from fabgen.frozen import frozen
from fabgen.physics.array import LIGHT_MM_MHZ, RodArray, solve_array

REFLECTOR_WL = 0.49
REFLECTOR_BEHIND_WL = 0.20
LEAST_SPACING_WL = 0.20
DIRECTOR_WL = (0.42, 0.44)
"""Free lengths of the director between which the feed answers it well: shorter it does little, longer it takes over."""

MIDDLE_REFLECTION, LEAST_WL = 1 / 3, 0.40
"""Reflection at the middle length, SWR 2, above which a shorter director is taken, down to this length."""

STEPS, SPAN_RELATIVE = 8, 0.05
"""Lengths of a trim series, and its span over the middle length: more, and a quadratic no longer follows."""

FREQUENCIES_RELATIVE = (0.99, 1.0, 1.01)
REFERENCE_OHM = 50.0


@frozen
class CouponArray:
    """A test array and its two trim series.

    Attributes:
        array: reflector, driven rod and director at its middle length, the driven one fed.
        frequencies_mhz: at which to read.
        free_mm: director lengths with the director free, longest first.
        mounted_mm: the same in the mount.
        expected_allowance_mm: what theory expects the mount to take; the mounted series is longer by about this.
    """

    array: RodArray
    frequencies_mhz: tuple[float, ...]
    free_mm: tuple[float, ...]
    mounted_mm: tuple[float, ...]
    expected_allowance_mm: float

    def reflection(self, director_mm: float, frequency_mhz: float) -> complex:
        """What the feed reflects into 50 ohm with a free director of some length.

        Args:
            director_mm: electrical length of the director.
            frequency_mhz: at which frequency.
        """
        return feed_reflection(self.array, director_mm, frequency_mhz)


def coupon_array(
    *,
    rods_mm: Sequence[float],
    rod_diameter_mm: float,
    frequency_mhz: float,
    spacing_mm: float,
    expected_allowance_mm: float,
    cut_step_mm: float,
    driven_diameter_mm: float | None = None,
) -> CouponArray:
    """The test array for a mount.

    Args:
        rods_mm: modelled lengths of the rods that the mount carries; their mean decides the director, within limits.
        rod_diameter_mm: of reflector and director.
        frequency_mhz: design frequency.
        spacing_mm: driven rod to director.
        expected_allowance_mm: what theory expects of the mount.
        cut_step_mm: the shop's step.
        driven_diameter_mm: left out: as the others.

    Returns:
        The array, with all lengths whole steps.
    """
    wl_mm = LIGHT_MM_MHZ / frequency_mhz
    low_mm, high_mm = (part * wl_mm for part in DIRECTOR_WL)
    middle_mm = min(max(sum(rods_mm) / len(rods_mm), low_mm), high_mm)
    fed_mm = rod_diameter_mm if driven_diameter_mm is None else driven_diameter_mm
    behind_mm = REFLECTOR_BEHIND_WL * wl_mm
    stations = (0.0, round(behind_mm, 1), round(behind_mm + spacing_mm, 1))
    reflector_mm = _whole(REFLECTOR_WL * wl_mm, cut_step_mm)

    def tuned(director_mm: float) -> RodArray:
        """The array whose feed is resistive with that director."""

        def rods(driven_mm: float) -> RodArray:
            lengths = (reflector_mm, driven_mm, director_mm)
            return RodArray(stations, lengths, (rod_diameter_mm, fed_mm, rod_diameter_mm), 1)

        def reactance_ohm(driven_mm: float) -> float:
            return solve_array(rods(driven_mm), frequency_mhz).feed_impedance_ohm.imag

        driven_mm = float(brentq(reactance_ohm, 0.40 * wl_mm, 0.52 * wl_mm, xtol=0.01))
        return rods(_whole(driven_mm, cut_step_mm))

    array = tuned(middle_mm)
    while abs(feed_reflection(array, middle_mm, frequency_mhz)) > MIDDLE_REFLECTION and middle_mm > LEAST_WL * wl_mm:
        middle_mm -= 0.0025 * wl_mm
        array = tuned(middle_mm)
    step_mm = _whole(SPAN_RELATIVE * middle_mm / (STEPS - 1), cut_step_mm)
    longest_mm = _whole(middle_mm + step_mm * (STEPS - 1) / 2, cut_step_mm)
    free_mm = tuple(round(longest_mm - k * step_mm, 6) for k in range(STEPS))
    added_mm = _whole(expected_allowance_mm, cut_step_mm)
    return CouponArray(
        array,
        tuple(round(part * frequency_mhz, 1) if part != 1.0 else frequency_mhz for part in FREQUENCIES_RELATIVE),
        free_mm,
        tuple(round(length_mm + added_mm, 6) for length_mm in free_mm),
        expected_allowance_mm,
    )


def feed_reflection(array: RodArray, director_mm: float, frequency_mhz: float) -> complex:
    """Reflection into 50 ohm at the feed of a three-rod array with another director length.

    Args:
        array: reflector, driven rod, director.
        director_mm: electrical length of the director.
        frequency_mhz: at which frequency.
    """
    lengths = (*array.length_mm[:2], director_mm)
    trial = RodArray(array.station_mm, lengths, array.diameter_mm, array.fed_index)
    impedance = solve_array(trial, frequency_mhz).feed_impedance_ohm
    return complex((impedance - REFERENCE_OHM) / (impedance + REFERENCE_OHM))


def _whole(length_mm: float, step_mm: float) -> float:
    """The nearest whole number of steps, at least one."""
    return round(max(1, math.floor(length_mm / step_mm + 0.5)) * step_mm, 6)
