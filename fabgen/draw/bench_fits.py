"""The fits: what goes through which hole and bore, one row for each mount and rod."""

from collections import defaultdict

from fabgen.design.arranged import Arranged
from fabgen.design.design import Boom, Bush, Element, Mount
from fabgen.draw.flow import Column, Flow
from fabgen.draw.words import ids
from fabgen.stock.tables import print_practice
from fabgen.units import format_mm

_COLUMNS = (
    Column("mount", 34.0),
    Column("rod", 17.0, "end"),
    Column("hole", 17.0, "end"),
    Column("bore", 17.0, "end"),
    Column("spigot", 34.0, "end"),
    Column("flange", 18.0, "end"),
    Column("keeper bore", 24.0, "end"),
    Column("held by", 22.0),
)


def fits(flow: Flow, arranged: Arranged) -> None:
    """Letter the fits of every mount and feed.

    Args:
        flow: the pages.
        arranged: the arranged design.
    """
    design = arranged.design
    flow.heading("Fits: finished diameters in mm", keep_mm=34.0)
    groups: dict[tuple[str, ...], list[str]] = defaultdict(list)
    for element in design.elements:
        if element.mount is not None and design.feed_of(element) is None:
            groups[tuple(_cells(design.boom, element, element.mount))].append(element.id)
    if groups:
        flow.table(_COLUMNS, [[*cells, f"for {ids(names, 8)}"] for cells, names in groups.items()])
    growth_mm = design.printer.hole_growth_mm
    if groups and growth_mm > 0:
        flow.paragraph(
            f"Printed bores are drawn {growth_mm:g} mm larger than this table says, because the printer makes them "
            "that much smaller. Try one print on a rod and in a drilled offcut first; drill a tight bore out."
        )
    for feed in design.feeds:
        rod_mm = format_mm(design.element(feed.element).rod.diameter_mm)
        flow.paragraph(
            f"Feed of {feed.element}: {feed.kind.replace('-', ' ')}, rod {rod_mm}, gap {format_mm(feed.gap_mm)}, "
            f"rod axis {format_mm(feed.height_mm)} over the boom's top, cable {feed.cable_mm:g}."
        )


def _cells(boom: Boom, element: Element, mount: Mount) -> list[str]:
    bush, keeper, saddle = mount.bush, mount.keeper, mount.saddle
    bore = bush.bore_mm if bush else saddle.bore_mm if saddle else 0.0
    held = keeper.kind if keeper and mount.hold == "keepers" else mount.bond or mount.hold
    return [
        mount.name,
        _size(element.rod.diameter_mm),
        _size(mount.hole_mm),
        _size(bore),
        f"{_size(bush.spigot_mm)} × {_spigot_length_mm(boom, bush):g}" if bush else "–",
        _size(bush.flange_mm if bush else 0.0),
        _size(keeper.bore_mm if keeper else 0.0),
        held.replace("-", " "),
    ]


def _spigot_length_mm(boom: Boom, bush: Bush) -> float:
    """In one wall; of a sleeve through both, to where it ends inside the far one."""
    if bush.kind == "shoulder":
        return bush.spigot_length_mm
    return boom.width_mm - print_practice("keeper_play_mm")


def _size(diameter_mm: float) -> str:
    return format_mm(diameter_mm) if diameter_mm else "–"
