"""The procedure of a coupon in plain words: the text stands in `words/coupon`, the numbers come from the plan."""

from pathlib import Path

from fabgen.design.coupon import CouponPlan
from fabgen.design.design import Design

_TEXT = Path(__file__).parent / "words" / "coupon" / "procedure.txt"


def procedure(plan: CouponPlan, design: Design) -> bytes:
    """The procedure.

    Args:
        plan: the coupon.
        design: whose mount is measured.
    """
    boom = design.boom
    size = f"{boom.width_mm:g}" if boom.section != "rectangular" else f"{boom.width_mm:g} x {boom.height_mm:g}"
    wall = f" x {boom.wall_mm:g}" if boom.hollow else ", solid"
    heading = f"COUPON OF MOUNT {plan.mount}, {plan.number} {plan.revision}"
    steps = "".join(
        f"    step {count}: free {free:.1f} mm, mounted {mounted:.1f} mm\n"
        for count, (free, mounted) in enumerate(zip(plan.free_mm, plan.mounted_mm, strict=True), start=1)
    )
    text = _TEXT.read_text(encoding="utf-8").format(
        mount=plan.mount,
        number=plan.number,
        revision=plan.revision,
        underline="=" * len(heading),
        boom=f"{boom.section} {size}{wall} mm, {boom.material.name}",
        piece=f"{plan.piece_mm:g}",
        half=f"{plan.piece_mm / 2:g}",
        rod=f"{plan.rod_diameter_mm:g}",
        free_first=f"{plan.free_mm[0]:.1f}",
        mounted_first=f"{plan.mounted_mm[0]:.1f}",
        timber=f"{plan.timber_mm:g}",
        timber_length=f"{plan.timber_length_mm:.0f}",
        frequencies=", ".join(f"{mhz:g}" for mhz in plan.frequencies_mhz),
        clear=f"{2 * plan.wavelength_mm / 1000:.1f}",
        steps=steps.rstrip("\n"),
        stem=design.stem,
    )
    return text.encode("utf-8")
