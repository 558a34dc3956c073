"""C01, C02, A and F14: the clamp's place, the mast, the order of assembly, stock."""

from dataclasses import replace

import pytest

from fabgen.design.arranged import Box
from fabgen.design.assembly_order import Phase, assembly_order, phase_of

from_rule = "parts_that_cannot_be_made"
FOLDED = {"feed": {"kind": "folded-dipole", "spacing": 30, "gap": 10, "height": 18, "cable": 5}}


def test_no_free_place_for_the_clamp(found):
    assert found(from_rule) == []
    assert found(from_rule, {"clamp.mast": 120}) == [("C01", "fail", "clamp", None, None)]


def test_a_mast_among_vertical_rods(found):
    """A mast of 38 mm at 200 reaches to 219; the rearmost rod of 4 mm at 80 begins at 78."""
    vertical = {"polarisation": "vertical"}
    assert found("mast_among_rods", vertical | {"clamp.at": 200}) == [("C02", "fail", "mast", 219, 78)]
    assert found("mast_among_rods", vertical | {"clamp.at": 59}) == [("C02", "fail", "mast", 78, 78)]
    assert found("mast_among_rods", vertical | {"clamp.at": 58.9}) == []
    assert found("mast_among_rods", {"polarisation": "vertical", "boom.overhang.rear": 150}) == []
    assert found("mast_among_rods", {"clamp.at": 200}) == []


def test_stock(found):
    """Bars of 349.5 mm less 5 mm of rough end give 344.5; R is cut to 338 plus its allowance and trim."""
    assert found("stock_lengths") == []
    none = {"mounts.line.allowance": {"origin": "none"}}
    assert found("stock_lengths", none | {"shop.stock.rod": 343}) == []
    assert found("stock_lengths", none | {"shop.stock.rod": 342}) == [("A03", "fail", "R", 338, 337)]
    assert found("stock_lengths", {"shop.stock.boom": 472}) == []
    assert found("stock_lengths", {"shop.stock.boom": 471}) == [("A04", "fail", "boom", 467, 466)]


def test_a_bent_rod_needs_its_developed_length(found):
    """2 (329 − 30 − 4) + 30 π − 10 = 674.248, and twice the trim of 7 mm."""
    short = FOLDED | {"shop.stock.rod": 690}
    assert found("stock_lengths", short) == [("A03", "fail", "DE", pytest.approx(674.248 + 14, abs=0.001), 685)]


def test_every_part_goes_on_once(made):
    for changes in ({}, FOLDED, {"boom.section": "round", "boom.corner_radius": None}):
        arranged = made(changes)
        order = assembly_order(arranged)
        assert order.stuck == ()
        parts = [name for step in order.steps for name in step.parts]
        assert sorted(parts) == sorted(part.name for part in arranged.placed if part.part != "boom")
        assert [step.number for step in order.steps] == list(range(1, len(order.steps) + 1))


def test_what_is_reached_last_goes_on_last(made):
    """Sleeves before all that crosses the bore, nuts before the block that hides them, rods before their keepers."""
    arranged = made()
    step_of = {name: step.number for step in assembly_order(arranged).steps for name in step.parts}
    assert step_of["clamp bolt 1 crush sleeve"] < min(step_of["D1 bush left"], step_of["DE feed screw 1"])
    assert step_of["DE terminal nut left"] < step_of["DE feed block"] < step_of["DE-left"]
    assert step_of["DE-left"] < step_of["DE terminal screw left"] < step_of["DE feed lid"]
    assert step_of["D1 bush right"] < step_of["D1"] < step_of["D1 keeper left"]
    assert max(step_of.values()) == step_of["mast U-bolt 1"]


def test_phases(made):
    phases = {part.name: phase_of(part) for part in made(FOLDED).placed}
    assert phases["DE"] is Phase.BENT_RODS
    assert phase_of(made().part("DE-left")) is Phase.HALF_RODS
    assert phases["DE retainer washer"] is Phase.TERMINALS
    assert phases["clamp bolt 1"] is Phase.CLAMP
    assert phases["mast U-bolt 1 1 nut"] is Phase.MAST


