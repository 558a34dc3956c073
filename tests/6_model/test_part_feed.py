"""The two feeds put together from their parts: everything reaches its place, only the gripped cable is squeezed."""

import functools
import itertools
import math

import pytest

from fabgen.design import feed_layout as layout
from fabgen.design import folded_saddle_sizes as sizes
from fabgen.design.part_fasteners import fastener
from fabgen.design.part_geometry import hexagon_corners_mm
from fabgen.design.part_sizes import feed_block_size, folded_saddle_size, nut_size
from fabgen.design.top_block import TAG_MM
from fabgen.model.kernel import cq, solid_of
from fabgen.model.parts.feed_block import feed_block
from fabgen.model.parts.feed_lid import feed_lid
from fabgen.model.parts.folded_rod import folded_rod
from fabgen.model.parts.folded_saddle import folded_saddle
from fabgen.model.parts.nut import nut
from fabgen.model.parts.rod import rod
from fabgen.model.parts.screw import screw
from fabgen.model.parts.washer import washer

NONE_MM3 = 1e-6
FORWARD = (((0, 1, 0), 90),)
STRAIGHT = [
    {},
    {"boom_width_mm": 25.0, "boom_diameter_mm": 25.0},
    {"rod_diameter_mm": 8.0, "height_mm": 25.0, "boom_width_mm": 30.0, "cable_mm": 10.0, "hole_growth_mm": 0.2},
    {"rod_diameter_mm": 6.0, "gap_mm": 20.0, "boom_width_mm": 50.0, "boom_diameter_mm": 50.0},
    {"rod_diameter_mm": 3.0, "gap_mm": 4.0, "boom_width_mm": 12.0, "cable_mm": 3.0, "height_mm": 14.0},
]
FOLDED = [
    {},
    {"boom_width_mm": 25.0, "boom_diameter_mm": 25.0},
    {"rod_diameter_mm": 8.0, "spacing_mm": 50.0, "height_mm": 20.0, "boom_width_mm": 30.0, "hole_growth_mm": 0.2},
    {"rod_diameter_mm": 3.0, "spacing_mm": 15.0, "gap_mm": 4.0, "boom_width_mm": 12.0, "height_mm": 13.0},
]


def cases(table):
    """The default in the quick suite, the others in the slow one."""
    return [case if case == 0 else pytest.param(case, marks=pytest.mark.slow) for case in range(len(table))]


def at(part, x, y, z, turns=()):
    solid = solid_of(part)
    for axis, angle in turns:
        solid = solid.rotate(cq.Vector(0, 0, 0), cq.Vector(*axis), angle)
    return solid.translate(cq.Vector(x, y, z))


def shared_mm3(first, second):
    return first.intersect(second).Volume()


def column(diameter, x, y, low, high):
    return cq.Solid.makeCylinder(diameter / 2, high - low, cq.Vector(x, y, low))


def boom(size):
    """The boom under the block, holes for its screws left out."""
    if size.boom_diameter_mm:
        radius = size.boom_diameter_mm / 2
        return cq.Solid.makeCylinder(radius, 200, cq.Vector(-100, 0, -radius), cq.Vector(1, 0, 0))
    width = size.boom_width_mm
    return cq.Solid.makeBox(200, width, 20, cq.Vector(-100, -width / 2, -20))


@functools.cache
def straight_parts(case):
    given = STRAIGHT[case]
    size = feed_block_size(**given)
    length = 150.0
    found = {"block": solid_of(feed_block(**given)), "lid": solid_of(feed_lid(**given)), "boom": boom(size)}
    for side, name in ((1, "left"), (-1, "right")):
        half_rod = rod(
            diameter_mm=size.rod_diameter_mm,
            length_mm=length,
            cross_hole_mm=size.rod_hole_mm,
            cross_hole_z_mm=-(length / 2 - size.rod_hole_from_end_mm),
        )
        # Local z turned to ±y, local x upright.
        turns = [((0, 1, 0), 90), ((0, 0, 1), 90 * side)]
        found[f"rod {name}"] = at(half_rod, 0, side * (size.gap_mm / 2 + length / 2), size.height_mm, turns)
        bolt = screw(thread=size.terminal, length_mm=size.terminal_length_mm)
        y = side * size.terminal_y_mm
        found[f"terminal {name}"] = at(bolt, 0, y, size.terminal_head_mm)
        low = size.trap_top_mm - nut_size(thread=size.terminal).height_mm
        found[f"nut {name}"] = at(nut(thread=size.terminal), 0, y, low)
    return size, found


