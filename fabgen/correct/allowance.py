"""Which allowance a rod gets: by what carries it, then by the origin its mount asks for.

`auto` takes a measurement of the mount, else a stored full solution, else the closed form, else it asks for a value.
"""

from dataclasses import replace

from fabgen.correct.computed import computed
from fabgen.correct.measured import measured
from fabgen.correct.published import published, published_values
from fabgen.design.design import AllowanceChoice, Design, Element, Mount
from fabgen.design.ledger import Allowance, PublishedValue, Remark
from fabgen.design.mount_geometry import beside_metal

MIDDLE_SCREW = (
    "the screw through a rod's middle holds it and bonds nothing: the middle is at the boom's potential anyway, so the "
    "allowance is that of an insulated rod"
)


def allowance(design: Design, element: Element) -> Allowance:
    """The length to add to one rod, with origin, uncertainty and the published values beside it.

    Args:
        design: as read.
        element: one of its elements.

    Returns:
        The allowance; marked `missing` where the chosen origin gives no number.
    """
    if element.mount is None:
        return _of_feed(design, element)
    if design.lengths_are == "as-cut":
        return Allowance(0.0, "none", source="lengths are as cut: nothing is added", needed=False)
    if not beside_metal(design, element.mount) and element.mount.allowance.origin != "stated":
        return Allowance(0.0, "none", source="no metal boom", needed=False)
    found = _of_mount(design, element, element.mount)
    if element.mount.hold == "middle-screw" and found.needed:
        return replace(found, remarks=(*found.remarks, Remark("L05", MIDDLE_SCREW)))
    return found


def _of_feed(design: Design, element: Element) -> Allowance:
    feed = design.feed_of(element)
    if feed is not None and feed.allowance.origin == "stated":
        return replace(_stated(feed.allowance, ()), correlated_u_mm=0.0)
    return Allowance(0.0, "none", source="a driven rod's length is set by its match", needed=False)


def _of_mount(design: Design, element: Element, mount: Mount) -> Allowance:
    choice = mount.allowance
    values = published_values(design, element, mount) if beside_metal(design, mount) else ()
    if choice.origin == "stated":
        return _stated(choice, values)
    if choice.origin == "published":
        return published(design, element, mount, values)
    if choice.origin in ("measured", "auto", "computed"):
        return _found_out(design, element, mount, values)
    return Allowance(0.0, "none", source="asked for", published=values)


def _found_out(design: Design, element: Element, mount: Mount, values: tuple[PublishedValue, ...]) -> Allowance:
    """Measured, else solved, else by closed form, as far as the choice goes."""
    remarks: tuple[Remark, ...] = ()
    if mount.allowance.origin != "computed":
        found, remarks = measured(design, element, mount, values)
        if found is not None:
            return found
    if mount.allowance.origin == "measured":
        remarks = remarks or (Remark("L10", f"mount {mount.name} has no record of a measurement"),)
        return Allowance(0.0, "none", published=values, missing=True, remarks=remarks)
    found = computed(design, element, mount, values)
    return replace(found, remarks=found.remarks + remarks)


def _stated(choice: AllowanceChoice, values: tuple[PublishedValue, ...]) -> Allowance:
    """One figure for all rods of the mount: whatever it is off, it is off for all of them together."""
    return Allowance(
        choice.value_mm,
        "stated",
        u_mm=choice.uncertainty_mm,
        correlated_u_mm=choice.uncertainty_mm,
        source=f"stated: {choice.source}",
        published=values,
    )
