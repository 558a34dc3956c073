"""The boom's holes: where they are, what they open, and what they take away."""

import math

import pytest

from fabgen.errors import ProgramError
from fabgen.model.parts import boom as module
from fabgen.model.parts.boom import boom

VOLUME_REL = 1e-9  # planes and cylinders along the axes: the kernel integrates them to rounding error
CURVED_REL = 2e-5  # curves of intersection between two cylinders are approximated by the kernel to about 1e-5 mm


def cylinders(part):
    """(axis point, axis direction, diameter) of every cylindrical face."""
    found = []
    for face in part.val().Faces():
        if face.geomType() == "CYLINDER":
            shape = face._geomAdaptor().Cylinder()
            place, axis = shape.Axis().Location(), shape.Axis().Direction()
            found.append(((place.X(), place.Y(), place.Z()), (axis.X(), axis.Y(), axis.Z()), 2 * shape.Radius()))
    return found


def tube_area(width, height, wall, corner):
    """Area of a tube's section; the inside corner radius is the outside one less the wall, at least 0."""
    inside = max(corner - wall, 0.0)
    outer = width * height - (4 - math.pi) * corner**2
    return outer - ((width - 2 * wall) * (height - 2 * wall) - (4 - math.pi) * inside**2)


def through_round_tube(outside, inside, hole, steps=4000):
    """Volume that a radial drill of diameter `hole` takes from both walls of a round tube.

    For a distance y from the drill's axis its chord is 2√(r² − y²) along the boom, and the walls above it are
    2(√(R² − y²) − √(q² − y²)) high; y = r sin t makes the integrand smooth (midpoint rule).
    """
    r, big, small = hole / 2, outside / 2, inside / 2
    total = 0.0
    for i in range(steps):
        y = r * math.sin((i + 0.5) / steps * math.pi - math.pi / 2)
        high = 2 * (math.sqrt(big**2 - y**2) - (math.sqrt(small**2 - y**2) if small else 0.0))
        total += high * 2 * (r**2 - y**2) * math.pi / steps
    return total


def pair(station, diameter, angle=90.0, across=0.0):
    return ((station, angle, across, diameter), (station, (angle + 180) % 360, across, diameter))


def test_default_is_one_valid_solid_in_its_frame():
    part = boom()
    assert part.val().ShapeType() == "Solid"
    assert part.val().isValid()
    box = part.val().BoundingBox()
    assert (box.xmin, box.xmax) == pytest.approx((0, 260), abs=1e-6)
    assert (box.ymin, box.ymax, box.zmin, box.zmax) == pytest.approx((-10, 10, -10, 10), abs=1e-6)


@pytest.mark.parametrize(
    ("width", "height", "wall", "corner"),
    [(20, 20, 1.5, 1.0), (20, 20, 1.5, 0.0), (30, 20, 2.0, 3.0), (15, 25, 1.0, 1.0)],
)
def test_flat_tube_against_formula(width, height, wall, corner):
    rows = (*pair(40, 8), *pair(90, 4.2, 90, 1.5), (60, 0, -2.0, 3.2), (110, 180, 1.0, 5.0))
    part = boom(width_mm=width, height_mm=height, wall_mm=wall, corner_radius_mm=corner, length_mm=150, holes=rows)
    taken = sum(math.pi / 4 * diameter**2 * wall for _, _, _, diameter in rows)
    assert part.val().isValid()
    assert part.val().Volume() == pytest.approx(tube_area(width, height, wall, corner) * 150 - taken, rel=VOLUME_REL)
    assert len(part.val().Solids()) == 1


def test_holes_stand_where_their_rows_say():
    """Across grows to +z on the ±y walls and to +y on the ±z walls."""
    rows = ((40, 90, 1.5, 8), (60, 270, -2, 6), (80, 0, 3, 4), (100, 180, -3, 5))
    found = sorted(cylinders(boom(corner_radius_mm=0, length_mm=150, holes=rows)))
    expected = [
        ((40, None, 1.5), "y", 8, (8.5, 10)),
        ((60, None, -2), "y", 6, (-10, -8.5)),
        ((80, 3, None), "z", 4, (8.5, 10)),
        ((100, -3, None), "z", 5, (-10, -8.5)),
    ]
    assert len(found) == 4
    for (point, axis, diameter), (place, along, size, _) in zip(found, expected, strict=True):
        assert diameter == pytest.approx(size, abs=1e-9)
        assert abs(axis["xyz".index(along)]) == pytest.approx(1, abs=1e-12)
        for got, want in zip(point, place, strict=True):
            assert want is None or got == pytest.approx(want, abs=1e-9)


def test_a_row_opens_only_its_own_wall():
    """A line along the hole's axis leaves the boom where the wall is open and meets it where it is not."""
    import cadquery as cq

    part = boom(holes=((40, 90, 0, 8), (80, 0, 0, 3)), length_mm=120).val()

    def solid_at(x, y, z):
        return part.isInside(cq.Vector(x, y, z), 1e-6)

    assert not solid_at(40, 9.25, 0)
    assert solid_at(40, -9.25, 0)
    assert not solid_at(80, 0, 9.25)
    assert solid_at(80, 0, -9.25)
    assert solid_at(40, 9.25, 4.1)
    assert not solid_at(40, 9.25, 3.9)


