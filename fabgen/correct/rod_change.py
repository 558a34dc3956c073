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
    from fabgen.physics.scattering_reactance import DIAMETER_LIMIT_WL, equal_scattering_length

    thickest_wl = max(rod.diameter_mm, rod.replaces_mm) / design.wavelength_mm
    try:
        found = equal_scattering_length(element.length_mm, rod.replaces_mm, rod.diameter_mm, design.frequency_mhz)
    except ValueError as error:
        return RodChange(remarks=(Remark("E05", str(error), rod.diameter_mm, rod.replaces_mm, "mm"),))
    remarks: tuple[Remark, ...] = ()
    if not found.within_range:
        text = f"rods of 0.38 to 0.50 wavelengths and up to {DIAMETER_LIMIT_WL} wavelengths thick are in its range"
        remarks = (Remark("E06", text, thickest_wl, DIAMETER_LIMIT_WL, "wl"),)
    return RodChange(found.change_mm, U_SHARE * abs(found.change_mm), remarks)


def free_length_mm(design: Design, element: Element) -> float:
    """Length of a rod of the shop in free space, from which its allowance follows: modelled, and the rod's change.

    Args:
        design: for the frequency and the kind of feed.
        element: as modelled, with the rod of the shop.
    """
    return element.length_mm + rod_change(design, element).value_mm
