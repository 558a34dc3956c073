"""Clipping, pages of the shop's paper, the stamp."""

import itertools
import math

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from fabgen.design.drawing import Arc, Circle, Fill, Line, Polyline, Sheet, Text
from fabgen.design.overlaps import bounds, overlaps
from fabgen.design.pen import Pen
from fabgen.draw.clipping import clipped, contains
from fabgen.draw.stamp import stamped
from fabgen.draw.tiling import tile

WINDOW = (0.0, 0.0, 100.0, 60.0)
A4, LETTER = (210.0, 297.0), (215.9, 279.4)
MARGIN = 10.0
COORDINATE = st.integers(-1500, 2500).map(lambda k: k / 10 + 0.037)


def strip(stations, length_mm=720.0, across_mm=80.0, above_mm=35.0):
    """A boom piece of four flats with a hole and its lettering at each station; the datum face stands at x = 20."""
    pen, x0, y0 = Pen(), 20.0, 25.0
    pen.rectangle("outline", x0, y0, x0 + length_mm, y0 + across_mm)
    for k in range(4):
        y = y0 + (k + 0.5) * across_mm / 4
        pen.line("fold", x0, y0 + k * across_mm / 4, x0 + length_mm, y0 + k * across_mm / 4)
        pen.line("centre", x0 - 5, y, x0 + length_mm + 5, y)
        if k % 2 == 0:
            for station in stations:
                pen.circle("drill", x0 + station, y, 4)
                pen.dot(x0 + station, y, 0.6)
                pen.cross(x0 + station, y, 6)
    for k, station in enumerate(stations):
        pen.text(x0 + station, y0 + 3 * across_mm / 8, f"D{k + 1}", anchor="middle", angle_deg=90, level="middle")
    values = [(x0, "0"), *((x0 + station, f"{station:.3f}") for station in stations)]
    pen.running(values, origin_x_mm=x0, from_y_mm=y0 + across_mm, line_y_mm=y0 + across_mm + 6)
    pen.text(x0 + 3, y0 - 10, "datum end   TOP   forward →", 3.5)
    return pen.sheet("boom", "boom 1", length_mm + 40, across_mm + y0 + above_mm, -x0)


def cut(sheet, paper_mm=A4):
    return tile(sheet, paper_mm, number="RGL-434-06", revision="A")


STATIONS = [40.0, 138.25, 190.0, 245.0, 251.333, 262.0, 400.0, 470.5, 500.0, 680.0]


def length(items):
    total = 0.0
    for item in items:
        match item:
            case Line():
                total += math.dist((item.x0_mm, item.y0_mm), (item.x1_mm, item.y1_mm))
            case Polyline():
                points = (*item.points_mm, item.points_mm[0]) if item.closed else item.points_mm
                total += sum(math.dist(a, b) for a, b in itertools.pairwise(points))
            case Arc():
                total += item.radius_mm * math.radians(item.end_deg - item.start_deg)
            case Circle():
                total += math.tau * item.radius_mm
    return total


def sampled_length(point, whole_mm, steps=4000):
    """Length inside the window by counting: an independent, coarse measure."""
    inside = 0
    for k in range(steps):
        x, y = point((k + 0.5) / steps)
        inside += WINDOW[0] <= x <= WINDOW[2] and WINDOW[1] <= y <= WINDOW[3]
    return whole_mm * inside / steps


@given(COORDINATE, COORDINATE, COORDINATE, COORDINATE)
def test_lines_are_cut_at_the_window(x0, y0, x1, y1):
    parts = clipped(Line("outline", x0, y0, x1, y1), WINDOW)
    whole = math.dist((x0, y0), (x1, y1))
    assert all(contains(WINDOW, bounds(part)) for part in parts)
    expected = sampled_length(lambda t: (x0 + t * (x1 - x0), y0 + t * (y1 - y0)), whole)
    assert length(parts) == pytest.approx(expected, abs=2 * whole / 4000 + 1e-6)


