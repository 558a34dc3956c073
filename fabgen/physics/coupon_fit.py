"""The allowance from two trim series of one director: the mounted series is the free one moved along the length axis.

Every reading of every frequency follows a quadratic of the rod's electrical length; the quadratics and the shift A are
fitted together by weighted least squares, with the covariance for u(A). Before that A is scanned over the whole
overlap of the two series, so that a second root is seen and refused, not chosen.

Source: separable least squares (G. H. Golub, V. Pereyra, SIAM J. Numer. Anal. 10, 1973, 413; from memory);
JCGM 100:2008 for u. The method: own study 2026, computed, unpublished.
"""

import math
from collections.abc import Sequence
from enum import Enum

import numpy as np
from numpy.typing import NDArray
from scipy.optimize import minimize_scalar

from fabgen.frozen import frozen

Floats = NDArray[np.float64]

FEWEST_STEPS = 5
"""Distinct lengths of one series: a quadratic, and something left to judge it by."""

LEAST_OVERLAP = 0.4
"""Part of the shorter series that must lie inside the other after the shift."""

LARGEST_RESIDUAL = 3.0
"""Residuals above so many times the stated noise are no noise."""

ROOTS_APART = 9.0
"""Least growth of χ² from the best root to the next: three standard deviations."""

HANDLING_U_MM = 0.07
"""U of what the readings do not show: rod length by vernier and station in the holder, 0.05 mm each; a judgement."""

_SCAN = 241


class Refusal(Enum):
    """Why readings give no allowance; the value is the sentence to print."""

    ONE_SWR = (
        "SWR at one frequency has a second root several millimetres away: read a second frequency or the complex "
        "reflection"
    )
    FEW_STEPS = f"a series needs at least {FEWEST_STEPS} lengths"
    SHORT_SPAN = "the lengths of a series are too close together to tell slope from noise"
    NO_OVERLAP = "the two series do not overlap: trim the one that is too long further"
    TWO_ROOTS = "two allowances fit about equally well: read another frequency, or more lengths"
    RESIDUALS = "the readings scatter far more than the stated noise: look for a loose rod, a moved cable, a wrong row"
    ZERO = "the allowance cannot be told from zero"


class CouponRefusedError(ValueError):
    """Readings that give no allowance.

    Args:
        refusal: why.
        detail: the figures.
    """

    def __init__(self, refusal: Refusal, detail: str = "") -> None:
        super().__init__(f"{refusal.value} ({detail})" if detail else refusal.value)
        self.refusal = refusal


@frozen
class Channel:
    """One real reading against length, in both set-ups.

    Attributes:
        name: what was read: `re`, `im`, or `swr` for the square of the reflection's magnitude that SWR stands for.
        frequency_mhz: at which frequency.
        length_mm: rod lengths.
        mounted: True where the rod sat in its mount.
        reading_ratio: the readings.
        noise_ratio: standard deviation of each.
    """

    name: str
    frequency_mhz: float
    length_mm: tuple[float, ...]
    mounted: tuple[bool, ...]
    reading_ratio: tuple[float, ...]
    noise_ratio: tuple[float, ...]


@frozen
class FittedCurve:
    """One channel's quadratic.

    Attributes:
        channel: what was fitted.
        middle_mm: electrical length at which the polynomial's argument is 0.
        scale_mm: length per unit of its argument.
        quadratic_ratio: coefficients of 1, x and x².
        residual_ratio: reading less curve, in the channel's order.
    """

    channel: Channel
    middle_mm: float
    scale_mm: float
    quadratic_ratio: tuple[float, float, float]
    residual_ratio: tuple[float, ...]

    def at(self, length_mm: float) -> float:
        """The reading of a free rod of some length."""
        x = (length_mm - self.middle_mm) / self.scale_mm
        c0, c1, c2 = self.quadratic_ratio
        return c0 + x * (c1 + x * c2)


