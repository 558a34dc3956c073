"""Arrays of thin parallel rods in free space, one rod fed at its centre: feed impedance, gain, back/front ratio.

Piecewise sinusoidal Galerkin moment method: the rods lie across the boom with their centres on it, `station_mm` is
measured along the boom, forward is towards growing station. Rods in a plane at right angles do not couple with these
when both planes are centred on the boom: solve each plane as an array of its own.

What the model holds: straight rods in free space. Not modelled: boom and mounts, mast, ground, feed line.

Source: J. H. Richmond's piecewise sinusoidal Galerkin method (from memory); mesh and end extension: own study 2026,
computed, unpublished.
"""

import math
from collections.abc import Sequence
from enum import Enum
from itertools import pairwise

import numpy as np

from fabgen.frozen import frozen
from fabgen.physics.array_loss import RodLoss, impedance_matrix, rod_loss
from fabgen.physics.array_matrix import (
    ETA_OHM,
    Bases,
    bases,
    mutual_and_self,
)
from fabgen.physics.blas_threads import one_blas_thread
from fabgen.physics.thin_rod_kernel import NODES, ComplexArray, FloatArray
from fabgen.units import SPEED_OF_LIGHT_M_S

LIGHT_MM_MHZ = SPEED_OF_LIGHT_M_S / 1000
"""Wavelength in mm times frequency in MHz."""

STRAINED_WL = 0.01
RELATIVE_ONLY_WL = 0.015
ABSOLUTE_FREQUENCY_UNCERTAINTY = 0.003
"""Fraction: no absolute centre frequency from this model is better than that."""


class ThinRodRange(Enum):
    """How far the thin-rod model carries for the fattest rod of an array."""

    WITHIN = f"Rods are thin enough; an absolute frequency still means +-{ABSOLUTE_FREQUENCY_UNCERTAINTY:.1%}."
    STRAINED = f"A rod is thicker than {STRAINED_WL} wavelengths: absolute values are less certain."
    RELATIVE_ONLY = (
        f"A rod is thicker than {RELATIVE_ONLY_WL} wavelengths: differences between builds only, no absolute values."
    )

    @property
    def absolute_values_hold(self) -> bool:
        """False when only differences may be stated."""
        return self is not ThinRodRange.RELATIVE_ONLY


@frozen
class RodArray:
    """Parallel rods on one axis, one of them fed at its centre.

    Args:
        station_mm: rod positions along the boom, forward positive, any origin and order.
        length_mm: electrical (free) lengths, tip to tip.
        diameter_mm: rod diameters.
        fed_index: which rod is fed.
        conductivity_s_per_m: of all rods, in S/m; infinite for perfect conductors.

    Raises:
        ValueError: counts differ, a length is not positive, two rods touch, or `fed_index` names no rod.
    """

    station_mm: tuple[float, ...]
    length_mm: tuple[float, ...]
    diameter_mm: tuple[float, ...]
    fed_index: int
    conductivity_s_per_m: float = math.inf

    def __post_init__(self) -> None:
        count = len(self.station_mm)
        if not count == len(self.length_mm) == len(self.diameter_mm):
            raise ValueError("station_mm, length_mm and diameter_mm must have one entry per rod")
        if not 0 <= self.fed_index < count:
            raise ValueError(f"fed_index {self.fed_index} names none of {count} rods")
        values = (*self.station_mm, *self.length_mm, *self.diameter_mm)
        if not all(math.isfinite(value) for value in values):
            raise ValueError("stations, lengths and diameters must be finite")
        if min(self.diameter_mm) <= 0 or any(
            length <= diameter for length, diameter in zip(self.length_mm, self.diameter_mm, strict=True)
        ):
            raise ValueError("every rod needs a positive diameter and a length above its diameter")
        if not self.conductivity_s_per_m > 0:
            raise ValueError("conductivity_s_per_m must be positive")
        order = sorted(range(count), key=lambda index: self.station_mm[index])
        for rear, front in pairwise(order):
            apart_mm = self.station_mm[front] - self.station_mm[rear]
            if apart_mm <= 0.5 * (self.diameter_mm[rear] + self.diameter_mm[front]):
                raise ValueError(f"rods {rear} and {front} touch: stations {apart_mm} mm apart")

    @property
    def count(self) -> int:
        """Number of rods."""
        return len(self.station_mm)

    def thin_rod_range(self, frequency_mhz: float) -> ThinRodRange:
        """What may be stated about this array at a frequency.

        Args:
            frequency_mhz: frequency.

        Returns:
            the range of the fattest rod.
        """
        fattest_wl = max(self.diameter_mm) * frequency_mhz / LIGHT_MM_MHZ
        if fattest_wl > RELATIVE_ONLY_WL:
            return ThinRodRange.RELATIVE_ONLY
        return ThinRodRange.STRAINED if fattest_wl > STRAINED_WL else ThinRodRange.WITHIN