@pytest.mark.parametrize("case", cases(STRAIGHT))
def test_straight_feed_goes_together(case):
    size, parts = straight_parts(case)
    for (a, first), (b, second) in itertools.combinations(parts.items(), 2):
        pair = f"{a} / {b}"
        room = shared_mm3(first, second)
        if "nut" in pair and "terminal" in pair and a.split()[-1] == b.split()[-1]:
            continue  # thread in thread: both are drawn at the thread's diameter and share a face
        assert room < NONE_MM3, pair
    for name in ("left", "right"):
        gap = parts[f"terminal {name}"].distance(parts["block"])
        assert gap == pytest.approx(size.terminal_gap_mm + size.hole_growth_mm / 2, abs=1e-6)


@pytest.mark.parametrize("case", cases(STRAIGHT))
def test_terminals_cross_the_half_rods(case):
    size, parts = straight_parts(case)
    for side, name in ((1, "left"), (-1, "right")):
        centre = parts[f"terminal {name}"].Center()
        assert (centre.x, centre.y) == pytest.approx((0.0, side * size.terminal_y_mm), abs=1e-6)
        # A hole is really there: the undrilled rod would be in the screw's way.
        whole = cq.Solid.makeCylinder(
            size.rod_diameter_mm / 2, 100, cq.Vector(0, side * size.gap_mm / 2, size.height_mm), cq.Vector(0, side, 0)
        )
        assert shared_mm3(whole, parts[f"terminal {name}"]) > 1.0
        assert size.rod_hole_from_end_mm >= 1.5 * size.rod_hole_mm
        beside_hole = (size.rod_diameter_mm - size.rod_hole_mm) / 2
        assert beside_hole > 0.35
    gap = parts["rod left"].distance(parts["rod right"])
    assert gap == pytest.approx(size.gap_mm, abs=1e-6)


@pytest.mark.parametrize("case", cases(STRAIGHT))
def test_every_screw_of_the_straight_feed_can_be_driven(case):
    """Straight access from above with the lid off, as wide as the head; for the nut from below with the boom off."""
    size, parts = straight_parts(case)
    head = size.terminal_fastener.head_diameter_mm + 0.3
    for y in (-size.terminal_y_mm, size.terminal_y_mm):
        assert shared_mm3(column(head, 0, y, size.terminal_head_mm, size.top_mm + 50), parts["block"]) < NONE_MM3
        low = size.trap_top_mm
        socket = column(nut_size(thread=size.terminal).across_flats_mm, 0, y, size.bottom_mm - 5, low)
        assert shared_mm3(socket, parts["block"]) < NONE_MM3
    for x in size.screw_x_mm:
        head = column(size.fastener.head_diameter_mm + 0.4, x, 0, size.seat_mm, size.top_mm + 50)
        shank = column(size.fastener.diameter_mm, x, 0, -30, size.seat_mm)
        for tool in (head, shank):
            assert shared_mm3(tool, parts["block"]) < NONE_MM3
        for name in ("left", "right"):
            assert shared_mm3(head, parts[f"rod {name}"]) < NONE_MM3
        assert size.seat_mm + size.fastener.head_height_mm <= size.height_mm


@pytest.mark.parametrize("case", cases(STRAIGHT))
def test_cable_comes_up_beside_the_boom_and_is_gripped(case):
    size, parts = straight_parts(case)
    x, y = size.cable_at_mm
    cable = column(size.cable_mm, x, y, -60, size.height_mm)
    assert shared_mm3(cable, parts["block"]) < NONE_MM3
    assert shared_mm3(cable, parts["boom"]) < NONE_MM3
    for name in ("left", "right"):
        assert shared_mm3(cable, parts[f"rod {name}"]) < NONE_MM3
    # The lid's wedge takes 15 % of the cable's diameter, along a good part of the slot.
    squeezed = shared_mm3(cable, parts["lid"])
    chord = 2 * (size.cable_mm**2 / 4 - (0.35 * size.cable_mm) ** 2) ** 0.5
    reach = size.height_mm - size.tongue_low_mm - layout.TIP_MM[1]
    assert squeezed > 0.5 * chord * 0.15 * size.cable_mm * reach * 0.6
    without = solid_of(cq.Workplane(parts["lid"])).distance(parts["block"])
    assert without == pytest.approx(0.0, abs=1e-6)


@pytest.mark.parametrize("case", cases(STRAIGHT))
def test_lid_seats_in_the_rabbet_flush(case):
    size, parts = straight_parts(case)
    assert parts["lid"].BoundingBox().zmax == pytest.approx(parts["block"].BoundingBox().zmax, abs=1e-6)
    lifted = parts["lid"].translate(cq.Vector(0, 0, 0.1))
    assert lifted.distance(parts["block"]) > 0.05
    assert shared_mm3(parts["lid"].translate(cq.Vector(0, 0, -0.1)), parts["block"]) > 1.0
    x, y = size.lid_screw_mm
    pan = fastener(size.lid_screw)
    wall = min(size.lid_mm[0] - x, size.lid_mm[1] - y) - size.drawn_mm(pan.clearance_mm) / 2
    assert wall >= 1.2


