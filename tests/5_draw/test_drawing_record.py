"""The recording: lettering sizes, overlaps, the pen."""

import importlib.util
import itertools
import math
import subprocess
import sys
from pathlib import Path

import pymupdf
import pytest
from hypothesis import given
from hypothesis import strategies as st

from fabgen.design import lettering
from fabgen.design.drawing import LAYERS, Arc, Circle, Fill, Line, Polyline, Sheet, Text, moved
from fabgen.design.lettering import shortened, text_box, text_corners, text_width_mm
from fabgen.design.overlaps import bounds, overlaps
from fabgen.design.pen import Pen, spread

HEAVY = {"cadquery", "OCP", "vtk", "matplotlib", "trimesh", "ezdxf", "typst", "svgwrite", "jinja2", "scipy", "numpy"}


def sheet(*items):
    return Sheet("s", "s", 200.0, 100.0, items)


def kinds(*items, **options):
    return [overlap.kind for overlap in overlaps(sheet(*items), **options)]


def test_widths_are_the_fonts_own():
    """Every advance of the table against the font file, read by another library; equal to the unit of the font."""
    package = Path(importlib.util.find_spec("matplotlib").submodule_search_locations[0])
    font = pymupdf.Font(fontfile=str(package / "mpl-data/fonts/ttf/DejaVuSans.ttf"))
    wrong = {
        character: width
        for character, width in lettering._ADVANCE.items()
        if round(font.glyph_advance(ord(character)) * 2048) != width
    }
    assert len(lettering._ADVANCE) > 200
    assert wrong == {}


def test_width_grows_with_height_and_length():
    assert text_width_mm("", 2.5) == 0
    assert text_width_mm("100.000", 5) == pytest.approx(2 * text_width_mm("100.000", 2.5))
    # digits are 1303 units wide, the point 651, a capital 1493 units high
    assert text_width_mm("40.000", 1493) == pytest.approx(5 * 1303 + 651)
    assert text_width_mm("日", 1493) == pytest.approx(2048)


def test_box_follows_anchor_and_angle():
    width = text_width_mm("D12", 2.5)
    start = text_box(Text("text", 10, 20, "D12"))
    assert start[0] == pytest.approx(10)
    assert start[2] == pytest.approx(10 + width)
    assert text_box(Text("text", 10, 20, "D12", anchor="end"))[2] == pytest.approx(10)
    middle = text_box(Text("text", 10, 20, "D12", anchor="middle"))
    assert (middle[0] + middle[2]) / 2 == pytest.approx(10)
    upright = text_box(Text("text", 10, 20, "D12", angle_deg=90))
    assert upright[1] == pytest.approx(20)
    assert upright[3] == pytest.approx(20 + width)
    assert upright[0] < 10 - 2.5 < 10 < upright[2]
    slanted = text_corners(Text("text", 10, 20, "D12", angle_deg=30))
    assert math.dist(slanted[0], slanted[1]) == pytest.approx(width)


def test_shortened_fits_and_keeps_what_fits():
    assert shortened("short", 2.5, 100) == "short"
    cut = shortened("x" * 500, 2.5, 60)
    assert cut.endswith("…")
    assert 50 < text_width_mm(cut, 2.5) <= 60


def test_unprintable_characters_become_spaces():
    assert Text("text", 0, 0, "a\nb\x00c\ud800d\u202ee").text == "a b c d e"


def test_text_on_text():
    first = Text("text", 50, 50, "40.000")
    assert kinds(first, Text("text", 55, 51, "54.000")) == ["text on text"]
    assert kinds(first, Text("text", 50, 54, "54.000")) == []
    assert kinds(first, Text("text", 50 + text_width_mm("40.000", 2.5) + 0.1, 50, "54.000")) == []


def test_slanted_text_is_judged_by_its_own_box_and_not_by_the_upright_one():
    slanted = Text("text", 50, 20, "a long slanted line", angle_deg=45)
    corner = Text("text", 62, 22, "D1")
    box, other = text_box(slanted), text_box(corner)
    assert box[0] < other[0] < box[2]
    assert box[1] < other[1] < box[3]
    assert kinds(slanted, corner) == []
    assert kinds(slanted, Text("text", 58, 28, "D1")) == ["text on text"]


