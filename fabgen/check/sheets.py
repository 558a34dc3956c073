"""Judgements about recorded sheets; made when a package is built, because only then there are sheets."""

from collections import Counter
from collections.abc import Iterable, Iterator

from fabgen.check.finding import finding
from fabgen.design.drawing import Sheet
from fabgen.design.findings import Finding
from fabgen.design.overlaps import Kind, Overlap, overlaps

CODES: dict[Kind, str] = {"text outside": "S01", "text on hole": "S02", "text on text": "S03"}


def sheet_findings(sheets: Iterable[Sheet], *, margin_mm: float = 0.0) -> Iterator[Finding]:
    """S01 lettering outside its sheet, S02 on a hole, S03 on other lettering; each kind once per sheet.

    Args:
        sheets: as recorded, before they are cut into pages.
        margin_mm: strip along the edges that lettering keeps out of.
    """
    for sheet in sheets:
        found = overlaps(sheet, margin_mm=margin_mm)
        counts = Counter(overlap.kind for overlap in found)
        for kind, code in CODES.items():
            if counts[kind]:
                first = next(overlap for overlap in found if overlap.kind == kind)
                yield finding(code, "fail", sheet.name, _advice(first), measured=counts[kind], required=0)


def _advice(first: Overlap) -> str:
    text = first.text
    return (
        f"first “{text.text[:40]}” at x {text.x_mm:.1f} mm, y {text.y_mm:.1f} mm; shorten ids and title, or give "
        "the rods more room"
    )
