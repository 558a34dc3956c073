"""One hole, five files: drilling.csv, SVG, DXF, PDF and STEP agree to 0.001 mm, each read by another library.

CSV by the csv module, SVG as plain XML, DXF by its pairs of group code and value, PDF from its content stream with
pypdf, STEP by the CAD kernel's reader. Marks on paper are folded round the boom before they are compared, so that a
mirrored file cannot pass.
"""

import csv
import io
import math
import xml.etree.ElementTree as ET

import pymupdf
import pypdf
import pytest
from pypdf.generic import ContentStream

from fabgen.draw.sheet_list import sheets_of
from fabgen.draw.tiling import tile
from fabgen.export import tables
from fabgen.export.dxf import dxf
from fabgen.export.pdf import pdf
from fabgen.export.svg import svg
from fabgen.stock.tables import paper_size_mm

TOLERANCE_MM = 0.001
"""The contract: the same hole agrees to 0.001 mm; the bar is 100 mm ± 0.001."""
MM_PER_POINT = 25.4 / 72
SVG = "{http://www.w3.org/2000/svg}"


def drilled(arranged, plan):
    """Rows of drilling.csv as (station, y, z, angle, diameter): where the hole's axis is nearest to the boom's."""
    [table] = [file for file in tables.files(arranged, plan) if file.path == "tables/drilling.csv"]
    holes = []
    for row in csv.DictReader(io.StringIO(table.data.decode("utf-8"))):
        station, angle, across, size = (float(row[k]) for k in ("station_mm", "angle_deg", "across_mm", "diameter_mm"))
        if row["wall"] != "round":
            assert angle == {"+z": 0, "+y": 90, "-z": 180, "-y": 270}[row["wall"]]
        aside = (0.0, across) if angle in (90, 270) else (across, 0.0)
        holes.append((station, *aside, angle, size))
    return sorted(holes)


def on_boom(sheet, arranged, paper, holes):
    """Holes of a sheet, (x, y, diameter) on paper, as drilling.csv has them; a hole seen twice counts once."""
    folded, found = paper(sheet, arranged), set()
    for x, y, size in holes:
        at = folded.fold(x, y)
        ny, nz = at.normal
        angle = math.degrees(math.atan2(ny, nz)) % 360
        depth = at.point[1] * ny + at.point[2] * nz
        aside = (at.point[1] - depth * ny, at.point[2] - depth * nz)
        found.add((*(round(v, 4) + 0.0 for v in (at.point[0], *aside)), round(angle, 3) % 360, round(size, 4)))
    return sorted(found)


def box(points):
    xs, ys = [x for x, _ in points], [y for _, y in points]
    return min(xs), min(ys), max(xs), max(ys)


def marked(outlines, dots):
    """Outlines with a pilot dot in them: the dot's centre and the outline's width along the boom."""
    holes = []
    for left, low, right, high in map(box, outlines):
        inside = [(x, y) for x, y in dots if abs(x - (left + right) / 2) < 0.01 and low < y < high]
        holes += [(x, y, right - left) for x, y in inside]
    return holes


def centres(fills):
    return [((a + c) / 2, (b + d) / 2) for a, b, c, d in map(box, fills)]


def in_svg(sheet):
    root = ET.fromstring(svg(sheet))
    height = float(root.get("viewBox").split()[3])
    [group] = [g for g in root.findall(f"{SVG}g") if g.get("id") == "drill"]
    outlines = []
    for circle in group.findall(f"{SVG}circle"):
        x, y, r = (float(circle.get(k)) for k in ("cx", "cy", "r"))
        outlines.append([(x - r, height - y - r), (x + r, height - y + r)])
    fills = []
    for polygon in group.findall(f"{SVG}polygon"):
        pairs = [pair.split(",") for pair in polygon.get("points").split()]
        points = [(float(x), height - float(y)) for x, y in pairs]
        (fills if polygon.get("stroke") == "none" else outlines).append(points)
    return marked(outlines, centres(fills))


