"""H: holes against ends, each other, walls, drills and what stands on them."""

import pytest


def test_a_hole_near_the_end(found, advice):
    """EN 1993-1-8 Table 3.3 (secondary source): 1.2 d, of 8 mm 9.6; shop rule 2 d: 16.

    D2 stands 10 mm from the front end at station 387: ±0.5 on it and ±0.3 on a boom of 397 mm (ISO 2768-1 m: 0.5 each
    up to 400).
    """
    assert found("hole_to_end") == []
    assert found("hole_to_end", {"boom.overhang.front": 10}) == [("H01", "fail", "D2", 10 - 0.5 - 0.5, 9.6)]
    assert "10.000 mm on the drawing" in advice("hole_to_end", {"boom.overhang.front": 10})
    assert found("hole_to_end", {"boom.overhang.front": 16}) == [("H01", "warn", "D2", 16 - 0.5 - 0.8, 16)]
    assert found("hole_to_end", {"boom.overhang.front": 17.3}) == []
    assert found("hole_to_end", {"boom.overhang.rear": 9.7}) == [("H01", "fail", "R", 9.7 - 0.2, 9.6)]
    assert found("hole_to_end", {"boom.overhang.rear": 16.2}) == []


def test_the_clamps_bolts_are_moved_with_the_clamp(advice):
    """M6 in holes of 6.6: two diameters are 13.2. The plate's bolts stand 27 mm off its middle."""
    text = advice("hole_to_end", {"clamp.at": 37})
    assert text.endswith("move the clamp inwards")
    assert "overhang" not in text


def test_a_hole_past_the_end(found):
    assert found("hole_to_end", {"boom.overhang.front": 3}) == [("H08", "fail", "D2", 3, 4)]
    assert found("hole_to_end", {"boom.overhang.front": 4})[0][0] == "H01"


def test_holes_near_each_other(found):
    """EN 1993-1-8 Table 3.3 (secondary source): 2.2 d, of 8 mm 17.6.

    D1 at station 270 and D2 before 400 are marked from the datum face, each ±0.5 (ISO 2768-1 m, 120 to 400 mm).
    """
    assert found("hole_to_hole") == []
    assert found("hole_to_hole", {"elements.D2.at": 208.5}) == [("H02", "fail", "D1 to D2", 18.5 - 1, 17.6)]
    assert found("hole_to_hole", {"elements.D2.at": 208.6}) == [("H02", "warn", "D1 to D2", 17.6, 24)]
    assert found("hole_to_hole", {"elements.D2.at": 215}) == []


def test_holes_of_one_block_are_marked_from_each_other(made, found):
    """Bond screws 2 mm apart in a tube of 14 x 2 mm: ±0.1 up to 6 mm (ISO 2768-1 m), not what two stations may be off.

    The side walls' inner faces are 10 mm apart and each screw 3 mm from one: 4 mm between the two. 2.2 of 2.5 is 5.5.
    """
    screwed = {"style": "bonded-through", "bond": "wall-screws", "allowance": {"origin": "none"}}
    changes = {"mounts.line": screwed, "boom.outside": 14, "boom.wall": 2, "boom.corner_radius": 0, "clamp": None}
    rows = [(severity, measured, required) for _, severity, _, measured, required in found("hole_to_hole", changes)]
    assert ("fail", 3.9, 5.5) in rows


def test_round_booms_are_measured_along_the_surface(found, on_top):
    """A quarter turn from D1's hole of 8 mm to D2's tapped hole of 2.5 on the crown, at one station.

    π/4 × 20 = 15.708 less 0.2 is under 3 × 5.25 = 15.75, π/4 × 22 is not.
    """
    changes = {"mounts.above": on_top, "elements.D2.mount": "above", "elements.D1.mount": "line"}
    changes |= {"boom.section": "round", "boom.corner_radius": None, "elements.R.mount": "line"}
    changes |= {"elements.D2.at": 199.29, "boom.outside": 20, "clamp": None}
    ((code, severity, where, measured, required),) = found("hole_to_hole", changes)
    assert (code, severity, required) == ("H02", "warn", 15.75)
    assert "saddle screw" in where
    assert measured == pytest.approx(15.508, abs=0.005)
    assert found("hole_to_hole", changes | {"boom.outside": 22}) == []


def test_unequal_holes_count_by_their_mean(found, on_top):
    """Two saddles 20 mm apart: screw of one 2 mm from the screw of the other, both 2.5 mm."""
    changes = {"mounts.line": on_top, "elements.D2.at": 210, "clamp": None}
    ((code, severity, _, _, required),) = found("hole_to_hole", changes)
    assert (code, severity, required) == ("H02", "fail", 2.2 * 2.5)


@pytest.mark.parametrize(
    ("outside_mm", "expected"),
    [
        # flat beside the hole: half the side, less the wall or the corner's radius, less half the hole
        (10, [("H04", "fail", "R, D1, D2", -0.5, 0)]),
        # at the worst 0.1 off the middle (ISO 2768-1 m, 3 to 6 mm) and 0.15 too large (ISO 286-1 IT12, 6 to 10 mm)
        (12, [("H03", "fail", "R, D1, D2", 0.5 - 0.1 - 0.075, 1.5)]),
        (15, [("H03", "warn", "R, D1, D2", 7.5 - 0.2, 9.6)]),
        (20, []),
    ],
)
def test_wall_beside_a_hole(found, outside_mm, expected):
    """EN 1993-1-8 Table 3.3 (secondary source): 1.2 d, of 8 mm 9.6."""
    assert found("hole_in_wall", {"boom.outside": outside_mm, "clamp": None}) == expected


