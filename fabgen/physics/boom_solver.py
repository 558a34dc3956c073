"""The boom's effect on a rod by full-wave solution: the half-wave mode of the mounted rod matched to a free rod's.

The quantity kept is the characteristic eigenvalue X/R of the half-wave mode. A mounted rod of length L1 and a free rod
of length L0 with the same eigenvalue belong together; the allowance is L1 - L0. The rod stands alone on a long boom of
perfect conductor; bush, film, neighbours and boom ends are not in it.

Source: R. F. Harrington, J. R. Mautz, Theory of characteristic modes for conducting bodies, IEEE Trans. Antennas and
Propagation 19 (1971) 622; mesh and matching: own study 2026, computed, unpublished.
"""

from collections.abc import Callable
from functools import lru_cache

import numpy as np
from scipy.linalg import lu_factor, lu_solve

from fabgen.frozen import frozen
from fabgen.physics.boom_closed_form import rod_slope_ohm_per_wl
from fabgen.physics.boom_coupon import reactance_factor_from_allowance
from fabgen.physics.boom_differences import nearest_closed_form_mm
from fabgen.physics.boom_fill import centre_current, impedance_matrix, uniform_field
from fabgen.physics.boom_mesh import Mesh
from fabgen.physics.boom_mount import BoomMount, Style, wavelength_mm
from fabgen.physics.boom_mount_mesh import (
    DEFAULT,
    FINE,
    LONG_BOOM_HALF_WL,
    Fineness,
    free_rod_mesh,
    mounted_rod_mesh,
    rod_segments,
)
from fabgen.physics.boom_range import RangeMiss, Reason

_FREE_STEP_WL = 0.01
_LENGTH_TOLERANCE_WL = 0.001
_MOST_ROUNDS = 4


@frozen
class Mode:
    """The half-wave mode of a rod.

    Attributes:
        reactance_ratio: the eigenvalue, reactive over radiated power, X/R.
        resistance_ohm: radiation resistance at the rod's middle; only meaningful for a rod that passes it.
        unknowns: number of edge functions.
    """

    reactance_ratio: float
    resistance_ohm: float
    unknowns: int


@frozen
class SolvedAllowance:
    """Allowance of one rod, solved at two mesh sizes.

    Attributes:
        allowance_mm: from the finer mesh.
        coarse_allowance_mm: from the coarser mesh.
        mesh_difference_relative: finer over coarser, less one.
        reactance_factor: g = A S / (η B), the removed reactance over η B; B is `outside_mm`.
        rod_length_mm: modelled (free) rod length it holds for; g carries it to others.
        unknowns: of the coarser and the finer boom mesh.
    """

    allowance_mm: float
    coarse_allowance_mm: float
    mesh_difference_relative: float
    reactance_factor: float
    rod_length_mm: float
    unknowns: tuple[int, int]


Progress = Callable[[str, float], None]
"""Called with what is being done and the part done, 0 to 1."""


def half_wave_mode(mesh: Mesh) -> Mode:
    """Characteristic mode of a mesh that answers a uniform field along the rod.

    Args:
        mesh: the mesh, in wavelengths.

    Returns:
        The mode, after two steps of J ← Z⁻¹ R J.
    """
    impedance = impedance_matrix(mesh)
    resistance, reactance = np.ascontiguousarray(impedance.real), np.ascontiguousarray(impedance.imag)
    factors = lu_factor(impedance, overwrite_a=True, check_finite=False)
    current = lu_solve(factors, uniform_field(mesh).astype(np.complex128))
    for _ in range(2):
        current = lu_solve(factors, resistance @ current)
    radiated = float(np.vdot(current, resistance @ current).real)
    stored = float(np.vdot(current, reactance @ current).real)
    parts = 8 if mesh.mirror_z else 4
    middle = parts / 2 * abs(centre_current(mesh, current))
    return Mode(stored / radiated, parts * radiated / middle**2 if middle else np.inf, mesh.count)


