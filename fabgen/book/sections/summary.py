"""Title block, verdict and the figures of the whole array."""

from fabgen.book.book import Book, Content

PLACE = 10
SHOWS_LENGTHS = True


def content(book: Book) -> Content:
    """Counts by severity, and whether anything is printed."""
    severities = [finding.severity for finding in book.findings]
    return {
        "counts": {severity: severities.count(severity) for severity in ("fail", "warn", "note")},
        "printed": any(placed.source == "printed" for placed in book.arranged.placed),
    }
