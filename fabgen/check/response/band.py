"""The modelled array over its band, the fan of its builds, and its patterns."""

import math

import numpy as np

from fabgen.check.response.arrays import at_terminals
from fabgen.check.response.gauge import Sampled, swr
from fabgen.design.electrical_case import ElectricalCase
from fabgen.design.response import SHARE_INSIDE, BandPoint, FanPoint, Pattern
from fabgen.physics.array import RodArray, solve_array, solve_band
from fabgen.physics.array_pattern import PatternCut, e_plane_cut, h_plane_cut, half_power_beamwidth_deg
from fabgen.physics.array_shift import HALF_BAND
from fabgen.physics.thin_rod_kernel import FloatArray

POINTS = 61
ANGLES_DEG = tuple(range(0, 181, 2))
FLOOR_DBI = -40.0
"""Deeper than that a pattern says nothing."""


def frequencies_mhz(case: ElectricalCase) -> list[float]:
    """The band widened by 1.5 % each way in even steps, its own ends and the design frequency among them."""
    low_mhz, high_mhz = case.band_mhz
    first_mhz, last_mhz = low_mhz * (1 - HALF_BAND), high_mhz * (1 + HALF_BAND)
    even = {round(first_mhz + k * (last_mhz - first_mhz) / (POINTS - 1), 4) for k in range(POINTS)}
    return sorted(even | {low_mhz, case.frequency_mhz, high_mhz})


def band_points(case: ElectricalCase, array: RodArray) -> tuple[BandPoint, ...]:
    """Response of an array at these frequencies."""
    found = solve_band(array, frequencies_mhz(case))
    impedance = at_terminals(case, found.feed_impedance_ohm)
    columns = (
        found.frequency_mhz, found.gain_dbi, found.front_to_back_db, impedance.real, impedance.imag,
        swr(case, found.feed_impedance_ohm),
    )  # fmt: skip
    return tuple(BandPoint(*(round(float(cell), 4) for cell in row)) for row in zip(*columns, strict=True))


def fan(sampled: Sampled) -> tuple[FanPoint, ...]:
    """Between which values 95 % of builds lie, frequency by frequency."""
    _, first = np.unique(sampled.frequency_mhz, return_index=True)
    kept = sampled.taken(first)
    sides = [_sides(values) for values in (kept.gain_dbi, kept.front_to_back_db, kept.mismatch)]
    return tuple(
        FanPoint(round(float(frequency), 4), *(side[index] for side in sides))
        for index, frequency in enumerate(kept.frequency_mhz)
    )


def _sides(values: FloatArray) -> list[tuple[float, float]]:
    outside = (1 - SHARE_INSIDE) / 2
    low, high = np.quantile(values, [outside, 1 - outside], axis=0)
    return [(round(float(a), 4), round(float(b), 4)) for a, b in zip(low, high, strict=True)]


def patterns(array: RodArray, frequency_mhz: float) -> tuple[Pattern, Pattern]:
    """H-plane and E-plane cut at one frequency."""
    solution = solve_array(array, frequency_mhz)
    return _pattern(h_plane_cut(solution, ANGLES_DEG)), _pattern(e_plane_cut(solution, ANGLES_DEG))


def _pattern(cut: PatternCut) -> Pattern:
    try:
        width_deg: float | None = round(half_power_beamwidth_deg(cut), 1)
    except ValueError:
        width_deg = None
    gains = tuple(round(max(float(gain), FLOOR_DBI), 3) if not math.isnan(gain) else FLOOR_DBI for gain in cut.gain_dbi)
    return Pattern(tuple(float(angle) for angle in cut.angle_deg), gains, width_deg)
