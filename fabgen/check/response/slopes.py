"""What a millimetre costs, from the exact derivatives of the drawn array."""

import numpy as np

from fabgen.check.response.arrays import step_up
from fabgen.check.response.gauge import Gauge, Outcomes
from fabgen.design.limits import Limits
from fabgen.design.response import Quantity, Sensitivity
from fabgen.frozen import frozen
from fabgen.physics.array import RodArray
from fabgen.physics.array_gradient import ArrayGradient, gradient_band
from fabgen.physics.thin_rod_kernel import ComplexArray, FloatArray

_KINDS: tuple[Quantity, Quantity] = ("length", "station")


@frozen
class Slopes:
    """First-order response of an array; quantities are all lengths, then all stations.

    Args:
        gain_dbi, back_front, impedance_ohm: of the array, by frequencies.
        gain_db_per_mm, back_front_per_mm, impedance_ohm_per_mm: quantities by frequencies.
        shift_khz_per_mm: one entry per quantity.
    """

    gauge: Gauge
    gain_dbi: FloatArray
    back_front: ComplexArray
    impedance_ohm: ComplexArray
    gain_db_per_mm: FloatArray
    back_front_per_mm: ComplexArray
    impedance_ohm_per_mm: ComplexArray
    shift_khz_per_mm: FloatArray

    def judge(self, change_mm: FloatArray) -> Outcomes:
        """Builds to first order; `change_mm` is builds by quantities."""
        return self.gauge.judge(
            self.gain_dbi + change_mm @ self.gain_db_per_mm,
            self.back_front + change_mm @ self.back_front_per_mm,
            self.impedance_ohm + change_mm @ self.impedance_ohm_per_mm,
        )

    def weights(self, limits: Limits) -> FloatArray:
        """What a millimetre of each quantity takes of the room that the limits leave, one entry per quantity.

        For each limit the change at the worst frequency of the band over the distance to the limit there; the limits
        are added in quadrature. The front-to-back ratio counts as a field, mismatch as a reflection.
        """
        band, case = self.gauge.in_band, self.gauge.case
        square = np.zeros(self.shift_khz_per_mm.size)
        if limits.shift_khz is not None:
            square += (self.shift_khz_per_mm / limits.shift_khz) ** 2
        if limits.gain_loss_db is not None:
            square += (np.abs(self.gain_db_per_mm[:, band]).max(axis=1) / limits.gain_loss_db) ** 2
        if limits.front_to_back_db is not None:
            room = _room(10 ** (-limits.front_to_back_db / 20), np.abs(self.back_front[band]))
            square += (np.abs(self.back_front_per_mm[:, band]) / room).max(axis=1) ** 2
        if limits.mismatch is not None:
            most = (limits.mismatch - 1) / (limits.mismatch + 1)
            total = step_up(case) * self.impedance_ohm[band] + case.reference_ohm
            reflection = (total - 2 * case.reference_ohm) / total
            slope = 2 * case.reference_ohm * step_up(case) * self.impedance_ohm_per_mm[:, band] / total**2
            square += (np.abs(slope) / _room(most, np.abs(reflection))).max(axis=1) ** 2
        return np.sqrt(square)


def _room(most: float, now: FloatArray) -> FloatArray:
    """How far a size is from its limit; where it is past it, a tenth of the limit, so that weights stay finite."""
    return np.maximum(most - now, 0.1 * most)


def slopes(gauge: Gauge, array: RodArray) -> Slopes:
    """Response and derivatives of an array at the gauge's frequencies."""
    gradients = gradient_band(array, gauge.frequency_mhz)
    own = gauge.shift.frequency_mhz.size
    gain = np.concatenate([_rows(gradients, kind, "gain_db_per_mm") for kind in _KINDS])
    back_front = np.concatenate([_rows(gradients, kind, "back_front_per_mm") for kind in _KINDS])
    return Slopes(
        gauge=gauge,
        gain_dbi=np.array([gradient.solution.gain_dbi for gradient in gradients]),
        back_front=np.array([gradient.solution.back_front for gradient in gradients]),
        impedance_ohm=np.array([gradient.solution.feed_impedance_ohm for gradient in gradients]),
        gain_db_per_mm=gain.real,
        back_front_per_mm=back_front,
        impedance_ohm_per_mm=np.concatenate([_rows(gradients, kind, "feed_impedance_ohm_per_mm") for kind in _KINDS]),
        shift_khz_per_mm=gauge.shift.per_mm(gain.real[:, :own], back_front[:, :own]).shift_khz,
    )


def _rows(gradients: tuple[ArrayGradient, ...], kind: Quantity, name: str) -> ComplexArray:
    """One derivative, elements by frequencies."""
    return np.array([getattr(getattr(gradient, kind), name) for gradient in gradients], dtype=np.complex128).T


def sensitivities(found: Slopes) -> tuple[Sensitivity, ...]:
    """Length, then station, of every element in order of station."""
    case, band = found.gauge.case, found.gauge.in_band
    count = len(case.element)
    at = int(np.flatnonzero(found.gauge.frequency_mhz == case.frequency_mhz)[-1])
    impedance = step_up(case) * complex(found.impedance_ohm[at])
    rows = []
    for index, element in enumerate(case.element):
        for kind, place in zip(_KINDS, (index, count + index), strict=True):
            to_impedance = step_up(case) * complex(found.impedance_ohm_per_mm[place, at])
            to_gain = float(found.gain_db_per_mm[place, at])
            rows.append(
                Sensitivity(
                    element=element,
                    quantity=kind,
                    shift_khz_per_mm=_plain(found.shift_khz_per_mm[place], 2),
                    gain_db_per_mm=_plain(to_gain, 5),
                    back_front_per_mm=_plain(abs(found.back_front_per_mm[place, at]), 6),
                    r_ohm_per_mm=_plain(to_impedance.real, 4),
                    x_ohm_per_mm=_plain(to_impedance.imag, 4),
                    signal_db_per_mm=_plain(to_gain + _match_db_per_mm(impedance, to_impedance, case.reference_ohm), 5),
                    loss_db_per_mm=_plain(np.abs(found.gain_db_per_mm[place, band]).max(), 5),
                )
            )
    return tuple(rows)


def _match_db_per_mm(impedance_ohm: complex, per_mm: complex, reference_ohm: float) -> float:
    """Change of the power that passes the feed, 4 r Z0 / |z + Z0|^2, in dB."""
    passes = per_mm.real / impedance_ohm.real - 2 * (per_mm / (impedance_ohm + reference_ohm)).real
    return float(10 / np.log(10) * passes)


def _plain(number: float | np.floating, decimals: int) -> float:
    return round(float(number), decimals) + 0.0
