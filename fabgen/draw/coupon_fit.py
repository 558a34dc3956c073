"""Picture of a coupon's fit: both trim series, the curve of the free rod, and the same curve moved by the allowance."""

from fabgen.design.drawing import Sheet
from fabgen.draw.trim_chart import TrimCurve, trim_sheet
from fabgen.physics.coupon_fit import CouponFit, FittedCurve

_STEPS = 40
_SAID = {"re": "reflection, real part", "im": "reflection, imaginary part", "swr": "square of the reflection, from SWR"}


def fit_sheet(fit: CouponFit, mount: str, date: str) -> Sheet:
    """The picture.

    Args:
        fit: what was found.
        mount: the mount's name.
        date: of the measurement.
    """
    title = f"Mount {mount}, measured {date}: allowance {fit.allowance_mm:.3f} mm ± {2 * fit.u_mm:.3f} mm (95 %)"
    notes = (
        f"Rings, full line: free. Dots, dashed line: in its mount, the same curve moved by {fit.allowance_mm:.3f} mm.",
        f"The readings scatter {fit.residual_relative:.2f} times the stated noise about the curves.",
    )
    curves = [_curve(curve, fit.allowance_mm) for curve in fit.curves]
    return trim_sheet("coupon-fit", title, curves, notes)


def _curve(curve: FittedCurve, shift_mm: float) -> TrimCurve:
    channel = curve.channel
    points = list(zip(channel.length_mm, channel.reading_ratio, strict=True))
    free = tuple(point for point, mounted in zip(points, channel.mounted, strict=True) if not mounted)
    mounted = tuple(point for point, mounted in zip(points, channel.mounted, strict=True) if mounted)
    electrical = [mm for mm, _ in free] + [mm - shift_mm for mm, _ in mounted]
    low, high = min(electrical), max(electrical)
    lengths = [low + (high - low) * k / _STEPS for k in range(_STEPS + 1)]
    return TrimCurve(
        f"{_SAID[channel.name]}, {channel.frequency_mhz:g} MHz",
        free,
        mounted,
        tuple((mm, curve.at(mm)) for mm in lengths),
        tuple((mm + shift_mm, curve.at(mm)) for mm in lengths),
    )
