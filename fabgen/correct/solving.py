"""Full solutions of the drawn mounts: which rods are solved, and what a record keeps of them.

One mount is solved for up to three rod lengths at the default mesh, the shortest, the middle and the longest, because
the removed reactance changes by up to 15 % over a table of lengths; the middle one is solved at the finer mesh too, and
the difference goes into u. Rods between them get theirs by the polynomial through the solved ones.
"""

from collections.abc import Callable, Mapping
from dataclasses import asdict
from typing import Any

from fabgen.correct.case import as_boom_mount
from fabgen.correct.computed import BEYOND_WL, NOT_SOLVED
from fabgen.correct.rod_change import free_length_mm
from fabgen.design.design import Design
from fabgen.design.mount_geometry import beside_metal, mount_geometry
from fabgen.design.records import MountGeometry, SolvedRecord
from fabgen.errors import InputError
from fabgen.frozen import frozen
from fabgen.physics.boom_mount import wavelength_mm

Progress = Callable[[str, float], None]
"""Takes what is being done and the part done, 0 to 1."""

TWO_RODS_WL = 0.03
"""Span of rod length up to which two rods are solved for all; one rod stands for a span of `BEYOND_WL`."""

FINER_COSTS = 3
"""What the finer mesh takes, in runs of the default one; for the progress only."""

METHOD = (
    "electric field integral equation on triangles, half-wave mode matched to a free rod's; one rod on a long boom; "
    "own study 2026, computed, unpublished; theory, unmeasured"
)


@frozen
class SolveTask:
    """One distinct mount to solve.

    Attributes:
        mount: the user's name for it.
        geometry: what is solved.
        elements: ids of its rods.
        lengths_mm: the free lengths to solve for, in order.
        stored: the record that answers it already; empty when there is none.
    """

    mount: str
    geometry: MountGeometry
    elements: tuple[str, ...]
    lengths_mm: tuple[float, ...]
    stored: str


def solve_tasks(design: Design, mount: str = "") -> tuple[SolveTask, ...]:
    """What there is to solve on a design, one task per distinct mount.

    Args:
        design: as read, with its records.
        mount: solve this one only; empty for all.

    Raises:
        InputError: no rod has a mount of that name on metal.
    """
    groups: dict[tuple[str, MountGeometry], list[tuple[str, float]]] = {}
    for element in design.elements:
        drawn = element.mount
        if drawn is not None and beside_metal(design, drawn) and mount in ("", drawn.name):
            key = (drawn.name, mount_geometry(design, element, drawn))
            groups.setdefault(key, []).append((element.id, free_length_mm(design, element)))
    if not groups:
        known = sorted({element.mount.name for element in design.elements if element.mount is not None})
        what = f"no rod is carried by a mount {mount} on a metal boom" if mount else "no rod meets a metal boom"
        raise InputError(what, f"the mounts are {', '.join(known)}" if known else "there is nothing to solve")
    return tuple(
        SolveTask(
            name,
            geometry,
            tuple(id_ for id_, _ in rods),
            _lengths([length_mm for _, length_mm in rods], design.wavelength_mm),
            _stored(design, geometry, [length_mm for _, length_mm in rods]),
        )
        for (name, geometry), rods in groups.items()
    )


def _lengths(rods_mm: list[float], wl_mm: float) -> tuple[float, ...]:
    shortest, longest = min(rods_mm), max(rods_mm)
    middle = round((shortest + longest) / 2, 1)
    if longest - shortest <= BEYOND_WL * wl_mm:
        return (middle,)
    if longest - shortest <= TWO_RODS_WL * wl_mm:
        return (shortest, longest)
    return (shortest, middle, longest)


def _stored(design: Design, geometry: MountGeometry, rods_mm: list[float]) -> str:
    for record in design.records:
        if isinstance(record, SolvedRecord):
            same = all(item in NOT_SOLVED for item, _, _ in record.geometry.differing(geometry))
            if same and all(record.covers(length_mm, BEYOND_WL * design.wavelength_mm) for length_mm in rods_mm):
                return record.file
    return ""


def solve(task: SolveTask, progress: Progress) -> Mapping[str, Any]:
    """Solve one mount.

    Args:
        task: what to solve.
        progress: told what is being done.

    Returns:
        The record's content.

    Raises:
        InputError: the solver does not reach this mount.
    """
    from fabgen.physics import boom_solver
    from fabgen.physics.boom_coupon import reactance_factor_from_allowance

    mount, frequency_mhz = as_boom_mount(task.geometry), task.geometry.frequency_mhz
    for length_mm in (task.lengths_mm[0], task.lengths_mm[-1]):
        misses = boom_solver.solver_misses(mount, length_mm, frequency_mhz)
        if misses:
            reasons = "; ".join(miss.reason.value for miss in misses)
            raise InputError(f"mount {task.mount}, rods of {length_mm:g} mm: the solver does not reach it: {reasons}")
    refined, rods = len(task.lengths_mm) // 2, []
    difference, unknowns, finer_mm = 0.0, (0, 0), 0.0
    total, done = len(task.lengths_mm) + FINER_COSTS, 0
    for count, length_mm in enumerate(task.lengths_mm):
        rod = f"rod of {length_mm:g} mm"
        progress(f"{rod}, default mesh", done / total)
        if count == refined:
            found = boom_solver.solve_allowance(
                mount,
                length_mm,
                frequency_mhz,
                progress=lambda what, _part, rod=rod, done=done: progress(f"{rod}, {what}", done / total),  # type: ignore[misc]
            )
            done += FINER_COSTS
            allowance_mm, finer_mm = found.coarse_allowance_mm, found.allowance_mm
            difference, unknowns = found.mesh_difference_relative, found.unknowns
        else:
            allowance_mm, _ = boom_solver.solve_at(mount, length_mm, frequency_mhz)
        done += 1
        factor = reactance_factor_from_allowance(
            allowance_mm,
            boom_mm=mount.outside_mm,
            rod_diameter_mm=mount.rod_diameter_mm,
            rod_length_mm=length_mm,
            frequency_mhz=frequency_mhz,
        )
        rods.append((length_mm, allowance_mm, factor))
    progress("solved", 1.0)
    return {
        "record": "solved",
        "mount": task.mount,
        "geometry": {key: _tidy(value) for key, value in asdict(task.geometry).items()},
        "rods": [
            {
                "modelled_mm": _tidy(length_mm),
                "modelled_wl": _tidy(length_mm / wavelength_mm(frequency_mhz)),
                "allowance_mm": _tidy(allowance_mm),
                "reactance_factor": _tidy(factor),
            }
            for length_mm, allowance_mm, factor in rods
        ],
        "mesh_difference_relative": _tidy(difference),
        "finer_mesh": {"modelled_mm": _tidy(task.lengths_mm[refined]), "allowance_mm": _tidy(finer_mm)},
        "unknowns": list(unknowns),
        "method": METHOD,
    }


def _tidy(value: Any) -> Any:
    """A number without the noise of threads and machines: five significant decimals."""
    return round(value, 5) + 0.0 if isinstance(value, float) else value
