"""The text files of a coupon package: the test array as a design file, the sheet of readings, the expected readings."""

import cmath
import math

from fabgen.design.coupon import REAR_MM, CouponPlan, Expected
from fabgen.design.design import Design
from fabgen.design.readings import COLUMNS, REFLECTION_NOISE, SWR_NOISE
from fabgen.export.csv_table import csv_bytes

EXPECTED_COLUMNS = ("setup", "step", "length_mm", "frequency_mhz", "re", "im", "magnitude", "phase_deg", "swr")


def test_array_yaml(plan: CouponPlan, design: Design) -> bytes:
    """The three-rod test array: a design file of its own.

    Args:
        plan: the coupon.
        design: whose shop and printer make it.
    """
    shop, printer = design.shop, design.printer
    reflector, driven, director = plan.at_mm
    bed = ", ".join(f"{side:g} mm" for side in printer.bed_mm)
    driven_rod = f", rod: {plan.driven_diameter_mm:g} mm" if plan.driven_diameter_mm != plan.rod_diameter_mm else ""
    lines = [
        f"# Test array of the coupon of mount {plan.mount}, {plan.number} {plan.revision}: its director is laid into a",
        "# coupon holder that stands where its saddle would, and is trimmed free and in its mount.",
        "fabgen: 1",
        f"title: Test array for mount {plan.mount}",
        f"number: {plan.number[:36]}-TA",
        f"revision: {plan.revision}",
        f"frequency: {plan.frequency_mhz:g} MHz",
        "units: mm",
        "boom:",
        "  section: square",
        f"  outside: {plan.timber_mm:g} mm",
        "  material: spruce",
        f"  overhang: {{rear: {REAR_MM:g} mm, front: {plan.front_mm:g} mm}}",
        "mounts:",
        "  stand:",
        "    style: on-top",
        f"    saddle: {{height: {plan.height_mm:g} mm}}",
        f"rods: {{diameter: {plan.rod_diameter_mm:g} mm, material: {plan.material}}}",
        "elements:",
        f"  - {{id: R, role: reflector, at: {reflector:g}, length: {plan.reflector_mm:g}}}",
        f"  - {{id: DE, role: driven, at: {driven:g}, length: {plan.driven_mm:g}, mount: feed}}",
        f"  - {{id: D1, role: director, at: {director:g}, length: {plan.free_mm[0]:g}}}",
        "feed:",
        f"  {{kind: straight-dipole, gap: 10 mm, height: {plan.height_mm:g} mm, cable: 5 mm{driven_rod}}}",
        f"shop: {{cut_step: {shop.cut_step_mm:g} mm, drills: {shop.drills}, paper: {shop.paper}}}",
        f"printer: {{bed: [{bed}], nozzle: {printer.nozzle_mm:g} mm, hole_growth: {printer.hole_growth_mm:g} mm}}",
    ]
    return ("\n".join(lines) + "\n").encode("utf-8")


def readings_csv(plan: CouponPlan) -> bytes:
    """The sheet to fill in: one row per set-up, step and frequency; one kind of reading in each row."""
    head = [
        f"#mount,{plan.mount}",
        f"#mount_key,{plan.mount_key}",
        f"#boom_piece_mm,{plan.piece_mm:.3f}",
        f"#reflection_noise,{REFLECTION_NOISE:g}",
        f"#swr_noise,{SWR_NOISE:g}",
    ]
    rows = ((step.setup, step.step, f"{step.length_mm:.3f}", f"{step.frequency_mhz:.3f}") for step in plan.expected)
    table = csv_bytes(COLUMNS, [(*row, "", "", "", "", "") for row in rows])
    return ("\n".join(head) + "\n").encode("utf-8") + table


def expected_csv(plan: CouponPlan) -> bytes:
    """What the feed should read at every step."""
    return csv_bytes(EXPECTED_COLUMNS, [_expected(step) for step in plan.expected])


def _expected(step: Expected) -> tuple[str, ...]:
    size, angle = cmath.polar(step.reflection)
    return (
        step.setup, f"{step.step}", f"{step.length_mm:.3f}", f"{step.frequency_mhz:.3f}", f"{step.reflection.real:.3f}",
        f"{step.reflection.imag:.3f}", f"{size:.3f}", f"{math.degrees(angle):.1f}", f"{step.swr:.2f}",
    )  # fmt: skip
