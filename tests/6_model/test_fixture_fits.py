"""Fixtures do their work: measured on the solids by the kernel."""

import functools
import math

import pytest
from OCP.BRepAdaptor import BRepAdaptor_Surface

from fabgen.design import glyphs
from fabgen.design.centring_aid_sizes import centring_aid_size
from fabgen.design.drill_guide_sizes import MARK_DEPTH_MM, drill_guide_size
from fabgen.design.fit_gauge_sizes import PLATE_MM, fit_gauge_size
from fabgen.model.kernel import cq, solid_of
from fabgen.model.parts.boom import boom
from fabgen.model.parts.bush import bush
from fabgen.model.parts.centring_aid import centring_aid
from fabgen.model.parts.drill_guide import drill_guide
from fabgen.model.parts.fit_gauge import fit_gauge
from fabgen.model.parts.nut import nut
from fabgen.model.shapes import X, Y, box, cylinder

FLAT, ROUND = {}, {"boom_diameter_mm": 20.0}
TOUCH_MM, NOTHING_MM3 = 1e-6, 1e-6


@functools.cache
def guide(round_boom):
    return solid_of(drill_guide(**(ROUND if round_boom else FLAT)))


def shared_mm3(first, second):
    return first.intersect(second).Volume()


def bar(round_boom, y_mm=0.0, z_mm=0.0):
    """20 mm of boom section, longer than the guide, off its place by a little."""
    if round_boom:
        return cylinder(20.0, (-50.0, y_mm, z_mm), X, 100.0)
    return box((-50.0, 50.0), (y_mm - 10.0, y_mm + 10.0), (z_mm - 10.0, z_mm + 10.0))


def cylinders(solid):
    """(diameter, a point of the axis, direction) of every cylindrical face."""
    found = []
    for face in solid.Faces():
        if face.geomType() == "CYLINDER":
            surface = BRepAdaptor_Surface(face.wrapped).Cylinder()
            axis = surface.Axis()
            found.append((round(2 * surface.Radius(), 6), cq.Vector(axis.Location()), cq.Vector(axis.Direction())))
    return found


@pytest.mark.parametrize("round_boom", [False, True])
def test_guide_slides_on_the_boom_and_seats_on_its_reference_faces(round_boom):
    """In its place the boom touches the face it is pressed against; 0.3 mm of play lies on the other sides."""
    assert shared_mm3(guide(round_boom), bar(round_boom)) < NOTHING_MM3
    assert guide(round_boom).distance(bar(round_boom)) < TOUCH_MM
    assert shared_mm3(guide(round_boom), bar(round_boom, z_mm=-0.3)) < NOTHING_MM3
    assert shared_mm3(guide(round_boom), bar(round_boom, z_mm=0.05)) > 1.0
    assert shared_mm3(guide(round_boom), bar(round_boom, z_mm=-0.35)) > 1.0
    if not round_boom:
        assert shared_mm3(guide(False), bar(False, y_mm=-0.3)) < NOTHING_MM3
        assert shared_mm3(guide(False), bar(False, y_mm=0.05)) > 1.0


def test_guide_takes_the_drawn_boom():
    """The tube of the assembly, corners and all, goes through."""
    tube = solid_of(boom()).translate(cq.Vector(-130.0, 0.0, 0.0))
    assert shared_mm3(guide(False), tube) < NOTHING_MM3


@pytest.mark.parametrize("round_boom", [False, True])
def test_both_walls_guide_one_drill_on_the_booms_axis(round_boom):
    """Two seats of 5 mm and two lips of 3.5 mm, all on the y axis; hole_growth goes on top of both."""
    found = [(d, at, along) for d, at, along in cylinders(guide(round_boom)) if d in (5.0, 3.5)]
    assert sorted(d for d, _, _ in found) == [3.5, 3.5, 5.0, 5.0]
    for _, at, along in found:
        assert abs(along.y) == pytest.approx(1.0)
        assert (at.x, at.z) == pytest.approx((0.0, 0.0), abs=1e-9)
    grown = {d for d, _, _ in cylinders(solid_of(drill_guide(hole_growth_mm=0.2)))}
    assert {5.2, 3.7, 4.7} <= grown


