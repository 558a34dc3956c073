"""The walls of feed block, lid, folded dipole's saddle and saddle, measured on the solids, are those of the sizes.

Within limits that keep openings apart, what is not plastic is one piece an opening (or the air outside); the wall
between two of them is the distance between their pieces.
"""

import itertools

import pytest

from fabgen.design.part_sizes import feed_block_size, folded_saddle_size, saddle_size
from fabgen.model.kernel import cq, solid_of
from fabgen.model.parts.feed_block import feed_block
from fabgen.model.parts.feed_lid import feed_lid
from fabgen.model.parts.folded_saddle import folded_saddle
from fabgen.model.parts.saddle import saddle
from fabgen.model.shapes import box

NEAR_MM = 1e-3
CLOSE_MM = 1e-5  # a lying bore that is cut NEAR_MM under its axis is narrower by less
AIR_MM = 5.0
STRAIGHT = [
    {},
    {"hole_growth_mm": 0.6},
    {"cable_mm": 1.5, "gap_mm": 4.0},
    {"rod_diameter_mm": 8.0, "height_mm": 25.0, "boom_width_mm": 30.0, "cable_mm": 10.0, "hole_growth_mm": 0.2},
    {"rod_diameter_mm": 3.0, "gap_mm": 1.0, "boom_width_mm": 12.0, "cable_mm": 3.0, "height_mm": 14.0},
]
CRADLES = [
    {"boom_width_mm": 30.0, "boom_diameter_mm": 30.0, "gap_mm": 4.0},
    {"boom_width_mm": 8.0, "boom_diameter_mm": 8.0, "gap_mm": 2.0, "hole_growth_mm": 0.6},
    {"rod_diameter_mm": 16.0, "height_mm": 20.0, "boom_width_mm": 80.0, "boom_diameter_mm": 80.0, "gap_mm": 3.0},
    {"rod_diameter_mm": 12.0, "height_mm": 19.0, "boom_width_mm": 50.0, "boom_diameter_mm": 50.0},
]
FOLDED = [
    {},
    {"gap_mm": 1.0, "hole_growth_mm": 0.1},
    {"rod_diameter_mm": 8.0, "spacing_mm": 50.0, "height_mm": 20.0, "boom_width_mm": 30.0, "hole_growth_mm": 0.3},
]
SADDLES = [
    {},
    {"boom_width_mm": 10.0, "hole_growth_mm": 0.3},
    {"screw": "M4", "boom_width_mm": 30.0, "hole_growth_mm": 0.3},
]


def cases(table):
    """The first in the quick suite, the others in the slow one."""
    return [case if case == table[0] else pytest.param(case, marks=pytest.mark.slow) for case in table]


def not_plastic(part, x, y, z):
    """Pieces of what is not plastic within limits."""
    return box(x, y, z).cut(part).Solids()


def about(value, reach):
    return value - reach, value + reach


def at(pieces, x, y, z):
    """The piece that holds a point."""
    (found,) = (piece for piece in pieces if piece.isInside(cq.Vector(x, y, z)))
    return found


def least_apart_mm(pieces):
    return min(first.distance(second) for first, second in itertools.combinations(pieces, 2))


@pytest.mark.parametrize("given", cases(STRAIGHT))
def test_walls_under_a_feed_blocks_floor(given):
    size, part = feed_block_size(**given), solid_of(feed_block(**given))
    x, y, walls = size.half_x_mm, size.half_y_mm, size.walls_mm
    pieces = not_plastic(part, (-x, x), (-y, y), (size.bottom_mm, size.height_mm - NEAR_MM))
    z = size.height_mm - 2 * NEAR_MM
    # Two rods with their terminals, two hold-down screws, cable slot, drain, four lid screws.
    assert len(pieces) == 10
    places = {
        "rod": (0.0, size.terminal_y_mm),
        "hold-down head": (size.screw_x_mm[1], 0.0),
        "cable slot": size.cable_at_mm,
        "lid screw": size.lid_screw_mm,
    }
    front, drain = {name: at(pieces, *place, z) for name, place in places.items()}, at(pieces, *size.drain_at_mm, z)
    back = {name: at(pieces, -px, -py, z) for name, (px, py) in places.items() if name != "cable slot"}
    apart = {(a, b): front[a].distance(front[b]) for a, b in itertools.combinations(front, 2)}
    apart |= {("drain", name): drain.distance(piece) for name, piece in back.items()}
    for names, measured in apart.items():
        # A rod and its nut's trap are one piece.
        either = [names, tuple("nut" if name == "rod" else name for name in names)]
        expected = min(
            walls[name]
            for a, b in either
            for name in (f"wall between {a} and {b}", f"wall between {b} and {a}")
            if name in walls
        )
        assert measured == pytest.approx(expected, abs=CLOSE_MM), names
    between = [wall for name, wall in walls.items() if name.startswith("wall between")]
    assert least_apart_mm(pieces) == pytest.approx(min(*between, walls["rib between the rods"]), abs=CLOSE_MM)


