"""How uncertain a computed allowance is, and what stands near the rod that makes it so.

All u are standard uncertainties (k = 1), relative to the allowance.

Source: own study 2026, computed, unpublished.
"""

import math

from fabgen.frozen import frozen
from fabgen.physics.boom_mount import BoomMount, Section, Style, wavelength_mm


@frozen
class Surroundings:
    """What stands near the rod on the boom; None where there is nothing to reckon with.

    Attributes:
        end_distance_mm: rod axis to the nearest sawn boom end.
        neighbour_distance_mm: rod axis to the nearest other rod's axis.
        widening_distance_mm: rod axis to the nearest splice sleeve or clamp.
        interior: True for a rod with rods on both sides, whose allowance its neighbours raise together.
    """

    end_distance_mm: float | None = None
    neighbour_distance_mm: float | None = None
    widening_distance_mm: float | None = None
    interior: bool = True

    def __post_init__(self) -> None:
        for distance_mm in (self.end_distance_mm, self.neighbour_distance_mm):
            if distance_mm is not None and distance_mm <= 0:
                raise ValueError("distances to the boom's end and to the next rod must be positive")
        if self.widening_distance_mm is not None and self.widening_distance_mm < 0:
            raise ValueError("the distance to a splice or clamp is not negative")


def method_u_relative(mount: BoomMount, rod_length_mm: float, frequency_mhz: float, near: Surroundings) -> float:
    """Standard uncertainty of the closed form for one rod, relative to its allowance.

    Args:
        mount: the mount.
        rod_length_mm: modelled (free) rod length.
        frequency_mhz: design frequency.
        near: what stands near the rod.

    Returns:
        6 % bonded, 8 % insulated in round stock, 10 % on top, insulated in square tube or with a rod nearer than
        0.15 wavelengths; 15 % for an unbonded rod 2 to 3.3 boom widths from the end; 2 % more outside
        .42 to .48 wavelengths; in quadrature 10 % for a splice or clamp within 2 boom widths (a judgement).

    Source: own study 2026, computed, unpublished.
    """
    wl_mm = wavelength_mm(frequency_mhz)
    length_wl = rod_length_mm / wl_mm
    bonded = mount.style is Style.BONDED_THROUGH
    round_hole = mount.style is Style.INSULATED_THROUGH and mount.section is Section.ROUND
    u = 0.06 if bonded else 0.08 if round_hole else 0.10
    if near.neighbour_distance_mm is not None and near.neighbour_distance_mm < 0.15 * wl_mm:
        u = max(u, 0.10)
    if not bonded and near.end_distance_mm is not None and near.end_distance_mm < 3.3 * mount.outside_mm:
        u = max(u, 0.15)
    if not 0.42 <= length_wl <= 0.48:
        u += 0.02
    return math.hypot(u, widening_u_relative(mount, near))


def widening_u_relative(mount: BoomMount, near: Surroundings) -> float:
    """Relative u for a splice or clamp near the rod, which acts as a wider boom.

    Args:
        mount: the mount.
        near: how far the splice or clamp is.

    Returns:
        10 % within 2 boom widths, else 0.

    Source: own study 2026, a judgement, unpublished.
    """
    near_mm = near.widening_distance_mm
    return 0.10 if near_mm is not None and near_mm < 2 * mount.outside_mm else 0.0


def correlated_u_relative(mount: BoomMount, frequency_mhz: float, near: Surroundings) -> float:
    """Relative u common to all interior rods: rods about 0.2 wavelengths apart on one boom raise it together.

    Args:
        mount: the mount.
        frequency_mhz: design frequency.
        near: whether the rod is an interior one.

    Returns:
        2 % for a boom below .02 wavelengths, else 3 %; 0 for an end rod.

    Source: own study 2026, computed, unpublished.
    """
    if not near.interior:
        return 0.0
    return 0.02 if mount.outside_mm / wavelength_mm(frequency_mhz) < 0.02 else 0.03


def end_u_relative(mount: BoomMount, near: Surroundings) -> float:
    """Relative u of a bonded rod for the boom's near end, which lowers g by about as much.

    Args:
        mount: the mount.
        near: how far the end is.

    Returns:
        0.12 B/e; 0 for unbonded rods, whose u the end raises in `method_u_relative`.

    Source: own study 2026, computed, unpublished.
    """
    if mount.style is not Style.BONDED_THROUGH or near.end_distance_mm is None:
        return 0.0
    return 0.12 * mount.outside_mm / near.end_distance_mm


def carrying_u_relative(mount: BoomMount, frequency_mhz: float, known_length_mm: float, rod_length_mm: float) -> float:
    """How far g, taken from a rod of one length, is off for a rod of another.

    A boom changes a rod's radiation resistance too, the more the farther its metal is from the rod's axis; g is then
    not the same for all lengths. Solved from .40 to .49 wavelengths: bonded 20 B, insulated 60 B, on top
    0.2 + 30 B + 160 t (axis height t) for each wavelength of difference in length.

    Args:
        mount: the mount.
        frequency_mhz: design frequency.
        known_length_mm: free length of the rod that g was had from.
        rod_length_mm: free length of the rod it is used for.

    Returns:
        The relative difference, as a standard uncertainty.

    Source: own study 2026, computed, unpublished; seen in the phase of a wire-cage boom of a reference library too.
    """
    wl_mm = wavelength_mm(frequency_mhz)
    boom_wl, height_wl = mount.outside_mm / wl_mm, mount.axis_height_mm / wl_mm
    per_length_wl = {
        Style.BONDED_THROUGH: 20 * boom_wl,
        Style.INSULATED_THROUGH: 60 * boom_wl,
        Style.ON_TOP: 0.2 + 30 * boom_wl + 160 * height_wl,
    }[mount.style]
    return per_length_wl * abs(rod_length_mm - known_length_mm) / wl_mm