@settings(max_examples=60)
@given(COORDINATE, COORDINATE, st.floats(1, 120), st.floats(-400, 400), st.floats(1, 359.9))
def test_arcs_and_circles_are_cut_at_the_window(x, y, radius, start, turn):
    for item in (Arc("drill", x, y, radius, start, start + turn), Circle("drill", x, y, radius)):
        arc = item if isinstance(item, Arc) else Arc("drill", x, y, radius, 0, 360)
        parts = clipped(item, WINDOW)
        for part in parts:
            box = bounds(part)
            assert contains((-1e-6, -1e-6, 100 + 1e-6, 60 + 1e-6), box)
            assert (part.x_mm, part.y_mm, part.radius_mm) == (x, y, radius)
        reach = arc.end_deg - arc.start_deg
        whole = radius * math.radians(reach)
        expected = sampled_length(lambda t, arc=arc, reach=reach: arc.point(arc.start_deg + t * reach), whole)
        assert length(parts) == pytest.approx(expected, abs=9 * whole / 4000)


def test_a_circle_cut_on_one_side_is_one_arc_and_in_a_corner_keeps_its_quarter():
    [arc] = clipped(Circle("drill", 0, 30, 10), WINDOW)
    assert (arc.start_deg, arc.end_deg) == pytest.approx((270, 450))
    [corner] = clipped(Circle("drill", 100, 60, 10), WINDOW)
    assert (corner.start_deg, corner.end_deg) == pytest.approx((180, 270))
    assert clipped(Circle("drill", 50, 30, 10), WINDOW) == [Circle("drill", 50, 30, 10)]
    assert clipped(Circle("drill", 50, 30, 100), WINDOW) == []


@pytest.mark.parametrize(("x", "y"), [(-10, 30), (110, 30), (50, -10), (50, 70)])
def test_a_circle_that_only_touches_the_window_from_outside_is_left_out(x, y):
    assert clipped(Circle("drill", x, y, 10), WINDOW) == []


def test_an_arc_that_touches_an_edge_from_inside_stays_one_arc():
    [arc] = clipped(Circle("drill", 10, 55, 10), WINDOW)
    assert (arc.start_deg, arc.end_deg) == pytest.approx((150, 390))


def test_an_arc_that_touches_an_edge_from_outside_is_left_out():
    """Its middle lies on the edge, its ends beyond the upper and lower edge."""
    assert clipped(Arc("drill", 150, 30, 50, 130, 230), WINDOW) == []


def test_closed_lines_come_back_as_runs_without_new_edges():
    square = Polyline("outline", ((80, 20), (120, 20), (120, 40), (80, 40)), closed=True)
    [run] = clipped(square, WINDOW)
    assert run == Polyline("outline", ((100, 40), (80, 40), (80, 20), (100, 20)))
    assert clipped(Polyline("outline", ((10, 10), (20, 10), (20, 20)), closed=True), WINDOW) == [
        Polyline("outline", ((10, 10), (20, 10), (20, 20)), closed=True)
    ]
    zigzag = Polyline("outline", ((-10, 10), (10, 10), (10, -10), (20, -10), (20, 10)))
    assert clipped(zigzag, WINDOW) == [
        Polyline("outline", ((0, 10), (10, 10), (10, 0))),
        Polyline("outline", ((20, 0), (20, 10))),
    ]


def test_fills_keep_the_area_in_the_window():
    [part] = clipped(Fill("dim", ((95, 30), (105, 25), (105, 35))), WINDOW)
    assert bounds(part) == pytest.approx((95, 27.5, 100, 32.5))
    assert clipped(Fill("dim", ((105, 25), (115, 25), (110, 30))), WINDOW) == []


def test_text_is_never_cut():
    inside, across = Text("text", 10, 10, "D1"), Text("text", 98, 10, "D1")
    assert clipped(inside, WINDOW) == [inside]
    assert clipped(across, WINDOW) == []


@pytest.mark.parametrize("paper", [A4, LETTER])
def test_every_hole_and_every_label_is_whole_on_some_page_at_its_station(paper):
    sheet = strip(STATIONS)
    tiling = cut(sheet, paper)
    assert tiling.dropped == ()
    shown, labels = {}, set()
    for page in tiling.pages:
        for item in page.items:
            if isinstance(item, Circle) and item.layer == "drill":
                assert item.radius_mm == 4
                shown.setdefault(round(item.x_mm + page.station_at_x0_mm, 6), set()).add(page.name)
            if isinstance(item, Text) and item.layer in ("text", "dim"):
                labels.add(item.text)
    assert sorted(shown) == STATIONS
    assert {f"D{k + 1}" for k in range(len(STATIONS))} | {f"{station:.3f}" for station in STATIONS} <= labels


