"""Pieces to saw: rods and boom."""

from fabgen.arrange.drilling import PIECE
from fabgen.design.arranged import Cut
from fabgen.design.design import Design, Element
from fabgen.design.ledger import LedgerLine
from fabgen.design.shop_tolerance import shop_tolerance_mm


def rod_cut(design: Design, element: Element, line: LedgerLine) -> Cut:
    """A straight rod; it stands out equally on both sides of the boom."""
    return Cut(
        piece=element.id,
        element=element.id,
        stock="rod",
        rod_mm=element.rod.diameter_mm,
        material=element.rod.material.name,
        cut_mm=line.cut_mm,
        trim_mm=line.trim_mm,
        half_mm=line.cut_mm / 2,
        projection_mm=(line.cut_mm - design.boom.width_mm) / 2,
        tolerance_mm=line.tolerance_mm,
    )


def boom_cut(design: Design) -> Cut:
    """The boom; the datum end is sawn square first."""
    boom = design.boom
    return Cut(
        piece=PIECE,
        element="boom",
        stock="boom",
        rod_mm=boom.width_mm,
        material=boom.material.name,
        cut_mm=boom.length_mm,
        trim_mm=0.0,
        half_mm=0.0,
        projection_mm=0.0,
        tolerance_mm=shop_tolerance_mm(design.shop, boom.length_mm),
    )
