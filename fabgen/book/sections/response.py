"""The modelled array over its band with the fan of its builds, and its patterns."""

import math

from fabgen.book.book import Book, Content
from fabgen.design.response import Pattern, Response
from fabgen.design.scale import Axis, axis
from fabgen.frozen import frozen

PLACE = 53
WIDTH_MM, HEIGHT_MM, LEFT_MM, FOOT_MM = 178.0, 52.0, 12.0, 9.5
HIGHEST_FRONT_TO_BACK_DB = 40.0
"""Above that a front-to-back ratio is a null that no build keeps."""
HIGHEST_MISMATCH = 5.0
"""Above that a mismatch is no more than bad, unless the band itself goes higher."""
ROOM = 1.2
RADIUS_MM, DEEPEST_DB = 36.0, 40.0

Point = tuple[float, float]


@frozen
class Panel:
    """One quantity over the band; all points are on paper.

    Attributes:
        name: quantity with its unit.
        x: frequency in MHz.
        y: the quantity.
        fan: outline of 95 % of builds.
        nominal: the modelled array.
        limit_mm: height of the stated limit on paper; None without one.
        cut: something lies above the top and is drawn along it.
    """

    name: str
    x: Axis
    y: Axis
    fan: tuple[Point, ...]
    nominal: tuple[Point, ...]
    limit_mm: float | None
    cut: bool


@frozen
class Round:
    """One pattern on paper, forward to the right, its centre at the origin."""

    name: str
    outline: tuple[Point, ...]
    half_power_deg: float | None


def content(book: Book) -> Content | None:
    """Panels and patterns; left out where the solver was not asked."""
    found = book.response
    if found is None:
        return None
    design = book.arranged.design
    return {
        "found": found,
        "panels": _panels(found, book) if found.absolute else [],
        "patterns": [
            _round("H-plane, across the rods", found.h_plane),
            _round("E-plane, along the rods", found.e_plane),
        ]
        if found.absolute
        else [],
        "at": next((point for point in found.points if point.frequency_mhz == design.frequency_mhz), None),
        "folded": any(feed.kind == "folded-dipole" for feed in design.feeds),
        "band_mhz": design.limits.band_mhz,
        "width_mm": WIDTH_MM,
        "height_mm": HEIGHT_MM,
        "radius_mm": RADIUS_MM,
        "rings": [("" if depth > 20 else f"−{depth}" if depth else "0", _ring_mm(-depth)) for depth in (0, 10, 20, 30)],
        "spokes": [(math.cos(a) * RADIUS_MM, math.sin(a) * RADIUS_MM) for a in (k * math.pi / 6 for k in range(12))],
    }


def _panels(found: Response, book: Book) -> list[Panel]:
    limits, design_mhz = book.arranged.design.limits, book.arranged.design.frequency_mhz
    low_mhz, high_mhz = limits.band_mhz or (design_mhz, design_mhz)
    gains = [(point.frequency_mhz, point.gain_dbi) for point in found.points]
    ratios = [(point.frequency_mhz, point.front_to_back_db) for point in found.points]
    swr = [(point.frequency_mhz, point.mismatch) for point in found.points]
    return [
        _panel("gain, dBi", gains, [(each.frequency_mhz, each.gain_dbi) for each in found.fan], None, math.inf),
        _panel(
            "front to back, dB",
            ratios,
            [(each.frequency_mhz, each.front_to_back_db) for each in found.fan],
            limits.front_to_back_db,
            HIGHEST_FRONT_TO_BACK_DB,
        ),
        _panel(
            "mismatch, SWR",
            swr,
            [(each.frequency_mhz, each.mismatch) for each in found.fan],
            limits.mismatch,
            max(
                HIGHEST_MISMATCH,
                ROOM * max(value for frequency_mhz, value in swr if low_mhz <= frequency_mhz <= high_mhz),
            ),
        ),
    ]


def _panel(
    name: str,
    nominal: list[tuple[float, float]],
    fan: list[tuple[float, tuple[float, float]]],
    limit: float | None,
    highest: float,
) -> Panel:
    """A panel; what is above `highest` is drawn there."""
    shown = [min(value, highest) for _, value in nominal]
    shown += [min(value, highest) for _, ends in fan for value in ends]
    shown += [limit] if limit is not None else []
    places = [frequency for frequency, _ in nominal]
    x = axis(min(places), max(places), LEFT_MM, WIDTH_MM - 6.0, 12)
    y = axis(min(shown), max(shown), HEIGHT_MM - FOOT_MM, 3.0, 6)

    def on_paper(frequency_mhz: float, value: float) -> Point:
        return x.at(frequency_mhz), y.at(min(value, highest))

    return Panel(
        name,
        x,
        y,
        fan=tuple(on_paper(frequency, ends[1]) for frequency, ends in fan)
        + tuple(on_paper(frequency, ends[0]) for frequency, ends in reversed(fan)),
        nominal=tuple(on_paper(frequency, value) for frequency, value in nominal),
        limit_mm=None if limit is None else y.at(limit),
        cut=any(value > highest for value in (*(value for _, value in nominal), *(high for _, (_, high) in fan))),
    )


def _round(name: str, pattern: Pattern) -> Round:
    """A cut drawn all round: it is the same on both sides of the forward axis."""
    top_dbi = max(pattern.gain_dbi)
    half = []
    for angle_deg, gain_dbi in zip(pattern.angle_deg, pattern.gain_dbi, strict=True):
        angle, radius_mm = math.radians(angle_deg), _ring_mm(gain_dbi - top_dbi)
        half.append((round(radius_mm * math.cos(angle), 2) + 0.0, round(radius_mm * math.sin(angle), 2) + 0.0))
    mirrored = tuple((x, -y + 0.0) for x, y in reversed(half[1:-1]))
    return Round(name, tuple(half) + mirrored, pattern.half_power_deg)


def _ring_mm(relative_db: float) -> float:
    return round(max(0.0, RADIUS_MM * (1 + relative_db / DEEPEST_DB)), 3)
