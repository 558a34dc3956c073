"""What a metal boom takes from a parasitic rod, by closed form: length to add, uncertainty, or why there is none.

The boom removes the inductance of about a boom's width of wire at the current maximum; the allowance is that
reactance divided by the free rod's own reactance slope S, so it depends on the rod's modelled length. Constants
fitted to full-wave solutions of one isolated rod on a long boom. Theory, not measurement.

Source: own study 2026, computed, unpublished.
"""

import math

from fabgen.frozen import frozen
from fabgen.physics.boom_mount import ETA_OHM, BoomMount, Section, Style, wavelength_mm
from fabgen.physics.boom_range import Advice, RangeMiss, Reason, advice_on, boom_end_misses, range_misses
from fabgen.physics.boom_uncertainty import (
    Surroundings,
    carrying_u_relative,
    correlated_u_relative,
    end_u_relative,
    method_u_relative,
)

_SQUARE_SIDES_WL = (0.01, 0.02, 0.03, 0.045)
_SQUARE_FACTORS = (1.135, 1.107, 1.106, 1.092)
_SQUARE_TUBE_FACTOR = 1.14
_ON_TOP_CONSTANTS = {
    Section.ROUND: (0.500, 1.388, 0.355, 4.162, 0.521),
    Section.SQUARE: (0.279, 0.968, 0.309, 4.312, 0.522),
}
_EPSILON_0_F_M = 8.8541878128e-12
_MU_0_OVER_2_PI_H_M = 2e-7


@frozen
class BoomAllowance:
    """Length to add to one rod because of its mount, or the reasons why none is computed.

    Attributes:
        allowance_mm: length to add, bush term included; None outside the range.
        allowance_wl: the same in wavelengths.
        reactance_factor: g, the removed reactance over η B in wavelengths, without the bush.
        bush_term_mm: what the bush's dielectric changes, contained in the allowance, 0 or negative.
        u_relative: standard uncertainty of the method, without the parts below, relative to the allowance.
        u_correlated_relative: part common to all interior rods of the boom.
        u_end_relative: part due to the boom's near end.
        u_bush_mm: part due to the bush's dielectric.
        u_mm: all parts in quadrature (JCGM 100); None outside the range.
        misses: what lies outside the range; empty when there is a value.
        advice: what the builder should do or know.
    """

    allowance_mm: float | None
    allowance_wl: float | None
    reactance_factor: float | None
    bush_term_mm: float
    u_relative: float
    u_correlated_relative: float
    u_end_relative: float
    u_bush_mm: float
    u_mm: float | None
    misses: tuple[RangeMiss, ...]
    advice: tuple[Advice, ...]


def rod_slope_ohm_per_wl(diameter_wl: float, length_wl: float) -> float:
    """Reactance slope S of a free half-wave rod against its length, at its own length.

    Args:
        diameter_wl: rod diameter in wavelengths, .0015 to .0085.
        length_wl: modelled (free) rod length in wavelengths, .39 to .495.

    Returns:
        S in ohm per wavelength of length.

    Source: own study 2026, computed, unpublished; fit within 0.4 %.
    """
    shift_wl = length_wl - 0.45
    at_045 = 514.3 * math.log(1 / diameter_wl) - 1027.5
    return at_045 * math.exp(-5.687 * shift_wl + 2.156 * shift_wl**2)


def square_factor(side_wl: float) -> float:
    """Diameter of the round boom that acts as a square one does on a bonded rod, over the side.

    Args:
        side_wl: side in wavelengths, up to .055.

    Returns:
        The factor, linear between fitted points, level outside them (at .055 within 0.3 % of the solver).

    Source: own study 2026, computed, unpublished.
    """
    if side_wl <= _SQUARE_SIDES_WL[0]:
        return _SQUARE_FACTORS[0]
    for i in range(1, len(_SQUARE_SIDES_WL)):
        low_wl, high_wl = _SQUARE_SIDES_WL[i - 1 : i + 1]
        if side_wl <= high_wl:
            part = (side_wl - low_wl) / (high_wl - low_wl)
            return _SQUARE_FACTORS[i - 1] + part * (_SQUARE_FACTORS[i] - _SQUARE_FACTORS[i - 1])
    return _SQUARE_FACTORS[-1]


