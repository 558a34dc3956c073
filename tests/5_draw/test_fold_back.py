"""The template wrapped round its boom in space: every mark comes to lie on the hole of the table, never mirrored."""

import dataclasses
import math

import pytest

from fabgen.design.arranged import Hole
from fabgen.design.drawing import Circle, Fill, Polyline, Text
from fabgen.draw.sheets import boom_template

TOLERANCE_MM = 0.001
"""The contract: the same hole agrees to 0.001 mm."""
ANGLES = {"+z": 0.0, "+y": 90.0, "-z": 180.0, "-y": 270.0}
SHAPES = ["square", "rectangular", "solid", "bonded", "round", "round-solid", "dense", "small"]


def lopsided(arranged):
    """Holes aside of every wall's middle, each wall otherwise: no mirrored paper could carry them."""
    round_boom = arranged.design.boom.section == "round"
    holes = tuple(
        Hole("boom", f"H{k:02d}", "D1", 90.0 + 61.25 * k, "round" if round_boom else wall, angle, aside, size, 2.0, 0.5,
             f"{size:g} mm", "rod")
        for k, (wall, angle, aside, size) in enumerate(
            [("+z", 0.0, 1.7, 3.0), ("+y", 90.0, -1.3, 5.0), ("-z", 180.0, 0.9, 4.0), ("-y", 270.0, 2.1, 2.5),
             ("+z", 0.0, -2.0, 2.0)], start=1)
    )  # fmt: skip
    return dataclasses.replace(arranged, holes=holes)


def crown(hole, boom):
    """The hole's axis: a point far out on it, and its direction in the cross-section."""
    angle = math.radians(hole.angle_deg)
    out = (math.sin(angle), math.cos(angle))
    if abs(out[0]) > 0.5:  # a side wall: across grows to +z
        return (0.0, hole.across_mm), out
    return (hole.across_mm, 0.0), out


def off_axis(point, hole, boom):
    """Distance of a folded point from the hole's axis; infinite when it lies on the other side of the boom."""
    (ay, az), (oy, oz) = crown(hole, boom)
    x, y, z = point[0] - hole.station_mm, point[1] - ay, point[2] - az
    if y * oy + z * oz <= 0:
        return math.inf
    return math.hypot(x, y * oz - z * oy)


def marks(sheet):
    """Pilot dots as centres; circles and outlines as points on them."""
    dots, outlines = [], []
    for item in sheet.on("drill"):
        match item:
            case Fill(points_mm=points):
                xs, ys = [x for x, _ in points], [y for _, y in points]
                dots.append(((min(xs) + max(xs)) / 2, (min(ys) + max(ys)) / 2))
            case Circle(x_mm=x, y_mm=y, radius_mm=r):
                outlines.append([(x + r * math.cos(k / 6), y + r * math.sin(k / 6)) for k in range(38)])
            case Polyline(points_mm=points):
                outlines.append(list(points))
    return dots, outlines


@pytest.mark.parametrize("aside", [False, True], ids=["as arranged", "lopsided"])
@pytest.mark.parametrize("name", SHAPES)
def test_every_mark_lies_on_its_hole(name, aside, arranged_as, paper):
    arranged, plan = arranged_as(name)
    if aside:
        arranged = lopsided(arranged)
    [sheet] = boom_template.sheets(arranged, plan)
    folded, boom = paper(sheet, arranged), arranged.design.boom
    dots, outlines = marks(sheet)
    found = set()
    for x, y in dots:
        at = folded.fold(x, y)
        hole = min(arranged.holes, key=lambda hole: off_axis(at.point, hole, boom))
        assert off_axis(at.point, hole, boom) < TOLERANCE_MM
        if boom.section != "round":
            assert at.normal == pytest.approx((hole.axis[1], hole.axis[2]))
        found.add((hole.number, hole.angle_deg))
    assert found == {(hole.number, hole.angle_deg) for hole in arranged.holes}
    seen = set()
    for points in outlines:
        places = [folded.fold(x, y).point for x, y in points]
        misses = {
            (hole.number, hole.angle_deg): max(abs(off_axis(p, hole, boom) - hole.diameter_mm / 2) for p in places)
            for hole in arranged.holes
            if abs(hole.station_mm - places[0][0]) <= hole.diameter_mm
        }
        best = min(misses, key=misses.get)
        assert misses[best] < TOLERANCE_MM
        seen.add(best)
    assert seen == found


def test_a_hole_on_the_seam_is_drawn_at_both_edges(arranged_as):
    arranged, plan = arranged_as("round")
    hole = dataclasses.replace(arranged.holes[0], angle_deg=180.0)
    [sheet] = boom_template.sheets(dataclasses.replace(arranged, holes=(hole,)), plan)
    closed = [item for item in sheet.on("drill") if isinstance(item, Polyline) and item.closed]
    opened = [item for item in sheet.on("drill") if isinstance(item, Polyline) and not item.closed]
    assert (len(closed), len(opened)) == (1, 1)


@pytest.mark.parametrize("name", ["square", "rectangular", "round", "dense"])
def test_walls_are_named_where_they_come_to_lie(name, arranged_as, paper, normals):
    arranged, plan = arranged_as(name)
    [sheet] = boom_template.sheets(arranged, plan)
    folded = paper(sheet, arranged)
    counts = dict.fromkeys(normals, 0)
    for text in sheet.on("text"):
        if isinstance(text, Text) and text.text in normals:
            ny, nz = folded.fold(text.x_mm, text.y_mm).normal
            wanted = normals[text.text]
            assert ny * wanted[0] + nz * wanted[1] > math.cos(math.radians(45))
            counts[text.text] += 1
    assert min(counts.values()) >= arranged.design.boom.length_mm / 400


def test_paper_round_a_tube_closes(arranged_as):
    arranged, plan = arranged_as("round")
    [sheet] = boom_template.sheets(arranged, plan)
    [edge] = [item for item in sheet.on("outline") if isinstance(item, Polyline)]
    ys = [y for _, y in edge.points_mm]
    boom = arranged.design.boom
    across = math.pi * (boom.width_mm + arranged.design.shop.paper_thickness_mm)
    assert max(ys) - min(ys) == pytest.approx(across, abs=1e-6)


def test_paper_round_corners_is_shorter_than_drawn_sharp(arranged_as):
    arranged, plan = arranged_as("rectangular")
    [sheet] = boom_template.sheets(arranged, plan)
    [edge] = [item for item in sheet.on("outline") if isinstance(item, Polyline)]
    ys = [y for _, y in edge.points_mm]
    boom, paper_mm = arranged.design.boom, arranged.design.shop.paper_thickness_mm
    corner = boom.corner_radius_mm
    across = 2 * (boom.width_mm + boom.height_mm - 4 * corner) + 2 * math.pi * (corner + paper_mm / 2)
    assert max(ys) - min(ys) == pytest.approx(across, abs=1e-6)