def test_text_on_hole_touching_and_inside():
    text = Text("text", 50, 50, "D1")
    assert kinds(text, Circle("drill", 48, 51, 4)) == ["text on hole"]
    assert kinds(text, Circle("drill", 52, 51, 20)) == ["text on hole"]
    assert kinds(text, Circle("drill", 45, 51, 4)) == []
    outline = Polyline("drill", ((45, 45), (60, 45), (60, 60), (45, 60)), closed=True)
    assert kinds(text, outline) == ["text on hole"]
    assert kinds(text, Arc("drill", 48, 51, 4, 270, 450)) == ["text on hole"]
    assert kinds(text, Arc("drill", 48, 51, 4, 90, 270)) == []


def test_text_may_stand_in_a_circle_that_is_no_hole_but_not_on_its_line():
    text = Text("text", 50, 50, "1", anchor="middle")
    assert kinds(text, Circle("dim", 50, 51.25, 4), lines=True) == []
    assert kinds(text, Circle("dim", 50, 54, 4), lines=True) == ["text on line"]


def test_text_on_line_only_when_asked():
    text = Text("text", 50, 50, "D1")
    line = Line("outline", 40, 51, 70, 51)
    assert kinds(text, line) == []
    assert kinds(text, line, lines=True) == ["text on line"]
    assert kinds(text, Fill("dim", ((50, 50), (52, 50), (51, 52))), lines=True) == ["text on line"]
    assert kinds(text, Polyline("outline", ((40, 40), (70, 40), (70, 70)), closed=False), lines=True) == []


def test_text_outside():
    text = Text("text", 196, 50, "D12")
    assert kinds(text) == ["text outside"]
    assert kinds(Text("text", 5, 50, "D12")) == []
    assert kinds(Text("text", 5, 50, "D12"), margin_mm=10) == ["text outside"]
    assert kinds(Text("text", 50, 0.2, "g")) == ["text outside"]


def test_the_stamp_lies_under_everything_and_hits_nothing():
    assert kinds(Text("stamp", 50, 50, "NOT CLEARED", 20), Text("text", 52, 52, "D1"), Circle("drill", 60, 60, 4)) == []
    assert next(iter(LAYERS)) == "stamp"


def test_overlap_names_the_place():
    [overlap] = overlaps(sheet(Text("text", 50, 50, "D1"), Text("text", 50, 50, "D2")))
    assert str(overlap) == "text on text: 'D1' at x 50.00 mm, y 50.00 mm 'D2'"


@given(st.floats(-400, 400), st.floats(0.5, 359))
def test_arc_bounds_hold_every_point_and_no_more(start, turn):
    arc = Arc("outline", 10, -5, 8, start, start + turn)
    points = [arc.point(start + turn * k / 720) for k in range(721)]
    box = bounds(arc)
    sampled = (
        min(x for x, _ in points),
        min(y for _, y in points),
        max(x for x, _ in points),
        max(y for _, y in points),
    )
    # a chord of half a degree leaves a circle of 8 mm by 8e-5 mm at most
    assert all(abs(a - b) < 1e-4 for a, b in zip(box, sampled, strict=True))


def test_moved_moves_every_kind():
    items = [
        Line("outline", 0, 0, 3, 4),
        Polyline("outline", ((0, 0), (3, 4))),
        Fill("dim", ((0, 0), (3, 0), (3, 4))),
        Circle("drill", 1, 1, 1),
        Arc("drill", 1, 1, 1, 20, 200),
        Text("text", 1, 1, "D1", angle_deg=30),
    ]
    for item in items:
        there = bounds(moved(item, 7, -2))
        assert there == pytest.approx([a + b for a, b in zip(bounds(item), (7, -2, 7, -2), strict=True)])


def test_cross_meets_in_the_centre():
    pen = Pen()
    pen.cross(40, 30, 7)
    assert all((line.x0_mm, line.y0_mm) == (40, 30) for line in pen.items)
    assert sorted((line.x1_mm, line.y1_mm) for line in pen.items) == [(33, 30), (40, 23), (40, 37), (47, 30)]


