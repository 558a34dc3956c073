"""Does every bush's flange lie on the flat of its wall?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.design.arranged import Arranged
from fabgen.design.findings import Finding


def findings(arranged: Arranged) -> Iterator[Finding]:
    """F13: a flange wider than the flat between the corners (a foot on a round tube is shaped to it)."""
    boom = arranged.design.boom
    flat_mm = boom.height_mm - 2 * boom.corner_radius_mm
    if boom.section == "round":
        return
    for element in arranged.design.elements:
        bush = element.mount.bush if element.mount else None
        if bush and bush.flange_mm > flat_mm + 1e-9:
            advice = (
                "the flange rocks on the corners; make flange smaller, down to hole + 4 mm, or drill a smaller hole"
            )
            yield finding("F13", "warn", element.id, advice, measured=bush.flange_mm, required=flat_mm, unit="mm")