@pytest.mark.parametrize("given", cases(STRAIGHT))
def test_floor_rim_posts_and_lid_of_a_feed_block(given):
    size, part, lid = feed_block_size(**given), solid_of(feed_block(**given)), solid_of(feed_lid(**given))
    hole, (x, y), walls = size.drawn_mm(size.terminal_fastener.clearance_mm), size.lid_screw_mm, size.walls_mm
    beside_screw = size.terminal_y_mm + hole / 2 + NEAR_MM, size.terminal_y_mm + size.trap_flats_mm / 2
    low, high, floor = size.bottom_mm, size.height_mm, "floor between rod and nut"
    assert least_apart_mm(not_plastic(part, (-0.1, 0.1), beside_screw, (low, high))) == pytest.approx(walls[floor])
    post = not_plastic(part, about(x, 4), about(y, 4), (size.lid_seat_mm - 2, size.lid_seat_mm - NEAR_MM))
    chamber = [piece for piece in post if piece.Center().x < x - 0.1]
    assert chamber[0].distance(at(post, x, y, size.lid_seat_mm - 1)) == pytest.approx(walls["wall round a lid screw"])
    for of, seen in ((part, "rim"), (lid, "lid's edge")):
        across = about(0, size.half_x_mm + AIR_MM), about(0, size.half_y_mm + AIR_MM)
        pieces = not_plastic(of, *across, (size.lid_seat_mm + NEAR_MM, size.top_mm - NEAR_MM))
        assert least_apart_mm(pieces) == pytest.approx(walls[seen])
    (x0, x1), (y0, y1) = size.slot_x_mm, size.tongue_y_mm
    wedge = lid.intersect(box((x0 - 1, x1 + 1), (y0 - 2, y1 + 2), about(size.height_mm - 2, 0.3))).BoundingBox()
    assert min(wedge.xlen, wedge.ylen) == pytest.approx(walls["lid's wedge"], abs=CLOSE_MM)


@pytest.mark.parametrize("given", cases(CRADLES))
def test_plastic_between_rod_drain_and_cradle(given):
    """A rod's trough that opens into the cradle would lay the rod on the boom."""
    size, part = feed_block_size(**given), solid_of(feed_block(**given))
    walls = size.walls_mm
    half_bore, trap = size.drawn_bore_mm / 2, size.terminal_y_mm - size.trap_flats_mm / 2
    before_nut = (0.0, trap - NEAR_MM)
    pieces = not_plastic(part, about(0, half_bore), before_nut, (size.bottom_mm, size.height_mm - NEAR_MM))
    floor = walls["floor between rod and cradle"]
    assert least_apart_mm(pieces) == pytest.approx(floor, abs=CLOSE_MM)
    assert floor > 2
    x, y = size.drain_at_mm
    foot = (size.bottom_mm, size.bottom_mm + 0.2)
    pieces = not_plastic(part, about(x, 0.5), (y - 1, 0.0), foot)
    assert least_apart_mm(pieces) == pytest.approx(walls["wall between drain and cradle"], abs=CLOSE_MM)


@pytest.mark.parametrize("given", cases(FOLDED))
def test_walls_of_a_folded_dipoles_saddle(given):
    size, part = folded_saddle_size(**given), solid_of(folded_saddle(**given))
    walls = dict(size.walls_mm)
    column = not_plastic(part, (size.back_mm, size.front_mm), size.y_mm, (0.0, size.top_mm))
    # Two fed limbs with their terminals, the upper limb, the retainer's screw, two slots for each tie.
    assert len(column) == 4 + 2 * len(size.tie_z_mm)
    ear = walls.pop("ear wall")
    assert least_apart_mm(column) == pytest.approx(min(walls.values()), abs=CLOSE_MM)
    low, high = size.screw_x_mm[1], size.x_mm[1] + AIR_MM
    pieces = not_plastic(part, (low, high), (-0.1, 0.1), (size.seat_mm + 0.6, size.ear_mm - NEAR_MM))
    assert least_apart_mm(pieces) == pytest.approx(ear, abs=CLOSE_MM)


@pytest.mark.parametrize("given", cases(SADDLES))
def test_walls_of_a_saddle(given):
    size, part, walls = saddle_size(**given), solid_of(saddle(**given)), saddle_size(**given).walls_mm
    x, y = size.length_mm / 2, size.width_mm / 2
    ears = not_plastic(part, (size.screw_x_mm[1], x + AIR_MM), about(0, y + AIR_MM), (size.seat_mm + 0.6, size.ear_mm))
    expected = min(walls["ear wall"], walls["ear wall at a counterbore's apex"])
    assert least_apart_mm(ears) == pytest.approx(expected, abs=CLOSE_MM)
    below = not_plastic(part, (-0.1, 0.1), (-y, y), (-AIR_MM, size.height_mm))
    assert least_apart_mm(below) == pytest.approx(walls["floor"], abs=CLOSE_MM)
    column = size.column_half_mm + AIR_MM
    beside = not_plastic(part, (0.0, column), (-y, y), about(size.height_mm, 0.1))
    assert least_apart_mm(beside) == pytest.approx(walls["wall round the bore"], abs=CLOSE_MM)
