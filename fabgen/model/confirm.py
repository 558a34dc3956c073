"""The kernel's word on every near pair: solids against the numbers they were arranged by.

Formulae come first and decide. Parts that meet, or whose shapes do, are measured solid against solid, once per distinct
relative placement. For parts meant to stay apart the formula is a lower bound because simple shapes hold the solids;
that they do is confirmed of every part, once per distinct one. A disagreement is a mistake of the program, never of the
design.
"""

import functools
import math
from collections.abc import Iterable
from typing import Protocol

from fabgen.design.arranged import Cylinder, Frame, Interface, Placed
from fabgen.errors import ProgramError
from fabgen.model.envelope import outside_envelope
from fabgen.model.fits import fits
from fabgen.model.kernel import common, location_of
from fabgen.model.neighbourhood import Body, neighbourhood, relative
from fabgen.model.separation import separation_mm

DISTANCE_TOLERANCE_MM = 1e-6
OVERLAP_TOLERANCE_MM3 = 1e-6
_SLACK_MM = 0.01
_LEAST_GRIP = 0.3
"""Least part of a full ring that a grip may be: slit, mouth and lead-ins take the rest."""


class Near(Protocol):
    """A near pair as the checks class it."""

    @property
    def first(self) -> Placed:
        """One part."""

    @property
    def second(self) -> Placed:
        """The other."""

    @property
    def interface(self) -> Interface | None:
        """How they are meant to meet; None where they are meant to stay apart."""

    @property
    def limit_mm(self) -> float:
        """Least distance of parts meant to stay apart."""

    @property
    def distance_mm(self) -> float:
        """By formula, never more than the true distance."""


def confirm(pairs: Iterable[Near]) -> int:
    """Hold the solids of all near pairs against the formulae.

    Args:
        pairs: every near pair, classed. One that is nearer than its limit has its finding already and is let pass.

    Returns:
        How many pairs were confirmed.

    Raises:
        ProgramError: solids and numbers contradict each other; the message names the pair, or the part that its shapes
            do not hold.
    """
    count = 0
    parts: dict[str, Placed] = {}
    for pair in pairs:
        parts |= {pair.first.name: pair.first, pair.second.name: pair.second}
        if pair.interface is None and pair.distance_mm < pair.limit_mm:
            continue
        wrong = _contradiction(pair)
        if wrong:
            raise ProgramError(f"{pair.first.name} and {pair.second.name}: {wrong}")
        count += 1
    for part in parts.values():
        if wrong := outside_envelope(part):
            raise ProgramError(f"{part.name}: {wrong}")
    return count


def _contradiction(pair: Near) -> str:
    """What the solids say against the numbers; empty when they agree."""
    first, own = neighbourhood(pair.first, pair.second, pair.distance_mm)
    second, others = neighbourhood(pair.second, pair.first, pair.distance_mm)
    frame = relative(own, others)
    if pair.interface:
        return _against_interface(pair.interface, first, second, frame)
    if pair.distance_mm == 0:
        overlap_mm3 = _overlap_mm3(first, second, frame)
        return f"the solids overlap by {overlap_mm3:.6f} mm³" if overlap_mm3 > OVERLAP_TOLERANCE_MM3 else ""
    if not _formula_is_exact(pair.first, pair.second):
        return ""
    apart_mm = _apart_mm(first, second, frame, pair.distance_mm)
    if abs(apart_mm - pair.distance_mm) > DISTANCE_TOLERANCE_MM:
        return f"the solids are {apart_mm:.6f} mm apart, by formula {pair.distance_mm:.6f} mm"
    return ""


def _apart_mm(first: Body, second: Body, frame: Frame, expected_mm: float) -> float:
    """Distance of two bodies, sought first where it is expected."""
    apart_mm = separation_mm(first, second, frame, expected_mm + _SLACK_MM)
    if apart_mm <= expected_mm + _SLACK_MM:
        return apart_mm
    return separation_mm(first, second, frame, math.inf)


def _against_interface(interface: Interface, first: Body, second: Body, frame: Frame) -> str:
    """What the solids say against a declared interface."""
    kind = f"the interface '{interface.kind}'"
    apart_mm = _apart_mm(first, second, frame, interface.gap_mm)
    if abs(apart_mm - interface.gap_mm) > DISTANCE_TOLERANCE_MM:
        return f"{kind} asks for a gap of {interface.gap_mm:.6f} mm, the solids have {apart_mm:.6f} mm"
    overlap_mm3 = _overlap_mm3(first, second, frame) if apart_mm <= DISTANCE_TOLERANCE_MM else 0.0
    if interface.fit_mm is None:
        return f"{kind} overlaps by {overlap_mm3:.6f} mm³" if overlap_mm3 > OVERLAP_TOLERANCE_MM3 else ""
    found = fits(first, second, frame)
    fit = next((fit for fit in found if abs(fit.fit_mm - interface.fit_mm) <= DISTANCE_TOLERANCE_MM), None)
    if fit is None:
        seen = ", ".join(f"{fit.fit_mm:.6f}" for fit in found) or "none"
        return f"{kind} asks for a fit of {interface.fit_mm:.6f} mm, the solids have {seen}"
    if not _LEAST_GRIP * fit.ring_mm3 - OVERLAP_TOLERANCE_MM3 <= overlap_mm3 <= fit.ring_mm3 + OVERLAP_TOLERANCE_MM3:
        return f"{kind} overlaps by {overlap_mm3:.6f} mm³, the full ring is {fit.ring_mm3:.6f} mm³"
    return ""


def _formula_is_exact(first: Placed, second: Placed) -> bool:
    """Whether the formula is the distance itself: parts that are their shapes, and no cylinders that cross."""
    return (
        first.exact
        and second.exact
        and not any(
            isinstance(a, Cylinder) and isinstance(b, Cylinder) and a.axis != b.axis
            for a in first.shapes
            for b in second.shapes
        )
    )


@functools.cache
def _overlap_mm3(first: Body, second: Body, frame: Frame) -> float:
    """Common volume of two bodies, the second standing at `frame` in the first one's frame."""
    return float(common(first.solid, second.solid.moved(location_of(frame))).Volume())
