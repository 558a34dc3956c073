"""A page for the range: what a rise or a fall means when a short rod is brought near a tip."""

from fabgen.book.book import Book, Content
from fabgen.design.response import Sensitivity

PLACE = 112
NEW_PAGE = True
FELT_DB = 0.01
"""Per millimetre: below it nothing can be seen on a meter outdoors; common practice."""


def content(book: Book) -> Content | None:
    """Length and station of every element with the change of the forward signal; left out without the solver."""
    found = book.response
    if found is None:
        return None
    rows: dict[str, dict[str, Sensitivity]] = {}
    for row in found.sensitivities:
        rows.setdefault(row.element, {})[row.quantity] = row
    return {
        "rows": [(element, each["length"], each["station"]) for element, each in rows.items()],
        "felt_db": FELT_DB,
    }
