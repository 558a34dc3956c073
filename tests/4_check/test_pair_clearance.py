"""Near pairs: declared, apart, too near, or an error of the program."""

import dataclasses
import math
from collections.abc import Callable

import pytest
from hypothesis import given
from hypothesis import strategies as st

from fabgen.arrange.arrange import arrange
from fabgen.check.pairs import near_pairs, too_near
from fabgen.check.rules.over_the_end import findings as over_the_end
from fabgen.check.rules.pair_clearance import findings
from fabgen.correct.ledger import correct
from fabgen.design.arranged import Arranged, Box, Cylinder, Shape
from fabgen.design.design import Design
from fabgen.design.distances import distance_mm
from fabgen.errors import ProgramError

Variant = Callable[..., Design]


def arranged(design: Design) -> Arranged:
    return arrange(design, correct(design))


def test_a_clear_design_has_only_interfaces_and_distances_over_their_limits(variant: Variant) -> None:
    found = arranged(variant())
    pairs = list(near_pairs(found))
    assert len(pairs) > 100
    assert all(pair.interface or pair.distance_mm >= pair.limit_mm for pair in pairs)
    assert list(findings(found)) == []


def test_flanges_of_neighbours_need_room_for_a_tool(variant: Variant) -> None:
    """Flanges of 12 mm on rods 13 mm apart leave 1 mm, the limit; on rods 12.5 mm apart half of it."""
    assert not [f for f in findings(arranged(variant(("at: 307,", "at: 203,")))) if f.code == "C10"]
    seen = [f for f in findings(arranged(variant(("at: 307,", "at: 202.5,")))) if f.code == "C10"]
    assert {(f.measured, f.required) for f in seen} == {(0.5, 1.0)}
    assert "D1 bush left / D2 bush left" in {f.where for f in seen}


def test_a_rod_above_the_boom_hits_the_feed_block(variant: Variant) -> None:
    found = arranged(variant(("at: 560,", "at: 350,"), base="meter-reading-169.yaml"))
    codes = {(f.code, f.severity) for f in findings(found)}
    assert ("C10", "fail") in codes


def test_the_mast_among_the_rods_is_too_near(variant: Variant) -> None:
    found = arranged(variant(("clamp: {at: balance", "clamp: {at: 803 mm")))
    seen = {f.code: f for f in findings(found)}
    assert seen["C11"].measured == 0.0
    assert seen["C11"].required == 5.0
    assert "C10" in seen


def test_metal_near_a_tip_is_named_with_its_distance(variant: Variant) -> None:
    """With a tip clearance of 200 mm the clamp, 143 mm across the boom from D5's tip and 50 mm along, is too near."""
    found = arranged(variant(("clamp: {at: balance", "clearance: {tip: 200 mm}\nclamp: {at: balance")))
    seen = [f for f in findings(found) if f.code == "C12"]
    assert seen
    assert all(f.measured is not None and f.measured < 200.0 for f in seen)


def test_a_bent_rod_is_no_foreign_metal_at_a_directors_tip(variant: Variant) -> None:
    """It is a rod of the model, like a straight one: with a clearance of 80 mm D1's tips, 59 mm off, are let be."""
    folded = ("kind: straight-dipole", "kind: folded-dipole, spacing: 30 mm")
    wide = ("clamp: {at: balance", "clearance: {tip: 80 mm}\nclamp: {at: balance")
    assert [f for f in findings(arranged(variant(folded, wide))) if f.code == "C12"] == []


def test_a_pair_that_nobody_declared_is_an_error_of_the_program(variant: Variant) -> None:
    found = arranged(variant())
    plate = found.part("clamp plate")
    intruder = dataclasses.replace(found.part("D5"), name="D5 copy", owner="clamp", shapes=plate.shapes)
    with pytest.raises(ProgramError, match="nobody declared"):
        list(too_near(dataclasses.replace(found, placed=(*found.placed, intruder))))
    stranger = dataclasses.replace(intruder, part="turnbuckle")
    with pytest.raises(ProgramError, match="turnbuckle"):
        list(too_near(dataclasses.replace(found, placed=(*found.placed, stranger))))


def test_distances_by_hand() -> None:
    unit = Box((0.0, 0.0, 0.0), (1.0, 1.0, 1.0))
    assert distance_mm(unit, Box((4.0, 5.0, 0.5), (6.0, 6.0, 0.6))) == 5.0
    along_x = Cylinder("x", (10.0, 0.0, 0.0), 4.0, 10.0)
    assert distance_mm(along_x, Cylinder("x", (10.0, 6.0, 8.0), 2.0, 4.0)) == 10.0 - 3.0
    assert distance_mm(along_x, Cylinder("x", (22.0, 0.0, 0.0), 4.0, 6.0)) == 4.0
    assert distance_mm(along_x, Box((10.0, 5.0, 6.0), (11.0, 7.0, 7.0))) == pytest.approx(math.hypot(5, 6) - 2)
    ring = Cylinder("x", (10.0, 0.0, 0.0), 10.0, 2.0, bore_mm=6.0)
    assert distance_mm(ring, along_x) == 1.0
    assert distance_mm(along_x, Cylinder("y", (10.0, 0.0, 9.0), 2.0, 50.0)) == 9.0 - 2.0 - 1.0


