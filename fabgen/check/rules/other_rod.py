"""Can a rod of another diameter than the modelled one be made good by its length?"""

from collections.abc import Iterator

from fabgen.check.finding import remarked
from fabgen.design.arranged import Arranged
from fabgen.design.findings import Finding, Severity

SEVERITY: dict[str, Severity] = {"E05": "fail", "E06": "warn"}
WAY_OUT = {"E05": "take a rod nearer to the modelled one", "E06": "take a rod nearer to the modelled one, or measure"}


def findings(arranged: Arranged) -> Iterator[Finding]:
    """E05 no length makes good for the diameter, E06 outside the range of the method."""
    for line in arranged.ledger.lines:
        for remark in line.rod_change_remarks:
            yield remarked(remark, SEVERITY[remark.code], line.element, WAY_OUT[remark.code])
