"""F: parts that cannot be made, fits, keepers, insulators, what carries the load, screws, flanges, ends."""

import math

import pytest

from fabgen.check.pairs import near_pairs
from fabgen.model.confirm import confirm


def test_a_part_that_cannot_be_made(found):
    assert found("parts_that_cannot_be_made") == []
    ((code, severity, where, *_),) = found("parts_that_cannot_be_made", {"feed.height": 5})
    assert (code, severity, where) == ("F01", "fail", "DE")
    too_wide = {"boom.section": "round", "boom.corner_radius": None, "mounts.line.bush.flange": 20.5}
    assert found("parts_that_cannot_be_made", too_wide) == [("F01", "fail", "R, D1, D2", None, None)]


@pytest.mark.parametrize(
    ("bore_mm", "expected"),
    [
        (4.0, [("F02", "fail", "R, D1, D2", 0, 0)]),
        (4.05, [("F02", "warn", "R, D1, D2", 0.05, 0.1)]),
        (4.1, []),
        (4.6, []),
        (4.7, [("F02", "warn", "R, D1, D2", 0.7, 0.6)]),
        (None, []),
    ],
)
def test_bore_on_rod(found, on_top, bore_mm, expected):
    assert found("bore_on_rod", {"mounts.line.bush.bore": bore_mm}) == expected
    assert found("bore_on_rod", {"mounts.line": on_top, "mounts.line.saddle.bore": bore_mm}) == expected


@pytest.mark.parametrize(
    ("spigot_mm", "expected"),
    [
        (8.0, [("F03", "fail", "R, D1, D2", 0, 0)]),
        (7.95, [("F03", "warn", "R, D1, D2", 0.05, 0.1)]),
        (7.9, []),
        (7.3, [("F03", "warn", "R, D1, D2", 0.7, 0.6)]),
        (None, []),
    ],
)
def test_spigot_in_hole(found, spigot_mm, expected):
    assert found("spigot_in_hole", {"mounts.line.bush.spigot": spigot_mm}) == expected


def test_wall_of_a_spigot(found, advice):
    """Hole 6.6, spigot 6.4, bore 4.2: 1.1 mm; the fits ask for 1.2. What is advised is never too small a hole."""
    assert found("spigot_in_hole", {"mounts.line.hole": 6.6}) == [("F04", "warn", "R, D1, D2", 1.1, 1.2)]
    assert found("spigot_in_hole", {"mounts.line.hole": 6.8}) == []
    assert "drill the hole 6.8 mm or more" in advice("spigot_in_hole", {"mounts.line.hole": 6.6})
    assert "drill the hole 6.9 mm or more" in advice(
        "spigot_in_hole", {"mounts.line.hole": 6.6, "mounts.line.bush.bore": 4.22}
    )


def test_length_of_a_spigot(found):
    """Flat wall 1.5 mm. Tube 20 x 1.5, hole 8: 10 − √(8.5² − 4²) = 2.5 mm down from the crown."""
    assert found("spigot_in_hole", {"mounts.line.bush.spigot_length": 1.4}) == [("F05", "warn", "R, D1, D2", 1.4, 1.5)]
    assert found("spigot_in_hole", {"mounts.line.bush.spigot_length": 1.5}) == []
    tube = {"boom.section": "round", "boom.corner_radius": None}
    short = found("spigot_in_hole", tube | {"mounts.line.bush.spigot_length": 2.4})
    assert short == [("F05", "warn", "R, D1, D2", 2.4, 2.5)]
    assert found("spigot_in_hole", tube) == []


@pytest.mark.parametrize(
    ("length_mm", "expected"),
    [
        # 20 mm less two spigots, less two times the 0.3 mm that a print may be off
        (10.1, [("F06", "fail", "R, D1, D2", -0.8, 0)]),
        (10, [("F06", "fail", "R, D1, D2", -0.6, 0)]),
        (9.9, [("F06", "warn", "R, D1, D2", -0.4, 0)]),
        (9.8, [("F06", "warn", "R, D1, D2", -0.2, 0)]),
        (9.7, []),
        (None, []),
    ],
)
def test_bushes_that_meet(found, length_mm, expected):
    assert found("bushes_meet", {"mounts.line.bush.spigot_length": length_mm}) == expected


def test_a_sleeve_meets_nothing(found):
    assert found("bushes_meet", {"mounts.line.bush.kind": "sleeve"}) == []


def strain_percent(rod_mm, bore_mm, outside_mm):
    """Thick curved bar (Winkler and Bach, from memory): ε = n r / ((n + r − i) i) − 1 at the inner surface."""
    inner, outer, rod = bore_mm / 2, outside_mm / 2, rod_mm / 2
    neutral = (outer - inner) / math.log(outer / inner)
    return 100 * (neutral * rod / ((neutral + rod - inner) * inner) - 1)


