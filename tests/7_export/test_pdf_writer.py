"""PDF written by typst: its content stream read with pypdf, its text and ink with pymupdf.

A PDF counts in points of 1/72 in. Coordinates are read from the content stream as written, because drawing libraries
hand them out in single precision.
"""

import io
import math
import os
import subprocess
import sys

import pymupdf
import pypdf
import pytest
from pypdf.generic import ContentStream

from fabgen.design import lettering
from fabgen.design.drawing import Arc, Circle, Sheet, Text
from fabgen.design.lettering import text_box, text_width_mm
from fabgen.design.pen import Pen
from fabgen.errors import MachineError, ProgramError
from fabgen.export.fonts import font_file
from fabgen.export.pdf import pdf

MM_PER_POINT = 25.4 / 72
NASTY = [
    "#set page(fill: red) $x^2$ *b* _i_ `c` @r <l> // /* \\ ]",
    "<script>&amp;</script>",
    '"quotes" -- --- ... ~ fi ffi',
    "λ/4 → 8 ⌀ ± 0.1 °",
]


def recorded():
    pen = Pen()
    pen.bar_100(30, 10)
    pen.bar_100(12, 20, up=True)
    pen.rectangle("outline", 20, 20, 270.125, 110)
    pen.circle("drill", 123.4567, 77.0004, 4)
    pen.cross(123.4567, 77.0004, 7)
    pen.arc("drill", 230, 60, 12.5, start_deg=-40, end_deg=200)
    for k, text in enumerate(NASTY):
        pen.text(40, 120 + 6 * k, text, 3.5)
    return pen.sheet("strip", "boom 1", 297, 210)


def multiplied(first, second):
    a, b, c, d, e, f = first
    g, h, i, j, k, m = second
    return (a * g + b * i, a * h + b * j, c * g + d * i, c * h + d * j, e * g + f * i + k, e * h + f * j + m)


def paths(data, page=0):
    """Painted paths of a page: list of (operator, points on the path in mm, y up, origin lower left)."""
    reader = pypdf.PdfReader(io.BytesIO(data))
    content = ContentStream(reader.pages[page].get_contents(), reader)
    matrix, saved, points, found = (1, 0, 0, 1, 0, 0), [], [], []
    for raw, operator in content.operations:
        values = [float(v) for v in raw if isinstance(v, int | float)]
        match operator:
            case b"q":
                saved.append(matrix)
            case b"Q":
                matrix = saved.pop()
            case b"cm":
                matrix = multiplied(values, matrix)
            case b"m" | b"l" | b"c":
                a, b, c, d, e, f = matrix
                x, y = values[-2:]
                points.append(((a * x + c * y + e) * MM_PER_POINT, (b * x + d * y + f) * MM_PER_POINT))
            case b"re":
                raise AssertionError("a rectangle operator is not expected")
            case b"S" | b"s" | b"f" | b"f*":
                found.append((operator.decode(), points))
                points = []
    return found


def test_both_bars_are_100_mm():
    lines = [points for operator, points in paths(pdf([recorded()], "t")) if operator == "S" and len(points) == 2]
    lengths = [math.dist(*line) for line in lines]
    bars = [length for length in lengths if abs(length - 100) < 1]
    assert bars == pytest.approx([100, 100], abs=0.001)


def test_page_is_the_paper():
    sheets = [Sheet("a", "a", 210, 297, ()), Sheet("b", "b", 279.4, 215.9, ()), Sheet("c", "c", 1189.5, 90, ())]
    reader = pypdf.PdfReader(io.BytesIO(pdf(sheets, "t")))
    assert len(reader.pages) == 3
    for page, sheet in zip(reader.pages, sheets, strict=True):
        width, height = float(page.mediabox.width) * MM_PER_POINT, float(page.mediabox.height) * MM_PER_POINT
        assert (width, height) == pytest.approx((sheet.width_mm, sheet.height_mm), abs=0.001)
        assert (float(page.mediabox.left), float(page.mediabox.bottom)) == (0, 0)
        assert page.get("/UserUnit", 1) == 1
        assert page.get("/Rotate", 0) == 0


