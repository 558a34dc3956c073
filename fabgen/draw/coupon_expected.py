"""Picture of the readings to expect: SWR and both parts of the reflection against the director's length."""

from collections.abc import Callable

from fabgen.design.coupon import CouponPlan, Expected
from fabgen.design.drawing import Point, Sheet
from fabgen.draw.trim_chart import TrimCurve, trim_sheet

_PARTS: tuple[tuple[str, Callable[[Expected], float]], ...] = (
    ("SWR at 50 ohm", lambda step: step.swr),
    ("reflection, real part", lambda step: step.reflection.real),
    ("reflection, imaginary part", lambda step: step.reflection.imag),
)


def expected_sheet(plan: CouponPlan) -> Sheet:
    """The picture.

    Args:
        plan: the coupon.
    """
    title = f"Coupon of mount {plan.mount}, {plan.number} {plan.revision}: what the feed should read"
    notes = (
        f"Full line: director free. Dashed: in its mount, if that takes {plan.allowance_mm:.2f} mm (theory).",
        "Computed for thin rods in free space: level and slope tell the right side of a minimum, not the last digit.",
    )
    curves = [
        _curve(plan, f"{name}, {mhz:g} MHz", part, mhz)
        for mhz in plan.frequencies_mhz
        for name, part in _PARTS[: 3 if mhz == plan.frequency_mhz else 1]
    ]
    return trim_sheet("expected", title, curves, notes)


def _curve(plan: CouponPlan, title: str, part: Callable[[Expected], float], mhz: float) -> TrimCurve:
    steps = [step for step in plan.expected if step.frequency_mhz == mhz]

    def line(setup: str) -> tuple[Point, ...]:
        return tuple((step.length_mm, part(step)) for step in steps if step.setup == setup)

    return TrimCurve(title, (), (), line("free"), line("mounted"))
