"""Solved and measured factors carried to the rods of a table, and to a mount that differs from its record.

Source: own study 2026, computed, unpublished.
"""

import math
from dataclasses import replace

import pytest

from fabgen.physics.boom_carried import measured_allowance, solved_allowance
from fabgen.physics.boom_closed_form import BoomAllowance, closed_form_allowance
from fabgen.physics.boom_differences import Item, differences, nearest_closed_form_mm
from fabgen.physics.boom_mount import BoomMount, Section, Style
from fabgen.physics.boom_range import Reason
from fabgen.physics.boom_uncertainty import Surroundings

MHZ = 434.0
TUBE = BoomMount(
    Style.INSULATED_THROUGH,
    Section.ROUND,
    20,
    4,
    wall_mm=1.5,
    hole_mm=8,
    bush_permittivity=3,
    bush_length_mm=2.5,
)
BONDED = BoomMount(Style.BONDED_THROUGH, Section.ROUND, 20, 4, wall_mm=1.5)
TOP = BoomMount(Style.ON_TOP, Section.SQUARE, 20, 4, axis_height_mm=6)


def value(result: BoomAllowance) -> tuple[float, float]:
    assert result.allowance_mm is not None
    assert result.u_mm is not None
    return result.allowance_mm, result.u_mm


@pytest.mark.parametrize("mount", [TUBE, BONDED, TOP])
@pytest.mark.parametrize("length_mm", [300.0, 310.0, 330.0])
def test_the_closed_forms_own_factor_gives_the_closed_form(mount: BoomMount, length_mm: float) -> None:
    """A solution that found just what the closed form says changes nothing, bush, u and ends included."""
    near = Surroundings(end_distance_mm=50, neighbour_distance_mm=90)
    closed = closed_form_allowance(mount, length_mm, MHZ, near)
    assert closed.reactance_factor is not None
    carried = solved_allowance(mount, closed.reactance_factor, 0.0, length_mm, MHZ, near)
    assert value(carried) == pytest.approx(value(closed))


def test_a_solution_is_surer_than_the_closed_form_for_a_long_raised_rod() -> None:
    high = replace(TOP, axis_height_mm=22.0)
    closed = closed_form_allowance(high, 338, MHZ)
    assert closed.reactance_factor is not None
    assert solved_allowance(high, closed.reactance_factor, 0.0, 338, MHZ).u_relative < closed.u_relative


def test_mesh_difference_joins_u() -> None:
    exact, rough = (solved_allowance(BONDED, 2.2, part, 300, MHZ) for part in (0.0, 0.08))
    assert rough.u_relative == pytest.approx(math.hypot(exact.u_relative, 0.08))


def test_measured_allowance_has_its_bush_in_it() -> None:
    """The same factor gives more length solved without bush than measured: the term is not counted twice."""
    solved = solved_allowance(TUBE, 1.0, 0.0, 300, MHZ)
    measured = measured_allowance(TUBE, 1.0, 0.0, 300, MHZ)
    assert measured.bush_term_mm == measured.u_bush_mm == 0
    assert value(measured)[0] == pytest.approx(value(solved)[0] - solved.bush_term_mm)


def test_measured_uncertainty() -> None:
    near = Surroundings(end_distance_mm=100)
    result = measured_allowance(BONDED, 2.2, 0.03, 300, MHZ, near, difference_u_relative=0.04)
    allowance_mm, u_mm = value(result)
    assert result.u_relative == pytest.approx(math.hypot(0.06, 0.04))
    assert result.u_correlated_relative == 0.03
    assert u_mm == pytest.approx(allowance_mm * math.hypot(0.06, 0.04, 0.03, 0.12 * 20 / 100))


@pytest.mark.parametrize("mount", [BONDED, TUBE, TOP])
def test_a_coupon_of_another_length_says_less(mount: BoomMount) -> None:
    same, other = (
        measured_allowance(mount, 1.0, 0.02, 330, MHZ, coupon_length_mm=coupon_mm) for coupon_mm in (330, 300)
    )
    assert other.allowance_mm == same.allowance_mm
    assert other.u_relative > same.u_relative


@pytest.mark.parametrize(("end_mm", "u_relative"), [(66.0, 0.06), (65.0, math.hypot(0.06, 0.15))])
def test_unbonded_end_rods_keep_their_extra_u(end_mm: float, u_relative: float) -> None:
    near = Surroundings(end_distance_mm=end_mm)
    result = measured_allowance(TOP, 1.0, 0.02, 300, MHZ, near)
    assert result.u_relative == pytest.approx(u_relative)


@pytest.mark.parametrize(("widening_mm", "u_relative"), [(39.0, 0.10), (40.0, 0.0), (None, 0.0)])
def test_a_clamp_near_a_measured_rod_widens_u(widening_mm: float | None, u_relative: float) -> None:
    """The coupon's rod stood free: a clamp within two widths of the 20 mm boom adds its tenth (a judgement)."""
    free = measured_allowance(TOP, 0.06, 0.02, 300, MHZ)
    near = measured_allowance(TOP, 0.06, 0.02, 300, MHZ, Surroundings(widening_distance_mm=widening_mm))
    assert near.allowance_mm == free.allowance_mm
    assert near.u_relative == pytest.approx(math.hypot(free.u_relative, u_relative))


