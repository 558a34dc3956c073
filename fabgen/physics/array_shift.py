"""How far a build is detuned: the frequency shift that best explains its response, and what it leaves unexplained.

The build's gain G and complex back/front ratio r are compared with those of the design moved along the axis of ln f:

    delta = argmin of mean over the band of [((G - G0(f e^-delta)) / 0.05 dB)^2 + |r - r0(f e^-delta)|^2 / 0.01^2]

A shift never stands alone: a build may be changed without being shifted. The residual is the root of the mean that
remains, 1 being a typical miss of 0.05 dB of gain together with 0.01 of back/front field.

Source: own study 2026, computed, unpublished.
"""

import math

import numpy as np
from numpy.typing import NDArray
from scipy.interpolate import CubicSpline

from fabgen.frozen import frozen
from fabgen.physics.array import RodArray, solve_band
from fabgen.physics.thin_rod_kernel import ComplexArray, FloatArray

HALF_BAND = 0.015
"""The band is widened by this fraction on each side."""
GAIN_UNIT_DB = 0.05
BACK_FRONT_UNIT = 0.01
REACH = 0.03
"""Largest shift looked for, as a fraction of the frequency."""


@frozen
class Shift:
    """Detuning of builds; every array has one entry per build.

    Args:
        shift_khz: displacement of the response at the design frequency; negative is low.
        residual: what a shift does not explain, see the module docstring.
        residual_gain_db: root mean square of the unexplained gain.
        residual_back_front: root mean square of the unexplained back/front field.
        at_limit: the shift lies at the end of the range searched and means nothing.
    """

    shift_khz: FloatArray
    residual: FloatArray
    residual_gain_db: FloatArray
    residual_back_front: FloatArray
    at_limit: NDArray[np.bool_]


@frozen
class ShiftGauge:
    """The design's response, ready to measure builds against.

    Args:
        centre_mhz: design frequency; shifts are stated there.
        frequency_mhz: where builds must be solved.
        spline: gain over its unit, real and imaginary back/front over its unit, against ln f.
    """

    centre_mhz: float
    frequency_mhz: FloatArray
    spline: CubicSpline

    def measure(self, gain_dbi: FloatArray, back_front: ComplexArray) -> Shift:
        """Detuning of builds.

        Args:
            gain_dbi: gain at `frequency_mhz`, one build or builds by frequencies.
            back_front: complex back/front ratio likewise.

        Returns:
            one entry per build.
        """
        found = _in_units(np.atleast_2d(gain_dbi), np.atleast_2d(back_front))
        log_f = np.log(self.frequency_mhz)
        trials = np.linspace(-REACH, REACH, 41)
        at_trial = self.spline(log_f - trials[:, None])
        weight = _weights(log_f.size)
        cost = np.array([((found - design) ** 2).sum(axis=2) @ weight for design in at_trial])
        delta = trials[np.argmin(cost, axis=0)]
        slope = self.spline.derivative()
        for _ in range(12):
            place = log_f - delta[:, None]
            miss = found - self.spline(place)
            rate = -slope(place)
            step = ((rate * miss).sum(axis=2) @ weight) / ((rate * rate).sum(axis=2) @ weight)
            delta = np.clip(delta + step, -REACH, REACH)
            if np.max(np.abs(step)) < 1e-12:
                break
        miss = found - self.spline(log_f - delta[:, None])
        square = np.einsum("bfq,f->bq", miss**2, weight)
        return Shift(
            shift_khz=1e3 * self.centre_mhz * np.expm1(delta),
            residual=np.sqrt(square.sum(axis=1)),
            residual_gain_db=GAIN_UNIT_DB * np.sqrt(square[:, 0]),
            residual_back_front=BACK_FRONT_UNIT * np.sqrt(square[:, 1] + square[:, 2]),
            at_limit=np.abs(delta) > 0.999 * REACH,
        )

    def per_mm(self, gain_db_per_mm: FloatArray, back_front_per_mm: ComplexArray) -> Shift:
        """Shift and residual per millimetre, to first order.

        Args:
            gain_db_per_mm: change of the gain, quantities by frequencies.
            back_front_per_mm: change of the back/front ratio likewise.

        Returns:
            one entry per quantity, everything per millimetre.
        """
        change = _in_units(np.atleast_2d(gain_db_per_mm), np.atleast_2d(back_front_per_mm))
        rate = -self.spline.derivative()(np.log(self.frequency_mhz))
        weight = _weights(self.frequency_mhz.size)
        delta = ((rate * change).sum(axis=2) @ weight) / ((rate * rate).sum(axis=1) @ weight)
        square = np.einsum("bfq,f->bq", (change - delta[:, None, None] * rate) ** 2, weight)
        return Shift(
            shift_khz=1e3 * self.centre_mhz * delta,
            residual=np.sqrt(square.sum(axis=1)),
            residual_gain_db=GAIN_UNIT_DB * np.sqrt(square[:, 0]),
            residual_back_front=BACK_FRONT_UNIT * np.sqrt(square[:, 1] + square[:, 2]),
            at_limit=np.zeros(delta.shape, dtype=np.bool_),
        )


def _weights(points: int) -> FloatArray:
    """Weights of a mean over evenly spaced frequencies, both ends counted half: more points give the same mean."""
    weight = np.full(points, 1 / (points - 1))
    weight[[0, -1]] /= 2
    return weight


def _in_units(gain_db: FloatArray, back_front: ComplexArray) -> FloatArray:
    """Gain and back/front over their units; last axis gain, real, imaginary."""
    return np.stack(
        [gain_db / GAIN_UNIT_DB, back_front.real / BACK_FRONT_UNIT, back_front.imag / BACK_FRONT_UNIT], axis=-1
    )


def shift_gauge(
    array: RodArray,
    centre_mhz: float,
    *,
    low_mhz: float | None = None,
    high_mhz: float | None = None,
    points: int = 31,
) -> ShiftGauge:
    """Gauge for builds of an array.

    Args:
        array: the design.
        centre_mhz: design frequency.
        low_mhz: lower end of the design band; the design frequency when left out.
        high_mhz: upper end likewise. Both ends are widened by `HALF_BAND`.
        points: frequencies at which builds are compared.

    Returns:
        the gauge.
    """
    low = math.log((low_mhz or centre_mhz) * (1 - HALF_BAND))
    high = math.log((high_mhz or centre_mhz) * (1 + HALF_BAND))
    step = (high - low) / (points - 1)
    beyond = math.ceil(REACH / step)
    wide_mhz = np.exp(low + step * np.arange(-beyond, points + beyond))
    design = solve_band(array, wide_mhz)
    return ShiftGauge(
        centre_mhz=centre_mhz,
        frequency_mhz=np.exp(np.linspace(low, high, points)),
        spline=CubicSpline(np.log(wide_mhz), _in_units(design.gain_dbi, design.back_front)),
    )


def build_shift(gauge: ShiftGauge, build: RodArray) -> Shift:
    """Detuning of one build, solved anew.

    Args:
        gauge: of the design.
        build: the array as built.

    Returns:
        one entry.
    """
    response = solve_band(build, gauge.frequency_mhz)
    return gauge.measure(response.gain_dbi, response.back_front)
