"""Bores, spigots and holes measured on the solids by the kernel, and volumes away from the defaults."""

import functools

import pytest
from OCP.BRepAdaptor import BRepAdaptor_Surface

from fabgen import registry
from fabgen.design import part_sizes
from fabgen.model.kernel import cq, solid_of, volume_mm3

CLOSED_FORM = 1e-7
"""Relative, as for the defaults."""


@functools.cache
def built(name, **parameters):
    return registry.entry("model/parts", name).function()(**parameters)


def diameters_mm(part):
    """Diameters of all cylindrical faces."""
    return {round(2 * surface(face).Radius(), 6) for face in cylinders(part)}


def bores_mm(part):
    return {round(2 * surface(face).Radius(), 6) for face in cylinders(part) if is_bore(face)}


def cylinders(part):
    return [face for face in solid_of(part).Faces() if face.geomType() == "CYLINDER"]


def surface(face):
    return BRepAdaptor_Surface(face.wrapped).Cylinder()


def is_bore(face):
    """Whether the material lies outside the cylinder: the outward normal points at the axis."""
    axis = surface(face).Axis()
    vertices, triangles = face.tessellate(0.05, 0.1)
    a, b, c = triangles[0]
    point = (vertices[a] + vertices[b] + vertices[c]) / 3
    direction = cq.Vector(axis.Direction())
    radial = point - cq.Vector(axis.Location())
    radial -= direction * radial.dot(direction)
    return face.normalAt(point).dot(radial) < 0


def test_bush_has_the_fits_of_common_practice():
    """Fits, diametral, common practice: bore = rod + 0.2, spigot = hole − 0.2, flange = hole + 4."""
    part = built("bush", rod_diameter_mm=5.0, hole_diameter_mm=9.0, wall_mm=2.0)
    assert diameters_mm(part) == {5.2, 8.8, 13.0}
    assert bores_mm(part) == {5.2}
    box = solid_of(part).BoundingBox()
    assert (box.zmin, box.zmax) == pytest.approx((-3.0, 3.0), abs=1e-6)


def test_growth_goes_to_the_bore_and_nowhere_else():
    assert diameters_mm(built("bush", hole_growth_mm=0.25)) == {4.45, 7.8, 12.0}


@pytest.mark.parametrize(
    "name", ["bush", "sleeve", "push_ring", "snap_keeper", "saddle", "feed_block", "folded_saddle"]
)
def test_growth_moves_nothing(name):
    """A printer's correction must not move a drilled hole or an outside face: only openings grow."""
    sizes = [getattr(part_sizes, f"{name}_size")(hole_growth_mm=growth) for growth in (0.0, 0.3)]
    drawn = {"hole_growth_mm", "volume_mm3", "lid_volume_mm3", "drawn_bore_mm", "walls_mm", "shapes"}
    for quantity in [q for q in dir(sizes[0]) if not q.startswith("_") and q not in drawn]:
        first, second = (getattr(size, quantity) for size in sizes)
        if not callable(first):
            assert first == second, quantity
    assert sizes[0].shapes == sizes[1].shapes
    plain, grown = (solid_of(built(name, hole_growth_mm=growth)) for growth in (0.0, 0.3))
    assert plain.intersect(grown).Volume(1e-6) == pytest.approx(grown.Volume(1e-6), rel=1e-7)
    assert grown.Volume() < plain.Volume()


def test_round_foot_is_the_booms_own_cylinder():
    part = built("bush", boom_diameter_mm=25.0)
    assert bores_mm(part) == {4.2, 25.0}
    boom = cq.Workplane("YZ", origin=(-50, 0, -12.5)).circle(12.5).circle(11.0).extrude(100)
    drilled = boom.cut(cq.Workplane().circle(4.0).extrude(30, both=True))
    assert solid_of(part).intersect(drilled.val()).Volume() == pytest.approx(0.0, abs=1e-6)
    assert solid_of(part).distance(drilled.val()) == pytest.approx(0.0, abs=1e-6)


def test_sleeve_ends_inside_the_far_wall():
    part = built("sleeve", boom_width_mm=25.0)
    assert solid_of(part).BoundingBox().zmin == pytest.approx(-(25.0 - 0.3), abs=1e-6)
    assert bores_mm(part) == {4.2}


def test_keepers_are_tighter_than_the_rod():
    assert bores_mm(built("push_ring", rod_diameter_mm=6.0)) == {5.7}
    assert bores_mm(built("snap_keeper", rod_diameter_mm=6.0)) == {5.8}


def test_snap_mouth_holds_the_rod():
    size = part_sizes.snap_keeper_size()
    part = built("snap_keeper")
    rod = cq.Workplane().circle(size.bore_mm / 2).extrude(size.length_mm)
    steps = [0.0, 1.0, 2.0, 3.0, 4.0, 6.0]
    shared = [solid_of(part).intersect(rod.translate((x, 0, 0)).val()).Volume() for x in steps]
    assert shared[0] == pytest.approx(0.0, abs=1e-6)
    assert max(shared[1:]) > 0.1
    assert shared[-1] == pytest.approx(0.0, abs=1e-6)


