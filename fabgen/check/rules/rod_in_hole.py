"""Does a pressed or welded rod fill its hole?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.design.arranged import Arranged
from fabgen.design.findings import Finding
from fabgen.stock import tables

LARGEST_CONTACT_MM = 0.3
"""Diametral play beyond which a press or a weld bridges a gap. Source: common practice."""


def findings(arranged: Arranged) -> Iterator[Finding]:
    """F16: play in a hole drilled too large; a hole smaller than its rod was refused when the file was read."""
    for element in arranged.design.elements:
        mount = element.mount
        if mount is None or mount.bond not in ("press", "weld"):
            continue
        play_mm = mount.hole_mm - element.rod.diameter_mm
        worst_mm = play_mm + tables.drilled_over_mm(mount.hole_mm)
        if worst_mm > LARGEST_CONTACT_MM + 1e-9:
            advice = (
                f"play: {play_mm:.3f} mm on the drawing, the figure is a hole drilled too large (IT12); the joint "
                "bridges a gap: use a smaller drill and ream"
            )
            yield finding("F16", "warn", element.id, advice, measured=worst_mm, required=LARGEST_CONTACT_MM, unit="mm")
