"""Tolerances from limits: as loose as 95 % of builds allow, loosest where the array does not care.

One number, the most that a tolerance may take of the room which the limits leave, sets every tolerance to the loosest
class within it. The number is searched with builds to first order; what it gives is then tried on builds that are each
solved, and tightened until 95 % of those are inside.
"""

import numpy as np

from fabgen.check.response.gauge import Gauge, Outcomes, Sampled
from fabgen.check.response.slopes import Slopes
from fabgen.design.electrical_case import ElectricalCase
from fabgen.design.response import SHARE_INSIDE, Allotment, Spread, Tolerances
from fabgen.frozen import frozen
from fabgen.physics.array import RodArray
from fabgen.physics.thin_rod_kernel import FloatArray

SAMPLES = 2000
LARGEST_WORK = SAMPLES * 12**2
"""Builds times rods squared: larger arrays are tried with fewer builds, but never with fewer than `FEWEST`."""
FEWEST = 300
SEED = 20_260_301
TRIES = 6
SPARE_SHARE = 0.004
"""Builds to spare over 95 % in the search, for what the first order leaves out."""


@frozen
class Tried:
    """Tolerances with the builds that were tried within them.

    Attributes:
        tolerance_mm: lengths, then stations.
        outcomes: of the builds.
        sampled: their responses.
    """

    tolerance_mm: FloatArray
    outcomes: Outcomes
    sampled: Sampled


def errors(case: ElectricalCase) -> FloatArray:
    """Random errors between -1 and 1, builds by quantities; the same on every machine."""
    count = len(case.element)
    builds = max(FEWEST, min(SAMPLES, LARGEST_WORK // count**2))
    raw = np.random.PCG64(SEED).random_raw(builds * 2 * count)
    return np.asarray((raw >> np.uint64(11)) * (2.0 / 2**53) - 1.0).reshape(builds, 2 * count)


def try_out(gauge: Gauge, array: RodArray, unit: FloatArray, tolerance_mm: FloatArray) -> Tried:
    """Builds within tolerances, each one solved.

    Args:
        gauge: what they are held against.
        array: as drawn.
        unit: errors between -1 and 1.
        tolerance_mm: lengths, then stations.
    """
    count = array.count
    change_mm = unit * tolerance_mm
    return Tried(tolerance_mm, *gauge.sample(array, change_mm[:, :count], change_mm[:, count:]))


def spread(gauge: Gauge, tried: Tried) -> Spread:
    """What the builds tried amount to."""
    outcomes = tried.outcomes
    return Spread(
        samples=outcomes.shift_khz.size,
        at_95=outcomes.at_95(),
        inside_share=round(float(outcomes.inside(gauge.case.limits).mean()), 4),
    )


def allot(gauge: Gauge, array: RodArray, found: Slopes, unit: FloatArray) -> tuple[Allotment, Tried]:
    """The loosest tolerances within which 95 % of builds keep all limits; the finest where none do.

    Args:
        gauge: with the limits.
        array: as drawn.
        found: its derivatives.
        unit: errors between -1 and 1.
    """
    case = gauge.case
    steps = _steps(
        found.weights(case.limits), [case.classes_mm] * array.count + [case.station_classes_mm] * array.count
    )
    wanted = SHARE_INSIDE + SPARE_SHARE
    place = _loosest(found, unit, steps, wanted, len(steps) - 1)
    for _ in range(TRIES):
        tried = try_out(gauge, array, unit, steps[place])
        share = float(tried.outcomes.inside(case.limits).mean())
        if share >= SHARE_INSIDE or place == 0:
            break
        wanted = max(wanted, _share(found, unit, steps[place]) + SHARE_INSIDE - share + SPARE_SHARE)
        place = _loosest(found, unit, steps, wanted, place - 1)
    else:
        tried = try_out(gauge, array, unit, steps[0])
        share = float(tried.outcomes.inside(case.limits).mean())
    return Allotment(_rows(case, tried.tolerance_mm), share >= SHARE_INSIDE), tried


def _steps(weights: FloatArray, classes_mm: list[tuple[float, ...]]) -> list[FloatArray]:
    """Every set of tolerances on the way from the finest to the loosest, each looser in one quantity at a time."""
    order = sorted(
        (float(weight * tolerance_mm), quantity, tolerance_mm)
        for quantity, (weight, own) in enumerate(zip(weights, classes_mm, strict=True))
        for tolerance_mm in own[1:]
    )
    current = np.array([own[0] for own in classes_mm])
    steps = [current]
    for _, quantity, tolerance_mm in order:
        current = current.copy()
        current[quantity] = tolerance_mm
        steps.append(current)
    return steps


def _share(found: Slopes, unit: FloatArray, tolerance_mm: FloatArray) -> float:
    return float(found.judge(unit * tolerance_mm).inside(found.gauge.case.limits).mean())


def _loosest(found: Slopes, unit: FloatArray, steps: list[FloatArray], wanted: float, last: int) -> int:
    """The loosest step up to `last` that keeps the wanted share inside to first order; 0 when none does."""
    low, high = 0, last
    while low < high:
        middle = (low + high + 1) // 2
        if _share(found, unit, steps[middle]) >= wanted:
            low = middle
        else:
            high = middle - 1
    return low


def _rows(case: ElectricalCase, tolerance_mm: FloatArray) -> tuple[Tolerances, ...]:
    count = len(case.element)
    return tuple(
        Tolerances(element, float(tolerance_mm[index]), float(tolerance_mm[count + index]))
        for index, element in enumerate(case.element)
    )
