"""Allowances measured with a coupon: the record's reactance carried to every rod of the mount."""

import math
from collections.abc import Iterator

from fabgen.correct.case import as_boom_mount, surroundings
from fabgen.correct.remarks import advice_remarks, missing_remarks
from fabgen.design.design import Design, Element, Mount
from fabgen.design.ledger import Allowance, PublishedValue, Remark
from fabgen.design.mount_geometry import mount_geometry
from fabgen.design.records import MeasuredRecord, MountGeometry
from fabgen.frozen import frozen
from fabgen.physics.boom_carried import measured_allowance
from fabgen.physics.boom_differences import Difference, Item, differences

KEEPER_U_RELATIVE = 0.01
"""What another keeper or bush of one size adds to u: it sits where a rod has current, not voltage (a judgement)."""


@frozen
class _Candidate:
    """A record of this mount and how far the drawn mount is from it."""

    record: MeasuredRecord
    differing: tuple[tuple[str, float, bool], ...]
    """Each item in words, how much u grows in relative terms, and whether it makes another mount."""

    @property
    def refused(self) -> bool:
        """Whether any item makes it another mount."""
        return any(other for _, _, other in self.differing)

    @property
    def growth_relative(self) -> float:
        """What all items together add to u, in quadrature."""
        return math.hypot(*(growth for _, growth, _ in self.differing))

    @property
    def named(self) -> str:
        """Every item in words."""
        return "; ".join(
            text if other else f"{text}: u grows by {growth:.1%}" for text, growth, other in self.differing
        )


def measured(
    design: Design, element: Element, mount: Mount, values: tuple[PublishedValue, ...]
) -> tuple[Allowance | None, tuple[Remark, ...]]:
    """The measured allowance of one rod, or None; with what has to be said when there is none.

    Args:
        design: for the boom, the frequency, the neighbours and the records.
        element: the rod.
        mount: its mount on a metal boom.
        values: the published values to show beside it.

    Returns:
        The allowance from the record that differs least, and remarks for the case that none can be used.
    """
    drawn = mount_geometry(design, element, mount)
    found = [
        _Candidate(record, tuple(_differing(record.geometry, drawn)))
        for record in design.records
        if isinstance(record, MeasuredRecord) and record.mount == mount.name
    ]
    usable = [candidate for candidate in found if not candidate.refused]
    if usable:
        best = min(reversed(usable), key=_total)
        return _carried(design, element, best, values), ()
    return None, tuple(
        Remark("L08", f"{candidate.record.file} measured another mount: {candidate.named}") for candidate in found
    )


def _total(candidate: _Candidate) -> float:
    record = candidate.record
    own = record.u_mm / abs(record.allowance_mm)
    return math.hypot(own, record.boom_end_relative / math.sqrt(3), candidate.growth_relative)


def _carried(design: Design, element: Element, candidate: _Candidate, values: tuple[PublishedValue, ...]) -> Allowance:
    assert element.mount is not None
    record = candidate.record
    common = math.hypot(record.u_mm / abs(record.allowance_mm), record.boom_end_relative / math.sqrt(3))
    result = measured_allowance(
        as_boom_mount(mount_geometry(design, element, element.mount)),
        record.reactance_factor,
        common,
        element.length_mm,
        design.frequency_mhz,
        surroundings(design, element),
        coupon_length_mm=record.modelled_mm,
        difference_u_relative=candidate.growth_relative,
    )
    remarks = advice_remarks(result)
    if candidate.differing:
        remarks += (Remark("L07", f"{record.file} differs from the drawn mount: {candidate.named}"),)
    if result.allowance_mm is None or result.u_mm is None:
        return Allowance(0.0, "none", published=values, missing=True, remarks=missing_remarks(result) + remarks)
    return Allowance(
        result.allowance_mm,
        "measured",
        u_mm=result.u_mm,
        correlated_u_mm=result.u_correlated_relative * result.allowance_mm,
        source=f"measured with a coupon on {record.date}, {record.file}",
        published=values,
        remarks=remarks,
    )


_SAID = {item: item.value for item in Item}


def _differing(recorded: MountGeometry, drawn: MountGeometry) -> Iterator[tuple[str, float, bool]]:
    """Every item that differs: in words, growth of u, and whether it makes another mount."""
    physical = differences(as_boom_mount(recorded), recorded.frequency_mhz, as_boom_mount(drawn), drawn.frequency_mhz)
    for difference in physical:
        yield _words(difference), difference.u_relative, difference.refused
    named = {item for item, _, _ in recorded.differing(drawn)}
    if any(difference.item in (Item.STYLE, Item.SECTION, Item.SOLID, Item.FILM) for difference in physical):
        return
    for item, said in (("bush_material", "bush material"), ("keeper", "keeper")):
        if item in named:
            old, new = getattr(recorded, item), getattr(drawn, item)
            yield f"{said} {old or 'none'}, drawn {new or 'none'}", KEEPER_U_RELATIVE, False


def _words(difference: Difference) -> str:
    return f"{_SAID[difference.item]} {difference.recorded}, drawn {difference.drawn}"