def test_the_net_section_is_told(advice):
    """15 x 15 x 1.5, corners 1 mm, 8 mm through both side walls: 24 of 80.1 mm² and 1098 of 2445 mm⁴ are gone."""
    text = advice("hole_in_wall", {"boom.outside": 15, "clamp": None})
    assert "keeps 70% of the metal and at least 55% of the bending strength" in text


def test_wall_beside_a_hole_in_a_round_tube(found):
    """Tube 14 x 1.5: bore 11, (11 − 8)/2 = 1.5 beside the hole; 0.2 off the middle and 0.15 too large leave 1.225."""
    changes = {"boom.section": "round", "boom.corner_radius": None, "clamp": None}
    assert found("hole_in_wall", changes | {"boom.outside": 14}) == [("H03", "fail", "R, D1, D2", 1.225, 1.5)]
    assert found("hole_in_wall", changes | {"boom.outside": 20}) == []


def test_a_large_corner_counts(found):
    assert found("hole_in_wall", {"boom.corner_radius": 6.1, "clamp": None}) == [("H04", "fail", "R, D1, D2", -0.1, 0)]


def test_a_solid_bar_has_no_wall_to_lose(found):
    """An 8 mm hole leaves 1 mm beside it in a bar of 10 mm: below 1.2 d it warns."""
    changes = {"boom.outside": 10, "boom.wall": None, "boom.corner_radius": 0, "clamp": None}
    assert found("hole_in_wall", changes) == [("H03", "warn", "R, D1, D2", 4.9, 9.6)]


def test_drills(found, advice):
    """Metric drills grow by 0.25 mm above 14 mm (BS 328, secondary source); half of IT12 is 0.09 mm there."""
    assert found("drill_sizes") == []
    odd = {"boom.outside": 40, "mounts.line.hole": 14.1, "clamp": None}
    assert found("drill_sizes", odd) == [("H05", "warn", "R, D1, D2", 14.1, 14)]
    assert "14 mm" in advice("drill_sizes", odd)
    near = odd | {"mounts.line.hole": 14.08}
    assert found("drill_sizes", near) == [("H05", "note", "R, D1, D2", 14.08, 14)]
    assert found("drill_sizes", odd | {"mounts.line.hole": 14.2}) == []
    large = {"boom.outside": 60, "mounts.line.hole": 30, "clamp": None}
    assert found("drill_sizes", large) == [("H05", "warn", "R, D1, D2", 30, 25)]
    assert "hole saw" in advice("drill_sizes", large)


def test_inch_drills(found, advice):
    """5/16 in is 7.9375 mm and the letter O 8.026: near enough to 8, and larger. M3 is tapped 2.5, No. 40 is 2.489."""
    screws = ("H05", "note", "DE feed screw H04, DE feed screw H05", 2.5, 2.489)
    assert found("drill_sizes", {"shop.drills": "inch"}) == [screws]
    assert "No. 40 (2.489 mm), 0.011 mm smaller than the hole" in advice("drill_sizes", {"shop.drills": "inch"})


def test_a_drill_smaller_than_its_hole_is_told_and_a_larger_one_is_not(found):
    """Letter N is 7.671 mm, IT12 of 7.7 mm is 0.150: 0.029 mm too small is a note, 0.006 mm too large is none.

    From 7.671, the nearest three decimals to 0.302 in (7.6708 mm), nothing is told: the rounding is not the shop's.
    """
    for hole_mm, told in (
        (7.7, [("H05", "note", "R, D1, D2", 7.7, 7.671)]),
        (7.665, []),
        (7.671, []),
    ):
        rods = found("drill_sizes", {"shop.drills": "inch", "mounts.line.hole": hole_mm})
        assert [each for each in rods if each[2] == "R, D1, D2"] == told


def test_a_hole_under_the_clamp(found):
    """The plate is wider than the hole of D1 at station 270, which lies under it whole: 8 mm."""
    assert found("hole_under_part") == []
    assert found("hole_under_part", {"clamp.at": 270}) == [("H06", "fail", "D1", 8, 0)]


def test_a_hole_beside_the_clamp_only_weakens(found, on_top):
    """Screws of a saddle stand in the top wall, the plate on the side."""
    changes = {"mounts.line": on_top, "clamp.at": 270}
    assert [(code, severity) for code, severity, *_ in found("hole_under_part", changes)] == [("H06", "warn")]


def test_a_hole_under_a_foreign_block(found, made, on_top):
    changes = {"mounts.line": on_top, "elements.D1.at": 150, "clamp": None}
    screws = [hole for hole in made(changes).holes if hole.element in ("DE", "D1")]
    reported = {where for code, _, where, *_ in found("hole_under_part", changes) for where in where.split(", ")}
    assert reported
    assert reported <= {f"{hole.element} {hole.purpose} {hole.number}" for hole in screws}
    assert {code for code, *_ in found("hole_under_part", changes)} == {"H07"}
    assert found("hole_under_part", {"mounts.line": on_top, "clamp": None}) == []
