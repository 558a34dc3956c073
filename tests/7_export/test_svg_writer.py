"""SVG written by svgwrite, read back as plain XML."""

import math
import re
import xml.etree.ElementTree as ET

import pytest

from fabgen.design.drawing import LAYERS, Arc, Sheet, Text
from fabgen.design.lettering import text_box
from fabgen.design.pen import Pen
from fabgen.export.svg import svg

NS = "{http://www.w3.org/2000/svg}"


def recorded():
    pen = Pen()
    pen.bar_100(30, 10)
    pen.bar_100(12, 20, up=True)
    pen.rectangle("outline", 20, 20, 480.125, 110)
    pen.circle("drill", 123.4567, 77.0004, 4)
    pen.dot(123.4567, 77.0004, 0.6)
    pen.cross(123.4567, 77.0004, 7)
    pen.arc("drill", 300, 60, 12.5, start_deg=-40, end_deg=200)
    pen.line("fold", 20, 60, 480, 60)
    pen.text(40, 30, "TOP → forward λ/4", 3.5)
    pen.text(60, 50, "<b>&amp; ]]></text><script>alert(1)</script>", angle_deg=90, anchor="middle")
    return pen.sheet("strip", 'boom <1> & "two"', 500.5, 130, -20)


def parsed(sheet):
    return ET.fromstring(svg(sheet))


def group(root, layer):
    [found] = [g for g in root.findall(f"{NS}g") if g.get("id") == layer]
    return found


def test_one_user_unit_is_one_millimetre():
    root = parsed(recorded())
    assert root.get("width") == "500.5mm"
    assert root.get("height") == "130mm"
    assert root.get("viewBox") == "0 0 500.5 130"


def test_both_bars_are_100_mm():
    bars = []
    for line in group(parsed(recorded()), "scale").findall(f"{NS}line"):
        x1, y1, x2, y2 = (float(line.get(name)) for name in ("x1", "y1", "x2", "y2"))
        bars.append(math.dist((x1, y1), (x2, y2)))
    assert sorted(bars)[-2:] == pytest.approx([100, 100], abs=0.001)
    assert max(sorted(bars)[:-2]) < 10


def test_holes_keep_their_centre_and_y_points_up():
    [circle] = group(parsed(recorded()), "drill").findall(f"{NS}circle")
    assert float(circle.get("cx")) == pytest.approx(123.4567, abs=1e-6)
    assert 130 - float(circle.get("cy")) == pytest.approx(77.0004, abs=1e-6)
    assert float(circle.get("r")) == 4


@pytest.mark.parametrize(("start", "end"), [(-40, 200), (10, 80), (90, 271), (350, 380)])
def test_arc_turns_the_right_way(start, end):
    """The centre and the middle of the arc, computed from the path's end points and flags (SVG 1.1, appendix F.6)."""
    arc = Arc("outline", 50, 40, 12.5, start, end)
    [path] = group(parsed(Sheet("s", "s", 100, 100, (arc,))), "outline").findall(f"{NS}path")
    x0, y0, rx, ry, _, large, sweep, x1, y1 = (float(word) for word in re.findall(r"-?[\d.]+", path.get("d")))
    assert (rx, ry) == (12.5, 12.5)
    half = math.dist((x0, y0), (x1, y1)) / 2
    away = math.sqrt(max(0, rx * rx - half * half)) * (1 if large != sweep else -1)
    ux, uy = (x1 - x0) / (2 * half), (y1 - y0) / (2 * half)
    centre = ((x0 + x1) / 2 - uy * away, (y0 + y1) / 2 + ux * away)
    assert centre == pytest.approx((50, 60), abs=1e-4)
    assert (large == 1) == (end - start > 180)
    assert sweep == 0
    assert (x0, 100 - y0) == pytest.approx(arc.point(start), abs=1e-6)


def test_layers_are_groups_in_printing_order_with_their_stroke():
    groups = [g.get("id") for g in parsed(recorded()).findall(f"{NS}g")]
    assert groups == [layer for layer in LAYERS if layer in groups]
    assert {"fold", "centre", "scale", "outline", "drill", "text"} == set(groups)
    fold = group(parsed(recorded()), "fold")
    assert float(fold.get("stroke-width")) == LAYERS["fold"].width_mm
    assert [float(dash) for dash in fold.get("stroke-dasharray").split()] == pytest.approx(LAYERS["fold"].dash_mm)
    assert group(parsed(recorded()), "outline").get("stroke-dasharray") is None


def test_text_arrives_as_written():
    sheet = recorded()
    root = parsed(sheet)
    written = {text.text for text in root.iter(f"{NS}text")}
    assert written == {item.text for item in sheet.items if isinstance(item, Text)}
    assert root.find(f"{NS}title").text == 'boom <1> & "two"'
    assert not list(root.iter(f"{NS}script"))


def test_lettering_has_its_height_anchor_and_angle():
    turned = [t for t in group(parsed(recorded()), "text").findall(f"{NS}text") if t.get("transform")]
    [text] = turned
    # capitals of DejaVu Sans are 1493 units of 2048 high
    assert float(text.get("font-size")) * 1493 / 2048 == pytest.approx(2.5, abs=1e-5)
    assert text.get("text-anchor") == "middle"
    assert text.get("transform") == "rotate(-90 60 80)"
    assert text.get("font-family").startswith("'DejaVu Sans'")


def test_another_font_is_squeezed_into_the_room_that_was_reckoned_with():
    text = Text("text", 10, 10, "40.000", 2.5)
    [element] = group(parsed(Sheet("s", "s", 100, 100, (text, Text("text", 5, 5, "")))), "text").findall(f"{NS}text")[
        :1
    ]
    box = text_box(text)
    assert float(element.get("textLength")) == pytest.approx(box[2] - box[0], abs=1e-5)


@pytest.mark.parametrize("bad", ["\x00\x08", "\ud800", "\ufffe", "a\nb\tc"])
def test_titles_with_forbidden_characters_stay_well_formed(bad):
    root = parsed(Sheet("s", bad, 100, 100, (Text("text", 1, 1, bad),)))
    assert root.find(f"{NS}title") is not None


def test_same_sheet_same_bytes():
    assert svg(recorded()) == svg(recorded())
    assert b"\r" not in svg(recorded())