@pytest.mark.parametrize("paper", [A4, LETTER])
@pytest.mark.parametrize("across_mm", [60.0, 120.0, 260.0])
def test_nothing_is_printed_outside_the_margin_and_no_lettering_overlaps(paper, across_mm):
    for page in cut(strip(STATIONS, across_mm=across_mm), paper).pages:
        room = (MARGIN, MARGIN, page.width_mm - MARGIN, page.height_mm - MARGIN)
        assert {page.width_mm, page.height_mm} == set(paper)
        outside = [item for item in page.items if not contains(room, bounds(item))]
        assert outside == []
        assert [str(overlap) for overlap in overlaps(page, margin_mm=MARGIN)] == []


def bars(page):
    lines = [item for item in page.on("scale") if isinstance(item, Line)]
    spans = [(line.x1_mm - line.x0_mm, line.y1_mm - line.y0_mm) for line in lines]
    return sorted(span for span in spans if math.hypot(*span) > 50)


def test_every_page_has_a_100_mm_bar_each_way_and_a_foot():
    tiling = cut(strip(STATIONS))
    count = len(tiling.pages)
    assert count == tiling.rows * tiling.columns > 2
    for k, page in enumerate(tiling.pages, 1):
        assert bars(page) == [(0, 100), (100, 0)]
        lettering = " | ".join(item.text for item in page.items if isinstance(item, Text))
        assert f"sheet {k} of {count}" in lettering
        assert "RGL-434-06 A" in lettering
        assert "boom 1" in lettering


def joins(page):
    """Stations of the full-height join lines on a page."""
    lines = [item for item in page.on("frame") if isinstance(item, Line) and item.x0_mm == item.x1_mm]
    return [round(line.x0_mm + page.station_at_x0_mm, 6) for line in lines if line.y1_mm - line.y0_mm > 30]


def targets(page):
    return {
        (round(item.x_mm + page.station_at_x0_mm, 6), round(item.y_mm, 6))
        for item in page.on("frame")
        if isinstance(item, Circle)
    }


@pytest.mark.parametrize("paper", [A4, LETTER])
def test_neighbours_print_the_same_join_at_a_round_station_with_the_same_targets(paper):
    pages = cut(strip(STATIONS), paper).pages
    for left, right in itertools.pairwise(pages):
        [join] = set(joins(left)) & set(joins(right))
        assert join % 10 == 0
        common = {target for target in targets(left) if target[0] == join}
        assert common == {target for target in targets(right) if target[0] == join}
        assert len(common) == 2
        for page in (left, right):
            labels = [item for item in page.on("dim") if isinstance(item, Text) and item.text == f"{join:.0f}"]
            assert [round(label.x_mm + page.station_at_x0_mm, 6) for label in labels] == [join]


def shown(page):
    """From which to which station the page's window reaches, by its frame."""
    [frame] = [item for item in page.on("frame") if isinstance(item, Polyline) and item.closed]
    box = bounds(frame)
    return box[0] + page.station_at_x0_mm, box[2] + page.station_at_x0_mm


def test_pages_share_at_least_the_overlap_and_leave_nothing_out():
    sheet = strip(STATIONS)
    pages = cut(sheet).pages
    spans = [shown(page) for page in pages]
    assert spans[0][0] == pytest.approx(-20)
    assert spans[-1][1] == pytest.approx(sheet.width_mm - 20)
    assert all(left[1] - right[0] >= 10 - 1e-9 for left, right in itertools.pairwise(spans))
    both = [left[1] - right[0] for left, right in itertools.pairwise(spans)]
    assert max(both) < 60