def test_grip_of_a_keeper(found):
    keeper = {"mounts.line.keeper": {"bore": 3.7, "outside": 11}}
    strained = round(strain_percent(4, 3.7, 11), 3)
    assert found("keeper_grip", keeper) == [("F07", "warn", "R, D1, D2", strained, 2)]
    cracked = round(strain_percent(4, 3.5, 11), 3)
    assert cracked > 5
    tight = {"mounts.line.keeper": {"bore": 3.5, "outside": 11}}
    assert found("keeper_grip", tight) == [("F07", "fail", "R, D1, D2", cracked, 2)]
    assert strain_percent(4, 3.7, 6.5) < 2
    assert found("keeper_grip", {"mounts.line.keeper": {"bore": 3.7, "outside": 6.5}}) == []
    assert found("keeper_grip") == []


def test_a_keeper_that_grips_nothing(found):
    assert found("keeper_grip", {"mounts.line.keeper": {"bore": 4.0, "outside": 7}}) == [
        ("F17", "fail", "R, D1, D2", 0, 0)
    ]


def test_a_thick_clip_is_strained_by_its_mouth(found):
    clip = {"kind": "snap", "outside": 10}
    ((code, severity, _, percent, limit),) = found("keeper_grip", {"mounts.line.keeper": clip})
    assert (code, severity, limit) == ("F07", "warn", 2)
    assert percent > strain_percent(4, 3.8, 10)
    thin = {"kind": "snap", "outside": 6.4}
    assert found("keeper_grip", {"mounts.line.keeper": thin}) == []


WOOD = {
    "boom.material": "spruce",
    "boom.wall": None,
    "boom.corner_radius": None,
    "mounts.line": {"style": "through-nonmetal", "hole": 4.1},
    "clamp": None,
}


def test_a_keeper_that_slips_through(found):
    """Hole 4.1 drilled up to IT12 = 0.12 too large: 4.22. On a bush only the bore counts, 4.2."""
    assert found("keeper_stop", WOOD | {"mounts.line.keeper": {"outside": 4.3}}) == [
        ("F08", "fail", "R, D1, D2", 4.3, 4.32)
    ]
    assert found("keeper_stop", WOOD | {"mounts.line.keeper": {"outside": 6.2}}) == [
        ("F08", "warn", "R, D1, D2", 6.2, 6.22)
    ]
    assert found("keeper_stop", WOOD | {"mounts.line.keeper": {"outside": 6.3}}) == []
    assert found("keeper_stop", {"mounts.line.keeper": {"outside": 4.25}}) == [("F08", "fail", "R, D1, D2", 4.25, 4.3)]
    assert found("keeper_stop") == []


def test_a_middle_screw_ends_above_what_lies_under_it(made, found):
    """8 mm hole in a solid bar: room √(4² − 1²) = 3.873 mm below the axis.

    A bar of 13 asks for 6.5 + 1.2, M2 × 8, which ends 1.5 mm below it; one of 20 for 12, 2 mm; one of 30 for 20, 5 mm.
    """
    held = {"mounts.line.hold": "middle-screw", "mounts.line.bush": {"spigot_length": 3}, "boom.wall": None}
    for size, refused in ((13, False), (20, False), (30, True)):
        here = [each for each in found("parts_that_cannot_be_made", held | {"boom.outside": size}) if each[2] != "DE"]
        assert here == ([("F01", "fail", "R, D1, D2", None, None)] if refused else []), size
    assert confirm(near_pairs(made(held | {"boom.outside": 20}))) > 0


def test_a_sleeves_right_hand_keeper_stops_on_the_boom(made, found, advice):
    """Its only flange is on the left. Hole 8 drilled up to IT12 = 0.15 too large: a keeper of 8.2 may slip in."""
    sleeve = {"mounts.line.bush.kind": "sleeve"}
    assert found("keeper_stop", sleeve | {"mounts.line.keeper.outside": 8.2}) == [
        ("F08", "fail", "R, D1, D2", 8.2, 8.25)
    ]
    assert found("keeper_stop", sleeve | {"mounts.line.keeper.outside": 10.1}) == [
        ("F08", "warn", "R, D1, D2", 10.1, 10.15)
    ]
    assert found("keeper_stop", sleeve | {"mounts.line.keeper.outside": 10.2}) == []
    assert "no flange stands on the right" in advice("keeper_stop", sleeve | {"mounts.line.keeper.outside": 8.2})
    advised = sleeve | {"mounts.line.keeper.outside": 10.2, "mounts.line.keeper.bore": 3.9}
    assert found("keeper_stop", advised) == found("keeper_grip", advised) == []
    assert found("keeper_stop", sleeve) == found("keeper_grip", sleeve) == [], "what the program chooses holds"
    for keeper, expected in (({}, {"D1", "boom"}), ({"mounts.line.keeper.outside": 6.5}, {"D1"})):
        meetings = made(sleeve | keeper).interfaces
        assert {meeting.second for meeting in meetings if meeting.first == "D1 keeper right"} == expected


def test_a_keeper_over_the_tip(found):
    """Half boom 10, flange 3, half the play 0.15, keeper 5: 18.15 mm to the side."""
    short = {"lengths_are": "as-cut", "elements.D2.length": 36}
    assert found("keeper_stop", short) == [("F15", "fail", "D2", 18, 18.15)]
    assert found("keeper_stop", short | {"elements.D2.length": 36.5}) == []


