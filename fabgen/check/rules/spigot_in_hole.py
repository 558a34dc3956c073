"""Does every bush go into its hole, with plastic enough round the rod and through the wall?"""

import math
from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.check.tolerances import printed_accuracy_mm
from fabgen.design.arranged import Arranged
from fabgen.design.design import Boom, Bush, Element
from fabgen.design.findings import Finding
from fabgen.design.wall_depth import wall_depth_mm
from fabgen.stock import tables

LOOSEST_MM = 0.6
"""Diametral play beyond which a bush stands askew. Source: common practice."""


def findings(arranged: Arranged) -> Iterator[Finding]:
    """F03 spigot in the hole, F04 its wall round the rod, F05 its length against the boom's wall."""
    for element in arranged.design.elements:
        if element.mount and element.mount.bush:
            bush = element.mount.bush
            yield from _play(element, bush, element.mount.hole_mm)
            yield from _wall(element, bush)
            yield from _length(element, bush, element.mount.hole_mm, arranged.design.boom)


def _play(element: Element, bush: Bush, hole_mm: float) -> Iterator[Finding]:
    """A drilled hole never comes out smaller than its drill, so the drawn play is the tightest."""
    play_mm = hole_mm - bush.spigot_mm
    slides_mm = tables.print_practice("diametral_undersize_press_mm")
    off_mm = printed_accuracy_mm()
    worst = (
        f"as printed and drilled {play_mm - off_mm:.2f} to {play_mm + off_mm + tables.drilled_over_mm(hole_mm):.2f} mm "
        "until the fit gauge says better"
    )
    fix = f"write spigot: {hole_mm - tables.print_practice('spigot_clearance_mm'):g} mm, or leave it out"
    if play_mm <= 0:
        yield finding("F03", "fail", element.id, fix, measured=play_mm, required=0.0, unit="mm")
    elif play_mm < slides_mm - 1e-9:
        advice = f"a press fit that splits a print along its layers; {fix}; {worst}"
        yield finding("F03", "warn", element.id, advice, measured=play_mm, required=slides_mm, unit="mm")
    elif play_mm > LOOSEST_MM:
        advice = f"the bush stands askew; {fix}; {worst}"
        yield finding("F03", "warn", element.id, advice, measured=play_mm, required=LOOSEST_MM, unit="mm")


def _wall(element: Element, bush: Bush) -> Iterator[Finding]:
    wall_mm = (bush.spigot_mm - bush.bore_mm) / 2
    least_mm = tables.print_practice("thinnest_spigot_wall_mm")
    if wall_mm < least_mm - 1e-9:
        hole_mm = bush.bore_mm + 2 * least_mm + tables.print_practice("spigot_clearance_mm")
        advice = f"drill the hole {math.ceil(10 * hole_mm - 1e-6) / 10:g} mm or more; thinner plastic cracks on the rod"
        yield finding("F04", "warn", element.id, advice, measured=wall_mm, required=least_mm, unit="mm")


def _length(element: Element, bush: Bush, hole_mm: float, boom: Boom) -> Iterator[Finding]:
    """The spigot must reach the inside of the wall, on a round tube at the hole's lowest edge."""
    if bush.kind == "sleeve" or not boom.hollow:
        return
    through_mm = wall_depth_mm(boom, hole_mm)
    if bush.spigot_length_mm < through_mm - 1e-9:
        advice = "the hole's inner edge stays bare and cuts the rod's bearing short; make spigot_length longer"
        yield finding("F05", "warn", element.id, advice, measured=bush.spigot_length_mm, required=through_mm, unit="mm")
