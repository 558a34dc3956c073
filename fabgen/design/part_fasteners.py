"""What printed parts need of a thread in one record, from the stock tables, and the lengths that screws are sold in."""

import functools

from fabgen.frozen import frozen
from fabgen.stock.fasteners import clearance_hole_mm, nut, screw_head, thread

SCREW_LENGTHS_MM = (
    4.0, 5.0, 6.0, 8.0, 10.0, 12.0, 16.0, 20.0, 25.0, 30.0, 35.0, 40.0, 45.0, 50.0, 55.0, 60.0, 65.0, 70.0, 80.0, 90.0,
    100.0, 110.0, 120.0, 130.0, 140.0, 150.0, 160.0, 180.0, 200.0,
)  # fmt: skip
"""Source: ISO 888:2012, preferred nominal lengths, from memory."""


def sold_length_mm(least_mm: float) -> float:
    """The shortest screw sold that is not shorter than asked for.

    Raises:
        ValueError: none is that long.
    """
    for length_mm in SCREW_LENGTHS_MM:
        if length_mm >= least_mm - 1e-9:
            return length_mm
    raise ValueError(f"no screw of {least_mm:g} mm is sold, the longest has {SCREW_LENGTHS_MM[-1]:g} mm")


@frozen
class Fastener:
    """One thread with its clearance holes, its socket head and its hexagon nut."""

    name: str
    diameter_mm: float
    clearance_fine_mm: float
    clearance_mm: float
    head_diameter_mm: float
    head_height_mm: float
    nut_across_flats_mm: float
    nut_height_mm: float


@functools.cache
def fastener(name: str) -> Fastener:
    """Sizes of one thread, for example `M3`.

    Raises:
        UnknownStockError: no such thread in the tables.
    """
    head, hexagon = screw_head(name), nut(name)
    return Fastener(
        name=name,
        diameter_mm=thread(name).diameter_mm,
        clearance_fine_mm=clearance_hole_mm(name, "fine"),
        clearance_mm=clearance_hole_mm(name),
        head_diameter_mm=head.diameter_mm,
        head_height_mm=head.height_mm,
        nut_across_flats_mm=hexagon.across_flats_mm,
        nut_height_mm=hexagon.height_mm,
    )
