"""Does a mast parallel to the rods stand among them?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.design.arranged import Arranged
from fabgen.design.findings import Finding


def findings(arranged: Arranged) -> Iterator[Finding]:
    """C02: with vertical rods the mast must stand behind the rearmost one."""
    design = arranged.design
    if design.polarisation != "vertical" or design.clamp is None or arranged.clamp_mm is None:
        return
    front_mm = arranged.clamp_mm + design.clamp.mast_mm / 2
    rearmost = design.elements[0]
    rear_mm = rearmost.station_mm - rearmost.rod.diameter_mm / 2
    if front_mm >= rear_mm:
        advice = (
            f"a metal mast parallel to the rods is one more rod; clamp the boom behind {rearmost.id}: lengthen the "
            "rear overhang and write clamp: {at: balance}"
        )
        yield finding("C02", "fail", "mast", advice, measured=front_mm, required=rear_mm, unit="mm")
