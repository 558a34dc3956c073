"""Do keepers grip their rods without cracking?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.design.arranged import Arranged
from fabgen.design.design import Keeper
from fabgen.design.findings import Finding, Severity
from fabgen.design.keeper_sizes import snap_keeper_size
from fabgen.physics.split_ring import largest_push_ring_outside_mm, push_ring_strain, snap_clip_strain
from fabgen.stock import tables

CRACKS_PERCENT = 5.0
"""Strain at which printed layers part at once. Source: common practice, from memory."""


def findings(arranged: Arranged) -> Iterator[Finding]:
    """F17 a bore not below the rod grips nothing; F07 strain over 2 % warns, over 5 % fails."""
    for element in arranged.design.elements:
        keeper, rod_mm = element.mount.keeper if element.mount else None, element.rod.diameter_mm
        if keeper is None:
            continue
        if keeper.bore_mm >= rod_mm:
            advice = f"write bore: {rod_mm - tables.print_practice('split_keeper_grip_mm'):g} mm, or leave it out"
            yield finding("F17", "fail", element.id, advice, measured=rod_mm - keeper.bore_mm, required=0.0, unit="mm")
            continue
        percent = strain_percent(keeper, rod_mm)
        limit = tables.print_practice("largest_keeper_strain_percent")
        if percent is not None and percent > limit + 1e-9:
            severity: Severity = "fail" if percent > CRACKS_PERCENT else "warn"
            yield finding(
                "F07", severity, element.id, _advice(keeper, rod_mm), measured=percent, required=limit, unit="%"
            )


def strain_percent(keeper: Keeper, rod_mm: float) -> float | None:
    """Largest strain of a keeper on its rod, or while it is snapped on; None where no such keeper can be made."""
    sizes = {"rod_mm": rod_mm, "bore_mm": keeper.bore_mm, "outside_mm": keeper.outside_mm}
    if keeper.outside_mm <= keeper.bore_mm:
        return None
    on_rod = push_ring_strain(**sizes)
    if keeper.kind == "push-ring":
        return 100 * on_rod
    try:
        clip = snap_keeper_size(
            rod_diameter_mm=rod_mm,
            bore_mm=keeper.bore_mm,
            outside_diameter_mm=keeper.outside_mm,
            length_mm=keeper.length_mm,
        )
    except ValueError:
        return None
    return 100 * max(on_rod, snap_clip_strain(**sizes, mouth_mm=clip.mouth_mm))


def _advice(keeper: Keeper, rod_mm: float) -> str:
    if keeper.kind == "snap":
        return "make the clip thinner: outside smaller, or use keeper: {kind: push-ring}"
    widest_mm = largest_push_ring_outside_mm(rod_mm=rod_mm, bore_mm=keeper.bore_mm)
    return f"make it thinner, outside up to {widest_mm:.1f} mm, or its bore larger"