@pytest.mark.parametrize(
    ("path", "where"),
    [("mounts.line.bush", "R, D1, D2"), ("mounts.line.keeper", "R, D1, D2"), ("feed", "DE")],
)
def test_a_conductive_insulator(found, path, where):
    findings = found("insulators", {f"{path}.material": "PETG-CF"})
    assert {finding[:3] for finding in findings} == {("F09", "fail", where)}
    assert found("insulators", {f"{path}.material": "PETG"}) == []


def test_a_conductive_saddle(found, on_top):
    changes = {"mounts.line": on_top, "mounts.line.saddle.material": "PA12-CF"}
    assert found("insulators", changes) == [("F09", "fail", "R, D1, D2", None, None)]


@pytest.mark.parametrize("material", ["PETG", "GRP", "oak"])
def test_a_clamp_that_is_no_metal(found, material):
    assert found("load_path", {"clamp.material": material}) == [("F10", "fail", "clamp plate", None, None)]


def test_what_may_carry_the_array(found):
    assert found("load_path") == []
    assert found("load_path", WOOD) == []
    assert found("load_path", WOOD | {"boom.material": "ASA"}) == [("F10", "fail", "boom", None, None)]


def flat_boom(height_mm, wall_mm):
    boom = {"boom.section": "rectangular", "boom.outside": [20, height_mm], "boom.wall": wall_mm}
    return boom | {"boom.corner_radius": 0, "clamp": None}


def test_a_screw_at_the_opposite_wall(found, on_top):
    """Hold-down screws reach 3.5 mm below the boom's top."""
    top = {"mounts.line": on_top}
    assert found("screw_reach", top | flat_boom(5.7, 1.2)) == []
    assert found("screw_reach", top | flat_boom(5.0, 1.2)) == [("F11", "warn", "R…D2", 0.3, 1)]
    assert found("screw_reach", top | flat_boom(4.5, 1.2)) == [("F11", "fail", "R…D2", -0.2, 0)]


def test_a_screw_in_a_rod_below(found, on_top):
    """Boom 6 mm high: the tips end 0.5 mm below the axis, the rod's top is 2 mm above it."""
    low = {
        "mounts.above": on_top,
        "elements.D1.mount": "above",
        "elements.D2.mount": "line",
        "elements.R.mount": "line",
    }
    low |= flat_boom(6, 1) | {"mounts.line.hole": 4.1, "mounts.line.bush.spigot": 4.05, "mounts.line.bush.bore": 4.01}
    low |= {"mounts.line": {"style": "bonded-through", "bond": "weld", "allowance": {"origin": "none"}}}
    assert ("F11", "fail", "D1", -2.5, 0) in found("screw_reach", low | {"elements.D2.at": 199})
    assert found("screw_reach", low) == []


def test_turns_of_thread(found):
    """M3 has a pitch of 0.5 mm (ISO 261, from memory): 1.6 turns in 0.8 mm."""
    assert found("screw_reach", {"boom.wall": 0.8}) == [("F12", "warn", "DE", 1.6, 2)]
    assert found("screw_reach", {"boom.wall": 1.0}) == []


def test_a_flange_wider_than_its_flat(found):
    assert found("flange_on_wall", {"mounts.line.bush.flange": 18}) == []
    assert found("flange_on_wall", {"mounts.line.bush.flange": 18.5}) == [("F13", "warn", "R, D1, D2", 18.5, 18)]
    tube = {"boom.section": "round", "boom.corner_radius": None, "mounts.line.bush.flange": 18.5}
    assert found("flange_on_wall", tube) == []


def test_parts_over_the_end(found, made, on_top):
    half_mm = made().clamp_width_mm / 2
    assert found("over_the_end") == []
    assert found("over_the_end", {"clamp.at": 20}) == [("F14", "fail", "clamp plate", half_mm - 20, 0)]
    short = {"mounts.line": on_top, "boom.overhang.front": 5, "clamp": None}
    arranged = made(short)
    base = arranged.part("D2 saddle").shapes[0]
    over_mm = round(base.high[0] - arranged.design.boom.length_mm, 3)
    assert over_mm > 5
    assert found("over_the_end", short) == [("F14", "warn", "D2", over_mm, 0)]


def bonded(bond, hole_mm):
    return {"mounts.line": {"style": "bonded-through", "hole": hole_mm, "bond": bond, "allowance": {"origin": "none"}}}


@pytest.mark.parametrize(
    ("bond", "hole_mm", "expected"),
    [
        ("weld", 4.05, []),
        ("press", 4.18, []),
        ("weld", 4.2, [("F16", "warn", "R, D1, D2", 0.32, 0.3)]),
        # 0.2 of play and IT12 = 0.12 of drilling
        ("press", 4.2, [("F16", "warn", "R, D1, D2", 0.32, 0.3)]),
        ("wall-screws", 4.3, []),
    ],
)
def test_a_bonded_rod_in_its_hole(found, bond, hole_mm, expected):
    assert found("rod_in_hole", bonded(bond, hole_mm)) == expected


def test_a_rod_through_wood_may_be_loose(found):
    assert found("rod_in_hole", WOOD | {"mounts.line.hole": 4.5}) == []
