"""Measurements of a built array held against the drawing and against the model, and what shortening can mend.

The plan only shortens, in the shop's steps. Each step takes the cut, or the two cuts at once, that bring gain,
back/front field and match nearest to the modelled array; it stops where no cut helps. Every trial is a solved build.
"""

from dataclasses import replace
from itertools import combinations_with_replacement

import numpy as np

from fabgen.check.response.arrays import absolute_values_hold, at_terminals, drawn_array, modelled_array
from fabgen.check.response.gauge import Gauge, gauge
from fabgen.design.arranged import Arranged
from fabgen.design.as_built import AsBuilt, Deviation, Measured, State, Trim
from fabgen.design.electrical_case import LOCATING, ElectricalCase
from fabgen.design.limits import Limits
from fabgen.design.response import Outcome
from fabgen.physics.array import RodArray, mismatch, solve_array
from fabgen.physics.array_sampling import BuildChanges, sample_band
from fabgen.physics.array_shift import BACK_FRONT_UNIT, GAIN_UNIT_DB, build_shift
from fabgen.physics.thin_rod_kernel import ComplexArray, FloatArray

REFLECTION_UNIT = 0.05
"""A miss of the feed's reflection that weighs as much as 0.05 dB of gain."""
WORTH_A_CUT = 0.02
"""A cut must take at least this part of what is wrong, or it is not worth the risk."""
GOOD_ENOUGH = 0.05
"""Mean square of the misses in their units: below it nothing is trimmed, nor where the drawing itself is no nearer."""
PLAN_WORTH = 0.4
"""A whole plan must take at least this part of what is wrong: less is one error traded for another."""
MOST_CUTS = 200
LARGEST_PAIRS = 20
"""Arrays up to this many rods are tried with two cuts at once too."""


def as_built(case: ElectricalCase, arranged: Arranged, rows: tuple[Measured, ...]) -> AsBuilt:
    """What measurements say about a built array.

    Args:
        case: the array in plain numbers, with its limits.
        arranged: the drawing, with the tolerances in force.
        rows: one per element in order of station.
    """
    measure, target = gauge(case), modelled_array(case)
    built = _built(case, arranged, rows)
    steps_mm = _steps_mm(arranged, case)
    cuts = _plan(measure, (target, drawn_array(case)), built, np.array(steps_mm))
    off_mm = tuple(float(each) for each in cuts * np.array(steps_mm))
    trimmed = replace(built, length_mm=tuple(a - b for a, b in zip(built.length_mm, off_mm, strict=True)))
    states = [_state(measure, array) for array in (target, built, trimmed)]
    absolute = absolute_values_hold(case)
    return AsBuilt(
        deviations=_deviations(arranged, rows),
        designed=states[0],
        built=states[1],
        trims=tuple(
            Trim(row.element, round(off, 3), round(row.length_mm - off, 3))
            for row, off in zip(rows, off_mm, strict=True)
            if off > 0
        ),
        trimmed=states[2],
        absolute=absolute,
        missed=_missed(case.limits, states[1].outcome, absolute),
        missed_trimmed=_missed(case.limits, states[2].outcome, absolute),
    )


def _built(case: ElectricalCase, arranged: Arranged, rows: tuple[Measured, ...]) -> RodArray:
    """The drawn array with every deviation; allowances are taken as they stand in the ledger."""
    drawn = drawn_array(case)
    off_mm = (row.length_mm - arranged.ledger.line(row.element).cut_mm for row in rows)
    lengths_mm = tuple(length + off for length, off in zip(drawn.length_mm, off_mm, strict=True))
    return replace(drawn, length_mm=lengths_mm, station_mm=tuple(row.station_mm for row in rows))


def _steps_mm(arranged: Arranged, case: ElectricalCase) -> list[float]:
    """What one cut takes off each rod: the shop's step; of a split dipole one from each half."""
    halves = {cut.element for cut in arranged.cuts if cut.element in case.element and cut.piece != cut.element}
    step_mm = arranged.design.shop.cut_step_mm
    return [2 * step_mm if element in halves else step_mm for element in case.element]


