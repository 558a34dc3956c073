"""Allowance against the size of the boom, for each mount: computed band, published curves, and where this design is."""

from collections.abc import Callable, Iterable
from dataclasses import replace

from fabgen.book.book import Book, Content
from fabgen.design.design import Mount
from fabgen.design.ledger import LedgerLine
from fabgen.design.records import MeasuredRecord
from fabgen.design.scale import Axis, axis
from fabgen.frozen import frozen
from fabgen.physics.boom_closed_form import closed_form_allowance
from fabgen.physics.boom_coupon import allowance_from_reactance_factor_mm
from fabgen.physics.boom_mount import BoomMount, Section, wavelength_mm
from fabgen.physics.published_boom import equivalent_round_mm, published_values

PLACE = 56
SHOWS_LENGTHS = True
WIDTH_MM, HEIGHT_MM, LEFT_MM, FOOT_MM = 178.0, 92.0, 12.0, 11.0
LOW_WL, HIGH_WL, STEPS = 0.005, 0.055, 60
NBS_POINT_WL = (0.0085, 0.005, 0.001)
"""Boom, added length and reading error of one bonded mount: P. P. Viezbicke, Yagi Antenna Design, NBS Technical Note
688, 1976, Fig. 10 (graph reading)."""

Point = tuple[float, float]


@frozen
class BoomPicture:
    """One mount's picture; all points are on paper.

    Attributes:
        mount: as designed.
        lines: the ledger's lines of its rods.
        length_mm: mean modelled length, for which the computed curve holds.
        x: boom in wavelengths.
        y: allowance in mm.
        bands: outlines of value ± 2u, one for every unbroken stretch.
        curves: the values in the middle of the bands.
        printed: name, validity as dash, polyline of each published statement.
        own: this design's rods.
        nbs: place and half height of the one measured array point; None for other mounts.
        measured: date, place, and the two ends of ±2u of every coupon on record for this mount.
    """

    mount: Mount
    lines: tuple[LedgerLine, ...]
    length_mm: float
    x: Axis
    y: Axis
    bands: tuple[tuple[Point, ...], ...]
    curves: tuple[tuple[Point, ...], ...]
    printed: tuple[tuple[str, bool, tuple[Point, ...]], ...]
    own: tuple[Point, ...]
    nbs: tuple[Point, Point] | None
    measured: tuple[tuple[str, Point, Point], ...]


def content(book: Book) -> Content | None:
    """A picture per mount on a metal boom; left out when there is none."""
    mounts = dict(book.mounts)
    rods: dict[str, tuple[Mount, list[LedgerLine]]] = {}
    for element in book.arranged.design.elements:
        if element.mount is not None and element.id in mounts:
            line = book.arranged.ledger.line(element.id)
            rods.setdefault(element.mount.name, (element.mount, []))[1].append(line)
    found = [_picture(book, mounts[lines[0].element], mount, lines) for mount, lines in rods.values()]
    return {"pictures": found, "width_mm": WIDTH_MM, "height_mm": HEIGHT_MM} if found else None


