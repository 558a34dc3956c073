"""Threads, clearance holes, heads, nuts and washers against their ISO standards."""

import math

import pytest

from fabgen.stock.tables import (
    UnknownStockError,
    clearance_hole_mm,
    nearest_drill,
    nut,
    screw_head,
    tap_drill_mm,
    thread,
    washer,
)

THREADS = ("M2", "M2.5", "M3", "M4", "M5", "M6", "M8", "M10", "M12")
MAIN = ("M3", "M4", "M5", "M6", "M8")


@pytest.mark.parametrize(
    ("fit", "sizes_mm"),
    [
        ("fine", (2.2, 2.7, 3.2, 4.3, 5.3, 6.4, 8.4, 10.5, 13.0)),
        ("medium", (2.4, 2.9, 3.4, 4.5, 5.5, 6.6, 9.0, 11.0, 13.5)),
        ("coarse", (2.6, 3.1, 3.6, 4.8, 5.8, 7.0, 10.0, 12.0, 14.5)),
    ],
)
def test_iso_273_clearance_holes(fit, sizes_mm):
    """ISO 273:1979, secondary source, exact; copies of an older table print 14 and 15 for M12."""
    assert tuple(clearance_hole_mm(name, fit) for name in THREADS) == sizes_mm


@pytest.mark.parametrize(
    ("name", "diameter_mm", "pitch_mm", "tap_mm", "minor_mm"),
    [
        ("M2", 2, 0.4, 1.6, 1.567),
        ("M2.5", 2.5, 0.45, 2.05, 2.013),
        ("M3", 3, 0.5, 2.5, 2.459),
        ("M4", 4, 0.7, 3.3, 3.242),
        ("M5", 5, 0.8, 4.2, 4.134),
        ("M6", 6, 1.0, 5.0, 4.917),
        ("M8", 8, 1.25, 6.8, 6.647),
        ("M10", 10, 1.5, 8.5, 8.376),
        ("M12", 12, 1.75, 10.2, 10.106),
    ],
)
def test_iso_261_coarse_threads(name, diameter_mm, pitch_mm, tap_mm, minor_mm):
    """ISO 261 pitches from memory; tap drills common practice; minor diameter D − 1.082532 P (ISO 724), computed."""
    found = thread(name)
    assert (found.diameter_mm, found.pitch_mm, tap_drill_mm(name)) == (diameter_mm, pitch_mm, tap_mm)
    assert found.diameter_mm - 1.082532 * found.pitch_mm == pytest.approx(minor_mm, abs=6e-4)
    assert minor_mm < found.tap_drill_mm <= found.diameter_mm - found.pitch_mm + 0.051
    assert nearest_drill(found.tap_drill_mm, "metric").diameter_mm == found.tap_drill_mm


def test_iso_4762_socket_heads():
    """ISO 4762, secondary source: largest knurled head diameter, head height, key."""
    heads = [screw_head(name, "socket") for name in MAIN]
    assert [head.diameter_mm for head in heads] == [5.68, 7.22, 8.72, 10.22, 13.27]
    assert [head.height_mm for head in heads] == [3, 4, 5, 6, 8]
    assert [head.across_flats_mm for head in heads] == [2.5, 3, 4, 5, 6]


def test_iso_4017_hexagon_heads():
    """ISO 4017: nominal head height and width across flats, secondary source; e from memory.

    Copies hold the largest height (2.2, 3, 3.74, 4.24, 5.54) in the nominal column.
    """
    heads = [screw_head(name, "hex") for name in MAIN]
    assert [head.height_mm for head in heads] == [2, 2.8, 3.5, 4, 5.3]
    assert [head.across_flats_mm for head in heads] == [5.5, 7, 8, 10, 13]
    assert [head.diameter_mm for head in heads] == [6.01, 7.66, 8.79, 11.05, 14.38]


def test_iso_7380_1_button_heads():
    """ISO 7380-1, secondary source; it begins at M3."""
    heads = [screw_head(name, "button") for name in MAIN]
    assert [head.diameter_mm for head in heads] == [5.7, 7.6, 9.5, 10.5, 14]
    assert [head.height_mm for head in heads] == [1.65, 2.2, 2.75, 3.3, 4.4]
    with pytest.raises(UnknownStockError, match="nearest is 'M"):
        screw_head("M2", "button")


def test_iso_7045_pan_heads():
    """ISO 7045, from memory."""
    heads = [screw_head(name, "pan") for name in MAIN]
    assert [(head.diameter_mm, head.height_mm) for head in heads] == [
        (5.6, 2.4),
        (8, 3.1),
        (9.5, 3.7),
        (12, 4.6),
        (16, 6),
    ]


def test_iso_4032_nuts():
    """ISO 4032: largest height and width across flats, secondary source; smallest width across corners from memory."""
    nuts = [nut(name) for name in MAIN]
    assert [found.height_mm for found in nuts] == [2.4, 3.2, 4.7, 5.2, 6.8]
    assert [found.across_flats_mm for found in nuts] == [5.5, 7, 8, 10, 13]
    assert [found.across_corners_mm for found in nuts] == [6.01, 7.66, 8.79, 11.05, 14.38]


@pytest.mark.parametrize("name", THREADS)
def test_hexagons_are_regular(name):
    """Across corners is at least 1.08 and at most 1.155 (a sharp hexagon) times across flats."""
    for across, flats in (
        (nut(name).across_corners_mm, nut(name).across_flats_mm),
        (screw_head(name, "hex").diameter_mm, screw_head(name, "hex").across_flats_mm),
    ):
        assert 1.08 * flats <= across <= 2 / math.sqrt(3) * flats


def test_iso_7089_washers():
    """ISO 7089, secondary source: nominal thickness; copies hold the largest (0.55, 0.9, 1.1, 1.8, 1.8) instead."""
    washers = [washer(name) for name in MAIN]
    assert [found.bore_mm for found in washers] == [3.2, 4.3, 5.3, 6.4, 8.4]
    assert [found.outside_mm for found in washers] == [7, 9, 10, 12, 16]
    assert [found.thickness_mm for found in washers] == [0.5, 0.8, 1.0, 1.6, 1.6]


def test_iso_7093_large_washers():
    """ISO 7093-1, secondary source: outside diameter and largest thickness."""
    washers = [washer(name, "large") for name in MAIN]
    assert [found.outside_mm for found in washers] == [9, 12, 15, 18, 24]
    assert [found.thickness_mm for found in washers] == [0.9, 1.1, 1.4, 1.8, 2.2]


@pytest.mark.parametrize("name", THREADS)
def test_parts_of_one_thread_go_together(name):
    """The head rests on its clearance hole and on its washer; sizes typed from memory would show here."""
    hole_mm = clearance_hole_mm(name)
    assert thread(name).diameter_mm < washer(name).bore_mm < hole_mm + 0.01
    for kind in ("socket", "hex"):
        assert hole_mm < screw_head(name, kind).diameter_mm < washer(name).outside_mm
    assert hole_mm < nut(name).across_flats_mm < washer(name).outside_mm


def test_unknown_names_are_refused():
    for look_up in (thread, nut, washer, clearance_hole_mm, screw_head):
        with pytest.raises(UnknownStockError, match="M7"):
            look_up("M7")
    with pytest.raises(UnknownStockError, match="countersunk"):
        screw_head("M3", "countersunk")
    with pytest.raises(UnknownStockError, match="clearance fit 'loose'"):
        clearance_hole_mm("M3", "loose")
    with pytest.raises(UnknownStockError, match="large"):
        washer("M3", "huge")
