"""In what order the parts go together, and what holds them."""

from collections import Counter
from collections.abc import Mapping

from fabgen.book.book import Book, Content
from fabgen.design.arranged import Placed
from fabgen.design.assembly_order import Step, assembly_order

PLACE = 100
NEW_PAGE = True


def content(book: Book) -> Content:
    """Steps with their parts counted, what cannot go on, the fits, and whether rods must not touch the boom."""
    arranged = book.arranged
    order = assembly_order(arranged)
    placed = {each.name: each for each in arranged.placed}
    fits: dict[tuple[str, float], int] = Counter(
        (interface.kind, round(interface.fit_mm, 3) + 0.0)
        for interface in arranged.interfaces
        if interface.fit_mm is not None
    )
    mounts = [element.mount for element in arranged.design.elements if element.mount is not None]
    return {
        "steps": [(step, _counted(step, placed)) for step in order.steps],
        "stuck": order.stuck,
        "fits": [(kind, fit_mm, count) for (kind, fit_mm), count in sorted(fits.items())],
        "insulated": any(mount.style in ("insulated-through", "on-top") for mount in mounts),
    }


def _counted(step: Step, placed: Mapping[str, Placed]) -> list[tuple[tuple[str, ...], int, str]]:
    """How many of which part go on in a step, and at which elements where not at all of the step."""
    owners: dict[str, list[str]] = {}
    for name in step.parts:
        owners.setdefault(placed[name].size, []).append(placed[name].owner)
    counted = []
    for size, found in owners.items():
        distinct = tuple(dict.fromkeys(found))
        counted.append(((), len(found), size) if set(distinct) == set(step.elements) else (distinct, len(found), size))
    return counted
