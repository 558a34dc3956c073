"""Stations, holes, parts, pieces and the clamp, as numbers."""

import math
from collections.abc import Callable

import pytest

from fabgen.arrange.arrange import arrange
from fabgen.correct.ledger import correct
from fabgen.design.arranged import Arranged, Hole
from fabgen.design.design import Design

Variant = Callable[..., Design]
FOLDED = "kind: folded-dipole, spacing: 30 mm"
ROUND = (("section: square", "section: round"), ("  corner_radius: 1 mm\n", ""), ("outside: 20 mm", "outside: 25 mm"))


def arranged(design: Design) -> Arranged:
    return arrange(design, correct(design))


def holes(found: Arranged, element: str, purpose: str) -> list[Hole]:
    return [hole for hole in found.holes if (hole.element, hole.purpose) == (element, purpose)]


def test_a_through_hole_is_two_rows_with_one_number(variant: Variant) -> None:
    left, right = holes(arranged(variant()), "R", "bush")
    assert (left.station_mm, left.wall, left.angle_deg) == (60.0, "+y", 90.0)
    assert (right.station_mm, right.wall, right.angle_deg) == (60.0, "-y", 270.0)
    assert left.number == right.number == "H01"
    assert (left.diameter_mm, left.pilot_mm, left.drill) == (8.0, 2.5, "8 mm")


def test_round_booms_name_their_wall_round(variant: Variant) -> None:
    assert {hole.wall for hole in arranged(variant(*ROUND)).holes} == {"round"}


def test_stations_count_from_the_datum_face(variant: Variant) -> None:
    found = arranged(variant(("at: 0,", "at: -37.5,")))
    assert holes(found, "R", "bush")[0].station_mm == 60.0
    assert holes(found, "D1", "bush")[0].station_mm == 60.0 + 190.0 + 37.5


def test_boom_and_halves_are_on_the_cut_list(variant: Variant) -> None:
    cuts = {cut.piece: cut for cut in arranged(variant()).cuts}
    assert cuts["boom"].cut_mm == 60 + 1744 + 60
    assert cuts["DE-left"].cut_mm == cuts["DE-right"].cut_mm == (329.0 - 10.0) / 2
    assert cuts["DE-left"].note.startswith("hole 2.2 across")
    assert cuts["D1"].half_mm == cuts["D1"].cut_mm / 2
    assert cuts["D1"].projection_mm == (cuts["D1"].cut_mm - 20) / 2


def test_a_folded_rod_is_cut_to_its_developed_length(variant: Variant) -> None:
    """2(L − s − d) + π s − gap, our own geometry; L 329, s 30, d 4, gap 10."""
    cuts = {cut.piece: cut for cut in arranged(variant(("kind: straight-dipole", FOLDED))).cuts}
    assert cuts["DE"].cut_mm == pytest.approx(2 * (329 - 30 - 4) + math.pi * 30 - 10, abs=1e-3)


def test_the_balance_point_balances(variant: Variant) -> None:
    """Moments about the balance point vanish: boom, parts and the cable's run, the clamp left out."""
    found = arranged(variant())
    masses = [(p.mass_g, p.frame.origin[0]) for p in found.placed if p.owner not in ("boom", "clamp")]
    boom = found.part("boom")
    masses.append((boom.mass_g, found.design.boom.length_mm / 2))
    cable_g = math.pi / 4 * 5**2 * abs(found.balance_mm - 191.0) * 1900 / 1e6
    masses.append((cable_g, (191.0 + found.balance_mm) / 2))
    moment = sum(mass * (x - found.balance_mm) for mass, x in masses)
    assert abs(moment) < 1.0  # g·mm of some 900 g on 1.9 m


def test_the_boom_weighs_what_its_section_says(variant: Variant) -> None:
    """20 × 20 × 1.5 with 1 mm corners: 20² − 17² less (4 − π)·1² outside, sharp inside; EN AW-6060 2700 kg/m³."""
    area = 20**2 - 17**2 - (4 - math.pi)
    assert arranged(variant()).part("boom").mass_g == pytest.approx(area * 1864 * 2700e-6, rel=1e-9)


