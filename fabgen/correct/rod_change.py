"""Another rod than the modelled one: the length that keeps its scattering reactance.

The solver is loaded only for a rod whose diameter differs; every other design stays light. A folded driven rod is left
as it is: its match sets its length.
"""

import math

from fabgen.design.design import Design, Element
from fabgen.design.ledger import Remark
from fabgen.frozen import frozen

U_SHARE = 0.2 / math.sqrt(3)
"""u over the change: measured rods and the formulas in print agree with it within 20 %, as a rectangle."""


@frozen
class RodChange:
    """What another diameter adds to a length.

    Attributes:
        value_mm: added to the tip-to-tip length.
        u_mm: standard uncertainty (k = 1).
        remarks: what has to be said about it.
    """

    value_mm: float = 0.0
    u_mm: float = 0.0
    remarks: tuple[Remark, ...] = ()


def rod_change(design: Design, element: Element) -> RodChange:
    """The change of one rod's length for its diameter; nothing where the rod is the modelled one.

    Args:
        design: for the frequency and the kind of feed.
        element: as modelled, with the rod of the shop.
    """
    rod, feed = element.rod, design.feed_of(element)
    if rod.replaces_mm == rod.diameter_mm or (feed is not None and feed.kind == "folded-dipole"):
        return RodChange()
    from fabgen.physics.scattering_reactance import equal_scattering_length

    try:
        found = equal_scattering_length(element.length_mm, rod.replaces_mm, rod.diameter_mm, design.frequency_mhz)
    except ValueError as error:
        return RodChange(remarks=(Remark("E05", str(error), rod.diameter_mm, rod.replaces_mm, "mm"),))
    thickest_mm, wl_mm = max(rod.diameter_mm, rod.replaces_mm), design.wavelength_mm
    remarks = () if found.within_range else (_outside(element.length_mm, found.length_mm, thickest_mm, wl_mm),)
    return RodChange(found.change_mm, U_SHARE * abs(found.change_mm), remarks)


def _outside(modelled_mm: float, new_mm: float, thickest_mm: float, wl_mm: float) -> Remark:
    """E06 with the figure that lies outside: the thicker diameter, else one of the two lengths."""
    from fabgen.physics.scattering_reactance import DIAMETER_LIMIT_WL, LENGTH_RANGE_WL

    shortest_wl, longest_wl = LENGTH_RANGE_WL
    if thickest_mm / wl_mm > DIAMETER_LIMIT_WL:
        what, measured_wl, limit_wl = "diameter", thickest_mm / wl_mm, DIAMETER_LIMIT_WL
    elif max(modelled_mm, new_mm) / wl_mm > longest_wl:
        what, measured_wl, limit_wl = "length", max(modelled_mm, new_mm) / wl_mm, longest_wl
    else:
        what, measured_wl, limit_wl = "length", min(modelled_mm, new_mm) / wl_mm, shortest_wl
    text = (
        f"its {what} is outside: rods of {shortest_wl:.2f} to {longest_wl:.2f} wavelengths and up to "
        f"{DIAMETER_LIMIT_WL} wavelengths thick are in the method's range"
    )
    return Remark("E06", text, measured_wl, limit_wl, "wl")


def free_length_mm(design: Design, element: Element) -> float:
    """Length of a rod of the shop in free space, from which its allowance follows: modelled, and the rod's change.

    Args:
        design: for the frequency and the kind of feed.
        element: as modelled, with the rod of the shop.
    """
    return element.length_mm + rod_change(design, element).value_mm
