"""Can the parts go on in some order?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.design.arranged import Arranged
from fabgen.design.assembly_order import assembly_order
from fabgen.design.findings import Finding


def findings(arranged: Arranged) -> Iterator[Finding]:
    """A01 no order of assembly exists, A02 a closed loop that cannot be threaded."""
    for stuck in assembly_order(arranged).stuck:
        if stuck.kind == "loop":
            yield finding("A02", "fail", stuck.element, stuck.text)
        else:
            yield finding("A01", "fail", stuck.element, f"{stuck.text}; move one of the elements along the boom")