@frozen
class CouponFit:
    """What two trim series say.

    Attributes:
        allowance_mm: the shift A.
        u_mm: its standard uncertainty: readings and handling.
        readings_u_mm: the part that follows from the readings' scatter.
        modelled_mm: free length at which A holds: the mounted electrical lengths, weighted by what each tells.
        residual_relative: root mean square residual over the stated noise.
        next_root_mm: the second best root, None where there is none.
        curves: the fitted quadratics.
    """

    allowance_mm: float
    u_mm: float
    readings_u_mm: float
    modelled_mm: float
    residual_relative: float
    next_root_mm: float | None
    curves: tuple[FittedCurve, ...]


@frozen
class _Series:
    """All channels as arrays, with the scale of their polynomials."""

    channels: tuple[Channel, ...]
    length: tuple[Floats, ...]
    mounted: tuple[Floats, ...]
    value: tuple[Floats, ...]
    weight: tuple[Floats, ...]
    middle: float
    scale: float

    @property
    def count(self) -> int:
        """Number of readings."""
        return sum(len(value) for value in self.value)

    def misfit(self, shifts: Floats) -> Floats:
        """χ² of the best quadratics for each of many shifts."""
        total = np.zeros(len(shifts))
        for length, mounted, value, weight in zip(self.length, self.mounted, self.value, self.weight, strict=True):
            x = (length - shifts[:, None] * mounted - self.middle) / self.scale
            base = np.stack([np.ones_like(x), x, x * x], axis=2) * weight[:, None]
            q, _ = np.linalg.qr(base)
            weighted = value * weight
            part = np.einsum("gik,i->gk", q, weighted)
            total += weighted @ weighted - np.einsum("gk,gk->g", part, part)
        return total


def fit_trim_series(channels: Sequence[Channel]) -> CouponFit:
    """Fit both trim series together.

    Args:
        channels: every reading; each channel holds both set-ups.

    Returns:
        The allowance with its uncertainty and the curves.

    Raises:
        CouponRefusedError: the readings do not settle it.
    """
    _judge_kind(channels)
    series = _series(channels)
    free, mounted = _span(channels, False), _span(channels, True)
    shorter = min(free[1] - free[0], mounted[1] - mounted[0])
    low, high = mounted[0] - free[1] + LEAST_OVERLAP * shorter, mounted[1] - free[0] - LEAST_OVERLAP * shorter
    shifts = np.linspace(low, high, _SCAN)
    misfit = series.misfit(shifts)
    inside = np.flatnonzero((misfit[1:-1] <= misfit[:-2]) & (misfit[1:-1] < misfit[2:])) + 1
    roots = sorted(_refined(series, shifts, int(index)) for index in inside)
    edge = float(min(misfit[0], misfit[-1]))
    if not roots or edge < min(chi2 for chi2, _ in roots):
        raise CouponRefusedError(Refusal.NO_OVERLAP, f"tried {low:.1f} to {high:.1f} mm")
    chi2, shift = roots[0]
    degrees = series.count - 3 * len(channels) - 1
    relative = math.sqrt(chi2 / degrees)
    if relative > LARGEST_RESIDUAL:
        raise CouponRefusedError(Refusal.RESIDUALS, f"{relative:.1f} times the noise at {shift:.2f} mm")
    inflation = max(1.0, relative) ** 2
    rivals = [root for other, root in roots[1:] if other - chi2 < ROOTS_APART * inflation]
    if rivals:
        raise CouponRefusedError(Refusal.TWO_ROOTS, f"{shift:.2f} and {rivals[0]:.2f} mm")
    if edge - chi2 < ROOTS_APART * inflation:
        raise CouponRefusedError(Refusal.TWO_ROOTS, f"{shift:.2f} mm and beyond the overlap")
    curves = tuple(_curve(series, index, shift) for index in range(len(channels)))
    readings_u, modelled = _covariance(series, curves, shift)
    readings_u *= math.sqrt(inflation)
    u = math.hypot(readings_u, HANDLING_U_MM)
    if shift < 2 * u:
        raise CouponRefusedError(Refusal.ZERO, f"{shift:.2f} mm with u {u:.2f} mm")
    return CouponFit(shift, u, readings_u, modelled, relative, roots[1][1] if len(roots) > 1 else None, curves)


