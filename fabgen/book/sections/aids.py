"""Shop aids: what to print before the first hole, and how each is used."""

from collections import Counter

from fabgen.book.book import Book, Content

PLACE = 65


def content(book: Book) -> Content | None:
    """What is to be bought for all aids together; left out when there are none."""
    if not book.aids:
        return None
    bought: Counter[str] = Counter()
    for aid, _ in book.aids:
        for number, name in aid.needs:
            bought[name] += aid.quantity * number
    return {"bought": list(bought.items())}
