"""The hardware of the driven elements."""

from fabgen.arrange import folded_dipole, straight_dipole
from fabgen.arrange.layout import Layout
from fabgen.design.arranged import Cut
from fabgen.design.design import Design, Feed
from fabgen.design.ledger import LedgerLine


def lay_out(design: Design, feed: Feed, line: LedgerLine) -> tuple[Layout, list[Cut]]:
    """Parts, holes and sawn pieces of one driven element."""
    if feed.kind == "folded-dipole":
        return folded_dipole.lay_out(design, feed, line)
    return straight_dipole.lay_out(design, feed, line)