def in_dxf(sheet):
    """Circles and closed lines of the layer `drill`, read by pairs of group code and value, as the format defines."""
    lines = dxf(sheet).decode("utf-8").splitlines()
    pairs = [(int(code), value) for code, value in zip(lines[::2], lines[1::2], strict=True)]
    start = next(k for k, pair in enumerate(pairs) if pair == (2, "ENTITIES"))
    entities, outlines, crosses = [], [], []
    for code, value in pairs[start:]:
        if code == 0:
            entities.append([value])
        elif entities:
            entities[-1].append((code, value))
    for kind, *groups in entities:
        if (8, "drill") in groups and kind == "CIRCLE":
            x, y, r = (float(next(v for c, v in groups if c == code)) for code in (10, 20, 40))
            outlines.append([(x - r, y - r), (x + r, y + r)])
        elif (8, "drill") in groups and kind == "LWPOLYLINE":
            outlines.append(list(zip(*([float(v) for c, v in groups if c == code] for code in (10, 20)), strict=True)))
        elif (8, "drill") in groups and kind == "HATCH":
            xs, ys = ([float(v) for c, v in groups if c == code][1:] for code in (10, 20))
            crosses.append(list(zip(xs, ys, strict=False)))
    return marked(outlines, centres([points for points in crosses if points]))


def multiplied(first, second):
    a, b, c, d, e, f = first
    g, h, i, j, k, m = second
    return (a * g + b * i, a * h + b * j, c * g + d * i, c * h + d * j, e * g + f * i + k, e * h + f * j + m)


def painted(page, reader):
    """Paths of a PDF page: how it is painted, line width in mm, points in mm from the lower left."""
    matrix, saved, points, width, found = (1, 0, 0, 1, 0, 0), [], [], 0.0, []
    for raw, operator in ContentStream(page.get_contents(), reader).operations:
        values = [float(v) for v in raw if isinstance(v, int | float)]
        match operator:
            case b"q":
                saved.append((matrix, width))
            case b"Q":
                matrix, width = saved.pop()
            case b"cm":
                matrix = multiplied(values, matrix)
            case b"w":
                width = values[0]
            case b"m" | b"l" | b"c":
                a, b, c, d, e, f = matrix
                x, y = values[-2:]
                points.append(((a * x + c * y + e) * MM_PER_POINT, (b * x + d * y + f) * MM_PER_POINT))
            case b"S" | b"s" | b"f" | b"f*":
                scale = math.hypot(matrix[0], matrix[1])
                found.append((operator.decode()[0].lower(), width * scale * MM_PER_POINT, points))
                points = []
    return found


def in_pdf(sheet, arranged):
    """Holes of the tiled pages, moved to the sheet by each page's station and the paper's lower edge."""
    design = arranged.design
    tiling = tile(sheet, paper_size_mm(design.shop.paper), number=design.number, revision=design.revision)
    assert tiling.rows == 1
    reader = pypdf.PdfReader(io.BytesIO(pdf(tiling.pages, "t")))
    low = min(y for item in sheet.on("outline") for _, y in item.points_mm)
    holes = []
    for page, tiled in zip(reader.pages, tiling.pages, strict=True):
        paths = painted(page, reader)
        floor = min(y for kind, width, points in paths if kind == "s" and abs(width - 0.35) < 0.01 for _, y in points)
        dx, dy = tiled.station_at_x0_mm - sheet.station_at_x0_mm, low - floor
        outlines = [points for kind, _, points in paths if kind == "s" and len(points) > 8]
        fills = centres([points for kind, _, points in paths if kind == "f" and len(points) == 24])
        holes += [(x + dx, y + dy, size) for x, y, size in marked(outlines, fills)]
    return holes


def assert_same(found, wanted):
    assert len(found) == len(wanted)
    for hole, other in zip(found, wanted, strict=True):
        assert hole == pytest.approx(other, abs=TOLERANCE_MM)


@pytest.mark.parametrize(
    "name",
    ["square", "round", *(pytest.param(name, marks=pytest.mark.slow) for name in ("rectangular", "solid", "bonded"))],
)
def test_svg_dxf_and_pdf_have_the_holes_of_the_table(name, arranged_as, paper):
    arranged, plan = arranged_as(name)
    sheet = sheets_of("templates", arranged, plan)[0]
    wanted = drilled(arranged, plan)
    for holes in (in_svg(sheet), in_dxf(sheet), in_pdf(sheet, arranged)):
        assert_same(on_boom(sheet, arranged, paper, holes), wanted)