def bonded_reactance_factor(boom_wl: float, diameter_wl: float) -> float:
    """The factor g of a rod bonded through a round boom: its removed reactance over η B.

    Args:
        boom_wl: boom diameter in wavelengths.
        diameter_wl: rod diameter in wavelengths.

    Returns:
        g; rms error 1.3 %, largest 3.6 % over 147 solved cases.

    Source: own study 2026, computed, unpublished.
    """
    return math.log(boom_wl / diameter_wl) + 0.807 - 3.01 * boom_wl


def buried_factor(mount: BoomMount) -> float:
    """Part of g that an insulated rod keeps: the inductance of the length inside boom and holes.

    Args:
        mount: an insulated-through mount.

    Returns:
        The factor to subtract from the bonded one.

    Source: own study 2026, computed, unpublished.
    """
    hole_log = math.log(mount.hole_mm / mount.rod_diameter_mm)
    if mount.solid:
        return hole_log
    in_walls = 2 * mount.wall_mm / mount.outside_mm
    return (1 - in_walls) * math.log(mount.bore_mm / mount.rod_diameter_mm) + in_walls * hole_log


def relative_allowance(mount: BoomMount, rod_length_mm: float, frequency_mhz: float) -> float:
    """Allowance over boom diameter or side, A/B, by the closed form of this mount, bush left out.

    Args:
        mount: a mount the closed forms cover; ranges are not checked here.
        rod_length_mm: modelled (free) rod length.
        frequency_mhz: design frequency.

    Returns:
        A/B.

    Raises:
        ValueError: no closed form covers this section.

    Source: own study 2026, computed, unpublished.
    """
    wl_mm = wavelength_mm(frequency_mhz)
    boom_wl, diameter_wl = mount.outside_mm / wl_mm, mount.rod_diameter_mm / wl_mm
    eta_over_slope = ETA_OHM / rod_slope_ohm_per_wl(diameter_wl, rod_length_mm / wl_mm)
    square = mount.section is Section.SQUARE
    if mount.section is Section.RECTANGULAR:
        raise ValueError("no closed form covers a rectangular boom")
    if mount.style is Style.ON_TOP:
        c0, c1, c2, c3, c4 = _ON_TOP_CONSTANTS[mount.section]
        height_ratio = mount.axis_height_mm / mount.outside_mm
        gap_ratio = mount.gap_mm / mount.outside_mm
        below = c0 + c1 * height_ratio + c2 * diameter_wl / boom_wl + c4 * math.sqrt(gap_ratio)
        return eta_over_slope * (1 - c3 * mount.axis_height_mm / wl_mm) / below
    if mount.style is Style.BONDED_THROUGH:
        factor = square_factor(boom_wl) if square else 1.0
        return eta_over_slope * factor * bonded_reactance_factor(factor * boom_wl, diameter_wl)
    if square and mount.solid:
        raise ValueError("no closed form covers an insulated rod through a solid square bar")
    round_value = eta_over_slope * (bonded_reactance_factor(boom_wl, diameter_wl) - buried_factor(mount))
    return _SQUARE_TUBE_FACTOR * round_value if square else round_value


def bush_reactance_ratio(mount: BoomMount, frequency_mhz: float) -> float:
    """Current that the bush's dielectric takes, over the rod current, at the buried length.

    The two bushes are capacitors in series across the buried length's inductance. In a solid bar voltage grows
    from the middle outwards, so a bush counts by the square of its distance from the middle. Air in the hole
    belongs to the closed form; only permittivity above 1 counts here.

    Args:
        mount: an insulated-through mount.
        frequency_mhz: design frequency.

    Returns:
        X B_C, small against 1.

    Source: own study 2026, computed, unpublished.
    """
    half_mm = mount.outside_mm / 2
    acting_mm = min(mount.bush_length_mm, half_mm)
    if mount.solid:
        acting_mm = (half_mm**3 - (half_mm - acting_mm) ** 3) / (3 * half_mm**2)
    per_metre = 2 * math.pi * _EPSILON_0_F_M * (mount.bush_permittivity - 1)
    series_f = per_metre * acting_mm / 1000 / math.log(mount.hole_mm / mount.rod_diameter_mm) / 2
    omega = 2 * math.pi * frequency_mhz * 1e6
    buried_ohm = omega * _MU_0_OVER_2_PI_H_M * mount.outside_mm / 1000 * buried_factor(mount)
    return buried_ohm * omega * series_f