PLACES = st.floats(-20.0, 20.0).map(lambda x: round(x, 3))
SIZES = st.floats(0.5, 10.0).map(lambda x: round(x, 3))


@st.composite
def shapes(draw: st.DrawFn) -> Shape:
    x, y, z = draw(PLACES), draw(PLACES), draw(PLACES)
    if draw(st.booleans()):
        return Box((x, y, z), (x + draw(SIZES), y + draw(SIZES), z + draw(SIZES)))
    return Cylinder(draw(st.sampled_from(["x", "y", "z"])), (x, y, z), draw(SIZES), draw(SIZES))


def points(shape: Shape) -> list[tuple[float, float, float]]:
    """Points of a shape, its surface among them."""
    if isinstance(shape, Box):
        steps = (0.0, 0.25, 0.5, 0.75, 1.0)
        sides = [[a + (b - a) * s for s in steps] for a, b in zip(shape.low, shape.high, strict=True)]
        return [(x, y, z) for x in sides[0] for y in sides[1] for z in sides[2]]
    found = []
    order = {"x": (0, 1, 2), "y": (1, 2, 0), "z": (2, 0, 1)}[shape.axis]
    for turn in range(16):
        for reach in (0.0, shape.diameter_mm / 2):
            for along in (-0.5, -0.25, 0.0, 0.25, 0.5):
                point = list(shape.centre)
                point[order[0]] += along * shape.length_mm
                point[order[1]] += reach * math.cos(math.tau * turn / 16)
                point[order[2]] += reach * math.sin(math.tau * turn / 16)
                found.append((point[0], point[1], point[2]))
    return found


@given(shapes(), shapes())
def test_a_distance_is_symmetric_and_never_more_than_between_two_points(first: Shape, second: Shape) -> None:
    apart = distance_mm(first, second)
    assert apart == distance_mm(second, first)
    assert apart <= min(math.dist(p, q) for p in points(first)[::3] for q in points(second)[::3]) + 1e-9


@pytest.mark.parametrize("far", [(0.0, 13.0, 0.0), (9.0, 9.0, 9.0), (500.0, 0.0, 0.0)])
def test_parts_that_are_to_meet_are_never_left_out(variant: Variant, far: tuple[float, float, float]) -> None:
    """A keeper away from its place: its pairs are given to the kernel, or are an error of the program at once.

    13 mm beside it and 9 mm along each axis, 15.6 mm, are both beyond the search range of 12 mm.
    """
    found = arranged(variant())
    pushed = _pushed(found, "D1 keeper left", far)
    if max(far) == 9.0:
        given = {pair.interface: pair.distance_mm for pair in near_pairs(pushed) if pair.interface}
        assert set(given) == set(found.interfaces)
    else:
        with pytest.raises(
            ProgramError, match=r"D1 keeper left and D1.* are to meet by 'keeper on .*', and are far apart"
        ):
            list(near_pairs(pushed))


@pytest.mark.parametrize("at_mm", [10.0, 22.0, 34.0])
def test_a_bow_beyond_the_booms_end_is_the_designs_mistake(variant: Variant, at_mm: float) -> None:
    """The clamp has its finding; a stamped package is made all the same, so no error of the program."""
    design = variant(("clamp: {at: 55 mm", f"clamp: {{at: {at_mm} mm"), base="valley-television-637.yaml")
    found = arranged(design)
    assert [f.code for f in over_the_end(found) if f.severity == "fail"] == ["F14"]
    left = set(found.interfaces) - {pair.interface for pair in near_pairs(found)}
    assert {(i.first, i.kind) for i in left} == {("boom U-bolt 1", "bow on boom")}


def test_a_bent_rod_shorter_than_its_saddle_is_told(variant: Variant) -> None:
    """A gap of 86 mm makes the saddle 103 mm wide; limbs 99 mm apart in 202 mm are straight for 99 mm."""
    wide = ("spacing: 24 mm, gap: 8 mm", "spacing: 99 mm, gap: 86 mm")
    (said,) = (remark for _, remark in arranged(variant(wide, base="valley-television-637.yaml")).remarks)
    assert said.code == "F01"
    assert "saddle is 103.05 mm wide, its limbs are straight for only 99 mm" in said.text


def _pushed(found: Arranged, name: str, far: tuple[float, float, float]) -> Arranged:
    part = found.part(name)
    (ring,) = part.shapes
    assert isinstance(ring, Cylinder)
    x, y, z = (c + f for c, f in zip(ring.centre, far, strict=True))
    moved = dataclasses.replace(part, shapes=(dataclasses.replace(ring, centre=(x, y, z)),))
    return dataclasses.replace(found, placed=tuple(moved if p is part else p for p in found.placed))
