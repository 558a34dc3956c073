"""Does every part that must insulate do so?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.design.arranged import Arranged
from fabgen.design.findings import Finding


def findings(arranged: Arranged) -> Iterator[Finding]:
    """F09: a bush, keeper, saddle or feed block that conducts, such as a print filled with carbon or metal."""
    for part in arranged.placed:
        if part.source == "printed" and part.metal:
            kind = part.part.replace("_", " ")
            advice = (
                f"its {kind} is of {part.material}, which conducts; carbon- or metal-filled prints short the rod: "
                "use ASA, PETG or PA12"
            )
            yield finding("F09", "fail", part.owner, advice)
