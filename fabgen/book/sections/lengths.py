"""The ledger: from each modelled length to its cut length, with the origin of every allowance."""

from fabgen.book.book import Book, Content
from fabgen.design.ledger import LedgerLine

PLACE = 50
SHOWS_LENGTHS = True
NEW_PAGE = True


def content(book: Book) -> Content:
    """Allowance sources and remarks, each once with the elements they hold for."""
    lines = book.arranged.ledger.lines
    sources: dict[str, list[str]] = {}
    remarks: dict[tuple[str, str], list[str]] = {}
    for line in lines:
        sources.setdefault(line.allowance.source, []).append(line.element)
        for remark in line.allowance.remarks:
            remarks.setdefault((remark.code, remark.text), []).append(line.element)
    return {
        "lines": lines,
        "uncertain": [line for line in lines if line.allowance.needed and line.allowance.origin != "none"],
        "sources": [(source, elements) for source, elements in sources.items() if source],
        "remarks": [(code, text, elements) for (code, text), elements in remarks.items()],
        "origins": [origin for origin in _ORIGINS if any(_origin(line) == origin for line in lines)],
    }


_ORIGINS = ("measured", "computed", "published", "stated", "none", "not needed")


def _origin(line: LedgerLine) -> str:
    return line.allowance.origin if line.allowance.needed else "not needed"
