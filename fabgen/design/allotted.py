"""Tolerances of an allotment, put in place of the general ones: in the ledger, the cut list and the hole table."""

from dataclasses import replace

from fabgen.design.arranged import Arranged, Hole
from fabgen.design.electrical_case import LOCATING
from fabgen.design.response import Response


def with_tolerances(arranged: Arranged, response: Response | None) -> Arranged:
    """The arranged design with the tolerances that its limits allow; itself where none were allotted.

    Args:
        arranged: with general tolerances.
        response: what the solver found; None where it was not asked.

    Returns:
        The same places, holes and lengths, other ±. Half rods of a split dipole get half the ± of the whole; screw
        holes, whose parts have a pitch, are never looser than the general tolerance.
    """
    if response is None or response.allotment is None or not response.allotment.feasible:
        return arranged
    length_mm = {row.element: row.length_mm for row in response.allotment.rows}
    station_mm = {row.element: row.station_mm for row in response.allotment.rows}
    halved = {cut.element for cut in arranged.cuts if cut.element in length_mm and cut.piece != cut.element}
    lines = tuple(replace(line, tolerance_mm=length_mm[line.element]) for line in arranged.ledger.lines)
    cuts = tuple(
        replace(cut, tolerance_mm=length_mm[cut.element] / (2 if cut.element in halved else 1))
        if cut.element in length_mm
        else cut
        for cut in arranged.cuts
    )
    holes = tuple(
        replace(hole, tolerance_mm=_hole_mm(hole, station_mm[hole.element]))
        if hole.element in station_mm and hole.purpose in LOCATING
        else hole
        for hole in arranged.holes
    )
    return replace(arranged, ledger=replace(arranged.ledger, lines=lines), cuts=cuts, holes=holes)


def _hole_mm(hole: Hole, station_mm: float) -> float:
    return station_mm if hole.purpose in ("rod", "bush") else min(station_mm, hole.tolerance_mm)