def test_the_clamp_takes_the_free_place_nearest_to_the_balance_point(variant: Variant) -> None:
    """Balance 853.2; D5 at 803 has flanges of 12 mm, and the plate of 78 mm keeps 6 mm off: 803 + 6 + 6 + 39 = 854."""
    found = arranged(variant())
    assert found.clamp_mm is not None
    low, high = found.clamp_mm - found.clamp_width_mm / 2, found.clamp_mm + found.clamp_width_mm / 2
    for element in found.design.elements:
        assert not low - 5 < element.station_mm < high + 5
    assert found.clamp_mm == 854
    assert arranged(variant(("at: 743,", "at: 740,"))).clamp_mm == 853


@pytest.mark.parametrize("side_mm", [20, 46, 50, 80, 120])
def test_the_clamps_bolts_reach_through_boom_plate_and_nut(variant: Variant, side_mm: int) -> None:
    """M6: washers 1.6 mm (ISO 7089) under head and nut, nut 5.2 mm (ISO 4032), plate 5 mm."""
    found = arranged(variant(("outside: 20 mm", f"outside: {side_mm} mm")))
    bolts = [part for part in found.placed if part.name in ("clamp bolt 1", "clamp bolt 2")]
    assert len(bolts) == 2
    for bolt in bolts:
        assert float(str(dict(bolt.parameters)["length_mm"])) >= side_mm + 5 + 2 * 1.6 + 5.2


def test_a_boom_too_thick_for_any_bolt_is_remarked(variant: Variant) -> None:
    found = arranged(variant(("outside: 20 mm", "outside: 200 mm")))
    assert found.clamp_mm is None
    assert ("clamp", "F01") in [(where, remark.code) for where, remark in found.remarks]


def test_a_crowded_balance_point_moves_the_clamp(variant: Variant) -> None:
    found = arranged(variant(("at: 915,", "at: 795,")))
    assert found.clamp_mm is not None
    assert abs(found.clamp_mm - found.balance_mm) > 10
    others = [element.station_mm for element in found.design.elements]
    assert min(abs(found.clamp_mm - other) for other in others) > found.clamp_width_mm / 2 + 5


def test_with_vertical_rods_the_clamp_goes_behind_the_rearmost(variant: Variant) -> None:
    vertical = variant(("polarisation: horizontal", "polarisation: vertical"), ("rear: 60 mm", "rear: 160 mm"))
    found = arranged(vertical)
    assert found.clamp_mm is not None
    assert found.clamp_mm + found.clamp_width_mm / 2 < 160 - 5
    assert found.mast is not None
    assert found.mast.axis == "y"


def test_without_room_there_is_no_clamp_but_a_remark(variant: Variant) -> None:
    found = arranged(variant(("polarisation: horizontal", "polarisation: vertical")))
    assert found.clamp_mm is None
    assert [(where, remark.code) for where, remark in found.remarks] == [("clamp", "C01")]
    assert not [part for part in found.placed if part.owner == "clamp"]


def test_a_feed_that_cannot_be_made_is_remarked_and_left_out(variant: Variant) -> None:
    found = arranged(variant(("height: 18 mm, cable", "height: 10 mm, cable")))
    assert [(where, remark.code) for where, remark in found.remarks] == [("DE", "F01")]
    assert not [part for part in found.placed if part.owner == "DE"]
    assert "DE" in [cut.piece for cut in found.cuts]


def test_every_interface_joins_two_placed_parts(variant: Variant) -> None:
    for replacements in [(), ROUND, (("kind: straight-dipole", FOLDED),)]:
        found = arranged(variant(*replacements))
        names = [part.name for part in found.placed]
        assert len(names) == len(set(names))
        assert all(name.isascii() for name in names)
        for interface in found.interfaces:
            assert interface.first in names
            assert interface.second in names


