"""Allowances computed from the drawn mount, by a stored full solution or by closed form: theory, unmeasured."""

from fabgen.correct.case import as_boom_mount, surroundings
from fabgen.correct.remarks import advice_remarks, missing_remarks, touching_remarks
from fabgen.design.design import Design, Element, Mount
from fabgen.design.ledger import Allowance, PublishedValue, Remark
from fabgen.design.mount_geometry import mount_geometry
from fabgen.design.records import MountGeometry, SolvedRecord
from fabgen.physics.boom_carried import solved_allowance
from fabgen.physics.boom_closed_form import BoomAllowance, closed_form_allowance
from fabgen.physics.boom_range import Reason

CLOSED_FORM = "computed from the drawn mount by closed form; theory, unmeasured (own study 2026, computed, unpublished)"
SOLVED = "computed from the drawn mount by the full solver, {file}; theory, unmeasured"

BEYOND_WL = 0.005
"""How far outside the solved lengths a solution is carried: there g changes by less than 1 %."""

NOT_SOLVED = frozenset({"bush_material", "bush_permittivity", "bush_length_mm", "keeper"})
"""What a solution leaves out: the bush comes in by its small series term, as in the closed form."""


def computed(design: Design, element: Element, mount: Mount, values: tuple[PublishedValue, ...]) -> Allowance:
    """The allowance of one rod from its own modelled length, solved or else by closed form; or why there is none.

    Args:
        design: for the boom, the frequency, the neighbours and the records.
        element: the rod.
        mount: its mount on a metal boom.
        values: the published values to show beside it.
    """
    geometry = mount_geometry(design, element, mount)
    stored = [record for record in design.records if isinstance(record, SolvedRecord)]
    fresh = [record for record in stored if not _changes(record, geometry)]
    beyond_mm = BEYOND_WL * design.wavelength_mm
    for record in reversed(fresh):
        if record.covers(element.length_mm, beyond_mm):
            return _allowance(_solved(design, element, record), SOLVED.format(file=record.file), values)
    drawn, near = as_boom_mount(geometry), surroundings(design, element)
    result = closed_form_allowance(drawn, element.length_mm, design.frequency_mhz, near)
    stale = [record for record in stored if record.mount == mount.name]
    remarks = _stale(stale, fresh, geometry, element.length_mm)
    if any(miss.reason is Reason.GAP_TOO_SMALL for miss in result.misses):
        remarks += touching_remarks(drawn.section)
    return _allowance(result, CLOSED_FORM, values, remarks)


def _solved(design: Design, element: Element, record: SolvedRecord) -> BoomAllowance:
    assert element.mount is not None
    return solved_allowance(
        as_boom_mount(mount_geometry(design, element, element.mount)),
        record.factor_at(element.length_mm),
        record.mesh_difference_relative,
        element.length_mm,
        design.frequency_mhz,
        surroundings(design, element),
    )


def _changes(record: SolvedRecord, drawn: MountGeometry) -> list[str]:
    """What of the solved geometry is drawn otherwise now."""
    return [
        f"{item.removesuffix('_mm').removesuffix('_mhz').replace('_', ' ')} {old}, now {new}"
        for item, old, new in record.geometry.differing(drawn)
        if item not in NOT_SOLVED
    ]


def _stale(
    stored: list[SolvedRecord], fresh: list[SolvedRecord], geometry: MountGeometry, length_mm: float
) -> tuple[Remark, ...]:
    """Why no stored solution is used: of this geometry, or else of the mount of this name."""
    if not stored and not fresh:
        return ()
    if fresh:
        low, high = fresh[-1].rods[0].modelled_mm, fresh[-1].rods[-1].modelled_mm
        why = f"{fresh[-1].file} holds for rods of {low:g} to {high:g} mm and this one has {length_mm:g}"
    else:
        record = min(reversed(stored), key=lambda record: len(_changes(record, geometry)))
        why = f"{record.file} was solved for another mount: {'; '.join(_changes(record, geometry))}"
    return (Remark("L06", f"{why}; it is not used, run `fabgen solve` again"),)


def _allowance(
    result: BoomAllowance, source: str, values: tuple[PublishedValue, ...], remarks: tuple[Remark, ...] = ()
) -> Allowance:
    remarks += advice_remarks(result)
    if result.allowance_mm is None or result.u_mm is None:
        return Allowance(0.0, "none", published=values, missing=True, remarks=missing_remarks(result) + remarks)
    return Allowance(
        result.allowance_mm,
        "computed",
        u_mm=result.u_mm,
        correlated_u_mm=result.u_correlated_relative * result.allowance_mm,
        source=source,
        published=values,
        remarks=remarks,
    )