@frozen
class ArraySolution:
    """Currents of an array at one frequency for 1 V at the feed, and what follows from them.

    Args:
        array: the array solved.
        frequency_mhz: frequency.
        current_a: currents at the nodes but the tips, rods by nodes, per volt at the feed.
        moment_a: currents times pattern weight seen broadside to each rod, one per rod.
        lost_fraction: part of the input power lost in the rods.
        segments: nodes per half rod.
    """

    array: RodArray
    frequency_mhz: float
    current_a: ComplexArray
    moment_a: ComplexArray
    lost_fraction: float
    segments: int

    @property
    def wavenumber_per_mm(self) -> float:
        """2 pi over the wavelength."""
        return 2 * math.pi * self.frequency_mhz / LIGHT_MM_MHZ

    @property
    def phase_station_mm(self) -> float:
        """Phase origin of far fields: the fed rod, so that a shift of the whole array changes nothing."""
        return self.array.station_mm[self.array.fed_index]

    @property
    def feed_current_a(self) -> complex:
        """Current into the fed rod per volt."""
        return complex(self.current_a[self.array.fed_index, 0])

    @property
    def feed_impedance_ohm(self) -> complex:
        """Impedance at the centre of the fed rod."""
        return 1 / self.feed_current_a

    @property
    def efficiency(self) -> float:
        """Radiated power over input power."""
        return 1 - self.lost_fraction

    @property
    def thin_rod_range(self) -> ThinRodRange:
        """What may be stated about this array."""
        return self.array.thin_rod_range(self.frequency_mhz)

    def field(self, cosine: float) -> complex:
        """Far field in the plane across the rods, per volt, as an equivalent current.

        Args:
            cosine: cosine of the angle from forward.

        Returns:
            sum of rod moments with their phases; the gain is eta |field|^2 / (pi Re(feed current)).
        """
        ahead = np.asarray(self.array.station_mm) - self.phase_station_mm
        return complex(self.moment_a @ np.exp(1j * self.wavenumber_per_mm * cosine * ahead))

    def gain_of(self, field_a: complex) -> float:
        """Gain as a ratio over an isotropic radiator, rod loss included.

        Args:
            field_a: far field as given by `field`.

        Returns:
            power ratio.
        """
        return ETA_OHM * abs(field_a) ** 2 / (math.pi * self.feed_current_a.real)

    @property
    def gain_dbi(self) -> float:
        """Forward gain, rod loss included, mismatch not."""
        return 10 * math.log10(self.gain_of(self.field(1.0)))

    @property
    def back_front(self) -> complex:
        """Field backward over field forward, phase referred to the fed rod."""
        return self.field(-1.0) / self.field(1.0)

    @property
    def front_to_back_db(self) -> float:
        """Forward over backward gain. Exaggerates near a null: compare builds by `back_front`."""
        return -20 * math.log10(abs(self.back_front))


def mismatch(impedance_ohm: ComplexArray, reference_ohm: float) -> FloatArray:
    """Standing wave ratio of impedances.

    Args:
        impedance_ohm: impedances, any shape.
        reference_ohm: impedance they are referred to.

    Returns:
        SWR, 1 for a perfect match.
    """
    reflection = np.abs((impedance_ohm - reference_ohm) / (impedance_ohm + reference_ohm))
    return np.asarray((1 + reflection) / (1 - reflection))