@pytest.mark.parametrize(("x", "y"), [(123.4567, 77.0004), (5.0001, 205.9999), (291.9999, 4.0002)])
def test_holes_keep_their_centre_and_radius(x, y):
    [(_, points)] = paths(pdf([Sheet("s", "s", 297, 210, (Circle("drill", x, y, 4),))], "t"))
    xs, ys = [p[0] for p in points], [p[1] for p in points]
    assert ((min(xs) + max(xs)) / 2, (min(ys) + max(ys)) / 2) == pytest.approx((x, y), abs=0.001)
    assert (max(xs) - min(xs), max(ys) - min(ys)) == pytest.approx((8, 8), abs=0.001)


def test_hole_at_the_end_of_a_long_page_keeps_its_centre():
    [(_, points)] = paths(pdf([Sheet("s", "s", 2000, 100, (Circle("drill", 1987.6543, 50, 4),))], "t"))
    xs = [p[0] for p in points]
    assert (min(xs) + max(xs)) / 2 == pytest.approx(1987.6543, abs=0.001)


def test_arc_lies_on_its_circle_and_turns_the_right_way():
    arc = Arc("drill", 100, 60, 30, -40, 200)
    data = pdf([Sheet("s", "s", 297, 210, (arc,))], "t")
    [(_, points)] = paths(data)
    assert points[0] == pytest.approx(arc.point(-40), abs=0.001)
    assert points[-1] == pytest.approx(arc.point(200), abs=0.001)
    assert all(math.dist(point, (100, 60)) == pytest.approx(30, abs=0.001) for point in points)
    assert any(math.dist(point, arc.point(80)) < 0.001 for point in points)


def test_cubics_leave_the_circle_by_less_than_a_micrometre():
    """Points between the ends of each cubic, computed from the control points, for a radius of 100 mm."""
    from fabgen.export.pdf import _cubics

    steps = _cubics(Arc("drill", 0, 0, 100, 0, 360))
    start = steps[0][0]
    worst = 0.0
    for first, second, end in steps[1:]:
        for k in range(1, 20):
            t = k / 20
            weights = ((1 - t) ** 3, 3 * t * (1 - t) ** 2, 3 * t * t * (1 - t), t**3)
            corners = (start, first, second, end)
            point = [sum(w * corner[i] for w, corner in zip(weights, corners, strict=True)) for i in (0, 1)]
            worst = max(worst, abs(math.hypot(*point) - 100))
        start = end
    assert worst < 0.001


def test_text_arrives_as_written_and_searchable():
    page = pymupdf.open(stream=pdf([recorded()], "t"))[0]
    lines = page.get_text().splitlines()
    for text in NASTY:
        assert text in lines
    assert lines.count("100 mm") == 2


def test_print_dialogs_are_asked_not_to_scale_and_the_file_stays_sound():
    data = pdf([recorded()], "a title with /Type/Catalog in it")
    catalog = pypdf.PdfReader(io.BytesIO(data), strict=True).root_object
    assert catalog["/ViewerPreferences"]["/PrintScaling"] == "/None"
    document = pymupdf.open(stream=data)
    assert not document.is_repaired
    assert document.page_count == 1


def test_title_is_data():
    reader = pypdf.PdfReader(io.BytesIO(pdf([recorded()], '#panic() "<b>" \ud800\n x')))
    assert reader.metadata.title == '#panic() "<b>"    x'


def test_only_the_bundled_font_is_used_and_embedded():
    document = pymupdf.open(stream=pdf([recorded()], "t"))
    fonts = document.get_page_fonts(0)
    assert [name.split("+")[-1] for _, _, _, name, *_ in fonts] == ["DejaVuSans"]
    assert len(document.extract_font(fonts[0][0])[3]) > 1000


