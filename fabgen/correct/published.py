"""Allowances from published models, always beside what the other models say for the same case."""

import math

from fabgen.correct.remarks import touching_remarks
from fabgen.design.design import Design, Element, Mount
from fabgen.design.ledger import Allowance, PublishedValue, Remark
from fabgen.design.mount_geometry import film_insulated
from fabgen.physics import published_boom
from fabgen.physics.boom_mount import Section


def published_values(design: Design, element: Element, mount: Mount) -> tuple[PublishedValue, ...]:
    """What is in print for this mount; empty without a metal boom, and for a rod that a film parts from it.

    The models know round booms only. A square one counts as its side or as Lo's equivalent, as the design chooses; a
    rectangular one as its width along the rod: conventions, not results.
    """
    if film_insulated(element, mount):
        return ()
    gap_mm = mount.saddle.height_mm - element.rod.diameter_mm / 2 if mount.saddle else 0.0
    printed = published_boom.published_values(
        mount.style, boom_mm=_round_boom_mm(design, mount), wavelength_mm=design.wavelength_mm, gap_mm=gap_mm
    )
    return tuple(
        PublishedValue(value.model, value.value_mm, value.valid, value.is_bound, value.range_text, value.source)
        for value in printed
    )


def _round_boom_mm(design: Design, mount: Mount) -> float:
    """Diameter of the round boom that stands in for this one."""
    boom = design.boom
    if boom.section == "square":
        return published_boom.equivalent_round_mm(boom.width_mm, mount.allowance.square_as)
    return boom.width_mm


def published(design: Design, element: Element, mount: Mount, values: tuple[PublishedValue, ...]) -> Allowance:
    """The chosen model's value; its uncertainty is the spread of all printed values over √12.

    A rectangular distribution between the least and the largest: JCGM 100:2008, 4.3.7.
    """
    choice = mount.allowance
    if film_insulated(element, mount):
        film = "anodic film" if element.rod.finish == "anodised" else "paint"
        return _none(f"no value is in print for a rod whose {film} parts it from the boom: bond it bare, or bush it")
    chosen = next((value for value in values if value.model == choice.model and not value.is_bound), None)
    if chosen is None:
        known = " or ".join(published_boom.published_models(mount.style)) or "nobody"
        return _none(f"no value is in print by {choice.model} for this mount, only by {known}", values)
    found = Allowance(chosen.value_mm, "published", source=chosen.source, published=values)
    remarks: tuple[Remark, ...] = ()
    if not chosen.valid:
        text, limit_wl = f"{choice.model} holds for: {chosen.range_text}", published_boom.LIMITS_WL.get(choice.model)
        boom_wl = _round_boom_mm(design, mount) / design.wavelength_mm
        remarks += (Remark("L02", text) if limit_wl is None else Remark("L02", text, boom_wl, limit_wl, "wl"),)
    if design.boom.section != "round":
        taken = "Lo's 1.180 × side" if choice.square_as == "lo" and design.boom.section == "square" else "its width"
        remarks += (Remark("L03", f"a round-boom model reads this boom as {taken}: a convention, not a result"),)
    if mount.style == "on-top":
        remarks += touching_remarks(Section(design.boom.section))
    u_mm = found.spread_mm / math.sqrt(12)
    return Allowance(
        chosen.value_mm,
        "published",
        u_mm=u_mm,
        correlated_u_mm=u_mm,
        source=chosen.source,
        published=values,
        remarks=remarks,
    )


def _none(why: str, values: tuple[PublishedValue, ...] = ()) -> Allowance:
    return Allowance(0.0, "none", published=values, missing=True, remarks=(Remark("L01", why),))