@lru_cache(maxsize=256)
def free_rod_mode(diameter_wl: float, length_wl: float, segments: int, fineness: Fineness) -> Mode:
    """Half-wave mode of a rod in free space.

    Args:
        diameter_wl: rod diameter in wavelengths.
        length_wl: rod length in wavelengths.
        segments: sides per quarter of its polygon.
        fineness: mesh fineness.

    Returns:
        The mode.
    """
    return half_wave_mode(free_rod_mesh(diameter_wl, length_wl, segments, fineness))


def free_rod_length_wl(
    reactance_ratio: float, diameter_wl: float, near_wl: float, segments: int, fineness: Fineness = DEFAULT
) -> float:
    """Length of the free rod whose half-wave mode has a given eigenvalue, by three solved rods.

    Args:
        reactance_ratio: the eigenvalue X/R; 0 is resonance.
        diameter_wl: rod diameter in wavelengths.
        near_wl: expected length in wavelengths.
        segments: sides per quarter of its polygon.
        fineness: mesh fineness.

    Returns:
        Length in wavelengths.
    """
    lengths = (near_wl - _FREE_STEP_WL, near_wl, near_wl + _FREE_STEP_WL)
    values = [free_rod_mode(diameter_wl, length, segments, fineness).reactance_ratio for length in lengths]
    return float(np.polyval(np.polyfit(values, lengths, 2), reactance_ratio))


def solver_misses(mount: BoomMount, rod_length_mm: float, frequency_mhz: float) -> tuple[RangeMiss, ...]:
    """Why a mount cannot be solved.

    Args:
        mount: the mount.
        rod_length_mm: modelled (free) rod length.
        frequency_mhz: design frequency.

    Returns:
        Every limit missed: boom .002 to .08 wavelengths and at least 1.15 rod diameters, rod diameter .0005 to .02,
        rod length .36 to .5, hole at most 0.95 of the bore, gap above a boom at least .02 diameters, no film.
    """
    wl_mm = wavelength_mm(frequency_mhz)
    narrow_mm = min(mount.outside_mm, mount.height_mm or mount.outside_mm)
    wide_mm = max(mount.outside_mm, mount.height_mm)
    rod_mm = mount.rod_diameter_mm
    miss, gap_mm = RangeMiss, mount.gap_mm
    checks = [
        (narrow_mm < 0.002 * wl_mm, miss(Reason.BOOM_TOO_SMALL, narrow_mm / wl_mm, 0.002, "wl")),
        (wide_mm > 0.08 * wl_mm, miss(Reason.BOOM_TOO_LARGE, wide_mm / wl_mm, 0.08, "wl")),
        (rod_mm < 0.0005 * wl_mm, miss(Reason.ROD_TOO_THIN, rod_mm / wl_mm, 0.0005, "wl")),
        (rod_mm > 0.02 * wl_mm, miss(Reason.ROD_TOO_THICK, rod_mm / wl_mm, 0.02, "wl")),
        (rod_length_mm < 0.36 * wl_mm, miss(Reason.ROD_TOO_SHORT, rod_length_mm / wl_mm, 0.36, "wl")),
        (rod_length_mm > 0.5 * wl_mm, miss(Reason.ROD_TOO_LONG, rod_length_mm / wl_mm, 0.5, "wl")),
        (mount.film_insulation, miss(Reason.FILM_INSULATION, 0.0, 0.0, "")),
    ]
    if mount.style is Style.ON_TOP:
        least_mm = 0.02 * rod_mm
        checks.append((gap_mm < least_mm * (1 - 1e-9), miss(Reason.GAP_TOO_SMALL, gap_mm, least_mm, "mm")))
    else:
        checks.append((narrow_mm < 1.15 * rod_mm, miss(Reason.BOOM_TO_ROD, narrow_mm / rod_mm, 1.15, "")))
    if mount.style is Style.INSULATED_THROUGH:
        most_mm = 0.95 * (narrow_mm - 2 * mount.wall_mm)
        checks.append((mount.hole_mm > most_mm, miss(Reason.HOLE_TOO_LARGE, mount.hole_mm, most_mm, "mm")))
    return tuple(found for missed, found in checks if missed)


