"""Title block and the figures of the whole array."""

from fabgen.book.book import Book, Content

PLACE = 10
SHOWS_LENGTHS = True


def content(book: Book) -> Content:
    """Whether anything is printed."""
    return {"printed": any(placed.source == "printed" for placed in book.arranged.placed)}
