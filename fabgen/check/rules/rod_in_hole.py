"""Does a bare rod go through its own hole, and touch it where it must?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.check.tolerances import drilled_over_mm
from fabgen.design.arranged import Arranged
from fabgen.design.findings import Finding

DEEPEST_PRESS_MM = 0.1
"""Interference beyond which a rod cannot be pressed in without scoring both walls. Source: common practice."""

LARGEST_CONTACT_MM = 0.3
"""Diametral play beyond which a press or a weld bridges a gap. Source: common practice."""


def findings(arranged: Arranged) -> Iterator[Finding]:
    """F16: a hole too small for the rod fails; one too large for a pressed or welded joint warns."""
    for element in arranged.design.elements:
        mount = element.mount
        if mount is None or mount.style not in ("bonded-through", "through-nonmetal"):
            continue
        play_mm = mount.hole_mm - element.rod.diameter_mm
        tightest_mm = -DEEPEST_PRESS_MM if mount.bond == "press" else 0.0
        if play_mm < tightest_mm - 1e-9:
            advice = f"drill {element.rod.diameter_mm + 0.05:g} mm or the next drill above"
            yield finding("F16", "fail", element.id, advice, measured=play_mm, required=tightest_mm, unit="mm")
        elif mount.bond in ("press", "weld") and play_mm + drilled_over_mm(mount.hole_mm) > LARGEST_CONTACT_MM:
            advice = (
                f"play {play_mm:.3f} mm on the drawing, the figure is a hole drilled too large (IT12): "
                "the joint bridges a gap; use a smaller drill and ream"
            )
            yield finding(
                "F16", "warn", element.id, advice,
                measured=play_mm + drilled_over_mm(mount.hole_mm), required=LARGEST_CONTACT_MM, unit="mm",
            )  # fmt: skip
