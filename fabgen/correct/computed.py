"""Allowances computed from the drawn mount by closed form: theory, unmeasured."""

from fabgen.correct.case import boom_mount, surroundings
from fabgen.design.design import Design, Element, Mount
from fabgen.design.ledger import Allowance, PublishedValue, Remark
from fabgen.physics.boom_closed_form import BoomAllowance, closed_form_allowance

SOURCE = "computed from the drawn mount by closed form; theory, unmeasured (own study 2026, computed, unpublished)"


def computed(design: Design, element: Element, mount: Mount, values: tuple[PublishedValue, ...]) -> Allowance:
    """The closed form's allowance for one rod, from its own modelled length; or why there is none.

    Args:
        design: for the boom, the frequency and the neighbours.
        element: the rod.
        mount: its mount on a metal boom.
        values: the published values to show beside it.
    """
    result = closed_form_allowance(
        boom_mount(design, element, mount), element.length_mm, design.frequency_mhz, surroundings(design, element)
    )
    advice = tuple(Remark("L05", advice.value) for advice in result.advice)
    if result.allowance_mm is None or result.u_mm is None:
        return Allowance(0.0, "none", published=values, missing=True, remarks=_misses(result) + advice)
    return Allowance(
        result.allowance_mm,
        "computed",
        u_mm=result.u_mm,
        correlated_u_mm=result.u_correlated_relative * result.allowance_mm,
        source=SOURCE,
        published=values,
        remarks=advice,
    )


def _misses(result: BoomAllowance) -> tuple[Remark, ...]:
    return tuple(
        Remark("L04", miss.reason.value, miss.measured, miss.required, miss.unit) if miss.required
        else Remark("L04", miss.reason.value)
        for miss in result.misses
    )  # fmt: skip