def bush_term_mm(mount: BoomMount, rod_length_mm: float, frequency_mhz: float) -> float:
    """What the bush's dielectric adds to the allowance of an insulated-through mount: 0 or negative.

    Args:
        mount: an insulated-through mount.
        rod_length_mm: modelled (free) rod length.
        frequency_mhz: design frequency.

    Returns:
        The term in mm, first order in the bush's susceptance; half of it is its standard uncertainty.

    Source: own study 2026, computed, unpublished.
    """
    wl_mm = wavelength_mm(frequency_mhz)
    slope = rod_slope_ohm_per_wl(mount.rod_diameter_mm / wl_mm, rod_length_mm / wl_mm)
    air_mm = ETA_OHM * buried_factor(mount) * mount.outside_mm / slope
    return -air_mm * bush_reactance_ratio(mount, frequency_mhz)


def closed_form_allowance(
    mount: BoomMount, rod_length_mm: float, frequency_mhz: float, near: Surroundings | None = None
) -> BoomAllowance:
    """Allowance of one parasitic rod by closed form, with its uncertainty; or why there is no value.

    Args:
        mount: the mount.
        rod_length_mm: modelled (free) length of this rod.
        frequency_mhz: design frequency.
        near: boom end, neighbours, splices; left out: an interior rod far from all of them.

    Returns:
        The allowance; without a number, and with what is missed, outside the range. u is no less than what
        the closed form's dependence on rod length is off by, which counts above the boom and in wide tubes.

    Source: own study 2026, computed, unpublished.
    """
    near = near or Surroundings()
    wl_mm = wavelength_mm(frequency_mhz)
    misses = range_misses(mount, rod_length_mm, frequency_mhz)
    misses += boom_end_misses(mount, near.end_distance_mm)
    insulated = mount.style is Style.INSULATED_THROUGH
    if insulated and not misses:
        ratio = bush_reactance_ratio(mount, frequency_mhz)
        if ratio > 0.1:
            misses += (RangeMiss(Reason.BUSH_CAPACITANCE, ratio, 0.1, ""),)
    advice = advice_on(mount, misses, near.end_distance_mm, near.widening_distance_mm)
    u_relative = method_u_relative(mount, rod_length_mm, frequency_mhz, near)
    length_u = carrying_u_relative(mount, frequency_mhz, 0.45 * wl_mm, rod_length_mm)
    if length_u > u_relative:
        u_relative = length_u
        advice += () if misses else (Advice.SOLVE_THIS_LENGTH,)
    u_correlated = correlated_u_relative(mount, frequency_mhz, near)
    u_end = end_u_relative(mount, near)
    if misses:
        return BoomAllowance(None, None, None, 0.0, u_relative, u_correlated, u_end, 0.0, None, misses, advice)
    air_mm = relative_allowance(mount, rod_length_mm, frequency_mhz) * mount.outside_mm
    slope = rod_slope_ohm_per_wl(mount.rod_diameter_mm / wl_mm, rod_length_mm / wl_mm)
    term_mm = bush_term_mm(mount, rod_length_mm, frequency_mhz) if insulated else 0.0
    allowance_mm = air_mm + term_mm
    u_bush_mm = abs(term_mm) / 2
    u_mm = math.hypot(*(u * allowance_mm for u in (u_relative, u_correlated, u_end)), u_bush_mm)
    return BoomAllowance(
        allowance_mm=allowance_mm,
        allowance_wl=allowance_mm / wl_mm,
        reactance_factor=air_mm * slope / (ETA_OHM * mount.outside_mm),
        bush_term_mm=term_mm,
        u_relative=u_relative,
        u_correlated_relative=u_correlated,
        u_end_relative=u_end,
        u_bush_mm=u_bush_mm,
        u_mm=u_mm,
        misses=(),
        advice=advice,
    )
