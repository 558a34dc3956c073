"""Errors that are not random: an allowance wrong on all rods at once, and rods of another diameter."""

from dataclasses import replace

from fabgen.check.response.arrays import changed_array, unchanged_array
from fabgen.check.response.gauge import Gauge
from fabgen.design.response import CommonError, LeftOver, Outcome
from fabgen.physics.array import RodArray
from fabgen.physics.array_shift import build_shift
from fabgen.physics.scattering_reactance import DIAMETER_LIMIT_WL, LENGTH_RANGE_WL
from fabgen.units import wavelength_mm


def common_error(gauge: Gauge, array: RodArray) -> CommonError | None:
    """All allowances wrong by their own u in the same direction; None where none has one.

    Args:
        gauge: what the result is held against.
        array: its rods before rounding, so that the known error of rounding is not counted here.
    """
    u_mm = gauge.case.allowance_u_mm
    counted = [u for u in u_mm if u > 0]
    if not counted:
        return None

    def off_by(times: float, u_mm: tuple[float, ...] = u_mm) -> Outcome:
        ends = []
        for sign in (-1.0, 1.0):
            lengths_mm = tuple(length + sign * times * u for length, u in zip(array.length_mm, u_mm, strict=True))
            ends.append(gauge.outcome(replace(array, length_mm=lengths_mm)))
        return Outcome(
            shift_khz=max(abs(end.shift_khz) for end in ends),
            gain_loss_db=max(end.gain_loss_db for end in ends),
            front_to_back_db=min(end.front_to_back_db for end in ends),
            mismatch=max(end.mismatch for end in ends),
        )

    certain = off_by(2.0, gauge.case.common_u_mm)
    return CommonError((round(min(counted), 4), round(max(counted), 4)), certain, off_by(1.0), off_by(2.0))


def left_over(gauge: Gauge) -> LeftOver | None:
    """What is left of a change of rods; None where the rods are the modelled ones."""
    case = gauge.case
    if case.diameter_mm == case.modelled_diameter_mm:
        return None
    alone = build_shift(gauge.shift, unchanged_array(case))
    changed = changed_array(case)
    shift = build_shift(gauge.shift, changed)
    wavelength = wavelength_mm(case.frequency_mhz)
    low_mm, high_mm = (limit * wavelength for limit in LENGTH_RANGE_WL)
    thickest_mm = DIAMETER_LIMIT_WL * wavelength
    outside = tuple(
        element
        for element, modelled, new, before, after in zip(
            case.element, case.modelled_mm, changed.length_mm, case.modelled_diameter_mm, case.diameter_mm, strict=True
        )
        if before != after
        and (min(modelled, new) < low_mm or max(modelled, new) > high_mm or max(before, after) > thickest_mm)
    )
    return LeftOver(
        uncorrected_khz=round(float(alone.shift_khz[0]), 1),
        uncorrected_cut=bool(alone.at_limit[0]),
        outcome=gauge.outcome(changed),
        shift_cut=bool(shift.at_limit[0]),
        residual_gain_db=round(float(shift.residual_gain_db[0]), 4),
        residual_back_front_ratio=round(float(shift.residual_back_front[0]), 5),
        outside=outside,
    )
