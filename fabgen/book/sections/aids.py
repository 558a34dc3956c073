"""Shop aids: what to print before the first hole, and how each is used."""

from fabgen.book.book import Book, Content

PLACE = 65


def content(book: Book) -> Content | None:
    """What is to be bought for the aids; left out when there are none."""
    if not book.aids:
        return None
    return {"bought": list(dict.fromkeys(need for aid, _ in book.aids for need in aid.needs))}