def test_unbonded_rod_too_near_the_end_has_no_value_by_any_origin() -> None:
    near = Surroundings(end_distance_mm=39)
    for result in (
        solved_allowance(TOP, 1.0, 0.0, 300, MHZ, near),
        measured_allowance(TOP, 1.0, 0.02, 300, MHZ, near),
    ):
        assert result.allowance_mm is None
        assert [miss.reason for miss in result.misses] == [Reason.BOOM_END]


def test_same_mount_has_no_differences() -> None:
    for mount in (TUBE, BONDED, TOP):
        assert differences(mount, MHZ, mount, MHZ) == ()


@pytest.mark.parametrize(
    ("change", "item"),
    [
        ({"rod_diameter_mm": 4.1}, Item.ROD),
        ({"outside_mm": 20.3}, Item.BOOM),
        ({"wall_mm": 1.6}, Item.WALL),
        ({"hole_mm": 8.2}, Item.HOLE),
        ({"bush_permittivity": 3.6}, Item.BUSH_PERMITTIVITY),
        ({"bush_length_mm": 3.0}, Item.BUSH_LENGTH),
    ],
)
def test_a_small_difference_is_named_and_grows_u(change: dict[str, float], item: Item) -> None:
    (found,) = differences(TUBE, MHZ, replace(TUBE, **change), MHZ)  # type: ignore[arg-type]
    assert found.item is item
    assert not found.refused
    assert 0 < found.u_relative < 0.10
    twice = {name: 2 * new - getattr(TUBE, name) for name, new in change.items()}
    (more,) = differences(TUBE, MHZ, replace(TUBE, **twice), MHZ)  # type: ignore[arg-type]
    assert more.u_relative > found.u_relative


@pytest.mark.parametrize(
    ("mount", "change"),
    [
        (replace(TUBE, section=Section.RECTANGULAR, height_mm=30), {"hole_mm": 8.4}),
        (replace(TUBE, section=Section.RECTANGULAR, height_mm=30), {"wall_mm": 1.7}),
        (replace(TOP, section=Section.RECTANGULAR, height_mm=30), {"axis_height_mm": 6.3}),
        (replace(TUBE, section=Section.SQUARE, wall_mm=0.0), {"hole_mm": 8.4}),
    ],
)
def test_a_difference_counts_where_no_closed_form_covers_the_mount_too(
    mount: BoomMount, change: dict[str, float]
) -> None:
    (found,) = differences(mount, MHZ, replace(mount, **change), MHZ)  # type: ignore[arg-type]
    assert found.u_relative > 0.004


def test_differences_come_item_by_item() -> None:
    drawn = replace(TUBE, hole_mm=8.1, rod_diameter_mm=4.05)
    assert {d.item for d in differences(TUBE, MHZ, drawn, 432.0)} == {Item.ROD, Item.HOLE, Item.FREQUENCY}


@pytest.mark.parametrize(
    ("recorded", "drawn", "item"),
    [
        (TUBE, replace(BONDED, wall_mm=1.5), Item.STYLE),
        (TUBE, replace(TUBE, section=Section.SQUARE), Item.SECTION),
        (TUBE, replace(TUBE, wall_mm=0.0), Item.SOLID),
        (TUBE, replace(TUBE, film_insulation=True), Item.FILM),
        (TUBE, replace(TUBE, rod_diameter_mm=6.0), Item.ROD),
        (TUBE, replace(TUBE, wall_mm=4.0), Item.WALL),
        (TOP, replace(TOP, axis_height_mm=12.0), Item.HEIGHT),
    ],
)
def test_another_mount_is_refused(recorded: BoomMount, drawn: BoomMount, item: Item) -> None:
    found = {d.item: d for d in differences(recorded, MHZ, drawn, MHZ)}
    assert found[item].refused


def test_another_band_is_another_mount() -> None:
    """Theory moves g by 9 % only, but nobody measured it: more than a quarter away is refused."""
    (found,) = differences(replace(TOP, axis_height_mm=20.0), 144.0, replace(TOP, axis_height_mm=20.0), 432.0)
    assert found.item is Item.FREQUENCY
    assert found.refused


def test_nearest_closed_form_covers_what_closed_forms_do_not() -> None:
    rectangular = BoomMount(Style.BONDED_THROUGH, Section.RECTANGULAR, 30, 4, height_mm=20)
    bar = BoomMount(Style.INSULATED_THROUGH, Section.SQUARE, 20, 4, hole_mm=8)
    low, high = (
        nearest_closed_form_mm(replace(BONDED, section=Section.SQUARE, outside_mm=side_mm), 300, MHZ)
        for side_mm in (20.0, 30.0)
    )
    assert nearest_closed_form_mm(rectangular, 300, MHZ) == pytest.approx((low + high) / 2)
    round_bar = nearest_closed_form_mm(replace(bar, section=Section.ROUND), 300, MHZ)
    assert nearest_closed_form_mm(bar, 300, MHZ) == round_bar > 2
    assert nearest_closed_form_mm(BONDED, 300, MHZ) == pytest.approx(
        closed_form_allowance(BONDED, 300, MHZ).allowance_mm
    )