@pytest.mark.slow
@pytest.mark.parametrize("name", ["square", "round", "bonded", "solid"])
def test_step_has_the_holes_of_the_table(name, arranged_as, tmp_path):
    import cadquery as cq

    from fabgen.export.step import assembly_bytes
    from fabgen.model.assembly import assembly

    arranged, plan = arranged_as(name)
    path = tmp_path / "array.step"
    path.write_bytes(assembly_bytes(assembly(arranged), name=arranged.design.name))
    length = arranged.design.boom.length_mm
    solids = cq.importers.importStep(str(path)).solids().vals()
    [boom] = [s for s in solids if abs(s.BoundingBox().xlen - length) < 0.01]
    barrels = []
    for face in boom.Faces():
        if face.geomType() == "CYLINDER":
            cylinder = face._geomAdaptor().Cylinder()
            axis, place = cylinder.Axis().Direction(), cylinder.Axis().Location()
            centre = face.Center()
            barrels.append(
                ((place.X(), place.Y(), place.Z()), (axis.X(), axis.Y(), axis.Z()), cylinder.Radius(), centre)
            )
    across = [barrel for barrel in barrels if abs(barrel[1][0]) < 1e-6]
    holes = drilled(arranged, plan)
    for station, y, z, angle, size in holes:
        out = (0.0, math.sin(math.radians(angle)), math.cos(math.radians(angle)))
        misses = [
            math.hypot(off_line((station, y, z), place, axis), radius - size / 2)
            for place, axis, radius, centre in across
            if abs(abs(sum(a * o for a, o in zip(axis, out, strict=True))) - 1) < 1e-9
            and (centre.y * out[1] + centre.z * out[2] > 0 or not arranged.design.boom.hollow)
        ]
        assert min(misses) < TOLERANCE_MM
    radii = {round(size / 2, 3) for *_, size in holes}
    assert {round(radius, 3) for _, _, radius, _ in across} == radii


def off_line(point, place, axis):
    apart = [a - b for a, b in zip(point, place, strict=True)]
    along = sum(a * u for a, u in zip(apart, axis, strict=True))
    return math.sqrt(max(0.0, sum(a * a for a in apart) - along * along))


def lengths(lines):
    return sorted(math.dist(a, b) for a, b in lines)[-2:]


@pytest.mark.parametrize("name", ["square", "round"])
def test_the_bar_is_100_mm_in_every_file(name, arranged_as):
    """Vector bounds read back by ElementTree, trimesh and MuPDF, none of which wrote the file.

    MuPDF hands out points in single precision: 1e-4 mm at this size, a tenth of the tolerance.
    """
    import trimesh

    arranged, plan = arranged_as(name)
    design = arranged.design
    for sheet in sheets_of("templates", arranged, plan):
        [group] = [g for g in ET.fromstring(svg(sheet)).findall(f"{SVG}g") if g.get("id") == "scale"]
        ends = [[float(line.get(k)) for k in ("x1", "y1", "x2", "y2")] for line in group.findall(f"{SVG}line")]
        assert lengths((e[:2], e[2:]) for e in ends) == pytest.approx([100, 100], abs=TOLERANCE_MM)
        drawing = trimesh.load_path(io.BytesIO(dxf(sheet)), file_type="dxf")
        assert drawing.units in ("mm", "millimeters", "millimeter")
        bars = [drawing.vertices[e.points] for e in drawing.entities if str(e.layer) == "SCALE" and len(e.points) == 2]
        assert lengths(bars) == pytest.approx([100, 100], abs=TOLERANCE_MM)
        pages = tile(sheet, paper_size_mm(design.shop.paper), number=design.number, revision=design.revision).pages
        for page in pymupdf.open(stream=pdf(pages, "t"), filetype="pdf"):
            straight = [
                [(i[1].x * MM_PER_POINT, i[1].y * MM_PER_POINT), (i[2].x * MM_PER_POINT, i[2].y * MM_PER_POINT)]
                for path in page.get_drawings()
                for i in path["items"]
                if i[0] == "l"
            ]
            found = [(a, b) for a, b in straight if abs(math.dist(a, b) - 100) < 0.5]
            assert lengths(found) == pytest.approx([100, 100], abs=TOLERANCE_MM)
            assert {abs(a[0] - b[0]) > 50 for a, b in found} == {True, False}