@pytest.mark.parametrize("round_boom", [False, True])
def test_bushings_seat_without_standing_out_and_the_drill_passes(round_boom):
    size = drill_guide_size(**(ROUND if round_boom else FLAT))
    drill = cylinder(2.5, (0.0, -40.0, 0.0), Y, 80.0)
    assert shared_mm3(guide(round_boom), drill) < NOTHING_MM3
    for side, along in (("+y", 1.0), ("-y", -1.0)):
        foot = size.lip_face_mm(side)
        bushing = cylinder(5.0, (0.0, along * foot, 0.0), (0.0, along, 0.0), 6.0)
        assert shared_mm3(guide(round_boom), bushing) < NOTHING_MM3
        deeper = bushing.translate(cq.Vector(0.0, -along * 0.1, 0.0))
        assert shared_mm3(guide(round_boom), deeper) > 0.5, "the lip stops it"
        assert foot + 6.0 <= size.outside_mm(side) + 1e-9
        assert foot > size.face_mm(side), "room for chips"


@pytest.mark.parametrize("round_boom", [False, True])
def test_the_windows_edge_is_the_drills_axis(round_boom):
    """Looking down on the boom beside the notch: open before the edge, closed behind it, thin at the boom."""
    solid = guide(round_boom)
    for y in (-3.0, 3.0):
        top = math.sqrt(100 - y**2) if round_boom else 10.0
        assert not solid.isInside(cq.Vector(0.01, y, top + 0.2))
        assert solid.isInside(cq.Vector(-0.01, y, top + 0.2))
        assert not solid.isInside(cq.Vector(-0.5, y, 13.0)), "the slope leaves the edge to the eye"


def test_a_round_boom_is_clocked_by_notches_on_its_crown():
    solid = guide(True)
    half = drill_guide_size(**ROUND).length_mm / 2
    for x in (-half + 0.3, half - 0.3, -0.3):
        assert not solid.isInside(cq.Vector(x, 0.0, 10.5))
        assert solid.isInside(cq.Vector(x, 1.2, 10.5))


@pytest.mark.parametrize("round_boom", [False, True])
def test_a_nut_lies_below_the_cavitys_face_and_cannot_turn(round_boom):
    size = drill_guide_size(**(ROUND if round_boom else FLAT))
    lying = solid_of(nut(thread="M4"))
    # Its hexagon, corner towards y, pushed to the floor of the pocket under the boom.
    turns = {
        angle: lying.rotate(cq.Vector(), cq.Vector(0, 0, 1), angle).translate(
            cq.Vector(0, 0, -size.pocket_floor_mm("-z"))
        )
        for angle in (0, 30)
    }
    free, turned = sorted(turns.values(), key=lambda solid: shared_mm3(guide(round_boom), solid))
    assert shared_mm3(guide(round_boom), free) < NOTHING_MM3
    assert shared_mm3(guide(round_boom), turned) > 1.0
    assert shared_mm3(bar(round_boom), free) < NOTHING_MM3
    assert size.set_screw_mm <= size.clamp_wall_mm
    assert size.set_screw_mm + 0.5 > size.nut_depth_mm, "it reaches through the nut"


def test_marks_read_from_outside():
    """The foot of L points to the reader's right: seen from the left side that is towards the datum."""
    solid, size = guide(False), drill_guide_size()
    ((_, _, x),) = [mark for mark in size.marks if mark[0] == "L"]
    just_below = size.outside_mm("+y") - MARK_DEPTH_MM / 2
    low, high = -2.0, 2.0
    assert not solid.isInside(cq.Vector(x - 1.0, just_below, low)), "the foot's end"
    assert solid.isInside(cq.Vector(x - 1.0, just_below, high))
    assert not solid.isInside(cq.Vector(x + 1.0, just_below, high)), "the stem's head"


def test_letters_do_not_touch_in_a_corner_only():
    for letter in sorted(glyphs.LETTERS):
        corners = [corner for loop in glyphs.outlines(letter) for corner in loop]
        assert len(corners) == len(set(corners)), letter
        areas = [
            sum(a[0] * b[1] - b[0] * a[1] for a, b in zip(loop, (*loop[1:], loop[0]), strict=True)) / 2
            for loop in glyphs.outlines(letter)
        ]
        assert sum(areas) == glyphs.area_cells(letter)
        assert all(area < 0 for area in areas[1:])