def _judge_kind(channels: Sequence[Channel]) -> None:
    """Refuse what cannot have one root, and series that are too poor to fit."""
    kinds = {channel.name for channel in channels}
    if kinds == {"swr"} and len({channel.frequency_mhz for channel in channels}) < 2:
        raise CouponRefusedError(Refusal.ONE_SWR)
    for channel in channels:
        for mounted in (False, True):
            lengths = {mm for mm, where in zip(channel.length_mm, channel.mounted, strict=True) if where is mounted}
            if len(lengths) < FEWEST_STEPS:
                setup = "mounted" if mounted else "free"
                raise CouponRefusedError(
                    Refusal.FEW_STEPS, f"{setup}, {channel.frequency_mhz:g} MHz: {len(lengths)} lengths"
                )
            if max(lengths) - min(lengths) < 0.01 * max(lengths):
                raise CouponRefusedError(Refusal.SHORT_SPAN, f"{max(lengths) - min(lengths):.1f} mm")


def _span(channels: Sequence[Channel], mounted: bool) -> tuple[float, float]:
    """Shortest and longest rod of one set-up."""
    lengths = [mm for c in channels for mm, where in zip(c.length_mm, c.mounted, strict=True) if where is mounted]
    return min(lengths), max(lengths)


def _series(channels: Sequence[Channel]) -> _Series:
    low, high = _span(channels, False)
    return _Series(
        tuple(channels),
        tuple(np.array(channel.length_mm) for channel in channels),
        tuple(np.array(channel.mounted, dtype=np.float64) for channel in channels),
        tuple(np.array(channel.reading_ratio) for channel in channels),
        tuple(1 / np.array(channel.noise_ratio) for channel in channels),
        (low + high) / 2,
        (high - low) / 2,
    )


def _refined(series: _Series, shifts: Floats, index: int) -> tuple[float, float]:
    """χ² and shift of one root."""
    found = minimize_scalar(
        lambda shift: float(series.misfit(np.array([shift]))[0]),
        bounds=(float(shifts[index - 1]), float(shifts[index + 1])),
        method="bounded",
        options={"xatol": 1e-5},
    )
    return float(found.fun), float(found.x)


def _curve(series: _Series, index: int, shift: float) -> FittedCurve:
    x = (series.length[index] - shift * series.mounted[index] - series.middle) / series.scale
    base = np.stack([np.ones_like(x), x, x * x], axis=1)
    weight = series.weight[index]
    found, *_ = np.linalg.lstsq(base * weight[:, None], series.value[index] * weight, rcond=None)
    c0, c1, c2 = (float(value) for value in found)
    residual = tuple(float(value) for value in series.value[index] - base @ found)
    return FittedCurve(series.channels[index], series.middle, series.scale, (c0, c1, c2), residual)


def _covariance(series: _Series, curves: Sequence[FittedCurve], shift: float) -> tuple[float, float]:
    """Uncertainty of the shift from the readings' noise, and the length at which it holds."""
    information, moment, weights = 0.0, 0.0, 0.0
    for index, curve in enumerate(curves):
        electrical = series.length[index] - shift * series.mounted[index]
        x = (electrical - series.middle) / series.scale
        weight = series.weight[index]
        slope = (curve.quadratic_ratio[1] + 2 * curve.quadratic_ratio[2] * x) / series.scale
        told = -slope * series.mounted[index] * weight
        q, _ = np.linalg.qr(np.stack([np.ones_like(x), x, x * x], axis=1) * weight[:, None])
        rest = told - q @ (q.T @ told)
        information += float(rest @ rest)
        moment += float((told**2) @ electrical)
        weights += float(told @ told)
    return 1 / math.sqrt(information), moment / weights