@pytest.mark.parametrize("section", ["square", "rectangular"])
def test_drawn_and_cut_tubes_are_the_same(section, monkeypatch):
    height = 20 if section == "square" else 30
    rows = (*pair(40, 8), *pair(52, 3.3, 0, 4.0), (90, 0, -2, 5), (90, 180, 2, 5), *pair(52, 2, 90, 3))
    asked = {"section": section, "height_mm": height, "length_mm": 130, "holes": rows}
    drawn = boom(**asked)
    monkeypatch.setattr(module, "_apart", lambda rows, length: False)
    cut = boom(**asked)
    assert drawn.val().Volume() == pytest.approx(cut.val().Volume(), rel=1e-12)
    assert drawn.val().Area() == pytest.approx(cut.val().Area(), rel=1e-12)
    assert len(drawn.val().Faces()) == len(cut.val().Faces())
    assert sorted(d for _, _, d in cylinders(drawn)) == pytest.approx(sorted(d for _, _, d in cylinders(cut)))


@pytest.mark.parametrize(
    "rows",
    [
        pytest.param(((40, 90, 6.0, 6.0),), id="reaches into the corner"),
        pytest.param(((40, 90, 0.0, 8.0), (46, 90, 0.0, 8.0)), id="two holes that overlap"),
        pytest.param(((2, 90, 0.0, 8.0),), id="open at the end"),
        pytest.param(((40, 45, 0.0, 8.0),), id="through the edge"),
    ],
)
def test_holes_that_a_wall_cannot_hold_are_cut(rows):
    part = boom(corner_radius_mm=2.0, length_mm=80, holes=rows)
    assert part.val().isValid()
    assert len(part.val().Solids()) == 1
    assert 0 < tube_area(20, 20, 1.5, 2.0) * 80 - part.val().Volume() < len(rows) * 400


@pytest.mark.parametrize(("outside", "wall", "hole"), [(25, 1.5, 8), (20, 0, 5), (30, 2, 12)])
def test_round_boom_against_the_integral(outside, wall, hole):
    part = boom(
        section="round", width_mm=outside, height_mm=outside, wall_mm=wall, corner_radius_mm=0, length_mm=100,
        holes=(*pair(30, hole), *pair(65, hole, 0)),
    )  # fmt: skip
    inside = outside - 2 * wall if wall else 0.0
    plain = math.pi / 4 * (outside**2 - inside**2) * 100
    expected = plain - 2 * through_round_tube(outside, inside, hole)
    assert part.val().isValid()
    assert part.val().Volume() == pytest.approx(expected, rel=CURVED_REL)
    axes = {(round(p[0], 6), tuple(round(abs(c), 6) for c in a)) for p, a, d in cylinders(part) if d == hole}
    assert axes == {(30.0, (0, 1, 0)), (65.0, (0, 0, 1))}


def test_through_hole_in_a_solid_bar_is_one_cylinder():
    part = boom(wall_mm=0, length_mm=100, corner_radius_mm=0, holes=pair(50, 4.2, 0, 1.0))
    assert len(cylinders(part)) == 1
    assert part.val().Volume() == pytest.approx(20 * 20 * 100 - math.pi / 4 * 4.2**2 * 20, rel=VOLUME_REL)


def test_single_row_in_a_solid_bar_stops_at_the_middle():
    part = boom(wall_mm=0, length_mm=100, corner_radius_mm=0, holes=((50, 0, 0.0, 3.0),))
    assert part.val().Volume() == pytest.approx(20 * 20 * 100 - math.pi / 4 * 9 * 10, rel=VOLUME_REL)


def test_any_angle_on_a_round_boom():
    part = boom(
        section="round", width_mm=30, height_mm=30, wall_mm=2, corner_radius_mm=0, length_mm=80,
        holes=((40, 30, 0, 6),),
    )  # fmt: skip
    (found,) = [axis for _, axis, diameter in cylinders(part) if diameter == pytest.approx(6)]
    assert found[1:] == pytest.approx((math.sin(math.radians(30)), math.cos(math.radians(30))))


def test_a_boom_sawn_through_by_its_holes_is_refused():
    """The kernel calls two pieces valid, so they are counted."""
    with pytest.raises(ProgramError, match="2 pieces"):
        boom(length_mm=100, holes=pair(50, 30))


@pytest.mark.parametrize("sizes", [{"wall_mm": 10.0}, {"wall_mm": -1.0}, {"corner_radius_mm": 10.0}])
def test_impossible_sections_are_refused(sizes):
    with pytest.raises(ProgramError, match="a boom of 20"):
        boom(**sizes)


def test_boom_with_320_holes_against_formula():
    rows = [row for i in range(160) for row in pair(30 + 30 * i, 8)]
    part = boom(length_mm=4860, holes=rows)
    assert part.val().Volume() == pytest.approx(
        tube_area(20, 20, 1.5, 1.0) * 4860 - 320 * math.pi * 16 * 1.5, rel=VOLUME_REL
    )