def test_gauge_bores_and_plug_measured():
    """Rod 4: bores 4.0 to 4.6 in tenths; hole 8: steps 8.0 to 7.4; the gauge of a printer to find has no growth."""
    found = {d for d, _, _ in cylinders(solid_of(fit_gauge()))}
    assert found == {4.0, 4.1, 4.2, 4.3, 4.4, 4.5, 4.6, 8.0, 7.9, 7.8, 7.7, 7.6, 7.5, 7.4}


@pytest.mark.parametrize("growth_mm", [0.0, 0.03, 0.1, 0.17, 0.2, 0.34, 0.5])
def test_the_number_under_the_first_free_bore_is_the_growth(growth_mm):
    """A printer whose bores come out smaller by g: the first bore that lets the rod through is drawn g to g + step."""
    size = fit_gauge_size()
    first = next(i for i, drawn in enumerate(size.bores_mm) if drawn - growth_mm >= size.rod_diameter_mm - 1e-9)
    assert 0 <= first * size.step_mm - growth_mm + 1e-9 < size.step_mm


def test_gauge_bores_stay_apart_and_the_plug_enters_a_tube():
    size = fit_gauge_size()
    walls = [
        b - a - (p + q) / 2
        for a, b, p, q in zip(size.bore_x_mm, size.bore_x_mm[1:], size.bores_mm, size.bores_mm[1:], strict=False)
    ]
    assert min(walls) >= 3.0
    solid = solid_of(fit_gauge())
    x, y = size.plug_x_mm, size.row_y_mm
    # A tube with 1.5 mm of wall and a hole of exactly 8 mm stops at the step that fills it, not at letters or plate.
    wall = box((x - 10, x + 10), (y - 10, y + 10), (PLATE_MM + 3.2, PLATE_MM + 4.7))
    tube = wall.cut(cylinder(7.9, (x, y, 0.0), (0.0, 0.0, 1.0), 40.0))
    assert shared_mm3(solid, tube) < NOTHING_MM3
    lower = tube.translate(cq.Vector(0.0, 0.0, -2.0))
    assert shared_mm3(solid, lower) > 0.1


def test_two_blocks_set_a_rod_by_its_tip_clear_of_bush_and_keeper():
    """Boom wall at y = 10; a rod of 4 mm stands out 60 mm; the first block's arm is turned up."""
    size, projection_mm = centring_aid_size(), 60.0
    block = solid_of(centring_aid())
    wall = box((-40.0, 40.0), (-10.0, 10.0), (-10.0, 10.0))
    rod = cylinder(4.0, (0.0, -100.0, 0.0), Y, 110.0 + projection_mm)
    flange = solid_of(bush().rotate((0, 0, 0), (1, 0, 0), -90).translate((0, 10, 0)))

    def placed(y_mm, arm):
        where = cq.Plane(origin=(-size.reach_mm, y_mm, 0.0), xDir=arm, normal=(0, 1, 0))
        return block.moved(cq.Location(where))

    first, second = placed(10.0, (0, 0, 1)), placed(10.0 + projection_mm, (1, 0, 0))
    assert first.distance(wall) < TOUCH_MM
    assert shared_mm3(first, wall) < NOTHING_MM3
    assert first.distance(flange) == pytest.approx(1.0, abs=1e-6)
    assert second.distance(rod) < TOUCH_MM
    assert shared_mm3(second, rod) < NOTHING_MM3
    for each in (first, second):
        gauge_rod = cylinder(4.0, (-size.reach_mm, 10.0, 0.0), Y, projection_mm + 30.0)
        assert shared_mm3(each, gauge_rod) < NOTHING_MM3
        assert each.distance(gauge_rod) == pytest.approx(0.15, abs=1e-6)


def test_the_aids_nut_goes_in_and_cannot_turn():
    size, block = centring_aid_size(), solid_of(centring_aid())
    flat = solid_of(nut(thread="M3").rotate((0, 0, 0), (0, 1, 0), 90))
    shared = []
    for angle in (0, 30):
        turned = flat.rotate(cq.Vector(), cq.Vector(1, 0, 0), angle)
        shared.append(shared_mm3(block, turned.translate(cq.Vector(size.nut_x_mm[0] + 0.1, 0.0, size.screw_z_mm))))
    assert min(shared) < NOTHING_MM3
    assert max(shared) > 0.1, "four corners of 6.3 mm in a slot of 5.8 mm"