def test_saddle_bore_and_screw_holes():
    """Saddle bore = rod + 0.3 (common practice); M4 medium 4.5 (ISO 273); head 7.22 (ISO 4762, knurled) + 0.8."""
    part = built("saddle", rod_diameter_mm=6.0, height_mm=15.0, screw="M4")
    assert bores_mm(part) >= {6.3, 4.5, 8.02}
    axis = [f for f in cylinders(part) if round(2 * surface(f).Radius(), 6) == 6.3]
    assert {round(surface(f).Axis().Location().Z(), 6) for f in axis} == {15.0}


@pytest.mark.parametrize(
    ("name", "parameters"),
    [
        ("bush", {"boom_diameter_mm": 25.0, "hole_growth_mm": 0.2}),
        ("bush", {"boom_diameter_mm": 14.0, "rod_diameter_mm": 3.0, "hole_diameter_mm": 6.0, "flange_height_mm": 2.0}),
        ("sleeve", {"boom_diameter_mm": 25.0, "boom_width_mm": 25.0}),
        ("push_ring", {"rod_diameter_mm": 10.0, "hole_growth_mm": 0.2}),
        ("snap_keeper", {"rod_diameter_mm": 3.0, "hole_growth_mm": 0.2}),
        ("saddle", {"boom_diameter_mm": 25.0, "hole_growth_mm": 0.2}),
        ("saddle", {"height_mm": 4.0}),
        ("saddle", {"height_mm": 8.0, "boom_diameter_mm": 12.0, "screw": "M2.5"}),
        ("saddle", {"rod_diameter_mm": 10.0, "height_mm": 30.0, "boom_width_mm": 40.0, "screw": "M5"}),
        ("rod", {"cross_hole_mm": 2.2, "cross_hole_z_mm": 145.0}),
        ("folded_rod", {"cross_hole_mm": 2.2}),
        ("screw", {"thread": "M6", "head": "hex", "length_mm": 50.0}),
        ("screw", {"thread": "M3", "head": "pan", "length_mm": 12.0}),
        ("nut", {"thread": "M8"}),
        ("clamp_plate", {"corner_mm": 0.0, "holes": ()}),
    ],
)
def test_volume_is_the_closed_form_away_from_the_defaults(name, parameters):
    part = registry.entry("model/parts", name).function()(**parameters)
    formula = getattr(part_sizes, f"{name}_size")(**parameters).volume_mm3
    assert volume_mm3(part) == pytest.approx(formula, rel=CLOSED_FORM)


def test_folded_rod_has_the_developed_length_of_its_centre_line():
    """2(L − s − d) + πs − gap for L 320, s 30, d 4, gap 10."""
    size = part_sizes.folded_rod_size()
    assert size.developed_mm == pytest.approx(2 * (320 - 30 - 4) + 94.24777960769379 - 10, abs=1e-9)
    box = solid_of(built("folded_rod")).BoundingBox(1e-4)
    assert box.ylen == pytest.approx(320.0, abs=1e-3)
    assert box.zlen == pytest.approx(34.0, abs=1e-3)


@pytest.mark.parametrize(
    ("name", "parameters"),
    [
        ("bush_size", {"rod_diameter_mm": 8.0}),
        ("bush_size", {"flange_diameter_mm": 7.0}),
        ("bush_size", {"boom_diameter_mm": 11.0}),
        ("bush_size", {"boom_diameter_mm": 12.5, "spigot_length_mm": 1.0}),
        ("push_ring_size", {"slit_mm": 4.0}),
        ("push_ring_size", {"outside_diameter_mm": 3.0}),
        ("snap_keeper_size", {"mouth_mm": 4.0}),
        ("saddle_size", {"height_mm": 3.0}),
        ("saddle_size", {"width_mm": 5.0}),
        ("feed_block_size", {"height_mm": 6.0}),
        ("feed_block_size", {"rod_diameter_mm": 2.0}),
        ("folded_saddle_size", {"terminal": "M4"}),
        ("folded_saddle_size", {"height_mm": 8.0}),
        ("folded_saddle_size", {"spacing_mm": 8.0}),
        ("folded_rod_size", {"length_mm": 40.0}),
        ("folded_rod_size", {"cross_hole_mm": 4.0}),
        ("folded_rod_size", {"length_mm": 54.0, "cross_hole_mm": 2.2}),
    ],
)
def test_impossible_sizes_are_refused_with_the_reason(name, parameters):
    with pytest.raises(ValueError, match=r"\d mm"):
        getattr(part_sizes, name)(**parameters)
