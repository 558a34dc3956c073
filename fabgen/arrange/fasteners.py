"""Screws, nuts and washers at their places."""

import math
from typing import Literal

from fabgen.arrange.drilling import Opening
from fabgen.arrange.layout import Layout
from fabgen.design.arranged import Frame, Vector
from fabgen.design.design import Design, Element, Material
from fabgen.design.part_fasteners import fastener, sold_length_mm
from fabgen.stock import tables

UP: Vector = (0.0, 0.0, 1.0)


def bought_material(name: str = "stainless 1.4301") -> Material:
    """A material of the table as the design holds it."""
    row = tables.material(name)
    return Material(
        name=row.name,
        kind=row.kind,
        density_kg_m3=row.density_kg_m3,
        youngs_modulus_gpa=row.youngs_modulus_gpa,
        yield_mpa=row.yield_mpa,
        expansion_per_k=row.expansion_per_k,
        anodic_index_cv=row.anodic_index_cv,
        permittivity=row.permittivity,
        conductive=row.conductive,
        source=row.source,
    )


def screw(
    layout: Layout,
    name: str,
    thread: str,
    length_mm: float,
    *,
    owner: str,
    seat: Vector,
    up: Vector = UP,
    head: Literal["socket", "hex", "pan"] = "socket",
) -> None:
    """A stainless screw with the underside of its head at a point, pointing against `up`."""
    layout.put(
        "screw",
        name,
        {
            "thread": thread,
            "length_mm": length_mm,
            "head": head,
        },
        owner=owner,
        label=f"screw {thread} x {length_mm:g} {head}",
        material=bought_material(),
        frame=_frame(seat, up),
    )


def nut(layout: Layout, name: str, thread: str, *, owner: str, seat: Vector, up: Vector) -> None:
    """A stainless nut that lies with its lower face on a point."""
    layout.put(
        "nut",
        name,
        {
            "thread": thread,
        },
        owner=owner,
        label=f"nut {thread}",
        material=bought_material(),
        frame=_frame(seat, up),
    )


def washer(
    layout: Layout,
    name: str,
    thread: str,
    *,
    owner: str,
    seat: Vector,
    up: Vector,
    series: Literal["normal", "large"] = "normal",
) -> None:
    """A stainless washer that lies with its lower face on a point."""
    layout.put(
        "washer",
        name,
        {"thread": thread, "series": series},
        owner=owner,
        label=f"washer {thread}" if series == "normal" else f"washer {thread} large",
        material=bought_material(),
        frame=_frame(seat, up),
        exact=True,
    )


def _frame(seat: Vector, up: Vector) -> Frame:
    """A fastener's frame: its axis, and its x axis so that a nut's flats face ±y in the traps of both feeds."""
    return Frame(seat, z=up, x=(0.0, 0.0, 1.0) if up[0] else (1.0, 0.0, 0.0))


def middle_screw_thread(rod_diameter_mm: float) -> str:
    """Thread of the one screw through a rod's middle: at most half the rod. Source: common practice."""
    return "M3" if rod_diameter_mm >= 6 else "M2.5" if rod_diameter_mm >= 5 else "M2"


def _room_below_axis_mm(design: Design, element: Element, screw_mm: float) -> float:
    """How far an upright screw through the rod's middle may reach below its axis: a tube's floor, or a bar's hole."""
    boom, hole_mm = design.boom, element.mount.hole_mm if element.mount else 0.0
    if boom.hollow:
        return boom.top_mm - boom.wall_mm
    return math.sqrt(max(0.0, (hole_mm / 2) ** 2 - (screw_mm / 2) ** 2))


def middle_screw(layout: Layout, design: Design, element: Element) -> None:
    """Hold a rod by one screw through the boom's top into its tapped middle; it bonds nothing there.

    Raises:
        ValueError: no screw that is sold holds the rod and ends above what lies under it.
    """
    thread = middle_screw_thread(element.rod.diameter_mm)
    sizes = fastener(thread)
    layout.openings.append(Opening(element.id, element.station_mm, ("+z",), 0.0, sizes.clearance_mm, "middle screw"))
    top_mm = design.boom.top_mm
    name = f"{element.id} middle screw"
    length_mm = sold_length_mm(top_mm + 0.3 * element.rod.diameter_mm)
    below_mm, room_mm = length_mm - top_mm, _room_below_axis_mm(design, element, sizes.diameter_mm)
    if below_mm > room_mm:
        raise ValueError(
            f"the shortest screw that holds the rod, {thread} x {length_mm:g}, ends {below_mm:.2f} mm below "
            f"the rod's axis, where the boom leaves {room_mm:.2f} mm; hold the rod by keepers"
        )
    screw(layout, name, thread, length_mm, owner=element.id, seat=(element.station_mm, 0.0, top_mm))
    layout.meet(name, "boom", "screw head on wall", 0.0, sizes.clearance_mm - sizes.diameter_mm)
    layout.meet(name, element.id, "thread in rod", 0.0, tables.tap_drill_mm(thread) - sizes.diameter_mm)


def hold_down(
    layout: Layout,
    design: Design,
    *,
    owner: str,
    block: str,
    station_mm: float,
    offsets_mm: tuple[float, ...],
    seat_mm: float,
    length_mm: float,
    thread: str,
    purpose: str,
) -> None:
    """Screw a block to the boom's top: tapped holes on its centre line and their screws.

    Args:
        layout: takes holes, screws and interfaces.
        design: for the boom.
        owner: element id.
        block: occurrence name of what is held down.
        station_mm: of the block's origin.
        offsets_mm: of the screws along the boom.
        seat_mm: of the heads over the boom's top.
        length_mm: of the screws.
        thread: for example M3.
        purpose: as in the drilling table.
    """
    sizes = fastener(thread)
    for count, offset_mm in enumerate(offsets_mm, start=1):
        x_mm, name = station_mm + offset_mm, f"{owner} {purpose} {count}"
        layout.openings.append(Opening(owner, x_mm, ("+z",), 0.0, tables.tap_drill_mm(thread), purpose))
        screw(layout, name, thread, length_mm, owner=owner, seat=(x_mm, 0.0, design.boom.top_mm + seat_mm))
        layout.meet(name, block, "screw in block", 0.0, sizes.clearance_mm - sizes.diameter_mm)
        layout.meet(name, "boom", "thread in wall", 0.0, tables.tap_drill_mm(thread) - sizes.diameter_mm)
