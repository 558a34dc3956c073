"""From modelled to cut, one line per element, in columns that add up as printed.

modelled + allowance + rod change + rounding = cut. Every column is rounded to a micrometre before it is added, so that
the sum of the printed figures is the printed sum.
"""

import math
from dataclasses import replace
from fractions import Fraction

from fabgen.correct.allowance import allowance
from fabgen.correct.rod_change import rod_change
from fabgen.design.design import Design, Element
from fabgen.design.ledger import Ledger, LedgerLine
from fabgen.design.shop_tolerance import shop_tolerance_mm
from fabgen.physics.half_wave import shift_khz

DRIVEN_TRIM = 0.02
"""Trim offered on a driven rod, as a share of its length: its match decides. Source: common practice."""


def correct(design: Design) -> Ledger:
    """The ledger of a design.

    Args:
        design: as read.

    Returns:
        One line per element in order of station.
    """
    return Ledger(tuple(_line(design, element) for element in design.elements))


def _line(design: Design, element: Element) -> LedgerLine:
    change = rod_change(design, element)
    found = allowance(design, replace(element, length_mm=element.length_mm + change.value_mm))
    modelled, added, changed = _um(element.length_mm), _um(found.value_mm), _um(change.value_mm)
    cut = _cut_um(design, element, modelled + added + changed)
    cut_mm = cut / 1000
    return LedgerLine(
        element=element.id,
        role=element.role,
        station_mm=round(element.station_mm, 3),
        rod_mm=element.rod.diameter_mm,
        modelled_mm=modelled / 1000,
        allowance=found,
        rod_change_mm=changed / 1000,
        rod_change_u_mm=change.u_mm,
        rounding_mm=(cut - modelled - added - changed) / 1000,
        cut_mm=cut_mm,
        tolerance_mm=shop_tolerance_mm(design.shop, cut_mm),
        trim_mm=_trim_mm(design, element, math.hypot(found.u_mm, change.u_mm)),
        shift_khz=abs(shift_khz(frequency_mhz=design.frequency_mhz, length_mm=element.length_mm, change_mm=found.u_mm)),
        rod_change_remarks=change.remarks,
    )


def _um(length_mm: float) -> int:
    return round(Fraction(length_mm) * 1000)


def _cut_um(design: Design, element: Element, ideal_um: int) -> int:
    """The shop's step nearest to the ideal length; of a split dipole each half is a step."""
    step_mm, feed = design.shop.cut_step_mm, design.feed_of(element)
    if feed is not None and feed.kind == "straight-dipole":
        gap_um = _um(feed.gap_mm)
        return gap_um + 2 * _nearest_step_um(Fraction(ideal_um - gap_um, 2), step_mm)
    return _nearest_step_um(Fraction(ideal_um), step_mm)


def _nearest_step_um(length_um: Fraction | int, step_mm: float) -> int:
    """Of two equally near the longer: a rod can be shortened."""
    step_um = Fraction(step_mm).limit_denominator(1_000_000) * 1000
    return round(math.floor(Fraction(length_um) / step_um + Fraction(1, 2)) * step_um)


def _trim_mm(design: Design, element: Element, u_mm: float) -> float:
    """Twice the uncertainty (95 %) rounded up to the step; on a driven rod at least its own margin."""
    wanted_mm = 2 * u_mm
    if element.role == "driven":
        wanted_mm = max(wanted_mm, DRIVEN_TRIM * element.length_mm)
    step_mm = design.shop.cut_step_mm
    return round(math.ceil(wanted_mm / step_mm - 1e-9) * step_mm, 3)
