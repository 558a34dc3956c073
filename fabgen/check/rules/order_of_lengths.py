"""Are reflectors longer and directors shorter than the driven element?"""

from collections.abc import Iterator

from fabgen.check.finding import finding
from fabgen.check.where import names
from fabgen.design.arranged import Arranged
from fabgen.design.findings import Finding
from fabgen.design.ledger import LedgerLine

ADVICE = "common practice, advisory: the model may know better; check that no row of the table was swapped or mistyped"


def findings(arranged: Arranged) -> Iterator[Finding]:
    """L12 reflectors not longer, L13 directors not shorter, by modelled length; both advisory."""
    lines = arranged.ledger.lines
    driven = next((line for line in lines if line.role == "driven"), None)
    if driven is None:
        return
    short = [line for line in lines if line.role == "reflector" and line.modelled_mm <= driven.modelled_mm]
    long = [line for line in lines if line.role == "director" and line.modelled_mm >= driven.modelled_mm]
    if short:
        yield _odd("L12", arranged, short, min(line.modelled_mm for line in short), driven.modelled_mm)
    if long:
        yield _odd("L13", arranged, long, max(line.modelled_mm for line in long), driven.modelled_mm)


def _odd(code: str, arranged: Arranged, odd: list[LedgerLine], worst_mm: float, driven_mm: float) -> Finding:
    where = names([element.id for element in arranged.design.elements], [line.element for line in odd])
    return finding(code, "warn", where, ADVICE, measured=worst_mm, required=driven_mm, unit="mm")
