"""Where the closed forms of the boom's effect hold, why they stop, and what the builder can do instead.

Source: own study 2026, computed, unpublished.
"""

from enum import Enum

from fabgen.frozen import frozen
from fabgen.physics.boom_mount import BoomMount, Section, Style, wavelength_mm

_ROUNDING = 1e-9


class Advice(Enum):
    """What to do or know; the value is the sentence to print."""

    BOND = "bond the rod to both walls, or clear the hole and bush it: a film is no mount"
    BUSH = "open the hole and use a bush with more air or a lower permittivity"
    SOLVE = "run the full solver on this mount"
    MEASURE = "measure this mount with a coupon"
    LONGER_BOOM = "leave at least 2 boom widths beyond the end rods"
    LONGER_BOOM_UNBONDED = "leave at least 3.3 boom widths beyond the end rods"
    MOVE_SPLICE = "keep splices and clamps at least 2 boom widths from a rod: they act as a wider boom"
    RAISE_ROD = "raise the rod off the boom so that it cannot touch, or bond it through"
    SOLVE_THIS_LENGTH = "run the full solver: for this mount the closed form is rough so far from 0.45 wavelengths"
    SMALLER_HOLE = "use a smaller hole"
    BOND_BOTH_WALLS = "make metal contact where the rod leaves the metal, on both sides, and keep it for life"


class Reason(Enum):
    """Why there is no computed value; the value is the sentence to print."""

    RECTANGULAR = "no closed form covers a rectangular boom"
    SOLID_SQUARE_INSULATED = "no closed form covers an insulated rod through a solid square or rectangular bar"
    FILM_INSULATION = (
        "an anodic film or paint in a tight hole is a capacitor, resonant somewhere between 432 and 1296 MHz"
    )
    BUSH_CAPACITANCE = "the bush's capacitance is no longer a small correction"
    BOOM_TOO_SMALL = "boom below the range in wavelengths"
    BOOM_TOO_LARGE = "boom above the range in wavelengths"
    ROD_TOO_THIN = "rod diameter below the range in wavelengths"
    ROD_TOO_THICK = "rod diameter above the range in wavelengths"
    BOOM_TO_ROD = "boom less than 1.25 rod diameters wide"
    ROD_TOO_SHORT = "rod shorter than the range in wavelengths"
    ROD_TOO_LONG = "rod longer than the range in wavelengths"
    HOLE_TOO_LARGE = "hole larger than 0.85 of the boom's inside"
    GAP_TOO_SMALL = "rod touches the boom or nearly so"
    TOO_HIGH = "rod too high above the boom"
    BOOM_END = "unbonded rod nearer than 2 boom widths to the boom's end"


@frozen
class RangeMiss:
    """One limit that a mount misses.

    Attributes:
        reason: which limit.
        measured: the mount's figure; 0 where the reason is no number.
        required: the limit it misses.
        unit: "wl" wavelengths, "mm", or empty for a ratio.
    """

    reason: Reason
    measured: float
    required: float
    unit: str


def _below(value: float, limit: float) -> bool:
    return value < limit * (1 - _ROUNDING)


def _above(value: float, limit: float) -> bool:
    return value > limit * (1 + _ROUNDING)


def range_misses(mount: BoomMount, rod_length_mm: float, frequency_mhz: float) -> tuple[RangeMiss, ...]:
    """Limits of the closed forms that a mount misses, boom ends left out.

    Args:
        mount: the mount.
        rod_length_mm: modelled (free) rod length.
        frequency_mhz: design frequency.

    Returns:
        Every limit missed; empty inside the range: boom .005 to .055 wavelengths, rod diameter .0015 to .0085,
        boom at least 1.25 rod diameters, rod length .39 to .495, hole at most 0.85 of the bore, on top a gap of
        at least .02 diameters and a height of at most 2.5 boom widths and .11 wavelengths.
    """
    wl_mm = wavelength_mm(frequency_mhz)
    sizes = (
        (mount.outside_mm / wl_mm, 0.005, 0.055, Reason.BOOM_TOO_SMALL, Reason.BOOM_TOO_LARGE),
        (mount.rod_diameter_mm / wl_mm, 0.0015, 0.0085, Reason.ROD_TOO_THIN, Reason.ROD_TOO_THICK),
        (rod_length_mm / wl_mm, 0.39, 0.495, Reason.ROD_TOO_SHORT, Reason.ROD_TOO_LONG),
    )
    misses = _shape_misses(mount)
    for value_wl, low_wl, high_wl, too_low, too_high in sizes:
        if _below(value_wl, low_wl):
            misses.append(RangeMiss(too_low, value_wl, low_wl, "wl"))
        if _above(value_wl, high_wl):
            misses.append(RangeMiss(too_high, value_wl, high_wl, "wl"))
    width_ratio = mount.outside_mm / mount.rod_diameter_mm
    if _below(width_ratio, 1.25):
        misses.append(RangeMiss(Reason.BOOM_TO_ROD, width_ratio, 1.25, ""))
    if mount.style is Style.INSULATED_THROUGH and _above(mount.hole_mm, 0.85 * mount.bore_mm):
        misses.append(RangeMiss(Reason.HOLE_TOO_LARGE, mount.hole_mm, 0.85 * mount.bore_mm, "mm"))
    if mount.style is Style.ON_TOP:
        highest_mm = min(2.5 * mount.outside_mm, 0.11 * wl_mm)
        if _below(mount.gap_mm, 0.02 * mount.rod_diameter_mm):
            misses.append(RangeMiss(Reason.GAP_TOO_SMALL, mount.gap_mm, 0.02 * mount.rod_diameter_mm, "mm"))
        if _above(mount.axis_height_mm, highest_mm):
            misses.append(RangeMiss(Reason.TOO_HIGH, mount.axis_height_mm, highest_mm, "mm"))
    return tuple(misses)