@pytest.mark.parametrize("length_mm", [260.0, 300.0, 530.0, 790.0, 1100.0, 1864.0, 5230.0])
def test_a_bare_strip_takes_the_fewest_pages_and_all_are_about_as_long(length_mm):
    """Joins stand at multiples of 10 mm, so two pages may differ by 10 mm and the ends by what is left of that."""
    sheet = Sheet("s", "s", length_mm, 80, (Line("outline", 0, 40, length_mm, 40),), 0.0)
    pages = cut(sheet).pages
    room = 297 - 20 - 9
    between = math.floor((room - 10) / 10) * 10
    first = math.floor((room - 5) / 10) * 10
    assert len(pages) == 1 + math.ceil(max(length_mm - first - (room - 5), 0) / between) + (length_mm > room)
    widths = [right - left for left, right in map(shown, pages)]
    assert max(widths) - min(widths) <= 25


@pytest.mark.parametrize("pitch_mm", [47.0, 53.0, 61.0, 85.0, 117.0])
def test_every_hole_is_whole_on_a_page_together_with_its_lettering(pitch_mm):
    pen = Pen()
    stations = [30.0 + pitch_mm * k for k in range(int(1650 / pitch_mm))]
    for k, station in enumerate(stations):
        pen.circle("drill", station, 40, 4)
        pen.text(station + 5.2, 40.6, f"D{k} {station:.3f} ±0.3")
    together = set()
    for page in cut(pen.sheet("s", "s", 1750, 80, 0.0)).pages:
        whole = {
            round(item.x_mm + page.station_at_x0_mm, 6)
            for item in page.items
            if isinstance(item, Circle) and item.layer == "drill"
        }
        texts = [item.text for item in page.items if isinstance(item, Text)]
        together |= whole & {float(text.split()[1]) for text in texts if "±" in text}
    assert sorted(together) == stations


def test_joins_keep_off_holes_and_lettering():
    sheet = strip(STATIONS)
    solid = [
        (bounds(item)[0] - 20, bounds(item)[2] - 20)
        for item in sheet.items
        if isinstance(item, Text) or item.layer == "drill"
    ]
    for page in cut(sheet).pages:
        for join in joins(page):
            assert not any(low < join < high for low, high in solid)


def test_ruler_ticks_stand_at_multiples_of_10_mm_of_station():
    for page in cut(strip(STATIONS)).pages:
        upper = [line for line in page.on("dim") if isinstance(line, Line) and 1 < abs(line.y1_mm - line.y0_mm) <= 2]
        stations = [line.x0_mm + page.station_at_x0_mm for line in upper]
        assert len(stations) > 10
        assert all(abs(station / 10 - round(station / 10)) < 1e-9 for station in stations)


def test_a_sheet_that_fits_is_one_page_without_joins():
    sheet = strip([40.0, 90.0], length_mm=140.0, above_mm=30.0)
    tiling = cut(sheet)
    [page] = tiling.pages
    assert (tiling.rows, tiling.columns) == (1, 1)
    assert joins(page) == []
    assert targets(page) == set()
    drawn = [item for item in page.items if isinstance(item, Circle) and item.layer == "drill"]
    assert len(drawn) == 4


@pytest.mark.parametrize(
    ("width", "height", "wide_page"), [(240, 120, True), (150, 230, False), (900, 100, True), (100, 900, False)]
)
def test_the_orientation_that_takes_fewer_pages_wins(width, height, wide_page):
    sheet = Sheet("s", "s", width, height, (Polyline("outline", ((1, 1), (9, 1), (9, 9)), closed=True),), 0.0)
    pages = cut(sheet).pages
    assert (pages[0].width_mm > pages[0].height_mm) == wide_page
    if max(width, height) < 250:
        assert len(pages) == 1


def test_several_rows_cover_the_height_and_name_their_neighbours():
    sheet = strip(STATIONS, across_mm=240.0)
    tiling = cut(sheet)
    assert tiling.rows == 2
    first = [item.text for item in tiling.pages[0].items if isinstance(item, Text)]
    assert "join to sheet 2 →" in first
    assert f"← sheet {tiling.columns + 1}" in first
    assert "← join to sheet 1" in [item.text for item in tiling.pages[1].items if isinstance(item, Text)]


