"""Does every rod go through its bush or saddle, without rattling?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.check.tolerances import printed_accuracy_mm
from fabgen.design.arranged import Arranged
from fabgen.design.design import Element
from fabgen.design.findings import Finding
from fabgen.stock import tables

LOOSEST_MM = 0.6
"""Diametral play beyond which a rod rattles in wind: three times the usual one. Source: common practice."""


def findings(arranged: Arranged) -> Iterator[Finding]:
    """F02: a bore not above the rod fails; too tight to slide or too loose warns."""
    for element in arranged.design.elements:
        yield from _bore(element)


def _bore(element: Element) -> Iterator[Finding]:
    mount = element.mount
    block = (mount.bush or mount.saddle) if mount else None
    if block is None:
        return
    play_mm = block.bore_mm - element.rod.diameter_mm
    slides_mm = tables.print_practice("diametral_undersize_press_mm")
    usual_mm = tables.print_practice("bush_bore_clearance_mm" if mount and mount.bush else "saddle_bore_clearance_mm")
    fix = f"write bore: {element.rod.diameter_mm + usual_mm:g} mm, or leave it out"
    off_mm = printed_accuracy_mm()
    worst = f"as printed {play_mm - off_mm:.2f} to {play_mm + off_mm:.2f} mm until the fit gauge says better"
    if play_mm <= 0:
        yield finding("F02", "fail", element.id, fix, measured=play_mm, required=0.0, unit="mm")
    elif play_mm < slides_mm - 1e-9:
        advice = f"a press fit, the rod will not slide; {fix}; {worst}"
        yield finding("F02", "warn", element.id, advice, measured=play_mm, required=slides_mm, unit="mm")
    elif play_mm > LOOSEST_MM:
        advice = f"the rod rattles; {fix}; {worst}"
        yield finding("F02", "warn", element.id, advice, measured=play_mm, required=LOOSEST_MM, unit="mm")