@pytest.mark.parametrize("case", cases(STRAIGHT))
def test_drain_is_open_beside_the_boom(case):
    size, parts = straight_parts(case)
    x, y = size.drain_at_mm
    stream = column(3.0, x, y, -60, size.height_mm + 3)
    assert shared_mm3(stream, parts["block"]) < NONE_MM3
    assert shared_mm3(stream, parts["boom"]) < NONE_MM3


@pytest.mark.parametrize("case", cases(STRAIGHT))
def test_feed_volumes_are_the_formulas(case):
    size, parts = straight_parts(case)
    assert parts["block"].Volume(1e-6) == pytest.approx(size.volume_mm3, rel=1e-7)
    assert parts["lid"].Volume(1e-6) == pytest.approx(size.lid_volume_mm3, rel=1e-7)


def test_round_cradle_touches_the_boom_on_both_sides():
    _, parts = straight_parts(1)
    assert parts["block"].distance(parts["boom"]) == pytest.approx(0.0, abs=1e-6)
    sunk = parts["block"].translate(cq.Vector(0, 0, -0.05))
    shared = sunk.intersect(parts["boom"])
    sides = {solid.Center().y > 0 for solid in shared.Solids()}
    assert sides == {True, False}


@functools.cache
def folded_parts(case):
    given = FOLDED[case]
    size = folded_saddle_size(**given)
    loop = folded_rod(
        length_mm=320.0,
        spacing_mm=size.spacing_mm,
        diameter_mm=size.rod_diameter_mm,
        gap_mm=size.gap_mm,
        cross_hole_mm=size.rod_hole_mm,
        cross_hole_from_end_mm=size.rod_hole_from_end_mm,
    )
    found = {
        "saddle": solid_of(folded_saddle(**given)),
        "rod": at(loop, 0, 0, size.height_mm),
        "boom": boom(size),
    }
    for side, name in ((1, "left"), (-1, "right")):
        y = side * size.terminal_y_mm
        bolt = screw(thread=size.terminal, length_mm=size.terminal_length_mm)
        under_head = size.rod_diameter_mm / 2 + TAG_MM
        found[f"terminal {name}"] = at(bolt, under_head, y, size.height_mm, FORWARD)
        back = size.trap_front_mm - nut_size(thread=size.terminal).height_mm
        found[f"nut {name}"] = at(nut(thread=size.terminal), back, y, size.height_mm, FORWARD)
    return size, found


@pytest.mark.parametrize("case", cases(FOLDED))
def test_folded_feed_goes_together(case):
    size, parts = folded_parts(case)
    for (a, first), (b, second) in itertools.combinations(parts.items(), 2):
        if "nut" in f"{a}{b}" and "terminal" in f"{a}{b}" and a.split()[-1] == b.split()[-1]:
            continue  # thread in thread: both are drawn at the thread's diameter and share a face
        assert shared_mm3(first, second) < NONE_MM3, f"{a} / {b}"
    for name in ("left", "right"):
        gap = parts[f"terminal {name}"].distance(parts["saddle"])
        assert gap == pytest.approx(size.terminal_gap_mm + size.hole_growth_mm / 2, abs=1e-6)


@pytest.mark.parametrize("case", cases(FOLDED))
def test_bent_rod_goes_in_from_the_front_and_no_other_way(case):
    size, parts = folded_parts(case)
    for step in (0.5, 1.5, size.rod_diameter_mm, 12.0, 25.0):
        assert shared_mm3(parts["rod"].translate(cq.Vector(step, 0, 0)), parts["saddle"]) < NONE_MM3
    assert shared_mm3(parts["rod"].translate(cq.Vector(-1.0, 0, 0)), parts["saddle"]) > 1.0
    assert shared_mm3(parts["rod"].translate(cq.Vector(0, 0, 1.0)), parts["saddle"]) > 1.0
    # Its fed ends meet the rib when it is shifted along y by more than the nominal gap leaves, which is nothing.
    assert shared_mm3(parts["rod"].translate(cq.Vector(0, 0.2, 0)), parts["saddle"]) > 0.1


