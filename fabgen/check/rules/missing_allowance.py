"""Does every rod on a metal boom have an allowance with a reason?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.design.arranged import Arranged
from fabgen.design.findings import Finding


def findings(arranged: Arranged) -> Iterator[Finding]:
    """L01 to L10: what stage `correct` remarked; a missing value fails."""
    for line in arranged.ledger.lines:
        for remark in line.allowance.remarks:
            missing = line.allowance.missing and remark.code != "L05"
            yield finding(
                remark.code,
                "fail" if missing else "warn" if remark.code == "L02" else "note",
                line.element,
                f"{remark.text}" + ("; state a value or choose another origin" if missing else ""),
                measured=remark.measured,
                required=remark.required,
                unit=remark.unit,
            )