def test_a_joint_without_parts_is_a_step(made):
    welded = {"mounts.line": {"style": "bonded-through", "bond": "weld", "allowance": {"origin": "none"}}}
    joints = [step for step in assembly_order(made(welded)).steps if step.text.startswith("Make the joints")]
    assert [(step.elements, step.parts) for step in joints] == [(("R", "D1", "D2"), ())]


def test_a_fed_rod_is_measured_before_its_lid_is_closed(made):
    texts = [step.text for step in assembly_order(made()).steps if step.elements == ("DE",)]
    assert [text.split()[0] for text in texts[-3:]] == ["Fit", "Fasten", "Close"]
    assert [step.text.split()[0] for step in assembly_order(made(FOLDED)).steps][-2:] == ["Fasten", "Hang"]


def test_a_middle_screw_comes_after_its_rod(made):
    held = {"mounts.line.hold": "middle-screw"}
    step_of = {name: step.number for step in assembly_order(made(held)).steps for name in step.parts}
    assert step_of["D1 bush left"] < step_of["D1"] < step_of["D1 middle screw"]


def test_a_loop_through_the_boom(made, rule):
    arranged = made(FOLDED)
    assert rule("assembly", arranged) == []
    bent = arranged.part("DE")
    low = replace(bent, shapes=(*bent.shapes, Box((0, -20, -20), (4, 20, 60))))
    placed = tuple(low if part is bent else part for part in arranged.placed)
    assert rule("assembly", replace(arranged, placed=placed)) == [("A02", "fail", "DE", None, None)]


def test_a_loop_into_a_closed_ring(made, rule):
    arranged = made(FOLDED)
    bush = replace(arranged.part("D1 bush left"), name="DE bush left", owner="DE")
    ringed = replace(arranged, placed=(*arranged.placed, bush))
    assert rule("assembly", ringed) == [("A02", "fail", "DE", None, None)]


def in_the_way(arranged, side, part):
    """A part moved beside D1's tip."""
    x = arranged.design.element("D1").station_mm
    low, high = sorted((side * 200, side * 220))
    return replace(part, shapes=(Box((x - 5, low, -5), (x + 5, high, 5)),))


def test_a_rod_blocked_on_one_side_comes_from_the_other(made):
    arranged = made()
    lid = arranged.part("DE feed lid")
    placed = tuple(in_the_way(arranged, 1, lid) if part is lid else part for part in arranged.placed)
    assert assembly_order(replace(arranged, placed=placed)).stuck == ()


def test_a_rod_blocked_on_both_sides_goes_first(made):
    """The clamp's plate waits for a rod that it would lock out."""
    arranged = made()
    block, plate = arranged.part("DE feed block"), arranged.part("clamp plate")
    moved = {block.name: in_the_way(arranged, 1, block), plate.name: in_the_way(arranged, -1, plate)}
    changed = replace(arranged, placed=tuple(moved.get(part.name, part) for part in arranged.placed))
    order = assembly_order(changed)
    step_of = {name: step.number for step in order.steps for name in step.parts}
    assert order.stuck == ()
    assert step_of["D1"] < max(step_of["DE feed block"], step_of["clamp plate"])


def test_a_circle_of_waits_is_reported(made, rule):
    """A sleeve inside the boom must be there before every rod: beyond both tips of D1 it locks it out."""
    arranged = made()
    sleeve = arranged.part("clamp bolt 1 crush sleeve")
    left = in_the_way(arranged, 1, sleeve).shapes[0]
    right = in_the_way(arranged, -1, sleeve).shapes[0]
    both = replace(sleeve, shapes=(left, right))
    placed = tuple(both if part is sleeve else part for part in arranged.placed)
    found = rule("assembly", replace(arranged, placed=placed))
    assert found == [("A01", "fail", "D1", None, None)]
