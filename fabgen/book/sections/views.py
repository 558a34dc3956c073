"""The array as a whole: plan, side elevation and the assembled picture."""

from fabgen.book.book import Book, Content

PLACE = 40
SHOWS_LENGTHS = True


def content(book: Book) -> Content | None:
    """Nothing of its own; left out when nothing was drawn."""
    return {} if book.views else None
