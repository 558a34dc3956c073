"""A file without contradictions becomes a design: defaults and fits filled in, stations counted from the datum face."""

from dataclasses import replace

from fabgen.design.design import (
    AllowanceChoice,
    Boom,
    Clamp,
    Design,
    Element,
    Feed,
    Mount,
    Printer,
    Rod,
    SheetFields,
    Shop,
)
from fabgen.read.compound import table_material
from fabgen.read.fits import SADDLE_OVER_ROD_MM, allowance_choice, mount_for_rod, printed_material
from fabgen.read.grammar import (
    BoomKeys,
    ClampKeys,
    ElementKeys,
    FeedKeys,
    FileKeys,
    PrinterKeys,
    RodKeys,
    SheetKeys,
    ShopKeys,
    StockKeys,
)
from fabgen.read.limits import resolve_limits
from fabgen.read.reasons import Reasons
from fabgen.stock.tables import ToleranceClass

AS_CUT = "lengths_are: as-cut, nothing is added"
MATCH = "the match sets the driven rod's length"
CLAMP_MATERIAL = "EN AW-6061 T6"
FEED_HEIGHT_MM = 18.0
"""From the boom's top to the axis of a driven rod; common practice."""


def resolve(keys: FileKeys, stem: str, sha256: str, reasons: Reasons) -> Design:
    """Make the design of a validated file.

    Args:
        keys: the whole file, free of contradictions.
        stem: the file's name without its ending.
        sha256: of the file and its tables.
        reasons: takes where each default came from.
    """
    assert keys.boom is not None
    assert keys.elements is not None
    assert keys.title is not None
    assert keys.number is not None
    assert keys.frequency_mhz is not None
    rows = [row for row in keys.elements if row is not None]
    pick = reasons.pick
    boom = resolve_boom(keys.boom, [row.at_mm for row in rows], reasons)
    shop = _shop(keys.shop or ShopKeys(), reasons)
    as_cut = keys.lengths_are == "as-cut"
    sheet = keys.sheet or SheetKeys()
    return Design(
        stem=stem,
        sha256=sha256,
        title=keys.title,
        number=keys.number,
        revision=pick("revision", keys.revision, "A", "default, first revision"),
        frequency_mhz=keys.frequency_mhz,
        polarisation=pick("polarisation", keys.polarisation, "horizontal"),
        sheet=SheetFields(sheet.owner, sheet.creator, sheet.approved, sheet.date),
        boom=boom,
        elements=_elements(keys, rows, boom, shop, reasons),
        lengths_are=pick("lengths_are", keys.lengths_are, "free-space", "default"),
        feeds=_feeds(keys.feed, keys.rods, rows, as_cut, reasons),
        clamp=_clamp(keys.clamp, reasons) if keys.clamp is not None else None,
        tip_clearance_mm=pick("clearance.tip", keys.clearance.tip_mm if keys.clearance else None, 25.0),
        shop=shop,
        printer=_printer(keys.printer or PrinterKeys(), reasons),
        limits=resolve_limits(keys.limits),
    )


def resolve_boom(keys: BoomKeys, at_mm: list[float], reasons: Reasons) -> Boom:
    """The boom, its length and overhang computed from the outermost rods."""
    span_mm = max(at_mm) - min(at_mm)
    rear_mm = keys.overhang.rear_mm
    length_mm = keys.length_mm if keys.length_mm is not None else keys.overhang.length_mm
    if length_mm is None:
        front_mm = keys.overhang.front_mm or 0.0
        length_mm = rear_mm + span_mm + front_mm
    else:
        front_mm = length_mm - span_mm - rear_mm
    wall_mm = keys.wall_mm or 0.0
    hollow_metal = wall_mm > 0 and keys.material.kind == "metal"
    sharp_mm = 1.0 if hollow_metal and keys.section != "round" else 0.0
    why = "default, usual for drawn tube" if sharp_mm else "default, sharp"
    return Boom(
        section=keys.section,
        width_mm=keys.outside_mm[0],
        height_mm=keys.outside_mm[-1],
        wall_mm=reasons.pick("boom.wall", keys.wall_mm, 0.0, "left out: a solid bar"),
        corner_radius_mm=reasons.pick("boom.corner_radius", keys.corner_radius_mm, sharp_mm, why),
        material=keys.material,
        rear_mm=rear_mm,
        front_mm=front_mm,
        length_mm=length_mm,
    )


def resolve_rod(row: ElementKeys, rods: RodKeys | None, feed: FeedKeys | None) -> Rod | None:
    """What one element is cut from; None when nothing says it."""
    fed_mm = feed.rod_mm if feed is not None and row.role == "driven" else None
    diameter_mm = row.diameter_mm or fed_mm or (rods.diameter_mm if rods else None)
    material = row.material or (rods.material if rods else None)
    if diameter_mm is None or material is None:
        return None
    modelled_mm = row.modelled_diameter_mm or (rods.modelled_diameter_mm if rods else None)
    return Rod(diameter_mm, material, row.finish or (rods.finish if rods else None) or "bare", modelled_mm)


