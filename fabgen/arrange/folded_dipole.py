"""A folded dipole: one rod bent to a flat loop, pushed into a saddle on the boom's top and screwed to it."""

from typing import Any

from fabgen.arrange.fasteners import screw, washer
from fabgen.arrange.fed_block import numbers_of, screwed_down, terminal
from fabgen.arrange.layout import SIDES, Layout
from fabgen.design.arranged import Cut, Frame, Vector
from fabgen.design.design import Design, Feed
from fabgen.design.folded_rod_sizes import FoldedRodSize, folded_rod_size
from fabgen.design.folded_saddle_sizes import FoldedSaddleSize, folded_saddle_size
from fabgen.design.ledger import LedgerLine
from fabgen.design.part_fasteners import fastener
from fabgen.design.top_block import TAG_MM
from fabgen.stock import tables

_FRONT: Vector = (1.0, 0.0, 0.0)


def lay_out(design: Design, feed: Feed, line: LedgerLine) -> tuple[Layout, list[Cut]]:
    """Bent rod, saddle, screws, holes and the one piece to saw and bend."""
    element, boom, numbers = design.element(feed.element), design.boom, numbers_of(design, feed)
    diameter_mm, saddle_numbers = element.rod.diameter_mm, numbers | {"spacing_mm": feed.spacing_mm}
    size = folded_saddle_size(**saddle_numbers)
    rod_numbers: dict[str, Any] = {
        "length_mm": line.cut_mm,
        "spacing_mm": feed.spacing_mm,
        "diameter_mm": diameter_mm,
        "gap_mm": feed.gap_mm,
        "cross_hole_mm": size.rod_hole_mm,
        "cross_hole_from_end_mm": size.rod_hole_from_end_mm,
    }
    bent = folded_rod_size(**rod_numbers)
    if bent.straight_mm / 2 < max(map(abs, size.y_mm)):
        raise ValueError(
            f"a folded dipole's saddle is {2 * max(map(abs, size.y_mm)):g} mm wide, its limbs are straight for only "
            f"{bent.straight_mm:g} mm"
        )
    layout, saddle = Layout(), f"{element.id} folded saddle"
    layout.put(
        "folded_rod",
        element.id,
        rod_numbers,
        owner=element.id,
        label=f"folded rod {diameter_mm:g} x {line.cut_mm:.3f}",
        material=element.rod.material,
        frame=Frame((element.station_mm, 0.0, boom.top_mm + feed.height_mm)),
    )
    layout.put(
        "folded_saddle",
        saddle,
        saddle_numbers,
        owner=element.id,
        label=f"folded saddle rod {diameter_mm:g} height {feed.height_mm:g}",
        material=feed.material,
        frame=Frame((element.station_mm, 0.0, boom.top_mm)),
    )
    fit_mm = size.bore_mm - diameter_mm
    layout.meet(element.id, saddle, "limbs in slots", 0.0, fit_mm)
    layout.meet(saddle, "boom", "saddle on boom", 0.0)
    screwed_down(layout, design, feed, saddle, size)
    _terminals(layout, design, feed, size)
    _retainer(layout, design, feed, size)
    return layout, [_cut(design, feed, line, bent, size)]


def _terminals(layout: Layout, design: Design, feed: Feed, size: FoldedSaddleSize) -> None:
    """A screw along the boom through each fed end, its nut in the saddle's back."""
    element, saddle = design.element(feed.element), f"{feed.element} folded saddle"
    z_mm = design.boom.top_mm + feed.height_mm
    head_mm = element.station_mm + element.rod.diameter_mm / 2 + TAG_MM
    for side in SIDES:
        y_mm = side * size.terminal_y_mm
        seat, trap = (head_mm, y_mm, z_mm), (element.station_mm + size.trap_front_mm, y_mm, z_mm)
        terminal(layout, element.id, side, size, block=saddle, rod=element.id, seat=seat, trap=trap, up=_FRONT)


def _retainer(layout: Layout, design: Design, feed: Feed, size: FoldedSaddleSize) -> None:
    """A screw over the upper limb whose washer keeps it in its slot."""
    element, saddle = design.element(feed.element), f"{feed.element} folded saddle"
    thread, large = size.retainer, tables.washer(size.retainer, "large")
    thickness_mm = large.thickness_mm
    x_mm, z_mm = element.station_mm + element.rod.diameter_mm / 2, design.boom.top_mm + size.retainer_z_mm
    ring, bolt = f"{element.id} retainer washer", f"{element.id} retainer screw"
    washer(layout, ring, thread, owner=element.id, seat=(x_mm, 0.0, z_mm), up=_FRONT, series="large")
    deepest_mm = element.rod.diameter_mm / 2 + thickness_mm - size.back_mm
    length_mm = max(length for length in (6.0, 8.0, 10.0, 12.0, 16.0) if length <= max(deepest_mm, 6.0))
    screw(
        layout,
        bolt,
        thread,
        length_mm,
        owner=element.id,
        seat=(x_mm + thickness_mm, 0.0, z_mm),
        up=_FRONT,
        head="pan",
    )
    thread_mm = fastener(thread).diameter_mm
    layout.meet(ring, element.id, "washer on limb", size.retainer_gap_mm)
    layout.meet(bolt, ring, "head on washer", 0.0, large.bore_mm - thread_mm)
    layout.meet(bolt, saddle, "thread in plastic", 0.0, size.pilot_mm - thread_mm)


def _cut(design: Design, feed: Feed, line: LedgerLine, bent: FoldedRodSize, size: FoldedSaddleSize) -> Cut:
    """The rod as sawn, before it is bent; one millimetre of finished length is two of it."""
    element = design.element(feed.element)
    return Cut(
        piece=element.id,
        element=element.id,
        stock="rod",
        rod_mm=element.rod.diameter_mm,
        material=element.rod.material.name,
        cut_mm=round(bent.developed_mm, 3),
        trim_mm=2 * line.trim_mm,
        half_mm=round(bent.developed_mm / 2, 3),
        projection_mm=(line.cut_mm - design.boom.width_mm) / 2,
        tolerance_mm=line.tolerance_mm,
        note=(
            f"bend both ends round {bent.bend_radius_mm:g} to the centre line, {line.cut_mm:g} over the bends; "
            f"hole {size.rod_hole_mm:g} across, {size.rod_hole_from_end_mm:g} from each end"
        ),
    )
