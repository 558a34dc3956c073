"""Does every keeper stop on something, and sit on the rod as a whole?"""

from collections.abc import Iterator

from fabgen.check.finding import finding, too_small
from fabgen.design.arranged import Arranged, Placed
from fabgen.design.design import Mount
from fabgen.design.findings import Finding
from fabgen.design.keeper_sizes import KEEPER_RIM_MM
from fabgen.design.spans import part_span_mm
from fabgen.stock import tables


def findings(arranged: Arranged) -> Iterator[Finding]:
    """F08 a keeper no larger than the opening it must stop on; F15 one that hangs over the rod's tip."""
    parts = {part.name: part for part in arranged.placed}
    for element in arranged.design.elements:
        mount = element.mount
        if mount and mount.keeper:
            opening_mm, what = opening(mount)
            if missed := too_small(
                mount.keeper.outside_mm, fail_mm=opening_mm + 0.1, warn_mm=opening_mm + 2 * KEEPER_RIM_MM
            ):
                severity, limit_mm = missed
                advice = f"it rests on the rim of {what}, {opening_mm:.3f} mm at its largest: make it wider"
                if mount.bush and mount.bush.kind == "sleeve":
                    advice += (
                        ", as a push-ring whose bore is nearer to the rod so that it is not strained too far, or use "
                        "bush: {kind: shoulder}: no flange stands on the right"
                    )
                yield finding(
                    "F08", severity, element.id, advice, measured=mount.keeper.outside_mm, required=limit_mm, unit="mm"
                )
    for meeting in arranged.interfaces:
        if meeting.kind == "keeper on rod":
            yield from _on_tip(parts[meeting.first], parts[meeting.second])


def opening(mount: Mount) -> tuple[float, str]:
    """Largest diameter of what the keeper could slip into, and what it is."""
    if mount.bush and mount.bush.kind == "shoulder":
        return mount.bush.bore_mm, "the bush's bore"
    if mount.saddle:
        return mount.saddle.bore_mm, "the saddle's bore"
    return mount.hole_mm + tables.drilled_over_mm(mount.hole_mm), "the hole"


def _on_tip(keeper: Placed, rod: Placed) -> Iterator[Finding]:
    half_mm, outer_mm = _reach_mm(rod), _reach_mm(keeper)
    if outer_mm > half_mm + 1e-9:
        advice = "the rod is too short for boom, bushes and keepers: a shorter keeper, a lower flange or a smaller boom"
        yield finding("F15", "fail", keeper.owner, advice, measured=half_mm, required=outer_mm, unit="mm")


def _reach_mm(part: Placed) -> float:
    """How far a part reaches to the side, from the boom's middle."""
    low, high = part_span_mm(part, 1)
    return max(abs(low), abs(high))