def _elements(keys: FileKeys, rows: list[ElementKeys], boom: Boom, shop: Shop, reasons: Reasons) -> tuple[Element, ...]:
    mounts = keys.mounts or {}
    sole = next(iter(mounts)) if len(mounts) == 1 else None
    first_mm = min(row.at_mm for row in rows)
    made: dict[tuple[str, float], Mount] = {}
    rods: dict[tuple[object, ...], Rod] = {}
    elements = []
    for row in rows:
        rod = resolve_rod(row, keys.rods, keys.feed)
        assert rod is not None
        rod = rods.setdefault((rod.diameter_mm, rod.material, rod.finish, rod.modelled_diameter_mm), rod)
        mount = None
        if row.role != "driven":
            name = row.mount or sole
            assert name is not None
            mount = made.get((name, rod.diameter_mm))
            if mount is None:
                wanted = mounts[name]
                assert wanted is not None
                mount = mount_for_rod(name, wanted, rod.diameter_mm, boom, shop.drills, reasons)
                if keys.lengths_are == "as-cut":
                    reasons.by_path[f"mounts.{name}.allowance.origin"] = AS_CUT
                    mount = replace(mount, allowance=AllowanceChoice("none"))
                made[name, rod.diameter_mm] = mount
        station_mm = row.at_mm - first_mm + boom.rear_mm
        elements.append(Element(row.id, row.role, row.at_mm, station_mm, row.length_mm, rod, mount))
    return tuple(sorted(elements, key=lambda element: element.station_mm))


def _feeds(
    keys: FeedKeys | None, rods: RodKeys | None, rows: list[ElementKeys], as_cut: bool, reasons: Reasons
) -> tuple[Feed, ...]:
    driven = [row for row in rows if row.role == "driven"]
    if keys is None or not driven:
        return ()
    first = min(driven, key=lambda row: row.at_mm)
    rod = resolve_rod(first, rods, keys)
    assert rod is not None
    pick = reasons.pick
    allowance = allowance_choice("feed.allowance", keys.allowance, "none", MATCH, reasons)
    if as_cut:
        reasons.by_path["feed.allowance.origin"] = AS_CUT
        allowance = AllowanceChoice("none")
    return (
        Feed(
            kind=keys.kind,
            element=first.id,
            gap_mm=pick("feed.gap", keys.gap_mm, 10.0),
            height_mm=_feed_height_mm(keys, rod.diameter_mm, reasons),
            cable_mm=pick("feed.cable", keys.cable_mm, 5.0),
            spacing_mm=keys.spacing_mm or 0.0,
            material=printed_material("feed.material", keys.material, reasons),
            allowance=allowance,
            reference_ohm=pick("feed.reference", keys.reference_ohm, 50.0),
        ),
    )


def _feed_height_mm(keys: FeedKeys, rod_mm: float, reasons: Reasons) -> float:
    """Stated, else the usual one, or more where a thick rod would not clear the boom as a saddle clears it."""
    clear_mm = rod_mm / 2 + SADDLE_OVER_ROD_MM
    if clear_mm > FEED_HEIGHT_MM:
        return reasons.pick("feed.height", keys.height_mm, clear_mm, f"computed, rod/2 + {SADDLE_OVER_ROD_MM:g} mm")
    return reasons.pick("feed.height", keys.height_mm, FEED_HEIGHT_MM)


def _clamp(keys: ClampKeys, reasons: Reasons) -> Clamp:
    at = keys.at if keys.at is not None else reasons.pick("clamp.at", None, "balance")
    return Clamp(
        at_mm=at if isinstance(at, float) else None,
        mast_mm=keys.mast_mm,
        plate_mm=reasons.pick("clamp.plate", keys.plate_mm, 5.0),
        material=keys.material
        if keys.material is not None
        else reasons.pick("clamp.material", None, table_material(CLAMP_MATERIAL)),
    )


def _shop(keys: ShopKeys, reasons: Reasons) -> Shop:
    pick = reasons.pick
    stock = keys.stock or StockKeys()
    stated_mm = keys.tolerance if isinstance(keys.tolerance, float) else 0.0
    letter = None if isinstance(keys.tolerance, float) else keys.tolerance
    standard: ToleranceClass = "m"
    if not stated_mm:
        standard = pick("shop.tolerance", letter, "m", "default, ISO 2768-1 class m")
    return Shop(
        tolerance=standard,
        stated_tolerance_mm=stated_mm,
        cut_step_mm=pick("shop.cut_step", keys.cut_step_mm, 0.5),
        saw_kerf_mm=pick("shop.saw_kerf", keys.saw_kerf_mm, 1.5),
        end_trim_mm=pick("shop.end_trim", keys.end_trim_mm, 5.0),
        rod_stock_mm=pick("shop.stock.rod", stock.rod_mm, 2000.0),
        boom_stock_mm=pick("shop.stock.boom", stock.boom_mm, 6000.0),
        drills=pick("shop.drills", keys.drills, "metric"),
        paper=pick("shop.paper", keys.paper, "A4"),
        paper_thickness_mm=pick("shop.paper_thickness", keys.paper_thickness_mm, 0.1),
    )


def _printer(keys: PrinterKeys, reasons: Reasons) -> Printer:
    bed = reasons.pick("printer.bed", keys.bed_mm, (220.0, 220.0, 250.0))
    return Printer(
        bed_mm=(bed[0], bed[1], bed[2]),
        nozzle_mm=reasons.pick("printer.nozzle", keys.nozzle_mm, 0.4),
        hole_growth_mm=reasons.pick("printer.hole_growth", keys.hole_growth_mm, 0.2),
    )
