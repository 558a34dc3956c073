"""Every sheet of a package: each file in `sheets/` says where its sheets go and draws them."""

import importlib
from typing import Literal, get_args

from fabgen import registry
from fabgen.design.arranged import Arranged, CutPlan
from fabgen.design.drawing import Sheet
from fabgen.draw.stamp import stamped

Place = Literal["templates", "bench", "drawings"]
PLACES: tuple[Place, ...] = get_args(Place)


def sheets_of(place: Place, arranged: Arranged, plan: CutPlan, *, stamp: bool = False) -> list[Sheet]:
    """The sheets that go to one place, in order of their files' names.

    Args:
        place: `templates` at 1:1, `bench` for the drill press, `drawings` to look at.
        arranged: the arranged design.
        plan: its bars.
        stamp: print the stamp of a design that is not cleared under every sheet.
    """
    found: list[Sheet] = []
    for entry in registry.entries("draw/sheets"):
        if place == importlib.import_module(entry.module).PLACE:
            found += entry.function("sheets")(arranged, plan)
    return [stamped(sheet) for sheet in found] if stamp else found
