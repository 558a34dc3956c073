"""What is printed, as it lies on the bed: one per distinct part, with the bores that this printer needs."""

import re
from collections import Counter
from collections.abc import Sequence

from fabgen import registry
from fabgen.design.arranged import Arranged, Parameters
from fabgen.design.fixtures import Fixture
from fabgen.design.solids import Print, Product
from fabgen.model.assembly import PRINTED, unique
from fabgen.model.kernel import cq, solid_of
from fabgen.model.solids import solid_of as drawn_solid
from fabgen.model.tessellate import PRINT_RAD, mesh_of


def prints(arranged: Arranged) -> tuple[Print, ...]:
    """Every distinct printed part of the array, in the order of its first place."""
    printed = [placed for placed in arranged.placed if placed.source == "printed"]
    quantities = Counter(placed.key for placed in printed)
    first = {placed.key: placed for placed in reversed(printed)}
    names: set[str] = set()
    stems: set[str] = set()
    found = []
    for key, quantity in quantities.items():
        product = print_of(*key, unique(first[key].size, names))
        found.append(Print(unique(_stem(product.name), stems), product, quantity))
    return tuple(found)


def fixture_prints(fixtures: Sequence[Fixture]) -> tuple[Print, ...]:
    """Every shop aid, in the order given; its files' names begin with `fixture-`."""
    stems: set[str] = set()
    return tuple(
        Print(
            unique(_stem(f"fixture {fixture.label}"), stems),
            print_of(fixture.part, fixture.parameters, fixture.label),
            fixture.quantity,
        )
        for fixture in fixtures
    )


def print_of(part: str, parameters: Parameters, name: str) -> Product:
    """One printed part in print pose.

    Args:
        part: a file in `model/parts` with a function `print_pose`.
        parameters: its keyword arguments, the printer's growth among them.
        name: what to call it, printable ASCII.
    """
    pose = registry.entry("model/parts", part).function("print_pose")
    solid = solid_of(pose(cq.Workplane(drawn_solid(part, parameters))))
    return Product(name, solid, mesh_of(solid, PRINT_RAD), PRINTED)


def _stem(name: str) -> str:
    """A file name's stem: lower case, digits and hyphens, 6p35 for 6.35, so that the only dot is the ending's."""
    whole = re.sub(r"(?<=\d)\.(?=\d)", "p", name.lower())
    return re.sub(r"[^a-z0-9]+", "-", whole).strip("-") or "part"
