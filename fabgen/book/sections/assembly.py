"""In what order the parts go together, and what holds them."""

from collections import Counter

from fabgen.book.book import Book, Content
from fabgen.design.assembly_order import Step, assembly_order

PLACE = 100


def content(book: Book) -> Content:
    """Steps with their parts counted, what cannot go on, the fits, and whether rods must not touch the boom."""
    arranged = book.arranged
    order = assembly_order(arranged)
    sizes = {placed.name: placed.size for placed in arranged.placed}
    fits: dict[tuple[str, float], int] = Counter(
        (interface.kind, round(interface.fit_mm, 3) + 0.0)
        for interface in arranged.interfaces
        if interface.fit_mm is not None
    )
    mounts = [element.mount for element in arranged.design.elements if element.mount is not None]
    return {
        "steps": [(step, _counted(step, sizes)) for step in order.steps],
        "stuck": order.stuck,
        "fits": [(kind, fit_mm, count) for (kind, fit_mm), count in sorted(fits.items())],
        "insulated": any(mount.style in ("insulated-through", "on-top") for mount in mounts),
    }


def _counted(step: Step, sizes: dict[str, str]) -> list[tuple[int, str]]:
    """How many of which part go on in a step."""
    return [(count, size) for size, count in Counter(sizes[name] for name in step.parts).items()]
