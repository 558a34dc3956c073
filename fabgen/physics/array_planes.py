"""Two arrays on one boom with their rods at right angles.

Rods centred on a common boom do not couple across the two planes: the field of one rod along the other's axis is odd
about its centre. Each plane is solved apart; only the fields are put together.

Source: symmetry; polarisation ellipse from the Stokes parameters, textbook.
"""

import cmath
import math

from fabgen.frozen import frozen
from fabgen.physics.array import ArraySolution, RodArray, solve_array
from fabgen.physics.array_matrix import ETA_OHM


@frozen
class CrossedSolution:
    """Both planes of a crossed array at one frequency.

    Args:
        first: solution of the first plane, rods along y.
        second: solution of the second plane, rods along z.
        second_feed: feed voltage of the second plane over that of the first.
    """

    first: ArraySolution
    second: ArraySolution
    second_feed: complex

    def _fields(self, cosine: float) -> tuple[complex, complex]:
        """Fields of both planes along the boom with one phase origin."""
        later_mm = self.second.phase_station_mm - self.first.phase_station_mm
        turn = cmath.exp(1j * self.first.wavenumber_per_mm * cosine * later_mm)
        return self.first.field(cosine), self.second_feed * self.second.field(cosine) * turn

    @property
    def gain_dbi(self) -> float:
        """Forward gain of both polarisations together."""
        along_y, along_z = self._fields(1.0)
        power = self.first.feed_current_a.real + abs(self.second_feed) ** 2 * self.second.feed_current_a.real
        return 10 * math.log10(ETA_OHM * (abs(along_y) ** 2 + abs(along_z) ** 2) / (math.pi * power))

    @property
    def axial_ratio_db(self) -> float:
        """Axial ratio of the forward polarisation ellipse: 0 dB circular, infinite linear."""
        along_y, along_z = self._fields(1.0)
        total = abs(along_y) ** 2 + abs(along_z) ** 2
        circular = 2 * (along_y.conjugate() * along_z).imag
        linear = math.sqrt(max(total**2 - circular**2, 0.0))
        if total - linear <= 1e-12 * total:
            return math.inf
        return 10 * math.log10((total + linear) / (total - linear))


def solve_crossed(
    first: RodArray, second: RodArray, frequency_mhz: float, *, second_feed: complex = 1.0, segments: int = 4
) -> CrossedSolution:
    """Both planes of a crossed array.

    Args:
        first: rods along y; stations of both planes share one origin.
        second: rods along z.
        frequency_mhz: frequency.
        second_feed: feed voltage of the second plane over that of the first.
        segments: nodes per half rod.

    Returns:
        both solutions.

    Raises:
        ValueError: rods of the two planes touch at the boom's centre.
    """
    for station_mm, diameter_mm in zip(first.station_mm, first.diameter_mm, strict=True):
        for other_mm, other_diameter_mm in zip(second.station_mm, second.diameter_mm, strict=True):
            if abs(station_mm - other_mm) <= 0.5 * (diameter_mm + other_diameter_mm):
                raise ValueError(f"rods of the two planes touch at stations {station_mm} and {other_mm} mm")
    return CrossedSolution(
        first=solve_array(first, frequency_mhz, segments=segments),
        second=solve_array(second, frequency_mhz, segments=segments),
        second_feed=second_feed,
    )