def solve_at(
    mount: BoomMount,
    rod_length_mm: float,
    frequency_mhz: float,
    fineness: Fineness = DEFAULT,
    guess_mm: float | None = None,
    *,
    boom_half_mm: float | None = None,
) -> tuple[float, int]:
    """Allowance of one rod at one mesh size.

    Args:
        mount: the mount; its bush is left out.
        rod_length_mm: modelled (free) rod length L0.
        frequency_mhz: design frequency.
        fineness: mesh fineness.
        guess_mm: allowance to start from; left out: the nearest closed form's.
        boom_half_mm: boom on each side of the rod, as of a coupon; left out: a long boom.

    Returns:
        Allowance in mm and the number of unknowns of the boom mesh.

    Raises:
        ValueError: the mount cannot be solved; see `solver_misses`.
    """
    misses = solver_misses(mount, rod_length_mm, frequency_mhz)
    if misses:
        raise ValueError("; ".join(miss.reason.value for miss in misses))
    wl_mm = wavelength_mm(frequency_mhz)
    wanted, diameter = rod_length_mm / wl_mm, mount.rod_diameter_mm / wl_mm
    if guess_mm is None:
        guess_mm = nearest_closed_form_mm(mount, rod_length_mm, frequency_mhz)
    mounted = wanted + guess_mm / wl_mm
    segments = rod_segments(mount.style, fineness)
    boom_half_wl = LONG_BOOM_HALF_WL if boom_half_mm is None else boom_half_mm / wl_mm
    for _ in range(_MOST_ROUNDS):
        mode = half_wave_mode(mounted_rod_mesh(mount, wl_mm, mounted, fineness, boom_half_wl))
        free = free_rod_length_wl(mode.reactance_ratio, diameter, wanted, segments, fineness)
        if abs(free - wanted) <= _LENGTH_TOLERANCE_WL:
            break
        mounted += wanted - free
    to_wanted = rod_slope_ohm_per_wl(diameter, free) / rod_slope_ohm_per_wl(diameter, wanted)
    return (mounted - free) * to_wanted * wl_mm, mode.unknowns


def solve_allowance(
    mount: BoomMount,
    rod_length_mm: float,
    frequency_mhz: float,
    *,
    meshes: tuple[Fineness, Fineness] = (DEFAULT, FINE),
    boom_half_mm: float | None = None,
    progress: Progress | None = None,
) -> SolvedAllowance:
    """Allowance of one rod in its mount, at two mesh sizes.

    Args:
        mount: the mount; its bush is left out (add `bush_term_mm`).
        rod_length_mm: modelled (free) rod length L0.
        frequency_mhz: design frequency.
        meshes: the coarser and the finer mesh.
        boom_half_mm: boom on each side of the rod, as of a coupon; left out: a long boom.
        progress: told what is going on.

    Returns:
        The allowance of the finer mesh with its difference from the coarser.

    Raises:
        ValueError: the mount cannot be solved; see `solver_misses`.
    """
    tell = progress or (lambda _what, _part: None)
    tell("coarser mesh", 0.0)
    coarse_mm, few = solve_at(mount, rod_length_mm, frequency_mhz, meshes[0], boom_half_mm=boom_half_mm)
    tell("finer mesh", 0.2)
    fine_mm, many = solve_at(mount, rod_length_mm, frequency_mhz, meshes[1], coarse_mm, boom_half_mm=boom_half_mm)
    tell("solved", 1.0)
    factor = reactance_factor_from_allowance(
        fine_mm,
        boom_mm=mount.outside_mm,
        rod_diameter_mm=mount.rod_diameter_mm,
        rod_length_mm=rod_length_mm,
        frequency_mhz=frequency_mhz,
    )
    return SolvedAllowance(fine_mm, coarse_mm, fine_mm / coarse_mm - 1, factor, rod_length_mm, (few, many))
