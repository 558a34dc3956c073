"""Is there exactly one driven element?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.design.arranged import Arranged
from fabgen.design.findings import Finding


def findings(arranged: Arranged) -> Iterator[Finding]:
    """L11: none, or more than one."""
    driven = [element.id for element in arranged.design.elements if element.role == "driven"]
    if len(driven) != 1:
        advice = (
            "give the row of the fed rod `role: driven`"
            if not driven
            else "one feed carries one rod: give every other row `role: director` or `role: reflector`"
        )
        yield finding("L11", "fail", ", ".join(driven) or "elements", advice, measured=len(driven), required=1)
