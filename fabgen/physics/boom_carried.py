"""One solved or measured rod carried to every rod of the table, and to a mount that differs a little from the record.

What is carried is g, the removed reactance over η B; each rod's allowance follows from S at its own length.

Source: own study 2026, computed, unpublished.
"""

import math
from dataclasses import dataclass, replace
from enum import Enum

from fabgen.physics.boom_closed_form import (
    BoomAllowance,
    bonded_reactance_factor,
    bush_term_mm,
    relative_allowance,
    rod_slope_ohm_per_wl,
)
from fabgen.physics.boom_coupon import (
    TRANSFER_U_RELATIVE,
    allowance_from_reactance_factor_mm,
    reactance_factor_from_allowance,
)
from fabgen.physics.boom_mount import ETA_OHM, BoomMount, Section, Style, wavelength_mm
from fabgen.physics.boom_range import RangeMiss, advice_on, boom_end_misses
from fabgen.physics.boom_uncertainty import (
    Surroundings,
    correlated_u_relative,
    end_u_relative,
    method_u_relative,
)

_LARGEST_GROWTH = 0.10
_LARGEST_CHANGE = 0.25


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
        reactance_factor: g of the solution, without bush.
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
        difference_u_relative: growth for a mount that differs from the record, all items in quadrature.

    Returns:
        The allowance; u is the 6 % for carrying three-rod results to the full array and the growth, the coupon's own
        u is common to all rods. Rods near the boom's end keep what the end adds.
    """
    near = near or Surroundings()
    u_relative = math.hypot(TRANSFER_U_RELATIVE, difference_u_relative)
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


def nearest_closed_form_mm(mount: BoomMount, rod_length_mm: float, frequency_mhz: float) -> float:
    """Allowance of the nearest closed form, whatever its range: to start a solver and to compare, never to cut by.

    Args:
        mount: the mount.
        rod_length_mm: modelled (free) rod length.
        frequency_mhz: design frequency.

    Returns:
        A rough allowance in mm; a rectangular boom counts as a round one of 1.1 times its mean side, and an
        unbonded rod on or through it, or through a solid square bar, as half bonded.
    """
    solid_flat = mount.style is Style.INSULATED_THROUGH and mount.solid and mount.section is not Section.ROUND
    if mount.section is not Section.RECTANGULAR and not solid_flat:
        return relative_allowance(mount, rod_length_mm, frequency_mhz) * mount.outside_mm
    wl_mm = wavelength_mm(frequency_mhz)
    round_mm = 1.1 * (mount.outside_mm + (mount.height_mm or mount.outside_mm)) / 2
    rod_wl = mount.rod_diameter_mm / wl_mm
    slope = rod_slope_ohm_per_wl(rod_wl, rod_length_mm / wl_mm)
    bonded_mm = ETA_OHM * round_mm * bonded_reactance_factor(round_mm / wl_mm, rod_wl) / slope
    return bonded_mm if mount.style is Style.BONDED_THROUGH else bonded_mm / 2


class Item(Enum):
    """What may differ between a record and the drawn mount; the value is the word to print."""

    STYLE = "style"
    SECTION = "section"
    SOLID = "solid or tube"
    FILM = "film insulation"
    ROD = "rod diameter"
    BOOM = "boom"
    BOOM_HEIGHT = "boom height"
    WALL = "wall"
    HOLE = "hole"
    HEIGHT = "height above the boom"
    BUSH_PERMITTIVITY = "bush permittivity"
    BUSH_LENGTH = "bush length"
    FREQUENCY = "frequency"


@dataclass(frozen=True, slots=True)
class Difference:
    """One item in which the drawn mount differs from the record.

    Attributes:
        item: what differs.
        recorded: the record's value, as text.
        drawn: the drawn value, as text.
        u_relative: how much the allowance's u grows: the change of g that theory gives for this item alone.
        refused: True if this makes it another mount.
    """

    item: Item
    recorded: str
    drawn: str
    u_relative: float
    refused: bool


def differences(recorded: BoomMount, recorded_mhz: float, drawn: BoomMount, drawn_mhz: float) -> tuple[Difference, ...]:
    """Items in which a drawn mount differs from a record's, and how much u grows for each.

    Args:
        recorded: the record's mount.
        recorded_mhz: the record's frequency.
        drawn: the drawn mount.
        drawn_mhz: the design frequency.

    Returns:
        The differing items. Another style or section, tube against solid bar, film against bush, an item that moves
        g by more than 10 %, or a size or frequency that differs by more than a quarter is another mount.
    """
    kinds: tuple[tuple[Item, str | bool, str | bool], ...] = (
        (Item.STYLE, recorded.style.value, drawn.style.value),
        (Item.SECTION, recorded.section.value, drawn.section.value),
        (Item.SOLID, recorded.solid, drawn.solid),
        (Item.FILM, recorded.film_insulation, drawn.film_insulation),
    )
    found = [Difference(item, str(old), str(new), 0.0, True) for item, old, new in kinds if old != new]
    if found:
        return tuple(found)
    fields = {
        Item.ROD: "rod_diameter_mm",
        Item.BOOM: "outside_mm",
        Item.BOOM_HEIGHT: "height_mm",
        Item.WALL: "wall_mm",
        Item.HOLE: "hole_mm",
        Item.HEIGHT: "axis_height_mm",
        Item.BUSH_PERMITTIVITY: "bush_permittivity",
        Item.BUSH_LENGTH: "bush_length_mm",
    }
    start = _reactance_factor(recorded, recorded_mhz)
    for item, field in fields.items():
        old, new = getattr(recorded, field), getattr(drawn, field)
        if math.isclose(old, new, rel_tol=1e-9, abs_tol=1e-9):
            continue
        try:
            growth = abs(_reactance_factor(replace(recorded, **{field: new}), recorded_mhz) / start - 1)
        except ValueError:
            growth = math.inf
        sized = item not in (Item.BUSH_PERMITTIVITY, Item.BUSH_LENGTH)
        other = growth > _LARGEST_GROWTH or (sized and abs(new - old) > _LARGEST_CHANGE * old)
        found.append(Difference(item, f"{old:g}", f"{new:g}", growth, other))
    if not math.isclose(recorded_mhz, drawn_mhz, rel_tol=1e-9):
        growth = abs(_reactance_factor(recorded, drawn_mhz) / start - 1)
        other = growth > _LARGEST_GROWTH or abs(drawn_mhz - recorded_mhz) > _LARGEST_CHANGE * recorded_mhz
        old_text, new_text = f"{recorded_mhz:g} MHz", f"{drawn_mhz:g} MHz"
        found.append(Difference(Item.FREQUENCY, old_text, new_text, growth, other))
    return tuple(found)


def _reactance_factor(mount: BoomMount, frequency_mhz: float) -> float:
    """The factor g of theory for a rod of 0.45 wavelengths, bush included."""
    length_mm = 0.45 * wavelength_mm(frequency_mhz)
    allowance_mm = nearest_closed_form_mm(mount, length_mm, frequency_mhz)
    if mount.style is Style.INSULATED_THROUGH:
        allowance_mm += bush_term_mm(mount, length_mm, frequency_mhz)
    return reactance_factor_from_allowance(
        allowance_mm,
        boom_mm=mount.outside_mm,
        rod_diameter_mm=mount.rod_diameter_mm,
        rod_length_mm=length_mm,
        frequency_mhz=frequency_mhz,
    )