@pytest.mark.parametrize("case", cases(FOLDED))
def test_washer_holds_the_upper_limb(case):
    size, parts = folded_parts(case)
    ring = at(washer(thread=size.retainer, series="large"), size.rod_diameter_mm / 2, 0, size.retainer_z_mm, FORWARD)
    assert shared_mm3(ring, parts["saddle"]) < NONE_MM3
    assert shared_mm3(ring, parts["rod"]) < NONE_MM3
    assert ring.distance(parts["rod"]) == pytest.approx(size.retainer_gap_mm, abs=1e-6)
    assert size.retainer_gap_mm < 0.3
    assert shared_mm3(parts["rod"].translate(cq.Vector(0.7, 0, 0)), ring) > 0.1


@pytest.mark.parametrize("case", cases(FOLDED))
def test_cable_and_ties_have_room_on_the_folded_saddle(case):
    size, parts = folded_parts(case)
    x, y = size.cable_at_mm
    cable = column(size.cable_mm, x, y, -60, size.height_mm - size.rod_diameter_mm)
    assert shared_mm3(cable, parts["saddle"]) < NONE_MM3
    assert shared_mm3(cable, parts["boom"]) < NONE_MM3
    assert cable.distance(parts["saddle"]) == pytest.approx(0.0, abs=1e-6)
    for tie_y in size.tie_y_mm:
        assert abs(tie_y - y) > size.cable_mm / 2 + 0.9
        for z in size.tie_z_mm:
            tie = cq.Solid.makeBox(60, 1.4, 3.2, cq.Vector(-30, tie_y - 0.7, z - 1.6))
            assert shared_mm3(tie, parts["saddle"]) < NONE_MM3


@pytest.mark.parametrize("case", cases(FOLDED))
def test_every_hold_down_screw_of_the_folded_saddle_can_be_driven(case):
    size, parts = folded_parts(case)
    for x in size.screw_x_mm:
        head = column(size.fastener.head_diameter_mm + 0.4, x, 0, size.seat_mm, size.top_mm + 50)
        shank = column(size.fastener.diameter_mm, x, 0, -30, size.seat_mm)
        for tool, other in itertools.product((head, shank), ("saddle", "rod")):
            assert shared_mm3(tool, parts[other]) < NONE_MM3


@pytest.mark.parametrize("case", cases(FOLDED))
def test_folded_saddle_volume_is_the_formula(case):
    size, parts = folded_parts(case)
    assert parts["saddle"].Volume(1e-6) == pytest.approx(size.volume_mm3, rel=1e-7)


@pytest.mark.parametrize("given", STRAIGHT)
def test_walls_of_the_feed_block(given):
    """No wall under 1.2 mm (common practice), as drawn."""
    size = feed_block_size(**given)
    hold, drain = size.screw_x_mm[1], size.drain_at_mm[1]
    walls = size.walls_mm | {
        "slot to outside": size.half_y_mm - size.slot_y_mm[1],
        "hold-down to outside": size.half_x_mm - hold - size.drawn_mm(size.counterbore_mm) / 2,
        "drain to outside": size.half_y_mm + drain - size.drawn_mm(layout.DRAIN_MM) / 2,
        "under hold-down": size.seat_mm - max(size.bottom_mm, size.roof_mm),
        "pilot to foot": size.lid_seat_mm - layout.PILOT_DEPTH_MM - size.bottom_mm,
    }
    assert {name: wall for name, wall in walls.items() if wall < 1.2 - 1e-9} == {}


@pytest.mark.parametrize("given", FOLDED)
def test_walls_of_the_folded_saddle(given):
    size = folded_saddle_size(**given)
    corner = hexagon_corners_mm(size.trap_flats_mm) / 2
    tie_top = max(size.tie_z_mm) + sizes.TIE_MM[1] / 2
    walls = {
        "rod to nut": -size.bore_mm / 2 - size.trap_front_mm,
        "tie to trap": size.height_mm - corner - tie_top,
        "tie to foot": min(size.tie_z_mm) - sizes.TIE_MM[1] / 2,
        "tie to outside": size.y_mm[1] - size.tie_y_mm[1] - sizes.TIE_MM[0] / 2,
        "trap to outside": -size.y_mm[0] - size.terminal_y_mm - size.trap_flats_mm / 2,
        "slot to retainer": size.retainer_z_mm - size.pilot_mm / 2 - size.upper_mm - size.bore_mm / 2,
        "retainer to top": size.top_mm - size.retainer_z_mm - size.pilot_mm / 2,
        "slot to slot": size.spacing_mm - size.bore_mm / 2 - size.tallest_mm / 2,
        "counterbore to ear": size.ear_y_mm - math.sqrt(0.5) * size.counterbore_mm,
        "under hold-down": size.seat_mm,
    }
    assert {name: wall for name, wall in walls.items() if wall < 1.2 - 1e-9} == {}
