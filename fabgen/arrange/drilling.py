"""Hole rows: which walls a hole opens, with which drill, and how far its station may be off."""

import functools

from fabgen.design.arranged import Hole, Wall
from fabgen.design.design import Design
from fabgen.design.shop_tolerance import shop_tolerance_mm
from fabgen.frozen import frozen
from fabgen.stock import tables

PIECE = "boom"
_ANGLE_DEG: dict[Wall, float] = {"+z": 0.0, "+y": 90.0, "-z": 180.0, "-y": 270.0}


@frozen
class Opening:
    """A hole before it has a number: `walls` are the walls it opens, in drilling order."""

    element: str
    station_mm: float
    walls: tuple[Wall, ...]
    across_mm: float
    diameter_mm: float
    purpose: str


def hole_rows(design: Design, openings: list[Opening]) -> tuple[Hole, ...]:
    """Number the openings by station and write one row per opened wall.

    Args:
        design: for the boom's section, the drills and the tolerance.
        openings: in any order.

    Returns:
        Rows in order of station; the rows of a through hole follow each other.
    """
    ordered = sorted(openings, key=lambda o: (o.station_mm, o.walls, o.across_mm, o.diameter_mm))
    digits = max(2, len(str(len(ordered))))
    return tuple(
        Hole(
            piece=PIECE,
            number=f"H{count:0{digits}d}",
            element=opening.element,
            station_mm=round(opening.station_mm, 6),
            wall="round" if design.boom.section == "round" else wall,
            angle_deg=_ANGLE_DEG[wall],
            across_mm=round(opening.across_mm, 6),
            diameter_mm=opening.diameter_mm,
            pilot_mm=pilot_mm(opening.diameter_mm),
            tolerance_mm=shop_tolerance_mm(design.shop, opening.station_mm),
            drill=drill_name(opening.diameter_mm, design.shop.drills),
            purpose=opening.purpose,
        )
        for count, opening in enumerate(ordered, start=1)
        for wall in opening.walls
    )


def pilot_mm(diameter_mm: float) -> float:
    """Pilot drill: 2 mm for holes up to 5 mm, 2.5 mm above, none below 3 mm. Source: common practice."""
    if diameter_mm < 3.0:
        return diameter_mm
    return 2.0 if diameter_mm <= 5.0 else 2.5


@functools.cache
def drill_name(diameter_mm: float, series: tables.DrillSeries) -> str:
    """The drill of a series nearest to a hole's diameter."""
    return tables.nearest_drill(diameter_mm, series).name
