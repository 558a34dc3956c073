"""What to buy, make and print."""

from collections import Counter

from fabgen.book.book import Book, Content
from fabgen.design.arranged import Placed, Source
from fabgen.frozen import frozen

PLACE = 80
SHOWS_LENGTHS = True


@frozen
class Row:
    """One distinct part: the first place it stands at, how many there are, and for which elements."""

    placed: Placed
    quantity: int
    owners: tuple[str, ...]


def rows(book: Book, source: Source) -> tuple[Row, ...]:
    """Distinct parts of one source, in the order of their first place; also in `tables/parts.csv`."""
    places = [placed for placed in book.arranged.placed if placed.source == source]
    quantities = Counter((placed.key, placed.material) for placed in places)
    first = {(placed.key, placed.material): placed for placed in reversed(places)}
    owners = {
        key: tuple(dict.fromkeys(placed.owner for placed in places if (placed.key, placed.material) == key))
        for key in quantities
    }
    return tuple(Row(first[key], quantity, owners[key]) for key, quantity in quantities.items())


def content(book: Book) -> Content:
    """Parts by where they come from, and bars to buy."""
    bars = Counter((bar.name.rpartition(" #")[0], bar.length_mm) for bar in book.cut_plan.bars)
    return {
        "bars": [(name, length_mm, count) for (name, length_mm), count in bars.items()],
        "bought": rows(book, "bought"),
        "made": rows(book, "made"),
        "printed": rows(book, "printed"),
        "feeds": book.arranged.design.feeds,
    }
