"""The hardware of the driven elements: one module per kind of feed, named like the kind."""

from importlib import import_module

from fabgen.arrange.layout import Layout
from fabgen.design.arranged import Cut
from fabgen.design.design import Design, Feed
from fabgen.design.ledger import LedgerLine


def lay_out(design: Design, feed: Feed, line: LedgerLine) -> tuple[Layout, list[Cut]]:
    """Parts, holes and sawn pieces of one driven element."""
    module = import_module("fabgen.arrange." + feed.kind.replace("-", "_"))
    found: tuple[Layout, list[Cut]] = module.lay_out(design, feed, line)
    return found