def test_the_turning_radius_reaches_the_farthest_tip_from_the_masts_axis(variant: Variant) -> None:
    """The mast of 38 mm stands on the right: half the boom, the plate of 5 mm and half the mast off the axis."""
    found = arranged(variant())
    assert found.clamp_mm is not None
    beside_mm = 20 / 2 + 5 + 38 / 2
    tips = [math.hypot(x.station_mm - found.clamp_mm, x.cut_mm / 2 + beside_mm) for x in found.ledger.lines]
    ends = [math.hypot(x, 10 + beside_mm) for x in (found.clamp_mm, found.design.boom.length_mm - found.clamp_mm)]
    assert found.turning_radius_mm == pytest.approx(max(tips + ends), abs=1e-3)


def test_upright_rods_turn_round_the_mast_below_the_boom(variant: Variant) -> None:
    """Boom 20 mm high on a plate of 5 mm and a mast of 42 mm; the front director ends 15 + 4 mm above the boom."""
    found = arranged(variant(base="meter-reading-169.yaml"))
    assert found.clamp_mm is not None
    front_mm = found.design.boom.length_mm - found.clamp_mm
    boom = math.hypot(front_mm, 20 + 5 + 21)
    rod = math.hypot(front_mm - 80 + 4, 20 + 5 + 21 + 15 + 4)
    assert found.turning_radius_mm == pytest.approx(max(boom, rod), abs=1e-3)


def test_without_a_clamp_the_array_turns_round_its_balance_point(variant: Variant) -> None:
    found = arranged(variant(("clamp: {at: balance, mast: 38 mm}\n", "")))
    tips = [math.hypot(x.station_mm - found.balance_mm, x.cut_mm / 2) for x in found.ledger.lines]
    # The rod's end face is 4 mm wide, and the farthest corner is half of that farther along.
    farthest = max(abs(x.station_mm - found.balance_mm) for x in found.ledger.lines)
    assert max(tips) < found.turning_radius_mm <= math.hypot(farthest + 60, 20 / 2)


def test_a_crush_sleeve_must_go_into_the_boom(variant: Variant) -> None:
    """Sleeves of 10 mm with 0.2 mm of play: a tube of 13.2 mm with a wall of 1.5 takes them, one of 13.1 does not."""
    flat = ("  section: square\n  outside: 20 mm\n", "  section: rectangular\n  outside: [30 mm, {} mm]\n")
    for height, remarks in (("13.2", []), ("13.1", [("clamp", "F01")])):
        found = arranged(variant((flat[0], flat[1].format(height))))
        assert [(where, remark.code) for where, remark in found.remarks] == remarks
        assert (found.clamp_mm is None) == bool(remarks)


def test_a_bent_rod_stands_out_evenly_beyond_the_boom(variant: Variant) -> None:
    """Its saddle is wider on the cable's side, so the boom is what both ends are measured from."""
    cuts = {x.piece: x for x in arranged(variant(("kind: straight-dipole", FOLDED))).cuts}
    assert cuts["DE"].projection_mm == (329 - 20) / 2


def test_a_bonded_rod_screwed_at_its_walls_gets_two_screws_from_the_top(variant: Variant) -> None:
    insulated = (
        "style: insulated-through\n    hole: 8 mm\n    bush: {kind: shoulder, material: ASA}\n"
        "    keeper: {kind: push-ring, material: ASA}"
    )
    design = variant((insulated, "style: bonded-through\n    bond: wall-screws"))
    rows = holes(arranged(design), "D1", "bond screw")
    # Side wall inside at 8.5 mm, the screw 3 mm from it; M3 is tapped from 2.5 mm (ISO 261 pitch 0.5).
    assert [(h.wall, h.across_mm, h.diameter_mm) for h in rows] == [("+z", -5.5, 2.5), ("+z", 5.5, 2.5)]
