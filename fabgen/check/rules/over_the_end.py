"""Does any block or plate hang over the boom's end?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.design.arranged import Arranged
from fabgen.design.findings import Finding
from fabgen.design.spans import part_span_mm

BLOCKS = ("clamp_plate", "feed_block", "folded_saddle", "saddle")


def findings(arranged: Arranged) -> Iterator[Finding]:
    """F14: the clamp's plate fails, other blocks warn; their screws are judged as holes."""
    length_mm = arranged.design.boom.length_mm
    for part in arranged.placed:
        if part.part not in BLOCKS:
            continue
        low, high = part_span_mm(part, 0)
        over_mm = max(-low, high - length_mm)
        if over_mm > 1e-9:
            clamp = part.part == "clamp_plate"
            advice = (
                "move the clamp inwards, or write clamp: {at: balance}"
                if clamp
                else f"lengthen the boom's overhang by {over_mm:.1f} mm"
            )
            where = part.name if clamp else part.owner
            yield finding("F14", "fail" if clamp else "warn", where, advice, measured=over_mm, required=0.0, unit="mm")
