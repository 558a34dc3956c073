"""Does any printed surface hang over air?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.check.printed import distinct_prints, overhangs, owners
from fabgen.design.arranged import Arranged
from fabgen.design.findings import Finding
from fabgen.stock import tables


def findings(arranged: Arranged) -> Iterator[Finding]:
    """P03: over 45° from the vertical without being a bridge, or a bridge longer than printers span."""
    steepest_deg = tables.print_practice("overhang_from_vertical_deg")
    longest_mm = tables.print_practice("longest_bridge_mm")
    for part, size in distinct_prints(arranged):
        for each in overhangs(size):
            what = f"the {each.what} of the {part.part.replace('_', ' ')}"
            for owner in owners(arranged, part):
                if each.bridge_mm > longest_mm:
                    advice = f"{what} is printed in the air over this span: give it support, or raise the block"
                    yield finding("P03", "warn", owner, advice, measured=each.bridge_mm, required=longest_mm, unit="mm")
                elif not each.bridge_mm and each.slope_deg > steepest_deg + 1e-9:
                    advice = f"{what} leans too far over: give it support"
                    yield finding(
                        "P03", "warn", owner, advice, measured=each.slope_deg, required=steepest_deg, unit="deg"
                    )
