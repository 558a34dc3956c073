"""Is there anything that could not be arranged at all?"""

from collections.abc import Iterator

from fabgen.check.finding import remarked
from fabgen.design.arranged import Arranged
from fabgen.design.findings import Finding


def findings(arranged: Arranged) -> Iterator[Finding]:
    """F01 a part that no numbers can make, C01 no place for the clamp: what stage `arrange` remarked."""
    for where, remark in arranged.remarks:
        yield remarked(remark, "fail", where)