def test_lettering_longer_than_an_overlap_is_printed_whole_once():
    title = Text("text", 200, 10, "a caption that is far longer than the overlap of two pages")
    sheet = Sheet("s", "s", 700, 100, (title, Line("outline", 0, 50, 700, 50)), 0.0)
    tiling = cut(sheet)
    found = [item for page in tiling.pages for item in page.items if isinstance(item, Text) and item.text == title.text]
    assert len(found) == 1
    assert tiling.dropped == ()


def test_lettering_that_fits_nowhere_is_reported_and_not_cut():
    title = Text("text", 0, 10, "x" * 300)
    tiling = cut(Sheet("s", "s", 700, 100, (title,), 0.0))
    assert tiling.dropped == (title,)
    assert not any(item.text == title.text for page in tiling.pages for item in page.items if isinstance(item, Text))


def test_pages_spend_no_room_on_the_sheet_s_own_bars_and_empty_edges():
    pen = Pen()
    pen.rectangle("outline", 20, 12, 500, 172)
    pen.bar_100(20, 6, label="100 mm along")
    sheet = pen.sheet("s", "s", 520, 180, -20.0)
    tiling = cut(sheet)
    assert (tiling.rows, tiling.columns) == (1, 2)
    for page in tiling.pages:
        assert page.width_mm == 297
        assert bars(page) == [(0, 100), (100, 0)]
        [frame] = [item for item in page.on("frame") if isinstance(item, Polyline) and item.closed]
        box = bounds(frame)
        assert box[3] - box[1] == pytest.approx(162)


def test_without_stations_pages_carry_none():
    sheet = Sheet("plate", "plate", 400, 100, (Line("outline", 0, 50, 400, 50),))
    for page in cut(sheet).pages:
        assert page.station_at_x0_mm is None
        assert not any("station" in item.text.lower() for item in page.items if isinstance(item, Text))


@pytest.mark.parametrize("size", [(297, 210), (210, 297), (800, 110), (90, 700), (60, 40), (2000, 100)])
def test_the_stamp_is_large_inside_the_sheet_and_under_the_drawing(size):
    hole = Circle("drill", size[0] / 2, size[1] / 2, 4)
    done = stamped(Sheet("s", "s", *size, (hole,)))
    stamps = done.on("stamp")
    assert stamps
    assert done.items[-1] == hole
    for stamp in stamps:
        assert stamp.text == "NOT CLEARED"
        assert contains((0, 0, *size), bounds(stamp))
        box = bounds(stamp)
        assert max(box[2] - box[0], box[3] - box[1]) > 0.4 * min(size)
    assert stamped(done) == done


def test_pages_of_a_stamped_sheet_are_stamped_each():
    plain = cut(strip(STATIONS)).pages
    pages = cut(stamped(strip(STATIONS))).pages
    assert len(pages) == len(plain)
    for page, bare in zip(pages, plain, strict=True):
        assert [item.text for item in page.on("stamp")] == ["NOT CLEARED"]
        assert tuple(item for item in page.items if item.layer != "stamp") == bare.items
        assert bare.on("stamp") == ()


@settings(max_examples=25, suppress_health_check=[HealthCheck.too_slow], deadline=None)
@given(
    st.integers(60, 1500).map(float),
    st.lists(st.floats(12, 1480), min_size=1, max_size=25),
    st.floats(40, 200),
    st.sampled_from([A4, LETTER]),
)
def test_any_boom_keeps_its_holes_its_margins_and_its_lettering(length_mm, places, across_mm, paper):
    stations: list[float] = []
    for place in sorted(round(place, 3) for place in places if place < length_mm - 12):
        if not stations or place - stations[-1] > 12:
            stations.append(place)
    sheet = strip(stations, length_mm=length_mm, across_mm=across_mm)
    tiling = cut(sheet, paper)
    assert tiling.dropped == ()
    drawn = set()
    for page in tiling.pages:
        room = (MARGIN, MARGIN, page.width_mm - MARGIN, page.height_mm - MARGIN)
        assert all(contains(room, bounds(item)) for item in page.items)
        assert overlaps(page, margin_mm=MARGIN) == []
        drawn |= {
            round(item.x_mm + page.station_at_x0_mm, 6)
            for item in page.items
            if isinstance(item, Circle) and item.layer == "drill"
        }
    assert sorted(drawn) == [round(station, 6) for station in stations]