ROWS = {
    "level": sorted(lettering._LEVEL - {" "}),
    "deep": sorted(lettering._DEEP),
    "all": sorted(set(lettering._ADVANCE) - {" ", "\u00a0", "\u00ad"}),
}


def ink(page, side_mm):
    """Left, bottom, right, top of the dark pixels of a square page, and the size of a pixel, in mm."""
    picture = page.get_pixmap(dpi=100, colorspace=pymupdf.csGRAY)
    wide, samples = picture.width, picture.samples
    lines = [samples[j * wide : (j + 1) * wide] for j in range(picture.height)]
    rows = [j for j, line in enumerate(lines) if min(line) < 128]
    left = min(next(i for i, value in enumerate(lines[j]) if value < 128) for j in rows)
    right = max(wide - next(i for i, value in enumerate(reversed(lines[j])) if value < 128) for j in rows)
    pixel = side_mm / wide
    box = (left * pixel, side_mm - (rows[-1] + 1) * pixel, right * pixel, side_mm - rows[0] * pixel)
    return box, pixel


@pytest.mark.parametrize(
    ("row", "angle", "anchor"), [("level", 0, "start"), ("all", 0, "end"), ("deep", 90, "middle"), ("deep", 180, "end")]
)
def test_ink_stays_in_the_box_that_drawing_code_reckons_with(row, angle, anchor):
    """Rendered ink of every character of the table, 12 at a time, against `text_box`.

    Tolerance 0.1 mm at 5 mm capitals and a pixel of 0.25 mm: side bearings of a few glyphs are slightly negative.
    """
    characters = ROWS[row]
    texts = [
        Text("text", 60, 60, "".join(characters[k : k + 12]), 5, anchor, angle) for k in range(0, len(characters), 12)
    ]
    document = pymupdf.open(stream=pdf([Sheet("s", "s", 120, 120, (text,)) for text in texts], "t"))
    for page, text in zip(document, texts, strict=True):
        dark, pixel = ink(page, 120)
        box = text_box(text)
        slack = 0.1 + pixel
        assert all(a > b - slack for a, b in zip(dark[:2], box[:2], strict=True))
        assert all(a < b + slack for a, b in zip(dark[2:], box[2:], strict=True))


def test_ink_has_the_height_and_width_that_were_asked_for():
    text = Text("text", 20, 20, "HEH", 30)
    [page] = pymupdf.open(stream=pdf([Sheet("s", "s", 150, 150, (text,))], "t"))
    dark, pixel = ink(page, 150)
    assert (dark[1], dark[3]) == pytest.approx((20, 50), abs=pixel)
    assert dark[2] - dark[0] == pytest.approx(text_width_mm("HEH", 30), rel=0.1)


def test_missing_font_is_a_message_with_its_fix():
    with pytest.raises(MachineError, match="no_such_package is not installed") as caught:
        font_file("no_such_package")
    assert "pip install" in caught.value.fix
    with pytest.raises(MachineError, match="has no mpl-data"):
        font_file("fabgen")
    assert font_file().is_file()


def test_a_document_needs_a_sheet():
    with pytest.raises(ProgramError, match="at least one sheet"):
        pdf([], "t")


def test_same_bytes_in_one_process_and_in_two_with_other_hash_seeds():
    data = pdf([recorded()], "t")
    assert data == pdf([recorded()], "t")
    assert str(font_file().parent).encode() not in data
    code = (
        "import sys; from fabgen.design.pen import Pen; from fabgen.export.pdf import pdf; pen = Pen();"
        "pen.bar_100(1, 1); pen.dot(2, 2, 1); sys.stdout.buffer.write(pdf([pen.sheet('s', 's', 120, 90)], 't'))"
    )
    runs = [
        subprocess.run(
            [sys.executable, "-c", code], capture_output=True, check=True, env={**os.environ, "PYTHONHASHSEED": seed}
        ).stdout
        for seed in ("1", "2")
    ]
    assert runs[0] == runs[1]
    assert len(runs[0]) > 1000
