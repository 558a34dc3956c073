"""Does every rod on a metal boom have an allowance with a reason?"""

from collections.abc import Iterator

from fabgen.check.finding import remarked
from fabgen.design.arranged import Arranged
from fabgen.design.findings import Finding, Severity
from fabgen.design.ledger import Allowance, Remark


def findings(arranged: Arranged) -> Iterator[Finding]:
    """L01 to L10: what stage `correct` remarked; a missing value fails."""
    for line in arranged.ledger.lines:
        for remark in line.allowance.remarks:
            severity = _severity(line.allowance, remark)
            way_out = "state a value or choose another origin" if severity == "fail" else ""
            yield remarked(remark, severity, line.element, way_out)


def _severity(allowance: Allowance, remark: Remark) -> Severity:
    if remark.code == "L05":
        return "note"
    if allowance.missing:
        return "fail"
    return "warn" if remark.code in ("L02", "L06", "L07", "L08") else "note"
