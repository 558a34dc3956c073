"""One solved or measured rod carried to every rod of the table.

What is carried is g, the removed reactance over η B; each rod's allowance follows from S at its own length.

Source: own study 2026, computed, unpublished.
"""

import math

from fabgen.physics.boom_closed_form import BoomAllowance, bush_term_mm
from fabgen.physics.boom_coupon import TRANSFER_U_RELATIVE, allowance_from_reactance_factor_mm
from fabgen.physics.boom_mount import BoomMount, Style, wavelength_mm
from fabgen.physics.boom_range import RangeMiss, advice_on, boom_end_misses
from fabgen.physics.boom_uncertainty import (
    Surroundings,
    carrying_u_relative,
    correlated_u_relative,
    end_u_relative,
    method_u_relative,
    widening_u_relative,
)


def solved_allowance(
    mount: BoomMount,
    reactance_factor: float,
    mesh_difference_relative: float,
    rod_length_mm: float,
    frequency_mhz: float,
    near: Surroundings | None = None,
) -> BoomAllowance:
    """Allowance of one rod from a solution of its mount.

    Args:
        mount: the mount, the same that was solved.
        reactance_factor: g of the solution at this rod's length, without bush.
        mesh_difference_relative: difference between the solution's two meshes.
        rod_length_mm: modelled (free) length of this rod.
        frequency_mhz: design frequency, that of the solution.
        near: boom end, neighbours, splices.

    Returns:
        The allowance, bush term included; u as for the closed form, which the boom's surroundings set and not the
        fit, and the mesh difference. Without a number for an unbonded rod near the boom's end.
    """
    near = near or Surroundings()
    method = method_u_relative(mount, rod_length_mm, frequency_mhz, near)
    term_mm = 0.0
    if mount.style is Style.INSULATED_THROUGH:
        term_mm = bush_term_mm(mount, rod_length_mm, frequency_mhz)
    return _carried(
        mount,
        reactance_factor,
        rod_length_mm,
        frequency_mhz,
        near,
        u_relative=math.hypot(method, mesh_difference_relative),
        u_correlated_relative=correlated_u_relative(mount, frequency_mhz, near),
        term_mm=term_mm,
    )


def measured_allowance(
    mount: BoomMount,
    reactance_factor: float,
    coupon_u_relative: float,
    rod_length_mm: float,
    frequency_mhz: float,
    near: Surroundings | None = None,
    *,
    coupon_length_mm: float | None = None,
    difference_u_relative: float = 0.0,
) -> BoomAllowance:
    """Allowance of one rod from a coupon of its mount.

    Args:
        mount: the mount as drawn.
        reactance_factor: g of the record, bush included.
        coupon_u_relative: u(A)/A of the coupon's fit.
        rod_length_mm: modelled (free) length of this rod.
        frequency_mhz: design frequency.
        near: boom end, neighbours, splices.
        coupon_length_mm: free length of the coupon's director, at which g was had; left out: this rod's.
        difference_u_relative: growth for a mount that differs from the record, all items in quadrature.

    Returns:
        The allowance; u is the 6 % for carrying three-rod results to the full array, what g is off by at another
        length, and the growth; the coupon's own u is common to all rods. Rods near the boom's end, a splice or a
        clamp keep what those add: the coupon's rod stood free of them.
    """
    near = near or Surroundings()
    known_mm = rod_length_mm if coupon_length_mm is None else coupon_length_mm
    off = carrying_u_relative(mount, frequency_mhz, known_mm, rod_length_mm)
    u_relative = math.hypot(TRANSFER_U_RELATIVE, off, difference_u_relative, widening_u_relative(mount, near))
    unbonded = mount.style is not Style.BONDED_THROUGH
    if unbonded and near.end_distance_mm is not None and near.end_distance_mm < 3.3 * mount.outside_mm:
        u_relative = math.hypot(u_relative, 0.15)
    return _carried(
        mount,
        reactance_factor,
        rod_length_mm,
        frequency_mhz,
        near,
        u_relative=u_relative,
        u_correlated_relative=coupon_u_relative,
        term_mm=0.0,
    )


def _carried(
    mount: BoomMount,
    reactance_factor: float,
    rod_length_mm: float,
    frequency_mhz: float,
    near: Surroundings,
    *,
    u_relative: float,
    u_correlated_relative: float,
    term_mm: float,
) -> BoomAllowance:
    misses: tuple[RangeMiss, ...] = boom_end_misses(mount, near.end_distance_mm)
    advice = advice_on(mount, misses, near.end_distance_mm, near.widening_distance_mm)
    u_end = end_u_relative(mount, near)
    if misses:
        return BoomAllowance(None, None, None, 0.0, u_relative, u_correlated_relative, u_end, 0.0, None, misses, advice)
    air_mm = allowance_from_reactance_factor_mm(
        reactance_factor,
        boom_mm=mount.outside_mm,
        rod_diameter_mm=mount.rod_diameter_mm,
        rod_length_mm=rod_length_mm,
        frequency_mhz=frequency_mhz,
    )
    allowance_mm = air_mm + term_mm
    u_bush_mm = abs(term_mm) / 2
    parts = (u_relative, u_correlated_relative, u_end)
    return BoomAllowance(
        allowance_mm=allowance_mm,
        allowance_wl=allowance_mm / wavelength_mm(frequency_mhz),
        reactance_factor=reactance_factor,
        bush_term_mm=term_mm,
        u_relative=u_relative,
        u_correlated_relative=u_correlated_relative,
        u_end_relative=u_end,
        u_bush_mm=u_bush_mm,
        u_mm=math.hypot(*(part * allowance_mm for part in parts), u_bush_mm),
        misses=(),
        advice=advice,
    )
