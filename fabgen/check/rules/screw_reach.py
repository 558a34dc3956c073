"""Do the screws into the boom's top hold, and end before they touch anything?"""

from collections.abc import Iterator

from fabgen.check.finding import finding, too_small
from fabgen.design.arranged import Arranged, Cylinder, Placed
from fabgen.design.findings import Finding
from fabgen.stock.fasteners import thread

BEFORE_WALL_MM = 1.0
"""Kept between a screw's tip and the opposite wall. Source: common practice."""

LEAST_TURNS = 2.0
"""Turns of thread that a tapped wall must offer. Source: common practice."""


def findings(arranged: Arranged) -> Iterator[Finding]:
    """F11 a tip at the opposite wall or on another rod; F12 too few turns of thread in a thin wall."""
    boom = arranged.design.boom
    parts = {part.name: part for part in arranged.placed}
    bars = [(part, part.shapes[0]) for part in arranged.placed if part.part == "rod"]
    rods = [(part, bar) for part, bar in bars if isinstance(bar, Cylinder) and abs(bar.centre[2]) < boom.top_mm]
    for meeting in arranged.interfaces:
        if meeting.kind != "thread in wall":
            continue
        screw = parts[meeting.first]
        numbers = dict(screw.parameters)
        size, length_mm = thread(str(numbers["thread"])), float(str(numbers["length_mm"]))
        tip_mm = screw.frame.origin[2] - length_mm
        yield from _opposite(arranged, screw, tip_mm)
        yield from _rods(screw, tip_mm, size.diameter_mm, rods)
        turns = boom.wall_mm / size.pitch_mm
        if boom.hollow and turns < LEAST_TURNS - 1e-9:
            advice = (
                f"{size.name} has {turns:.1f} turns in a wall of {boom.wall_mm:g} mm, the rule is two (common "
                "practice); use a smaller screw, a rivet nut or a thicker wall"
            )
            yield finding("F12", "warn", screw.owner, advice, measured=turns, required=LEAST_TURNS, unit="turns")


def _opposite(arranged: Arranged, screw: Placed, tip_mm: float) -> Iterator[Finding]:
    """In a tube the tip may not reach the other wall, in a bar not come out below."""
    boom = arranged.design.boom
    room_mm = tip_mm + boom.top_mm - boom.wall_mm
    if missed := too_small(room_mm, fail_mm=0.0, warn_mm=BEFORE_WALL_MM):
        severity, limit_mm = missed
        advice = "a screw into the top meets the opposite wall; use a higher boom, a shorter screw or washers"
        yield finding("F11", severity, screw.owner, advice, measured=room_mm, required=limit_mm, unit="mm")


def _rods(screw: Placed, tip_mm: float, screw_mm: float, rods: list[tuple[Placed, Cylinder]]) -> Iterator[Finding]:
    """A screw that ends in or below the top of a rod which passes under it."""
    for rod, bar in rods:
        beside_mm = abs(bar.centre[0] - screw.frame.origin[0]) - (bar.diameter_mm + screw_mm) / 2
        above_mm = tip_mm - bar.centre[2] - bar.diameter_mm / 2
        if rod.owner != screw.owner and beside_mm < 0 and above_mm < 0:
            advice = f"{screw.name} ends in the rod {rod.name}; move one of them along the boom"
            yield finding("F11", "fail", screw.owner, advice, measured=above_mm, required=0.0, unit="mm")
