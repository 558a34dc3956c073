"""The arranged design as an assembly: one product per distinct part, one item per place."""

from fabgen.design.arranged import Arranged, Placed
from fabgen.design.solids import AssemblyItem, Colour, Product
from fabgen.model.solids import finished
from fabgen.model.tessellate import VIEW_RAD, mesh_of

_BOOM_METAL: Colour = (0.62, 0.66, 0.70)
_MADE_METAL: Colour = (0.84, 0.85, 0.86)
_BOUGHT_METAL: Colour = (0.45, 0.47, 0.50)
_WOOD_OR_GRP: Colour = (0.73, 0.58, 0.38)
PRINTED: Colour = (0.92, 0.49, 0.13)
_BOUGHT_INSULATOR: Colour = (0.20, 0.22, 0.25)


def assembly(arranged: Arranged) -> tuple[AssemblyItem, ...]:
    """Every placed part with its solid, in the order of the arranged design."""
    products: dict[object, Product] = {}
    names: set[str] = set()
    items = []
    for placed in arranged.placed:
        if placed.key not in products:
            solid = finished(placed)
            products[placed.key] = Product(unique(placed.size, names), solid, mesh_of(solid, VIEW_RAD), _colour(placed))
        items.append(AssemblyItem(placed.name, products[placed.key], placed.frame))
    return tuple(items)


def unique(name: str, taken: set[str]) -> str:
    """The name in printable ASCII; when it is taken, whatever the case of its letters, with a number.

    Args:
        name: what to call it.
        taken: names in use, in lower case; the new one is added.
    """
    plain = "".join(c if " " <= c <= "~" else "_" for c in name) or "part"
    free, count = plain, 1
    while free.lower() in taken:
        count += 1
        free = f"{plain}-{count}"
    taken.add(free.lower())
    return free


def _colour(placed: Placed) -> Colour:
    if placed.metal:
        if placed.part == "boom":
            return _BOOM_METAL
        return _BOUGHT_METAL if placed.source == "bought" else _MADE_METAL
    return {"printed": PRINTED, "made": _WOOD_OR_GRP, "bought": _BOUGHT_INSULATOR}[placed.source]