def _picture(book: Book, here: BoomMount, mount: Mount, lines: list[LedgerLine]) -> BoomPicture:
    design = book.arranged.design
    wl_mm = design.wavelength_mm
    length_mm = sum(line.modelled_mm for line in lines) / len(lines)
    sizes_wl = [LOW_WL + (HIGH_WL - LOW_WL) * k / STEPS for k in range(STEPS + 1)]
    computed = [_computed(here, size_wl * wl_mm, length_mm, design.frequency_mhz) for size_wl in sizes_wl]
    own_wl = here.outside_mm / wl_mm
    printed = _printed(here, sizes_wl, wl_mm, mount)
    used_mm = [line.allowance.value_mm + k * line.allowance.u_mm for line in lines for k in (-2, 2)]
    tops_mm = [value + 2 * u for value, u in filter(None, computed)]
    tops_mm += [mm for _, _, curve in printed for _, mm in curve]
    measured = _measured(book, mount, length_mm)
    tops_mm += [mm + 2 * u for _, _, mm, u in measured]
    x = axis(min(LOW_WL, own_wl), max(HIGH_WL, own_wl), LEFT_MM, WIDTH_MM - 6.0)
    y = axis(min(0.0, *used_mm), max(*tops_mm, *used_mm), HEIGHT_MM - FOOT_MM, 3.0)
    runs = _runs(zip(sizes_wl, computed, strict=True))
    bonded = mount.style == "bonded-through"
    boom_wl, added_wl, error_wl = NBS_POINT_WL
    return BoomPicture(
        mount,
        tuple(lines),
        length_mm,
        x,
        y,
        bands=tuple(
            tuple((x.at(wl), y.at(mm + 2 * u)) for wl, mm, u in run)
            + tuple((x.at(wl), y.at(mm - 2 * u)) for wl, mm, u in reversed(run))
            for run in runs
        ),
        curves=tuple(tuple((x.at(wl), y.at(mm)) for wl, mm, _ in run) for run in runs),
        printed=tuple((name, valid, tuple((x.at(wl), y.at(mm)) for wl, mm in curve)) for name, valid, curve in printed),
        own=tuple((x.at(own_wl), y.at(line.allowance.value_mm)) for line in lines),
        nbs=(
            (x.at(boom_wl), y.at(added_wl * wl_mm)),
            (y.at((added_wl + error_wl) * wl_mm), y.at((added_wl - error_wl) * wl_mm)),
        )
        if bonded and y.high >= (added_wl + error_wl) * wl_mm
        else None,
        measured=tuple(
            (date, (x.at(wl), y.at(mm)), (y.at(mm + 2 * u), y.at(mm - 2 * u))) for date, wl, mm, u in measured
        ),
    )


def _measured(book: Book, mount: Mount, length_mm: float) -> list[tuple[str, float, float, float]]:
    """Date, boom in wavelengths, allowance at this length and its u for every coupon of the mount on record."""
    found = []
    for record in book.arranged.design.records:
        if isinstance(record, MeasuredRecord) and record.mount == mount.name:
            there = record.geometry
            mm = allowance_from_reactance_factor_mm(
                record.reactance_factor,
                boom_mm=there.outside_mm,
                rod_diameter_mm=there.rod_diameter_mm,
                rod_length_mm=length_mm,
                frequency_mhz=there.frequency_mhz,
            )
            u_mm = mm * record.u_mm / record.allowance_mm
            found.append((record.date, there.outside_mm / wavelength_mm(there.frequency_mhz), mm, u_mm))
    return found


def _computed(here: BoomMount, boom_mm: float, length_mm: float, frequency_mhz: float) -> Point | None:
    """Value and u of the same rod, wall and hole on another boom; None where nothing is computed."""
    height_mm = here.height_mm * boom_mm / here.outside_mm
    try:
        there = replace(here, outside_mm=boom_mm, height_mm=height_mm)
    except ValueError:
        return None
    found = closed_form_allowance(there, length_mm, frequency_mhz)
    return None if found.allowance_mm is None or found.u_mm is None else (found.allowance_mm, found.u_mm)


def _printed(here: BoomMount, sizes_wl: list[float], wl_mm: float, mount: Mount) -> list[tuple[str, bool, list[Point]]]:
    """Every published statement over the sizes for which it holds; one outside its range at this mount is marked."""
    counts_as: Callable[[float], float] = (
        (lambda mm: equivalent_round_mm(mm, mount.allowance.square_as))
        if here.section is Section.SQUARE
        else (lambda mm: mm)
    )
    gap_mm = here.gap_mm if mount.style == "on-top" else 0.0
    curves: dict[str, tuple[bool, list[Point]]] = {}
    for size_wl in sizes_wl:
        boom_mm = counts_as(size_wl * wl_mm)
        for value in published_values(mount.style, boom_mm=boom_mm, wavelength_mm=wl_mm, gap_mm=gap_mm):
            touching = value.range_text == "rod touches the boom"
            if value.valid or touching:
                curves.setdefault(value.model, (value.valid, []))[1].append((size_wl, value.value_mm))
    return [(name, valid, curve) for name, (valid, curve) in curves.items()]


def _runs(values: Iterable[tuple[float, Point | None]]) -> list[list[tuple[float, float, float]]]:
    """Unbroken stretches of size, value and u."""
    runs: list[list[tuple[float, float, float]]] = [[]]
    for size_wl, found in values:
        if found is None:
            runs.append([])
        else:
            runs[-1].append((size_wl, *found))
    return [run for run in runs if len(run) > 1]