def _plan(measure: Gauge, aims: tuple[RodArray, RodArray], built: RodArray, steps_mm: FloatArray) -> FloatArray:
    """Number of cuts at each rod; none once the array is as near to the modelled one (first aim) as drawn (second)."""
    cuts = np.zeros(built.count)
    goal, drawn = (_response(measure, aim, cuts[None]) for aim in aims)
    enough = max(GOOD_ENOUGH, float(_cost(measure, goal, drawn)[0]))
    first = cost = float(_cost(measure, goal, _response(measure, built, cuts[None]))[0])
    moves = _moves(built.count)
    for _ in range(MOST_CUTS):
        if cost <= enough * (1 + 1e-6):
            break
        costs = _cost(measure, goal, _response(measure, built, -(cuts + moves) * steps_mm))
        best = int(np.argmin(costs / (1 - 1e-3 * moves.sum(axis=1))))
        if costs[best] > cost * (1 - WORTH_A_CUT * moves[best].sum()):
            break
        cuts, cost = cuts + moves[best], float(costs[best])
    return cuts if cost < (1 - PLAN_WORTH) * first else np.zeros(built.count)


def _moves(count: int) -> FloatArray:
    """One cut at each rod; in smaller arrays any two cuts too."""
    unit = np.eye(count)
    if count > LARGEST_PAIRS:
        return unit
    pairs = [unit[a] + unit[b] for a, b in combinations_with_replacement(range(count), 2)]
    return np.concatenate([unit, np.array(pairs)])


def _response(measure: Gauge, array: RodArray, length_mm: FloatArray) -> tuple[FloatArray, ComplexArray, ComplexArray]:
    """Gain, back/front field and reflection of builds at the gauge's frequencies."""
    none = np.zeros_like(length_mm)
    found = sample_band(array, measure.frequency_mhz, BuildChanges(length_mm, none, none))
    impedance = at_terminals(measure.case, found.feed_impedance_ohm)
    reference = measure.case.reference_ohm
    return found.gain_dbi, found.back_front, (impedance - reference) / (impedance + reference)


def _cost(
    measure: Gauge,
    goal: tuple[FloatArray, ComplexArray, ComplexArray],
    found: tuple[FloatArray, ComplexArray, ComplexArray],
) -> FloatArray:
    """Mean square of what is missed, in the units of the shift measure; match counts in the band."""
    square = ((found[0] - goal[0]) / GAIN_UNIT_DB) ** 2 + np.abs((found[1] - goal[1]) / BACK_FRONT_UNIT) ** 2
    match = np.abs((found[2] - goal[2])[:, measure.in_band] / REFLECTION_UNIT) ** 2
    return np.asarray(square.mean(axis=1) + match.mean(axis=1))


def _state(measure: Gauge, array: RodArray) -> State:
    case = measure.case
    solution = solve_array(array, case.frequency_mhz)
    impedance = complex(at_terminals(case, np.array([solution.feed_impedance_ohm]))[0])
    shift = build_shift(measure.shift, array)
    return State(
        outcome=measure.outcome(array),
        gain_dbi=round(solution.gain_dbi, 4),
        front_to_back_db=round(solution.front_to_back_db, 3),
        r_ohm=round(impedance.real, 3),
        x_ohm=round(impedance.imag, 3),
        mismatch=round(float(mismatch(np.array([impedance]), case.reference_ohm)[0]), 4),
        residual_ratio=round(float(shift.residual[0]), 3),
    )


def _missed(limits: Limits, outcome: Outcome, absolute: bool) -> tuple[str, ...]:
    held = {
        "shift": limits.shift_khz is None or abs(outcome.shift_khz) <= limits.shift_khz,
        "gain_loss": limits.gain_loss_db is None or outcome.gain_loss_db <= limits.gain_loss_db,
        "front_to_back": not absolute
        or limits.front_to_back_db is None
        or outcome.front_to_back_db >= limits.front_to_back_db,
        "mismatch": not absolute or limits.mismatch is None or outcome.mismatch <= limits.mismatch,
    }
    return tuple(name for name, kept in held.items() if not kept)


def _deviations(arranged: Arranged, rows: tuple[Measured, ...]) -> tuple[Deviation, ...]:
    stations = {hole.element: hole.tolerance_mm for hole in arranged.holes if hole.purpose in LOCATING}
    found = []
    for row in rows:
        line = arranged.ledger.line(row.element)
        both = row.left_mm is not None and row.right_mm is not None
        found.append(
            Deviation(
                element=row.element,
                length_mm=row.length_mm,
                length_off_mm=round(row.length_mm - line.cut_mm, 3),
                length_tolerance_mm=line.tolerance_mm,
                station_mm=row.station_mm,
                station_off_mm=round(row.station_mm - line.station_mm, 3),
                station_tolerance_mm=stations.get(row.element, 0.0),
                off_centre_mm=round(((row.left_mm or 0.0) - (row.right_mm or 0.0)) / 2, 3) if both else None,
            )
        )
    return tuple(found)
