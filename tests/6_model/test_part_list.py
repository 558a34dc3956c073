"""What holds for every part of the folder, found by listing it: no part is missed and none is excused."""

import functools
import inspect
import math

import pytest

from fabgen import registry
from fabgen.design import part_sizes
from fabgen.model.kernel import bounds_mm, cq, solid_of, volume_mm3
from fabgen.stock.practice import print_practice

PARTS = [entry.name for entry in registry.entries("model/parts")]
BED_MM = (220.0, 220.0, 250.0)
"""The printer of the contract's example design."""

SIZED = [name for name in PARTS if hasattr(part_sizes, f"{name}_size")]
CLOSED_FORM = 1e-7
"""Relative: the kernel integrates trimmed faces to 1e-6 and does better; plane-faced parts agree to 1e-12."""


def module_of(name):
    return inspect.getmodule(registry.entry("model/parts", name).function())


@functools.cache
def default(name):
    return registry.entry("model/parts", name).function()()


def printed_parts():
    return [name for name in PARTS if module_of(name).SOURCE == "printed"]


@pytest.mark.parametrize("name", PARTS)
def test_default_part_is_one_valid_solid(name):
    part = default(name)
    assert len(part.vals()) == 1
    assert len(part.solids().vals()) == 1
    assert solid_of(part).isValid()
    assert volume_mm3(part) > 0


@pytest.mark.parametrize("name", PARTS)
def test_part_takes_keywords_only_and_has_a_default_for_each(name):
    parameters = inspect.signature(registry.entry("model/parts", name).function()).parameters.values()
    assert parameters
    assert all(p.kind is p.KEYWORD_ONLY and p.default is not p.empty for p in parameters)


@pytest.mark.parametrize("name", PARTS)
def test_source_is_declared_and_printed_parts_grow_their_bores(name):
    module = module_of(name)
    assert module.SOURCE in ("printed", "bought", "made")
    assert hasattr(module, "print_pose") == (module.SOURCE == "printed")
    parameters = inspect.signature(getattr(module, name)).parameters
    assert ("hole_growth_mm" in parameters) == (module.SOURCE == "printed")


@pytest.mark.parametrize("name", PARTS)
def test_part_is_the_same_twice(name):
    again = registry.entry("model/parts", name).function()()
    assert volume_mm3(again) == volume_mm3(default(name))
    assert bounds_mm(again) == bounds_mm(default(name))


@pytest.mark.parametrize("name", SIZED)
def test_volume_is_the_closed_form(name):
    formula = getattr(part_sizes, f"{name}_size")().volume_mm3
    assert volume_mm3(default(name)) == pytest.approx(formula, rel=CLOSED_FORM)


def test_sized_parts_are_not_an_empty_list():
    assert len(SIZED) >= 16


@pytest.mark.parametrize("name", SIZED)
def test_part_lies_within_its_envelope(name):
    size = getattr(part_sizes, f"{name}_size")()
    boxes = [shape if not hasattr(shape, "box") else shape.box for shape in size.shapes]
    low = [min(box.low[i] for box in boxes) for i in range(3)]
    high = [max(box.high[i] for box in boxes) for i in range(3)]
    found_low, found_high = bounds_mm(default(name))
    for i in range(3):
        assert found_low[i] == pytest.approx(max(low[i], found_low[i]), abs=1e-6)
        assert found_high[i] == pytest.approx(min(high[i], found_high[i]), abs=1e-6)
    # The envelope is not loose either: the screw's shank and the washer's ring touch it on every side but a slit's.
    slack = [found_low[i] - low[i] for i in range(3)] + [high[i] - found_high[i] for i in range(3)]
    assert max(slack) < 1.2


@pytest.mark.parametrize("name", printed_parts())
def test_print_pose_stands_on_the_bed_and_fits_it(name):
    pose = module_of(name).print_pose(default(name))
    low, high = bounds_mm(pose)
    assert low[2] == pytest.approx(0.0, abs=1e-6)
    assert all(high[i] - low[i] <= BED_MM[i] for i in range(3))
    assert volume_mm3(pose) == pytest.approx(volume_mm3(default(name)), rel=1e-9)
    assert bed_contact_mm2(pose) > 5.0


@pytest.mark.parametrize("name", printed_parts())
def test_prints_without_support(name):
    """No surface hangs over more than 45° but bridges: level, without a hole, and short (common practice: 20 mm)."""
    assert hanging(module_of(name).print_pose(default(name))) == []


def test_the_overhang_check_can_fail():
    """A saddle set on its foot has a lying bore that is round: its upper quarter hangs."""
    kinds = [kind for kind, _ in hanging(default("saddle"))]
    assert kinds == ["CYLINDER"]
    table = cq.Workplane().box(4, 4, 10).faces(">Z").workplane().rect(60, 60).extrude(2)
    assert hanging(table) != []


def bed_contact_mm2(pose):
    return sum(
        face.Area()
        for face in solid_of(pose).Faces()
        if face.geomType() == "PLANE" and face.normalAt().z < -0.999 and abs(face.Center().z) < 1e-6
    )


def hanging(pose):
    """Faces that would need support: (kind, centre) of each."""
    steepest = -math.sin(math.radians(print_practice("overhang_from_vertical_deg")))
    floor = bounds_mm(pose)[0][2]
    found = []
    for face in solid_of(pose).Faces():
        centre = face.Center().toTuple()
        if face.geomType() == "PLANE":
            slope = face.normalAt().z
            if slope >= steepest - 1e-6 or abs(centre[2] - floor) < 1e-6:
                continue
            if slope < -1 + 1e-9 and not face.innerWires() and span_mm(face) <= print_practice("longest_bridge_mm"):
                continue
            found.append(("plane", centre))
        elif lowest_normal(face) < steepest - 0.02:
            found.append((face.geomType(), centre))
    return found


def span_mm(face):
    box = face.BoundingBox()
    return min(box.xlen, box.ylen)


def lowest_normal(face):
    """The smallest z of a curved face's outward normals, over its own triangles."""
    vertices, triangles = face.tessellate(0.01, 0.05)
    middles = [(vertices[a] + vertices[b] + vertices[c]) / 3 for a, b, c in triangles]
    return min(face.normalAt(middle).z for middle in middles)
