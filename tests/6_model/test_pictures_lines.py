"""Pictures by the hidden-line pass: what is seen is drawn, what is hidden is not, at a standard scale."""

import itertools
import math

import numpy as np
import pytest

from fabgen.design.arranged import Frame
from fabgen.design.solids import AssemblyItem, Mesh, Product
from fabgen.errors import ProgramError
from fabgen.model import pictures
from fabgen.model.kernel import cq
from fabgen.model.parts.boom import boom
from fabgen.model.parts.bush import bush
from fabgen.model.parts.rod import rod

FRONT = (0.0, -1.0, 0.0)  # x to the right, z up
NO_MESH = Mesh(np.empty((0, 3)), np.empty((0, 3), int))


def product(name, part):
    return Product(name, part.val(), NO_MESH, (0.5, 0.5, 0.5))


def length(lines):
    return sum(math.dist(a, b) for line in lines for a, b in itertools.pairwise(line))


def test_a_box_from_the_front_is_its_rectangle():
    lines = pictures.visible_lines([cq.Solid.makeBox(30, 20, 10)], FRONT)
    points = {(round(x, 6), round(y, 6)) for line in lines for x, y in line}
    assert points == {(0, 0), (30, 0), (30, 10), (0, 10)}
    assert length(lines) == pytest.approx(80)


def test_what_stands_behind_is_hidden():
    near, far = cq.Solid.makeBox(30, 20, 10), cq.Solid.makeBox(10, 5, 5, cq.Vector(5, 40, 2))
    assert length(pictures.visible_lines([near, far], FRONT)) == pytest.approx(80)
    aside = cq.Solid.makeBox(10, 5, 5, cq.Vector(50, 40, 2))
    assert length(pictures.visible_lines([near, aside], FRONT)) == pytest.approx(110)


def test_circles_keep_their_shape():
    """A rod seen along its axis: every point on the circle, the length within the chord's tolerance."""
    lines = pictures.visible_lines([cq.Solid.makeCylinder(2, 50, cq.Vector(0, 0, 0), cq.Vector(0, 1, 0))], FRONT)
    assert all(math.hypot(x, y) == pytest.approx(2, abs=1e-6) for line in lines for x, y in line)
    assert length(lines) == pytest.approx(4 * math.pi, rel=0.01)


def test_part_picture_fits_and_says_its_scale():
    sheet = pictures.part_picture(product("bush rod 4 hole 8", bush()))
    assert sheet.title.startswith("bush rod 4 hole 8, 12.00 × 12.00 × ")
    assert sheet.title.endswith("scale 2:1")
    assert sheet.width_mm <= 120
    assert sheet.height_mm <= 75
    xs = [x for item in sheet.items for x, _ in item.points_mm]
    ys = [y for item in sheet.items for _, y in item.points_mm]
    assert min(xs) == pytest.approx(4, abs=1e-6)
    assert min(ys) == pytest.approx(4, abs=1e-6)
    assert sheet.width_mm - 5 <= max(xs) <= sheet.width_mm - 4 + 1e-6
    assert sheet.height_mm - 5 <= max(ys) <= sheet.height_mm - 4 + 1e-6


def test_scale_is_true():
    """A 30 mm rod at 2:1: the parallel projection shortens it by the angle to the eye, nothing else."""
    sheet = pictures.part_picture(product("rod", rod(length_mm=30)))
    assert sheet.title.endswith("scale 2:1")
    straight = max(math.dist(item.points_mm[0], item.points_mm[-1]) for item in sheet.items)
    x, y, z = pictures.ABOVE
    assert straight == pytest.approx(2 * 30 * math.hypot(x, y) / math.hypot(x, y, z), rel=1e-6)


def test_assembly_picture_shows_every_part():
    tube, bar = product("boom", boom()), product("rod", rod())
    places = [AssemblyItem("boom", tube, Frame())]
    alone = pictures.assembly_picture(places, name="array")
    places.append(AssemblyItem("R", bar, Frame((40, 0, 0), z=(0, 1, 0))))
    both = pictures.assembly_picture(places, name="array")
    assert len(both.items) > len(alone.items)
    assert both.title == "array, seen from the right, scale 1:2"


def test_same_picture_twice():
    assert pictures.part_picture(product("bush", bush())) == pictures.part_picture(product("bush", bush()))


def test_a_picture_that_no_scale_brings_on_the_sheet_is_refused():
    with pytest.raises(ProgramError, match="no scale of ISO 5455"):
        pictures.part_picture(product("rod", rod(length_mm=300_000)))
