"""Does every printed part fit on the bed as it is printed?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.check.printed import LYING_ON_SIDE, distinct_prints, owners
from fabgen.design.arranged import Arranged, Placed
from fabgen.design.findings import Finding
from fabgen.design.spans import local_size_mm


def findings(arranged: Arranged) -> Iterator[Finding]:
    """P02: too long or too wide for the bed, turned by 90° or not, or too tall."""
    bed_x_mm, bed_y_mm, bed_z_mm = arranged.design.printer.bed_mm
    for part, _ in distinct_prints(arranged):
        short_mm, long_mm, tall_mm = standing_mm(part)
        pairs = (
            (long_mm, max(bed_x_mm, bed_y_mm), "long"),
            (short_mm, min(bed_x_mm, bed_y_mm), "wide"),
            (tall_mm, bed_z_mm, "tall"),
        )
        for mm, room_mm, how in pairs:
            if mm > room_mm + 1e-9:
                advice = (
                    f"the {part.part.replace('_', ' ')} is too {how} for the bed; print it elsewhere and state that bed"
                )
                for owner in owners(arranged, part):
                    yield finding("P02", "fail", owner, advice, measured=mm, required=room_mm, unit="mm")


def standing_mm(part: Placed) -> tuple[float, float, float]:
    """Short and long side of the footprint, and height, as a part is printed."""
    x_mm, y_mm, z_mm = local_size_mm(part)
    if part.part in LYING_ON_SIDE:
        return min(x_mm, z_mm), max(x_mm, z_mm), y_mm
    return min(x_mm, y_mm), max(x_mm, y_mm), z_mm