def _shape_misses(mount: BoomMount) -> list[RangeMiss]:
    insulated = mount.style is Style.INSULATED_THROUGH
    misses = []
    if insulated and mount.solid and mount.section is not Section.ROUND:
        misses.append(RangeMiss(Reason.SOLID_SQUARE_INSULATED, 0.0, 0.0, ""))
    elif mount.section is Section.RECTANGULAR:
        misses.append(RangeMiss(Reason.RECTANGULAR, 0.0, 0.0, ""))
    if mount.film_insulation:
        misses.append(RangeMiss(Reason.FILM_INSULATION, 0.0, 0.0, ""))
    return misses


def boom_end_misses(mount: BoomMount, end_distance_mm: float | None) -> tuple[RangeMiss, ...]:
    """The boom-end limit: none for a bonded rod, 2 boom widths for an insulated or raised one.

    Args:
        mount: the mount.
        end_distance_mm: rod axis to the nearest sawn end; None for a boom that ends far away.

    Returns:
        One miss or none.
    """
    if mount.style is Style.BONDED_THROUGH or end_distance_mm is None:
        return ()
    if _below(end_distance_mm, 2 * mount.outside_mm):
        return (RangeMiss(Reason.BOOM_END, end_distance_mm, 2 * mount.outside_mm, "mm"),)
    return ()


_REMEDIES = {
    Reason.FILM_INSULATION: (Advice.BOND, Advice.MEASURE),
    Reason.BUSH_CAPACITANCE: (Advice.BUSH, Advice.BOND, Advice.MEASURE),
    Reason.HOLE_TOO_LARGE: (Advice.SMALLER_HOLE, Advice.SOLVE, Advice.MEASURE),
    Reason.GAP_TOO_SMALL: (Advice.RAISE_ROD, Advice.MEASURE),
    Reason.BOOM_END: (Advice.LONGER_BOOM_UNBONDED, Advice.MEASURE),
}


def advice_on(
    mount: BoomMount,
    misses: tuple[RangeMiss, ...],
    end_distance_mm: float | None = None,
    widening_distance_mm: float | None = None,
) -> tuple[Advice, ...]:
    """What the builder should do about this mount, cheapest first.

    Args:
        mount: the mount.
        misses: the limits it misses.
        end_distance_mm: rod axis to the nearest sawn boom end.
        widening_distance_mm: rod axis to the nearest splice sleeve or clamp.

    Returns:
        Advice without repetition.
    """
    advice: list[Advice] = []
    for miss in misses:
        advice += _REMEDIES.get(miss.reason, (Advice.SOLVE, Advice.MEASURE))
    bonded = mount.style is Style.BONDED_THROUGH
    if end_distance_mm is not None:
        if bonded and _below(end_distance_mm, 2 * mount.outside_mm):
            advice.append(Advice.LONGER_BOOM)
        if not bonded and _below(end_distance_mm, 3.3 * mount.outside_mm):
            advice.append(Advice.LONGER_BOOM_UNBONDED)
    if widening_distance_mm is not None and _below(widening_distance_mm, 2 * mount.outside_mm):
        advice.append(Advice.MOVE_SPLICE)
    if bonded:
        advice.append(Advice.BOND_BOTH_WALLS)
    return tuple(dict.fromkeys(advice))


def touching_allowance_ratios(section: Section) -> tuple[float, float] | None:
    """Between what a rod that touches the boom's top takes, over boom diameter or side; to print, never to cut by.

    Contact there is a matter of chance, and print has 0.06 for it, which cannot be the value of a rod that touches a
    long boom: measure.

    Args:
        section: the boom's cross-section.

    Returns:
        Lowest and highest ratio; None for a rectangular boom.

    Source: own study 2026, computed, unpublished.
    """
    return {Section.ROUND: (0.19, 0.33), Section.SQUARE: (0.28, 0.55)}.get(section)
