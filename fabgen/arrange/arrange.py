"""Design and lengths become stations, holes, placed parts, interfaces and pieces to saw, all as numbers.

Each style of mount and each kind of feed is a module of its own name, loaded when a design uses it.
"""

import math
from importlib import import_module

from fabgen.arrange import clamp, feed
from fabgen.arrange.clamp_place import clamp_station_mm
from fabgen.arrange.cuts import boom_cut, rod_cut
from fabgen.arrange.drilling import PIECE, hole_rows
from fabgen.arrange.layout import Layout, sorted_parameters
from fabgen.design.arranged import Arranged, Box, Cut, Cylinder, Frame, Hole, Piece, Placed
from fabgen.design.design import Design, Element
from fabgen.design.distances import bounding_box
from fabgen.design.ledger import Ledger, Remark
from fabgen.physics.sections import boom_section

CABLE_DENSITY_KG_M3 = 1900.0
"""Coaxial cable as a round bar: 37 g/m at 5 mm. Source: from memory, typical of solid-polyethylene cable."""


def arrange(design: Design, ledger: Ledger) -> Arranged:
    """Put everything in its place.

    Args:
        design: as read.
        ledger: its lengths.

    Returns:
        The arranged design; what could not be arranged stands in its remarks.
    """
    layout, cuts = Layout(), [boom_cut(design)]
    for element in design.elements:
        try:
            cuts += _lay_out(layout, design, element, ledger)
        except ValueError as error:
            layout.remarks.append((element.id, Remark("F01", str(error))))
            cuts.append(rod_cut(design, element, ledger.line(element.id)))
    boom_g = boom_mass_g(design)
    balance_mm = _balance_mm(design, layout, boom_g)
    station_mm, mast = _clamp(layout, design, balance_mm)
    holes = hole_rows(design, layout.openings)
    placed = (_boom(design, holes, boom_g), *layout.placed)
    return Arranged(
        design=design,
        ledger=ledger,
        pieces=(Piece(PIECE, 0.0, design.boom.length_mm),),
        holes=holes,
        placed=placed,
        interfaces=tuple(layout.interfaces),
        cuts=tuple(cuts),
        remarks=tuple(layout.remarks),
        mast=mast,
        mass_g=sum(part.mass_g for part in placed),
        balance_mm=balance_mm,
        clamp_mm=station_mm,
        clamp_width_mm=clamp.clamp_size(design, design.clamp).width_mm if design.clamp else 0.0,
        turning_radius_mm=_turning_radius_mm(design, placed, mast, balance_mm),
    )


def _lay_out(layout: Layout, design: Design, element: Element, ledger: Ledger) -> list[Cut]:
    """One element with its mount or feed; nothing of it is taken over when it cannot be made."""
    line = ledger.line(element.id)
    carried_by = design.feed_of(element)
    if carried_by is not None:
        part, cuts = feed.lay_out(design, carried_by, line)
    elif element.mount is not None:
        style = import_module("fabgen.arrange." + element.mount.style.replace("-", "_"))
        part = style.lay_out(design, element, element.mount, line)
        cuts = [rod_cut(design, element, line)]
    else:
        raise ValueError("no feed carries this driven element")
    layout.add(part)
    return cuts


def boom_mass_g(design: Design) -> float:
    """Mass of the undrilled boom."""
    boom = design.boom
    section = boom_section(
        boom.section,
        width_mm=boom.width_mm,
        height_mm=boom.height_mm,
        wall_mm=boom.wall_mm,
        corner_radius_mm=boom.corner_radius_mm,
    )
    return section.mass_g(boom.length_mm, boom.material.density_kg_m3)


def _boom(design: Design, holes: tuple[Hole, ...], mass_g: float) -> Placed:
    boom = design.boom
    y, z = boom.width_mm / 2, boom.height_mm / 2
    return Placed(
        name="boom",
        owner="boom",
        part="boom",
        parameters=sorted_parameters(
            {
                "section": boom.section,
                "width_mm": boom.width_mm,
                "height_mm": boom.height_mm,
                "wall_mm": boom.wall_mm,
                "corner_radius_mm": boom.corner_radius_mm,
                "length_mm": boom.length_mm,
                "holes": tuple((h.station_mm, h.angle_deg, h.across_mm, h.diameter_mm) for h in holes),
            }
        ),
        frame=Frame(),
        shapes=(Box((0.0, -y, -z), (boom.length_mm, y, z)),),
        exact=False,
        source="made",
        material=boom.material.name,
        metal=boom.material.conductive,
        mass_g=mass_g,
        size=f"boom {boom.section} {boom.width_mm:g} x {boom.height_mm:g} x {round(boom.length_mm, 3):.8g}",
    )


def _balance_mm(design: Design, layout: Layout, boom_g: float) -> float:
    """Centre of mass along the boom of all but the clamp; the cable runs along the boom from the feed to it."""
    masses = [(boom_g, design.boom.length_mm / 2)]
    masses += [(part.mass_g, part.frame.origin[0]) for part in layout.placed]
    balance_mm = _centre(masses)
    for _ in range(3):
        runs = []
        for carried in design.feeds:
            start_mm = design.element(carried.element).station_mm
            area_mm2 = math.pi / 4 * carried.cable_mm**2
            run_g = area_mm2 * abs(balance_mm - start_mm) * CABLE_DENSITY_KG_M3 / 1e6
            runs.append((run_g, (start_mm + balance_mm) / 2))
        balance_mm = _centre(masses + runs)
    return round(balance_mm, 3)


def _centre(masses: list[tuple[float, float]]) -> float:
    return sum(mass * x for mass, x in masses) / sum(mass for mass, _ in masses)


def _clamp(layout: Layout, design: Design, balance_mm: float) -> tuple[float | None, Cylinder | None]:
    if design.clamp is None:
        return None, None
    station_mm = clamp_station_mm(design, design.clamp, layout.placed, balance_mm)
    if station_mm is None:
        why = (
            "no place behind the rearmost rod is long enough for the clamp"
            if design.polarisation == "vertical"
            else "no place between the rods is long enough for the clamp"
        )
        layout.remarks.append(("clamp", Remark("C01", why)))
        return None, None
    try:
        part, mast = clamp.lay_out(design, design.clamp, station_mm)
    except ValueError as error:
        layout.remarks.append(("clamp", Remark("F01", str(error))))
        return None, None
    layout.add(part)
    return station_mm, mast


def _turning_radius_mm(design: Design, placed: tuple[Placed, ...], mast: Cylinder | None, balance_mm: float) -> float:
    """From the mast's axis (without one: the balance point) to the farthest point of boom and rods, seen from above.

    The mast stands beside the boom, or with upright rods below it, so its axis is not the boom's.
    """
    across = 1 if design.polarisation == "horizontal" else 2
    pivot = mast.centre if mast else (balance_mm, 0.0, 0.0)
    boxes = [bounding_box(part.shapes) for part in placed if part.part in ("boom", "rod", "folded_rod")]
    reaches = [
        math.hypot(*(max(abs(box.low[axis] - pivot[axis]), abs(box.high[axis] - pivot[axis])) for axis in (0, across)))
        for box in boxes
    ]
    return round(max(reaches), 3)