@pytest.mark.parametrize("up", [False, True])
def test_bar_is_100_mm_with_eleven_ticks(up):
    pen = Pen()
    pen.bar_100(20, 30, up=up)
    bar, *ticks, label = pen.items
    assert math.dist((bar.x0_mm, bar.y0_mm), (bar.x1_mm, bar.y1_mm)) == 100
    assert len(ticks) == 11
    along = [(tick.y0_mm - 30) if up else (tick.x0_mm - 20) for tick in ticks]
    assert along == pytest.approx(range(0, 101, 10))
    assert label.text == "100 mm"
    assert overlaps(pen.sheet("s", "s", 200, 200), lines=True) == []


@pytest.mark.parametrize("length_mm", [3.0, 8.0, 20.0, 80.0])
@pytest.mark.parametrize("angle_deg", [0, 37, 90, 143, 180, 270])
@pytest.mark.parametrize("offset_mm", [8.0, -8.0])
def test_dimension_points_at_both_ends_and_its_value_is_free_and_readable(length_mm, angle_deg, offset_mm):
    pen = Pen()
    u, v = math.cos(math.radians(angle_deg)), math.sin(math.radians(angle_deg))
    x1, y1 = 150 + length_mm * u, 150 + length_mm * v
    pen.dimension(150, 150, x1, y1, "123.456", offset_mm=offset_mm)
    tips = [item.points_mm[0] for item in pen.items if isinstance(item, Fill)]
    wanted = [(x - offset_mm * v, y + offset_mm * u) for x, y in ((150, 150), (x1, y1))]
    assert all(math.dist(tip, want) < 1e-9 for tip, want in zip(tips, wanted, strict=True))
    assert overlaps(pen.sheet("s", "s", 300, 300), lines=True) == []
    [text] = [item for item in pen.items if isinstance(item, Text)]
    assert -90 < (text.angle_deg + 180) % 360 - 180 <= 90


def test_running_dimensions_letter_every_value_clear_of_the_others():
    pen = Pen()
    xs = [20, 60, 61, 62, 63.5, 100, 180]
    top = pen.running([(x, f"{x - 20:.3f}") for x in xs], origin_x_mm=20, from_y_mm=20, line_y_mm=30)
    done = pen.sheet("s", "s", 200, 100)
    assert overlaps(done) == []
    texts = [item for item in done.items if isinstance(item, Text)]
    assert [text.text for text in texts] == [f"{x - 20:.3f}" for x in xs]
    assert max(text_box(text)[3] for text in texts) == pytest.approx(top)
    tips = sorted(item.points_mm[0][0] for item in done.items if isinstance(item, Fill))
    assert tips == xs[1:]
    leaders = [item for item in done.items if isinstance(item, Polyline)]
    assert [leader.points_mm[0][0] for leader in leaders] == xs


def test_running_dimensions_below_the_object():
    pen = Pen()
    low = pen.running([(20, "0"), (80, "60.000")], origin_x_mm=20, from_y_mm=60, line_y_mm=50)
    assert low < 50 - 10
    assert overlaps(pen.sheet("s", "s", 200, 100), lines=True) == []


@given(st.lists(st.floats(0, 500), min_size=1, max_size=30), st.floats(0.5, 20))
def test_spread_keeps_order_and_pitch_and_moves_nothing_without_need(wanted, pitch):
    wanted.sort()
    places = spread(wanted, pitch)
    assert len(places) == len(wanted)
    assert all(b - a >= pitch - 1e-9 for a, b in itertools.pairwise(places))
    assert spread(places, pitch) == pytest.approx(places)
    if all(b - a > pitch for a, b in itertools.pairwise(wanted)):
        assert places == pytest.approx(wanted)
    assert sum(places) == pytest.approx(sum(wanted), abs=1e-6)


def test_recording_is_light():
    code = "import sys, fabgen.design.pen, fabgen.design.overlaps, fabgen.draw.tiling; print(*sorted(sys.modules))"
    run = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    loaded = {name.partition(".")[0] for name in run.stdout.split()}
    assert "fabgen" in loaded
    assert loaded & HEAVY == set()