@frozen
class BandResponse:
    """Response of one array over a band; one entry per frequency.

    Args:
        frequency_mhz: frequencies, rising.
        gain_dbi: forward gain.
        back_front: field backward over field forward, phase referred to the fed rod.
        feed_impedance_ohm: impedance at the centre of the fed rod.
        thin_rod_range: what may be stated, judged at the highest frequency.
    """

    frequency_mhz: FloatArray
    gain_dbi: FloatArray
    back_front: ComplexArray
    feed_impedance_ohm: ComplexArray
    thin_rod_range: ThinRodRange

    @property
    def front_to_back_db(self) -> FloatArray:
        """Forward over backward gain."""
        return np.asarray(-20 * np.log10(np.abs(self.back_front)))

    def mismatch(self, reference_ohm: float = 50.0) -> FloatArray:
        """Standing wave ratio at the feed.

        Args:
            reference_ohm: impedance the feed is referred to.

        Returns:
            SWR, 1 for a perfect match.
        """
        return mismatch(self.feed_impedance_ohm, reference_ohm)


def solve_array(array: RodArray, frequency_mhz: float, *, segments: int = 4) -> ArraySolution:
    """Currents and response of an array at one frequency.

    Args:
        array: the rods.
        frequency_mhz: frequency.
        segments: nodes per half rod; a key of `NODES`.

    Returns:
        the solution.

    Raises:
        ValueError: unknown `segments`, or a frequency that is not positive.
    """
    if segments not in NODES:
        raise ValueError(f"segments must be one of {sorted(NODES)}")
    if not frequency_mhz > 0:
        raise ValueError("frequency_mhz must be positive")
    k_per_mm = 2 * math.pi * frequency_mhz / LIGHT_MM_MHZ
    basis = bases(array.length_mm, array.diameter_mm, k_per_mm, segments)
    potentials = mutual_and_self(basis, array.station_mm, array.diameter_mm, k_per_mm)
    loss = rod_loss(basis, array.diameter_mm, k_per_mm, frequency_mhz, array.conductivity_s_per_m)
    matrix = impedance_matrix(basis, potentials, loss)
    drive = np.zeros(matrix.shape[0], dtype=np.complex128)
    drive[array.fed_index * segments] = 1.0
    with one_blas_thread():
        current = np.asarray(np.linalg.solve(matrix, drive), dtype=np.complex128)
    return solution_from_current(array, frequency_mhz, basis, loss, current)


def solution_from_current(
    array: RodArray, frequency_mhz: float, basis: Bases, loss: RodLoss | None, current: ComplexArray
) -> ArraySolution:
    """The solution that currents at 1 V belong to.

    Args:
        array: the rods.
        frequency_mhz: frequency.
        basis: their basis functions.
        loss: their surface loss.
        current: currents, rods by bases or flat.

    Returns:
        the solution.
    """
    by_rod = current.reshape(array.count, basis.segments)
    lost = 0.0
    if loss is not None:
        dissipated = np.einsum("im,imn,in->", by_rod.conj(), loss.value_ohm.real, by_rod).real
        lost = float(dissipated / by_rod[array.fed_index, 0].real)
    return ArraySolution(
        array=array,
        frequency_mhz=frequency_mhz,
        current_a=by_rod,
        moment_a=np.einsum("in,in->i", by_rod, basis.moment),
        lost_fraction=lost,
        segments=basis.segments,
    )


def solve_band(array: RodArray, frequency_mhz: Sequence[float] | FloatArray, *, segments: int = 4) -> BandResponse:
    """Response of an array over a band.

    Args:
        array: the rods.
        frequency_mhz: frequencies.
        segments: nodes per half rod.

    Returns:
        one entry per frequency.
    """
    solutions = [solve_array(array, float(value), segments=segments) for value in frequency_mhz]
    return BandResponse(
        frequency_mhz=np.array([solution.frequency_mhz for solution in solutions]),
        gain_dbi=np.array([solution.gain_dbi for solution in solutions]),
        back_front=np.array([solution.back_front for solution in solutions]),
        feed_impedance_ohm=np.array([solution.feed_impedance_ohm for solution in solutions]),
        thin_rod_range=array.thin_rod_range(max(solution.frequency_mhz for solution in solutions)),
    )
