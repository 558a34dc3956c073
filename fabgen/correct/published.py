"""Allowances from published models, always beside what the other models say for the same case."""

import math

from fabgen.design.design import Design, Element, Mount
from fabgen.design.ledger import Allowance, PublishedValue, Remark
from fabgen.physics import published_boom


def published_values(design: Design, element: Element, mount: Mount) -> tuple[PublishedValue, ...]:
    """What is in print for this mount; empty without a metal boom.

    The models know round booms only. A square one counts as its side or as Lo's equivalent, as the design chooses; a
    rectangular one as its width along the rod: conventions, not results.
    """
    boom = design.boom
    diameter_mm = boom.width_mm
    if boom.section == "square":
        diameter_mm = published_boom.equivalent_round_mm(boom.width_mm, mount.allowance.square_as)
    gap_mm = mount.saddle.height_mm - element.rod.diameter_mm / 2 if mount.saddle else 0.0
    printed = published_boom.published_values(
        mount.style, boom_mm=diameter_mm, wavelength_mm=design.wavelength_mm, gap_mm=gap_mm
    )
    return tuple(
        PublishedValue(value.model, value.value_mm, value.valid, value.is_bound, value.range_text, value.source)
        for value in printed
    )


def published(design: Design, mount: Mount, values: tuple[PublishedValue, ...]) -> Allowance:
    """The chosen model's value; its uncertainty is the spread of all printed values over √12."""
    choice = mount.allowance
    chosen = next((value for value in values if value.model == choice.model and not value.is_bound), None)
    if chosen is None:
        known = " or ".join(published_boom.published_models(mount.style)) or "nobody"
        remark = Remark("L01", f"no value is in print by {choice.model} for this mount, only by {known}")
        return Allowance(0.0, "none", published=values, missing=True, remarks=(remark,))
    found = Allowance(chosen.value_mm, "published", source=chosen.source, published=values)
    remarks = []
    if not chosen.valid:
        boom_wl = design.boom.width_mm / design.wavelength_mm
        remarks.append(
            Remark(
                "L02", f"{choice.model} holds for: {chosen.range_text}", boom_wl, published_boom.DL6WU_LIMIT_WL, "wl"
            )
        )
    if design.boom.section != "round":
        taken = "Lo's 1.180 × side" if choice.square_as == "lo" and design.boom.section == "square" else "its width"
        remarks.append(Remark("L03", f"a round-boom model reads this boom as {taken}: a convention, not a result"))
    u_mm = found.spread_mm / math.sqrt(12)
    return Allowance(
        chosen.value_mm,
        "published",
        u_mm=u_mm,
        correlated_u_mm=u_mm,
        source=chosen.source,
        published=values,
        remarks=tuple(remarks),
    )
